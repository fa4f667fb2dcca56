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
import { monotoneSlopes } from '../plant/monotone-slopes.ts'

/** A given curve as an expression of what it is given against. */
export function curveOf(curve: Curve, against: Expression): Expression {
  if ('power' in curve) {
    const { at, value, exponent } = curve.power
    return times(constant(value), apply(powerLaw(exponent), divide(against, constant(at))))
  }
  return apply(interpolation(curve.points), against)
}

/** Below this part of its known point a power law is carried straight on, so that iterations may pass. */
const leastPart = 1e-4

/** r^exponent of a ratio r that is positive in any answer; 0 at r = 0 for a positive exponent. */
function powerLaw(exponent: number): Operation {
  const least = leastPart ** exponent
  const leastSlope = exponent * leastPart ** (exponent - 1)
  return {
    name: 'powerLaw',
    evaluate(tape, row) {
      const k = tape.first[row]!
      const r = tape.values[tape.operands[k]!]!
      const slot = tape.slotOf(row)
      if (r >= leastPart) {
        const value = r ** exponent
        tape.values[slot] = value
        tape.partials[k] = (exponent * value) / r
        return Outcome.fine
      }
      if (exponent <= 0) return Outcome.outsideDomain
      tape.values[slot] = r === 0 ? 0 : least + leastSlope * (r - leastPart)
      tape.partials[k] = leastSlope
      return Outcome.fine
    },
    invert: (target) => power(target, constant(1 / exponent)),
    print: ([r]) => ({ text: `(${r!.text})^${exponent}`, strength: 3 }),
  }
}

/** Monotone piecewise cubic through the points; beyond the ends straight on with the end slope. */
function interpolation(points: readonly (readonly [number, number])[]): Operation {
  const slopes = monotoneSlopes(points)
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
