import { describe, expect, test } from 'vitest'
import { state } from '../../src/steam/index.ts'
import { changed, type LayoutParts } from '../published/build-layout.ts'
import { simpleCycle } from '../published/cycles.ts'
import { answerOf, solvedAnswerOf } from './contract-answer.ts'

const losses = {
  mechanicalEfficiency: 0.99,
  mechanicalLoss: 1.2e5,
  generatorEfficiency: 0.98,
  generatorLoss: 8e4,
}
const plain = simpleCycle({
  main: { p: 6e6, T: 723.15, m: 40 },
  condenser: 7e3,
  turbine: 0.85,
  pump: 0.75,
})
const cycle: LayoutParts = changed(
  { ...plain, shafts: { s: { turbines: ['t'], given: losses } } },
  { set: { 'p.driveEfficiency': 0.94, 'p.suctionHeight': 6, 'plant.otherAuxiliary': 3e5 } },
)

describe('pump', () => {
  const { at } = solvedAnswerOf(changed(cycle, { set: { 'c.subcooling': 1 } }))

  test('h_out = h_in + (h(p_out, s_in) - h_in)/efficiency', () => {
    const isentropic = state({ p: at('feed.p'), s: at('condensate.s') })
    if (isentropic.outcome !== 'state') throw new Error('no state')
    const rise = (isentropic.h - at('condensate.h')) / 0.75
    expect((at('feed.h') - at('condensate.h')) / rise).toBeCloseTo(1, 6)
    expect(at('p.power') / (40 * rise)).toBeCloseTo(1, 6)
  })

  test('pressure rise and volume flow at the suction', () => {
    expect(at('p.pressureRise')).toBeCloseTo(6e6 - 7e3, 6)
    expect(at('p.volumeFlow') / (40 * at('condensate.v'))).toBeCloseTo(1, 12)
  })

  test('electric power = power/driveEfficiency', () => {
    expect(at('p.electricPower') / (at('p.power') / 0.94)).toBeCloseTo(1, 12)
  })

  test('suction head available = height + (p - psat(T)) v/g', () => {
    const psat = state({ T: at('condensate.T'), x: 0 })
    if (psat.outcome !== 'state') throw new Error('no state')
    const head = 6 + ((7e3 - psat.p) * at('condensate.v')) / 9.80665
    expect(at('p.npshAvailable')).toBeCloseTo(head, 9)
    expect(head).toBeGreaterThan(6)
  })
})

describe('shaft with a generator', () => {
  test('input, generator power, and the plant’s powers and heat rates', () => {
    const { at } = solvedAnswerOf(changed(cycle, { set: { 'b.efficiency': 0.9 } }))
    const input = 0.99 * at('t.power') - 1.2e5
    const generator = 0.98 * input - 8e4
    expect(at('s.generatorInput') / input).toBeCloseTo(1, 12)
    expect(at('s.generatorPower') / generator).toBeCloseTo(1, 12)
    expect(at('plant.grossPower') / generator).toBeCloseTo(1, 12)
    const auxiliary = at('p.electricPower') + 3e5
    const net = generator - auxiliary
    expect(at('plant.auxiliaryPower') / auxiliary).toBeCloseTo(1, 12)
    expect(at('plant.netPower') / net).toBeCloseTo(1, 12)
    const cyclePower = at('t.power') - at('p.power')
    const heat = at('b.heat')
    const wanted = {
      turbinePower: at('t.power'),
      pumpPower: at('p.power'),
      cyclePower,
      cycleEfficiency: cyclePower / heat,
      grossTurbineHeatRate: heat / generator,
      netTurbineHeatRate: heat / (generator - at('p.electricPower')),
      unitHeatRate: heat / 0.9 / net,
      unitEfficiency: (net * 0.9) / heat,
      backWorkRatio: at('p.power') / at('t.power'),
      steamRate: 40 / net,
    }
    for (const [name, value] of Object.entries(wanted)) {
      expect([name, at(`plant.${name}`) / value]).toEqual([name, expect.closeTo(1, 12)])
    }
    expect(at('plant.recoveredHeat')).toBe(0)
    expect(at('plant.processHeat')).toBe(0)
  })

  test('a pump on it takes its power mechanically, and draws none of the grid', () => {
    const answer = solvedAnswerOf({
      ...cycle,
      shafts: { s: { turbines: ['t'], pumps: ['p'], given: losses } },
    })
    const { at } = answer
    expect(at('p.electricPower')).toBe(0)
    const input = 0.99 * at('t.power') - 1.2e5 - at('p.power')
    expect(at('s.generatorInput') / input).toBeCloseTo(1, 12)
    expect(at('plant.auxiliaryPower')).toBeCloseTo(3e5, 6)
    const remarks = answer.findings.filter(({ severity }) => severity === 'remark')
    expect(remarks.flatMap(({ quantities }) => quantities)).toContain('p.driveEfficiency')
  })

  test('a drive efficiency of a pump on no shaft is not remarked', () => {
    const { findings } = solvedAnswerOf(cycle)
    expect(findings.filter(({ severity }) => severity === 'remark')).toEqual([])
  })
})

describe('shaft without a generator', () => {
  /** A small turbine, fed from the main steam, drives the feed pump and exhausts to the condenser. */
  const driven: LayoutParts = {
    ...cycle,
    units: {
      ...cycle.units,
      br: ['branch'],
      drive: ['turbine', { groupEfficiency1: 0.7, wetnessFactor: 0.8, exhaustLoss: 0 }],
    },
    streams: {
      main: ['b.steam', 'br.inlet', { p: 6e6, T: 723.15, m: 40 }],
      admitted: ['br.outlet1', 't.inlet'],
      motive: ['br.outlet2', 'drive.inlet'],
      exhaust: ['t.exhaust', 'c.steam1'],
      spent: ['drive.exhaust', 'c.steam2'],
      condensate: ['c.condensate', 'p.suction'],
      feed: ['p.discharge', 'b.feedwater'],
    },
    shafts: {
      s: { turbines: ['t'], given: losses },
      fp: {
        turbines: ['drive'],
        pumps: ['p'],
        generator: false,
        given: { mechanicalEfficiency: 0.98, mechanicalLoss: 5e3 },
      },
    },
  }
  const answer = solvedAnswerOf(driven)
  const { at } = answer

  test('fixes a flow: the small turbine takes just the steam that the pump needs', () => {
    expect((0.98 * at('drive.power') - 5e3) / at('p.power')).toBeCloseTo(1, 10)
    expect(at('motive.m')).toBeGreaterThan(0.1)
    expect(at('motive.m')).toBeLessThan(2)
    expect(at('admitted.m') + at('motive.m')).toBeCloseTo(40, 10)
    const drop = at('motive.h') - at('spent.h')
    expect(at('motive.m') / ((at('p.power') + 5e3) / 0.98 / drop)).toBeCloseTo(1, 10)
  })

  test('has no generator quantities, and adds nothing to the gross power', () => {
    expect(Object.keys(answer.shafts.fp!).sort()).toEqual(
      ['exergyDestroyed', 'mechanicalEfficiency', 'mechanicalLoss'].sort(),
    )
    expect(at('plant.grossPower')).toBe(at('s.generatorPower'))
    expect(at('plant.turbinePower') / (at('t.power') + at('drive.power'))).toBeCloseTo(1, 12)
  })

  test('the flow given as well is one number too many', () => {
    const twice = answerOf(changed(driven, { set: { 'motive.m': 0.6 } }))
    expect(twice.status).toBe('overspecified')
    expect(twice.finding('overspecified').quantities).toContain('motive.m')
  })

  test('a pump stands on two shafts: overspecified, by name', () => {
    const twice = answerOf({
      ...driven,
      shafts: { ...driven.shafts, s: { turbines: ['t'], pumps: ['p'], given: losses } },
    })
    expect(twice.status).toBe('overspecified')
    expect(twice.errors.flatMap(({ where }) => where)).toEqual(
      expect.arrayContaining(['p', 's', 'fp']),
    )
  })
})
