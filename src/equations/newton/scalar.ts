import { Outcome, type Tape } from '../expression/index.ts'
import type { GradientProgram } from './gradient.ts'
import { type Bounds, type Step, StepOutcome, stepOutcome } from './step.ts'

/** A change below this part of the variable's size is round-off. */
const roundOff = 4e-16
/** Newton steps before the range is searched. */
const mostSteps = 40
/** Places looked at when the range is searched for a change of sign. */
const places = 96
const mostBisections = 200

/**
 * One equation that its variable appears in more than once: Newton's method kept inside a bracket;
 * when it fails, the physical range is searched for a change of sign.
 */
export class ScalarStep implements Step {
  readonly needsGuess: boolean
  iterations = 0
  readonly size = 1
  readonly worst = 0
  private readonly prelude: Int32Array
  private readonly rows: Int32Array
  private readonly seed: number
  private readonly variable: number
  private readonly gradient: GradientProgram
  private readonly bounds: Bounds
  private readonly linear: boolean
  private readonly slope = new Float64Array(1)
  private lower = 0
  private upper = 0

  constructor(
    prelude: Int32Array,
    rows: Int32Array,
    seed: number,
    variable: number,
    gradient: GradientProgram,
    bounds: Bounds,
    linear: boolean,
  ) {
    this.prelude = prelude
    this.rows = rows
    this.seed = seed
    this.variable = variable
    this.gradient = gradient
    this.bounds = bounds
    this.linear = linear
    this.needsGuess = !linear
  }

  run(tape: Tape): number {
    this.iterations = 0
    const before = tape.evaluate(this.prelude)
    if (before !== Outcome.fine) return stepOutcome(before)
    if (this.linear) return this.solveLinear(tape)
    const { bounds, variable } = this
    const start = tape.values[variable]!
    this.lower = bounds.sensibleLower[variable]!
    this.upper = bounds.sensibleUpper[variable]!
    if (this.newton(tape) || this.search(tape) === StepOutcome.solved) return StepOutcome.solved
    tape.values[variable] = start
    this.lower = bounds.lower[variable]!
    this.upper = bounds.upper[variable]!
    return this.newton(tape) ? StepOutcome.solved : this.search(tape)
  }

  private solveLinear(tape: Tape): number {
    const { values } = tape
    for (let pass = 0; pass < 2; pass++) {
      const outcome = tape.evaluate(this.rows)
      if (outcome !== Outcome.fine) return stepOutcome(outcome)
      this.gradient.evaluate(tape, this.slope)
      const residual = values[this.seed]!
      const slope = this.slope[0]!
      if (slope === 0) {
        return residual === 0 ? StepOutcome.singular : StepOutcome.contradictory
      }
      values[this.variable]! -= residual / slope
    }
    return stepOutcome(tape.evaluate(this.rows))
  }

  /** The residual at x, or NaN where it has no value. */
  private at(tape: Tape, x: number): number {
    tape.values[this.variable] = x
    return tape.evaluate(this.rows) === Outcome.fine ? tape.values[this.seed]! : Number.NaN
  }

  /** Newton's method from the value at hand, with a bracket as soon as both signs have been seen. */
  private newton(tape: Tape): boolean {
    const { variable, lower, upper } = this
    let x = Math.min(upper, Math.max(lower, tape.values[variable]!))
    let below = Number.NaN
    let above = Number.NaN
    let f = this.at(tape, x)
    if (Number.isNaN(f)) return false
    for (let step = 0; step < mostSteps; step++) {
      this.iterations++
      if (f === 0) return true
      if (f < 0) below = x
      else above = x
      this.gradient.evaluate(tape, this.slope)
      const slope = this.slope[0]!
      let next = slope === 0 ? Number.NaN : x - f / slope
      if (!Number.isNaN(below) && !Number.isNaN(above)) {
        const low = Math.min(below, above)
        const high = Math.max(below, above)
        if (!(next > low && next < high)) next = low + (high - low) / 2
      } else if (Number.isNaN(next)) return false
      next = Math.min(upper, Math.max(lower, next))
      if (this.isSame(next, x)) return this.settle(tape, next)
      let value = this.at(tape, next)
      for (let halving = 0; Number.isNaN(value) && halving < 30; halving++) {
        next = x + (next - x) / 2
        value = this.at(tape, next)
      }
      if (Number.isNaN(value)) return false
      x = next
      f = value
    }
    return false
  }

  private isSame(a: number, b: number): boolean {
    return (
      Math.abs(a - b) <= roundOff * Math.max(Math.abs(a), this.bounds.scale[this.variable]! * 1e-3)
    )
  }

  /** Accepts x when the residual is round-off there, not when the method got stuck at a bound. */
  private settle(tape: Tape, x: number): boolean {
    const f = this.at(tape, x)
    if (Number.isNaN(f)) return false
    this.gradient.evaluate(tape, this.slope)
    const size = Math.max(Math.abs(x), this.bounds.scale[this.variable]! * 1e-3)
    return Math.abs(f) <= 1e-12 * Math.abs(this.slope[0]!) * size || f === 0
  }

  /** Looks over the range for a change of sign and closes in on it. */
  private search(tape: Tape): number {
    const { variable, bounds, lower, upper } = this
    let previous = Number.NaN
    let previousX = Number.NaN
    let seen = false
    for (let k = 0; k <= places; k++) {
      const x = place(lower, upper, k / places, bounds.scale[variable]!)
      const f = this.at(tape, x)
      if (f === 0) return StepOutcome.solved
      if (!Number.isNaN(f)) {
        seen = true
        if (!Number.isNaN(previous) && f < 0 !== previous < 0) {
          if (this.bisect(tape, previousX, previous, x)) return StepOutcome.solved
        }
      }
      previous = f
      previousX = x
    }
    return seen ? StepOutcome.noAnswer : StepOutcome.outsideRange
  }

  private bisect(tape: Tape, start: number, startValue: number, end: number): boolean {
    let a = start
    let b = end
    for (let k = 0; k < mostBisections; k++) {
      const middle = a + (b - a) / 2
      const f = this.at(tape, middle)
      if (f === 0) return true
      if (Number.isNaN(f)) return false
      if (f < 0 === startValue < 0) a = middle
      else b = middle
      // Close enough for Newton's method, which finds round-off faster.
      if (Math.abs(b - a) < 1e-6 * Math.max(Math.abs(a), Math.abs(b)) && this.newton(tape))
        return true
      if (this.isSame(a, b)) {
        // A jump of the formulation across zero: the place is known, its residual cannot vanish.
        return this.isJump(tape, a, b)
      }
    }
    return false
  }

  private isJump(tape: Tape, a: number, b: number): boolean {
    const fa = this.at(tape, a)
    const fb = this.at(tape, b)
    const range = Math.abs(fa - fb)
    return Number.isFinite(range) && range < 1e3 && fa < 0 !== fb < 0
  }
}

/** A place within the range: evenly by logarithm where it spans decades, else evenly. */
function place(lower: number, upper: number, share: number, scale: number): number {
  if (lower > 0 && upper / lower > 1e3) return lower * (upper / lower) ** share
  const low = Math.max(lower, -1e4 * scale)
  const high = Math.min(upper, 1e4 * scale)
  if (high - low > 1e3 * scale) {
    // Dense near zero, reaching far both ways.
    const t = 2 * share - 1
    const reach = Math.sinh(9 * t) / Math.sinh(9)
    return t < 0 ? -low * reach : high * reach
  }
  return low + (high - low) * share
}
