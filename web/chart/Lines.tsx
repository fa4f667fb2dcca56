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
    if (d) lines.push({ index: i, d, width: lineWidth(curves.flows[i] ?? 0, largestFlow) })
  }
  // Narrow lines lie over wide ones, or they would be lost.
  return lines.sort((a, b) => b.width - a.width)
}

export const Lines = memo(function Lines({
  lines,
  stroke,
  clip,
}: {
  readonly lines: readonly Line[]
  readonly stroke: string
  readonly clip: string
}) {
  return (
    <g className="chart-lines" stroke={stroke} clipPath={clip}>
      {lines.map(({ index, d, width }) => (
        <path key={index} d={d} strokeWidth={width} />
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
