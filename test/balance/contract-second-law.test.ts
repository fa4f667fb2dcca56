import { describe, expect, test } from 'vitest'
import { changed, type LayoutParts } from '../published/build-layout.ts'
import { reheatHeaterCycle } from '../published/cycles.ts'
import { type Answer, solvedAnswerOf } from './contract-answer.ts'

const T0 = 293.15

/** Reheat, a mixing heater with vent, blowdown, a line that loses heat, process steam, make-up. */
const base = reheatHeaterCycle({
  main: { p: 13e6, T: 811, m: 100 },
  cold: { p: 3e6 },
  hot: { T: 811 },
  hp: 0.86,
  lp: [0.88, 0.9],
  bleed: { p: 6e5 },
  condenser: 6e3,
  pump: 0.78,
  ambient: T0,
})
const { main: _main, hotWater: _hotWater, ...others } = base.streams
const parts: LayoutParts = changed(
  {
    ...base,
    units: {
      ...base.units,
      line: ['pipe', { heatLoss: 3e5, pressureLossFraction: 0.03 }],
      br: ['branch', { share2: 0.05 }],
      works: ['heatUser', { returnFraction: 0.7 }],
      economiser: ['heatSource', { pressureLossFraction: 0.01, heat: 5e6 }],
      makeup: ['supply'],
      waste: ['offtake'],
      air: ['offtake'],
    },
    streams: {
      ...others,
      main: ['b.steam', 'line.inlet', { p: 13e6, T: 811, m: 100 }],
      admitted: ['line.outlet', 'hp.inlet'],
      cold: ['hp.exhaust', 'br.inlet', { p: 3e6 }],
      toReheater: ['br.outlet1', 'r.inlet'],
      processSteam: ['br.outlet2', 'works.steam'],
      returned: ['works.condensate', 'c.drain1', { p: 2e5, T: 350 }],
      hotWater: ['d.outlet', 'economiser.inlet'],
      warmer: ['economiser.outlet', 'p2.suction'],
      vent: ['d.vent', 'air.inlet'],
      blowdown: ['b.blowdown', 'waste.inlet'],
      makeupWater: ['makeup.outlet', 'c.drain2', { p: 2e5, T: 288.15 }],
    },
    shafts: {
      s: {
        turbines: ['hp', 'lp'],
        given: {
          mechanicalEfficiency: 0.99,
          mechanicalLoss: 1e5,
          generatorEfficiency: 0.985,
          generatorLoss: 5e4,
        },
      },
    },
  },
  {
    set: {
      'b.efficiency': 0.9,
      'r.efficiency': 0.88,
      'r.pressureLossFraction': 0.08,
      'b.pressureLossFraction': 0.05,
      'b.blowdownFraction': 0.01,
      'b.drumPressure': 13.3e6,
      'd.ventFraction': 0.001,
    },
  },
)
const answer = solvedAnswerOf(parts)
const { at } = answer

/** m (h - T0 s) of a stream: its exergy flow, W, but for a constant that the masses cancel. */
const exergy = (stream: string, look: Answer['at'] = at): number =>
  look(`${stream}.m`) * (look(`${stream}.h`) - T0 * look(`${stream}.s`))
const entropy = (stream: string): number => at(`${stream}.m`) * at(`${stream}.s`)
const sum = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0)

const adiabatic = ['hp', 'lp', 'p1', 'p2', 'd', 'br']
const endsOf = (unit: string, side: 'in' | 'out'): string[] =>
  Object.entries(parts.streams)
    .filter(([, [from, to]]) => (side === 'in' ? to : from).startsWith(`${unit}.`))
    .map(([id]) => id)

test.each(adiabatic)(
  '%s, without heat exchange: entropy out less in, exergy T0 times that',
  (unit) => {
    const generated = sum(endsOf(unit, 'out').map(entropy)) - sum(endsOf(unit, 'in').map(entropy))
    expect(at(`${unit}.entropyGenerated`)).toBeCloseTo(generated, 6)
    expect(at(`${unit}.exergyDestroyed`)).toBeCloseTo(T0 * generated, 3)
  },
)

test.each(['c', 'line'])('%s gives off heat that counts as lost at T0', (unit) => {
  const lost =
    sum(endsOf(unit, 'in').map((id) => exergy(id))) -
    sum(endsOf(unit, 'out').map((id) => exergy(id)))
  expect(at(`${unit}.exergyDestroyed`) / lost).toBeCloseTo(1, 9)
  expect(at(`${unit}.entropyGenerated`) / (lost / T0)).toBeCloseTo(1, 9)
})

test.each(['b', 'r'])('%s: fuelHeat as exergy less the gain of its streams', (unit) => {
  const gain =
    sum(endsOf(unit, 'out').map((id) => exergy(id))) -
    sum(endsOf(unit, 'in').map((id) => exergy(id)))
  expect(at(`${unit}.exergyDestroyed`) / (at(`${unit}.fuelHeat`) - gain)).toBeCloseTo(1, 9)
  expect(answer.units[unit]!.entropyGenerated).toBeNull()
})

test('a heat user’s drop is delivered, a heat source’s gain supplied: nothing destroyed', () => {
  const { s, h, m } = { s: at('processSteam.s'), h: at('processSteam.h'), m: at('processSteam.m') }
  const drop = m * (h - at('returned.h') - T0 * (s - at('returned.s')))
  expect(at('works.exergyDelivered') / drop).toBeCloseTo(1, 9)
  expect(at('economiser.exergySupplied') / (exergy('warmer') - exergy('hotWater'))).toBeCloseTo(
    1,
    9,
  )
  expect(Object.keys(answer.units.works!)).not.toContain('exergyDestroyed')
  expect(Object.keys(answer.units.economiser!)).not.toContain('exergyDestroyed')
})

test('a shaft destroys turbine power less pump power less generator power', () => {
  const wanted = at('hp.power') + at('lp.power') - at('s.generatorPower')
  expect(at('s.exergyDestroyed') / wanted).toBeCloseTo(1, 12)
})

describe('over the whole plant', () => {
  test('exergy that enters is destroyed, delivered, turned into power, or leaves', () => {
    const destroyed = sum(
      [...Object.values(answer.units), ...Object.values(answer.shafts)].map(
        ({ exergyDestroyed }) => (typeof exergyDestroyed === 'number' ? exergyDestroyed : 0),
      ),
    )
    const { m, h, s } = { m: at('processSteam.m'), h: at('returned.h'), s: at('returned.s') }
    const notReturned = 0.3 * m * (h - T0 * s)
    const entering = at('plant.fuelHeat') + at('economiser.exergySupplied') + exergy('makeupWater')
    const leaving =
      destroyed +
      at('works.exergyDelivered') +
      at('s.generatorPower') -
      at('p1.power') -
      at('p2.power') +
      exergy('blowdown') +
      exergy('vent') +
      notReturned
    expect(leaving / entering).toBeCloseTo(1, 9)
  })

  test('energy that enters leaves', () => {
    const flow = (id: string): number => at(`${id}.m`) * at(`${id}.h`)
    const entering =
      at('plant.heatInput') +
      at('plant.recoveredHeat') +
      flow('makeupWater') +
      at('plant.pumpPower')
    const leaving =
      at('plant.turbinePower') +
      at('plant.heatRejected') +
      at('plant.processHeat') +
      at('line.heatLoss') +
      flow('blowdown') +
      flow('vent') +
      0.3 * at('processSteam.m') * at('returned.h')
    expect(leaving / entering).toBeCloseTo(1, 9)
    expect(at('plant.recoveredHeat')).toBeCloseTo(5e6, 3)
    const heat = at('processSteam.m') * (at('processSteam.h') - at('returned.h'))
    expect(at('plant.processHeat') / heat).toBeCloseTo(1, 12)
  })

  test('what enters as mass leaves: make-up = blowdown + vent + steam not returned', () => {
    const lost = at('blowdown.m') + at('vent.m') + 0.3 * at('processSteam.m')
    expect(at('makeupWater.m') / lost).toBeCloseTo(1, 9)
    expect(answer.closure!.mass).toBeLessThanOrEqual(1e-9)
    expect(answer.closure!.energy).toBeLessThanOrEqual(1e-9)
    expect(Object.keys(parts.units)).toContain(answer.closure!.worstUnit)
  })

  test('the ambient temperature changes exergy, and nothing else', () => {
    const warmer = solvedAnswerOf({ ...parts, ambient: T0 + 10 })
    expect(warmer.at('plant.netPower')).toBe(at('plant.netPower'))
    expect(warmer.at('lp.entropyGenerated')).toBe(at('lp.entropyGenerated'))
    const ratio = warmer.at('lp.exergyDestroyed') / at('lp.exergyDestroyed')
    expect(ratio).toBeCloseTo((T0 + 10) / T0, 10)
  })
})
