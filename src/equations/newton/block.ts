import { Outcome, type Tape } from '../expression/index.ts'
import type { GradientProgram } from './gradient.ts'
import { solveSingular } from './rank.ts'
import { Factors, SparseLU } from './sparse-lu.ts'
import { type Bounds, type Restart, type Step, StepOutcome, stepOutcome } from './step.ts'

/** Iterations times unknowns before no further start is tried. */
const mostWork = 12_000
/** A singular block larger than this is not looked into. */
const mostDense = 400
/** Steps aside from points where the linearised block is singular. */
const mostNudges = 4
/** Evaluated rows that the factors of a column cost as much as. */
const workPerColumn = 8
/** Newton iterations from one start before giving up. */
const mostIterations = 60
/** Step length below which the line search gives up. */
const shortest = 1 / 4096
/** A flow that shrinks below this part of itself spreads enthalpies no further. */
const leastDilution = 0.2
/** Steps below this, relative to the variables' sizes, are close enough to polish. */
const close = 1e-7
/** Steps below this are round-off. */
const roundOff = 1e-14
/** Residuals, relative to their rows, that still count as agreeing when the block is singular. */
const agreement = 1e-9

/**
 * Equations that must be solved together: Newton's method with scaled sparse factors, a line search
 * that backs off from the range of the steam properties, and polishing to round-off, so that warm
 * and cold starts give the same digits. A linear block takes one step and its polish.
 */
export class BlockStep implements Step {
  readonly needsGuess: boolean
  iterations = 0
  readonly size: number
  worst = 0
  readonly variables: readonly number[]
  readonly gradient: GradientProgram
  private readonly n: number
  private readonly prelude: Int32Array
  private readonly rows: Int32Array
  private readonly seeds: Int32Array
  private readonly variableSlots: Int32Array
  /** By place: the place of the flow that carries the variable, or -1. */
  private readonly carrier: Int32Array
  private readonly bounds: Bounds
  private readonly linear: boolean
  readonly factors: SparseLU
  private readonly columnOf: Int32Array
  private readonly entries: Float64Array
  private readonly scaled: Float64Array
  private readonly sizes: Float64Array
  private readonly rowScale: Float64Array
  private readonly residual: Float64Array
  private readonly step: Float64Array
  private readonly start: Float64Array
  private readonly origin: Float64Array
  private lower: Float64Array
  private upper: Float64Array
  private firstWorst = 0

  constructor(
    prelude: Int32Array,
    rows: Int32Array,
    seeds: readonly number[],
    variables: readonly number[],
    gradient: GradientProgram,
    bounds: Bounds,
    linear: boolean,
    assigned: ReadonlyMap<number, number> = new Map(),
  ) {
    const n = variables.length
    this.n = n
    this.size = n
    this.prelude = prelude
    this.rows = rows
    this.seeds = Int32Array.from(seeds)
    this.variables = variables
    this.variableSlots = Int32Array.from(variables)
    this.gradient = gradient
    this.bounds = bounds
    this.linear = linear
    this.needsGuess = !linear
    const place = new Map(variables.map((index, k) => [index, k]))
    // What an assigned flow starts from changes in proportion, or nearly.
    this.carrier = Int32Array.from(variables, (index) => {
      let flow = bounds.carrier[index]!
      for (let from = assigned.get(flow); from !== undefined; from = assigned.get(flow)) flow = from
      return place.get(flow) ?? -1
    })
    this.columnOf = gradient.entryVariable.map((index) => place.get(index)!)
    this.factors = new SparseLU(n, gradient.entryFirst, this.columnOf)
    this.entries = new Float64Array(this.columnOf.length)
    this.scaled = new Float64Array(this.columnOf.length)
    this.sizes = new Float64Array(n)
    this.rowScale = new Float64Array(n)
    this.residual = new Float64Array(n)
    this.step = new Float64Array(n)
    this.start = new Float64Array(n)
    this.origin = new Float64Array(n)
    this.lower = bounds.lower
    this.upper = bounds.upper
  }

  run(tape: Tape, choice: number, restart?: Restart): number {
    this.iterations = 0
    const before = tape.evaluate(this.prelude)
    if (before !== Outcome.fine) return stepOutcome(before)
    const { bounds } = this
    if (this.linear) return this.iterate(tape, bounds.lower, bounds.upper)
    this.remember(tape)
    this.origin.set(this.start)
    let first: number = StepOutcome.notConverged
    const starts = restart?.most ?? 1
    // Sensible answers are looked for first, from several starts; then any answer at all.
    for (let attempt = 0; attempt < 2 * starts; attempt++) {
      if (this.iterations * this.n > mostWork) break
      const isSensible = attempt < starts
      this.recall(tape)
      const turn = attempt % starts
      if (restart !== undefined) {
        const which = turn === 0 ? restart.first : choice + turn
        if (which > 0) restart.at(which)
      }
      const outcome = this.iterate(
        tape,
        isSensible ? bounds.sensibleLower : bounds.lower,
        isSensible ? bounds.sensibleUpper : bounds.upper,
      )
      if (outcome === StepOutcome.solved) return outcome
      if (attempt === 0) {
        first = outcome
        this.firstWorst = this.worst
      }
    }
    this.recall(tape)
    this.worst = this.firstWorst
    // That an iteration cannot go on does not prove that there is no answer.
    const proves = first === StepOutcome.singular || first === StepOutcome.contradictory
    return proves ? first : StepOutcome.notConverged
  }

  /** Puts the variables back to where they were. */
  private recall(tape: Tape): void {
    for (let j = 0; j < this.n; j++) tape.values[this.variableSlots[j]!] = this.origin[j]!
  }

  private iterate(tape: Tape, lower: Float64Array, upper: Float64Array): number {
    this.lower = lower
    this.upper = upper
    this.clamp(tape)
    let outcome = tape.evaluate(this.rows)
    // A start may stand just where an equation has no value (equal enthalpies in a divisor).
    for (let side = 1; outcome !== Outcome.fine && side <= mostNudges && !this.linear; side++) {
      outcome = this.nudge(tape, side)
    }
    if (outcome !== Outcome.fine) return stepOutcome(outcome)
    let previous = Number.POSITIVE_INFINITY
    let polishing = false
    let nudges = 0
    for (let iteration = 0; iteration < mostIterations; iteration++) {
      this.iterations++
      if (!this.linearise(tape)) {
        const verdict = this.singularStep()
        if (verdict !== StepOutcome.solved) {
          // Only wherever one looks do the equations contradict each other.
          if (this.linear || verdict === StepOutcome.singular || nudges >= mostNudges)
            return verdict
          nudges++
          outcome = this.nudge(tape, nudges)
          if (outcome !== Outcome.fine) return stepOutcome(outcome)
          continue
        }
        this.unscaleStep()
        outcome = this.linear ? this.fullStep(tape) : this.search(tape)
        if (outcome !== StepOutcome.solved) return outcome
        continue
      }
      this.factors.solve(this.residual, this.step)
      const length = this.unscaleStep()
      if (!Number.isFinite(length)) return StepOutcome.notConverged
      if (polishing && (length >= previous || length <= roundOff)) return StepOutcome.solved
      if (length <= close) polishing = true
      previous = length
      outcome = polishing || this.linear ? this.fullStep(tape) : this.search(tape)
      if (outcome !== StepOutcome.solved) return outcome
      if (this.linear) polishing = true
    }
    return StepOutcome.notConverged
  }

  /** Steps a little aside, each variable another way, always the same. */
  private nudge(tape: Tape, count: number): number {
    for (let j = 0; j < this.n; j++) {
      const index = this.variableSlots[j]!
      const side = ((j * 7 + count * 3) % 5) - 2
      const size = Math.max(Math.abs(tape.values[index]!), this.bounds.scale[index]! * 1e-2)
      tape.values[index]! += 0.01 * count * side * size
    }
    this.clamp(tape)
    return tape.evaluate(this.rows)
  }

  /** Recomputes the scaled factors at the present values; false when they are singular. */
  linearise(tape: Tape): boolean {
    const { n, entries, scaled, columnOf, gradient, sizes, rowScale, residual } = this
    tape.work += workPerColumn * n
    gradient.evaluate(tape, entries)
    for (let j = 0; j < n; j++) {
      const index = this.variableSlots[j]!
      sizes[j] = Math.max(Math.abs(tape.values[index]!), this.bounds.scale[index]! * 1e-2)
    }
    for (let i = 0; i < n; i++) {
      let largest = 0
      for (let e = gradient.entryFirst[i]!; e < gradient.entryFirst[i + 1]!; e++) {
        scaled[e] = entries[e]! * sizes[columnOf[e]!]!
        const entry = Math.abs(scaled[e]!)
        if (entry > largest) largest = entry
      }
      const scale = largest > 0 ? 1 / largest : 0
      rowScale[i] = scale
      for (let e = gradient.entryFirst[i]!; e < gradient.entryFirst[i + 1]!; e++) {
        scaled[e]! *= scale
      }
      residual[i] = tape.values[this.seeds[i]!]! * scale
    }
    return this.factors.factorise(scaled) === Factors.fine
  }

  /**
   * Where the linearised block is singular: a step that satisfies it all the same, when its
   * equations agree; `singular` when they hold already, `contradictory` when they do not agree.
   */
  private singularStep(): number {
    this.worst = Math.max(0, this.factors.singularRow)
    let largest = 0
    for (let i = 0; i < this.n; i++) largest = Math.max(largest, Math.abs(this.residual[i]!))
    if (largest <= agreement) return StepOutcome.singular
    if (this.n > mostDense) return StepOutcome.contradictory
    const { entryFirst } = this.gradient
    const { solution, misfit } = solveSingular(
      this.n,
      entryFirst,
      this.columnOf,
      this.scaled,
      this.residual,
    )
    if (misfit > agreement * Math.max(1, largest)) return StepOutcome.contradictory
    this.step.set(solution)
    return StepOutcome.solved
  }

  /** Turns the scaled solution into a change of the variables; returns its largest scaled part. */
  private unscaleStep(): number {
    let length = 0
    for (let j = 0; j < this.n; j++) {
      const part = Math.abs(this.step[j]!)
      if (!(part <= length)) length = part
      this.step[j] = -this.step[j]! * this.sizes[j]!
    }
    return length
  }

  private clamp(tape: Tape): void {
    const { lower, upper } = this
    for (let j = 0; j < this.n; j++) {
      const index = this.variableSlots[j]!
      const value = tape.values[index]!
      tape.values[index] = Math.min(upper[index]!, Math.max(lower[index]!, value))
    }
  }

  private move(tape: Tape, share: number): void {
    const { lower, upper } = this
    for (let j = 0; j < this.n; j++) {
      const index = this.variableSlots[j]!
      const from = this.start[j]!
      let to = from + share * this.step[j]! * this.dilution(j, share)
      // Going half the way to a bound instead of past it keeps every value inside.
      if (to < lower[index]!) to = from - (from - lower[index]!) / 2
      else if (to > upper[index]!) to = from + (upper[index]! - from) / 2
      tape.values[index] = to
    }
  }

  /**
   * Balances are linear in the energy flow m h, not in h: h moves as it must for m h to move along
   * its straight line.
   */
  private dilution(j: number, share: number): number {
    const flow = this.carrier[j]!
    if (flow < 0) return 1
    const before = this.start[flow]!
    const ratio = (before + share * this.step[flow]!) / before
    return ratio > leastDilution ? 1 / ratio : ratio > 0 ? 1 / leastDilution : 1
  }

  private remember(tape: Tape): void {
    for (let j = 0; j < this.n; j++) this.start[j] = tape.values[this.variableSlots[j]!]!
  }

  private fullStep(tape: Tape): number {
    this.remember(tape)
    this.move(tape, 1)
    const outcome = tape.evaluate(this.rows)
    if (outcome === Outcome.fine) return StepOutcome.solved
    this.move(tape, 0)
    tape.evaluate(this.rows)
    return this.search(tape)
  }

  private merit(tape: Tape): number {
    let sum = 0
    for (let i = 0; i < this.n; i++) {
      const part = tape.values[this.seeds[i]!]! * this.rowScale[i]!
      sum += part * part
    }
    return Math.sqrt(sum)
  }

  /** Shortens the step until the equations are met better than before. */
  private search(tape: Tape): number {
    this.remember(tape)
    const before = this.merit(tape)
    let best = -1
    let bestMerit = Number.POSITIVE_INFINITY
    let outcome: number = Outcome.fine
    for (let share = 1; share >= shortest; share /= 2) {
      this.move(tape, share)
      outcome = tape.evaluate(this.rows)
      if (outcome !== Outcome.fine) continue
      const merit = this.merit(tape)
      if (merit <= (1 - 1e-4 * share) * before || merit < 1e-13) return StepOutcome.solved
      if (merit < bestMerit) {
        bestMerit = merit
        best = share
      }
    }
    if (best < 0) return stepOutcome(outcome)
    // Nothing is better: take the least bad step, now and then that leads out of a corner.
    this.move(tape, best)
    tape.evaluate(this.rows)
    this.rememberWorst(tape)
    return bestMerit > 2 * before ? StepOutcome.notConverged : StepOutcome.solved
  }

  private rememberWorst(tape: Tape): void {
    let largest = -1
    for (let i = 0; i < this.n; i++) {
      const part = Math.abs(tape.values[this.seeds[i]!]! * this.rowScale[i]!)
      if (part > largest) {
        largest = part
        this.worst = i
      }
    }
  }
}
