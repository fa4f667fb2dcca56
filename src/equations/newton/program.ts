import {
  type Assignment,
  assignmentOf,
  type Equation,
  forEachVariableOf,
  iteratedResidual,
  solveFor,
  type Tape,
  TapeBuilder,
} from '../expression/index.ts'
import { BlockStep } from './block.ts'
import { GradientProgram } from './gradient.ts'
import { ScalarStep } from './scalar.ts'
import { type Bounds, ExplicitStep, type Step, StepOutcome } from './step.ts'

/** Equations solved together for as many variables; equation k is matched to variable k. */
export interface Block {
  readonly equations: readonly number[]
  readonly variables: readonly number[]
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
    this.inputs = blocks.map((block) => inputsOf(equations, block))
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
  solve(guess?: Guess, choice = 0): number {
    let iterations = 0
    let guessed = guess === undefined
    for (let k = 0; k < this.steps.length; k++) {
      if (!this.fresh && !this.isTouched(k) && this.outcomes[k] === StepOutcome.solved) continue
      if (!guessed && this.steps[k]!.needsGuess) {
        guessed = true
        guess!(this.knownBefore(k), 0)
      }
      const used = this.run(k, choice, guess)
      if (used > iterations) iterations = used
    }
    this.changed.fill(0)
    this.fresh = false
    return iterations
  }

  private knownBefore(step: number): (index: number) => boolean {
    const unknown = new Set<number>()
    for (let k = step; k < this.blocks.length; k++) {
      for (const index of this.blocks[k]!.variables) unknown.add(index)
    }
    return (index) => !unknown.has(index) && this.lost[index] === 0
  }

  /** Some block may have more than one answer. */
  get hasChoice(): boolean {
    return this.steps.some((step) => step.needsGuess)
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

  private run(k: number, choice: number, guess: Guess | undefined): number {
    const step = this.steps[k]!
    const { variables } = this.blocks[k]!
    const inputs = this.inputs[k]!
    const restart = guess && ((which: number) => guess(this.knownBefore(k), which))
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

/** Fills in first guesses for what is not known; the choice picks one of several. */
export type Guess = (known: (index: number) => boolean, choice: number) => void

interface StepDraft {
  /** Equations that the step iterates, or assigns. */
  readonly equations: readonly number[]
  readonly step: (builder: TapeBuilder, adjoint: Float64Array, bounds: Bounds) => Step
}

function draftStep(builder: TapeBuilder, equations: readonly Equation[], block: Block): StepDraft {
  if (block.equations.length === 1) {
    const target = block.variables[0]!
    const explicit = solveFor(equations[block.equations[0]!]!, target)
    if (explicit !== undefined) {
      const slot = builder.lower(explicit)
      const rows = builder.rowsBehind([slot])
      return {
        equations: block.equations,
        step: () => new ExplicitStep(rows, slot, target),
      }
    }
  }
  const from = builder.rowCount
  builder.activate(block.variables)
  const { assignments, equations: open, variables } = assignWithin(equations, block)
  const assigned = new Map<number, number>()
  for (const { variable, value } of assignments) {
    assigned.set(variable, builder.assign(variable, builder.lower(value)))
  }
  const seeds = open.map((e) => builder.lower(iteratedResidual(equations[e]!)))
  let linear = true
  for (const seed of seeds) if (builder.degreeOf(seed) > 1) linear = false
  // What is assigned must be evaluated even where no equation left asks for it.
  const all = builder.rowsBehind([...seeds, ...assigned.keys()], assigned)
  const isIterated = (row: number): boolean => builder.degreeOf(builder.slotOfRow(row)) > 0
  const prelude = all.filter((row) => !isIterated(row))
  const iterated = all.filter(isIterated)
  const active = new Set<number>(block.variables)
  for (const row of iterated) active.add(builder.slotOfRow(row))
  builder.deactivate(block.variables, from)
  return {
    equations: open,
    step: (finished, adjoint, bounds) => {
      const gradient = new GradientProgram(
        finished,
        seeds,
        (slot) => active.has(slot),
        adjoint,
        assigned,
      )
      return variables.length === 1
        ? new ScalarStep(prelude, iterated, seeds[0]!, variables[0]!, gradient, bounds, linear)
        : new BlockStep(prelude, iterated, seeds, variables, gradient, bounds, linear)
    },
  }
}

/**
 * Equations between two of a block's unknowns give one in terms of the other: it is assigned and
 * drops out of the iteration, as does its equation. In an order in which each finds what it needs.
 */
function assignWithin(
  equations: readonly Equation[],
  block: Block,
): {
  readonly assignments: readonly Assignment[]
  readonly equations: readonly number[]
  readonly variables: readonly number[]
} {
  const own = new Set(block.variables)
  const byVariable = new Map<number, Assignment>()
  const open: number[] = []
  block.equations.forEach((e, k) => {
    const unknowns: number[] = []
    forEachVariableOf(equations[e]!, (index) => {
      if (own.has(index)) unknowns.push(index)
    })
    const found =
      unknowns.length === 2
        ? assignmentOf(equations[e]!, [unknowns[0]!, unknowns[1]!], block.variables[k]!)
        : undefined
    if (found === undefined || byVariable.has(found.variable) || leadsTo(found, byVariable)) {
      open.push(e)
    } else byVariable.set(found.variable, found)
  })
  const assignments: Assignment[] = []
  const done = new Set<number>()
  const place = (assignment: Assignment): void => {
    if (done.has(assignment.variable)) return
    done.add(assignment.variable)
    const before = byVariable.get(assignment.from)
    if (before) place(before)
    assignments.push(assignment)
  }
  for (const assignment of byVariable.values()) place(assignment)
  return {
    assignments,
    equations: open,
    variables: block.variables.filter((index) => !byVariable.has(index)),
  }
}

/** Whether what an assignment starts from follows, step by step, from what it assigns. */
function leadsTo(assignment: Assignment, byVariable: ReadonlyMap<number, Assignment>): boolean {
  for (let at: number | undefined = assignment.from; at !== undefined; ) {
    if (at === assignment.variable) return true
    at = byVariable.get(at)?.from
  }
  return false
}

/** Variables that the block's equations need and that it does not solve for. */
function inputsOf(equations: readonly Equation[], block: Block): Int32Array {
  const own = new Set(block.variables)
  const inputs = new Set<number>()
  for (const e of block.equations) {
    forEachVariableOf(equations[e]!, (index) => {
      if (!own.has(index)) inputs.add(index)
    })
  }
  return Int32Array.from(inputs)
}
