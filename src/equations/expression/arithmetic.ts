import { apply, constant, isConstant } from './expression.ts'
import { type Expression, type Operation, Outcome, type Printed } from './operation.ts'

/*
 * Arithmetic as operations. The constructors fold constants, and a factor of exactly 0 or 1 (a
 * pipe without heat loss passes its enthalpy on, whatever its flow).
 */

const wrap = (operand: Printed, strength: number): string =>
  operand.strength < strength ? `(${operand.text})` : operand.text

const linear = (degrees: readonly number[]): number => {
  let most = 0
  for (const degree of degrees) if (degree > most) most = degree
  return most
}

const sumOperation: Operation = {
  name: 'sum',
  evaluate(tape, row) {
    const { values, operands, partials, first } = tape
    const end = first[row + 1]!
    let total = 0
    for (let k = first[row]!; k < end; k++) {
      total += values[operands[k]!]!
      partials[k] = 1
    }
    values[tape.slotOf(row)] = total
    return Outcome.fine
  },
  invert: (target, operands, index) =>
    minus(target, plus(...operands.filter((_, k) => k !== index))),
  degree: linear,
  print(operands) {
    let text = operands[0]?.text ?? '0'
    for (let k = 1; k < operands.length; k++) {
      const term = operands[k]!.text
      text += term.startsWith('−') ? ` − ${term.slice(1)}` : ` + ${term}`
    }
    return { text, strength: 1 }
  },
}

const differenceOperation: Operation = {
  name: 'difference',
  evaluate(tape, row) {
    const { values, operands, partials } = tape
    const k = tape.first[row]!
    values[tape.slotOf(row)] = values[operands[k]!]! - values[operands[k + 1]!]!
    partials[k] = 1
    partials[k + 1] = -1
    return Outcome.fine
  },
  invert: (target, operands, index) =>
    index === 0 ? plus(target, operands[1]!) : minus(operands[0]!, target),
  degree: linear,
  print: ([a, b]) => ({ text: `${a!.text} − ${wrap(b!, 2)}`, strength: 1 }),
}

const negativeOperation: Operation = {
  name: 'negative',
  evaluate(tape, row) {
    const k = tape.first[row]!
    tape.values[tape.slotOf(row)] = -tape.values[tape.operands[k]!]!
    tape.partials[k] = -1
    return Outcome.fine
  },
  invert: (target) => negate(target),
  degree: linear,
  print: ([a]) => ({ text: `−${wrap(a!, 2)}`, strength: 1 }),
}

const productOperation: Operation = {
  name: 'product',
  evaluate(tape, row) {
    const { values, operands, partials } = tape
    const k = tape.first[row]!
    const a = values[operands[k]!]!
    const b = values[operands[k + 1]!]!
    values[tape.slotOf(row)] = a * b
    partials[k] = b
    partials[k + 1] = a
    return Outcome.fine
  },
  invert: (target, operands, index) => divide(target, operands[1 - index]!),
  degree: ([a, b]) => Math.min(2, a! + b!),
  print: ([a, b]) => ({ text: `${wrap(a!, 2)} ${wrap(b!, 2)}`, strength: 2 }),
}

const quotientOperation: Operation = {
  name: 'quotient',
  evaluate(tape, row) {
    const { values, operands, partials } = tape
    const k = tape.first[row]!
    const b = values[operands[k + 1]!]!
    if (b === 0) return Outcome.unbounded
    const quotient = values[operands[k]!]! / b
    values[tape.slotOf(row)] = quotient
    partials[k] = 1 / b
    partials[k + 1] = -quotient / b
    return Outcome.fine
  },
  invert: (target, operands, index) =>
    index === 0 ? times(target, operands[1]!) : divide(operands[0]!, target),
  degree: ([a, b]) => (b === 0 ? a! : 2),
  print: ([a, b]) => ({ text: `${wrap(a!, 2)}/${wrap(b!, 3)}`, strength: 2 }),
}

const squareOperation: Operation = {
  name: 'square',
  evaluate(tape, row) {
    const k = tape.first[row]!
    const a = tape.values[tape.operands[k]!]!
    tape.values[tape.slotOf(row)] = a * a
    tape.partials[k] = 2 * a
    return Outcome.fine
  },
  invert: (target) => squareRoot(target),
  print: ([a]) => ({ text: `${wrap(a!, 4)}²`, strength: 3 }),
}

const squareRootOperation: Operation = {
  name: 'squareRoot',
  evaluate(tape, row) {
    const k = tape.first[row]!
    const a = tape.values[tape.operands[k]!]!
    if (a < 0) return Outcome.outsideDomain
    const root = Math.sqrt(a)
    tape.values[tape.slotOf(row)] = root
    // The slope is unbounded at 0; a large finite one keeps a step away from it possible.
    tape.partials[k] = root > 0 ? 0.5 / root : 1e150
    return Outcome.fine
  },
  invert: (target) => square(target),
  print: ([a]) => ({ text: `√(${a!.text})`, strength: 4 }),
}

/** a |a|: keeps the sign, so that a flow law has an answer either way round. */
const signedSquareOperation: Operation = {
  name: 'signedSquare',
  evaluate(tape, row) {
    const k = tape.first[row]!
    const a = tape.values[tape.operands[k]!]!
    tape.values[tape.slotOf(row)] = a * Math.abs(a)
    tape.partials[k] = 2 * Math.abs(a)
    return Outcome.fine
  },
  invert: (target) => apply(signedRootOperation, target),
  print: ([a]) => ({ text: `${wrap(a!, 4)}²`, strength: 3 }),
}

/** The inverse of a |a|. */
const signedRootOperation: Operation = {
  name: 'signedRoot',
  evaluate(tape, row) {
    const k = tape.first[row]!
    const a = tape.values[tape.operands[k]!]!
    const root = Math.sqrt(Math.abs(a))
    tape.values[tape.slotOf(row)] = a < 0 ? -root : root
    tape.partials[k] = root > 0 ? 0.5 / root : 1e150
    return Outcome.fine
  },
  invert: (target) => signedSquare(target),
  print: ([a]) => ({ text: `√(${a!.text})`, strength: 4 }),
}

const logarithmOperation: Operation = {
  name: 'logarithm',
  evaluate(tape, row) {
    const k = tape.first[row]!
    const a = tape.values[tape.operands[k]!]!
    if (a === 0) return Outcome.unbounded
    if (!(a > 0)) return Outcome.outsideDomain
    tape.values[tape.slotOf(row)] = Math.log(a)
    tape.partials[k] = 1 / a
    return Outcome.fine
  },
  invert: (target) => exponential(target),
  print: ([a]) => ({ text: `ln(${a!.text})`, strength: 4 }),
}

const exponentialOperation: Operation = {
  name: 'exponential',
  evaluate(tape, row) {
    const k = tape.first[row]!
    const value = Math.exp(tape.values[tape.operands[k]!]!)
    if (!Number.isFinite(value)) return Outcome.outsideDomain
    tape.values[tape.slotOf(row)] = value
    tape.partials[k] = value
    return Outcome.fine
  },
  invert: (target) => logarithm(target),
  print: ([a]) => ({ text: `exp(${a!.text})`, strength: 4 }),
}

/** a^b for a > 0. */
const powerOperation: Operation = {
  name: 'power',
  evaluate(tape, row) {
    const { values, operands, partials } = tape
    const k = tape.first[row]!
    const a = values[operands[k]!]!
    const b = values[operands[k + 1]!]!
    if (!(a > 0)) return Outcome.outsideDomain
    const value = a ** b
    if (!Number.isFinite(value)) return Outcome.outsideDomain
    values[tape.slotOf(row)] = value
    partials[k] = (b * value) / a
    partials[k + 1] = value * Math.log(a)
    return Outcome.fine
  },
  invert: (target, operands, index) =>
    index === 0 ? power(target, divide(constant(1), operands[1]!)) : undefined,
  print: ([a, b]) => ({ text: `${wrap(a!, 4)}^${wrap(b!, 4)}`, strength: 3 }),
}

/** Adds terms; constants among them are gathered, zeros left out. */
export function plus(...terms: Expression[]): Expression {
  let known = 0
  const open: Expression[] = []
  for (const term of terms) {
    if (term.kind === 'constant') known += term.value
    else open.push(term)
  }
  if (known !== 0) open.push(constant(known))
  if (open.length === 0) return constant(0)
  return open.length === 1 ? open[0]! : apply(sumOperation, ...open)
}

export function minus(a: Expression, b: Expression): Expression {
  if (isConstant(b, 0)) return a
  if (a.kind === 'constant' && b.kind === 'constant') return constant(a.value - b.value)
  if (isConstant(a, 0)) return negate(b)
  return apply(differenceOperation, a, b)
}

export function negate(a: Expression): Expression {
  return a.kind === 'constant' ? constant(-a.value) : apply(negativeOperation, a)
}

export function times(a: Expression, b: Expression): Expression {
  if (isConstant(a, 0) || isConstant(b, 0)) return constant(0)
  if (isConstant(a, 1)) return b
  if (isConstant(b, 1)) return a
  if (a.kind === 'constant' && b.kind === 'constant') return constant(a.value * b.value)
  return apply(productOperation, a, b)
}

export function divide(a: Expression, b: Expression): Expression {
  if (isConstant(b, 1)) return a
  if (isConstant(a, 0)) return constant(0)
  if (a.kind === 'constant' && b.kind === 'constant' && b.value !== 0) {
    return constant(a.value / b.value)
  }
  return apply(quotientOperation, a, b)
}

export function square(a: Expression): Expression {
  return a.kind === 'constant' ? constant(a.value * a.value) : apply(squareOperation, a)
}

export function signedSquare(a: Expression): Expression {
  return apply(signedSquareOperation, a)
}

export function squareRoot(a: Expression): Expression {
  return apply(squareRootOperation, a)
}

export function logarithm(a: Expression): Expression {
  return apply(logarithmOperation, a)
}

export function exponential(a: Expression): Expression {
  return apply(exponentialOperation, a)
}

export function power(a: Expression, b: Expression): Expression {
  if (isConstant(b, 1)) return a
  if (isConstant(b, 0)) return constant(1)
  return apply(powerOperation, a, b)
}
