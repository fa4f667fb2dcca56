/** Refusals: the code, the quantity, its value and the nearest limit. */
import { describe, expect, it } from 'vitest'
import {
  drySaturatedEnthalpyAtEntropy,
  enthalpyAtPressureDryness,
  enthalpyAtPressureEntropy,
  enthalpyAtPressureSubcooling,
  enthalpyAtPressureSuperheat,
  enthalpyAtPressureTemperature,
  enthalpyAtPressureVolume,
  lowestSaturationPressure,
  Outcome,
  type RangeProblem,
  type RangeQuantity,
  RESULT_SIZE,
  rangeProblem,
  SATURATION_SIZE,
  STATE_SIZE,
  saturatedLiquidEnthalpyAtEntropy,
  saturationAtPressure,
  saturationAtTemperature,
  saturationPressure,
  saturationTemperature,
  state,
  stateAtPressureEnthalpy,
} from '../../src/steam/index.ts'

const untouched = -123.456
const out = new Float64Array(RESULT_SIZE)
const record = new Float64Array(STATE_SIZE)
const saturation = new Float64Array(SATURATION_SIZE)

type Call = () => number

/** A call that is refused, with quantity, value and limit (null: not looked at). */
function expectRefusal(
  call: Call,
  code: number,
  quantity: RangeQuantity,
  value: number,
  limit: number | null,
): void {
  out.fill(untouched)
  expect(call()).toBe(code)
  expect([...out]).toEqual([untouched, untouched, untouched])
  const problem: RangeProblem = rangeProblem()
  expect(problem.quantity).toBe(quantity)
  expect(problem.value).toEqual(value)
  if (limit !== null) expect(problem.limit / limit).toBeCloseTo(1, 6)
}

describe('pressure', () => {
  it('below and above the formulation', () => {
    const calls: [number, number, number, (p: number) => Call][] = [
      [0.5, Outcome.pressureLow, 1, (p) => () => stateAtPressureEnthalpy(record, 0, p, 3e6)],
      [2e8, Outcome.pressureHigh, 1e8, (p) => () => stateAtPressureEnthalpy(record, 0, p, 3e6)],
      [0.5, Outcome.pressureLow, 1, (p) => () => enthalpyAtPressureTemperature(out, 0, p, 400)],
      [2e8, Outcome.pressureHigh, 1e8, (p) => () => enthalpyAtPressureEntropy(out, 0, p, 5e3)],
      [2e8, Outcome.pressureHigh, 1e8, (p) => () => enthalpyAtPressureVolume(out, 0, p, 1e-3)],
      [-1e5, Outcome.pressureLow, 1, (p) => () => enthalpyAtPressureEntropy(out, 0, p, 5e3)],
    ]
    for (const [p, code, limit, call] of calls) expectRefusal(call(p), code, 'pressure', p, limit)
  })

  it('without a saturation state', () => {
    for (const [p, code, limit] of [
      [600, Outcome.pressureLow, lowestSaturationPressure],
      [22.064e6, Outcome.pressureHigh, 22.064e6],
      [30e6, Outcome.pressureHigh, 22.064e6],
    ] as const) {
      for (const call of [
        () => saturationAtPressure(saturation, 0, p),
        () => saturationTemperature(out, 0, p),
        () => enthalpyAtPressureDryness(out, 0, p, 0.5),
        () => enthalpyAtPressureSuperheat(out, 0, p, 10),
        () => enthalpyAtPressureSubcooling(out, 0, p, 10),
      ]) {
        expectRefusal(call, code, 'pressure', p, limit)
      }
    }
  })

  it('that is not a number', () => {
    const p = Number.NaN
    expectRefusal(
      () => stateAtPressureEnthalpy(record, 0, p, 1e6),
      Outcome.pressureLow,
      'pressure',
      p,
      1,
    )
    expectRefusal(
      () => enthalpyAtPressureTemperature(out, 0, p, 400),
      Outcome.pressureLow,
      'pressure',
      p,
      1,
    )
    expectRefusal(
      () => saturationTemperature(out, 0, p),
      Outcome.pressureLow,
      'pressure',
      p,
      lowestSaturationPressure,
    )
  })
})

describe('temperature', () => {
  it('beyond the formulation', () => {
    for (const [T, code, limit] of [
      [270, Outcome.temperatureLow, 273.15],
      [2300, Outcome.temperatureHigh, 2273.15],
      [Number.NaN, Outcome.temperatureLow, 273.15],
    ] as const) {
      expectRefusal(
        () => enthalpyAtPressureTemperature(out, 0, 1e5, T),
        code,
        'temperature',
        T,
        limit,
      )
    }
    // above 1073.15 K the formulation ends at 50 MPa
    expectRefusal(
      () => enthalpyAtPressureTemperature(out, 0, 60e6, 1100),
      Outcome.temperatureHigh,
      'temperature',
      1100,
      1073.15,
    )
    expectRefusal(
      () => saturationAtTemperature(saturation, 0, 650),
      Outcome.temperatureHigh,
      'temperature',
      650,
      647.096,
    )
    expectRefusal(
      () => saturationPressure(out, 0, 273),
      Outcome.temperatureLow,
      'temperature',
      273,
      273.15,
    )
  })

  it('on the saturation line says nothing about h', () => {
    for (const p of [1e3, 1e5, 16e6, 20e6]) {
      saturationTemperature(out, 0, p)
      const T = out[0] as number
      for (const off of [0, 9e-7, -9e-7]) {
        expectRefusal(
          () => enthalpyAtPressureTemperature(out, 0, p, T + off),
          Outcome.onSaturation,
          'temperature',
          T + off,
          T,
        )
      }
      for (const off of [1.1e-6, -1.1e-6]) {
        expect(enthalpyAtPressureTemperature(out, 0, p, T + off)).toBe(0)
      }
    }
  })
})

describe('enthalpy, entropy, volume', () => {
  it('beyond the formulation, with the limit there', () => {
    const limitOf = (p: number, T: number): number => {
      expect(enthalpyAtPressureTemperature(out, 0, p, T)).toBe(0)
      return out[0] as number
    }
    for (const [p, h, code, T] of [
      [1e5, -1e5, Outcome.enthalpyLow, 273.15],
      [90e6, 1e4, Outcome.enthalpyLow, 273.15],
      [100, 2.4e6, Outcome.enthalpyLow, 273.15],
      [1e5, 8e6, Outcome.enthalpyHigh, 2273.15],
      [80e6, 5e6, Outcome.enthalpyHigh, 1073.15],
    ] as const) {
      const limit = limitOf(p, T)
      expectRefusal(() => stateAtPressureEnthalpy(record, 0, p, h), code, 'enthalpy', h, limit)
    }
    for (const [p, h, code, T] of [
      [1e5, Number.NaN, Outcome.enthalpyLow, 273.15],
      [100, Number.NEGATIVE_INFINITY, Outcome.enthalpyLow, 273.15],
      [1e5, Number.POSITIVE_INFINITY, Outcome.enthalpyHigh, 2273.15],
      [80e6, Number.POSITIVE_INFINITY, Outcome.enthalpyHigh, 1073.15],
    ] as const) {
      const limit = limitOf(p, T)
      expectRefusal(() => stateAtPressureEnthalpy(record, 0, p, h), code, 'enthalpy', h, limit)
    }
    for (const [p, T, s, code] of [
      [1e5, 273.15, Number.NEGATIVE_INFINITY, Outcome.entropyLow],
      [1e5, 2273.15, Number.POSITIVE_INFINITY, Outcome.entropyHigh],
      [80e6, 1073.15, Number.POSITIVE_INFINITY, Outcome.entropyHigh],
    ] as const) {
      const found = state({ p, T })
      const limit = found.outcome === 'state' ? found.s : null
      expectRefusal(() => enthalpyAtPressureEntropy(out, 0, p, s), code, 'entropy', s, limit)
    }
    // no pressure has this entropy: the limit is that of the thinnest, hottest steam
    const hottest = state({ p: 1, T: 2273.15 })
    const found = state({ h: 3e6, s: 2e4 })
    expect(found).toMatchObject({ outcome: 'range', quantity: 'entropy', value: 2e4 })
    if (found.outcome === 'range' && hottest.outcome === 'state') {
      expect(Math.abs(found.limit / hottest.s - 1)).toBeLessThan(1e-12)
    }
    for (const [p, s, code] of [
      [1e5, -200, Outcome.entropyLow],
      [100, 5000, Outcome.entropyLow],
      [1e5, 20e3, Outcome.entropyHigh],
      [80e6, 9e3, Outcome.entropyHigh],
    ] as const) {
      expectRefusal(() => enthalpyAtPressureEntropy(out, 0, p, s), code, 'entropy', s, null)
    }
    for (const [p, v, code] of [
      [1e5, 0.9e-3, Outcome.volumeLow],
      [100, 10, Outcome.volumeLow],
      [1e5, 100, Outcome.volumeHigh],
      [80e6, 1, Outcome.volumeHigh],
      [1e5, Number.NaN, Outcome.volumeLow],
    ] as const) {
      expectRefusal(() => enthalpyAtPressureVolume(out, 0, p, v), code, 'volume', v, null)
    }
  })

  it('of saturated states', () => {
    for (const [call, s, code] of [
      [drySaturatedEnthalpyAtEntropy, 4400, Outcome.entropyLow],
      [drySaturatedEnthalpyAtEntropy, 9200, Outcome.entropyHigh],
      [drySaturatedEnthalpyAtEntropy, Number.NaN, Outcome.entropyLow],
      [saturatedLiquidEnthalpyAtEntropy, -1, Outcome.entropyLow],
      [saturatedLiquidEnthalpyAtEntropy, 4420, Outcome.entropyHigh],
    ] as const) {
      expectRefusal(() => call(out, 0, s), code, 'entropy', s, null)
    }
  })

  it('of a superheat or a subcooling', () => {
    for (const d of [-1, -1e-9, Number.NaN]) {
      expectRefusal(
        () => enthalpyAtPressureSuperheat(out, 0, 1e5, d),
        Outcome.differenceLow,
        'difference',
        d,
        null,
      )
      expectRefusal(
        () => enthalpyAtPressureSubcooling(out, 0, 1e5, d),
        Outcome.differenceLow,
        'difference',
        d,
        null,
      )
    }
    expect(enthalpyAtPressureSubcooling(out, 0, 1e5, 200)).toBe(Outcome.temperatureLow)
    expect(enthalpyAtPressureSuperheat(out, 0, 1e5, 3000)).toBe(Outcome.temperatureHigh)
  })
})
