/** Properties that hold everywhere, over the whole range and round each border, by random states. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { borderTemperature23 } from '../../src/steam/if97/borders.ts'
import {
  POINT_SIZE,
  Point,
  region1Point,
  region2Point,
  region5Point,
} from '../../src/steam/if97/point.ts'
import { saturationTemperatureOf } from '../../src/steam/if97/saturation-line.ts'
import {
  criticalPressure,
  enthalpyAtPressureDryness,
  enthalpyAtPressureEntropy,
  enthalpyAtPressureTemperature,
  enthalpyAtPressureVolume,
  highestPressure,
  highestTemperature,
  lowestPressure,
  lowestSaturationPressure,
  Outcome,
  RESULT_SIZE,
  STATE_SIZE,
  State,
  state,
  stateAtPressureEnthalpy,
} from '../../src/steam/index.ts'
import { plainRegion3 } from '../reference/plain-if97.ts'

const runs = { numRuns: 3000 }
const out = new Float64Array(RESULT_SIZE)
const point = new Float64Array(POINT_SIZE)

/** A part from 0 to 1 as often near its ends as within. */
const part = fc.double({ min: 0, max: 1, noNaN: true })

/** Pressures (Pa) from 1 Pa to 100 MPa, evenly in their logarithm, or close to a border. */
const pressure = fc.oneof(
  part.map((u) =>
    Math.min(highestPressure, lowestPressure * (highestPressure / lowestPressure) ** u),
  ),
  part.map((u) => 16e6 + u * 7e6),
  fc
    .constantFrom(lowestSaturationPressure, 16529164.25260448, criticalPressure, 50e6)
    .chain((p) =>
      fc
        .constantFrom(1 - 1e-6, 1 - 1e-9, 1 - 1e-12, 1, 1 + 1e-12, 1 + 1e-9, 1 + 1e-6)
        .map((factor) => p * factor),
    ),
)

/** Temperatures (K) over the whole range, or close to a border. */
const temperature = fc.oneof(
  part.map((u) => 273.15 + u * (highestTemperature - 273.15)),
  part.map((u) => 273.15 + u * 800),
  fc
    .constantFrom(273.15, 623.15, 647.096, 863.15, 1073.15)
    .chain((T) => fc.constantFrom(-1e-6, -1e-9, 0, 1e-9, 1e-6).map((off) => T * (1 + off))),
)

const enthalpy = part.map((u) => -1e5 + u * 7.6e6)

function cold(p: number, h: number): { code: number; record: Float64Array } {
  const record = new Float64Array(STATE_SIZE)
  return { code: stateAtPressureEnthalpy(record, 0, p, h), record }
}

/** h by the plain forward equation of the record's region, at its p, T (and v). */
function forwardEnthalpy(record: Float64Array): number {
  const p = record[State.p] as number
  const T = record[State.T] as number
  const region = record[State.region]
  if (region === 3) return plainRegion3(1 / (record[State.v] as number), T).h
  if (region === 1) region1Point(point, p, T)
  else if (region === 2) region2Point(point, p, T)
  else region5Point(point, p, T)
  return point[Point.h] as number
}

/** Whether the record lies within a gap between two regions, at the border's temperature. */
function atBorder(record: Float64Array): boolean {
  return record[State.region] !== 4 && record[State.Th] === 0
}

describe('state from p and h', () => {
  it('is finite or refused with a reason, and never half written', () => {
    fc.assert(
      fc.property(pressure, enthalpy, (p, h) => {
        const { code, record } = cold(p, h)
        if (code === Outcome.fine) {
          expect(record.subarray(0, State.saturation).every(Number.isFinite)).toBe(true)
        } else {
          expect([...record.subarray(0, State.saturation)].every((value) => value === 0)).toBe(true)
        }
      }),
      runs,
    )
  })

  it('meets the forward equation of its region to 1e-10', () => {
    fc.assert(
      fc.property(pressure, temperature, (p, T) => {
        if (enthalpyAtPressureTemperature(out, 0, p, T) !== Outcome.fine) return
        const h = out[0] as number
        const { code, record } = cold(p, h)
        expect(code).toBe(Outcome.fine)
        if (record[State.region] === 4 || atBorder(record)) return
        const scale = Math.max(Math.abs(h), 1e5)
        expect(Math.abs(forwardEnthalpy(record) - h) / scale).toBeLessThan(1e-11)
        if (record[State.region] === 3) {
          const back = plainRegion3(1 / (record[State.v] as number), record[State.T] as number)
          expect(Math.abs(back.p / p - 1)).toBeLessThan(1e-10)
        }
      }),
      runs,
    )
  })

  it('gives the temperature back, but for the width of an overlap at a border', () => {
    fc.assert(
      fc.property(pressure, temperature, (p, T) => {
        if (enthalpyAtPressureTemperature(out, 0, p, T) !== Outcome.fine) return
        const { record } = cold(p, out[0] as number)
        const found = record[State.T] as number
        // within the band of saturation the state counts as saturated
        if (record[State.region] === 4) return
        const border = [623.15, p > 16.5e6 ? borderTemperature23(p) : 0, 1073.15]
        const near = border.some((at) => Math.abs(T - at) < 0.06)
        expect(Math.abs(found - T)).toBeLessThan(near ? 0.06 : 1e-9 * T)
      }),
      runs,
    )
  })

  it('does not depend on the state that the record held', () => {
    fc.assert(
      fc.property(pressure, enthalpy, pressure, enthalpy, (p0, h0, p, h) => {
        const { code, record } = cold(p, h)
        const warm = new Float64Array(STATE_SIZE)
        stateAtPressureEnthalpy(warm, 0, p0, h0)
        expect(stateAtPressureEnthalpy(warm, 0, p, h)).toBe(code)
        if (code !== Outcome.fine) return
        expect(warm[State.region]).toBe(record[State.region])
        for (const slot of [State.T, State.s, State.v, State.x]) {
          const scale = slot === State.s ? 300 : 1e-300
          const value = record[slot] as number
          const off = Math.abs((warm[slot] as number) - value) / Math.max(scale, Math.abs(value))
          expect(off, `slot ${slot}`).toBeLessThan(1e-12)
        }
        for (const slot of [State.Tp, State.Th, State.vp, State.vh, State.xp, State.xh]) {
          const value = record[slot] as number
          const off = Math.abs((warm[slot] as number) - value) / Math.max(1e-300, Math.abs(value))
          expect(off, `slot ${slot}`).toBeLessThan(1e-9)
        }
      }),
      runs,
    )
  })

  it('does not depend on a state close by', () => {
    const nearby = fc.double({ min: -0.03, max: 0.03, noNaN: true })
    fc.assert(
      fc.property(pressure, enthalpy, nearby, nearby, (p, h, dp, dh) => {
        const { code, record } = cold(p, h)
        const warm = new Float64Array(STATE_SIZE)
        stateAtPressureEnthalpy(warm, 0, p * (1 + dp), h * (1 + dh))
        expect(stateAtPressureEnthalpy(warm, 0, p, h)).toBe(code)
        if (code !== Outcome.fine) return
        const T = record[State.T] as number
        const v = record[State.v] as number
        expect(Math.abs((warm[State.T] as number) / T - 1)).toBeLessThan(1e-12)
        expect(Math.abs((warm[State.v] as number) / v - 1)).toBeLessThan(1e-12)
      }),
      runs,
    )
  })

  it('keeps its state when it is refused', () => {
    fc.assert(
      fc.property(pressure, enthalpy, pressure, enthalpy, (p0, h0, p, h) => {
        const { code, record } = cold(p0, h0)
        if (code !== Outcome.fine) return
        // with its saturation record where it has one
        const size = record[State.subcritical] === 1 ? STATE_SIZE : State.saturation
        const before = [...record.subarray(0, size)]
        if (stateAtPressureEnthalpy(record, 0, p, h) === Outcome.fine) return
        expect([...record.subarray(0, size)]).toEqual(before)
      }),
      runs,
    )
  })

  it('has T, s and v that rise with h', () => {
    fc.assert(
      fc.property(
        pressure,
        enthalpy,
        fc.double({ min: 1e-3, max: 1e5, noNaN: true }),
        (p, h, dh) => {
          const low = cold(p, h)
          const high = cold(p, h + dh)
          if (low.code !== Outcome.fine || high.code !== Outcome.fine) return
          const rise = (slot: number): number =>
            (high.record[slot] as number) - (low.record[slot] as number)
          const T = low.record[State.T] as number
          expect(rise(State.T)).toBeGreaterThanOrEqual(-1e-12 * T)
          // s may step back by the jump of the formulation at a border, some 0.2 J/(kg K)
          const crossing = [623.15, p > 16.5e6 ? borderTemperature23(p) : 0, 1073.15].some(
            (at) =>
              Math.abs(T - at) < 0.06 || Math.abs((high.record[State.T] as number) - at) < 0.06,
          )
          expect(rise(State.s)).toBeGreaterThan(crossing ? -0.2 : -1e-9)
          const v = low.record[State.v] as number
          // cold water is the exception: it shrinks up to 277 K
          if (T > 278) expect(rise(State.v)).toBeGreaterThan(crossing ? -2e-4 * v : -1e-12 * v)
        },
      ),
      runs,
    )
  })
})

describe('round trips', () => {
  it('h(p, s) and h(p, v) of a state are its h', () => {
    fc.assert(
      fc.property(pressure, temperature, (p, T) => {
        if (enthalpyAtPressureTemperature(out, 0, p, T) !== Outcome.fine) return
        const h = out[0] as number
        const { record } = cold(p, h)
        const found = record[State.T] as number
        const border = [623.15, p > 16.5e6 ? borderTemperature23(p) : 0, 1073.15]
        const near = border.some((at) => Math.abs(found - at) < 0.06)
        const scale = Math.max(Math.abs(h), 1e5)
        expect(enthalpyAtPressureEntropy(out, 0, p, record[State.s] as number)).toBe(Outcome.fine)
        expect(Math.abs((out[0] as number) - h) / scale).toBeLessThan(near ? 1e-4 : 1e-11)
        // volume says little of cold water, and nothing of it near its density maximum
        if (found < 290 && record[State.x]! < 0) return
        if (found < 320 && p > criticalPressure) return
        expect(enthalpyAtPressureVolume(out, 0, p, record[State.v] as number)).toBe(Outcome.fine)
        expect(Math.abs((out[0] as number) - h) / scale).toBeLessThan(near ? 2e-4 : 2e-9)
      }),
      runs,
    )
  })

  it('x of h(p, x) is x, within the wet region and beyond it', () => {
    const wetPressure = part.map((u) => 612 * (22.06e6 / 612) ** u)
    fc.assert(
      fc.property(wetPressure, fc.double({ min: 0, max: 1, noNaN: true }), (p, x) => {
        expect(enthalpyAtPressureDryness(out, 0, p, x)).toBe(Outcome.fine)
        const { code, record } = cold(p, out[0] as number)
        expect(code).toBe(Outcome.fine)
        expect(record[State.region]).toBe(4)
        const T = saturationTemperatureOf(p)
        expect(Math.abs((record[State.T] as number) - T)).toBeLessThan(2e-14 * T)
        expect(Math.abs((record[State.x] as number) - x)).toBeLessThan(1e-9)
      }),
      runs,
    )
  })

  it('state of h and s is the state of p and h', () => {
    fc.assert(
      fc.property(pressure, enthalpy, (p, h) => {
        const first = state({ p, h })
        if (first.outcome !== 'state') return
        const border = [623.15, p > 16.5e6 ? borderTemperature23(p) : 0, 1073.15]
        if (border.some((at) => Math.abs(first.T - at) < 0.06)) return
        // water near the freezing point: s hardly depends on p there, so that h and s fix p poorly
        const back = state({ h: first.h, s: first.s })
        if (back.outcome !== 'state') throw new Error(`${JSON.stringify(first)} ${back.message}`)
        expect(Math.abs(back.p / p - 1) * Math.min(1, p / 1e5)).toBeLessThan(1e-7)
        expect(Math.abs(back.T / first.T - 1)).toBeLessThan(1e-9)
      }),
      { numRuns: 1000 },
    )
  })

  it('the states of T with s and of T with h include the one they came from', () => {
    fc.assert(
      fc.property(pressure, temperature, (p, T) => {
        const first = state({ p, T })
        if (first.outcome !== 'state' || p < 10) return
        // at the critical point h and s run through vertically: p is lost in round-off
        if (Math.abs(p / criticalPressure - 1) < 1e-4 && Math.abs(T - 647.096) < 0.01) return
        const border = [623.15, p > 16.5e6 ? borderTemperature23(p) : 0, 1073.15]
        if (border.some((at) => Math.abs(first.T - at) < 0.06)) return
        for (const found of [state({ T, s: first.s }), state({ T, h: first.h })]) {
          const answers = found.outcome === 'several' ? found.answers : [found]
          const here = answers.some(
            (answer) =>
              answer.outcome === 'state' &&
              Math.abs(answer.h - first.h) < 1e-6 * Math.abs(first.h) + 1 &&
              Math.abs(answer.s - first.s) < 1e-3 * Math.abs(first.s) + 0.1,
          )
          expect(here, JSON.stringify({ first, found })).toBe(true)
        }
      }),
      { numRuns: 300 },
    )
  })
})
