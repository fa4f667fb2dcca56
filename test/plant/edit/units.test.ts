import { describe, expect, test } from 'vitest'
import { standardCatalogue } from '../../../src/plant/catalogue.ts'
import type { Given } from '../../../src/plant/document.ts'
import { EditRefused } from '../../../src/plant/edit/edit-refused.ts'
import { setGiven, whyNotGiven } from '../../../src/plant/edit/set-given.ts'
import { putOnShaft, setGenerator } from '../../../src/plant/edit/shafts.ts'
import { canInsertOnStream, insertOnStream, setBends } from '../../../src/plant/edit/streams.ts'
import { setTitle } from '../../../src/plant/edit/titles.ts'
import {
  addUnit,
  mirrorUnits,
  moveUnits,
  placeUnits,
  setLabel,
  setOption,
} from '../../../src/plant/edit/units.ts'
import { emptyPlant } from '../../../src/plant/empty-plant.ts'
import { givenOf, quantitiesOf } from '../../../src/plant/quantities.ts'
import { readPlant } from '../../../src/plant/read-plant.ts'
import { writePlant } from '../../../src/plant/write-plant.ts'
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

describe('a new plant', () => {
  test('shows that it assumes no other auxiliary power', () => {
    const { layouts } = emptyPlant()
    expect(layouts).toHaveLength(1)
    expect(layouts[0]?.plant.given).toEqual({ otherAuxiliary: 0 })
    expect(layouts[0]?.ambient).toEqual({ T: 298.15, p: 101325 })
  })
})

describe('adding a unit', () => {
  test('its usual quantities are given, in sight', () => {
    const { plant, id } = addUnit(emptyPlant('', invented), base, 'kettle', [8, 16], invented)
    expect(id).toBe('kettle1')
    expect(layoutOf(plant).units).toEqual([
      { id: 'kettle1', kind: 'kettle', label: 'Kettle', at: [8, 16], given: { warmth: 0.9 } },
    ])
  })

  test('ids and labels are the first that are free', () => {
    const plant = plantOf('kettle', 'kettle', 'kettle')
    expect(layoutOf(plant).units.map(({ id, label }) => [id, label])).toEqual([
      ['kettle1', 'Kettle'],
      ['kettle2', 'Kettle 2'],
      ['kettle3', 'Kettle 3'],
    ])
    const taken = withParts(plantOf('mill'), (layout) => ({
      ...layout,
      shafts: layout.shafts.map((shaft) => ({ ...shaft, id: 'kettle1' })),
    }))
    expect(addUnit(taken, base, 'kettle', [0, 0], invented).id).toBe('kettle2')
  })

  test('what drives a shaft is put on the first with a generator, or on a new one', () => {
    const one = plantOf('mill')
    expect(layoutOf(one).shafts).toEqual([
      { id: 'shaft1', turbines: ['mill1'], pumps: [], given: { loss: 0, dynamoSkill: 0.98 } },
    ])
    const without = setGenerator(one, base, 'shaft1', false, invented)
    const two = addUnit(without, base, 'mill', [0, 0], invented).plant
    expect(layoutOf(two).shafts.map(({ turbines }) => turbines)).toEqual([['mill1'], ['mill2']])
    const three = addUnit(two, base, 'mill', [0, 0], invented).plant
    expect(layoutOf(three).shafts[1]?.turbines).toEqual(['mill2', 'mill3'])
    expect(layoutOf(addUnit(three, base, 'lifter', [0, 0], invented).plant).shafts).toEqual(
      layoutOf(three).shafts,
    )
  })

  test('a kind that is not known is refused', () => {
    expect(() => addUnit(emptyPlant(), base, 'perpetuum', [0, 0])).toThrow(EditRefused)
    expect(() => addUnit(emptyPlant(), 'nowhere', 'boiler', [0, 0])).toThrow(EditRefused)
  })

  test.each(standardCatalogue.kinds.map(({ name }) => name))(
    '%s: arrives with every usual quantity given, and in a file that can be read',
    (kind) => {
      const { plant, id } = addUnit(emptyPlant(), base, kind, [0, 0])
      const unit = unitOf(plant, id)
      for (const { name, description } of quantitiesOf(layoutOf(plant), unit)) {
        expect(unit.given[name]).toBe(description.given ? description.usual : undefined)
      }
      expect(readPlant(writePlant(plant))).toEqual({ outcome: 'plant', plant, repairs: [] })
    },
  )
})

describe('giving and freeing', () => {
  const plant = tappedMill()

  test('of units, streams, shafts and the plant', () => {
    for (const path of ['mill1.skill2', 's1.m', 'shaft1.loss', 'plant.netPower']) {
      const given = setGiven(plant, base, path, 5, invented)
      expect(givenOf(layoutOf(given), path)).toBe(5)
      expect(setGiven(given, base, path, 5, invented)).toBe(given)
      expect(givenOf(layoutOf(setGiven(given, base, path, undefined, invented)), path)).toBe(
        undefined,
      )
    }
    expect(setGiven(plant, base, 's1.m', undefined, invented)).toBe(plant)
  })

  test('minus zero is zero', () => {
    const given = givenOf(layoutOf(setGiven(plant, base, 's1.m', -0, invented)), 's1.m')
    expect(Object.is(given, 0)).toBe(true)
  })

  test.each<[string, Given, RegExp]>([
    ['s1.v', 1, /no quantity s1\.v/],
    ['ghost.m', 1, /no quantity ghost\.m/],
    ['plant', 1, /no quantity plant/],
    ['mill1.constructor', 1, /no quantity/],
    ['s1.m', Number.NaN, /not finite/],
    [
      's1.m',
      {
        against: 's1.m',
        points: [
          [0, 1],
          [1, 1],
        ],
      },
      /cannot depend on the quantity/,
    ],
    [
      's1.m',
      {
        against: 's1.q',
        points: [
          [0, 1],
          [1, 1],
        ],
      },
      /no quantity s1\.q/,
    ],
    [
      's1.m',
      {
        against: 's1.p',
        points: [
          [1, 1],
          [0, 1],
        ],
      },
      /do not rise/,
    ],
    ['s1.m', { against: 's1.p', points: [[1, 1]] }, /at least two points/],
  ])('%s cannot be given %j', (path, given, why) => {
    expect(whyNotGiven(layoutOf(plant), path, given, invented)).toMatch(why)
    expect(() => setGiven(plant, base, path, given, invented)).toThrow(EditRefused)
  })
})

describe('options', () => {
  test('bring their quantities at the usual values, and take them away', () => {
    const plant = tappedMill()
    const on = setOption(plant, base, 'mill1', 'lifting', true, invented)
    expect(unitOf(on, 'mill1').options).toEqual({ lifting: true })
    expect(unitOf(on, 'mill1').given).toMatchObject({ lift1: 0.1, lift2: 0.1, lift3: 0.1 })
    expect(setOption(on, base, 'mill1', 'lifting', true, invented)).toBe(on)
    const curved = withGivensOf(on, 'tub1', {
      pressure: {
        against: 'mill1.lift2',
        points: [
          [0, 1],
          [1, 2],
        ],
      },
    })
    const off = setOption(curved, base, 'mill1', 'lifting', false, invented)
    expect(unitOf(off, 'mill1')).toEqual(unitOf(plant, 'mill1'))
    expect(unitOf(off, 'tub1').given).toEqual({})
  })

  test('lists, and none', () => {
    const held = setOption(tappedMill(), base, 'mill1', 'heldTaps', [2], invented)
    expect(unitOf(held, 'mill1').options).toEqual({ heldTaps: [2] })
    expect(setOption(held, base, 'mill1', 'heldTaps', [2], invented)).toBe(held)
    const none = setOption(held, base, 'mill1', 'heldTaps', [], invented)
    expect(unitOf(none, 'mill1')).not.toHaveProperty('options')
  })

  test('that a kind does not have are refused', () => {
    const plant = tappedMill()
    expect(() => setOption(plant, base, 'tub1', 'lifting', true, invented)).toThrow(EditRefused)
    expect(() => setOption(plant, base, 'mill1', 'lifting', [1], invented)).toThrow('yes or no')
    expect(() => setOption(plant, base, 'mill1', 'heldTaps', true, invented)).toThrow('a list')
  })
})

describe('putting a unit into a stream', () => {
  test('the stream ends at it, a new one runs on', () => {
    const plant = withParts(
      connected(plantOf('tub', 'kettle', 'lifter'), ['tub1.outlet', 'kettle1.water']),
      (layout) => ({
        ...layout,
        streams: layout.streams.map((one) => ({
          ...one,
          given: { p: 1e5 },
          bends: [[1, 1]] as const,
        })),
      }),
    )
    const after = insertOnStream(plant, base, 's1', 'lifter1', undefined, invented)
    expect(after.id).toBe('s2')
    expect(layoutOf(after.plant).streams).toEqual([
      { id: 's1', from: 'tub1.outlet', to: 'lifter1.inlet', given: { p: 1e5 } },
      { id: 's2', from: 'lifter1.outlet', to: 'kettle1.water', given: {} },
    ])
  })

  test('by the ports that are named, or the likeliest that fit', () => {
    const plant = connected(plantOf('kettle', 'mill', 'fork', 'twin', 'mill'), [
      'kettle1.steam',
      'mill1.inlet',
    ])
    const forked = insertOnStream(
      plant,
      base,
      's1',
      'fork1',
      { inlet: 'inlet', outlet: 'outlet1' },
      invented,
    )
    expect(endsOf(forked.plant)).toEqual({
      s1: 'kettle1.steam > fork1.inlet',
      s2: 'fork1.outlet1 > mill1.inlet',
    })
    const twinned = insertOnStream(plant, base, 's1', 'twin1', undefined, invented)
    expect(endsOf(twinned.plant)).toEqual({
      s1: 'kettle1.steam > twin1.hot',
      s2: 'twin1.hotOutlet > mill1.inlet',
    })
    const milled = insertOnStream(plant, base, 's1', 'mill2', undefined, invented)
    expect(endsOf(milled.plant).s2).toBe('mill2.exhaust > mill1.inlet')
  })

  test('is refused where the stream cannot run through', () => {
    const plant = connected(plantOf('kettle', 'mill', 'lifter'), ['kettle1.steam', 'mill1.inlet'])
    expect(canInsertOnStream(layoutOf(plant), 's1', 'lifter1', undefined, invented)).toMatchObject({
      why: 'Steam of Kettle carries steam, and Port of Lifter takes water.',
    })
    expect(canInsertOnStream(layoutOf(plant), 's1', 'mill1', undefined, invented)).toMatchObject({
      why: 'The stream is connected to this unit already.',
    })
    expect(() => insertOnStream(plant, base, 's1', 'lifter1', undefined, invented)).toThrow(
      EditRefused,
    )
  })
})

describe('shafts', () => {
  test('turbines and pumps move from one to another', () => {
    const plant = plantOf('mill', 'mill', 'lifter')
    const apart = putOnShaft(plant, base, 'mill2', 'new', invented)
    expect(layoutOf(apart).shafts).toMatchObject([
      { id: 'shaft1', turbines: ['mill1'] },
      { id: 'shaft2', turbines: ['mill2'], given: { loss: 0, dynamoSkill: 0.98 } },
    ])
    const driven = putOnShaft(apart, base, 'lifter1', 'shaft2', invented)
    expect(layoutOf(driven).shafts[1]?.pumps).toEqual(['lifter1'])
    const together = putOnShaft(driven, base, 'mill1', 'shaft2', invented)
    expect(layoutOf(together).shafts).toMatchObject([
      { id: 'shaft2', turbines: ['mill2', 'mill1'] },
    ])
    expect(putOnShaft(together, base, 'mill1', 'shaft2', invented)).toBe(together)
    expect(
      layoutOf(putOnShaft(together, base, 'lifter1', null, invented)).shafts[0]?.pumps,
    ).toEqual([])
    expect(() => putOnShaft(plant, base, 'lifter1', 'new', invented)).toThrow('needs a turbine')
    expect(() => putOnShaft(plant, base, 'mill1', 'ghost', invented)).toThrow('no shaft ghost')
  })

  test('without a generator its quantities go, with one they are usual again', () => {
    const plant = plantOf('mill')
    const off = setGenerator(plant, base, 'shaft1', false, invented)
    expect(layoutOf(off).shafts[0]).toMatchObject({ generator: false, given: { loss: 0 } })
    expect(setGenerator(off, base, 'shaft1', true, invented)).toEqual(plant)
  })
})

describe('drawing', () => {
  const plant = connected(
    plantOf('kettle', 'mill', 'tub'),
    ['kettle1.steam', 'mill1.inlet'],
    ['mill1.tap', 'tub1.steam'],
  )

  test('units move, and bends between two of them along', () => {
    const bent = setBends(setBends(plant, base, 's1', [[10, 20]]), base, 's2', [[30, 40]])
    const moved = moveUnits(bent, base, ['kettle1', 'mill1'], [8, -8])
    expect(unitOf(moved, 'mill1').at).toEqual([168, -8])
    expect(unitOf(moved, 'tub1').at).toEqual([320, 0])
    expect(layoutOf(moved).streams.map(({ bends }) => bends)).toEqual([[[18, 12]], [[30, 40]]])
    expect(moveUnits(plant, base, ['kettle1'], [0, 0])).toBe(plant)
    expect(unitOf(placeUnits(plant, base, { tub1: [5, 6] }), 'tub1').at).toEqual([5, 6])
    expect(placeUnits(plant, base, { tub1: [320, 0] })).toBe(plant)
  })

  test('bends go when there are none', () => {
    const bent = setBends(plant, base, 's1', [[10, 20]])
    expect(setBends(bent, base, 's1', [[10, 20]])).toBe(bent)
    expect(setBends(bent, base, 's1', [])).toEqual(plant)
    expect(setBends(plant, base, 's1', [])).toBe(plant)
  })

  test('mirrored twice is as before', () => {
    const once = mirrorUnits(plant, base, ['mill1'])
    expect(unitOf(once, 'mill1').mirrored).toBe(true)
    expect(mirrorUnits(once, base, ['mill1'])).toEqual(plant)
  })

  test('labels and titles', () => {
    expect(unitOf(setLabel(plant, base, 'mill1', 'HP'), 'mill1').label).toBe('HP')
    const named = setLabel(plant, base, 's1', 'Main steam')
    expect(layoutOf(named).streams[0]?.label).toBe('Main steam')
    expect(setLabel(named, base, 's1', '')).toEqual(plant)
    expect(layoutOf(setLabel(plant, base, 'shaft1', 'Set 1')).shafts[0]?.label).toBe('Set 1')
    expect(setLabel(plant, base, 'mill1', 'Mill')).toBe(plant)
    expect(setTitle(plant, 'Tarn Vale').title).toBe('Tarn Vale')
    expect(setTitle(plant, plant.title)).toBe(plant)
  })
})
