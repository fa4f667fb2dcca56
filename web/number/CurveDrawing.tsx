import { monotoneSlopes } from '../../src/document.ts'
import type { CurvePoint } from './curve-text.ts'

interface Props {
  readonly points: readonly CurvePoint[]
  /** Where the plant stands on it, if it does. */
  readonly at: CurvePoint | null
  readonly width: number
  readonly height: number
}

const margin = 6

/** A given curve, drawn small: just as it is reckoned with, a monotone cubic and straight ends. */
export function CurveDrawing({ points, at, width, height }: Props) {
  const shown = at ? [...points, at] : points
  const [left, right] = range(shown.map(([r]) => r))
  const [low, high] = range(shown.map(([, q]) => q))
  const x = (r: number) => margin + ((r - left) / (right - left)) * (width - 2 * margin)
  const y = (q: number) => height - margin - ((q - low) / (high - low)) * (height - 2 * margin)
  const slopes = monotoneSlopes(points)
  const [first, last] = [points[0] as CurvePoint, points.at(-1) as CurvePoint]
  const straight = (from: CurvePoint, slope: number, r: number) =>
    `L${x(r)} ${y(from[1] + slope * (r - from[0]))}`
  const path = points
    .map((point, i) => {
      const before = points[i - 1]
      if (!before) return `M${x(point[0])} ${y(point[1])}`
      // A cubic by its end slopes is a Bézier curve with its handles a third of the way.
      const third = (point[0] - before[0]) / 3
      const one = [before[0] + third, before[1] + third * (slopes[i - 1] ?? 0)] as const
      const two = [point[0] - third, point[1] - third * (slopes[i] ?? 0)] as const
      return `C${[one, two, point].map(([r, q]) => `${x(r)} ${y(q)}`).join(' ')}`
    })
    .join('')
  return (
    <svg className="curve-drawing" width={width} height={height} role="img">
      <title>The curve through {points.length} points</title>
      <path
        className="curve-frame"
        d={`M${margin} ${margin}V${height - margin}H${width - margin}`}
      />
      <path className="curve-line" d={path} />
      {at && at[0] < first[0] && (
        <path
          className="curve-line curve-beyond"
          d={`M${x(first[0])} ${y(first[1])}${straight(first, slopes[0] ?? 0, at[0])}`}
        />
      )}
      {at && at[0] > last[0] && (
        <path
          className="curve-line curve-beyond"
          d={`M${x(last[0])} ${y(last[1])}${straight(last, slopes.at(-1) ?? 0, at[0])}`}
        />
      )}
      {points.map(([r, q]) => (
        <circle key={r} className="curve-point" cx={x(r)} cy={y(q)} r="2" />
      ))}
      {at && <circle className="curve-at" cx={x(at[0])} cy={y(at[1])} r="3.5" />}
    </svg>
  )
}

function range(values: readonly number[]): readonly [number, number] {
  const [low, high] = [Math.min(...values), Math.max(...values)]
  return high > low ? [low, high] : [low - 1, high + 1]
}
