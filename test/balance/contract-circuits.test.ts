import { describe, expect, test } from 'vitest'
import { changed, type LayoutParts } from '../published/build-layout.ts'
import { simpleCycle } from '../published/cycles.ts'
import { answerOf, solvedAnswerOf } from './contract-answer.ts'

const cycle = simpleCycle({ main: { p: 6e6, T: 723.15, m: 40 }, condenser: 7e3, pump: 0.75 })

describe('mass balances', () => {
  test('one of a closed circuit is left out, whichever of its flows is given', () => {
    for (const flow of ['main.m', 'exhaust.m', 'condensate.m', 'feed.m']) {
      const answer = solvedAnswerOf(changed(cycle, { free: ['main.m'], set: { [flow]: 40 } }))
      for (const stream of ['main', 'exhaust', 'condensate', 'feed']) {
        expect(answer.at(`${stream}.m`)).toBe(40)
      }
    }
  })

  test('two flows given in a closed circuit are one too many', () => {
    const answer = answerOf(changed(cycle, { set: { 'feed.m': 40 } }))
    expect(answer.status).toBe('overspecified')
    expect(answer.finding('overspecified').excess).toBe(1)
    expect(answer.finding('overspecified').quantities).toEqual(
      expect.arrayContaining(['main.m', 'feed.m']),
    )
  })

  test('with a supply and an offtake none is left out: the make-up follows from the blowdown', () => {
    const open = changed(
      {
        ...cycle,
        units: { ...cycle.units, makeup: ['supply'], waste: ['offtake'] },
        streams: {
          ...cycle.streams,
          makeupWater: ['makeup.outlet', 'c.drain1', { p: 2e5, T: 288.15 }],
          blowdown: ['b.blowdown', 'waste.inlet'],
        },
      },
      { set: { 'b.blowdownFraction': 0.02, 'b.drumPressure': 6.2e6 } },
    )
    const answer = solvedAnswerOf(open)
    expect(answer.at('blowdown.m')).toBeCloseTo(0.8, 12)
    expect(answer.at('makeupWater.m')).toBeCloseTo(0.8, 12)
    expect(answer.at('feed.m')).toBeCloseTo(40.8, 12)
    const twice = answerOf(changed(open, { set: { 'makeupWater.m': 0.8 } }))
    expect(twice.status).toBe('overspecified')
  })

  test('two circuits in one layout: each leaves out its own', () => {
    const second = Object.fromEntries(
      Object.entries(cycle.units).map(([id, unit]) => [`${id}2`, unit]),
    )
    const streams = Object.fromEntries(
      Object.entries(cycle.streams).map(([id, [from, to, given]]) => [
        `${id}2`,
        [from.replace('.', '2.'), to.replace('.', '2.'), given ?? {}] as const,
      ]),
    )
    const both: LayoutParts = {
      units: { ...cycle.units, ...second },
      streams: { ...cycle.streams, ...streams },
      shafts: { s: { turbines: ['t', 't2'] } },
    }
    const answer = solvedAnswerOf(changed(both, { set: { 'main2.m': 10 } }))
    expect(answer.at('feed.m')).toBe(40)
    expect(answer.at('feed2.m')).toBe(10)
    const short = answerOf(changed(both, { free: ['main2.m'] }))
    expect(short.finding('underspecified').missing).toBe(1)
    expect(short.finding('underspecified').quantities).not.toContain('main.m')
  })
})

/** A supply through a branch into two lines that meet again before an offtake. */
function parallel(
  lines: Readonly<Record<string, LayoutParts['units'][string]>>,
  streams: LayoutParts['streams'],
): LayoutParts {
  return {
    units: {
      in: ['supply'],
      br: ['branch'],
      ...lines,
      mix: ['junction'],
      out: ['offtake'],
    },
    streams: {
      all: ['in.outlet', 'br.inlet', { p: 1e6, T: 450, m: 30 }],
      ...streams,
      end: ['mix.outlet', 'out.inlet'],
    },
  }
}

describe('pressure equalities round a loop', () => {
  test('that only repeat each other are left out', () => {
    const answer = solvedAnswerOf(
      parallel(
        {},
        {
          one: ['br.outlet1', 'mix.inlet1', { m: 12 }],
          two: ['br.outlet2', 'mix.inlet2'],
        },
      ),
    )
    expect(answer.at('end.p')).toBe(1e6)
    expect(answer.at('two.m')).toBeCloseTo(18, 12)
    expect(answer.at('br.share1')).toBeCloseTo(0.4, 12)
  })

  const pipes = parallel(
    { one: ['pipe', { heatLoss: 0 }], two: ['pipe', { heatLoss: 0 }] },
    {
      in1: ['br.outlet1', 'one.inlet'],
      out1: ['one.outlet', 'mix.inlet1'],
      in2: ['br.outlet2', 'two.inlet'],
      out2: ['two.outlet', 'mix.inlet2'],
    },
  )

  test('through pipes without pressure drop', () => {
    const answer = solvedAnswerOf(
      changed(pipes, { set: { 'one.pressureDrop': 0, 'two.pressureDrop': 0, 'br.share1': 0.25 } }),
    )
    expect(answer.at('end.p')).toBe(1e6)
    expect(answer.at('out1.m')).toBeCloseTo(7.5, 12)
  })

  test('a pressure drop once given is the other pipe’s too', () => {
    const answer = solvedAnswerOf(
      changed(pipes, { set: { 'one.pressureDrop': 5e4, 'br.share1': 0.25 } }),
    )
    expect(answer.at('two.pressureDrop')).toBeCloseTo(5e4, 6)
    const twice = answerOf(
      changed(pipes, {
        set: { 'one.pressureDrop': 5e4, 'two.pressureDrop': 5e4, 'br.share1': 0.25 },
      }),
    )
    expect(twice.status).toBe('overspecified')
  })

  test('two loss constants split the flow as the roots of their inverses', () => {
    const answer = solvedAnswerOf(
      changed(pipes, { set: { 'one.lossConstant': 4e4, 'two.lossConstant': 1e4 } }),
    )
    expect(answer.at('in1.m')).toBeCloseTo(10, 9)
    expect(answer.at('in2.m')).toBeCloseTo(20, 9)
    const drop = 4e4 * 10 ** 2 * answer.at('all.v')
    expect(answer.at('all.p') - answer.at('end.p')).toBeCloseTo(drop, 4)
  })
})

describe('relations between intensive quantities hold at zero flow too', () => {
  const idle: LayoutParts = {
    units: {
      in: ['supply'],
      br: ['branch', { share2: 0 }],
      line: ['pipe', { heatLoss: 0, pressureLossFraction: 0.05 }],
      v: ['valve', { pressureLossFraction: 0.5 }],
      out: ['offtake'],
      off: ['offtake'],
    },
    streams: {
      all: ['in.outlet', 'br.inlet', { p: 2e6, T: 600, m: 30 }],
      on: ['br.outlet1', 'out.inlet'],
      idle: ['br.outlet2', 'line.inlet'],
      behind: ['line.outlet', 'v.inlet'],
      end: ['v.outlet', 'off.inlet'],
    },
  }

  test('a pipe with heatLoss given as 0, a valve and a branch pass the enthalpy on', () => {
    const answer = solvedAnswerOf(idle)
    expect(answer.at('end.m')).toBe(0)
    for (const stream of ['idle', 'behind', 'end']) {
      expect(answer.at(`${stream}.h`)).toBe(answer.at('all.h'))
    }
    expect(answer.at('end.p')).toBeCloseTo(0.5 * 0.95 * 2e6, 6)
    expect(answer.at('on.m')).toBe(30)
  })

  test('a branch of no flow at all: its outlets have none, its shares mean nothing', () => {
    const dry = changed(idle, { free: ['br.share2'], set: { 'all.m': 0, 'br.share1': 0.3 } })
    // Beside it something that does flow, or nothing would fix the size of the plant.
    const answer = solvedAnswerOf({
      ...dry,
      units: { ...dry.units, river: ['supply'], sea: ['offtake'] },
      streams: { ...dry.streams, aside: ['river.outlet', 'sea.inlet', { p: 1e5, T: 290, m: 1 }] },
    })
    expect(answer.at('on.m')).toBeCloseTo(0, 12)
    expect(answer.at('idle.m')).toBeCloseTo(0, 12)
    expect(answer.at('br.share1')).toBe(0.3)
    expect(answer.at('br.share2')).toBeNaN()
    expect(answer.at('end.h')).toBe(answer.at('all.h'))
  })

  test('a heat loss without a flow to take it from has no answer', () => {
    const answer = answerOf(changed(idle, { set: { 'line.heatLoss': 1e4 } }))
    expect(answer.status).not.toBe('solved')
    expect(answer.errors.flatMap(({ where }) => where)).toContain('line')
    expect(answer.at('behind.h')).toBeNaN()
  })
})
