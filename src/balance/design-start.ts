import { Program, StepOutcome } from '../equations/newton/index.ts'
import { type Design, designOf, designVariants } from './design.ts'
import { boundsOf } from './ranges.ts'
import { Starts } from './starts.ts'
import type { System } from './system.ts'

/** Starts of a block before another design is tried. */
const fewStarts = 3
/** A usual range is searched through by the golden section: no two choices lie near each other. */
const goldenSection = (Math.sqrt(5) - 1) / 2

/** Solves the design of a plant: a sensible answer of its equations to start from. */
export class DesignStart {
  readonly design: Design
  readonly program: Program
  private readonly plant: System
  private last: { readonly choice: number; readonly values: Float64Array | undefined } | undefined

  private constructor(plant: System, design: Design) {
    this.plant = plant
    this.design = design
    this.program = new Program(
      plant.equations.map(({ equation }) => equation),
      design.structure.blocks,
      plant.variables.length,
      boundsOf(plant.variables),
    )
    for (const v of design.structure.open) this.program.lose(v)
  }

  /** Undefined where the plant is asked as a designer would ask. */
  static of(plant: System, open: readonly number[], variant = 0): DesignStart | undefined {
    const design = designOf(plant, open, variant)
    return design && new DesignStart(plant, design)
  }

  /** Those of all variants of the design that differ. */
  static variantsOf(plant: System, open: readonly number[]): DesignStart[] {
    const starts: DesignStart[] = []
    for (let variant = 0; variant < designVariants; variant++) {
      const design = designOf(plant, open, variant)
      const isNew = !starts.some((start) => isSame(start.design.fixed, design?.fixed ?? []))
      if (design !== undefined && isNew) starts.push(new DesignStart(plant, design))
    }
    return starts
  }

  /** The work its solutions have taken so far. */
  get work(): number {
    return this.program.work
  }

  /**
   * The values of the design, NaN where a result has none; undefined where it does not solve. Choices give it other
   * numbers.
   */
  solve(choice: number): Float64Array | undefined {
    if (this.last?.choice !== choice) this.last = { choice, values: this.solveAnew(choice) }
    return this.last.values
  }

  private solveAnew(choice: number): Float64Array | undefined {
    const { plant, design, program } = this
    const isGiven = (v: number): boolean => !Number.isNaN(plant.given[v]!)
    const guess = plant.given.slice()
    new Starts(plant, guess, isGiven, choice).fill()
    program.forget()
    design.system.given.forEach((value, v) => {
      if (!Number.isNaN(value)) program.set(v, value)
    })
    for (const v of design.fixed) {
      const { range, usual } = plant.variables[v]!.description
      let value = guess[v]!
      if (choice === 0) value = usual ?? value
      else if (range) value = range[0] + ((choice * goldenSection) % 1) * (range[1] - range[0])
      program.set(v, value)
    }
    const { values } = program.tape
    program.solve(
      (known, other, wanted) => {
        new Starts(design.system, values, known, other).fill(wanted)
      },
      { choice, first: 0, most: fewStarts },
    )
    if (!this.isSolved()) return undefined
    const solved = values.slice(0, plant.variables.length)
    // A result that only describes may have no value there (a conductance without bound).
    for (const v of design.released) if (program.lost[v]) solved[v] = Number.NaN
    return solved
  }

  /** Stands at its answer of this choice, from where it can be moved on; false where it has none. */
  standAt(choice: number): boolean {
    const values = this.solve(choice)
    if (values === undefined) return false
    for (const v of this.design.fixed) this.program.set(v, values[v]!)
    this.recall(values)
    this.program.solve()
    return this.isSolved()
  }

  /** Whether all that the plant's state hangs on was found. */
  isSolved(): boolean {
    const { program, design } = this
    for (let k = 0; k < design.structure.describingFrom; k++) {
      if (program.outcomes[k] !== StepOutcome.solved) return false
    }
    return true
  }

  /** Puts its unknowns where they were. */
  recall(values: Float64Array): void {
    const { program, design } = this
    program.forget()
    for (let v = 0; v < values.length; v++) {
      if (Number.isNaN(design.system.given[v]!)) program.tape.values[v] = values[v]!
    }
  }
}

function isSame(some: readonly number[], others: readonly number[]): boolean {
  return some.length === others.length && some.every((v) => others.includes(v))
}
