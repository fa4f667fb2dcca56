import { describe, expect, test } from 'vitest'
import {
  canConnect,
  canReconnect,
  connect,
  reconnect,
  renumberPort,
} from '../../../src/plant/edit/connect.ts'
import { EditRefused } from '../../../src/plant/edit/edit-refused.ts'
import { setGiven } from '../../../src/plant/edit/set-given.ts'
import { setBends } from '../../../src/plant/edit/streams.ts'
import { setOption } from '../../../src/plant/edit/units.ts'
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

describe('connecting', () => {
  const plant = plantOf('kettle', 'mill', 'tub', 'lifter', 'fork', 'twin')
  const judge = (a: string, b: string, of = plant) => canConnect(layoutOf(of), a, b, {}, invented)

  test('decides the direction, whichever end comes first', () => {
    const forth = connect(plant, base, 'kettle1.steam', 'mill1.inlet', {}, invented)
    const back = connect(plant, base, 'mill1.inlet', 'kettle1.steam', {}, invented)
    expect(forth.id).toBe('s1')
    expect(endsOf(forth.plant)).toEqual({ s1: 'kettle1.steam > mill1.inlet' })
    expect(back).toEqual(forth)
  })

  test('the bare name of a repeated port takes the next free number', () => {
    expect(endsOf(tappedMill())).toEqual({
      s1: 'kettle1.steam > mill1.inlet',
      s2: 'mill1.tap1 > tub1.steam1',
      s3: 'mill1.tap2 > tub1.steam2',
      s4: 'mill1.tap3 > tub1.steam3',
    })
  })

  test('the number that is next may be named', () => {
    const { plant: after } = connect(plant, base, 'mill1.tap1', 'tub1.steam1', {}, invented)
    expect(endsOf(after)).toEqual({ s1: 'mill1.tap1 > tub1.steam1' })
  })

  test('where an outlet and numbered inlets share a name, the one that fits is meant', () => {
    const two = plantOf('tub', 'tub')
    const { plant: after } = connect(two, base, 'tub1.drain', 'tub2.drain', {}, invented)
    expect(endsOf(after)).toEqual({ s1: 'tub1.drain > tub2.drain1' })
    const again = connect(after, base, 'tub1.outlet', 'tub2.drain', {}, invented)
    expect(endsOf(again.plant).s2).toBe('tub1.outlet > tub2.drain2')
  })

  test.each([
    ['kettle1.steam', 'mill1.exhaust', /Both ends are outlets/],
    ['mill1.inlet', 'tub1.steam', /Both ends are inlets/],
    [
      'kettle1.steam',
      'lifter1.inlet',
      /Steam of Kettle carries steam, and Port of Lifter takes water/,
    ],
    ['lifter1.outlet', 'mill1.inlet', /carries water, and .* takes steam/],
    ['lifter1.outlet', 'lifter1.inlet', /straight back into it/],
    ['mill1.tap', 'mill1.inlet', /straight back into it/],
    ['twin1.hotOutlet', 'twin1.hot', /straight back into it/],
    ['kettle1.steam', 'kettle1.vapour', /There is no port kettle1.vapour/],
    ['nothing.steam', 'mill1.inlet', /There is no port nothing.steam/],
    ['mill1.tap2', 'tub1.steam1', /The next free one is Tap 1 of Mill/],
  ])('%s to %s is refused', (a, b, why) => {
    const answer = judge(a, b)
    expect(answer.allowed).toBe(false)
    if (!answer.allowed) expect(answer.why).toMatch(why)
    if (!answer.allowed) expect(answer.why).toMatch(/^[A-Z].*\.$/)
    expect(() => connect(plant, base, a, b, {}, invented)).toThrow(EditRefused)
  })

  test.each([
    ['kettle1.steam', 'fork1.inlet'],
    ['fork1.outlet', 'lifter1.inlet'],
    ['fork1.outlet', 'mill1.inlet'],
    ['tub1.outlet', 'kettle1.water'],
    // From one line of a unit to its other.
    ['twin1.hotOutlet', 'twin1.cold'],
  ])('%s to %s is allowed', (a, b) => {
    expect(judge(a, b)).toEqual({ allowed: true })
  })

  test('a port takes one stream', () => {
    const one = connected(plant, ['kettle1.steam', 'mill1.inlet'])
    expect(judge('kettle1.steam', 'tub1.steam', one)).toMatchObject({
      why: 'Steam of Kettle is connected already, to s1.',
    })
    expect(judge('mill1.tap1', 'tub1.steam', tappedMill())).toMatchObject({
      why: 'Tap 1 of Mill is connected already, to s2.',
    })
  })
})

describe('what comes with a stream', () => {
  test('quantities of a port that is used arrive at their usual values', () => {
    const plant = connected(plantOf('kettle', 'lifter'), ['kettle1.drip', 'lifter1.inlet'])
    expect(unitOf(plant, 'kettle1').given).toEqual({ warmth: 0.9, dripFraction: 0.01 })
  })

  test('a tap parts the last stretch: both parts keep what was given for it', () => {
    const plain = plantOf('mill', 'tub')
    const given = setGiven(plain, base, 'mill1.skill1', 0.85, invented)
    const throat = setGiven(given, base, 'mill1.throat1', 2, invented)
    const plant = connected(throat, ['mill1.tap', 'tub1.steam'])
    // The throat was known of the whole stretch only.
    expect(unitOf(plant, 'mill1').given).toEqual({ skill1: 0.85, skill2: 0.85 })
  })

  test('a tap is put between two others', () => {
    const plant = withParts(
      withGivensOf(tappedMill(), 'mill1', {
        skill1: 0.81,
        skill2: 0.82,
        skill3: {
          against: 'mill1.skill4',
          points: [
            [0, 0.5],
            [1, 0.9],
          ],
        },
        skill4: 0.84,
        throat2: 2,
        throat3: 3,
      }),
      (layout) => ({
        ...layout,
        units: layout.units.map((unit) =>
          unit.id === 'mill1'
            ? { ...unit, options: { lifting: true, heldTaps: [1, 3], origins: [1, 2, 3, 4] } }
            : unit,
        ),
        cases: [{ id: 'c', name: 'C', given: { 'mill1.skill2': 0.7 }, free: ['mill1.skill3'] }],
      }),
    )
    const options = { insert: true }
    const after = connect(plant, base, 'mill1.tap2', 'tub1.steam1', options, invented)
    expect(after.id).toBe('s5')
    expect(endsOf(after.plant)).toEqual({
      s1: 'kettle1.steam > mill1.inlet',
      s2: 'mill1.tap1 > tub1.steam2',
      s3: 'mill1.tap3 > tub1.steam3',
      s4: 'mill1.tap4 > tub1.steam4',
      s5: 'mill1.tap2 > tub1.steam1',
    })
    const mill = unitOf(after.plant, 'mill1')
    expect(mill.given).toEqual({
      skill1: 0.81,
      // The second stretch is parted: its value holds for both parts, its throat for neither.
      skill2: 0.82,
      skill3: 0.82,
      skill4: {
        against: 'mill1.skill5',
        points: [
          [0, 0.5],
          [1, 0.9],
        ],
      },
      skill5: 0.84,
      throat4: 3,
      lift2: 0.1,
    })
    expect(mill.options).toEqual({ lifting: true, heldTaps: [1, 4], origins: [1, 2, 2, 3, 4] })
    expect(layoutOf(after.plant).cases).toEqual([
      { id: 'c', name: 'C', given: { 'mill1.skill3': 0.7 }, free: ['mill1.skill4'] },
    ])
  })
})

describe('reconnecting', () => {
  const two = connected(
    plantOf('kettle', 'mill', 'mill', 'tub'),
    ['mill1.tap', 'tub1.steam'],
    ['mill1.tap', 'tub1.steam'],
    ['mill2.tap', 'tub1.steam'],
  )

  test('moves one end; the numbers of the port it leaves close up', () => {
    const pressed = setGiven(setBends(two, base, 's1', [[1, 2]]), base, 's1.p', 5e5, invented)
    const after = reconnect(pressed, base, 's1', 'from', 'mill2.tap', invented)
    expect(endsOf(after)).toEqual({
      s1: 'mill2.tap2 > tub1.steam1',
      s2: 'mill1.tap1 > tub1.steam2',
      s3: 'mill2.tap1 > tub1.steam3',
    })
    const [stream] = layoutOf(after).streams
    expect(stream).toEqual({ id: 's1', from: 'mill2.tap2', to: 'tub1.steam1', given: { p: 5e5 } })
    expect(Object.keys(unitOf(after, 'mill1').given).sort()).toEqual(['skill1', 'skill2'])
    expect(Object.keys(unitOf(after, 'mill2').given).sort()).toEqual(['skill1', 'skill2', 'skill3'])
  })

  test('to where it is, changes nothing', () => {
    expect(reconnect(two, base, 's1', 'from', 'mill1.tap', invented)).toBe(two)
    expect(reconnect(two, base, 's1', 'to', 'tub1.steam1', invented)).toBe(two)
  })

  test('is refused where connecting would be', () => {
    const layout = layoutOf(two)
    expect(canReconnect(layout, 's1', 'to', 'kettle1.water', invented)).toMatchObject({
      why: 'Tap of Mill carries steam, and Water of Kettle takes water.',
    })
    expect(canReconnect(layout, 's1', 'to', 'mill2.exhaust', invented)).toMatchObject({
      why: 'A stream ends at an inlet.',
    })
    expect(canReconnect(layout, 's1', 'to', 'mill1.inlet', invented)).toMatchObject({
      allowed: false,
    })
    expect(() => reconnect(two, base, 's1', 'to', 'kettle1.water', invented)).toThrow(EditRefused)
  })
})

describe('renumbering a port', () => {
  test('streams change places; stretches stay, what belongs to a stream goes with it', () => {
    const lifting = setOption(tappedMill(), base, 'mill1', 'lifting', true, invented)
    const plant = withGivensOf(lifting, 'mill1', {
      skill1: 0.81,
      skill4: 0.84,
      lift1: 0.1,
      lift3: 0.3,
    })
    const after = renumberPort(plant, base, 'mill1.tap3', 1, invented)
    expect(endsOf(after)).toMatchObject({
      s2: 'mill1.tap2 > tub1.steam1',
      s3: 'mill1.tap3 > tub1.steam2',
      s4: 'mill1.tap1 > tub1.steam3',
    })
    expect(unitOf(after, 'mill1').given).toEqual({
      skill1: 0.81,
      skill4: 0.84,
      lift1: 0.3,
      lift2: 0.1,
    })
    expect(renumberPort(after, base, 'mill1.tap1', 3, invented)).toEqual(plant)
  })

  test('stays within the numbers there are', () => {
    expect(() => renumberPort(tappedMill(), base, 'mill1.tap1', 4, invented)).toThrow('from 1 to 3')
    expect(() => renumberPort(tappedMill(), base, 'mill1.inlet', 1, invented)).toThrow('no number')
  })
})
