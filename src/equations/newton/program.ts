import { type Equation, type Tape, TapeBuilder, variablesOf } from '../expression/index.ts'
import { type Block, draftStep } from './draft.ts'
import { type Bounds, type Step, StepOutcome } from './step.ts'

/** Starts of a block that are tried before giving up. */
const mostStarts = 10

/** Which of the first guesses blocks start from: `first`, then those after the choice. */
export interface Starting {
  readonly choice?: number
  readonly first?: number
  /** How many a block tries. */
  readonly most?: number
}

/**
 * A structure ready to be solved: blocks in order, lowered into one tape. Explicit equations are
 * assigned, the others iterated block by block.
 */
export class Program {
  readonly tape: Tape
  readonly steps: readonly Step[]
  readonly blocks: readonly Block[]
  /** By step: how it ended last time. */
  readonly outcomes: Uint8Array
  /** By variable: it could not be computed (1), or would have to be unbounded (2). */
  readonly lost: Uint8Array
  /** By variable: it changed since the step that needs it last ran. */
  private readonly changed: Uint8Array
  private readonly inputs: readonly Int32Array[]
  /** By variable: the step that solves for it, or -1. */
  private readonly stepOf: Int32Array
  /** Variables of the steps that iterate. */
  private readonly guessed: readonly number[]
  private readonly iterated: readonly (readonly number[])[]
  private fresh = true

  constructor(
    equations: readonly Equation[],
    blocks: readonly Block[],
    variableCount: number,
    bounds: Bounds,
  ) {
    const builder = new TapeBuilder(variableCount)
    const drafts = blocks.map((block) => draftStep(builder, equations, block))
    this.tape = builder.finish()
    const adjoint = new Float64Array(this.tape.values.length)
    this.steps = drafts.map(({ step }) => step(builder, adjoint, bounds))
    this.iterated = drafts.map((draft) => draft.equations)
    this.blocks = blocks
    this.outcomes = new Uint8Array(blocks.length)
    this.lost = new Uint8Array(variableCount)
    this.changed = new Uint8Array(variableCount)
    this.inputs = inputsOfBlocks(equations, blocks, variableCount)
    this.stepOf = new Int32Array(variableCount).fill(-1)
    const guessed: number[] = []
    blocks.forEach(({ variables }, k) => {
      const iterates = this.steps[k]!.needsGuess
      for (const index of variables) {
        this.stepOf[index] = k
        if (iterates) guessed.push(index)
      }
    })
    this.guessed = guessed
  }

  /** Says that a variable the program does not solve for (a given) has a new value. */
  set(index: number, value: number): void {
    if (this.tape.values[index] === value) return
    this.tape.values[index] = value
    this.changed[index] = 1
  }

  /** Marks a variable that no block solves for as not known. */
  lose(index: number): void {
    this.lost[index] = 1
  }

  /**
   * Solves every block that an edit touched, in order, from the values at hand. A block that has
   * no answer loses its variables; what does not need them is solved all the same.
   * Returns the number of Newton iterations of the hardest block. `guess` is called once before
   * the first block that iterates, with a test of which variables are known by then.
   */
  solve(guess?: Guess, { choice = 0, first = choice, most = mostStarts }: Starting = {}): number {
    let iterations = 0
    let guessed = guess === undefined
    for (let k = 0; k < this.steps.length; k++) {
      if (!this.fresh && !this.isTouched(k) && this.outcomes[k] === StepOutcome.solved) continue
      if (!guessed && this.steps[k]!.needsGuess) {
        guessed = true
        guess!(this.knownBefore(k), first, this.guessed)
      }
      const used = this.run(k, choice, guess && { first, most, guess })
      if (used > iterations) iterations = used
    }
    this.changed.fill(0)
    this.fresh = false
    return iterations
  }

  private knownBefore(step: number): (index: number) => boolean {
    const { stepOf, lost } = this
    return (index) => stepOf[index]! < step && lost[index] === 0
  }

  /** Rows evaluated over all solutions so far. */
  get work(): number {
    return this.tape.work
  }

  /** Whether some block that these variables hang on, step by step, may have more than one answer. */
  hasChoiceBehind(variables: readonly number[]): boolean {
    const seen = new Uint8Array(this.steps.length)
    const stack = [...variables]
    while (stack.length > 0) {
      const k = this.stepOf[stack.pop()!]!
      if (k < 0 || seen[k]) continue
      seen[k] = 1
      if (this.steps[k]!.needsGuess) return true
      stack.push(...this.inputs[k]!)
    }
    return false
  }

  /** Solves everything again at the next call, whatever has changed. */
  forget(): void {
    this.fresh = true
  }

  /** The equation of a block that was missed most when it had no answer. */
  worstEquation(k: number): number {
    return this.iterated[k]![this.steps[k]!.worst] ?? this.blocks[k]!.equations[0]!
  }

  private isTouched(k: number): boolean {
    const inputs = this.inputs[k]!
    for (let i = 0; i < inputs.length; i++) if (this.changed[inputs[i]!]) return true
    return false
  }

  private run(
    k: number,
    choice: number,
    from: { readonly first: number; readonly most: number; readonly guess: Guess } | undefined,
  ): number {
    const step = this.steps[k]!
    const { variables } = this.blocks[k]!
    const inputs = this.inputs[k]!
    const restart = from && {
      first: from.first,
      most: from.most,
      at: (which: number) => {
        this.tape.work += this.lost.length
        from.guess(this.knownBefore(k), which, variables)
      },
    }
    let missing = false
    for (let i = 0; i < inputs.length; i++) if (this.lost[inputs[i]!]) missing = true
    const outcome = missing ? StepOutcome.inputMissing : step.run(this.tape, choice, restart)
    this.outcomes[k] = outcome
    const state = outcome === StepOutcome.solved ? 0 : outcome === StepOutcome.unbounded ? 2 : 1
    for (const index of variables) {
      this.changed[index] = 1
      this.lost[index] = state
    }
    return step.iterations
  }
}

/**
 * Fills in first guesses for what is not known; the choice picks one of several. Only the variables
 * wanted, where they are named, are looked at.
 */
export type Guess = (
  known: (index: number) => boolean,
  choice: number,
  wanted?: readonly number[],
) => void

/** By block: variables that its equations need and that it does not solve for. */
function inputsOfBlocks(
  equations: readonly Equation[],
  blocks: readonly Block[],
  variableCount: number,
): Int32Array[] {
  // By variable: the block that met it last, as its own or as an input.
  const metBy = new Int32Array(variableCount).fill(-1)
  return blocks.map((block, k) => {
    for (const index of block.variables) metBy[index] = k
    const inputs: number[] = []
    for (const e of block.equations) {
      for (const index of variablesOf(equations[e]!)) {
        if (metBy[index] === k) continue
        metBy[index] = k
        inputs.push(index)
      }
    }
    return Int32Array.from(inputs)
  })
}
