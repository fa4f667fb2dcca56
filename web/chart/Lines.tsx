import { memo } from 'react'
import type { BalanceMessage, NamesMessage } from '../../src/messages.ts'
import { type Geometry, pathThrough } from './geometry.ts'

/** Width of a process line: 0.8 of the width that its stream has on the canvas, px. */
export function lineWidth(flow: number, largest: number): number {
  const share = largest > 0 && Number.isFinite(flow) ? Math.min(1, Math.abs(flow) / largest) : 0
  return 0.8 * (1.25 + 4.5 * Math.sqrt(share))
}

/** A process drawn: its line and how wide it is. */
export interface Line {
  readonly index: number
  readonly d: string
  readonly width: number
  /** Where temperature is not upright: its course along the line from end to end. */
  readonly colours?: Colours
}

interface Colours {
  readonly x1: number
  readonly y1: number
  readonly x2: number
  readonly y2: number
  /** Share of the way and temperature, K. */
  readonly stops: readonly (readonly [share: number, T: number])[]
}

/** Temperatures along a path, laid over the straight between its ends. */
function coloursOf(
  points: Float64Array,
  start: number,
  end: number,
  { x0, kx, y0, ky }: Geometry,
): Colours {
  const place = (i: number): readonly [number, number] => [
    x0 + kx * (points[3 * i] as number),
    y0 + ky * (points[3 * i + 2] as number),
  ]
  const [x1, y1] = place(start)
  let [x2, y2] = place(end - 1)
  // A gradient without length would not be drawn.
  if (Math.hypot(x2 - x1, y2 - y1) < 1) [x2, y2] = [x1 + 1, y1]
  const square = (x2 - x1) ** 2 + (y2 - y1) ** 2
  const stops: [number, number][] = []
  let reached = 0
  for (let i = start; i < end; i += 1) {
    const [x, y] = place(i)
    const share = ((x - x1) * (x2 - x1) + (y - y1) * (y2 - y1)) / square
    reached = Math.min(1, Math.max(reached, share))
    stops.push([reached, points[3 * i + 1] as number])
  }
  return { x1, y1, x2, y2, stops }
}

/** The processes of a balance as they are drawn, wide ones first. */
export function linesOf(
  curves: BalanceMessage['curves'],
  largestFlow: number,
  geometry: Geometry,
): readonly Line[] {
  const lines: Line[] = []
  for (let i = 0; i + 1 < curves.starts.length; i += 1) {
    const d = pathThrough(
      curves.points,
      curves.starts[i] as number,
      curves.starts[i + 1] as number,
      geometry,
    )
    if (!d) continue
    const [start, end] = [curves.starts[i] as number, curves.starts[i + 1] as number]
    lines.push({
      index: i,
      d,
      width: lineWidth(curves.flows[i] ?? 0, largestFlow),
      ...(geometry.upright === 'h'
        ? { colours: coloursOf(curves.points, start, end, geometry) }
        : {}),
    })
  }
  // Narrow lines lie over wide ones, or they would be lost.
  return lines.sort((a, b) => b.width - a.width)
}

export const Lines = memo(function Lines({
  lines,
  stroke,
  clip,
  colourOf,
  id,
}: {
  readonly lines: readonly Line[]
  readonly stroke: string
  readonly clip: string
  /** Colour of a temperature, for lines with colours of their own. */
  readonly colourOf: (T: number) => string
  readonly id: string
}) {
  return (
    <g className="chart-lines" stroke={stroke} clipPath={clip}>
      {lines.map(({ index, d, width, colours }) => (
        <g key={index}>
          {colours && (
            <linearGradient
              id={`${id}-line-${index}`}
              gradientUnits="userSpaceOnUse"
              x1={colours.x1}
              y1={colours.y1}
              x2={colours.x2}
              y2={colours.y2}
            >
              {colours.stops.map(([share, T], i) => (
                // biome-ignore lint/suspicious/noArrayIndexKey: stops are known by their order alone.
                <stop key={i} offset={share} stopColor={colourOf(T)} />
              ))}
            </linearGradient>
          )}
          <path
            d={d}
            strokeWidth={width}
            {...(colours ? { stroke: `url(#${id}-line-${index})` } : {})}
          />
        </g>
      ))}
    </g>
  )
})

/** The same processes of a remembered balance, thin and without colour. */
export const GhostLines = memo(function GhostLines({
  curves,
  geometry,
  clip,
}: {
  readonly curves: BalanceMessage['curves']
  readonly geometry: Geometry
  readonly clip: string
}) {
  return (
    <g className="chart-ghost" clipPath={clip}>
      {Array.from(curves.flows, (_, i) => (
        <path
          // biome-ignore lint/suspicious/noArrayIndexKey: processes are known by their order.
          key={i}
          d={pathThrough(
            curves.points,
            curves.starts[i] as number,
            curves.starts[i + 1] as number,
            geometry,
          )}
        />
      ))}
    </g>
  )
})

/** The soft band behind what is selected or pointed at. */
export function Halo({
  lines,
  names,
  active,
  clip,
}: {
  readonly lines: readonly Line[]
  readonly names: NamesMessage
  readonly active: ReadonlySet<string>
  readonly clip: string
}) {
  const lit = lines.filter(({ index }) => active.has(names.processes[index]?.unit ?? ''))
  if (lit.length === 0) return null
  return (
    <g className="chart-halo" clipPath={clip}>
      {lit.map(({ index, d, width }) => (
        <path key={index} d={d} strokeWidth={width + 11} />
      ))}
    </g>
  )
}
