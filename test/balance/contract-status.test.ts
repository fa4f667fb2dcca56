import { describe, expect, test } from 'vitest'
import { SATURATION_SIZE, Saturation, saturationAtPressure } from '../../src/steam/index.ts'
import { changed } from '../published/build-layout.ts'
import { simpleCycle } from '../published/cycles.ts'
import { answerOf } from './contract-answer.ts'

/** Boiler b, turbine t on shaft s, condenser c, pump p; streams main, exhaust, condensate, feed. */
const cycle = changed(
  simpleCycle({ main: { p: 6e6, T: 723.15, m: 40 }, condenser: 7e3, turbine: 0.85, pump: 0.75 }),
  { set: { 'b.pressureLossFraction': 0.05 } },
)

/** A supply through a branch whose outlets leave the plant. */
function split(shares: readonly [number, number], flow: Readonly<Record<string, number>>) {
  return {
    units: {
      in: ['supply'],
      br: ['branch', { share1: shares[0], share2: shares[1] }],
      left: ['offtake'],
      right: ['offtake'],
    },
    streams: {
      all: ['in.outlet', 'br.inlet', { p: 1e6, T: 400, ...flow }],
      one: ['br.outlet1', 'left.inlet'],
      two: ['br.outlet2', 'right.inlet'],
    },
  } as const
}

test('a plant with as many equations as unknowns is solved', () => {
  const answer = answerOf(cycle)
  expect(answer.status).toBe('solved')
  expect(answer.unknowns).toBe(answer.equations)
  expect(answer.blocks).toBeGreaterThan(0)
})

describe('underspecified', () => {
  test('a flow that nothing fixes: one is missing, and the flow of the steam leads the set', () => {
    const answer = answerOf(changed(cycle, { free: ['main.m'] }))
    expect(answer.status).toBe('underspecified')
    const finding = answer.finding('underspecified')
    expect(finding.missing).toBe(1)
    expect(finding.quantities[0]).toBe('main.m')
    expect(finding.where).toContain('main')
  })

  test('each quantity of the set, given alone, lowers the count', () => {
    const short = changed(cycle, { free: ['main.m'] })
    const whole = answerOf(cycle)
    for (const path of answerOf(short).finding('underspecified').quantities) {
      const answer = answerOf(changed(short, { set: { [path]: whole.at(path) } }))
      const codes = answer.errors.map(({ code }) => code)
      // A ratio of totals fits in by structure, but is the same at every flow.
      const isRatio = codes.length === 1 && codes[0] === 'singular'
      expect([path, answer.status]).toEqual([path, isRatio ? 'underspecified' : 'solved'])
    }
  })

  test('two numbers missing in parts that do not touch are counted together', () => {
    const answer = answerOf(changed(cycle, { free: ['main.m', 't.groupEfficiency1'] }))
    expect(answer.status).toBe('underspecified')
    expect(answer.finding('underspecified').missing).toBe(2)
  })

  test('a required port without a stream is an error that names the unit', () => {
    const { exhaust: _, ...streams } = cycle.streams
    const answer = answerOf({ ...cycle, streams })
    expect(answer.status).toBe('underspecified')
    const open = answer.errors.filter(({ code }) => code === 'open-port')
    expect(open.flatMap(({ where }) => where).sort()).toEqual(['c', 't'])
    expect(open.map(({ message }) => message).join()).toMatch(/exhaust.*steam1|steam1.*exhaust/)
  })

  test('a turbine on no shaft is an error that names it', () => {
    const answer = answerOf({ ...cycle, shafts: {} })
    expect(answer.status).toBe('underspecified')
    expect(answer.finding('turbine-without-shaft').where).toEqual(['t'])
  })

  test('pressure and temperature of one wet state do not say how much is steam', () => {
    const record = new Float64Array(SATURATION_SIZE)
    saturationAtPressure(record, 0, 6e6)
    const saturated = record[Saturation.T]!
    for (const off of [0, 5e-7, -5e-7]) {
      const answer = answerOf(changed(cycle, { set: { 'main.T': saturated + off } }))
      expect(answer.status).toBe('underspecified')
      expect(answer.errors[0]!.where).toContain('main')
      expect(answer.errors[0]!.missing).toBe(1)
    }
    for (const off of [2e-6, -2e-6]) {
      expect(answerOf(changed(cycle, { set: { 'main.T': saturated + off } })).status).toBe('solved')
    }
  })

  test('equations that repeat each other in numbers leave the flow open', () => {
    const answer = answerOf(split([0.5, 0.5], {}))
    expect(answer.status).toBe('underspecified')
    expect(answer.errors[0]!.missing).toBe(1)
    expect(JSON.stringify(answer.errors)).toMatch(/all\.m|one\.m|two\.m/)
  })
})

describe('overspecified', () => {
  test('one number too many is counted, and the set names it and what already fixes it', () => {
    const answer = answerOf(changed(cycle, { set: { 'feed.p': 6.5e6 } }))
    expect(answer.status).toBe('overspecified')
    const { excess, quantities } = answer.finding('overspecified')
    expect(excess).toBe(1)
    expect(quantities).toEqual(expect.arrayContaining(['feed.p', 'main.p']))
  })

  test('each quantity of the set, freed alone, mends it', () => {
    const full = changed(cycle, { set: { 'feed.p': 6.5e6 } })
    for (const path of answerOf(full).finding('overspecified').quantities) {
      const answer = answerOf(changed(full, { free: [path] }))
      expect([path, answer.status]).toEqual([path, 'solved'])
    }
  })

  test('a loss given as 0 is named like any other number', () => {
    const full = changed(cycle, { set: { 'b.pressureLossFraction': 0, 'feed.p': 6.5e6 } })
    expect([...answerOf(full).finding('overspecified').quantities].sort()).toEqual(
      ['b.pressureLossFraction', 'feed.p', 'main.p'].sort(),
    )
    const cooling = changed(cycle, { set: { 'c.coolingRise': 0, 'c.coolingInletT': 290 } })
    expect(answerOf(cooling).finding('overspecified').quantities).toContain('c.coolingRise')
    expect(answerOf(changed(cooling, { free: ['c.coolingRise'] })).status).toBe('solved')
  })

  test('a given share too many contradicts even where the numbers agree', () => {
    const answer = answerOf(split([0.5, 0.5], { m: 10 }))
    expect(answer.status).toBe('overspecified')
    expect(answer.finding('overspecified').excess).toBe(1)
  })

  test('a turbine on two shafts is overspecified, by name', () => {
    const answer = answerOf({
      ...cycle,
      shafts: { s: { turbines: ['t'] }, s2: { turbines: ['t'] } },
    })
    expect(answer.status).toBe('overspecified')
    expect(answer.finding('two-shafts').where).toEqual(expect.arrayContaining(['t', 's', 's2']))
  })

  test('it outranks underspecified, and both are told', () => {
    const answer = answerOf(changed(cycle, { set: { 'feed.p': 6.5e6 }, free: ['main.m'] }))
    expect(answer.status).toBe('overspecified')
    expect(answer.errors.map(({ code }) => code)).toEqual(
      expect.arrayContaining(['overspecified', 'underspecified']),
    )
  })

  test('a block that is singular in numbers and contradicts itself', () => {
    // What enters the branch goes round and comes back, and more is added each time: m = m + 1.
    const answer = answerOf({
      units: {
        in: ['supply'],
        mix: ['junction'],
        br: ['branch', { share1: 1 }],
        out: ['offtake'],
      },
      streams: {
        add: ['in.outlet', 'mix.inlet1', { p: 1e6, T: 400, m: 1 }],
        all: ['mix.outlet', 'br.inlet'],
        back: ['br.outlet1', 'mix.inlet2'],
        off: ['br.outlet2', 'out.inlet'],
      },
    })
    expect(answer.status).toBe('overspecified')
    expect(answer.errors[0]!.excess).toBe(1)
  })
})

describe('every quantity is a key whatever the status, null when undetermined', () => {
  const keysOf = (answer: ReturnType<typeof answerOf>): string[] =>
    Object.entries({ ...answer.streams, ...answer.units, ...answer.shafts, plant: answer.plant })
      .flatMap(([owner, numbers]) => Object.keys(numbers).map((name) => `${owner}.${name}`))
      .sort()
  const wanted = keysOf(answerOf(cycle))

  test.each([
    ['underspecified', { free: ['main.m'] }, 'main.m'],
    ['overspecified', { set: { 'feed.p': 6.5e6 }, free: ['main.m'] }, 'main.m'],
    ['infeasible', { set: { 'main.h': 9e6 }, free: ['main.T'] }, 'main.T'],
  ] as const)('%s', (status, change, unknown) => {
    const answer = answerOf(changed(cycle, change))
    expect(answer.status).toBe(status)
    expect(keysOf(answer)).toEqual(wanted)
    expect(answer.at(unknown)).toBeNaN()
  })

  test('a stream has these', () => {
    expect(Object.keys(answerOf(cycle).streams.main!).sort()).toEqual(
      ['T', 'h', 'm', 'p', 'phase', 's', 'subcooling', 'superheat', 'v', 'x'].sort(),
    )
  })

  test('the plant has these', () => {
    expect(Object.keys(answerOf(cycle).plant).sort()).toEqual(
      [
        'heatInput turbineHeat fuelHeat recoveredHeat processHeat turbinePower pumpPower cyclePower',
        'grossPower otherAuxiliary auxiliaryPower netPower heatRejected cycleEfficiency',
        'grossTurbineHeatRate netTurbineHeatRate unitHeatRate unitEfficiency backWorkRatio steamRate',
      ]
        .join(' ')
        .split(' ')
        .sort(),
    )
  })

  test('what can be solved is solved although a flow is missing', () => {
    const answer = answerOf(changed(cycle, { free: ['main.m'] }))
    const whole = answerOf(cycle)
    expect(answer.at('exhaust.h')).toBe(whole.at('exhaust.h'))
    expect(answer.at('main.s')).toBe(whole.at('main.s'))
    expect(answer.undetermined).toContain('t.power')
  })
})
