import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import * as arithmetic from '../../../src/equations/expression/arithmetic.ts'
import {
  constant,
  type Expression,
  Outcome,
  type Tape,
  TapeBuilder,
  variable,
} from '../../../src/equations/expression/index.ts'
import * as steam from '../../../src/steam/operations.ts'
import { twins } from './random-expression.ts'

const x = variable(0, 'x')
const y = variable(1, 'y')
const z = variable(2, 'z')

const everyRow = (tape: Tape): Int32Array => Int32Array.from(tape.slots, (_, row) => row)

/** Value of an expression and partials to the variables by a reverse sweep; null where refused. */
function valueAndPartials(expression: Expression, at: readonly number[]) {
  const builder = new TapeBuilder(at.length)
  const slot = builder.lower(expression)
  const tape = builder.finish()
  tape.values.set(at)
  if (tape.evaluate(everyRow(tape)) !== Outcome.fine) return null
  const adjoint = new Float64Array(tape.values.length)
  adjoint[slot] = 1
  for (let row = tape.slots.length - 1; row >= 0; row--) {
    for (let k = tape.first[row]!; k < tape.first[row + 1]!; k++) {
      adjoint[tape.operands[k]!]! += adjoint[tape.slots[row]!]! * tape.partials[k]!
    }
  }
  return { value: tape.values[slot]!, partials: [...adjoint.subarray(0, at.length)] }
}

/** Central differences of fourth order, with steps relative to the values. */
function differences(expression: Expression, at: readonly number[], step: number): number[] {
  return at.map((value, k) => {
    const h = Math.max(Math.abs(value), 1e-3) * step
    const f = (shift: number): number => {
      const moved = at.map((v, i) => (i === k ? v + shift * h : v))
      return valueAndPartials(expression, moved)?.value ?? Number.NaN
    }
    return (8 * (f(1) - f(-1)) - (f(2) - f(-2))) / (12 * h)
  })
}

type Place = readonly number[]

/** Every operation by the constructor that makes it, and where its partials are looked at. */
const arithmeticPlaces: Record<keyof typeof arithmetic, readonly [Expression, readonly Place[]]> = {
  plus: [arithmetic.plus(x, y, z), [[1, 2, 3]]],
  minus: [arithmetic.minus(x, y), [[1, 2]]],
  negate: [arithmetic.negate(x), [[1.5]]],
  times: [arithmetic.times(x, y), [[1.5, -2]]],
  divide: [arithmetic.divide(x, y), [[1.5, -2]]],
  square: [arithmetic.square(x), [[-3], [0.1]]],
  signedSquare: [arithmetic.signedSquare(x), [[-3], [2]]],
  squareRoot: [arithmetic.squareRoot(x), [[0.3], [9]]],
  logarithm: [arithmetic.logarithm(x), [[0.3], [9]]],
  exponential: [arithmetic.exponential(x), [[0.3], [-4]]],
  power: [
    arithmetic.power(x, y),
    [
      [2.5, 1.3],
      [0.2, -0.7],
    ],
  ],
}

const liquid: Place = [8e6, 7e5]
const wet: Place = [5e4, 2.1e6]
const vapour: Place = [2e6, 3.1e6]
const dense: Place = [25.5e6, 1.95e6]

const steamPlaces: Partial<Record<string, readonly [Expression, readonly Place[]]>> = {
  temperature: [steam.temperature(x, y), [liquid, wet, vapour, dense]],
  entropy: [steam.entropy(x, y), [liquid, wet, vapour, dense]],
  volume: [steam.volume(x, y), [liquid, wet, vapour, dense]],
  dryness: [steam.dryness(x, y), [liquid, wet, vapour]],
  moisture: [steam.moisture(x, y), [wet, vapour]],
  superheat: [steam.superheat(x, y), [vapour]],
  subcooling: [steam.subcooling(x, y), [liquid]],
  saturationTemperature: [steam.saturationTemperature(x), [[4e3], [1e6], [2e7]]],
  liquidEnthalpy: [steam.liquidEnthalpy(x), [[4e3], [1e6], [2e7]]],
  vapourEnthalpy: [steam.vapourEnthalpy(x), [[4e3], [1e6], [2e7]]],
  enthalpyAtTemperature: [
    steam.enthalpyAtTemperature(x, y),
    [
      [8e6, 450],
      [2e6, 700],
      [26e6, 670],
    ],
  ],
  enthalpyAtEntropy: [
    steam.enthalpyAtEntropy(x, y),
    [
      [8e6, 1900],
      [5e4, 6500],
      [2e6, 7000],
      [26e6, 4600],
    ],
  ],
  enthalpyAtSubcooling: [steam.enthalpyAtSubcooling(x, y), [[1e6, 15]]],
  enthalpyAtSuperheat: [steam.enthalpyAtSuperheat(x, y), [[1e6, 15]]],
  saturationPressureAt: [steam.saturationPressureAt(x), [[300], [450], [630]]],
  wetPart: [
    // From dry steam at 2 MPa with s = 6900 J/(kg K) to wet steam: 30 kPa and some 2.38 MJ/kg.
    steam.wetPart(constant(2e6), x, y, z),
    [[3.1e6, 6900, 2.36e6]],
  ],
}

describe('a tape', () => {
  it('knows the partials of every arithmetic operation', () => {
    for (const [name, [expression, places]] of Object.entries(arithmeticPlaces)) {
      for (const at of places) {
        const { partials } = valueAndPartials(expression, at)!
        const expected = differences(expression, at, 1e-3)
        partials.forEach((partial, k) => {
          expect(Math.abs(partial - expected[k]!), `${name} to operand ${k}`).toBeLessThan(
            1e-8 * Math.max(1, Math.abs(expected[k]!)),
          )
        })
      }
    }
    expect(Object.keys(arithmeticPlaces).sort()).toEqual(Object.keys(arithmetic).sort())
  })

  it('knows the partials of every steam operation', () => {
    for (const name of Object.keys(steam)) {
      const [expression, places] = steamPlaces[name] ?? []
      expect(expression, `${name} is not looked at`).toBeDefined()
      for (const at of places!) {
        const result = valueAndPartials(expression!, at)
        expect(result, `${name} at ${at}`).not.toBeNull()
        // Values are exact to some 1e-11: the step must stay well above that.
        const expected = differences(expression!, at, 1e-4)
        result!.partials.forEach((partial, k) => {
          const scale = Math.abs(result!.value / at[k]!)
          expect(
            Math.abs(partial - expected[k]!),
            `${name} at ${at} to operand ${k}: ${partial} against ${expected[k]}`,
          ).toBeLessThanOrEqual(2e-6 * Math.max(scale, Math.abs(expected[k]!)))
        })
      }
    }
  })

  it('differentiates trees by the chain rule', () => {
    let compared = 0
    fc.assert(
      fc.property(
        twins,
        fc.tuple(...[0, 1, 2].map(() => fc.double({ min: 0.5, max: 2, noNaN: true }))),
        ({ expression }, at) => {
          const result = valueAndPartials(expression, at)
          const expected = differences(expression, at, 1e-4)
          const doubled = differences(expression, at, 2e-4)
          if (result === null) return
          result.partials.forEach((partial, k) => {
            const size = Math.max(1, Math.abs(result.value), Math.abs(expected[k]!))
            // Where the differences themselves disagree (a corner, a pole) they say nothing.
            if (!(Math.abs(expected[k]! - doubled[k]!) < 1e-7 * size)) return
            compared++
            expect(Math.abs(partial - expected[k]!)).toBeLessThan(1e-6 * size)
          })
        },
      ),
      { numRuns: 500 },
    )
    expect(compared).toBeGreaterThan(300)
  })

  it('evaluates what is shared by identity once', () => {
    const builder = new TapeBuilder(2)
    const shared = arithmetic.plus(x, y)
    const first = builder.lower(arithmetic.times(shared, shared))
    const rows = builder.rowCount
    expect(rows).toBe(2)
    expect(builder.lower(arithmetic.times(shared, shared))).not.toBe(first)
    expect(builder.rowCount).toBe(rows + 1)
    builder.lower(arithmetic.plus(x, constant(7)))
    builder.lower(arithmetic.plus(y, constant(7)))
    // Two variables, three rows so far, 7 once, two rows more.
    expect(builder.finish().values.length).toBe(2 + 3 + 1 + 2)
  })

  it('computes one state for all its properties', () => {
    const builder = new TapeBuilder(3)
    const slots = [
      builder.lower(steam.temperature(x, y)),
      builder.lower(steam.entropy(x, y)),
      builder.lower(steam.volume(x, y)),
      builder.lower(steam.dryness(x, y)),
    ]
    expect(builder.rowCount).toBe(1 + slots.length)
    builder.lower(steam.temperature(z, y))
    expect(builder.rowCount).toBe(1 + slots.length + 2)
    const tape = builder.finish()
    tape.values.set([1e5, 1.5e6, 2e5])
    expect(tape.evaluate(everyRow(tape))).toBe(Outcome.fine)
    // IAPWS-IF97, region 4: Tsat(0.1 MPa) = 372.7559 K (R7-97(2012), table 36: 0.372755919e3).
    expect(tape.values[slots[0]!]).toBeCloseTo(372.755919, 5)
  })

  it('gives the same digits however often it is evaluated', () => {
    const builder = new TapeBuilder(2)
    const slot = builder.lower(steam.temperature(x, y))
    const tape = builder.finish()
    const at = (p: number, h: number): number => {
      tape.values[0] = p
      tape.values[1] = h
      expect(tape.evaluate(everyRow(tape))).toBe(Outcome.fine)
      return tape.values[slot]!
    }
    const fresh = at(2e6, 3.1e6)
    at(26e6, 1.9e6)
    at(1e5, 1.9e6)
    expect(Math.abs(at(2e6, 3.1e6) - fresh)).toBeLessThan(1e-10 * fresh)
  })
})

describe('refusals', () => {
  const outcomeOf = (expression: Expression, at: Place): number => {
    const builder = new TapeBuilder(at.length)
    builder.lower(expression)
    const tape = builder.finish()
    tape.values.set(at)
    const outcome = tape.evaluate(everyRow(tape))
    if (outcome !== Outcome.fine) expect(tape.failedRow).toBeGreaterThanOrEqual(0)
    return outcome
  }

  it.each([
    ['a quotient by zero', arithmetic.divide(x, y), [1, 0], Outcome.unbounded],
    ['a root of a negative number', arithmetic.squareRoot(x), [-1], Outcome.outsideDomain],
    ['a logarithm of zero', arithmetic.logarithm(x), [0], Outcome.unbounded],
    ['a logarithm of a negative number', arithmetic.logarithm(x), [-1], Outcome.outsideDomain],
    ['a power of a negative base', arithmetic.power(x, y), [-1, 0.5], Outcome.outsideDomain],
    ['an exponential beyond all numbers', arithmetic.exponential(x), [1e3], Outcome.outsideDomain],
    ['a state beyond the formulation', steam.temperature(x, y), [1e5, 9e6], Outcome.outsideRange],
    ['dryness above the critical pressure', steam.dryness(x, y), [23e6, 2e6], Outcome.outsideRange],
    ['saturation above critical', steam.saturationTemperature(x), [23e6], Outcome.outsideRange],
  ] as const)('%s is named', (_, expression, at, outcome) => {
    expect(outcomeOf(expression, at)).toBe(outcome)
  })

  it('says that pressure and temperature of saturation leave the state open', () => {
    const builder = new TapeBuilder(1)
    const slot = builder.lower(steam.saturationTemperature(x))
    const tape = builder.finish()
    tape.values[0] = 1e6
    tape.evaluate(everyRow(tape))
    const T = tape.values[slot]!
    expect(outcomeOf(steam.enthalpyAtTemperature(x, y), [1e6, T])).toBe(Outcome.onSaturation)
  })

  it('leaves the value and the partials of the row as they were', () => {
    const builder = new TapeBuilder(2)
    const slot = builder.lower(arithmetic.divide(x, y))
    const tape = builder.finish()
    tape.values.set([6, 3])
    tape.evaluate(everyRow(tape))
    tape.values.set([6, 0])
    expect(tape.evaluate(everyRow(tape))).toBe(Outcome.unbounded)
    expect(tape.values[slot]).toBe(2)
    expect([...tape.partials]).toEqual([1 / 3, -2 / 3])
  })
})
