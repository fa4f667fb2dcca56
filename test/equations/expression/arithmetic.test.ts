import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  constant,
  divide,
  type Expression,
  exponential,
  logarithm,
  minus,
  negate,
  Outcome,
  plus,
  power,
  print,
  signedSquare,
  square,
  squareRoot,
  TapeBuilder,
  times,
  variable,
} from '../../../src/equations/expression/index.ts'
import { printableTwins, twins } from './random-expression.ts'
import { readFormula } from './read-formula.ts'

const x = variable(0, 'x')
const y = variable(1, 'y')
const zero = constant(0)
const one = constant(1)

/** Value of an expression on a tape, or the outcome's name. */
function evaluate(expression: Expression, values: readonly number[]): number | 'refused' {
  const builder = new TapeBuilder(values.length)
  const slot = builder.lower(expression)
  const tape = builder.finish()
  tape.values.set(values)
  const outcome = tape.evaluate(Int32Array.from(tape.slots, (_, row) => row))
  return outcome === Outcome.fine ? tape.values[slot]! : 'refused'
}

describe('folding', () => {
  it('leaves out what adds nothing', () => {
    expect(plus()).toEqual(zero)
    expect(plus(x, zero)).toBe(x)
    expect(plus(zero, x, constant(2), constant(-2))).toBe(x)
    expect(minus(x, zero)).toBe(x)
    expect(minus(zero, x)).toEqual(negate(x))
  })

  it('gathers the constants of a sum', () => {
    expect(evaluate(plus(constant(2), x, constant(3)), [10])).toBe(15)
    expect(plus(constant(2), x, constant(3))).toEqual(plus(x, constant(5)))
  })

  it('lets a factor of 1 go and a factor of 0 take everything with it', () => {
    expect(times(one, x)).toBe(x)
    expect(times(x, one)).toBe(x)
    expect(times(zero, x)).toEqual(zero)
    expect(times(x, zero)).toEqual(zero)
    expect(divide(x, one)).toBe(x)
    expect(divide(zero, x)).toEqual(zero)
    expect(power(x, one)).toBe(x)
    expect(power(x, zero)).toEqual(one)
  })

  it('computes what is constant', () => {
    expect(minus(constant(5), constant(3))).toEqual(constant(2))
    expect(times(constant(5), constant(3))).toEqual(constant(15))
    expect(divide(constant(6), constant(3))).toEqual(constant(2))
    expect(negate(constant(6))).toEqual(constant(-6))
    expect(square(constant(-3))).toEqual(constant(9))
  })

  it('does not divide by a constant zero', () => {
    expect(divide(constant(2), zero).kind).toBe('application')
    expect(evaluate(divide(constant(2), zero), [])).toBe('refused')
  })

  it('never changes a value', () => {
    fc.assert(
      fc.property(
        twins,
        fc.tuple(...[0, 1, 2].map(() => fc.double({ min: -4, max: 4, noNaN: true }))),
        ({ expression, value }, values) => {
          const expected = value(values)
          const got = evaluate(expression, values)
          // Folding may give a value where plain arithmetic has none (0 times infinity); never another.
          if (!Number.isFinite(expected) || got === 'refused') return
          expect(Math.abs(got - expected)).toBeLessThanOrEqual(
            1e-12 * Math.max(1, Math.abs(expected)),
          )
        },
      ),
      { numRuns: 500 },
    )
  })
})

describe('printing', () => {
  const text = (expression: Expression): string =>
    print(expression, (leaf) => (leaf.kind === 'variable' ? leaf.name : String(leaf.value))).text

  it('writes formulas as a handbook does', () => {
    expect(text(minus(x, minus(y, x)))).toBe('x − (y − x)')
    expect(text(times(plus(x, y), minus(x, y)))).toBe('(x + y) (x − y)')
    expect(text(divide(times(x, y), times(x, y)))).toBe('x y/(x y)')
    expect(text(plus(x, negate(y)))).toBe('x − y')
    expect(text(squareRoot(square(plus(x, y))))).toBe('√((x + y)²)')
    expect(text(power(negate(x), constant(0.8)))).toBe('(−x)^0.8')
    expect(text(exponential(negate(divide(x, y))))).toBe('exp(−x/y)')
    expect(text(logarithm(signedSquare(x)))).toBe('ln(x²)')
  })

  it('puts brackets where the meaning needs them', () => {
    fc.assert(
      fc.property(
        printableTwins,
        fc.tuple(...[0, 1, 2].map(() => fc.double({ min: 0.1, max: 4, noNaN: true }))),
        ({ expression }, values) => {
          const expected = evaluate(expression, values)
          if (expected === 'refused' || !Number.isFinite(expected)) return
          const printed = print(expression, (leaf) => {
            if (leaf.kind === 'variable') return leaf.name
            return String(leaf.value).replace('-', '−')
          }).text
          const [X, Y, Z] = values
          const got = readFormula(printed, { x: X!, y: Y!, z: Z! })
          expect(Math.abs(got - expected), printed).toBeLessThanOrEqual(
            1e-9 * Math.max(1, Math.abs(expected)),
          )
        },
      ),
      { numRuns: 500 },
    )
  })
})
