import { useId, useMemo, useRef, useState } from 'react'
import { formatQuantity, type Layout, labelOf, type UnitChoice } from '../../src/document.ts'
import type { HeatProfile, ZoneName } from '../../src/messages.ts'
import { useBalanceStore } from '../store/balance-store.ts'
import { useGhostStore } from '../store/ghost-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { rampAt } from '../styles/ramp.ts'
import { useChartSettings } from './chart-settings.ts'
import { markText, zoneWords } from './heat-zones.ts'
import { axisTicks } from './isobar-labels.ts'
import { textWidth } from './measure-text.ts'
import { InkGrid, placeLabels, type Rectangle } from './place-labels.ts'
import { whyEmpty } from './summary.ts'
import { useSize } from './use-size.ts'
import { roundTicks, tickDigits } from './view.ts'

const margin = { top: 30, right: 16, bottom: 36, left: 46 }
const rampStops = Array.from({ length: 17 }, (_, i) => i / 16)
const round = (px: number): number => Math.round(px * 10) / 10

interface Scale {
  x(heat: number): number
  y(T: number): number
}

function line(pairs: Float64Array, { x, y }: Scale): string {
  let d = ''
  for (let i = 0; i < pairs.length; i += 2) {
    d += `${i === 0 ? 'M' : 'L'}${round(x(pairs[i] as number))} ${round(y(pairs[i + 1] as number))}`
  }
  return d
}

/** Lowest and highest temperature of some lines, K. */
function rangeOf(lines: readonly Float64Array[]): readonly [number, number] {
  let low = Number.POSITIVE_INFINITY
  let high = Number.NEGATIVE_INFINITY
  for (const pairs of lines) {
    for (let i = 1; i < pairs.length; i += 2) {
      low = Math.min(low, pairs[i] as number)
      high = Math.max(high, pairs[i] as number)
    }
  }
  return [low, high]
}

interface ZoneLabel {
  readonly name: ZoneName
  /** With its heat. */
  readonly title: string
  /** What there is room for; empty where there is none. */
  readonly text: string
  readonly at: { readonly x: number; readonly y: number; readonly upright?: true }
  /** What the text covers. */
  readonly box: Rectangle | undefined
  readonly x: number
  readonly width: number
}

/** A zone's name along its foot, or upright where it is narrow: at its head at the cold end, where nothing runs. */
function zoneName(
  { name, from, to }: HeatProfile['zones'][number],
  place: number,
  plot: Rectangle,
  scale: Scale,
  units: UnitChoice,
): ZoneLabel {
  const x = scale.x(from)
  const width = scale.x(to) - x
  const { text, unit } = formatQuantity(to - from, 'heatFlow', units)
  const words = zoneWords[name]
  const title = `${words} ${text}\u2009${unit}`
  const bottom = plot.y + plot.height
  const common = { name, title, x, width }
  for (const one of [title, words]) {
    const wide = textWidth(one, 11)
    if (wide + 8 > width) continue
    const box = { x: x + (width - wide) / 2, y: bottom - 18, width: wide, height: 14 }
    return { ...common, text: one, at: { x: x + width / 2, y: bottom - 6 }, box }
  }
  const tall = textWidth(words, 11)
  const fits = width >= 13 && tall + 16 < plot.height
  const end = place === 0 ? plot.y + 8 + tall : bottom - 6
  const box = { x: x + width / 2 - 7, y: end - tall, width: 14, height: tall }
  const at = { x: x + width / 2 + 4, y: end, upright: true as const }
  return { ...common, text: fits ? words : '', at, box: fits ? box : undefined }
}

/** Temperature against heat of one unit: both sides, zones, the named differences, the closest approach. */
export function HeatPicture({
  profile,
  ghost,
  layout,
  units,
  width,
  height,
}: {
  readonly profile: HeatProfile
  readonly ghost?: HeatProfile | undefined
  readonly layout: Layout
  readonly units: UnitChoice
  readonly width: number
  readonly height: number
}) {
  const id = useId()
  const coldest = useBalanceStore((state) => state.coldest)
  const hottest = useBalanceStore((state) => state.hottest)
  const plot = {
    x: margin.left,
    y: margin.top,
    width: width - margin.left - margin.right,
    height: height - margin.top - margin.bottom,
  }
  const right = plot.x + plot.width
  const bottom = plot.y + plot.height
  const most = Math.max(profile.heat, ghost?.heat ?? 0)
  const [low, high] = rangeOf([
    profile.hot,
    profile.cold,
    ...(ghost ? [ghost.hot, ghost.cold] : []),
  ])
  const beside = Math.max(3, 0.09 * (high - low))
  const range: readonly [number, number] = [low - beside, high + 1.9 * beside]
  const scale: Scale = {
    x: (heat) => plot.x + (plot.width * heat) / most,
    y: (T) => bottom - (plot.height * (T - range[0])) / (range[1] - range[0]),
  }
  const heatAxis = axisTicks([0, most], 'heatFlow', units, (from, to) =>
    roundTicks(from, to, Math.max(2, plot.width / 60)),
  )
  const temperatureAxis = axisTicks(range, 'temperature', units, (from, to) =>
    roundTicks(from, to, Math.max(2, plot.height / 60)),
  )
  const written = (shown: readonly number[], i: number): string =>
    (shown[i] as number).toFixed(tickDigits(shown)).replace('-', '\u2212')

  const closest = profile.closest
  const isNamed = closest
    ? profile.marks.some(
        (mark) =>
          Math.abs(mark.at - closest.at) < 1e-6 * most &&
          Math.abs(mark.hot - mark.cold - closest.hot + closest.cold) < 1e-6,
      )
    : true
  const marks = closest && !isNamed ? [...profile.marks, closest] : profile.marks

  const requests = marks.map((mark, i) => {
    const { name, value } = markText(mark, layout, units)
    const isClosest =
      closest !== null && Math.abs(mark.hot - mark.cold - closest.hot + closest.cold) < 1e-6
    const text = isClosest && name !== 'closest' ? `${name}, closest` : name
    return {
      id: String(i),
      x: scale.x(mark.at),
      y: (scale.y(mark.hot) + scale.y(mark.cold)) / 2,
      width: textWidth(`${text} ${value}`, 12) + 6,
      height: 14,
      text,
      value,
      isClosest,
    }
  })
  const ink = new InkGrid(plot)
  for (const pairs of [profile.hot, profile.cold, profile.superheat]) {
    for (let i = 2; i < pairs.length; i += 2) {
      ink.addLine(
        scale.x(pairs[i - 2] as number),
        scale.y(pairs[i - 1] as number),
        scale.x(pairs[i] as number),
        scale.y(pairs[i + 1] as number),
        16,
      )
    }
  }
  const bounds = { ...plot, x: plot.x + 4, width: plot.width - 6, height: plot.height - 20 }
  const zones = profile.zones.map((zone, i) => zoneName(zone, i, plot, scale, units))
  const taken = zones.flatMap(({ box }) => (box ? [box] : []))
  const placed = placeLabels(requests, bounds, { ink: ink.inkIn, taken })
  const ramp = `url(#${id}-ramp)`

  return (
    <svg width={width} height={height} className="heat" role="presentation">
      <defs>
        <linearGradient
          id={`${id}-ramp`}
          gradientUnits="userSpaceOnUse"
          x1={0}
          x2={0}
          y1={scale.y(coldest)}
          y2={scale.y(hottest)}
        >
          {rampStops.map((share) => (
            <stop key={share} offset={share} stopColor={rampAt(share)} />
          ))}
        </linearGradient>
        <clipPath id={`${id}-plot`}>
          <rect x={plot.x - 2} y={plot.y} width={plot.width + 4} height={plot.height} />
        </clipPath>
      </defs>
      {zones.map(({ name, title, text, at, x, width: wide }, i) => (
        <g key={name}>
          <title>{title}</title>
          <rect
            className={i % 2 === 0 ? 'heat-zone' : 'heat-zone heat-zone-other'}
            x={x}
            y={plot.y}
            width={wide}
            height={plot.height}
          />
          <text
            className="heat-zone-name"
            {...('upright' in at
              ? { transform: `translate(${at.x} ${at.y}) rotate(-90)` }
              : { x: at.x, y: at.y, textAnchor: 'middle' as const })}
          >
            {text}
          </text>
        </g>
      ))}
      <path className="heat-axis" d={`M${plot.x} ${plot.y}V${bottom}H${right}`} />
      {temperatureAxis.si.map((T, i) => (
        <g key={T}>
          <path className="heat-axis" d={`M${plot.x - 4} ${round(scale.y(T))}h4`} />
          <text x={plot.x - 7} y={round(scale.y(T)) + 4} textAnchor="end">
            {written(temperatureAxis.shown, i)}
          </text>
        </g>
      ))}
      {heatAxis.si.map((heat, i) => (
        <g key={heat}>
          <path className="heat-axis" d={`M${round(scale.x(heat))} ${bottom}v4`} />
          <text x={round(scale.x(heat))} y={bottom + 16} textAnchor="middle">
            {written(heatAxis.shown, i)}
          </text>
        </g>
      ))}
      <text x={plot.x - 7} y={plot.y - 14} textAnchor="end">
        {temperatureAxis.unit}
      </text>
      <text x={right} y={height - 5} textAnchor="end">{`Q, ${heatAxis.unit}`}</text>
      {ghost && (
        <g className="chart-ghost">
          <path d={line(ghost.hot, scale)} />
          <path d={line(ghost.cold, scale)} />
        </g>
      )}
      <g className="heat-lines" stroke={ramp} clipPath={`url(#${id}-plot)`}>
        {profile.superheat.length > 0 && (
          <path className="heat-superheat" d={line(profile.superheat, scale)} />
        )}
        <path d={line(profile.hot, scale)} strokeWidth={3} />
        {profile.cold.length > 0 && <path d={line(profile.cold, scale)} strokeWidth={3} />}
      </g>
      {marks.map((mark, i) => {
        const x = Math.min(right - 0.75, Math.max(plot.x + 0.75, round(scale.x(mark.at))))
        const [y1, y2] = [round(scale.y(mark.hot)), round(scale.y(mark.cold))]
        return (
          <g
            key={mark.quantity ?? 'closest'}
            className={requests[i]?.isClosest ? 'heat-mark heat-closest' : 'heat-mark'}
          >
            <path d={`M${x} ${y1}V${y2}`} />
            <circle cx={x} cy={y1} r={2.1} />
            <circle cx={x} cy={y2} r={2.1} />
          </g>
        )
      })}
      <g className="chart-names">
        {placed.map(({ id: which, x, y, width: wide, height: tall, leader }) => {
          const request = requests[Number(which)]
          if (!request) return null
          return (
            <g key={which} className={request.isClosest ? 'closest' : undefined}>
              {leader && (
                <line
                  x1={request.x}
                  y1={request.y}
                  x2={Math.min(x + wide, Math.max(x, request.x))}
                  y2={Math.min(y + tall, Math.max(y, request.y))}
                />
              )}
              <text x={x + 1} y={y + 11}>
                {request.text}
                <tspan className="detail">{`\u00a0${request.value}`}</tspan>
              </text>
            </g>
          )
        })}
      </g>
    </svg>
  )
}

const none: readonly HeatProfile[] = []

export function useProfiles(): readonly HeatProfile[] {
  return useBalanceStore((state) => state.balance?.profiles ?? none)
}

/** The profile in words. */
function spoken(profile: HeatProfile, layout: Layout, units: UnitChoice): string {
  const { text, unit } = formatQuantity(profile.heat, 'heatFlow', units)
  const all = profile.closest ? [...profile.marks, profile.closest] : profile.marks
  const marks = all.map((mark) => {
    const { name, value } = markText(mark, layout, units)
    return `${name} ${value}`
  })
  return `Temperature against heat of ${labelOf(layout, profile.unit)}, ${text} ${unit}. ${marks.join(', ')}.`
}

/** Temperature against heat of the selected heater, exchanger or condenser. */
export default function HeatChart() {
  const sheet = useRef<HTMLDivElement>(null)
  const { width, height } = useSize(sheet)
  const layout = useLayout()
  const units = useUnitChoice()
  const profiles = useProfiles()
  const selected = useSelectionStore((state) => state.selected)
  const select = useSelectionStore((state) => state.select)
  const ghost = useGhostStore((state) => state.ghost)
  const ghostShown = useChartSettings((settings) => settings.ghost)
  const status = useBalanceStore((state) => state.balance?.status ?? null)
  const trouble = useBalanceStore((state) => state.trouble)
  const [last, setLast] = useState<string | null>(null)
  const base = useId()

  const wanted = selected.find((one) => profiles.some(({ unit }) => unit === one))
  if (wanted !== undefined && wanted !== last) setLast(wanted)
  const profile =
    profiles.find(({ unit }) => unit === wanted) ??
    profiles.find(({ unit }) => unit === last) ??
    profiles[0]
  const before = useMemo(
    () => ghost?.balance.profiles.find(({ unit }) => unit === profile?.unit),
    [ghost, profile],
  )

  return (
    <div className="heat-place">
      {profile && (
        <div className="heat-choice">
          <label htmlFor={`${base}-unit`}>Unit</label>
          <select
            id={`${base}-unit`}
            value={profile.unit}
            onChange={(event) => {
              setLast(event.target.value)
              select([event.target.value])
            }}
          >
            {profiles.map(({ unit }) => (
              <option key={unit} value={unit}>
                {labelOf(layout, unit)}
              </option>
            ))}
          </select>
        </div>
      )}
      <div ref={sheet} className="chart-sheet">
        {profile ? (
          width > 120 &&
          height > 120 && (
            <div className="chart-picture" role="img" aria-label={spoken(profile, layout, units)}>
              <HeatPicture
                profile={profile}
                ghost={ghostShown ? before : undefined}
                layout={layout}
                units={units}
                width={width}
                height={height}
              />
              {profile.cold.length === 0 && (
                <p className="heat-open">
                  The cooling side is open: give its inlet temperature and flow or rise.
                </p>
              )}
            </div>
          )
        ) : (
          <p className="chart-empty">
            {status === 'solved'
              ? 'This plant has no heater, exchanger or condenser that passes heat on.'
              : whyEmpty(layout.units.length, status, trouble)}
          </p>
        )}
      </div>
    </div>
  )
}
