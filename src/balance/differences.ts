import {
  type Expression,
  forEachVariable,
  Outcome,
  type Tape,
  TapeBuilder,
} from '../equations/expression/index.ts'
import type { System } from './system.ts'

interface Difference {
  readonly owner: string
  readonly name: string
  readonly expression: Expression
}

/** Temperature differences of the equations, on a tape of their own that is read after a solution. */
export class Differences {
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
