import fc from 'fast-check'
import {
  constant,
  divide,
  type Expression,
  exponential,
  logarithm,
  minus,
  negate,
  plus,
  power,
  signedSquare,
  square,
  squareRoot,
  times,
  variable,
} from '../../../src/equations/expression/index.ts'

/** An expression beside the same thing in plain arithmetic, which folds nothing. */
export interface Twin {
  readonly expression: Expression
  readonly value: (values: readonly number[]) => number
}

const names = ['x', 'y', 'z']

export const variables: readonly Expression[] = names.map((name, k) => variable(k, name))

const leaf: fc.Arbitrary<Twin> = fc.oneof(
  fc
    .nat({ max: 2 })
    .map((k) => ({ expression: variables[k]!, value: (v: readonly number[]) => v[k]! })),
  fc
    .constantFrom(0, 1, -1, 2, 0.5, -3.25)
    .map((c) => ({ expression: constant(c), value: () => c })),
)

type Unary = readonly [(a: Expression) => Expression, (a: number) => number]
type Binary = readonly [
  (a: Expression, b: Expression) => Expression,
  (a: number, b: number) => number,
]

const unary: readonly Unary[] = [
  [negate, (a) => -a],
  [square, (a) => a * a],
  [signedSquare, (a) => a * Math.abs(a)],
  [squareRoot, Math.sqrt],
  [logarithm, Math.log],
  [exponential, Math.exp],
]

const binary: readonly Binary[] = [
  [minus, (a, b) => a - b],
  [times, (a, b) => a * b],
  [divide, (a, b) => a / b],
]

const treesOf = (operations: readonly Unary[]): fc.Arbitrary<Twin> =>
  fc.letrec<{ tree: Twin }>((tie) => ({
    tree: fc.oneof(
      { maxDepth: 5, withCrossShrink: true },
      leaf,
      fc.tuple(fc.constantFrom(...operations), tie('tree')).map(([[build, compute], a]) => ({
        expression: build(a.expression),
        value: (v: readonly number[]) => compute(a.value(v)),
      })),
      fc
        .tuple(fc.constantFrom(...binary), tie('tree'), tie('tree'))
        .map(([[build, compute], a, b]) => ({
          expression: build(a.expression, b.expression),
          value: (v: readonly number[]) => compute(a.value(v), b.value(v)),
        })),
      fc.tuple(tie('tree'), tie('tree'), tie('tree')).map(([a, b, c]) => ({
        expression: plus(a.expression, b.expression, c.expression),
        value: (v: readonly number[]) => a.value(v) + b.value(v) + c.value(v),
      })),
      fc.tuple(tie('tree'), fc.constantFrom(0, 1, 2, -1, 1.5)).map(([a, exponent]) => ({
        expression: power(a.expression, constant(exponent)),
        value: (v: readonly number[]) => a.value(v) ** exponent,
      })),
    ),
  })).tree

/** Trees of all arithmetic operations, with many factors of 0 and 1. */
export const twins = treesOf(unary)

/** The same without a |a|, which is printed as a square. */
export const printableTwins = treesOf(unary.filter(([build]) => build !== signedSquare))
