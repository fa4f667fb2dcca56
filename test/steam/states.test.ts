/** States from any two quantities: values, phases, more than one answer, and what a refusal says. */
import { describe, expect, it } from 'vitest'
import {
  type Phase,
  phaseOf,
  STATE_SIZE,
  type SteamRange,
  type SteamSeveral,
  type SteamState,
  state,
  stateAtPressureEnthalpy,
  stateAtRequest,
  stateRequest,
} from '../../src/steam/index.ts'

function single(pair: Parameters<typeof state>[0]): SteamState {
  const found: SteamState | SteamRange | SteamSeveral = state(pair)
  if (found.outcome !== 'state') throw new Error(found.message)
  return found
}

describe('a state from any pair', () => {
  // water, steam, wet steam, dense fluid, hot steam
  const states = [
    single({ p: 5e6, T: 420 }),
    single({ p: 12e6, T: 813.15 }),
    single({ p: 5e3, x: 0.88 }),
    single({ p: 19e6, x: 0.3 }),
    single({ p: 25e6, T: 655 }),
    single({ p: 2e6, T: 1500 }),
  ]

  it('is the same from p with T, h, s or v and from h with s', () => {
    for (const one of states) {
      const { p, T, h, s, v } = one
      const pairs = [
        { p, h },
        { p, s },
        { p, v },
        { h, s },
      ]
      for (const pair of one.x === null ? [...pairs, { p, T }] : [...pairs, { p, x: one.x }]) {
        const found = single(pair)
        expect(found.phase).toBe(one.phase)
        for (const name of ['p', 'T', 'h', 's', 'v'] as const) {
          expect(
            Math.abs(found[name] / one[name] - 1),
            `${Object.keys(pair)} ${name}`,
          ).toBeLessThan(1e-9)
        }
      }
    }
  })

  it('is the same from T with x', () => {
    for (const { T, x, h } of states.filter(({ x }) => x !== null)) {
      expect(Math.abs(single({ T, x: x as number }).h / h - 1)).toBeLessThan(1e-11)
    }
  })

  it('is found from T with s, and from T with h where they leave one state', () => {
    for (const { T, s, h, p } of states) {
      expect(Math.abs(single({ T, s }).p / p - 1)).toBeLessThan(1e-8)
      const found = state({ T, h })
      if (found.outcome === 'state') expect(Math.abs(found.p / p - 1)).toBeLessThan(1e-8)
      else expect(found.outcome).toBe('several')
    }
  })

  it('has cp and speed of sound outside the wet region only, x within it only', () => {
    for (const { phase, cp, w, x } of states) {
      expect(cp === null).toBe(phase === 'wet')
      expect(w === null).toBe(phase === 'wet')
      expect(x === null).toBe(phase !== 'wet')
    }
  })
})

describe('phases', () => {
  const wet: Phase = 'wet'

  it('are wet from saturated liquid to dry saturated steam, both included', () => {
    for (const p of [1e3, 1e5, 10e6, 20e6]) {
      const liquid = single({ p, x: 0 })
      const steam = single({ p, x: 1 })
      for (const h of [liquid.h, steam.h, 0.5 * (liquid.h + steam.h), liquid.h * (1 - 5e-10)]) {
        expect(phaseOf(p, h)).toBe(wet)
      }
      expect(phaseOf(p, liquid.h * (1 - 3e-9))).toBe('liquid')
      expect(phaseOf(p, steam.h * (1 + 3e-9))).toBe('vapour')
    }
  })

  it('are supercritical where p and T are, liquid below the critical temperature', () => {
    expect(single({ p: 25e6, T: 648 }).phase).toBe('supercritical')
    expect(single({ p: 25e6, T: 646 }).phase).toBe('liquid')
    expect(single({ p: 22e6, T: 700 }).phase).toBe('vapour')
    expect(single({ p: 300, T: 300 }).phase).toBe('vapour')
    expect(phaseOf(25e6, 3e6)).toBe('supercritical')
    expect(phaseOf(25e6, 5e5)).toBe('liquid')
  })

  it('have an answer beyond the limits too', () => {
    expect(phaseOf(1e5, -5e5)).toBe('liquid')
    expect(phaseOf(1e5, 9e6)).toBe('vapour')
    expect(phaseOf(40e6, 9e6)).toBe('supercritical')
    expect(phaseOf(2e8, 3e6)).toBe('vapour')
  })
})

describe('more than one answer', () => {
  it('names both states of T and h: compressed water and wet steam', () => {
    const found = state({ T: 400, h: 5.5e5 })
    expect(found.outcome).toBe('several')
    if (found.outcome !== 'several') return
    expect(found.answers.length).toBe(2)
    for (const answer of found.answers) {
      expect(answer.T).toBe(400)
      expect(Math.abs(answer.h / 5.5e5 - 1)).toBeLessThan(1e-9)
      expect(found.message).toContain(answer.p.toPrecision(6))
    }
  })

  it('names both states of p and v of cold water', () => {
    const cold = single({ p: 1e5, T: 275 })
    const found = state({ p: 1e5, v: cold.v })
    expect(found.outcome).toBe('several')
    if (found.outcome !== 'several') return
    const temperatures = found.answers.map(({ T }) => T)
    expect(temperatures[0]).toBeCloseTo(275, 6)
    expect(temperatures[1]).toBeGreaterThan(278)
  })
})

describe('refusals', () => {
  it('say which quantity, its value and the limit', () => {
    const high = state({ p: 1.2e8, T: 600 })
    expect(high).toMatchObject({ outcome: 'range', quantity: 'pressure', value: 1.2e8, limit: 1e8 })
    const dry = state({ p: 1e5, x: 1.2 })
    expect(dry).toMatchObject({ outcome: 'range', quantity: 'dryness', value: 1.2, limit: 1 })
    const wet = state({ T: 400, x: -0.1 })
    expect(wet).toMatchObject({ outcome: 'range', quantity: 'dryness', value: -0.1, limit: 0 })
    const critical = state({ T: 660, x: 0.5 })
    expect(critical).toMatchObject({ outcome: 'range', quantity: 'temperature', limit: 647.096 })
    const cold = state({ T: 200, s: 1000 })
    expect(cold).toMatchObject({ outcome: 'range', quantity: 'temperature', limit: 273.15 })
    const low = state({ T: 400, s: -100 })
    expect(low).toMatchObject({ outcome: 'range', quantity: 'entropy', value: -100 })
    const little = state({ h: 1e5, s: 5000 })
    expect(little).toMatchObject({ outcome: 'range', quantity: 'enthalpy', value: 1e5 })
    const line = state({ p: 1e5, T: single({ p: 1e5, x: 0 }).T })
    expect(line.outcome).toBe('range')
    for (const found of [high, dry, wet, critical, cold, low, little, line]) {
      if (found.outcome !== 'range') throw new Error('not refused')
      expect(found.message.length).toBeGreaterThan(30)
      expect(found.message).not.toMatch(/NaN|undefined|Infinity/)
    }
  })

  it('of what is not a number name it and never answer with one', () => {
    const nan = Number.NaN
    for (const pair of [
      { p: nan, T: 400 },
      { p: 1e5, T: nan },
      { p: 1e5, h: nan },
      { p: 1e5, s: nan },
      { p: 1e5, v: nan },
      { p: 1e5, x: nan },
      { T: nan, x: 0.5 },
      { T: 400, x: nan },
      { T: 400, s: nan },
      { T: nan, h: 1e6 },
      { h: nan, s: 5000 },
      { h: 1e6, s: nan },
      { h: Number.POSITIVE_INFINITY, s: 5000 },
    ]) {
      const found = state(pair)
      expect(found.outcome, JSON.stringify(pair)).toBe('range')
      if (found.outcome === 'range') expect(found.message).toContain('not a number')
    }
  })
})

describe('the hot function', () => {
  it('takes p and h as arguments or from the request, with the same answer', () => {
    const first = new Float64Array(STATE_SIZE)
    const second = new Float64Array(STATE_SIZE)
    for (const [p, h] of [
      [1e5, 2e6],
      [12e6, 3.4e6],
      [25e6, 2e6],
    ] as const) {
      expect(stateAtPressureEnthalpy(first, 0, p, h)).toBe(0)
      stateRequest[0] = p
      stateRequest[1] = h
      expect(stateAtRequest(second, 0)).toBe(0)
      expect([...second]).toEqual([...first])
    }
  })
})
