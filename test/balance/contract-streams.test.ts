import { describe, expect, test } from 'vitest'
import { SATURATION_SIZE, Saturation, saturationAtPressure, state } from '../../src/steam/index.ts'
import type { LayoutParts } from '../published/build-layout.ts'
import { answerOf, solvedAnswerOf } from './contract-answer.ts'

/* The quantities of a stream: how they may be given, and what they show. */

const stream = (given: Readonly<Record<string, number>>): LayoutParts => ({
  units: { in: ['supply'], out: ['offtake'] },
  streams: { a: ['in.outlet', 'out.inlet', { m: 1, ...given }] },
})

const p = 1e6
const saturated = new Float64Array(SATURATION_SIZE)
saturationAtPressure(saturated, 0, p)
const T = saturated[Saturation.T]!
const liquid = saturated[Saturation.hL]!
const vapour = saturated[Saturation.hV]!

function enthalpy(at: { readonly p: number; readonly T: number }): number {
  const found = state(at)
  if (found.outcome !== 'state') throw new Error(found.outcome)
  return found.h
}

describe('given', () => {
  test.each([
    ['x = 0: saturated liquid', { p, x: 0 }, liquid],
    ['x = 1: dry saturated steam', { p, x: 1 }, vapour],
    ['x = 0.9', { p, x: 0.9 }, liquid + 0.9 * (vapour - liquid)],
    ['x = 1.05, not clamped', { p, x: 1.05 }, liquid + 1.05 * (vapour - liquid)],
    ['x = -0.05, not clamped', { p, x: -0.05 }, liquid - 0.05 * (vapour - liquid)],
    ['superheat 0: dry saturated steam', { p, superheat: 0 }, vapour],
    ['superheat 30', { p, superheat: 30 }, enthalpy({ p, T: T + 30 })],
    ['subcooling 0: saturated liquid', { p, subcooling: 0 }, liquid],
    ['subcooling 30', { p, subcooling: 30 }, enthalpy({ p, T: T - 30 })],
    ['T', { p, T: 500 }, enthalpy({ p, T: 500 })],
    ['h', { p, h: 2e6 }, 2e6],
  ])('%s', (_, given, h) => {
    expect(solvedAnswerOf(stream(given)).at('a.h') / h).toBeCloseTo(1, 11)
  })

  test.each([
    ['T and x', { T, x: 0.9 }, p],
    ['T and superheat', { T: T + 30, superheat: 30 }, p],
    ['T and subcooling', { T: T - 30, subcooling: 30 }, p],
  ])('%s give the pressure', (_, given, wanted) => {
    expect(solvedAnswerOf(stream(given)).at('a.p') / wanted).toBeCloseTo(1, 9)
  })

  test('s and p, s and T', () => {
    const steam = solvedAnswerOf(stream({ p, T: 600 }))
    const s = steam.at('a.s')
    expect(solvedAnswerOf(stream({ p, s })).at('a.T')).toBeCloseTo(600, 6)
    expect(solvedAnswerOf(stream({ T: 600, s })).at('a.p') / p).toBeCloseTo(1, 8)
  })

  test('three quantities of one state are one too many', () => {
    const answer = answerOf(stream({ p, T: 600, h: 3e6 }))
    expect(answer.status).toBe('overspecified')
    expect(answer.finding('overspecified').excess).toBe(1)
  })

  test('one alone is one too few', () => {
    const answer = answerOf(stream({ p }))
    expect(answer.status).toBe('underspecified')
    const { missing, quantities } = answer.finding('underspecified')
    expect(missing).toBe(1)
    expect([...quantities].sort()).toEqual(
      ['a.T', 'a.h', 'a.s', 'a.subcooling', 'a.superheat', 'a.x'].sort(),
    )
  })
})

describe('shown', () => {
  test.each([
    ['liquid', { p, T: 400 }, 'liquid', null, 400 - T],
    ['saturated liquid', { p, x: 0 }, 'wet', 0, 0],
    ['wet', { p, x: 0.4 }, 'wet', 0.4, 0],
    ['dry saturated', { p, x: 1 }, 'wet', 1, 0],
    ['within 1e-9 of saturation', { p, h: vapour * (1 + 5e-10) }, 'wet', 1, 0],
    ['superheated', { p, T: 600 }, 'vapour', null, 600 - T],
  ])('%s: phase, dryness, superheat and subcooling', (_, given, phase, x, superheat) => {
    const shown = solvedAnswerOf(stream(given)).streams.a!
    expect(shown.phase).toBe(phase)
    if (x === null) expect(shown.x).toBeNull()
    else expect(shown.x).toBeCloseTo(x, 12)
    expect(shown.superheat).toBeCloseTo(superheat, 7)
    expect(shown.subcooling).toBeCloseTo(-superheat, 7)
  })

  test.each([
    ['supercritical', { p: 25e6, T: 700 }, 'supercritical'],
    ['at the critical point’s edges', { p: 22.064e6, T: 647.096 }, 'supercritical'],
    ['dense below the critical temperature', { p: 25e6, T: 500 }, 'liquid'],
    ['hot below the critical pressure', { p: 20e6, T: 700 }, 'vapour'],
  ])('%s', (_, given, phase) => {
    const shown = solvedAnswerOf(stream(given)).streams.a!
    expect(shown.phase).toBe(phase)
    expect(shown.x).toBeNull()
    const isSubcritical = given.p < 22.064e6
    expect(shown.superheat === null).toBe(!isSubcritical)
    expect(shown.subcooling === null).toBe(!isSubcritical)
  })

  test('T, s, v, x follow from p and h by the forward equations', () => {
    for (const given of [
      { p, T: 350 },
      { p, T: 900 },
      { p: 30e6, T: 680 },
      { p: 5e3, T: 1500 },
    ]) {
      const { at } = solvedAnswerOf(stream(given))
      const forward = state(given)
      if (forward.outcome !== 'state') throw new Error(forward.outcome)
      for (const name of ['T', 'h', 's', 'v'] as const) {
        expect([name, at(`a.${name}`) / forward[name]]).toEqual([name, expect.closeTo(1, 10)])
      }
    }
  })
})
