import type { Application, Constant, Expression, Operation, Variable } from './operation.ts'

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
