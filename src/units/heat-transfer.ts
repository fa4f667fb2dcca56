import {
  apply,
  type Equation,
  type Expression,
  equal,
  isConstant,
  minus,
  type Operation,
  Outcome,
  times,
} from '../equations/expression/index.ts'

/*
 * Counterflow surfaces: heat = conductance x logarithmic mean of the end differences. Iterations use
 * the same relation in effectiveness form, which has a value for every pair of differences.
 */

/** Relative difference below which the mean's series is more exact than its quotient. */
const nearlyEqual = 1e-3

/**
 * Reciprocal of the logarithmic mean of two positive differences, 1/K; without bound when one of
 * them is zero.
 */
const reciprocalMean: Operation = {
  name: 'reciprocalMean',
  evaluate(tape, row) {
    const k = tape.first[row]!
    const a = tape.values[tape.operands[k]!]!
    const b = tape.values[tape.operands[k + 1]!]!
    if (a < 0 || b < 0) return Outcome.outsideDomain
    if (a === 0 || b === 0) return Outcome.unbounded
    const slot = tape.slotOf(row)
    const difference = a - b
    if (Math.abs(difference) < nearlyEqual * a) {
      // ln(a/b)/(a - b) = (1 + r²/3 + r⁴/5 ...)/mean with r = (a - b)/(a + b).
      const mean = (a + b) / 2
      const r = difference / (a + b)
      const r2 = r * r
      const series = 1 + r2 * (1 / 3 + r2 * (1 / 5 + r2 / 7))
      const slope = r * (2 / 3 + r2 * (4 / 5 + (r2 * 6) / 7))
      const sum = a + b
      tape.values[slot] = series / mean
      tape.partials[k] = -series / (2 * mean * mean) + (slope * 2 * b) / (sum * sum * mean)
      tape.partials[k + 1] = -series / (2 * mean * mean) - (slope * 2 * a) / (sum * sum * mean)
      return Outcome.fine
    }
    const logarithm = Math.log(a / b)
    tape.values[slot] = logarithm / difference
    tape.partials[k] = (1 / a - logarithm / difference) / difference
    tape.partials[k + 1] = (logarithm / difference - 1 / b) / difference
    return Outcome.fine
  },
  print: ([a, b]) => ({ text: `1/LMTD(${a!.text}, ${b!.text})`, strength: 2 }),
}

/** (e^x - 1)/x, 1 at x = 0: positive, rising and smooth everywhere. */
const meanExponential: Operation = {
  name: 'meanExponential',
  evaluate(tape, row) {
    const k = tape.first[row]!
    const x = tape.values[tape.operands[k]!]!
    if (x > largestExponent) return Outcome.outsideDomain
    const slot = tape.slotOf(row)
    if (Math.abs(x) < 1e-4) {
      tape.values[slot] = 1 + x * (1 / 2 + x * (1 / 6 + x / 24))
      tape.partials[k] = 1 / 2 + x * (1 / 3 + x / 8)
      return Outcome.fine
    }
    const mean = Math.expm1(x) / x
    tape.values[slot] = mean
    tape.partials[k] = (Math.exp(x) - mean) / x
    return Outcome.fine
  },
  print: ([x]) => ({ text: `mean exponential(${x!.text})`, strength: 4 }),
}
/** Beyond it an iteration has gone astray. */
const largestExponent = 100

/** conductance (a - b)/heat, the transfer units by which one side changes more than the other. */
const unitsDifference: Operation = {
  name: 'unitsDifference',
  evaluate(tape, row) {
    const k = tape.first[row]!
    const { values, operands, partials } = tape
    const conductance = values[operands[k]!]!
    const difference = values[operands[k + 1]!]!
    const heat = values[operands[k + 2]!]!
    if (heat === 0) return Outcome.unbounded
    const quotient = (conductance * difference) / heat
    values[tape.slotOf(row)] = quotient
    partials[k] = difference / heat
    partials[k + 1] = conductance / heat
    partials[k + 2] = -quotient / heat
    return Outcome.fine
  },
  print: ([conductance, difference, heat]) => ({
    text: `${conductance!.text} (${difference!.text})/${heat!.text}`,
    strength: 2,
  }),
}

/** Energy flow over mass flow, J/kg; a third value where nothing flows. */
const mixedEnthalpyOperation: Operation = {
  name: 'mixedEnthalpy',
  evaluate(tape, row) {
    const k = tape.first[row]!
    const { values, operands, partials } = tape
    const m = values[operands[k + 1]!]!
    const slot = tape.slotOf(row)
    if (m === 0) {
      values[slot] = values[operands[k + 2]!]!
      partials[k] = 0
      partials[k + 1] = 0
      partials[k + 2] = 1
      return Outcome.fine
    }
    const h = values[operands[k]!]! / m
    values[slot] = h
    partials[k] = 1 / m
    partials[k + 1] = -h / m
    partials[k + 2] = 0
    return Outcome.fine
  },
  print: ([energyFlow, m]) => ({ text: `${energyFlow!.text}/${m!.text}`, strength: 2 }),
}

export function mixedEnthalpy(
  energyFlow: Expression,
  m: Expression,
  whenIdle: Expression,
): Expression {
  return isConstant(m, 0) ? whenIdle : apply(mixedEnthalpyOperation, energyFlow, m, whenIdle)
}

/**
 * conductance = heat/LMTD(hot, cold), the differences at the zone's hot and cold end, K. `zone`
 * names it in findings. Iterations use heat = conductance base (e^x - 1)/x with x = -conductance
 * (base - other)/heat, the same relation in effectiveness form: it has a value for differences of
 * any sign and no other root. `base` is the end whose difference is the larger.
 */
export function transfer(
  zone: string,
  conductance: Expression,
  heat: Expression,
  hot: Expression,
  cold: Expression,
  base: 'hot' | 'cold',
): Equation {
  const [large, small] = base === 'hot' ? [hot, cold] : [cold, hot]
  const units = apply(unitsDifference, conductance, minus(small, large), heat)
  return {
    ...equal(conductance, times(heat, apply(reciprocalMean, hot, cold))),
    iterated: minus(heat, times(conductance, times(large, apply(meanExponential, units)))),
    differences: {
      [`at the hot end of ${zone}`]: hot,
      [`at the cold end of ${zone}`]: cold,
    },
  }
}
