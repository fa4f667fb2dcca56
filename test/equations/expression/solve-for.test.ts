import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  constant,
  divide,
  type Expression,
  equal,
  exponential,
  logarithm,
  minus,
  negate,
  Outcome,
  plus,
  power,
  signedSquare,
  solveFor,
  square,
  squareRoot,
  TapeBuilder,
  times,
  variable,
} from '../../../src/equations/expression/index.ts'
import {
  dryness,
  enthalpyAtEntropy,
  enthalpyAtSubcooling,
  enthalpyAtSuperheat,
  enthalpyAtTemperature,
  entropy,
  liquidEnthalpy,
  saturationPressureAt,
  saturationTemperature,
  subcooling,
  superheat,
  temperature,
  vapourEnthalpy,
  volume,
} from '../../../src/steam/operations.ts'

const x = variable(0, 'x')
const y = variable(1, 'y')

function evaluate(expression: Expression, values: readonly number[]): number {
  const builder = new TapeBuilder(values.length)
  const slot = builder.lower(expression)
  const tape = builder.finish()
  tape.values.set(values)
  expect(tape.evaluate(Int32Array.from(tape.slots, (_, row) => row))).toBe(Outcome.fine)
  return tape.values[slot]!
}

describe('solving an equation for a variable', () => {
  /** Steps that can be undone where the value so far lies in the range given. */
  const steps: readonly {
    readonly build: (inner: Expression, c: number) => Expression
    readonly fits: (inner: number, c: number) => boolean
  }[] = [
    { build: (a, c) => plus(a, y, constant(c)), fits: () => true },
    { build: (a, c) => minus(a, constant(c)), fits: () => true },
    { build: (a, c) => minus(constant(c), a), fits: () => true },
    { build: negate, fits: () => true },
    { build: (a, c) => times(constant(c), a), fits: () => true },
    { build: (a) => times(a, y), fits: () => true },
    { build: (a, c) => divide(a, constant(c)), fits: () => true },
    { build: (a, c) => divide(constant(c), a), fits: (a) => Math.abs(a) > 1e-3 },
    { build: square, fits: (a) => a > 1e-2 },
    { build: signedSquare, fits: (a) => Math.abs(a) > 1e-2 },
    { build: squareRoot, fits: (a) => a > 1e-4 },
    { build: logarithm, fits: (a) => a > 1e-3 },
    { build: exponential, fits: (a) => Math.abs(a) < 5 },
    { build: (a, c) => power(a, constant(Math.abs(c))), fits: (a) => a > 1e-2 && a < 20 },
  ]

  it('undoes every arithmetic operation on the way to the variable', () => {
    const used = new Set<number>()
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.nat({ max: steps.length - 1 }), fc.constantFrom(2, -3, 0.4, 1.7)), {
          minLength: 1,
          maxLength: 6,
        }),
        fc.double({ min: 0.2, max: 5, noNaN: true }),
        fc.double({ min: 0.3, max: 3, noNaN: true }),
        fc.boolean(),
        (choices, start, other, flipped) => {
          let expression: Expression = x
          let value = start
          for (const [k, c] of choices) {
            const { build, fits } = steps[k]!
            if (!fits(value, c)) continue
            const next = build(expression, c)
            const reached = evaluate(next, [start, other])
            if (!(Math.abs(reached) > 1e-3 && Math.abs(reached) < 1e4)) continue
            used.add(k)
            expression = next
            value = reached
          }
          const target = constant(value)
          const equation = flipped ? equal(target, expression) : equal(expression, target)
          const solved = solveFor(equation, 0)
          expect(solved).toBeDefined()
          expect(evaluate(solved!, [Number.NaN, other])).toBeCloseTo(start, 5)
        },
      ),
      { numRuns: 1000 },
    )
    expect(used.size).toBe(steps.length)
  })

  it('refuses what occurs twice, or behind an operation without inverse', () => {
    expect(solveFor(equal(plus(x, times(x, y)), constant(1)), 0)).toBeUndefined()
    expect(solveFor(equal(x, plus(y, x)), 0)).toBeUndefined()
    expect(solveFor(equal(y, constant(2)), 0)).toBeUndefined()
    expect(solveFor(equal(power(constant(2), x), constant(8)), 0)).toBeUndefined()
    expect(solveFor(equal(liquidEnthalpy(x), constant(1e6)), 0)).toBeUndefined()
    expect(solveFor(equal(temperature(x, y), constant(500)), 0)).toBeUndefined()
  })

  it('counts occurrences along every path, shared ones too', () => {
    const shared = plus(x, y)
    expect(solveFor(equal(times(shared, shared), constant(4)), 0)).toBeUndefined()
  })
})

describe('steam relations solved for what they are matched to', () => {
  const states: readonly (readonly [name: string, p: number, h: number])[] = [
    ['liquid', 5e6, 5e5],
    ['wet', 1e5, 1.9e6],
    ['vapour', 3e6, 3.2e6],
    ['dense', 26e6, 2.1e6],
  ]

  it.each([
    ['entropy', entropy, states],
    ['volume', volume, states],
    ['temperature', temperature, states.filter(([name]) => name !== 'wet')],
    ['dryness', dryness, states.filter(([name]) => name === 'wet')],
    ['superheat', superheat, states.filter(([name]) => name === 'vapour')],
    ['subcooling', subcooling, states.filter(([name]) => name === 'liquid')],
  ] as const)('%s gives the enthalpy back', (_, relation, places) => {
    for (const [, p, h] of places) {
      const value = evaluate(relation(x, y), [p, h])
      const solved = solveFor(equal(relation(x, y), constant(value)), 1)
      expect(solved).toBeDefined()
      expect(Math.abs(evaluate(solved!, [p, Number.NaN]) - h)).toBeLessThan(1e-7 * h)
    }
  })

  it.each([
    ['temperature', enthalpyAtTemperature, 3e6, 700],
    ['entropy', enthalpyAtEntropy, 3e6, 6800],
    ['subcooling', enthalpyAtSubcooling, 3e6, 12],
    ['superheat', enthalpyAtSuperheat, 3e6, 40],
  ] as const)('enthalpy from %s gives it back', (_, relation, p, value) => {
    const h = evaluate(relation(x, y), [p, value])
    const solved = solveFor(equal(constant(h), relation(x, y)), 1)
    expect(evaluate(solved!, [p, Number.NaN])).toBeCloseTo(value, 6)
  })

  it('goes between saturation pressure and temperature', () => {
    const T = evaluate(saturationTemperature(x), [2e6])
    const pressure = solveFor(equal(saturationTemperature(x), constant(T)), 0)
    expect(evaluate(pressure!, [Number.NaN])).toBeCloseTo(2e6, 2)
    const back = solveFor(equal(saturationPressureAt(x), constant(2e6)), 0)
    expect(evaluate(back!, [Number.NaN])).toBeCloseTo(T, 8)
  })

  it('means dry saturated steam by superheat 0 and saturated liquid by subcooling 0', () => {
    const dry = solveFor(equal(superheat(x, y), constant(0)), 1)!
    const liquid = solveFor(equal(subcooling(x, y), constant(0)), 1)!
    expect(evaluate(minus(dry, vapourEnthalpy(x)), [1e6])).toBe(0)
    expect(evaluate(minus(liquid, liquidEnthalpy(x)), [1e6])).toBe(0)
  })
})
