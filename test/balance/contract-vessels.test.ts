import { describe, expect, test } from 'vitest'
import { changed, type LayoutParts } from '../published/build-layout.ts'
import { simpleCycle } from '../published/cycles.ts'
import { alone, lmtd, saturation, steam } from './by-hand.ts'
import { answerOf, solvedAnswerOf } from './contract-answer.ts'

/*
 * Exchanger, leak, vessels, process steam and heat from outside against balances written out here
 * from the states that are given.
 */

describe('heat exchanger', () => {
  const parts = alone(
    ['heatExchanger', { hotLossFraction: 0.03, coldLossFraction: 0.01, coldEndDifference: 12 }],
    { hot: { p: 1e6, T: 440, m: 20 }, cold: { p: 2e6, T: 320, m: 35 } },
    { hotOutlet: {}, coldOutlet: {} },
  )
  const { at } = solvedAnswerOf(parts)
  const heat = 20 * (steam({ p: 1e6, T: 440 }).h - steam({ p: 0.97e6, T: 332 }).h)
  const warmed = steam({ p: 0.99 * 2e6, h: steam({ p: 2e6, T: 320 }).h + heat / 35 }).T

  test('what the hot stream gives the cold one takes; both lose pressure', () => {
    expect(at('hotOutlet.p') / 0.97e6).toBeCloseTo(1, 12)
    expect(at('coldOutlet.p') / (0.99 * 2e6)).toBeCloseTo(1, 12)
    expect(at('hotOutlet.T')).toBeCloseTo(332, 8)
    expect(at('u.heat') / heat).toBeCloseTo(1, 10)
    expect(at('coldOutlet.T')).toBeCloseTo(warmed, 7)
  })

  test('counterflow: the differences lie at its ends, heat = conductance LMTD', () => {
    expect(at('u.hotEndDifference')).toBeCloseTo(440 - warmed, 7)
    expect(at('u.conductance') / (heat / lmtd(440 - warmed, 12))).toBeCloseTo(1, 9)
  })

  test.each(['conductance', 'heat', 'hotEndDifference'])(
    'its %s given gives the rest back',
    (name) => {
      const turned = changed(parts, {
        free: ['u.coldEndDifference'],
        set: { [`u.${name}`]: at(`u.${name}`) },
      })
      expect(solvedAnswerOf(turned).at('u.coldEndDifference')).toBeCloseTo(12, 6)
    },
  )

  test('equal differences at both ends are the mean', () => {
    const even = solvedAnswerOf(
      changed(parts, { free: ['cold.m'], set: { 'u.hotEndDifference': 12 } }),
    ).at
    expect(even('cold.m')).toBeLessThan(35)
    expect((even('u.conductance') * 12) / even('u.heat')).toBeCloseTo(1, 9)
  })

  test('a hot stream that leaves colder than the cold one enters cannot be', () => {
    const answer = answerOf(changed(parts, { set: { 'u.coldEndDifference': -3 } }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ where }) => where)).toContain('u')
  })
})

describe('leak', () => {
  const parts = alone(['leak'], { inlet: { p: 3e6, T: 700, m: 0.6 } }, { outlet: { p: 4e5 } })
  const { h, v } = steam({ p: 3e6, T: 700 })
  const ellipse = Math.sqrt(3e6 / v) * Math.sqrt(1 - (4e5 / 3e6) ** 2)

  test('flow = flowConstant sqrt(p/v) sqrt(1 - (p_out/p_in)²), at constant enthalpy', () => {
    const { at } = solvedAnswerOf(parts)
    expect((at('u.flowConstant') * ellipse) / 0.6).toBeCloseTo(1, 10)
    expect(at('outlet.h') / h).toBeCloseTo(1, 12)
    expect(at('outlet.m')).toBe(0.6)
  })

  test('its flow constant given gives the flow', () => {
    const { at } = solvedAnswerOf(
      changed(parts, { free: ['inlet.m'], set: { 'u.flowConstant': 2e-4 } }),
    )
    expect(at('inlet.m') / (2e-4 * ellipse)).toBeCloseTo(1, 10)
  })

  test('from the lower to the higher pressure nothing leaks', () => {
    const answer = answerOf(changed(parts, { set: { 'outlet.p': 3.2e6 } }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ where }) => where)).toContain('u')
  })
})

describe('flash vessel', () => {
  const parts = alone(
    ['flashVessel', { pressure: 3e5 }],
    { inlet1: { p: 9e6, x: 0, m: 2 }, inlet2: { p: 1e6, T: 440, m: 5 } },
    { steam: {}, water: {} },
  )
  const { liquid, dry } = saturation(3e5)

  test('dry saturated steam and saturated liquid leave, in the parts that the energy asks', () => {
    const { at } = solvedAnswerOf(parts)
    const entering = 2 * saturation(9e6).liquid + 5 * steam({ p: 1e6, T: 440 }).h
    const flashed = (entering - 7 * liquid) / (dry - liquid)
    expect(at('steam.m') / flashed).toBeCloseTo(1, 9)
    expect(at('water.m') / (7 - flashed)).toBeCloseTo(1, 9)
    expect(at('steam.h') / dry).toBeCloseTo(1, 12)
    expect(at('water.h') / liquid).toBeCloseTo(1, 12)
    for (const port of ['steam', 'water']) expect(at(`${port}.p`)).toBe(3e5)
  })

  test('a flow of flash steam wanted gives the pressure', () => {
    const { at } = solvedAnswerOf(changed(parts, { free: ['u.pressure'], set: { 'steam.m': 0.7 } }))
    const found = saturation(at('u.pressure'))
    const entering = 2 * saturation(9e6).liquid + 5 * steam({ p: 1e6, T: 440 }).h
    expect((entering - 7 * found.liquid) / (found.dry - found.liquid)).toBeCloseTo(0.7, 8)
  })

  test.each([
    ['from below its pressure nothing enters', { 'inlet2.p': 2.5e5, 'inlet2.T': 390 }, 'inlet2.p'],
    ['water too cold to flash would take steam', { 'inlet1.m': 0.1, 'inlet2.T': 350 }, 'steam.m'],
  ])('%s', (_, set, named) => {
    const answer = answerOf(changed(parts, { set }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ quantities }) => quantities)).toContain(named)
  })
})

describe('desuperheater', () => {
  const parts = alone(
    ['desuperheater'],
    { steam: { p: 2e6, T: 680, m: 40 }, spray: { p: 6e6, T: 410 } },
    { outlet: { T: 520 } },
  )
  const h = { steam: steam({ p: 2e6, T: 680 }).h, spray: steam({ p: 6e6, T: 410 }).h }

  test('the temperature behind it given, the spray flow follows', () => {
    const { at } = solvedAnswerOf(parts)
    const behind = steam({ p: 2e6, T: 520 }).h
    expect(at('outlet.p')).toBe(2e6)
    expect(at('spray.p')).toBe(6e6)
    expect(at('spray.m') / ((40 * (h.steam - behind)) / (behind - h.spray))).toBeCloseTo(1, 9)
    expect(at('outlet.m') - at('spray.m')).toBeCloseTo(40, 10)
  })

  test('the spray flow given, the temperature follows', () => {
    const { at } = solvedAnswerOf(changed(parts, { free: ['outlet.T'], set: { 'spray.m': 2 } }))
    const mixed = (40 * h.steam + 2 * h.spray) / 42
    expect(at('outlet.T')).toBeCloseTo(steam({ p: 2e6, h: mixed }).T, 7)
  })

  test.each([
    ['spray from below the pressure of the steam', { 'spray.p': 1.9e6 }, 'spray.p'],
    ['steam that should leave hotter than it came', { 'outlet.T': 690 }, 'spray.m'],
  ])('%s cannot be', (_, set, named) => {
    const answer = answerOf(changed(parts, { set }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ quantities }) => quantities)).toContain(named)
  })
})

describe('separator', () => {
  const parts = alone(
    ['separator', { effectiveness: 0.95, pressureLossFraction: 0.04 }],
    { inlet: { p: 8e5, x: 0.87, m: 200 } },
    { steam: {}, drain: {} },
  )
  const p = 0.96 * 8e5
  const { liquid, dry } = saturation(p)
  const before = saturation(8e5)
  const entering = before.liquid + 0.87 * (before.dry - before.liquid)
  /** Of what enters, at the outlet pressure. */
  const moisture = (dry - entering) / (dry - liquid)

  test('its part of the moisture, as it is at the outlet pressure, leaves as saturated liquid', () => {
    const { at } = solvedAnswerOf(parts)
    const drained = 0.95 * moisture * 200
    expect(at('drain.m') / drained).toBeCloseTo(1, 10)
    expect(at('drain.h') / liquid).toBeCloseTo(1, 12)
    for (const port of ['steam', 'drain']) expect(at(`${port}.p`) / p).toBeCloseTo(1, 12)
    const rest = (200 * entering - drained * liquid) / (200 - drained)
    expect(at('steam.h') / rest).toBeCloseTo(1, 10)
    // What moisture is left: the part that stays, over what goes on.
    expect(1 - at('steam.x')).toBeCloseTo((0.05 * moisture * 200) / (200 - drained), 9)
  })

  test('one that takes all leaves dry saturated steam, one that takes none leaves it as it was', () => {
    const all = solvedAnswerOf(changed(parts, { set: { 'u.effectiveness': 1 } })).at
    expect(all('steam.h') / dry).toBeCloseTo(1, 10)
    const none = solvedAnswerOf(changed(parts, { set: { 'u.effectiveness': 0 } })).at
    expect(none('drain.m')).toBe(0)
    expect(none('steam.h') / entering).toBeCloseTo(1, 12)
  })

  test('dry steam passes, and nothing is drained', () => {
    const { at } = solvedAnswerOf(
      changed(parts, { free: ['inlet.x'], set: { 'inlet.superheat': 30 } }),
    )
    expect(at('drain.m')).toBe(0)
    expect(at('steam.h')).toBeCloseTo(at('inlet.h'), 6)
  })

  test('an effectiveness above 1 cannot be', () => {
    const answer = answerOf(changed(parts, { set: { 'u.effectiveness': 1.02 } }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ quantities }) => quantities)).toContain('u.effectiveness')
  })
})

describe('heat user', () => {
  const parts = alone(
    ['heatUser', { returnFraction: 0.7 }],
    { steam: { p: 6e5, T: 460, m: 12 } },
    { condensate: { p: 2e5, T: 360 } },
  )
  const drop = steam({ p: 6e5, T: 460 }).h - steam({ p: 2e5, T: 360 }).h

  test('all its steam gives heat down to the condensate’s state; a part of it comes back', () => {
    const { at } = solvedAnswerOf(parts)
    expect(at('condensate.m')).toBeCloseTo(0.7 * 12, 12)
    expect(at('u.heat') / (12 * drop)).toBeCloseTo(1, 10)
    expect(at('plant.processHeat')).toBe(at('u.heat'))
  })

  test('the heat wanted gives the steam flow', () => {
    const { at } = solvedAnswerOf(changed(parts, { free: ['steam.m'], set: { 'u.heat': 2e7 } }))
    expect(at('steam.m') / (2e7 / drop)).toBeCloseTo(1, 10)
  })

  test('all of it returned keeps the circuit closed; of a part the rest is made up', () => {
    const cycle = simpleCycle({ main: { p: 6e6, T: 723.15, m: 40 }, condenser: 7e3 })
    const heating = (returnFraction: number, makeUp: boolean): LayoutParts => ({
      ...cycle,
      units: {
        ...cycle.units,
        t: [
          'turbine',
          { groupEfficiency1: 0.85, groupEfficiency2: 0.85, wetnessFactor: 0, exhaustLoss: 0 },
        ],
        u: ['heatUser', { returnFraction }],
        ...(makeUp && { tank: ['supply'] as const }),
      },
      streams: {
        ...cycle.streams,
        toUser: ['t.bleed1', 'u.steam', { p: 4e5, m: 6 }],
        back: ['u.condensate', 'c.drain1', { p: 2e5, T: 360 }],
        ...(makeUp && { makeUp: ['tank.outlet', 'c.drain2', { p: 2e5, T: 288 }] as const }),
      },
    })
    const { at: closed } = solvedAnswerOf(heating(1, false))
    expect(closed('back.m')).toBeCloseTo(6, 12)
    expect(closed('condensate.m')).toBeCloseTo(40, 9)
    expect(solvedAnswerOf(heating(0.7, true)).at('makeUp.m')).toBeCloseTo(1.8, 9)
  })
})

describe('heat source', () => {
  const cycle = simpleCycle({ main: { p: 6e6, T: 723.15, m: 40 }, condenser: 7e3 })
  const parts: LayoutParts = {
    ...cycle,
    units: { ...cycle.units, u: ['heatSource', { pressureLossFraction: 0.02, heat: 4e6 }] },
    streams: {
      ...cycle.streams,
      feed: ['p.discharge', 'u.inlet'],
      warmed: ['u.outlet', 'b.feedwater'],
    },
  }
  const { at } = solvedAnswerOf(parts)
  const plain = solvedAnswerOf(cycle).at

  test('its heat warms the stream, with pressure loss and loss law', () => {
    expect(at('warmed.h') - at('feed.h')).toBeCloseTo(4e6 / 40, 6)
    expect(at('warmed.p') / at('feed.p')).toBeCloseTo(0.98, 12)
    const loss = at('u.lossConstant') * 40 ** 2 * at('feed.v')
    expect(loss / (at('feed.p') - at('warmed.p'))).toBeCloseTo(1, 10)
  })

  test('it is recovered heat, and no part of heat input or fuel heat', () => {
    expect(at('plant.recoveredHeat')).toBe(4e6)
    expect(plain('plant.recoveredHeat')).toBe(0)
    expect(at('plant.heatInput') / (40 * (at('main.h') - at('warmed.h')))).toBeCloseTo(1, 12)
    // With a boiler that loses nothing, fuel heat is what the boiler alone gives.
    expect(at('plant.fuelHeat')).toBe(at('b.heat'))
    expect(plain('b.heat') - at('b.heat')).toBeCloseTo(4e6 + (at('p.power') - plain('p.power')), 2)
  })
})

test('condenser: cooling water and conductance given, the pressure follows', () => {
  const given = {
    'c.coolingInletT': 288,
    'c.coolingFlow': 2400,
    'c.coolingHeatCapacity': 4180,
    'c.conductance': 6e6,
  }
  const cycle = simpleCycle({ main: { p: 6e6, T: 723.15, m: 40 }, condenser: 7e3, turbine: 0.85 })
  const { at } = solvedAnswerOf(changed(cycle, { free: ['c.pressure'], set: given }))
  // Ts = T1 + Q/(m c (1 - exp(-UA/(m c)))), the effectiveness form of heat = conductance LMTD.
  const capacity = 2400 * 4180
  const Ts = 288 + at('c.heat') / (capacity * (1 - Math.exp(-6e6 / capacity)))
  expect(saturation(at('c.pressure')).T).toBeCloseTo(Ts, 7)
  expect(at('c.coolingRise')).toBeCloseTo(at('c.heat') / capacity, 9)
  expect(at('exhaust.p')).toBe(at('c.pressure'))
})

describe('where nothing is to be done', () => {
  const exchanger = (name: string) =>
    alone(
      ['heatExchanger', { hotLossFraction: 0.03, coldLossFraction: 0.01, [name]: 0 }],
      { hot: { p: 1e6, T: 440, m: 20 }, cold: { p: 2e6, T: 320, m: 35 } },
      { hotOutlet: {}, coldOutlet: {} },
    )

  test.each(['heat', 'conductance'])(
    'an exchanger with a %s of 0 passes both streams on',
    (name) => {
      const { at } = solvedAnswerOf(exchanger(name))
      expect(at('u.heat')).toBe(0)
      expect(at('u.conductance')).toBe(0)
      for (const side of ['hot', 'cold']) expect(at(`${side}Outlet.h`)).toBe(at(`${side}.h`))
    },
  )

  test('a desuperheater without spray passes the steam on, and one that need not cool takes none', () => {
    const streams = { steam: { p: 2e6, T: 680, m: 40 }, spray: { p: 6e6, T: 410 } }
    const dry = { ...streams, spray: { ...streams.spray, m: 0 } }
    expect(
      solvedAnswerOf(alone(['desuperheater'], dry, { outlet: {} })).at('outlet.T'),
    ).toBeCloseTo(680, 8)
    const same = alone(['desuperheater'], streams, { outlet: { T: 680 } })
    expect(solvedAnswerOf(same).at('spray.m')).toBeCloseTo(0, 8)
  })

  test('a vessel into which water comes saturated at its pressure flashes nothing', () => {
    const { at } = solvedAnswerOf(
      alone(
        ['flashVessel', { pressure: 1e6 }],
        { inlet1: { p: 1e6, x: 0, m: 2 } },
        { steam: {}, water: {} },
      ),
    )
    expect(at('steam.m')).toBeCloseTo(0, 10)
    expect(at('water.m')).toBeCloseTo(2, 10)
  })

  test('a tight gland lets nothing through, and what it does not let through keeps its enthalpy', () => {
    const { at } = solvedAnswerOf({
      units: {
        from: ['supply'],
        br: ['branch'],
        u: ['leak', { flowConstant: 0 }],
        to: ['offtake'],
        lost: ['offtake'],
      },
      streams: {
        all: ['from.outlet', 'br.inlet', { p: 1e6, T: 500, m: 10 }],
        on: ['br.outlet1', 'to.inlet'],
        past: ['br.outlet2', 'u.inlet'],
        out: ['u.outlet', 'lost.inlet', { p: 1e5 }],
      },
    })
    expect(at('out.m')).toBe(0)
    expect(at('out.h')).toBe(at('all.h'))
    expect(at('on.m')).toBe(10)
  })
})

describe('spray', () => {
  const fired = { pressureLossFraction: 0.05, efficiency: 0.9 }
  const boiler = (pressure: number) =>
    alone(
      ['boiler', fired],
      { feedwater: { p: 13e6, T: 500 }, spray: { p: pressure, T: 450, m: 3 } },
      { steam: { T: 813, m: 100 } },
    )
  const reheater = (pressure: number) =>
    alone(
      ['reheater', fired],
      { inlet: { p: 3e6, T: 600, m: 80 }, spray: { p: pressure, T: 400, m: 1 } },
      { outlet: { T: 813 } },
    )

  test.each([
    ['boiler', boiler, 0.95 * 13e6],
    ['reheater', reheater, 0.95 * 3e6],
  ] as const)('of a %s arrives at no less than the pressure of the steam', (_, unit, least) => {
    expect(solvedAnswerOf(unit(least)).at('spray.p')).toBe(least)
    const answer = answerOf(unit(0.99 * least))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ quantities }) => quantities)).toContain('spray.p')
  })
})
