import { memo } from 'react'
import type { BalanceMessage } from '../../src/messages.ts'
import { useBalanceStore } from '../store/balance-store.ts'
import { firstInside, type Geometry, pathThrough } from './geometry.ts'
import type { IsobarLabel } from './isobar-labels.ts'

/** What lies below the saturation line. */
export const Dome = memo(function Dome({ geometry }: { readonly geometry: Geometry }) {
  const points = useBalanceStore((state) => state.dome?.points)
  if (!points) return null
  return <path className="chart-dome" d={pathThrough(points, 0, points.length / 3, geometry)} />
})

/** Lines of constant pressure. */
export const Isobars = memo(function Isobars({
  isobars,
  geometry,
}: {
  readonly isobars: BalanceMessage['isobars']
  readonly geometry: Geometry
}) {
  return (
    <g className="chart-isobars">
      {Array.from(isobars.pressures, (p, i) => (
        <path
          key={p}
          d={pathThrough(
            isobars.points,
            isobars.starts[i] as number,
            isobars.starts[i + 1] as number,
            geometry,
          )}
        />
      ))}
    </g>
  )
})

/** Lines of constant dryness, each with its figure at the foot. */
export const DrynessLines = memo(function DrynessLines({
  geometry,
}: {
  readonly geometry: Geometry
}) {
  const lines = useBalanceStore((state) => state.dome?.dryness)
  if (!lines) return null
  return (
    <g className="chart-dryness">
      {Array.from(lines.x, (x, i) => {
        const [start, end] = [lines.starts[i] as number, lines.starts[i + 1] as number]
        const foot = firstInside(lines.points, start, end, geometry)
        return (
          <g key={x}>
            <path d={pathThrough(lines.points, start, end, geometry)} />
            {foot && (
              <text x={foot.x + 2} y={foot.y - 4}>
                {x.toFixed(1)}
              </text>
            )}
          </g>
        )
      })}
    </g>
  )
})

/** The isobars' pressures, at their ends. */
export function IsobarMarks({ labels }: { readonly labels: readonly IsobarLabel[] }) {
  return (
    <g className="chart-marks">
      {labels.map(({ isobar, x, y, text, unit }) => (
        <text key={isobar} x={x} y={y + 10}>
          {unit ? `${text}\u2009${unit}` : text}
        </text>
      ))}
    </g>
  )
}
