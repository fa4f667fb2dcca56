import { type Guess, Program, StepOutcome } from '../equations/newton/index.ts'
import type { Layout } from '../plant/document.ts'
import { aimAt } from './design-aim.ts'
import { DesignStart } from './design-start.ts'
import { type Difference, Differences, type Divisor, type Unmet } from './differences.ts'
import { boundsOf } from './ranges.ts'
import { Starts } from './starts.ts'
import { analyse, type Structure } from './structure.ts'
import { type AssemblyOptions, assemble, type System } from './system.ts'

/** Starts of a block where the whole plant is tried from several. */
const fewStarts = 3
/** Steps from a design to the plant: rows evaluated in all, and how short they may get. */
const mostLeading = 300_000
const shortestLead = 1 / 100

/** A layout assembled, analysed and lowered: ready to be solved, again and again as givens change. */
export class Model {
  readonly system: System
  readonly structure: Structure
  readonly program: Program
  readonly options: AssemblyOptions
  private isWarm = false
  private designs: readonly DesignStart[] | undefined
  private unfoldedSystem: System | undefined
  private seed: ((path: string) => number | null) | undefined
  private differencesRead: Differences | undefined

  constructor(layout: Layout, options: AssemblyOptions = {}) {
    this.system = assemble(layout, options)
    this.options = options
    this.structure = analyse(this.system)
    this.program = new Program(
      this.system.equations.map(({ equation }) => equation),
      this.structure.blocks,
      this.system.variables.length,
      boundsOf(this.system.variables),
    )
    for (const index of this.structure.open) this.program.lose(index)
    this.system.given.forEach((value, index) => {
      if (!Number.isNaN(value)) this.program.set(index, value)
    })
  }

  get values(): Float64Array {
    return this.program.tape.values
  }

  /** A quantity's value, SI; null while it is not determined. */
  value(path: string): number | null {
    const index = this.system.indexOf.get(path)
    if (index === undefined) return null
    return this.program.lost[index] ? null : this.values[index]!
  }

  /** The same equations with no given folded into them. */
  get unfolded(): System {
    this.unfoldedSystem ??= assemble(this.system.layout, { ...this.options, fold: false })
    return this.unfoldedSystem
  }

  /** Temperature differences that must not be below zero, K, as far as they are known. */
  differences(): readonly Difference[] {
    this.differencesRead ??= new Differences(this.system)
    return this.differencesRead.read(this.values, this.program.lost)
  }

  /** Equations that do not hold though the form of them that was iterated does. */
  unmet(): readonly Unmet[] {
    this.differencesRead ??= new Differences(this.system)
    return this.differencesRead.readUnmet(this.values, this.program.lost)
  }

  /** What equations divide by, as far as it is known. */
  divisors(): readonly Divisor[] {
    this.differencesRead ??= new Differences(this.system)
    return this.differencesRead.readDivisors(this.values, this.program.lost)
  }

  /** Changes a given number; false where that changes the structure and a new model is needed. */
  set(index: number, value: number): boolean {
    const before = this.system.given[index]!
    if (Number.isNaN(before) || isFolded(before) || isFolded(value)) return before === value
    this.system.given[index] = value
    this.program.set(index, value)
    return true
  }

  /** Starts the next solution from these values (by path; null where none is known). */
  startFrom(known: (path: string) => number | null): void {
    this.seed = known
    this.isWarm = false
    this.program.forget()
  }

  /**
   * Solves from the values at hand; the first time, and when those lead nowhere, from first
   * guesses. Returns the iterations of the hardest block.
   */
  solve(): number {
    if (this.isWarm) {
      const iterations = this.program.solve()
      if (this.firstFailure() < 0) return iterations
    }
    // All of it: first guesses go over what is solved, too.
    this.program.forget()
    const iterations = this.program.solve(this.guess)
    this.isWarm = this.firstFailure() < 0
    return iterations
  }

  /** Solves from the values of `startFrom` and from nowhere else; returns whether that led to an answer. */
  solveFromThere(): boolean {
    this.guess((index) => !Number.isNaN(this.system.given[index]!), 0)
    this.program.solve()
    this.isWarm = this.firstFailure() < 0
    return this.isWarm
  }

  /**
   * Solves again from another of the starts, in case a block has a further answer. Returns whether
   * there was one; the values are then those.
   */
  solveOtherwise(choice: number): boolean {
    this.program.forget()
    this.program.solve(this.guess, { choice, most: fewStarts })
    this.isWarm = this.firstFailure() < 0
    return this.isWarm
  }

  /**
   * Leads the plant from a design, one of several choices, to what is given. Returns whether that
   * reached an answer.
   */
  solveFromDesign(choice: number): boolean {
    const [design, numbers] = this.designOf(choice)
    const start = design?.solve(numbers)
    if (design === undefined || start === undefined) return false
    const { program, system } = this
    const { released } = design.design
    const put = (share: number): void => {
      for (const v of released) {
        const from = Number.isNaN(start[v]!) ? system.given[v]! : start[v]!
        program.set(v, from + share * (system.given[v]! - from))
      }
    }
    let good = start
    let done = 0
    let step = 1
    const allowed = this.work + mostLeading
    while (done < 1 && step > shortestLead && this.work < allowed) {
      const next = Math.min(1, done + step)
      put(next)
      if (this.solveFrom(good)) {
        done = next
        good = this.values.slice(0, system.variables.length)
        step *= 2
      } else step /= 3
    }
    put(1)
    this.isWarm = done >= 1
    return this.isWarm
  }

  /**
   * Moves what a design fixes until the plant is met, and solves from there. Returns whether that
   * reached an answer.
   */
  solveByAiming(choice: number): boolean {
    const [design, numbers] = this.designOf(choice)
    const values = design && aimAt(design, this.system, numbers)
    return values !== undefined && this.solveFrom(values)
  }

  /** Solves from these values, by variable, and from nowhere else. Returns whether there is an answer. */
  solveFrom(values: Float64Array): boolean {
    this.program.forget()
    for (let v = 0; v < this.system.variables.length; v++) {
      if (Number.isNaN(this.system.given[v]!)) this.values[v] = values[v]!
    }
    this.program.solve()
    this.isWarm = this.firstFailure() < 0
    return this.isWarm
  }

  /** Rows evaluated so far: a measure of time that is always the same. */
  get work(): number {
    return (this.designs ?? []).reduce((sum, { work }) => sum + work, this.program.work)
  }

  /** The design of a choice, and which of its numbers. Variants alternate where they differ. */
  private designOf(choice: number): readonly [design: DesignStart | undefined, choice: number] {
    this.designs ??= DesignStart.variantsOf(this.system, this.structure.open)
    const { length } = this.designs
    return [this.designs[choice % length], Math.floor(choice / Math.max(1, length))]
  }

  private readonly guess: Guess = (known, choice, wanted) => {
    new Starts(this.system, this.values, known, choice).fill(wanted)
    if (this.seed === undefined || choice > 0) return
    this.system.variables.forEach(({ path }, index) => {
      if (known(index)) return
      const value = this.seed!(path)
      if (value !== null) this.values[index] = value
    })
  }

  /** Index of the first block of the core that has no answer, or -1. */
  firstFailure(): number {
    const { outcomes } = this.program
    for (let k = 0; k < this.structure.describingFrom; k++) {
      if (outcomes[k] !== StepOutcome.solved && outcomes[k] !== StepOutcome.inputMissing) return k
    }
    return -1
  }
}

function isFolded(value: number): boolean {
  return value === 0 || value === 1
}
