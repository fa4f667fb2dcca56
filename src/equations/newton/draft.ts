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
import { type Bounds, ExplicitStep, FallbackStep, type Step } from './step.ts'

/** Equations solved together for as many variables; equation k is matched to variable k. */
export interface Block {
  readonly equations: readonly number[]
  readonly variables: readonly number[]
}

/** A block lowered; the step itself is made when the tape is finished. */
export interface StepDraft {
  /** Equations that the step iterates, or assigns. */
  readonly equations: readonly number[]
  readonly step: (builder: TapeBuilder, adjoint: Float64Array, bounds: Bounds) => Step
}

/** Variables given by others within a block, in order, and what is left to iterate. */
interface Division {
  readonly assignments: readonly {
    readonly variable: number
    readonly value: Assignment['value']
    /** The one variable that it follows from, where the chain has several links. */
    readonly from?: number
  }[]
  readonly equations: readonly number[]
  readonly variables: readonly number[]
}

/** Blocks up to this size are also looked at as a chain from one unknown. */
const mostChained = 48
/** Chains kept for a block. */
const mostChains = 3

/**
 * Lowers a block: an explicit assignment, or an iteration over what cannot be assigned. Small blocks
 * that a chain of assignments from one unknown covers can be searched along it when the iteration
 * fails.
 */
export function draftStep(
  builder: TapeBuilder,
  equations: readonly Equation[],
  block: Block,
): StepDraft {
  if (block.equations.length === 1) {
    const target = block.variables[0]!
    const explicit = solveFor(equations[block.equations[0]!]!, target)
    if (explicit !== undefined) {
      const slot = builder.lower(explicit)
      const rows = builder.rowsBehind([slot])
      return { equations: block.equations, step: () => new ExplicitStep(rows, slot, target) }
    }
  }
  const division = assignWithin(equations, block)
  const main = draftIteration(builder, equations, block, division)
  if (main.isLinear || division.variables.length === 1) return main
  if (block.equations.length > mostChained) return main
  return {
    equations: main.equations,
    step: (finished, adjoint, bounds) =>
      new FallbackStep(main.step(finished, adjoint, bounds), block.variables, () =>
        chainSteps(equations, block, builder.variableCount, bounds),
      ),
  }
}

/** Searches along the chains of a block, on a tape of their own. */
function chainSteps(
  equations: readonly Equation[],
  block: Block,
  variableCount: number,
  bounds: Bounds,
): { readonly tape: Tape; readonly steps: readonly Step[] } {
  const builder = new TapeBuilder(variableCount)
  const drafts = chainsWithin(equations, block).map((chain) =>
    // Rows stand in the order of each chain, so chains share none.
    builder.apart(() => draftIteration(builder, equations, block, chain)),
  )
  const tape = builder.finish()
  const adjoint = new Float64Array(tape.values.length)
  return { tape, steps: drafts.map((draft) => draft.step(builder, adjoint, bounds)) }
}

function draftIteration(
  builder: TapeBuilder,
  equations: readonly Equation[],
  block: Block,
  { assignments, equations: open, variables }: Division,
): StepDraft & { readonly isLinear: boolean } {
  const from = builder.rowCount
  builder.activate(block.variables)
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
    isLinear: linear,
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
        : new BlockStep(
            prelude,
            iterated,
            seeds,
            variables,
            gradient,
            bounds,
            linear,
            new Map(
              assignments.flatMap(({ variable, from }) =>
                from === undefined ? [] : [[variable, from]],
              ),
            ),
          )
    },
  }
}

/**
 * Equations between two of a block's unknowns give one in terms of the other: it is assigned and
 * drops out of the iteration, as does its equation. In an order in which each finds what it needs.
 */
function assignWithin(equations: readonly Equation[], block: Block): Division {
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

/**
 * Ways to run through a block from one unknown: each next variable follows outright from what is
 * known by then, and one equation is left to tell whether the start was right.
 */
function chainsWithin(equations: readonly Equation[], block: Block): Division[] {
  const own = new Set(block.variables)
  const unknowns = block.equations.map((e) => {
    const found: number[] = []
    forEachVariableOf(equations[e]!, (index) => {
      if (own.has(index)) found.push(index)
    })
    return found
  })
  const chains: Division[] = []
  for (const start of block.variables) {
    const chain = chainFrom(start, equations, block, unknowns)
    if (chain) chains.push(chain)
    if (chains.length === mostChains) break
  }
  return chains
}

function chainFrom(
  start: number,
  equations: readonly Equation[],
  block: Block,
  unknowns: readonly (readonly number[])[],
): Division | undefined {
  const known = new Set([start])
  const used = new Set<number>()
  const assignments: { variable: number; value: Assignment['value'] }[] = []
  for (let progress = true; progress; ) {
    progress = false
    block.equations.forEach((e, k) => {
      if (used.has(k)) return
      const open = unknowns[k]!.filter((index) => !known.has(index))
      if (open.length !== 1) return
      const value = solveFor(equations[e]!, open[0]!)
      if (value === undefined) return
      known.add(open[0]!)
      used.add(k)
      assignments.push({ variable: open[0]!, value })
      progress = true
    })
  }
  if (known.size < block.variables.length) return undefined
  return {
    assignments,
    equations: block.equations.filter((_, k) => !used.has(k)),
    variables: [start],
  }
}
