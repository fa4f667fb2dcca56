import { Outcome, type Tape } from '../expression/index.ts'

/** How a block ended. Integers; 0 is solved. */
export const StepOutcome = {
  solved: 0,
  /** Something it needs is itself not known. */
  inputMissing: 1,
  /** The answer has no bound (a conductance without a temperature difference). */
  unbounded: 2,
  /** Pressure and temperature are those of saturation and leave the state open. */
  onSaturation: 3,
  /** A steam property would lie outside the formulation. */
  outsideRange: 4,
  /** An operation has no value there (a root of a negative number). */
  outsideDomain: 5,
  /** The equations do not determine the variables in numbers, and agree. */
  singular: 6,
  /** The equations do not determine the variables in numbers, and contradict each other. */
  contradictory: 7,
  /** No value within the physical range satisfies the equation. */
  noAnswer: 8,
  /** The iteration ended without an answer. */
  notConverged: 9,
} as const

/** What an operation's outcome means for the block that needed it. */
export function stepOutcome(outcome: number): number {
  switch (outcome) {
    case Outcome.fine:
      return StepOutcome.solved
    case Outcome.unbounded:
      return StepOutcome.unbounded
    case Outcome.onSaturation:
      return StepOutcome.onSaturation
    case Outcome.outsideRange:
      return StepOutcome.outsideRange
    default:
      return StepOutcome.outsideDomain
  }
}

/** By variable, SI. */
export interface Bounds {
  /** The range in which an answer may lie at all. */
  readonly lower: Float64Array
  readonly upper: Float64Array
  /** The range in which an answer makes sense, looked at first: flows forward, efficiencies to 1. */
  readonly sensibleLower: Float64Array
  readonly sensibleUpper: Float64Array
  /** A size that makes changes of different quantities comparable. */
  readonly scale: Float64Array
  /** The flow that carries the variable (an enthalpy): balances hold their product. Or -1. */
  readonly carrier: Int32Array
}

/** First guesses that an iteration may start from: the usual one, 0, and as many others as wanted. */
export interface Restart {
  /** How many are tried: `first`, then those that follow the choice. */
  readonly most: number
  readonly first: number
  /** Puts the unknowns there. */
  at(choice: number): void
}

export interface Step {
  /**
   * Solves the block from the values at hand; returns a `StepOutcome`. `choice` picks among the
   * other starts that `restart` offers, where there may be more than one answer.
   */
  run(tape: Tape, choice: number, restart?: Restart): number
  /** The answer may depend on where it starts. */
  readonly needsGuess: boolean
  /** Newton iterations of the last run. */
  readonly iterations: number
  /** Unknowns that the step iterates. */
  readonly size: number
  /** Which of the block's equations (its place in the block) missed most when there was no answer. */
  readonly worst: number
}

/** A variable that its equation gives outright. */
export class ExplicitStep implements Step {
  readonly needsGuess = false
  readonly iterations = 0
  readonly size = 0
  readonly worst = 0
  private readonly rows: Int32Array
  private readonly slot: number
  private readonly variable: number

  constructor(rows: Int32Array, slot: number, variable: number) {
    this.rows = rows
    this.slot = slot
    this.variable = variable
  }

  run(tape: Tape): number {
    const outcome = tape.evaluate(this.rows)
    if (outcome !== Outcome.fine) return stepOutcome(outcome)
    tape.values[this.variable] = tape.values[this.slot]!
    return StepOutcome.solved
  }
}

/** An iteration, and searches on a tape of their own for when it fails; made when first needed. */
export class FallbackStep implements Step {
  readonly needsGuess = true
  private readonly main: Step
  private readonly variables: Int32Array
  private readonly start: Float64Array
  private readonly make: () => { readonly tape: Tape; readonly steps: readonly Step[] }
  private made: { readonly tape: Tape; readonly steps: readonly Step[] } | undefined

  constructor(
    main: Step,
    variables: readonly number[],
    make: () => { readonly tape: Tape; readonly steps: readonly Step[] },
  ) {
    this.main = main
    this.variables = Int32Array.from(variables)
    this.start = new Float64Array(variables.length)
    this.make = make
  }

  get iterations(): number {
    return this.main.iterations
  }

  get worst(): number {
    return this.main.worst
  }

  get size(): number {
    return this.main.size
  }

  run(tape: Tape, choice: number, restart?: Restart): number {
    for (let k = 0; k < this.start.length; k++) this.start[k] = tape.values[this.variables[k]!]!
    const outcome = this.main.run(tape, choice, restart)
    if (outcome === StepOutcome.solved) return outcome
    this.made ??= this.make()
    const { tape: own, steps } = this.made
    for (const step of steps) {
      own.values.set(tape.values.subarray(0, own.variableCount))
      for (let k = 0; k < this.start.length; k++) own.values[this.variables[k]!] = this.start[k]!
      const before = own.work
      const outcomeThere = step.run(own, choice)
      tape.work += own.work - before
      if (outcomeThere !== StepOutcome.solved) continue
      for (const index of this.variables) tape.values[index] = own.values[index]!
      return StepOutcome.solved
    }
    return outcome
  }
}
