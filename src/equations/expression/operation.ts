/** A quantity of the plant, unknown or given; `index` counts them from 0. */
export interface Variable {
  readonly kind: 'variable'
  readonly index: number
  readonly name: string
}

export interface Constant {
  readonly kind: 'constant'
  readonly value: number
}

export interface Application {
  readonly kind: 'application'
  readonly operation: Operation
  readonly operands: readonly Expression[]
}

/** An expression is shared by identity: the same object is evaluated once. */
export type Expression = Variable | Constant | Application

/** What an operation sees of the tape that its rows stand on. */
export interface Rows {
  /** By slot: its number. */
  readonly values: Float64Array
  /** By row: the place of its first operand; the row after it tells where they end. */
  readonly first: Int32Array
  /** Slots of the operands, and, in parallel, the row's partials to them. */
  readonly operands: Int32Array
  readonly partials: Float64Array
  /** Working memory, and by row where its own begins. */
  readonly memory: Float64Array
  readonly memoryAt: Int32Array
  /** The slot that a row writes. */
  slotOf(row: number): number
}

/** Outcomes of evaluating one operation. Integers, because inner loops hand them on; 0 is fine. */
export const Outcome = {
  fine: 0,
  /** A divisor is exactly zero, so that the result has no bound. */
  unbounded: 1,
  /** The operand lies outside the operation's domain (a root of a negative number, say). */
  outsideDomain: 2,
  /** Temperature and pressure are those of saturation, where they do not fix the state. */
  onSaturation: 3,
  /** A steam property lies outside the formulation. */
  outsideRange: 4,
} as const

/** A text with the binding strength of its outermost operation: 1 sum, 2 product, 3 power, 4 atom. */
export interface Printed {
  readonly text: string
  readonly strength: 1 | 2 | 3 | 4
}

/**
 * One record per operation: value and partials, inversion, linearity and printed form together,
 * so that evaluating, differentiating, incidence and printing are walks that list no operations.
 */
export interface Operation {
  readonly name: string
  /** Slots of working memory, kept from one evaluation to the next (warm starts, caches). */
  readonly memory?: number
  /** This operation only reads the working memory of `of`, applied to the same operands. */
  readonly reads?: Operation
  /**
   * Writes the value of the row and its partials to each operand into the tape.
   * Returns an `Outcome`; when it is not fine, value and partials stay as they were.
   */
  readonly evaluate: (tape: Rows, row: number) => number
  /** The expression that operand `index` must equal for the result to be `target`, where there is one. */
  readonly invert?: (
    target: Expression,
    operands: readonly Expression[],
    index: number,
  ) => Expression | undefined
  /**
   * Place of an operand in which the equation is better solved than evaluated: the operation itself
   * is flat there, its inverse is not (a subcooling of 0 says nothing of h inside the dome).
   */
  readonly solveFor?: number
  /** Is exactly zero over part of its range: nothing is to be divided by it. */
  readonly vanishes?: true
  /** Has a value and a modest slope over its whole range, so that it may be assigned, not iterated. */
  readonly gentle?: true
  /**
   * Degree of the result in chosen variables from the operands' degrees (0 constant, 1 linear,
   * 2 anything else). Absent: 0 when all are 0, else 2.
   */
  readonly degree?: (degrees: readonly number[]) => number
  readonly print: (operands: readonly Printed[]) => Printed
}
