/** Partial derivatives against central differences, and the identities that hold between them. */
import { describe, expect, it } from 'vitest'
import {
  drySaturatedEnthalpyAtEntropy,
  enthalpyAtPressureDryness,
  enthalpyAtPressureEntropy,
  enthalpyAtPressureSubcooling,
  enthalpyAtPressureSuperheat,
  enthalpyAtPressureTemperature,
  enthalpyAtPressureVolume,
  RESULT_SIZE,
  Result,
  SATURATION_SIZE,
  Saturation,
  STATE_SIZE,
  State,
  saturatedLiquidEnthalpyAtEntropy,
  saturationAtPressure,
  saturationPressure,
  saturationTemperature,
  state,
  stateAtPressureEnthalpy,
} from '../../src/steam/index.ts'

function recordOf(p: number, h: number): Float64Array {
  const record = new Float64Array(STATE_SIZE)
  expect(stateAtPressureEnthalpy(record, 0, p, h)).toBe(0)
  return record
}

function enthalpyOf(p: number, T: number): number {
  const found = state({ p, T })
  if (found.outcome !== 'state') throw new Error(found.message)
  return found.h
}

/**
 * Derivative by central differences of two widths, extrapolated (Richardson). With it an estimate
 * of its own error: the part that the extrapolation changed.
 */
function differenceOf(f: (x: number) => number, x: number, step: number): [number, number] {
  const wide = (f(x + step) - f(x - step)) / (2 * step)
  const narrow = (f(x + step / 2) - f(x - step / 2)) / step
  return [narrow + (narrow - wide) / 3, Math.abs(narrow - wide)]
}

function expectDerivative(
  f: (x: number) => number,
  x: number,
  step: number,
  value: number,
  told: string,
): void {
  const [expected, doubt] = differenceOf(f, x, step)
  const roundOff = (4e-13 * Math.abs(f(x))) / step
  expect(Math.abs(value - expected), told).toBeLessThan(
    1e-7 * Math.abs(expected) + 0.2 * doubt + roundOff,
  )
}

// p (Pa) and T (K) or x of states well inside every region
const singlePhase: [string, number, number][] = [
  ['1', 3e3, 285],
  ['1', 5e5, 400],
  ['1', 15e6, 560],
  ['1', 30e6, 300],
  ['1', 90e6, 600],
  ['2', 100, 280],
  ['2', 5e3, 320],
  ['2', 1e5, 400],
  ['2', 3e6, 600],
  ['2', 16e6, 640],
  ['2', 20e6, 800],
  ['2', 60e6, 1000],
  ['3', 17e6, 623.5],
  ['3', 18e6, 633],
  ['3', 25e6, 640],
  ['3', 25e6, 655],
  ['3', 22.3e6, 647.9],
  ['3', 50e6, 700],
  ['5', 1e5, 1500],
  ['5', 40e6, 1200],
]
const wetStates: [number, number][] = [
  [700, 0.9],
  [5e3, 0.88],
  [1e6, 0.3],
  [16e6, 0.02],
  [17e6, 0.5],
  [21.5e6, 0.7],
]
const all: [string, number, number][] = [
  ...singlePhase.map(([region, p, T]): [string, number, number] => [region, p, enthalpyOf(p, T)]),
  ...wetStates.map(([p, x]): [string, number, number] => {
    const found = state({ p, x })
    if (found.outcome !== 'state') throw new Error(found.message)
    return ['4', p, found.h]
  }),
]

describe('state from p and h', () => {
  for (const [region, p, h] of all) {
    it(`region ${region} at ${p} Pa, ${Math.round(h)} J/kg`, () => {
      const record = recordOf(p, h)
      expect(record[State.region]).toBe(Number(region))
      for (const name of ['T', 's', 'v', 'x'] as const) {
        if (name === 'x' && record[State.subcritical] === 0) continue
        const slot = State[name]
        const toP = record[State[`${name}p`]] as number
        const toH = record[State[`${name}h`]] as number
        const told = `${name} at constant`
        expectDerivative((q) => recordOf(q, h)[slot] as number, p, 1e-4 * p, toP, `${told} h`)
        expectDerivative((q) => recordOf(p, q)[slot] as number, h, 100, toH, `${told} p`)
      }
    })
  }

  it('has dh = T ds + v dp exactly in a single phase', () => {
    for (const [region, p, h] of all) {
      if (region === '4') continue
      const record = recordOf(p, h)
      expect((record[State.sh] as number) * (record[State.T] as number)).toBeCloseTo(1, 13)
      const sp = record[State.sp] as number
      expect((sp * (record[State.T] as number)) / (record[State.v] as number)).toBeCloseTo(-1, 13)
    }
  })
})

describe('saturation record', () => {
  const names = ['T', 'hL', 'hV', 'sL', 'sV', 'vL', 'vV'] as const
  for (const p of [650, 5e3, 101325, 2e6, 16e6, 16.6e6, 19e6, 21.9e6, 22.02e6]) {
    it(`at ${p} Pa`, () => {
      const at = (q: number): Float64Array => {
        const record = new Float64Array(SATURATION_SIZE)
        expect(saturationAtPressure(record, 0, q)).toBe(0)
        return record
      }
      const record = at(p)
      // nearer to the critical point everything bends with the distance from it
      const step = Math.min(1e-4 * p, 0.01 * (22.064e6 - p))
      for (const name of names) {
        const slope = record[Saturation[`${name}p`]] as number
        expectDerivative((q) => at(q)[Saturation[name]] as number, p, step, slope, name)
      }
    })
  }

  it('gives Tsat and psat with slopes that are each other’s inverse', () => {
    const forward = new Float64Array(RESULT_SIZE)
    const back = new Float64Array(RESULT_SIZE)
    for (let T = 273.15; T < 647; T += 7.3) {
      saturationPressure(back, 0, T)
      saturationTemperature(forward, 0, back[0] as number)
      expect(Math.abs((forward[0] as number) / T - 1)).toBeLessThan(1e-13)
      expect(Math.abs((forward[1] as number) * (back[1] as number) - 1)).toBeLessThan(1e-9)
    }
  })
})

describe('enthalpies', () => {
  const out = new Float64Array(RESULT_SIZE)
  type Form = (out: Float64Array, at: number, p: number, second: number) => number

  function check(form: Form, p: number, second: number, stepSecond: number, told: string): void {
    const value = (q: number, r: number): number => {
      expect(form(out, 0, q, r), told).toBe(0)
      return out[0] as number
    }
    value(p, second)
    const first = out[Result.first] as number
    const other = out[Result.second] as number
    expectDerivative((q) => value(q, second), p, 1e-4 * p, first, `${told}, dp`)
    expectDerivative((q) => value(p, q), second, stepSecond, other, `${told}, second`)
  }

  it('of p and T', () => {
    for (const [region, p, T] of singlePhase) {
      check(enthalpyAtPressureTemperature, p, T, 0.02, `region ${region}, ${p} Pa, ${T} K`)
    }
  })

  it('of p and s, of p and v', () => {
    for (const [region, p, h] of all) {
      const record = recordOf(p, h)
      const told = `region ${region}, ${p} Pa`
      check(enthalpyAtPressureEntropy, p, record[State.s] as number, 0.2, `s, ${told}`)
      const v = record[State.v] as number
      // cold water hardly expands: its h runs steep against v
      if (region !== '1' || (record[State.T] as number) > 290) {
        check(enthalpyAtPressureVolume, p, v, 1e-5 * v, `v, ${told}`)
      }
    }
  })

  it('of p and x, superheat, subcooling', () => {
    for (const p of [1e3, 1e5, 5e6, 16e6, 17e6, 20e6]) {
      for (const x of [-0.2, 0, 0.4, 1, 1.3]) check(enthalpyAtPressureDryness, p, x, 1e-3, `x ${x}`)
      for (const d of [0.5, 30, 200]) check(enthalpyAtPressureSuperheat, p, d, 0.02, `+${d}, ${p}`)
      for (const d of [0.5, 5]) check(enthalpyAtPressureSubcooling, p, d, 0.02, `-${d}, ${p}`)
      const saturation = new Float64Array(SATURATION_SIZE)
      saturationAtPressure(saturation, 0, p)
      enthalpyAtPressureSuperheat(out, 0, p, 0)
      expect(out[0]).toBe(saturation[Saturation.hV])
      enthalpyAtPressureSubcooling(out, 0, p, 0)
      expect(out[0]).toBe(saturation[Saturation.hL])
    }
  })

  it('of the saturated states of an entropy', () => {
    for (const [form, from, to] of [
      [drySaturatedEnthalpyAtEntropy, 4600, 9100],
      [saturatedLiquidEnthalpyAtEntropy, 50, 4300],
    ] as const) {
      for (let s = from; s < to; s += (to - from) / 23) {
        const value = (q: number): number => {
          expect(form(out, 0, q)).toBe(0)
          return out[0] as number
        }
        const h = value(s)
        const [, slope, p] = [...out] as [number, number, number]
        expectDerivative(value, s, 0.2, slope, `s = ${s}`)
        const saturation = new Float64Array(SATURATION_SIZE)
        saturationAtPressure(saturation, 0, p)
        const side = form === drySaturatedEnthalpyAtEntropy ? 1 : 0
        expect(Math.abs((saturation[Saturation.sL + side] as number) / s - 1)).toBeLessThan(1e-10)
        expect(Math.abs((saturation[Saturation.hL + side] as number) / h - 1)).toBeLessThan(1e-10)
      }
    }
  })
})
