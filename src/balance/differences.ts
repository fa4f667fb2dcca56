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

/** What an equation divides by, in the equation's own units. */
export interface Divisor {
  readonly owner: string
  readonly key: string
  readonly value: number
}

/** The temperature differences and divisors that equations declare, read after a solution. */
export class Differences {
  private readonly entries: { readonly owner: string; readonly name: string }[] = []
  private readonly expressions: ExpressionValues
  private readonly divisorEntries: { readonly owner: string; readonly key: string }[] = []
  private readonly divisorValues: ExpressionValues

  constructor(system: System) {
    const expressions: Expression[] = []
    for (const { owner, equation } of system.equations) {
      for (const [name, expression] of Object.entries(equation.differences ?? {})) {
        this.entries.push({ owner, name })
        expressions.push(expression)
      }
    }
    this.expressions = new ExpressionValues(expressions, system.variables.length)
    const divisors: Expression[] = []
    for (const { owner, key, equation } of system.equations) {
      if (equation.divisor === undefined) continue
      this.divisorEntries.push({ owner, key })
      divisors.push(equation.divisor)
    }
    this.divisorValues = new ExpressionValues(divisors, system.variables.length)
  }

  /** Divisors that can be computed from the values. */
  readDivisors(values: Float64Array, lost: Uint8Array): Divisor[] {
    this.divisorValues.load(values)
    const found: Divisor[] = []
    this.divisorEntries.forEach(({ owner, key }, k) => {
      if (this.divisorValues.variablesOf(k).some((index) => lost[index])) return
      const value = this.divisorValues.read(k)
      if (value !== undefined) found.push({ owner, key, value })
    })
    return found
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
