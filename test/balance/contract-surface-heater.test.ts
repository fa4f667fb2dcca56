import { describe, expect, test } from 'vitest'
import { changed, type LayoutParts } from '../published/build-layout.ts'
import { alone, lmtd, saturation, steam } from './by-hand.ts'
import { answerOf, solvedAnswerOf } from './contract-answer.ts'

/*
 * Surface heaters against zones written out here: drain cooling, condensing and desuperheating, each
 * with its own mean difference, the water between them at the outlet stream's pressure.
 */

const shell = 1.5e6
const { T: Ts, liquid } = saturation(shell)

/** Water of 9 MPa and 430 K, steam of 1.5 MPa and 640 K, a drain of 3 MPa and 490 K. */
function heater(
  given: Readonly<Record<string, number>>,
  options: Readonly<Record<string, boolean>> = {},
): LayoutParts {
  return alone(
    ['surfaceHeater', { pressureLossFraction: 0.02, terminalDifference: 2.5, ...given }, options],
    {
      water: { p: 9e6, T: 430, m: 120 },
      steam1: { p: shell, T: 640 },
      drain1: { p: 3e6, T: 490, m: 8 },
    },
    { outlet: {}, drain: {} },
  )
}

const outletPressure = 0.98 * 9e6
const water = steam({ p: 9e6, T: 430 }).h
const bled = steam({ p: shell, T: 640 }).h
const cascaded = steam({ p: 3e6, T: 490 }).h
/** Temperature of the water between two zones, K. */
const between = (h: number): number => steam({ p: outletPressure, h }).T

describe('a condensing zone alone', () => {
  const { at } = solvedAnswerOf(heater({}))
  const outlet = steam({ p: outletPressure, T: Ts - 2.5 }).h
  const heat = 120 * (outlet - water)

  test('the water leaves as far below saturation of the shell as given, less its pressure loss', () => {
    expect(at('outlet.T')).toBeCloseTo(Ts - 2.5, 8)
    expect(at('outlet.p') / outletPressure).toBeCloseTo(1, 12)
    expect(at('outlet.m')).toBe(120)
    expect(at('u.heat') / heat).toBeCloseTo(1, 10)
  })

  test('the drain is saturated liquid of the shell; the drain of another is throttled into it', () => {
    expect(at('drain.p')).toBe(shell)
    expect(at('drain.h') / liquid).toBeCloseTo(1, 12)
    expect(at('drain1.p')).toBe(3e6)
  })

  test('steam = (duty less what the drain brings)/(h - h′)', () => {
    const flow = (heat - 8 * (cascaded - liquid)) / (bled - liquid)
    expect(at('steam1.m') / flow).toBeCloseTo(1, 10)
    expect(at('drain.m') / (flow + 8)).toBeCloseTo(1, 10)
  })

  test('its shell side is at saturation throughout, whatever superheat enters', () => {
    const conductance = heat / lmtd(Ts - 430, 2.5)
    expect(at('u.conductance') / conductance).toBeCloseTo(1, 10)
    const wet = solvedAnswerOf(
      changed(heater({}), { free: ['steam1.T'], set: { 'steam1.x': 0.95 } }),
    ).at
    expect(wet('u.conductance') / conductance).toBeCloseTo(1, 10)
    expect(wet('steam1.m')).toBeGreaterThan(at('steam1.m'))
  })

  test('the conductance given instead gives the terminal difference back', () => {
    const turned = changed(heater({}), {
      free: ['u.terminalDifference'],
      set: { 'u.conductance': at('u.conductance') },
    })
    expect(solvedAnswerOf(turned).at('u.terminalDifference')).toBeCloseTo(2.5, 8)
    // T_out = Tsat - (Tsat - T_in) exp(-UA/(m c)), c the mean from inlet to outlet.
    const larger = solvedAnswerOf(
      changed(turned, { set: { 'u.conductance': 1.4 * at('u.conductance') } }),
    ).at
    const c = (larger('outlet.h') - water) / (larger('outlet.T') - 430)
    const left = (Ts - 430) * Math.exp((-1.4 * at('u.conductance')) / (120 * c))
    expect(larger('u.terminalDifference') / left).toBeCloseTo(1, 8)
  })

  test('a terminal difference of 0 needs an unbounded conductance', () => {
    const answer = solvedAnswerOf(heater({ terminalDifference: 0 }))
    expect(answer.unbounded).toContain('u.conductance')
    expect(answer.at('outlet.T')).toBeCloseTo(Ts, 8)
  })

  test('water that leaves hotter than the shell cannot be, though only a conductance suffers', () => {
    const answer = answerOf(heater({ terminalDifference: -1 }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ where }) => where)).toContain('u')
  })

  test('all its steam comes at the pressure of the shell', () => {
    const two = {
      ...heater({}),
      units: { ...heater({}).units, more: ['supply'] },
      streams: { ...heater({}).streams, steam2: ['more.outlet', 'u.steam2', { T: 520, m: 2 }] },
    } as const satisfies LayoutParts
    const { at: look } = solvedAnswerOf(two)
    expect(look('steam2.p')).toBe(shell)
    const flow =
      (heat - 8 * (cascaded - liquid) - 2 * (look('steam2.h') - liquid)) / (bled - liquid)
    expect(look('steam1.m') / flow).toBeCloseTo(1, 10)
    const answer = answerOf(changed(two, { set: { 'steam2.p': 1.6e6 } }))
    expect(answer.status).toBe('overspecified')
  })

  test('a drain from below the pressure of the shell cannot enter', () => {
    const answer = answerOf(changed(heater({}), { set: { 'drain1.p': 1.4e6, 'drain1.T': 460 } }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ quantities }) => quantities)).toContain('drain1.p')
  })
})

describe('with a drain cooler', () => {
  const cooled = heater({ drainApproach: 6 }, { drainCooler: true })
  const { at } = solvedAnswerOf(cooled)
  const heat = 120 * (steam({ p: outletPressure, T: Ts - 2.5 }).h - water)
  const drain = steam({ p: shell, T: 436 }).h
  const flow = (heat - 8 * (cascaded - drain)) / (bled - drain)
  const zone = (flow + 8) * (liquid - drain)
  const warmed = between(water + zone / 120)

  test('the drain leaves by the approach above the entering water', () => {
    expect(at('drain.T')).toBeCloseTo(436, 8)
    expect(at('drain.h') / drain).toBeCloseTo(1, 10)
    expect(at('steam1.m') / flow).toBeCloseTo(1, 10)
  })

  test('its zone cools the drain from saturation, in counterflow', () => {
    const conductance = zone / lmtd(Ts - warmed, 6)
    expect(at('u.drainConductance') / conductance).toBeCloseTo(1, 9)
  })

  test('the condensing zone takes over where the drain cooler ends', () => {
    const conductance = (heat - zone) / lmtd(Ts - warmed, 2.5)
    expect(at('u.conductance') / conductance).toBeCloseTo(1, 9)
  })

  test('its conductance given instead gives the approach back', () => {
    const turned = changed(cooled, {
      free: ['u.drainApproach'],
      set: { 'u.drainConductance': at('u.drainConductance') },
    })
    expect(solvedAnswerOf(turned).at('u.drainApproach')).toBeCloseTo(6, 7)
  })

  test('a drain that would have to leave above saturation cannot be', () => {
    const answer = answerOf(changed(cooled, { set: { 'water.T': Ts - 4 } }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ where }) => where)).toContain('u')
  })
})

describe('with a desuperheating zone', () => {
  const given = { residualSuperheat: 20, terminalDifference: -1 }
  const hot = heater(given, { desuperheater: true })
  const { at } = solvedAnswerOf(hot)
  const outlet = steam({ p: outletPressure, T: Ts + 1 }).h
  const heat = 120 * (outlet - water)
  const flow = (heat - 8 * (cascaded - liquid)) / (bled - liquid)
  const zone = flow * (bled - steam({ p: shell, T: Ts + 20 }).h)
  const before = between(outlet - zone / 120)

  test('the water may leave hotter than saturation', () => {
    expect(at('outlet.T')).toBeCloseTo(Ts + 1, 8)
    expect(at('steam1.m') / flow).toBeCloseTo(1, 10)
  })

  test('its zone cools the steam to the residual superheat, in counterflow', () => {
    const conductance = zone / lmtd(640 - (Ts + 1), Ts + 20 - before)
    expect(at('u.desuperheatConductance') / conductance).toBeCloseTo(1, 9)
  })

  test('the condensing zone ends where the desuperheating zone begins', () => {
    const conductance = (heat - zone) / lmtd(Ts - before, Ts - 430)
    expect(at('u.conductance') / conductance).toBeCloseTo(1, 9)
  })

  test('its conductance given instead gives the residual superheat back', () => {
    const turned = changed(hot, {
      free: ['u.residualSuperheat'],
      set: { 'u.desuperheatConductance': at('u.desuperheatConductance') },
    })
    expect(solvedAnswerOf(turned).at('u.residualSuperheat')).toBeCloseTo(20, 6)
  })

  test('drains do not enter its zone; two steams enter it mixed', () => {
    const two: LayoutParts = {
      ...hot,
      units: { ...hot.units, more: ['supply'] },
      streams: { ...hot.streams, steam2: ['more.outlet', 'u.steam2', { T: 560, m: 3 }] },
    }
    const { at: look } = solvedAnswerOf(two)
    const first = look('steam1.m')
    const mixed = (first * bled + 3 * steam({ p: shell, T: 560 }).h) / (first + 3)
    const taken = (first + 3) * (mixed - steam({ p: shell, T: Ts + 20 }).h)
    const start = between(outlet - taken / 120)
    const hotEnd = steam({ p: shell, h: mixed }).T - (Ts + 1)
    const conductance = taken / lmtd(hotEnd, Ts + 20 - start)
    expect(look('u.desuperheatConductance') / conductance).toBeCloseTo(1, 9)
  })
})

test('three zones share the duty, each with its own conductance', () => {
  const { at } = solvedAnswerOf(
    heater(
      { drainApproach: 6, residualSuperheat: 20, terminalDifference: 0 },
      { drainCooler: true, desuperheater: true },
    ),
  )
  const outlet = steam({ p: outletPressure, T: Ts }).h
  const drain = steam({ p: shell, T: 436 }).h
  const flow = (120 * (outlet - water) - 8 * (cascaded - drain)) / (bled - drain)
  const cooling = (flow + 8) * (liquid - drain)
  const desuperheating = flow * (bled - steam({ p: shell, T: Ts + 20 }).h)
  const [warmed, before] = [between(water + cooling / 120), between(outlet - desuperheating / 120)]
  const condensing = 120 * (outlet - water) - cooling - desuperheating
  expect(at('u.drainConductance') / (cooling / lmtd(Ts - warmed, 6))).toBeCloseTo(1, 9)
  expect(at('u.conductance') / (condensing / lmtd(Ts - before, Ts - warmed))).toBeCloseTo(1, 9)
  const last = desuperheating / lmtd(640 - Ts, Ts + 20 - before)
  expect(at('u.desuperheatConductance') / last).toBeCloseTo(1, 9)
})

describe('with plugged tubes', () => {
  const zones = { drainCooler: true, desuperheater: true }
  const approaches = { drainApproach: 6, residualSuperheat: 20, terminalDifference: 1 }
  const clean = solvedAnswerOf(heater(approaches, zones)).at
  const options = { ...zones, plugging: true }
  const names = ['conductance', 'drainConductance', 'desuperheatConductance'] as const

  test('the same approaches take a surface larger in proportion, in every zone', () => {
    const { at } = solvedAnswerOf(heater({ ...approaches, pluggedFraction: 0.1 }, options))
    for (const name of names) {
      expect((0.9 * at(`u.${name}`)) / clean(`u.${name}`), name).toBeCloseTo(1, 9)
    }
  })

  test('the same surface transfers less: the water leaves colder', () => {
    const surface = Object.fromEntries(names.map((name) => [`u.${name}`, clean(`u.${name}`)]))
    const { at } = solvedAnswerOf(
      changed(heater({ pluggedFraction: 0.1 }, options), {
        free: ['u.terminalDifference'],
        set: surface,
      }),
    )
    expect(at('u.terminalDifference')).toBeGreaterThan(1)
    expect(at('u.drainApproach')).toBeGreaterThan(6)
    expect(at('u.heat')).toBeLessThan(clean('u.heat'))
    const cooling = at('drain.m') * (liquid - at('drain.h'))
    const mean = lmtd(Ts - between(water + cooling / 120), at('drain.T') - 430)
    expect((0.9 * clean('u.drainConductance') * mean) / cooling).toBeCloseTo(1, 8)
  })
})

test('steam in the tubes: live steam condenses on the shell of a reheater', () => {
  const { at } = solvedAnswerOf(
    alone(
      ['surfaceHeater', { pressureLossFraction: 0.03, terminalDifference: 15 }],
      { water: { p: 1e6, x: 1, m: 300 }, steam1: { p: 6e6, x: 0.995 } },
      { outlet: {}, drain: {} },
    ),
  )
  const live = saturation(6e6)
  const reheated = steam({ p: 0.97e6, T: live.T - 15 }).h
  const wet = live.liquid + 0.995 * (live.dry - live.liquid)
  const flow = (300 * (reheated - saturation(1e6).dry)) / (wet - live.liquid)
  expect(at('outlet.h') / reheated).toBeCloseTo(1, 10)
  expect(at('steam1.m') / flow).toBeCloseTo(1, 9)
  const mean = lmtd(live.T - saturation(1e6).T, 15)
  expect((at('u.conductance') * mean) / at('u.heat')).toBeCloseTo(1, 9)
})

test.each([
  ['a flow of steam', 'steam1.m'],
  ['a conductance', 'u.conductance'],
])('%s of 0 leaves the water as it came, but for its pressure loss', (_, zero) => {
  const { at } = solvedAnswerOf(
    changed(
      alone(
        ['surfaceHeater', { pressureLossFraction: 0.02 }],
        { water: { p: 9e6, T: 430, m: 120 }, steam1: { p: shell, T: 640 } },
        { outlet: {}, drain: {} },
      ),
      { set: { [zero]: 0 } },
    ),
  )
  expect(at('outlet.h') / water).toBeCloseTo(1, 12)
  expect(at('steam1.m')).toBeCloseTo(0, 12)
  expect(at('u.conductance')).toBeCloseTo(0, 12)
  expect(at('u.heat')).toBeCloseTo(0, 12)
  expect(at('drain.h') / liquid).toBeCloseTo(1, 12)
})
