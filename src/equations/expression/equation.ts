import { minus } from './arithmetic.ts'
import { variable } from './expression.ts'
import type { Expression, Printed } from './operation.ts'

/**
 * `mass`: sums flows with coefficients of plus or minus one, so that round a closed circuit one of
 * them follows from the others.
 */
export type EquationRole = 'mass' | undefined

/** left = right. */
export interface Equation {
  readonly left: Expression
  readonly right: Expression
  readonly role?: EquationRole
  /** The same relation as an expression that is zero and has a value wherever an iteration may go. */
  readonly iterated?: Expression
  /** What the relation divides by: where it is zero the equation says nothing. */
  readonly divisor?: Expression
  /** What must not be below zero where the equation holds, by name: temperature differences, K. */
  readonly differences?: Readonly<Record<string, Expression>>
}

export function equal(left: Expression, right: Expression): Equation {
  return { left, right }
}

/** What flows in flows out. */
export function massBalance(left: Expression, right: Expression): Equation {
  return { left, right, role: 'mass' }
}

/** left - right, zero when the equation holds. */
export function residual(equation: Equation): Expression {
  return minus(equation.left, equation.right)
}

const variableLists = new WeakMap<Equation, readonly number[]>()

/** The variables of an equation, each once; found at the first call and kept. */
export function variablesOf(equation: Equation): readonly number[] {
  let list = variableLists.get(equation)
  if (list === undefined) {
    const found: number[] = []
    marks.round++
    collect(equation.left, found)
    collect(equation.right, found)
    list = found
    variableLists.set(equation, list)
  }
  return list
}

/** By variable: the round in which it was met last. */
const marks = { round: 0, metIn: new Uint32Array(256) }

function collect(expression: Expression, found: number[]): void {
  if (expression.kind === 'application') {
    const { operands } = expression
    for (let k = 0; k < operands.length; k++) collect(operands[k]!, found)
    return
  }
  if (expression.kind === 'constant') return
  const { index } = expression
  if (index >= marks.metIn.length) {
    const grown = new Uint32Array(2 * index)
    grown.set(marks.metIn)
    marks.metIn = grown
  }
  if (marks.metIn[index] === marks.round) return
  marks.metIn[index] = marks.round
  found.push(index)
}

/** Calls `visit` once for each variable of the equation. */
export function forEachVariableOf(equation: Equation, visit: (index: number) => void): void {
  const list = variablesOf(equation)
  for (let k = 0; k < list.length; k++) visit(list[k]!)
}

/** How often a variable occurs, counted along every path; stops counting at 2. */
function occurrences(expression: Expression, index: number): number {
  if (expression.kind === 'variable') return expression.index === index ? 1 : 0
  if (expression.kind === 'constant') return 0
  let count = 0
  for (const operand of expression.operands) {
    count += occurrences(operand, index)
    if (count > 1) break
  }
  return count
}

/**
 * The equation solved for a variable, or undefined where the variable occurs more than once or an
 * operation on the way to it has no inverse.
 */
export function solveFor(equation: Equation, index: number): Expression | undefined {
  const left = occurrences(equation.left, index)
  const right = left > 1 ? 0 : occurrences(equation.right, index)
  if (left + right !== 1) return undefined
  let target = left === 1 ? equation.right : equation.left
  let side = left === 1 ? equation.left : equation.right
  while (side.kind === 'application') {
    const at = side.operands.findIndex((operand) => occurrences(operand, index) === 1)
    const inverse = side.operation.invert?.(target, side.operands, at)
    if (inverse === undefined) return undefined
    target = inverse
    side = side.operands[at]!
  }
  return target
}

/** The variable in which an operation of the expression says it is better solved, or undefined. */
function preferredVariable(expression: Expression): number | undefined {
  if (expression.kind !== 'application') return undefined
  const { operation, operands } = expression
  if (operation.solveFor !== undefined) {
    const operand = operands[operation.solveFor]!
    if (operand.kind === 'variable') return operand.index
  }
  for (const operand of operands) {
    const found = preferredVariable(operand)
    if (found !== undefined) return found
  }
  return undefined
}

/** A variable of an equation between two unknowns, as a function of the other. */
export interface Assignment {
  readonly variable: number
  readonly from: number
  readonly value: Expression
}

/**
 * How an equation between just two unknowns can be assigned instead of iterated: the one in terms
 * of the other, where that is linear or a gentle function. `preferred` is taken when both can.
 */
export function assignmentOf(
  equation: Equation,
  unknowns: readonly [number, number],
  preferred: number,
): Assignment | undefined {
  const steam = preferredVariable(equation.left) ?? preferredVariable(equation.right)
  const order =
    steam !== undefined && unknowns.includes(steam)
      ? [steam]
      : preferred === unknowns[0]
        ? [unknowns[0], unknowns[1]]
        : [unknowns[1], unknowns[0]]
  for (const target of order) {
    const value = solveFor(equation, target)
    if (value === undefined || mayVanish(value)) continue
    const from = target === unknowns[0] ? unknowns[1] : unknowns[0]
    if (isLinearIn(value, from) || isGentle(value)) return { variable: target, from, value }
  }
  return undefined
}

/** Whether an operation that is zero over part of its range takes part: it may stand in a divisor. */
function mayVanish(value: Expression): boolean {
  return (
    value.kind === 'application' &&
    (value.operation.vanishes === true || value.operands.some(mayVanish))
  )
}

function isGentle(value: Expression): boolean {
  return (
    value.kind === 'application' &&
    value.operation.gentle === true &&
    value.operands.every((operand) => operand.kind !== 'application')
  )
}

/** Whether an expression is linear in a variable, with constant or given factors. */
function isLinearIn(expression: Expression, index: number): boolean {
  return degreeIn(expression, index) <= 1
}

function degreeIn(expression: Expression, index: number): number {
  if (expression.kind === 'constant') return 0
  if (expression.kind === 'variable') return expression.index === index ? 1 : 0
  const degrees = expression.operands.map((operand) => degreeIn(operand, index))
  if (degrees.every((degree) => degree === 0)) return 0
  return expression.operation.degree?.(degrees) ?? 2
}

/** The residual in the form that iterates best, with the same variables. */
export function iteratedResidual(equation: Equation): Expression {
  if (equation.iterated !== undefined) return equation.iterated
  const index = preferredVariable(equation.left) ?? preferredVariable(equation.right)
  const explicit = index === undefined ? undefined : solveFor(equation, index)
  if (index === undefined || explicit === undefined) return residual(equation)
  return minus(variable(index, ''), explicit)
}

/** Prints an expression with the given text for variables and constants. */
export function print(
  expression: Expression,
  atom: (leaf: Extract<Expression, { kind: 'variable' | 'constant' }>) => string,
): Printed {
  if (expression.kind !== 'application') {
    const text = atom(expression)
    return { text, strength: text.startsWith('−') ? 1 : 4 }
  }
  return expression.operation.print(expression.operands.map((operand) => print(operand, atom)))
}
