import { memo } from 'react'
import type { BalanceMessage } from '../../src/messages.ts'
import { useBalanceStore } from '../store/balance-store.ts'
import { type Geometry, pathThrough } from './geometry.ts'
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

/** Their pressures, at their ends. */
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
