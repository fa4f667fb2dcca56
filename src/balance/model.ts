import {
  type Expression,
  forEachVariable,
  Outcome,
  type Tape,
  TapeBuilder,
} from '../equations/expression/index.ts'
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
  private differencesRead: Differences | undefined

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

  /** Temperature differences that must not be below zero, K, as far as they are known. */
  differences(): readonly { owner: string; name: string; value: number }[] {
    this.differencesRead ??= new Differences(this.system)
    return this.differencesRead.read(this.values, this.program.lost)
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

interface Difference {
  readonly owner: string
  readonly name: string
  readonly expression: Expression
}

/** Temperature differences of the equations, on a tape of their own that is read after a solution. */
class Differences {
  private readonly entries: readonly Difference[]
  private readonly tape: Tape
  private readonly slots: readonly number[]
  private readonly rows: readonly Int32Array[]
  private readonly needs: readonly (readonly number[])[]

  constructor(system: System) {
    const entries: Difference[] = []
    for (const { owner, equation } of system.equations) {
      for (const [name, expression] of Object.entries(equation.differences ?? {})) {
        entries.push({ owner, name, expression })
      }
    }
    const builder = new TapeBuilder(system.variables.length)
    this.entries = entries
    this.slots = entries.map(({ expression }) => builder.lower(expression))
    this.rows = this.slots.map((slot) => builder.rowsBehind([slot]))
    this.needs = entries.map(({ expression }) => {
      const needed: number[] = []
      forEachVariable(expression, ({ index }) => needed.push(index))
      return needed
    })
    this.tape = builder.finish()
  }

  /** Those that can be computed from the values, K. */
  read(values: Float64Array, lost: Uint8Array): { owner: string; name: string; value: number }[] {
    this.tape.values.set(values.subarray(0, lost.length))
    const found: { owner: string; name: string; value: number }[] = []
    this.entries.forEach(({ owner, name }, k) => {
      if (this.needs[k]!.some((index) => lost[index])) return
      if (this.tape.evaluate(this.rows[k]!) !== Outcome.fine) return
      found.push({ owner, name, value: this.tape.values[this.slots[k]!]! })
    })
    return found
  }
}

function isFolded(value: number): boolean {
  return value === 0 || value === 1
}
