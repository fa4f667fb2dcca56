import type { Operation } from './operation.ts'

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

export function variable(index: number, name: string): Variable {
  return { kind: 'variable', index, name }
}

export function constant(value: number): Constant {
  return { kind: 'constant', value }
}

export function apply(operation: Operation, ...operands: Expression[]): Application {
  return { kind: 'application', operation, operands }
}

export function isConstant(expression: Expression, value: number): boolean {
  return expression.kind === 'constant' && expression.value === value
}

/** Calls `visit` once for each variable that appears in the expression. */
export function forEachVariable(
  expression: Expression,
  visit: (variable: Variable) => void,
  seen: Set<Expression> = new Set(),
): void {
  if (expression.kind === 'constant') return
  if (seen.has(expression)) return
  seen.add(expression)
  if (expression.kind === 'variable') {
    visit(expression)
    return
  }
  for (const operand of expression.operands) forEachVariable(operand, visit, seen)
}
