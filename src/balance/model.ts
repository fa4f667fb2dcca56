import { Program, StepOutcome } from '../equations/newton/index.ts'
import type { Layout } from '../plant/document.ts'
import { boundsOf } from './ranges.ts'
import { Starts } from './starts.ts'
import { analyse, type Structure } from './structure.ts'
import { assemble, type System } from './system.ts'

/** A layout assembled, analysed and lowered: ready to be solved, again and again as givens change. */
export class Model {
  readonly system: System
  readonly structure: Structure
  readonly program: Program
  private started = false

  constructor(layout: Layout) {
    this.system = assemble(layout)
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

  /** Changes a given number; false where that changes the structure and a new model is needed. */
  set(index: number, value: number): boolean {
    const before = this.system.given[index]!
    if (Number.isNaN(before) || isFolded(before) || isFolded(value)) return before === value
    this.system.given[index] = value
    this.program.set(index, value)
    return true
  }

  /** Solves from the values at hand; the first time from first guesses. Returns iterations. */
  solve(): number {
    if (!this.started) {
      this.started = true
      return this.program.solve((known) => {
        new Starts(this.system, this.values, known).fill()
      })
    }
    return this.program.solve()
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
