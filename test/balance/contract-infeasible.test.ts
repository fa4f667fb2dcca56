import { describe, expect, test } from 'vitest'
import { changed, type LayoutParts } from '../published/build-layout.ts'
import { oneHeaterCycle, simpleCycle } from '../published/cycles.ts'
import { type Answer, answerOf, solvedAnswerOf } from './contract-answer.ts'

const cycle = simpleCycle({
  main: { p: 6e6, T: 723.15, m: 40 },
  condenser: 7e3,
  turbine: 0.85,
  pump: 0.75,
})
const heated = oneHeaterCycle({
  main: { p: 8e6, T: 753.15, m: 80 },
  bleed: { p: 7e5 },
  turbine: [0.85, 0.85],
  condenser: 7e3,
  pump: 0.78,
})

/** The same with a drain from outside into the mixing heater, taken out again from the feedwater. */
function withDrain(given: Readonly<Record<string, number>>): LayoutParts {
  return {
    ...heated,
    units: { ...heated.units, aside: ['supply'], br: ['branch'], sold: ['offtake'] },
    streams: {
      ...heated.streams,
      drain: ['aside.outlet', 'd.drain1', given],
      feed: ['p2.discharge', 'br.inlet'],
      toBoiler: ['br.outlet1', 'b.feedwater'],
      surplus: ['br.outlet2', 'sold.inlet'],
    },
  }
}

/** The error that names all of these among its units, streams and quantities. */
function expectError(answer: Answer, ...names: readonly string[]): void {
  expect(answer.status).toBe('infeasible')
  const named = answer.errors.map(({ where, quantities }) => [...where, ...quantities])
  const best = named.find((one) => names.every((name) => one.includes(name)))
  expect(best ?? named).toEqual(expect.arrayContaining([...names]))
}

test.each(['main.m', 'plant.netPower', 'plant.heatInput'])(
  'every flow zero, %s being given as 0: nothing fixes the size',
  (path) => {
    const answer = answerOf(changed(cycle, { free: ['main.m'], set: { [path]: 0 } }))
    expectError(answer, 'main.m')
    expect(answer.finding('no-flow').severity).toBe('error')
  },
)

test('a negative flow given', () => {
  expectError(answerOf(changed(cycle, { set: { 'main.m': -40 } })), 'main', 'main.m')
})

test('a heater fed with more hot drain than it can use would send its bleed backwards', () => {
  const cool = withDrain({ p: 2e6, T: 440, m: 5 })
  expect(solvedAnswerOf(cool).at('bleed.m')).toBeGreaterThan(0)
  expectError(answerOf(changed(cool, { set: { 'drain.T': 480, 'drain.m': 800 } })), 'bleed.m')
})

describe('a drain that is throttled on entry', () => {
  test('from below the unit’s pressure', () => {
    expectError(answerOf(withDrain({ p: 3e5, T: 400, m: 5 })), 'd', 'drain', 'drain.p')
  })

  test('from the unit’s pressure exactly is accepted', () => {
    expect(solvedAnswerOf(withDrain({ p: 7e5, T: 400, m: 5 })).at('drain.m')).toBe(5)
  })

  test('is not looked at without flow', () => {
    expect(answerOf(withDrain({ p: 3e5, T: 400, m: 0 })).status).toBe('solved')
  })
})

describe('pressures', () => {
  test('a pump that lowers pressure', () => {
    const answer = answerOf(
      changed(cycle, { free: ['b.pressureLossFraction'], set: { 'feed.p': 5e3 } }),
    )
    expectError(answer, 'p', 'feed.p')
  })

  test('a boiler that raises pressure', () => {
    const answer = answerOf(
      changed(cycle, { free: ['b.pressureLossFraction'], set: { 'feed.p': 5.9e6 } }),
    )
    expectError(answer, 'b', 'main.p')
  })

  test('a turbine whose exhaust lies above its inlet', () => {
    expectError(answerOf(changed(cycle, { set: { 'c.pressure': 7e6 } })), 't')
  })

  test('a valve that raises pressure', () => {
    const answer = answerOf({
      units: { in: ['supply'], v: ['valve', { pressureDrop: -1e5 }], out: ['offtake'] },
      streams: {
        before: ['in.outlet', 'v.inlet', { p: 1e6, T: 500, m: 1 }],
        behind: ['v.outlet', 'out.inlet'],
      },
    })
    expectError(answer, 'v', 'behind.p')
  })
})

describe('values outside what is possible', () => {
  test.each([
    ['t.groupEfficiency1', 1.2],
    ['t.groupEfficiency1', 0],
    ['t.groupEfficiency1', -0.1],
    ['p.efficiency', 1.2],
    ['b.efficiency', 1.01],
    ['p.driveEfficiency', 1.2],
    ['s.mechanicalEfficiency', 1.1],
    ['s.generatorEfficiency', 1.1],
  ])('%s given as %d', (path, value) => {
    const answer = answerOf(changed(cycle, { set: { [path]: value } }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ quantities }) => quantities)).toContain(path)
  })

  test.each(['t.groupEfficiency1', 'p.efficiency', 'b.efficiency'])(
    '%s of 1 is possible',
    (path) => {
      expect(answerOf(changed(cycle, { set: { [path]: 1 } })).status).toBe('solved')
    },
  )

  test('an efficiency that is solved and comes out above 1', () => {
    const answer = answerOf(
      changed(cycle, { free: ['t.groupEfficiency1'], set: { 't.power': 6e7 } }),
    )
    expectError(answer, 't', 't.groupEfficiency1')
  })

  test('a condenser that should be colder than its cooling water', () => {
    const answer = answerOf(
      changed(cycle, { set: { 'c.coolingInletT': 310, 'c.coolingRise': 10 } }),
    )
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ quantities }) => quantities)).toContain('c.terminalDifference')
  })
})

test('a turbine that would expand to below the isentrope destroys entropy', () => {
  const answer = answerOf({
    units: {
      in: ['supply'],
      t: ['turbine', { wetnessFactor: 0, exhaustLoss: 0 }],
      out: ['offtake'],
    },
    streams: {
      before: ['in.outlet', 't.inlet', { p: 6e6, T: 723.15, m: 10 }],
      behind: ['t.exhaust', 'out.inlet', { p: 1e5, x: 0.7 }],
    },
    shafts: { s: { turbines: ['t'] } },
  })
  expectError(answer, 't', 't.entropyGenerated')
})

test.each([
  ['main.T', 2300, /2,?000/],
  ['main.p', 1.2e8, /1,?000/],
])('%s = %d lies beyond the steam properties: the message says the limit', (path, value, limit) => {
  const answer = answerOf(changed(cycle, { set: { [path]: value } }))
  expect(answer.status).toBe('infeasible')
  expect(answer.errors[0]!.message).toMatch(limit)
})

test.each([
  ['main.m', -40, 'reversed-flow'],
  ['t.groupEfficiency1', 1.4, 'impossible-value'],
] as const)(
  '%s given as %d is said alone, not hidden among what follows from it',
  (path, value, code) => {
    const { errors, status } = answerOf(changed(cycle, { set: { [path]: value } }))
    expect(status).toBe('infeasible')
    expect(errors.map((one) => [one.code, one.quantities[0]])).toEqual([[code, path]])
    expect(errors[0]?.remedies?.[0]?.path).toBe(path)
  },
)
