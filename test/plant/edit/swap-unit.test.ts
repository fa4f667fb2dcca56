import { describe, expect, test } from 'vitest'
import type { Plant } from '../../../src/plant/document.ts'
import { connect } from '../../../src/plant/edit/connect.ts'
import { setGiven } from '../../../src/plant/edit/set-given.ts'
import { swapUnit } from '../../../src/plant/edit/swap-unit.ts'
import { addUnit, setLabel } from '../../../src/plant/edit/units.ts'
import { emptyPlant } from '../../../src/plant/empty-plant.ts'
import { readPlant } from '../../../src/plant/read-plant.ts'
import { writePlant } from '../../../src/plant/write-plant.ts'
import { base, endsOf, layoutOf, unitOf } from './sample-plant.ts'

function plantOf(...kinds: string[]): Plant {
  return kinds.reduce(
    (plant, kind, i) => addUnit(plant, base, kind, [160 * i, 0]).plant,
    emptyPlant('Harrow Fen'),
  )
}

const linked = (plant: Plant, ...pairs: (readonly [string, string])[]): Plant =>
  pairs.reduce((one, [a, b]) => connect(one, base, a, b).plant, plant)

function swap(plant: Plant, id: string, kind: string) {
  const result = swapUnit(plant, base, id, kind)
  const read = readPlant(writePlant(result.plant))
  expect(read.outcome === 'plant' && read.repairs).toEqual([])
  return result
}

describe('swapping a unit for another kind', () => {
  test('a surface heater becomes a mixing heater: steam, water, drain in and outlet stay', () => {
    const plant = linked(
      plantOf('pump', 'surfaceHeater', 'boiler', 'turbine', 'surfaceHeater', 'condenser'),
      ['pump1.discharge', 'heater1.water'],
      ['heater1.outlet', 'boiler1.feedwater'],
      ['turbine1.bleed', 'heater1.steam'],
      ['heater2.drain', 'heater1.drain'],
      ['heater1.drain', 'condenser1.drain'],
    )
    const after = swap(plant, 'heater1', 'mixingHeater')
    expect(after.dropped).toEqual(['s5'])
    expect(endsOf(after.plant)).toEqual({
      s1: 'pump1.discharge > heater1.water1',
      s2: 'heater1.outlet > boiler1.feedwater',
      s3: 'turbine1.bleed1 > heater1.steam1',
      s4: 'heater2.drain > heater1.drain1',
    })
    expect(unitOf(after.plant, 'heater1')).toMatchObject({
      kind: 'mixingHeater',
      label: 'Mixing heater',
      given: { subcooling: 0 },
    })
    expect(unitOf(after.plant, 'heater1').given).not.toHaveProperty('terminalDifference')
  })

  test('givens of the same name, streams and a name of its own stay', () => {
    let plant = linked(
      plantOf('boiler', 'pipe', 'turbine'),
      ['boiler1.steam', 'pipe1.inlet'],
      ['pipe1.outlet', 'turbine1.inlet'],
    )
    plant = setGiven(plant, base, 's2.p', 1e7)
    plant = setLabel(plant, base, 'pipe1', 'Stop valve')
    const after = swap(plant, 'pipe1', 'valve')
    expect(after.dropped).toEqual([])
    expect(endsOf(after.plant)).toEqual(endsOf(plant))
    expect(unitOf(after.plant, 'pipe1')).toMatchObject({ kind: 'valve', label: 'Stop valve' })
    expect(layoutOf(after.plant).streams[1]?.given).toEqual({ p: 1e7 })
  })

  test('a turbine takes and leaves its place on the shaft', () => {
    const plant = plantOf('turbine', 'valve')
    const gone = swap(plant, 'turbine1', 'valve').plant
    expect(layoutOf(gone).shafts).toEqual([])
    const come = swap(plant, 'valve1', 'turbine').plant
    expect(layoutOf(come).shafts[0]?.turbines).toEqual(['turbine1', 'valve1'])
    expect(unitOf(come, 'valve1').given).toHaveProperty('groupEfficiency1')
  })

  test('the same kind changes nothing; a kind or unit that is not there is refused', () => {
    const plant = plantOf('valve')
    expect(swap(plant, 'valve1', 'valve').plant).toBe(plant)
    expect(() => swapUnit(plant, base, 'valve1', 'kettle')).toThrow('no kind of unit')
    expect(() => swapUnit(plant, base, 'ghost', 'pipe')).toThrow('no unit ghost')
  })
})
