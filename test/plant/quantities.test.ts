import { describe, expect, test } from 'vitest'
import { setGenerator } from '../../src/plant/edit/shafts.ts'
import { setLabel, setOption } from '../../src/plant/edit/units.ts'
import { findPort, portsOf, separateLines } from '../../src/plant/ports.ts'
import { describeQuantity, givenOf, labelOf, quantitiesOfId } from '../../src/plant/quantities.ts'
import { base, connected, layoutOf, plantOf, tappedMill, unitOf } from './edit/sample-plant.ts'
import { invented } from './invented-catalogue.ts'

const paths = (plant: ReturnType<typeof plantOf>, id: string) =>
  quantitiesOfId(layoutOf(plant), id, invented).map(({ path }) => path)

describe('the quantities there are', () => {
  test('follow options and streams, numbered ones from 1', () => {
    const mill = plantOf('mill', 'tub')
    expect(paths(mill, 'mill1')).toEqual(['mill1.skill1', 'mill1.throat1', 'mill1.power'])
    const tapped = setOption(
      connected(mill, ['mill1.tap', 'tub1.steam']),
      base,
      'mill1',
      'lifting',
      true,
      invented,
    )
    expect(paths(tapped, 'mill1')).toEqual([
      'mill1.skill1',
      'mill1.skill2',
      'mill1.throat1',
      'mill1.throat2',
      'mill1.lift1',
      'mill1.power',
    ])
    expect(paths(mill, 'kettle1')).toEqual([])
  })

  test('of streams, shafts and the plant', () => {
    const plant = tappedMill()
    expect(paths(plant, 's1')).toEqual(['s1.m', 's1.p', 's1.T'])
    expect(paths(plant, 'shaft1')).toEqual([
      'shaft1.loss',
      'shaft1.dynamoSkill',
      'shaft1.dynamoPower',
    ])
    expect(paths(setGenerator(plant, base, 'shaft1', false, invented), 'shaft1')).toEqual([
      'shaft1.loss',
    ])
    expect(paths(plant, 'plant')).toEqual(['plant.netPower', 'plant.otherAuxiliary'])
  })

  test('are described by path, with their owner', () => {
    const layout = layoutOf(tappedMill())
    expect(describeQuantity(layout, 'mill1.skill2', invented)).toMatchObject({
      path: 'mill1.skill2',
      owner: 'mill1',
      ownerType: 'unit',
      ownerLabel: 'Mill',
      label: 'Skill 2',
      number: 2,
      dimension: 'ratio',
    })
    expect(describeQuantity(layout, 's1.m', invented)).toMatchObject({
      ownerLabel: 'Kettle to mill',
      dimension: 'massFlow',
    })
    for (const path of ['mill1.skill5', 'mill1', 'ghost.m', 'mill1.toString', '.m', 's1.']) {
      expect(describeQuantity(layout, path, invented)).toBeUndefined()
      expect(givenOf(layout, path)).toBeUndefined()
    }
    // A single one needs no number in its label.
    expect(describeQuantity(layoutOf(plantOf('mill')), 'mill1.skill1', invented)?.label).toBe(
      'Skill',
    )
  })
})

describe('labels', () => {
  test('of a stream: its own, or its ends', () => {
    const plant = tappedMill()
    expect(labelOf(layoutOf(plant), 's2')).toBe('Mill to tub')
    expect(labelOf(layoutOf(setLabel(plant, base, 'mill1', 'LP')), 's1')).toBe('Kettle to LP')
    expect(labelOf(layoutOf(setLabel(plant, base, 's2', 'First bleed')), 's2')).toBe('First bleed')
    expect(labelOf(layoutOf(plant), 'shaft1')).toBe('Shaft')
    expect(labelOf(layoutOf(plant), 'plant')).toBe('Plant')
    expect(labelOf(layoutOf(setLabel(plant, base, 'mill1', ' ')), 'mill1')).toBe('mill1')
    expect(labelOf(layoutOf(plant), 'ghost')).toBe('ghost')
  })
})

describe('ports', () => {
  test('those in use and the next free one of each repeated port', () => {
    const plant = connected(plantOf('mill', 'tub'), ['mill1.tap', 'tub1.steam'])
    const ports = portsOf(layoutOf(plant), unitOf(plant, 'mill1'), invented)
    expect(ports.map(({ name, stream }) => [name, stream])).toEqual([
      ['inlet', undefined],
      ['tap1', 's1'],
      ['tap2', undefined],
      ['exhaust', undefined],
    ])
    const tub = portsOf(layoutOf(plant), unitOf(plant, 'tub1'), invented)
    expect(tub.map(({ name, port }) => `${name} ${port}`)).toEqual([
      'steam1 steam',
      'steam2 steam',
      'drain1 drainInlet',
      'drain drain',
      'outlet outlet',
    ])
  })

  test('are found by name; a name that two share by its direction', () => {
    const layout = layoutOf(plantOf('tub'))
    const found = (name: string, direction?: 'in' | 'out') => {
      const address = findPort(layout, `tub1.${name}`, invented, direction)
      return address && [address.port, address.number]
    }
    expect(found('drain')).toEqual(['drain', undefined])
    expect(found('drain', 'in')).toEqual(['drainInlet', undefined])
    expect(found('drain3')).toEqual(['drainInlet', 3])
    expect(found('steam')).toEqual(['steam', undefined])
    expect(found('drain03')).toBeUndefined()
    expect(found('hasOwnProperty')).toBeUndefined()
  })

  test('of separate lines through a unit', () => {
    const twin = invented.kindNamed('twin')
    if (!twin) throw new Error('no twin')
    expect(separateLines(twin, 'hotOutlet', 'cold')).toBe(true)
    expect(separateLines(twin, 'hotOutlet', 'hot')).toBe(false)
  })
})
