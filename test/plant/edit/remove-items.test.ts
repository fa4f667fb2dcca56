import { describe, expect, test } from 'vitest'
import { removeItems } from '../../../src/plant/edit/remove-items.ts'
import { putOnShaft } from '../../../src/plant/edit/shafts.ts'
import { invented } from '../invented-catalogue.ts'
import {
  base,
  connected,
  endsOf,
  layoutOf,
  plantOf,
  tappedMill,
  unitOf,
  withGivensOf,
  withParts,
} from './sample-plant.ts'

const without = (plant: ReturnType<typeof plantOf>, ...ids: string[]) =>
  removeItems(plant, base, ids, invented)

describe('removing', () => {
  test('a unit takes its streams with it', () => {
    const after = without(tappedMill(), 'kettle1')
    expect(layoutOf(after).units.map(({ id }) => id)).toEqual(['mill1', 'tub1'])
    expect(Object.keys(endsOf(after))).toEqual(['s2', 's3', 's4'])
  })

  test('nothing, or what is not there, changes nothing', () => {
    const plant = tappedMill()
    expect(without(plant)).toBe(plant)
    expect(without(plant, 'ghost')).toBe(plant)
  })

  test('what is not touched is shared', () => {
    const plant = tappedMill()
    const after = without(plant, 's4')
    expect(layoutOf(after).units[0]).toBe(layoutOf(plant).units[0])
    expect(layoutOf(after).streams[0]).toBe(layoutOf(plant).streams[0])
    expect(layoutOf(after).cases).toBe(layoutOf(plant).cases)
  })

  test('numbers close up, and numbered givens move along', () => {
    const plant = withParts(
      withGivensOf(tappedMill(), 'mill1', {
        skill1: 0.81,
        skill2: 0.82,
        skill3: 0.83,
        skill4: { against: 'mill1.throat1', power: { at: 1, value: 0.8, exponent: 1 } },
        throat1: 1,
        throat3: 3,
        throat4: 4,
      }),
      (layout) => ({
        ...layout,
        units: layout.units.map((unit) =>
          unit.id === 'mill1'
            ? { ...unit, options: { heldTaps: [2, 3], origins: [1, 2, 3, 4] } }
            : unit,
        ),
        streams: layout.streams.map((stream) =>
          stream.id === 's1'
            ? {
                ...stream,
                given: {
                  m: {
                    against: 'mill1.skill4',
                    points: [
                      [0, 1],
                      [1, 2],
                    ],
                  },
                },
              }
            : stream,
        ),
        cases: [
          {
            id: 'c',
            name: 'C',
            given: { 'mill1.skill2': 0.5, 's3.p': 1e5, 'mill1.skill4': 0.6 },
            free: ['mill1.throat4', 's3.T', 's1.m'],
          },
        ],
      }),
    )
    // The second tap: the stretches before and after it become one.
    const after = without(plant, 's3')
    expect(endsOf(after)).toEqual({
      s1: 'kettle1.steam > mill1.inlet',
      s2: 'mill1.tap1 > tub1.steam1',
      s4: 'mill1.tap2 > tub1.steam2',
    })
    const mill = unitOf(after, 'mill1')
    expect(mill.given).toEqual({
      skill1: 0.81,
      skill2: 0.83,
      skill3: { against: 'mill1.throat1', power: { at: 1, value: 0.8, exponent: 1 } },
      throat1: 1,
      // Of the merged stretch no throat is known; the one after it keeps its own.
      throat3: 4,
    })
    expect(mill.options).toEqual({ heldTaps: [2], origins: [1, 3, 4] })
    expect(layoutOf(after).streams[0]?.given).toEqual({
      m: {
        against: 'mill1.skill3',
        points: [
          [0, 1],
          [1, 2],
        ],
      },
    })
    expect(layoutOf(after).cases).toEqual([
      { id: 'c', name: 'C', given: { 'mill1.skill3': 0.6 }, free: ['mill1.throat3', 's1.m'] },
    ])
  })

  test('several streams of a port at once', () => {
    const plant = withGivensOf(tappedMill(), 'mill1', {
      skill1: 0.81,
      skill2: 0.82,
      skill3: 0.83,
      skill4: 0.84,
    })
    const after = without(plant, 's2', 's4')
    expect(endsOf(after)).toEqual({
      s1: 'kettle1.steam > mill1.inlet',
      s3: 'mill1.tap1 > tub1.steam1',
    })
    expect(unitOf(after, 'mill1').given).toEqual({ skill1: 0.82, skill2: 0.84 })
  })

  test('quantities that go with a stream are freed, curves against them too', () => {
    const dripping = connected(plantOf('kettle', 'lifter'), ['kettle1.drip', 'lifter1.inlet'])
    const plant = withGivensOf(dripping, 'lifter1', {
      skill: {
        against: 'kettle1.dripFraction',
        points: [
          [0, 0.5],
          [1, 0.6],
        ],
      },
    })
    const after = without(plant, 's1')
    expect(unitOf(after, 'kettle1').given).toEqual({ warmth: 0.9 })
    expect(unitOf(after, 'lifter1').given).toEqual({})
  })

  test('cases forget units that are no more', () => {
    const plant = withParts(tappedMill(), (layout) => ({
      ...layout,
      cases: [{ id: 'c', name: 'C', outOfService: ['tub1', 'mill1'] }],
    }))
    expect(layoutOf(without(plant, 'tub1')).cases[0]?.outOfService).toEqual(['mill1'])
  })
})

describe('shafts', () => {
  const two = putOnShaft(plantOf('mill', 'mill', 'lifter'), base, 'lifter1', 'shaft1', invented)

  test('a turbine leaves its shaft; the shaft goes with its last one', () => {
    expect(layoutOf(two).shafts).toMatchObject([
      { turbines: ['mill1', 'mill2'], pumps: ['lifter1'] },
    ])
    const one = without(two, 'mill1')
    expect(layoutOf(one).shafts).toMatchObject([{ turbines: ['mill2'], pumps: ['lifter1'] }])
    expect(layoutOf(without(one, 'mill2')).shafts).toEqual([])
    expect(layoutOf(without(two, 'lifter1')).shafts).toMatchObject([{ pumps: [] }])
  })

  test('a shaft can go by itself', () => {
    const after = without(two, 'shaft1')
    expect(layoutOf(after).shafts).toEqual([])
    expect(layoutOf(after).units).toHaveLength(3)
  })
})
