import { describe, expect, test } from 'vitest'
import { type StatePair, type SteamState, state } from '../../src/steam/index.ts'
import { changed, type LayoutParts } from '../published/build-layout.ts'
import { answerOf, solvedAnswerOf } from './contract-answer.ts'

/* Turbines against expansions evaluated here, group by group, from states alone. */

function steam(pair: StatePair): SteamState {
  const found = state(pair)
  if (found.outcome !== 'state') throw new Error(found.outcome)
  return found
}

/** Halves the interval until the function's change of sign is found to the last digit. */
function root(f: (x: number) => number, low: number, high: number): number {
  let [a, b] = [low, high]
  const below = f(a) < 0
  for (let k = 0; k < 200; k++) {
    const middle = (a + b) / 2
    if (f(middle) < 0 === below) a = middle
    else b = middle
  }
  return (a + b) / 2
}

interface PressureAndEnthalpy {
  readonly p: number
  readonly h: number
}

const moisture = ({ p, h }: PressureAndEnthalpy): number => {
  const { x } = steam({ p, h })
  return x === null ? 0 : 1 - x
}

/** End enthalpy of a group by the contract's words: Baumann on the wet part only. */
function endOf(start: PressureAndEnthalpy, p: number, efficiency: number, factor: number): number {
  const { s, x } = steam(start)
  const isentropic = steam({ p, s })
  const drop = start.h - isentropic.h
  let wet = 0
  if (x !== null) wet = 1
  else if (isentropic.x !== null) {
    // Dry saturated steam of the entropy at the start.
    const T = root((T) => steam({ T, x: 1 }).s - s, 290, 610)
    wet = (steam({ T, x: 1 }).h - isentropic.h) / drop
  }
  const missed = (h: number): number => {
    const mean = (moisture(start) + moisture({ p, h })) / 2
    return h - start.h + efficiency * (1 - factor * wet * mean) * drop
  }
  return root(missed, isentropic.h, start.h)
}

/** Steam from outside through a turbine with as many bleeds as there are pressures between. */
function expansion(
  inlet: Readonly<Record<string, number>>,
  pressures: readonly number[],
  turbine: Readonly<Record<string, number>>,
  bleeds: readonly number[] = [],
  options: Readonly<Record<string, boolean>> = {},
): LayoutParts {
  const units: Record<string, LayoutParts['units'][string]> = {
    in: ['supply'],
    t: ['turbine', { exhaustLoss: 0, wetnessFactor: 1, ...turbine }, options],
    out: ['offtake'],
  }
  const streams: Record<string, LayoutParts['streams'][string]> = {
    main: ['in.outlet', 't.inlet', { m: 50, ...inlet }],
    exhaust: ['t.exhaust', 'out.inlet', { p: pressures.at(-1)! }],
  }
  bleeds.forEach((m, k) => {
    units[`off${k + 1}`] = ['offtake']
    streams[`bleed${k + 1}`] = [`t.bleed${k + 1}`, `off${k + 1}.inlet`, { p: pressures[k]!, m }]
  })
  return { units, streams, shafts: { s: { turbines: ['t'] } } }
}

describe('wetness factor on the wet part of the isentropic drop', () => {
  test.each([
    ['superheated to wet', { p: 3e6, T: 673.15 }, 7e3, 1],
    ['superheated to wet, factor 0.7', { p: 3e6, T: 673.15 }, 7e3, 0.7],
    ['superheated to dry: no effect', { p: 12e6, T: 813.15 }, 3e6, 1],
    ['ends dry though its isentrope ends wet', { p: 1e6, T: 483.15 }, 5e5, 1],
    ['dry saturated inlet: all of it', { p: 6e6, x: 1 }, 1e5, 1],
    ['wet inlet: all of it, and its moisture counts', { p: 1e6, x: 0.94 }, 2e4, 1],
    ['without the factor', { p: 6e6, x: 1 }, 1e5, 0],
    ['from above the critical pressure', { p: 25e6, T: 843.15 }, 5e3, 1],
  ] as const)('%s', (_, inlet, end, wetnessFactor) => {
    const { at } = solvedAnswerOf(
      expansion(inlet, [end], { groupEfficiency1: 0.85, wetnessFactor }),
    )
    const start = { p: at('main.p'), h: at('main.h') }
    expect(at('exhaust.h') / endOf(start, end, 0.85, wetnessFactor)).toBeCloseTo(1, 9)
  })

  test('no dry saturated steam has the entropy where it is needed: no answer', () => {
    // Dense supercritical steam whose isentrope meets the dome on its liquid side.
    const answer = answerOf(expansion({ p: 30e6, T: 648.15 }, [5e5], { groupEfficiency1: 0.85 }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ where }) => where)).toContain('t')
  })
})

describe('stage groups', () => {
  const pressures = [2e6, 4e5, 6e3]
  const efficiencies = [0.86, 0.89, 0.84]
  const parts = expansion(
    { p: 8e6, T: 773.15 },
    pressures,
    { groupEfficiency1: 0.86, groupEfficiency2: 0.89, groupEfficiency3: 0.84, exhaustArea: 6 },
    [5, 3],
  )
  const { at } = solvedAnswerOf(parts)
  const ends = ['bleed1', 'bleed2', 'exhaust']

  test('each starts from the end state of the one before', () => {
    let start = { p: at('main.p'), h: at('main.h') }
    ends.forEach((stream, k) => {
      const h = endOf(start, pressures[k]!, efficiencies[k]!, 1)
      expect(at(`${stream}.h`) / h).toBeCloseTo(1, 9)
      start = { p: pressures[k]!, h: at(`${stream}.h`) }
    })
  })

  test('what is bled goes no further; power = inlet m h - sum of outlets m h', () => {
    expect(at('exhaust.m')).toBeCloseTo(42, 12)
    const power = 50 * at('main.h') - 5 * at('bleed1.h') - 3 * at('bleed2.h') - 42 * at('exhaust.h')
    expect(at('t.power') / power).toBeCloseTo(1, 12)
  })

  test('flow law of each: the flow through it, p and v where it starts', () => {
    const flows = [50, 45, 42]
    ;['main', 'bleed1', 'bleed2'].forEach((stream, k) => {
      const p = at(`${stream}.p`)
      const ellipse = Math.sqrt((p / at(`${stream}.v`)) * (1 - (pressures[k]! / p) ** 2))
      expect((at(`t.flowConstant${k + 1}`) * ellipse) / flows[k]!).toBeCloseTo(1, 12)
    })
  })

  test('its flow constants given instead of its pressures give the pressures back', () => {
    const constants = Object.fromEntries(
      [1, 2, 3].map((k) => [`t.flowConstant${k}`, at(`t.flowConstant${k}`)]),
    )
    const frozen = changed(parts, { free: ['main.p', 'bleed1.p', 'bleed2.p'], set: constants })
    const same = solvedAnswerOf(frozen).at
    expect(same('main.p') / 8e6).toBeCloseTo(1, 9)
    expect(same('bleed1.p') / 2e6).toBeCloseTo(1, 9)
    // At half the flows pressures go down nearly in proportion (Stodola).
    const half = solvedAnswerOf(
      changed(frozen, { set: { 'main.m': 25, 'bleed1.m': 2.5, 'bleed2.m': 1.5 } }),
    ).at
    expect(half('bleed1.p') / 1e6).toBeCloseTo(1, 1)
    expect(half('t.flowConstant2')).toBe(at('t.flowConstant2'))
  })

  test('exhaust: volume flow and velocity before the loss, which the exhaust keeps', () => {
    const lossy = solvedAnswerOf(changed(parts, { set: { 't.exhaustLoss': 22e3 } })).at
    expect(lossy('exhaust.h') - at('exhaust.h')).toBeCloseTo(22e3, 4)
    const volume = 42 * at('exhaust.v')
    for (const look of [at, lossy]) {
      expect(look('t.exhaustVolumeFlow') / volume).toBeCloseTo(1, 10)
      expect(look('t.exhaustVelocity') / (volume / 6)).toBeCloseTo(1, 10)
    }
    expect(at('t.power') - lossy('t.power')).toBeCloseTo(42 * 22e3, 2)
  })

  test('bleed pressures that rise along the expansion cannot be', () => {
    const answer = answerOf(changed(parts, { set: { 'bleed2.p': 3e6 } }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ where }) => where)).toContain('t')
  })
})

describe('with options.admission', () => {
  const parts = expansion(
    { p: 12e6, T: 813.15 },
    [3e6, 5e4],
    {
      groupEfficiency1: 0.88,
      groupEfficiency2: 0.88,
      admissionLossFraction: 0.04,
      admissionEfficiency: 0,
    },
    [4],
    { admission: true },
  )

  test('an efficiency of 0 throttles: group 1 starts at constant enthalpy from p_in (1 - fraction)', () => {
    const { at } = solvedAnswerOf(parts)
    const start = { p: 0.96 * 12e6, h: at('main.h') }
    expect(at('bleed1.h') / endOf(start, 3e6, 0.88, 1)).toBeCloseTo(1, 9)
    const { v } = steam(start)
    const ellipse = Math.sqrt((start.p / v) * (1 - (3e6 / start.p) ** 2))
    expect((at('t.flowConstant1') * ellipse) / 50).toBeCloseTo(1, 9)
  })

  test('a control stage takes its part of the drop', () => {
    const { at } = solvedAnswerOf(
      changed(parts, { set: { 't.admissionEfficiency': 0.6, 't.admissionLossFraction': 0.3 } }),
    )
    const p = 0.7 * 12e6
    const isentropic = steam({ p, s: at('main.s') }).h
    const start = { p, h: at('main.h') - 0.6 * (at('main.h') - isentropic) }
    expect(at('bleed1.h') / endOf(start, 3e6, 0.88, 1)).toBeCloseTo(1, 9)
  })

  test('without the option there is no such quantity', () => {
    const plain = solvedAnswerOf(
      expansion({ p: 12e6, T: 813.15 }, [5e4], { groupEfficiency1: 0.88 }),
    )
    expect(Object.keys(plain.units.t!)).not.toContain('admissionEfficiency')
    expect(() =>
      answerOf(
        expansion({ p: 12e6, T: 813.15 }, [5e4], {
          groupEfficiency1: 0.88,
          admissionEfficiency: 0,
        }),
      ),
    ).toThrow(/admissionEfficiency/)
  })
})

describe('with options.moistureRemoval', () => {
  const parts = expansion(
    { p: 6e6, x: 0.998 },
    [1e6, 1e4],
    { groupEfficiency1: 0.82, groupEfficiency2: 0.82, moistureRemoval1: 0.3 },
    [6],
    { moistureRemoval: true },
  )

  test('a part of the water leaves with the bleed, the rest shares the remaining steam’s state', () => {
    const { at } = solvedAnswerOf(parts)
    const end = endOf({ p: 6e6, h: at('main.h') }, 1e6, 0.82, 1)
    const water = steam({ p: 1e6, x: 0 }).h
    const removed = 0.3 * moisture({ p: 1e6, h: end }) * 50
    const rest = (50 * end - removed * water) / (50 - removed)
    const bled = (removed * water + (6 - removed) * rest) / 6
    expect(at('bleed1.h') / bled).toBeCloseTo(1, 9)
    expect(at('exhaust.h') / endOf({ p: 1e6, h: rest }, 1e4, 0.82, 1)).toBeCloseTo(1, 9)
  })

  test('none removed is a plain bleed', () => {
    const { at } = solvedAnswerOf(changed(parts, { set: { 't.moistureRemoval1': 0 } }))
    const end = endOf({ p: 6e6, h: at('main.h') }, 1e6, 0.82, 1)
    expect(at('bleed1.h') / end).toBeCloseTo(1, 9)
  })

  test('more water than the bleed’s flow cannot be', () => {
    const answer = answerOf(changed(parts, { set: { 't.moistureRemoval1': 1, 'bleed1.m': 2 } }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ where }) => where)).toContain('t')
  })

  test('a bleed without flow leaves from a dry group at that group’s end state', () => {
    const dry = expansion(
      { p: 6e6, T: 773.15 },
      [2e6, 1e5],
      { groupEfficiency1: 0.85, groupEfficiency2: 0.85, moistureRemoval1: 0.3 },
      [0],
      { moistureRemoval: true },
    )
    const { at } = solvedAnswerOf(dry)
    const end = endOf({ p: 6e6, h: at('main.h') }, 2e6, 0.85, 1)
    expect(at('bleed1.h') / end).toBeCloseTo(1, 9)
  })
})
