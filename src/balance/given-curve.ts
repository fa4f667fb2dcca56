import {
  apply,
  constant,
  divide,
  type Expression,
  type Operation,
  Outcome,
  power,
  times,
} from '../equations/expression/index.ts'
import type { Curve } from '../plant/document.ts'

/** A given curve as an expression of what it is given against. */
export function curveOf(curve: Curve, against: Expression): Expression {
  if ('power' in curve) {
    const { at, value, exponent } = curve.power
    return times(constant(value), power(divide(against, constant(at)), constant(exponent)))
  }
  return apply(interpolation(curve.points), against)
}

/**
 * Monotone piecewise cubic through the points (F. N. Fritsch and R. E. Carlson, SIAM J. Numer.
 * Anal. 17, 1980, 238-246; slopes by F. N. Fritsch and J. Butland, SIAM J. Sci. Stat. Comput. 5,
 * 1984, 300-304): weighted harmonic mean of the secants, 0 where they change sign; three-point end
 * slopes; beyond the ends straight on with the end slope.
 */
function interpolation(points: readonly (readonly [number, number])[]): Operation {
  const slopes = slopesOf(points)
  const last = points.length - 1
  return {
    name: 'curve',
    evaluate(tape, row) {
      const k = tape.first[row]!
      const r = tape.values[tape.operands[k]!]!
      const slot = tape.slotOf(row)
      if (r <= points[0]![0] || r >= points[last]![0]) {
        const end = r <= points[0]![0] ? 0 : last
        tape.values[slot] = points[end]![1] + slopes[end]! * (r - points[end]![0])
        tape.partials[k] = slopes[end]!
        return Outcome.fine
      }
      let i = 0
      while (points[i + 1]![0] < r) i++
      const [r0, q0] = points[i]!
      const [r1, q1] = points[i + 1]!
      const width = r1 - r0
      const t = (r - r0) / width
      const secant = (q1 - q0) / width
      const c = 3 * secant - 2 * slopes[i]! - slopes[i + 1]!
      const d = slopes[i]! + slopes[i + 1]! - 2 * secant
      tape.values[slot] = q0 + width * t * (slopes[i]! + t * (c + t * d))
      tape.partials[k] = slopes[i]! + t * (2 * c + 3 * t * d)
      return Outcome.fine
    },
    print: ([r]) => ({ text: `curve(${r!.text})`, strength: 4 }),
  }
}

function slopesOf(points: readonly (readonly [number, number])[]): Float64Array {
  const n = points.length
  const widths = new Float64Array(n - 1)
  const secants = new Float64Array(n - 1)
  for (let i = 0; i < n - 1; i++) {
    widths[i] = points[i + 1]![0] - points[i]![0]
    secants[i] = (points[i + 1]![1] - points[i]![1]) / widths[i]!
  }
  const slopes = new Float64Array(n)
  if (n === 2) return slopes.fill(secants[0]!)
  for (let i = 1; i < n - 1; i++) {
    const before = secants[i - 1]!
    const after = secants[i]!
    if (before * after <= 0) continue
    const w1 = 2 * widths[i]! + widths[i - 1]!
    const w2 = widths[i]! + 2 * widths[i - 1]!
    slopes[i] = (w1 + w2) / (w1 / before + w2 / after)
  }
  slopes[0] = endSlope(widths[0]!, widths[1]!, secants[0]!, secants[1]!)
  slopes[n - 1] = endSlope(widths[n - 2]!, widths[n - 3]!, secants[n - 2]!, secants[n - 3]!)
  return slopes
}

/**
 * Three-point slope at an end: 0 when against the first secant, at most three times it where the
 * secants change sign.
 */
function endSlope(width: number, nextWidth: number, secant: number, nextSecant: number): number {
  const slope = ((2 * width + nextWidth) * secant - width * nextSecant) / (width + nextWidth)
  if (Math.sign(slope) !== Math.sign(secant)) return 0
  if (Math.sign(secant) !== Math.sign(nextSecant) && Math.abs(slope) > 3 * Math.abs(secant)) {
    return 3 * secant
  }
  return slope
}
