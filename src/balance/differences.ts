import type { Expression } from '../equations/expression/index.ts'
import { ExpressionValues } from './expression-values.ts'
import type { System } from './system.ts'

/** A temperature difference that must not be below zero, K. */
export interface Difference {
  readonly owner: string
  /** Where it is, in words: 'at the hot end of the drain cooler'. */
  readonly name: string
  readonly value: number
}

/** The temperature differences that equations declare, read after a solution. */
export class Differences {
  private readonly entries: { readonly owner: string; readonly name: string }[] = []
  private readonly expressions: ExpressionValues

  constructor(system: System) {
    const expressions: Expression[] = []
    for (const { owner, equation } of system.equations) {
      for (const [name, expression] of Object.entries(equation.differences ?? {})) {
        this.entries.push({ owner, name })
        expressions.push(expression)
      }
    }
    this.expressions = new ExpressionValues(expressions, system.variables.length)
  }

  /** Those that can be computed from the values. */
  read(values: Float64Array, lost: Uint8Array): Difference[] {
    this.expressions.load(values)
    const found: Difference[] = []
    this.entries.forEach(({ owner, name }, k) => {
      if (this.expressions.variablesOf(k).some((index) => lost[index])) return
      const value = this.expressions.read(k)
      if (value !== undefined) found.push({ owner, name, value })
    })
    return found
  }
}
