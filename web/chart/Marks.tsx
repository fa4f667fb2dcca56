import { memo } from 'react'
import { type Geometry, heightOf } from './geometry.ts'
import type { StreamState } from './stream-states.ts'

/** Where the state of a stream lies on the chart, px. */
export interface Mark {
  readonly id: string
  readonly x: number
  readonly y: number
}

/** The states within the plot. */
export function marksOf(
  states: ReadonlyMap<string, StreamState>,
  geometry: Geometry,
): readonly Mark[] {
  const { plot, x0, kx } = geometry
  const marks: Mark[] = []
  for (const state of states.values()) {
    const { id } = state
    const x = Math.round(10 * (x0 + kx * state.s)) / 10
    const y = Math.round(10 * heightOf(geometry, state)) / 10
    const inside =
      x >= plot.x && x <= plot.x + plot.width && y >= plot.y && y <= plot.y + plot.height + 1
    if (inside) marks.push({ id, x, y })
  }
  return marks
}

export const Marks = memo(function Marks({ marks }: { readonly marks: readonly Mark[] }) {
  const drawn: Mark[] = []
  for (const mark of marks) {
    // States on one spot (before and after a pipe) get one mark.
    const hidden = drawn.some((other) => Math.hypot(other.x - mark.x, other.y - mark.y) < 3)
    if (!hidden) drawn.push(mark)
  }
  return (
    <g className="chart-states">
      {drawn.map(({ id, x, y }) => (
        <circle key={id} cx={x} cy={y} r={2.1} />
      ))}
    </g>
  )
})

/** A ring round each state that is selected or pointed at. */
export function Rings({
  marks,
  active,
}: {
  readonly marks: readonly Mark[]
  readonly active: ReadonlySet<string>
}) {
  return (
    <g className="chart-rings">
      {marks
        .filter(({ id }) => active.has(id))
        .map(({ id, x, y }) => (
          <g key={id}>
            <circle className="band" cx={x} cy={y} r={8} />
            <circle className="ring" cx={x} cy={y} r={3.6} />
          </g>
        ))}
    </g>
  )
}
