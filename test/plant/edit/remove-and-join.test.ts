import { describe, expect, test } from 'vitest'
import type { Plant } from '../../../src/plant/document.ts'
import { connect } from '../../../src/plant/edit/connect.ts'
import { removeAndJoin } from '../../../src/plant/edit/remove-and-join.ts'
import { setGiven } from '../../../src/plant/edit/set-given.ts'
import { addUnit } from '../../../src/plant/edit/units.ts'
import { emptyPlant } from '../../../src/plant/empty-plant.ts'
import { readPlant } from '../../../src/plant/read-plant.ts'
import { writePlant } from '../../../src/plant/write-plant.ts'
import { base, endsOf, layoutOf } from './sample-plant.ts'

function plantOf(...kinds: string[]): Plant {
  return kinds.reduce(
    (plant, kind, i) => addUnit(plant, base, kind, [160 * i, 0]).plant,
    emptyPlant('Harrow Fen'),
  )
}

const linked = (plant: Plant, ...pairs: (readonly [string, string])[]): Plant =>
  pairs.reduce((one, [a, b]) => connect(one, base, a, b).plant, plant)

function remove(plant: Plant, ...ids: string[]) {
  const result = removeAndJoin(plant, base, ids)
  const read = readPlant(writePlant(result.plant))
  expect(read.outcome === 'plant' && read.repairs).toEqual([])
  return result
}

/** boiler - valve - turbine - condenser - pump - boiler: streams s1 to s5. */
const loop = linked(
  plantOf('boiler', 'valve', 'turbine', 'condenser', 'pump'),
  ['boiler1.steam', 'valve1.inlet'],
  ['valve1.outlet', 'turbine1.inlet'],
  ['turbine1.exhaust', 'condenser1.steam'],
  ['condenser1.condensate', 'pump1.suction'],
  ['pump1.discharge', 'boiler1.feedwater'],
)

describe('removing from a line', () => {
  test('joins it: the stream before keeps its id and givens, and takes over the flow', () => {
    let plant = setGiven(loop, base, 's1.T', 800)
    plant = setGiven(plant, base, 's2.p', 1e7)
    plant = setGiven(plant, base, 's2.m', 50)
    const after = remove(plant, 'valve1')
    expect(after.joined).toEqual(['s1'])
    expect(endsOf(after.plant)).toEqual({
      s1: 'boiler1.steam > turbine1.inlet',
      s3: 'turbine1.exhaust > condenser1.steam1',
      s4: 'condenser1.condensate > pump1.suction',
      s5: 'pump1.discharge > boiler1.feedwater',
    })
    // The pressure was the valve's outlet's: with the valve it goes.
    expect(layoutOf(after.plant).streams[0]?.given).toEqual({ T: 800, m: 50 })
  })

  test('joins nothing where water would meet steam, or a machine is taken out', () => {
    expect(remove(loop, 'condenser1').joined).toEqual([])
    expect(remove(loop, 'boiler1').joined).toEqual([])
    const twice = linked(
      plantOf('boiler', 'turbine', 'turbine'),
      ['boiler1.steam', 'turbine1.inlet'],
      ['turbine1.exhaust', 'turbine2.inlet'],
    )
    expect(remove(twice, 'turbine1').joined).toEqual([])
  })

  test('a heater leaves its water line whole; its steam and drain go', () => {
    const plant = linked(
      plantOf('pump', 'surfaceHeater', 'boiler', 'turbine', 'condenser'),
      ['pump1.discharge', 'heater1.water'],
      ['heater1.outlet', 'boiler1.feedwater'],
      ['turbine1.bleed', 'heater1.steam'],
      ['heater1.drain', 'condenser1.drain'],
    )
    expect(endsOf(remove(plant, 'heater1').plant)).toEqual({
      s1: 'pump1.discharge > boiler1.feedwater',
    })
  })

  test('two units in a row leave one stream', () => {
    const plant = linked(
      plantOf('boiler', 'pipe', 'valve', 'turbine'),
      ['boiler1.steam', 'pipe1.inlet'],
      ['pipe1.outlet', 'valve1.inlet'],
      ['valve1.outlet', 'turbine1.inlet'],
    )
    expect(endsOf(remove(plant, 'valve1', 'pipe1').plant)).toEqual({
      s1: 'boiler1.steam > turbine1.inlet',
    })
  })

  test('the number at the far port stays', () => {
    const plant = linked(
      plantOf('surfaceHeater', 'valve', 'condenser', 'surfaceHeater'),
      ['heater1.drain', 'valve1.inlet'],
      ['valve1.outlet', 'condenser1.drain'],
      ['heater2.drain', 'condenser1.drain'],
    )
    expect(endsOf(remove(plant, 'valve1').plant)).toEqual({
      s1: 'heater1.drain > condenser1.drain1',
      s3: 'heater2.drain > condenser1.drain2',
    })
  })

  test('a branch that is left with one way through goes, and givens behind it stay', () => {
    let plant = linked(
      plantOf('boiler', 'branch', 'turbine', 'mixingHeater'),
      ['boiler1.steam', 'branch1.inlet'],
      ['branch1.outlet', 'turbine1.inlet'],
      ['branch1.outlet', 'mixing1.steam'],
    )
    plant = setGiven(plant, base, 's2.p', 1e7)
    const after = remove(plant, 's3')
    expect(endsOf(after.plant)).toEqual({ s1: 'boiler1.steam > turbine1.inlet' })
    expect(layoutOf(after.plant).streams[0]?.given).toEqual({ p: 1e7 })
    expect(layoutOf(after.plant).units.map(({ kind }) => kind)).not.toContain('branch')
  })

  test('what is not asked for stays', () => {
    expect(remove(loop).plant).toBe(loop)
    const after = remove(loop, 's1').plant
    expect(layoutOf(after).units[2]).toBe(layoutOf(loop).units[2])
  })
})
