import { formatQuantity, labelOf, type UnitChoice } from '../../src/document.ts'
import { useBalanceStore } from '../store/balance-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { useChart } from './chart-store.ts'
import { heightOf } from './geometry.ts'
import { textWidth } from './measure-text.ts'
import type { StreamState } from './stream-states.ts'
import { useNamedStates, useStates } from './use-named-states.ts'

interface Row {
  readonly symbol: string
  readonly text: string
  readonly unit: string
}

const quantities = [
  ['T', 'temperature'],
  ['p', 'pressure'],
  ['h', 'specificEnthalpy'],
  ['s', 'specificEntropy'],
  ['m', 'massFlow'],
] as const

function rowsOf(state: Pick<StreamState, 'T' | 'p' | 'h' | 's' | 'm'>, units: UnitChoice): Row[] {
  return quantities.flatMap(([symbol, dimension]) =>
    Number.isFinite(state[symbol])
      ? [{ symbol, ...formatQuantity(state[symbol], dimension, units) }]
      : [],
  )
}

/** Between the box and what it is about, px. */
const gap = 14
const lineHeight = 15
/** Symbols, borders and padding beside and above the numbers, px. */
const beside = 36
const above = 28
const widest = 190

/** Size of the box, px: it turns to the other side rather than leave the chart. */
function sizeOf(title: string, rows: readonly Row[]): { width: number; height: number } {
  const texts = rows.map(({ text, unit }) => textWidth(`${text} ${unit}`, 11) + beside)
  return {
    width: Math.min(widest, Math.max(textWidth(title, 12) + 20, ...texts)),
    height: above + lineHeight * rows.length,
  }
}

/** The numbers of the state or the place on a process that the pointer or the keyboard is on. */
export function ReadOut({ width, height }: { readonly width: number; readonly height: number }) {
  const pointed = useChart((chart) => chart.pointed)
  return pointed && <ReadOutBox width={width} height={height} />
}

function ReadOutBox({ width, height }: { readonly width: number; readonly height: number }) {
  const pointed = useChart((chart) => chart.pointed)
  const geometry = useChart((chart) => chart.geometry)
  const names = useBalanceStore((state) => state.names)
  const balance = useBalanceStore((state) => state.balance)
  const states = useStates()
  const named = useNamedStates()
  const layout = useLayout()
  const units = useUnitChoice()
  if (!pointed || !geometry || !names || !balance) return null

  let title: string
  let rows: Row[]
  let at: { readonly s: number; readonly T: number; readonly h: number }
  if (pointed.kind === 'state') {
    const state = states.get(pointed.stream)
    if (!state) return null
    title = named.find(({ id }) => id === state.id)?.name ?? labelOf(layout, state.id)
    rows = rowsOf(state, units)
    if (state.phase === 'wet') {
      rows.splice(4, 0, { symbol: 'x', ...formatQuantity(state.x, 'dryness', units) })
    }
    at = state
  } else {
    const process = names.processes[pointed.process]
    if (!process) return null
    const m = balance.curves.flows[pointed.process] ?? Number.NaN
    title = labelOf(layout, process.unit)
    rows = rowsOf({ ...pointed, p: Number.NaN, m }, units)
    // Along a process the pressure lies between those of its ends.
    const ends = [process.from, process.to].map((id) => states.get(id)?.p ?? Number.NaN)
    const [from, to] = ends.map((p) => formatQuantity(p, 'pressure', units))
    if (from && to && ends.every(Number.isFinite)) {
      const text =
        from.text === to.text && from.unit === to.unit
          ? from.text
          : from.unit === to.unit
            ? `${from.text} to ${to.text}`
            : `${from.text}\u2009${from.unit} to ${to.text}`
      rows.splice(1, 0, { symbol: 'p', text, unit: to.unit })
    }
    at = pointed
  }

  const x = geometry.x0 + geometry.kx * at.s
  const y = heightOf(geometry, at)
  const box = sizeOf(title, rows)
  const flipped = x + gap + box.width > width && x > width / 2
  const top = Math.max(2, Math.min(y - box.height / 2, height - box.height - 2))
  return (
    <div
      className="chart-read-out"
      aria-hidden="true"
      style={flipped ? { right: width - x + gap, top } : { left: x + gap, top }}
    >
      <div className="title">{title}</div>
      <dl>
        {rows.map(({ symbol, text, unit }) => (
          <div key={symbol}>
            <dt>{symbol}</dt>
            <dd>
              {text}
              {unit && <span className="unit">{`\u2009${unit}`}</span>}
            </dd>
          </div>
        ))}
      </dl>
    </div>
  )
}
