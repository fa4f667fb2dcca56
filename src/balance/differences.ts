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

/** An equation that was iterated in another form and does not hold as it stands. */
export interface Unmet {
  readonly owner: string
  readonly key: string
}

/** Relative difference between the two sides of an equation that holds. */
const agreement = 1e-6

/** What equations declare beside themselves, read after a solution. */
export class Differences {
  private readonly entries: { readonly owner: string; readonly name: string }[] = []
  private readonly expressions: ExpressionValues
  private readonly divisorEntries: { readonly owner: string; readonly key: string }[] = []
  private readonly divisorValues: ExpressionValues
  private readonly iteratedEntries: { readonly owner: string; readonly key: string }[] = []
  /** Left and right side of each. */
  private readonly sides: ExpressionValues

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
    const sides: Expression[] = []
    for (const { owner, key, equation } of system.equations) {
      if (equation.iterated === undefined) continue
      this.iteratedEntries.push({ owner, key })
      sides.push(equation.left, equation.right)
    }
    this.sides = new ExpressionValues(sides, system.variables.length)
  }

  /**
   * Equations whose iterated form holds where they themselves do not: a zone that passes no heat
   * satisfies the one with any conductance.
   */
  readUnmet(values: Float64Array, lost: Uint8Array): Unmet[] {
    this.sides.load(values)
    const isKnown = (place: number): boolean =>
      this.sides.variablesOf(place).every((index) => !lost[index])
    return this.iteratedEntries.filter((_, k) => {
      if (!isKnown(2 * k) || !isKnown(2 * k + 1)) return false
      const left = this.sides.read(2 * k)
      const right = this.sides.read(2 * k + 1)
      if (left === undefined || right === undefined) return false
      return Math.abs(left - right) > agreement * Math.max(Math.abs(left), Math.abs(right))
    })
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
