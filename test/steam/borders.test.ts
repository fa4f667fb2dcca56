/** Borders between regions, saturation and the neighbourhood of the critical point. */
import { describe, expect, it } from 'vitest'
import {
  border,
  highSide,
  lowSide,
  sidesOfBorder13,
  sidesOfBorder23,
  sidesOfBorder25,
} from '../../src/steam/gap.ts'
import { Point } from '../../src/steam/if97/point.ts'
import {
  criticalPressure,
  criticalTemperature,
  enthalpyAtPressureEntropy,
  enthalpyAtPressureTemperature,
  enthalpyAtPressureVolume,
  RESULT_SIZE,
  SATURATION_SIZE,
  Saturation,
  STATE_SIZE,
  State,
  saturationAtPressure,
  stateAtPressureEnthalpy,
} from '../../src/steam/index.ts'

const record = new Float64Array(STATE_SIZE)
const saturation = new Float64Array(SATURATION_SIZE)
const out = new Float64Array(RESULT_SIZE)

function at(p: number, h: number): Float64Array {
  record.fill(0)
  const code = stateAtPressureEnthalpy(record, 0, p, h)
  if (code !== 0) throw new Error(`outcome ${code} at ${p} Pa, ${h} J/kg`)
  return record
}

/** Fails with what was told; an expectation for each of so many states would take its time. */
function holds(condition: boolean, told: string): void {
  if (!condition) expect.fail(told)
}

const dense = [16.7e6, 17e6, 18.3e6, 20e6, 22e6, 22.064e6, 24e6, 30e6, 43e6, 60e6, 80e6, 99.9e6]
const hot = [1, 1e3, 1e5, 1e6, 5e6, 12e6, 25e6, 33e6, 50e6]
const borders = [
  { name: '1/3', low: 1, high: 3, sides: sidesOfBorder13, pressures: dense },
  { name: '2/3', low: 3, high: 2, sides: sidesOfBorder23, pressures: dense },
  { name: '2/5', low: 2, high: 5, sides: sidesOfBorder25, pressures: hot },
] as const

describe('borders between regions', () => {
  for (const { name, low, high, sides, pressures } of borders) {
    it(`${name}: T rises through it, a gap has its temperature, an overlap one answer`, () => {
      let gaps = 0
      let overlaps = 0
      for (const p of pressures) {
        sides(p)
        const T = border[0] as number
        const first = lowSide[Point.h] as number
        const last = highSide[Point.h] as number
        const width = last - first
        // the formulation's own jump: up to some 0.1 kJ/kg (R7-97 section 10)
        expect(Math.abs(width)).toBeLessThan(150)
        let before = 0
        const from = Math.min(first, last) - 200
        for (let i = 0; i <= 400; i++) {
          const h = from + (i * (Math.abs(width) + 400)) / 400
          const found = at(p, h)
          const here = found[State.T] as number
          const told = `${p} Pa, ${h} J/kg`
          holds(here >= before, `T falls at ${told}`)
          before = here
          const region = found[State.region] as number
          if (h > first && h < last) {
            gaps += 1
            holds(here === T && found[State.Th] === 0, `T is not the border's at ${told}`)
            // between both sides
            const s = found[State.s] as number
            const [s1, s2] = [lowSide[Point.s] as number, highSide[Point.s] as number]
            holds(s >= Math.min(s1, s2) - 1e-9 && s <= Math.max(s1, s2) + 1e-9, `s at ${told}`)
          } else if (width < 0 && h > last && h < first) {
            overlaps += 1
            // region 1 or 2 goes first
            holds(region === (name === '1/3' ? 1 : 2), `region ${region} at ${told}`)
          } else holds(region === low || region === high, `region ${region} at ${told}`)
        }
      }
      expect(gaps).toBeGreaterThan(0)
      expect(overlaps).toBeGreaterThan(0)
    })

    it(`${name}: 1e-9 of T on either side is of that side`, () => {
      for (const p of [16.53e6, ...pressures].slice(name === '2/5' ? 1 : 0)) {
        sides(p)
        const T = border[0] as number
        const below = lowSide[Point.h] as number
        const above = highSide[Point.h] as number
        for (const [factor, expected] of [
          [1 - 1e-9, below],
          [1 + 1e-9, above],
        ] as const) {
          expect(enthalpyAtPressureTemperature(out, 0, p, T * factor)).toBe(0)
          // cp is below 20 kJ/(kg K) there
          expect(Math.abs((out[0] as number) - expected)).toBeLessThan(0.05)
        }
      }
    })

    it(`${name}: entropy and volume lead back into a gap`, () => {
      for (const p of pressures) {
        sides(p)
        const first = lowSide[Point.h] as number
        const width = (highSide[Point.h] as number) - first
        if (width <= 0) continue
        const h = first + 0.4 * width
        const found = at(p, h)
        if ((highSide[Point.s] as number) > (lowSide[Point.s] as number)) {
          expect(enthalpyAtPressureEntropy(out, 0, p, found[State.s] as number)).toBe(0)
          expect(Math.abs((out[0] as number) - h)).toBeLessThan(1e-6 * width + 1e-6)
        }
        if ((highSide[Point.v] as number) > (lowSide[Point.v] as number) * (1 + 1e-7)) {
          expect(enthalpyAtPressureVolume(out, 0, p, found[State.v] as number)).toBe(0)
          expect(Math.abs((out[0] as number) - h)).toBeLessThan(1e-4 * width)
        }
      }
    })
  }
})

describe('saturation', () => {
  const pressures: number[] = []
  for (let i = 0; i <= 300; i++) pressures.push(612 * (22.0639e6 / 612) ** (i / 300))

  it('never puts a state beside it into the other phase', () => {
    for (const p of pressures) {
      expect(saturationAtPressure(saturation, 0, p)).toBe(0)
      const T = saturation[Saturation.T] as number
      const hL = saturation[Saturation.hL] as number
      const hV = saturation[Saturation.hV] as number
      const scale = Math.max(Math.abs(hL), 1e5)
      for (const part of [1e-4, 1e-6, 1e-8, 2e-9]) {
        const told = `${part} beside saturation at ${p} Pa`
        const liquid = at(p, hL - part * scale)
        // a ten-thousandth away may be beyond the border of regions 1 and 3
        holds(
          liquid[State.region] === (p > 16529164.2526 ? 3 : 1) ||
            (part === 1e-4 && liquid[State.region] === 1),
          `region ${liquid[State.region]} ${told}`,
        )
        holds((liquid[State.T] as number) <= T * (1 + 1e-12), `water too warm ${told}`)
        holds((liquid[State.x] as number) < 0, `x of water ${told}`)
        // water below 277 K shrinks as it warms
        const vL = (saturation[Saturation.vL] as number) * (T < 278 ? 1 + 1e-5 : 1 + 1e-8)
        holds((liquid[State.v] as number) < vL, `v of water ${told}`)
        const vapour = at(p, hV + part * hV)
        holds(vapour[State.region] === 2 || vapour[State.region] === 3, `region of steam ${told}`)
        holds((vapour[State.T] as number) >= T * (1 - 1e-12), `steam too cold ${told}`)
        holds((vapour[State.x] as number) > 1, `x of steam ${told}`)
        const vV = (saturation[Saturation.vV] as number) * (1 - 1e-8)
        holds((vapour[State.v] as number) > vV, `v of steam ${told}`)
      }
      for (const h of [
        hL * (1 - 5e-10),
        hL,
        hL * (1 + 5e-10),
        hV * (1 - 1e-12),
        hV,
        hV * (1 + 5e-10),
      ]) {
        const wet = at(p, h)
        holds(wet[State.region] === 4 && wet[State.T] === T, `not saturated: ${p} Pa, ${h} J/kg`)
      }
    }
  })

  it('has T, s and v that pass into the wet region without a step', () => {
    for (const p of pressures.filter((p) => p < 22e6)) {
      saturationAtPressure(saturation, 0, p)
      for (const side of [0, 1]) {
        const h = saturation[Saturation.hL + side] as number
        const off = (side === 0 ? -1 : 1) * Math.max(2e-9 * Math.abs(h), 2e-4)
        const beside = at(p, h + off)
        const T = saturation[Saturation.T] as number
        expect(Math.abs((beside[State.T] as number) / T - 1)).toBeLessThan(2e-8)
        const s = saturation[Saturation.sL + side] as number
        expect(Math.abs((beside[State.s] as number) - s)).toBeLessThan(1e-4)
        const v = saturation[Saturation.vL + side] as number
        expect(Math.abs((beside[State.v] as number) / v - 1)).toBeLessThan(2e-8)
      }
    }
  })
})

describe('the critical point', () => {
  // R7-97 Eqs. (2) to (4): 647.096 K, 22.064 MPa, 322 kg/m3; h from region 3 there
  const hc = 2087546.845
  const sc = 4412.02148223476

  it('is closed in on by both saturated states', () => {
    let last = new Float64Array(SATURATION_SIZE)
    for (let gap = 5e6; gap > 1e-6; gap *= 0.8) {
      const here = new Float64Array(SATURATION_SIZE)
      expect(saturationAtPressure(here, 0, criticalPressure - gap)).toBe(0)
      expect(here.every((value) => Number.isFinite(value))).toBe(true)
      expect(here[Saturation.T]).toBeLessThan(criticalTemperature)
      expect(here[Saturation.hL]).toBeLessThan(hc)
      expect(here[Saturation.hV]).toBeGreaterThan(hc)
      expect(here[Saturation.sL]).toBeLessThan(sc)
      expect(here[Saturation.sV]).toBeGreaterThan(sc)
      expect(here[Saturation.vL]).toBeLessThan(1 / 322)
      expect(here[Saturation.vV]).toBeGreaterThan(1 / 322)
      if (last[Saturation.p] !== 0) {
        expect(here[Saturation.hL]).toBeGreaterThan(last[Saturation.hL] as number)
        expect(here[Saturation.hV]).toBeLessThan(last[Saturation.hV] as number)
        expect(here[Saturation.sV]).toBeLessThan(last[Saturation.sV] as number)
        expect(here[Saturation.vV]).toBeLessThan(last[Saturation.vV] as number)
      }
      last = here
    }
    expect(Math.abs((last[Saturation.hV] as number) / hc - 1)).toBeLessThan(1e-6)
  })

  it('has states all round it', () => {
    for (const dp of [-1e5, -1e3, -10, -0.1, 0, 0.1, 10, 1e3, 1e5]) {
      let T = 0
      for (let dh = -2e5; dh <= 2e5; dh += 500) {
        const found = at(criticalPressure + dp, hc + dh)
        holds((found[State.T] as number) >= T, `T falls at ${dp} Pa, ${dh} J/kg from critical`)
        holds((found[State.v] as number) > 0, `v at ${dp} Pa, ${dh} J/kg from critical`)
        T = found[State.T] as number
        const finite = found.subarray(0, State.saturation).every(Number.isFinite)
        holds(finite, `not finite at ${dp} Pa, ${dh} J/kg from critical`)
      }
    }
    const found = at(criticalPressure, hc)
    expect(found[State.T]).toBeCloseTo(criticalTemperature, 4)
    expect(found[State.subcritical]).toBe(0)
    expect(found[State.x]).toBe(0)
  })
})
