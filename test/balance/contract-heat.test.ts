import { describe, expect, test } from 'vitest'
import { SATURATION_SIZE, Saturation, saturationAtPressure } from '../../src/steam/index.ts'
import { changed, type LayoutParts } from '../published/build-layout.ts'
import { oneHeaterCycle, reheatCycle, simpleCycle } from '../published/cycles.ts'
import { answerOf, solvedAnswerOf } from './contract-answer.ts'

/*
 * Boiler, reheater, condenser, mixing heater and pipes against balances written out here from the
 * streams of the answer and from saturated states.
 */

function saturated(p: number): Float64Array {
  const record = new Float64Array(SATURATION_SIZE)
  saturationAtPressure(record, 0, p)
  return record
}

const cycle = simpleCycle({ main: { p: 6e6, T: 723.15, m: 40 }, condenser: 7e3, pump: 0.75 })

describe('boiler', () => {
  /** Spray branched off before the feed valve, blowdown to waste, make-up into the condenser. */
  const parts: LayoutParts = changed(
    {
      ...cycle,
      units: {
        ...cycle.units,
        br: ['branch'],
        v: ['valve', { pressureDrop: 4e5 }],
        makeup: ['supply'],
        waste: ['offtake'],
      },
      streams: {
        main: cycle.streams.main!,
        exhaust: cycle.streams.exhaust!,
        condensate: cycle.streams.condensate!,
        pumped: ['p.discharge', 'br.inlet'],
        spray: ['br.outlet1', 'b.spray', { m: 2 }],
        rest: ['br.outlet2', 'v.inlet'],
        feed: ['v.outlet', 'b.feedwater'],
        blowdown: ['b.blowdown', 'waste.inlet'],
        makeupWater: ['makeup.outlet', 'c.drain1', { p: 2e5, T: 288.15 }],
      },
    },
    {
      set: {
        'b.pressureLossFraction': 0.05,
        'b.efficiency': 0.88,
        'b.blowdownFraction': 0.015,
        'b.drumPressure': 6.2e6,
      },
    },
  )
  const { at } = solvedAnswerOf(parts)

  test('pressure loss: p_steam = p_feedwater (1 - fraction)', () => {
    expect(at('main.p') / at('feed.p')).toBeCloseTo(0.95, 12)
  })

  test('loss law: p_in - p_out = lossConstant m² v_in', () => {
    const loss = at('b.lossConstant') * at('feed.m') ** 2 * at('feed.v')
    expect(loss / (at('feed.p') - at('main.p'))).toBeCloseTo(1, 12)
  })

  test('blowdown is saturated liquid of the drum, a fraction of the steam flow', () => {
    expect(at('blowdown.m')).toBeCloseTo(0.015 * 40, 12)
    expect(at('blowdown.p')).toBe(6.2e6)
    expect(at('blowdown.h') / saturated(6.2e6)[Saturation.hL]!).toBeCloseTo(1, 12)
  })

  test('mass and energy: feedwater and spray become steam and blowdown', () => {
    expect(at('feed.m') + at('spray.m')).toBeCloseTo(40 + 0.6, 12)
    const heat =
      40 * at('main.h') + 0.6 * at('blowdown.h') - at('feed.m') * at('feed.h') - 2 * at('spray.h')
    expect(at('b.heat') / heat).toBeCloseTo(1, 12)
    expect(at('b.fuelHeat') / (heat / 0.88)).toBeCloseTo(1, 12)
  })

  test('the spray arrives at its own pressure and is throttled on entry', () => {
    expect(at('spray.p') - at('feed.p')).toBeCloseTo(4e5, 6)
  })

  test('turbineHeat leaves out what the blowdown took above the feedwater', () => {
    const credit = 0.6 * (at('blowdown.h') - at('feed.h'))
    expect(at('plant.turbineHeat') / (at('b.heat') - credit)).toBeCloseTo(1, 12)
    expect(at('plant.heatInput')).toBe(at('b.heat'))
  })

  test('blowdown from a drum above the critical pressure has no answer', () => {
    const answer = answerOf(changed(parts, { set: { 'b.drumPressure': 23e6 } }))
    expect(answer.status).toBe('infeasible')
    expect(answer.errors.flatMap(({ quantities }) => quantities)).toContain('b.drumPressure')
  })
})

test('reheater with spray: mass, energy, pressure, and both of its fires count', () => {
  const plain = reheatCycle({
    main: { p: 12e6, T: 810, m: 50 },
    cold: { p: 3e6 },
    hot: { T: 810 },
    condenser: 6e3,
  })
  const { at } = solvedAnswerOf(
    changed(
      {
        ...plain,
        units: { ...plain.units, br: ['branch'] },
        streams: {
          ...plain.streams,
          feed: ['p.discharge', 'br.inlet'],
          toBoiler: ['br.outlet1', 'b.feedwater'],
          spray: ['br.outlet2', 'r.spray', { m: 1.5 }],
        },
      },
      { set: { 'r.pressureLossFraction': 0.08, 'r.efficiency': 0.9, 'b.efficiency': 0.92 } },
    ),
  )
  expect(at('hot.m')).toBeCloseTo(51.5, 12)
  expect(at('hot.p') / at('cold.p')).toBeCloseTo(0.92, 12)
  const heat = 51.5 * at('hot.h') - 50 * at('cold.h') - 1.5 * at('spray.h')
  expect(at('r.heat') / heat).toBeCloseTo(1, 12)
  expect(at('plant.heatInput') / (at('b.heat') + heat)).toBeCloseTo(1, 12)
  expect(at('plant.fuelHeat') / (at('b.heat') / 0.92 + heat / 0.9)).toBeCloseTo(1, 12)
  // Steam of all boilers, not the reheated.
  expect(at('plant.steamRate') / (50 / at('plant.netPower'))).toBeCloseTo(1, 12)
})

describe('condenser', () => {
  const cooled = changed(cycle, {
    set: {
      'c.subcooling': 1.5,
      'c.coolingInletT': 290,
      'c.coolingRise': 9,
      'c.coolingHeatCapacity': 4180,
    },
  })
  const { at } = solvedAnswerOf(cooled)
  const Ts = saturated(7e3)[Saturation.T]!

  test('the condensate is subcooled below saturation at the condenser’s pressure', () => {
    expect(at('condensate.T')).toBeCloseTo(Ts - 1.5, 8)
    expect(at('condensate.p')).toBe(7e3)
    expect(at('exhaust.p')).toBe(7e3)
  })

  test('heat = coolingFlow coolingHeatCapacity coolingRise', () => {
    const heat = 40 * (at('exhaust.h') - at('condensate.h'))
    expect(at('c.heat') / heat).toBeCloseTo(1, 12)
    expect(at('c.coolingFlow') / (heat / (4180 * 9))).toBeCloseTo(1, 12)
    expect(at('plant.heatRejected')).toBe(at('c.heat'))
  })

  test('heat = conductance LMTD with the shell at saturation, subcooling or not', () => {
    const far = Ts - 290
    const near = Ts - 299
    expect(at('c.terminalDifference')).toBeCloseTo(near, 10)
    const lmtd = (far - near) / Math.log(far / near)
    expect((at('c.conductance') * lmtd) / at('c.heat')).toBeCloseTo(1, 12)
  })

  test('a terminal difference of 0 needs an unbounded conductance: said so, and solved', () => {
    const answer = solvedAnswerOf(
      changed(cooled, { free: ['c.coolingRise'], set: { 'c.terminalDifference': 0 } }),
    )
    expect(answer.unbounded).toContain('c.conductance')
    expect(answer.at('c.conductance')).toBeNaN()
    expect(answer.at('c.coolingRise')).toBeCloseTo(Ts - 290, 8)
  })

  test('with nothing given of the cooling side the rest is solved, and it is undetermined', () => {
    const answer = solvedAnswerOf(cycle)
    for (const name of [
      'coolingInletT',
      'coolingRise',
      'coolingFlow',
      'terminalDifference',
      'conductance',
    ]) {
      expect(answer.undetermined).toContain(`c.${name}`)
    }
  })

  test('drains enter from above its pressure and count in its heat', () => {
    const drained = solvedAnswerOf({
      ...cycle,
      units: { ...cycle.units, in: ['supply'], br: ['branch', { share2: 0.1 }], out: ['offtake'] },
      streams: {
        ...cycle.streams,
        drain: ['in.outlet', 'c.drain1', { p: 1e5, T: 350 }],
        feed: ['p.discharge', 'br.inlet'],
        toBoiler: ['br.outlet1', 'b.feedwater'],
        sold: ['br.outlet2', 'out.inlet'],
      },
    }).at
    expect(drained('drain.m')).toBeCloseTo(40 / 9, 10)
    const heat =
      40 * drained('exhaust.h') +
      drained('drain.m') * drained('drain.h') -
      drained('condensate.m') * drained('condensate.h')
    expect(drained('c.heat') / heat).toBeCloseTo(1, 12)
  })
})

describe('mixing heater', () => {
  const heated = oneHeaterCycle({
    main: { p: 8e6, T: 753.15, m: 80 },
    bleed: { p: 7e5 },
    condenser: 7e3,
  })

  test('its outlet is saturated, or subcooled as given', () => {
    const plain = solvedAnswerOf(heated).at
    expect(plain('hotWater.h') / saturated(7e5)[Saturation.hL]!).toBeCloseTo(1, 12)
    const cooler = solvedAnswerOf(changed(heated, { set: { 'd.subcooling': 2 } })).at
    expect(cooler('hotWater.T')).toBeCloseTo(saturated(7e5)[Saturation.T]! - 2, 8)
  })

  test('a vent takes dry saturated steam, a fraction of the outlet flow, and its heat with it', () => {
    const vented: LayoutParts = changed(
      {
        ...heated,
        units: { ...heated.units, makeup: ['supply'], air: ['offtake'] },
        streams: {
          ...heated.streams,
          vent: ['d.vent', 'air.inlet'],
          makeupWater: ['makeup.outlet', 'c.drain1', { p: 2e5, T: 288.15 }],
        },
      },
      { set: { 'd.ventFraction': 0.002 } },
    )
    const { at } = solvedAnswerOf(vented)
    expect(at('hotWater.m')).toBeCloseTo(80, 10)
    expect(at('vent.m')).toBeCloseTo(0.002 * 80, 10)
    expect(at('vent.p')).toBe(7e5)
    expect(at('vent.h') / saturated(7e5)[Saturation.hV]!).toBeCloseTo(1, 12)
    expect(at('makeupWater.m')).toBeCloseTo(0.16, 9)
    const steam =
      (80 * at('hotWater.h') + at('vent.m') * at('vent.h') - (80 + at('vent.m')) * at('warm.h')) /
      (at('bleed.h') - at('warm.h'))
    expect(at('bleed.m') / steam).toBeCloseTo(1, 10)
  })
})

describe('pipe', () => {
  /** A pipe between boiler and turbine (hot), turbine and reheater (cold), pump and boiler (feed). */
  const plain = reheatCycle({
    main: { p: 12e6, T: 810, m: 50 },
    cold: { p: 3e6 },
    hot: { T: 810 },
    condenser: 6e3,
  })
  const line = ['pipe', { heatLoss: 0, pressureLossFraction: 0.02 }] as const
  const piped: LayoutParts = {
    ...plain,
    units: { ...plain.units, steamLine: line, coldLine: line, feedLine: line },
    streams: {
      ...plain.streams,
      main: ['b.steam', 'steamLine.inlet', { p: 12e6, T: 810, m: 50 }],
      admitted: ['steamLine.outlet', 'hp.inlet'],
      cold: ['hp.exhaust', 'coldLine.inlet', { p: 3e6 }],
      toReheater: ['coldLine.outlet', 'r.inlet'],
      feed: ['p.discharge', 'feedLine.inlet'],
      toBoiler: ['feedLine.outlet', 'b.feedwater'],
    },
  }

  test('heat loss: h_in - h_out = heatLoss/m; the loss law', () => {
    const { at } = solvedAnswerOf(changed(piped, { set: { 'steamLine.heatLoss': 2e5 } }))
    expect(at('main.h') - at('admitted.h')).toBeCloseTo(2e5 / 50, 6)
    expect(at('steamLine.pressureDrop')).toBeCloseTo(0.02 * 12e6, 4)
    const drop = at('steamLine.lossConstant') * 50 ** 2 * at('main.v')
    expect(drop).toBeCloseTo(0.02 * 12e6, 4)
  })

  test.each([
    ['steamLine', 1],
    ['coldLine', 1],
    ['feedLine', 0],
  ])('the loss of the %s is off turbineHeat %d times', (unit, times) => {
    const { at } = solvedAnswerOf(changed(piped, { set: { [`${unit}.heatLoss`]: 3e5 } }))
    expect(at('plant.heatInput') - at('plant.turbineHeat')).toBeCloseTo(times * 3e5, 2)
  })

  test('a fraction and a drop that say the same are one number too many', () => {
    const answer = answerOf(changed(piped, { set: { 'steamLine.pressureDrop': 0.02 * 12e6 } }))
    expect(answer.status).toBe('overspecified')
  })
})

test('branch and junction: shares, equal pressures and enthalpies, adiabatic mixing', () => {
  const { at } = solvedAnswerOf({
    units: {
      in: ['supply'],
      other: ['supply'],
      br: ['branch', { share2: 0.3 }],
      mix: ['junction'],
      out: ['offtake'],
      off: ['offtake'],
    },
    streams: {
      all: ['in.outlet', 'br.inlet', { p: 8e5, T: 520, m: 10 }],
      one: ['br.outlet1', 'mix.inlet1'],
      two: ['br.outlet2', 'off.inlet'],
      water: ['other.outlet', 'mix.inlet2', { T: 350, m: 1 }],
      mixed: ['mix.outlet', 'out.inlet'],
    },
  })
  expect(at('two.m')).toBeCloseTo(3, 12)
  expect(at('br.share1')).toBeCloseTo(0.7, 12)
  expect(at('one.h')).toBe(at('all.h'))
  expect(at('water.p')).toBe(8e5)
  expect(at('mixed.h') / ((7 * at('one.h') + at('water.h')) / 8)).toBeCloseTo(1, 12)
})
