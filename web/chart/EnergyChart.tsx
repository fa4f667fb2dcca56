import { memo, useMemo, useRef } from 'react'
import { formatQuantity, type UnitChoice } from '../../src/document.ts'
import { useBalanceStore } from '../store/balance-store.ts'
import { type Ghost, useGhostStore } from '../store/ghost-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { useChartSettings } from './chart-settings.ts'
import { barIn, type EnergyAccount, type EnergyBar, energyAccount } from './energy-bars.ts'
import { textWidth } from './measure-text.ts'
import { whyEmpty } from './summary.ts'
import { useSize } from './use-size.ts'

const rowHeight = 27
const headHeight = 30
const noteHeight = 18
const barHeight = 6
const side = 14

interface Section {
  readonly part: 'energy' | 'exergy'
  readonly title: string
  readonly note: string
  readonly bars: readonly EnergyBar[]
}

const shown = (value: number, units: UnitChoice): string => {
  const { text, unit } = formatQuantity(value, 'heatFlow', units)
  return `${text}\u2009${unit}`
}
const percent = (share: number): string =>
  share > 0 && share < 5e-5
    ? '<\u20090.01\u2009%'
    : `${(100 * share).toFixed(share < 0.0995 ? 2 : 1)}\u2009%`

function sectionsOf(account: EnergyAccount, units: UnitChoice): readonly Section[] {
  const { energyEntering, exergyEntering, entering, energy, exergyLeaving, destroyed } = account
  const sources = entering.map(({ label, value }) => `${label} ${shown(value, units)}`).join('; ')
  const leaving = exergyLeaving.reduce((sum, { value }) => sum + value, 0)
  return [
    {
      part: 'energy',
      title: `Where ${shown(energyEntering, units)} go`,
      note: `Enters: ${sources}`,
      bars: energy,
    },
    {
      part: 'exergy',
      title: `Exergy destroyed, of ${shown(exergyEntering, units)}`,
      note: `Leaves as exergy: ${shown(leaving, units)}, ${percent(leaving / exergyEntering)}`,
      bars: destroyed,
    },
  ]
}

/** A text no wider than there is room for. */
function fitted(text: string, room: number): string {
  if (textWidth(text, 12) <= room) return text
  let end = text.length - 1
  while (end > 1 && textWidth(`${text.slice(0, end)}…`, 12) > room) end -= 1
  return `${text.slice(0, end).trimEnd()}…`
}

/** Heat flows and exergy destroyed as ranked bars, at a width; as high as it needs to be. */
export const EnergyPicture = memo(function EnergyPicture({
  account,
  width,
  units,
  ghost = null,
  most = Number.POSITIVE_INFINITY,
}: {
  readonly account: EnergyAccount
  readonly width: number
  readonly units: UnitChoice
  readonly ghost?: Ghost | null
  /** Bars in a section; the smaller ones together make the last. */
  readonly most?: number
}) {
  const active = useSelectionStore((state) => state.hovered)
  const selected = useSelectionStore((state) => state.selected)
  const { hover, select } = useSelectionStore.getState()
  const room = width - 2 * side
  const sections = sectionsOf(account, units).map((section) => ({
    ...section,
    bars: joined(section.bars, most),
  }))
  let y = 4
  const drawn = sections.map((section) => {
    const top = y
    y += headHeight + noteHeight + rowHeight * section.bars.length + 8
    return { ...section, top }
  })
  return (
    <svg width={width} height={y} className="energy" role="presentation">
      {drawn.map(({ part, title, note, bars, top }) => {
        const longest = Math.max(...bars.map(({ value }) => value), 0)
        return (
          <g key={part} transform={`translate(${side} ${top})`}>
            <text className="energy-title" y={17}>
              {title}
            </text>
            <text className="energy-note" y={headHeight + 4}>
              {fitted(note, room)}
              <title>{note}</title>
            </text>
            {bars.map((bar, i) => {
              const value = `${shown(bar.value, units)}`
              const share = percent(bar.share)
              const before = ghost ? barIn(ghost.names, ghost.balance, bar, part) : undefined
              const length = longest > 0 ? (room * Math.max(0, bar.value)) / longest : 0
              const isLit = bar.owner === active || selected.includes(bar.owner)
              return (
                // biome-ignore lint/a11y/noStaticElementInteractions: units are reached by keys through the tables and the canvas
                <g
                  key={`${bar.owner}/${bar.item}`}
                  className={isLit ? 'energy-bar active' : 'energy-bar'}
                  data-item={bar.item}
                  transform={`translate(0 ${headHeight + noteHeight + i * rowHeight})`}
                  onPointerEnter={() => hover(bar.owner === '' ? null : bar.owner)}
                  onPointerLeave={() => hover(null)}
                  onClick={() => bar.owner !== '' && select([bar.owner])}
                >
                  <rect className="energy-grip" x={-4} y={-2} width={room + 8} height={rowHeight} />
                  <text className="energy-label" y={10}>
                    {fitted(bar.label, room - 120)}
                  </text>
                  <text className="energy-value" x={room - 52} y={10} textAnchor="end">
                    {value}
                  </text>
                  <text className="energy-share" x={room} y={10} textAnchor="end">
                    {share}
                  </text>
                  <rect className="energy-length" y={15} width={length} height={barHeight} />
                  {before !== undefined && longest > 0 && before > 0 && (
                    <path
                      className="energy-ghost"
                      d={`M${Math.min(room, (room * before) / longest)} 13V23`}
                    >
                      <title>{`${ghost?.label}: ${shown(before, units)}`}</title>
                    </path>
                  )}
                </g>
              )
            })}
          </g>
        )
      })}
    </svg>
  )
})

/** The largest bars and one for all the rest. */
function joined(bars: readonly EnergyBar[], most: number): readonly EnergyBar[] {
  if (bars.length <= most) return bars
  const rest = bars.slice(most - 1)
  return [
    ...bars.slice(0, most - 1),
    {
      owner: '',
      item: 'destroyed',
      label: `${rest.length} others`,
      value: rest.reduce((sum, { value }) => sum + value, 0),
      share: rest.reduce((sum, { share }) => sum + share, 0),
    },
  ]
}

/** The account of the balance shown; undefined while it is open. */
export function useEnergyAccount(): EnergyAccount | undefined {
  const layout = useLayout()
  const names = useBalanceStore((state) => state.names)
  const balance = useBalanceStore((state) => state.balance)
  return useMemo(() => energyAccount({ layout, names, balance }), [layout, names, balance])
}

/** Where the energy goes: heat flows, and exergy destroyed per unit, as ranked bars. */
export default function EnergyChart() {
  const sheet = useRef<HTMLDivElement>(null)
  const { width } = useSize(sheet)
  const units = useUnitChoice()
  const account = useEnergyAccount()
  const ghost = useGhostStore((state) => state.ghost)
  const ghostShown = useChartSettings((settings) => settings.ghost)
  const { units: placed } = useLayout()
  const status = useBalanceStore((state) => state.balance?.status ?? null)
  const trouble = useBalanceStore((state) => state.trouble)
  return (
    <section
      ref={sheet}
      className="chart-sheet chart-scroll"
      aria-label="Where the energy goes"
      // biome-ignore lint/a11y/noNoninteractiveTabindex: the keyboard scrolls what takes the focus
      tabIndex={0}
    >
      {account && width > 120 ? (
        <div
          className="chart-picture chart-picture-tall"
          role="img"
          aria-label={spoken(account, units)}
        >
          <EnergyPicture
            account={account}
            width={width}
            units={units}
            ghost={ghostShown ? ghost : null}
          />
        </div>
      ) : (
        <p className="chart-empty">
          {status === 'solved'
            ? 'Nothing enters this plant that could go anywhere.'
            : whyEmpty(placed.length, status, trouble)}
        </p>
      )}
    </section>
  )
}

function spoken(account: EnergyAccount, units: UnitChoice): string {
  return sectionsOf(account, units)
    .map(({ title, bars }) => {
      const chief = bars.slice(0, 6).map(({ label, value }) => `${label} ${shown(value, units)}`)
      return `${title}: ${chief.join(', ')}.`
    })
    .join(' ')
}
