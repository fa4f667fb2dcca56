import {
  type Expression,
  forEachVariable,
  Outcome,
  type Tape,
  TapeBuilder,
} from '../equations/expression/index.ts'

/** Expressions on a tape of their own, to be read at any values of the variables. */
export class ExpressionValues {
  private readonly tape: Tape
  private readonly slots: readonly number[]
  private readonly rows: readonly Int32Array[]
  private readonly needs: readonly (readonly number[])[]
  private readonly variableCount: number

  constructor(expressions: readonly Expression[], variableCount: number) {
    const builder = new TapeBuilder(variableCount)
    this.variableCount = variableCount
    this.slots = expressions.map((expression) => builder.lower(expression))
    this.rows = this.slots.map((slot) => builder.rowsBehind([slot]))
    this.needs = expressions.map((expression) => {
      const needed: number[] = []
      forEachVariable(expression, ({ index }) => needed.push(index))
      return needed
    })
    this.tape = builder.finish()
  }

  /** Variables that an expression needs. */
  variablesOf(place: number): readonly number[] {
    return this.needs[place]!
  }

  /** Takes over the values of all variables. */
  load(values: Float64Array): void {
    this.tape.values.set(values.subarray(0, this.variableCount))
  }

  /** Changes one variable. */
  set(index: number, value: number): void {
    this.tape.values[index] = value
  }

  /** An expression at the loaded values; undefined where it has no value. */
  read(place: number): number | undefined {
    if (this.tape.evaluate(this.rows[place]!) !== Outcome.fine) return undefined
    return this.tape.values[this.slots[place]!]!
  }
}
