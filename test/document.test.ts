import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import {
  emptyPlant,
  formatQuantity,
  kindOf,
  kinds,
  type Layout,
  plantQuantities,
  type QuantityDescription,
  quantitiesOfId,
  readPlant,
  shaftQuantities,
  streamQuantities,
  unitSets,
  writePlant,
} from '../src/document.ts'

/* The door to the plant file and the catalogue, with the registry behind it. */

const folder = new URL('reference/cases/', import.meta.url)
const files = readdirSync(folder).filter((name) => !name.endsWith('.expected.json'))

describe.each(files)('plant file %s', (name) => {
  test('is read without repair, and written so that it is read again', () => {
    const read = readPlant(readFileSync(new URL(name, folder), 'utf8'))
    if (read.outcome === 'unusable') throw new Error(read.message)
    expect(read.repairs).toEqual([])
    expect(readPlant(writePlant(read.plant))).toEqual(read)
  })
})

/* Names from the contract, sections 2 and 3. */
describe('quantities', () => {
  const layout = emptyPlant().layouts[0] as Layout

  test('of streams and shafts', () => {
    expect(Object.keys(streamQuantities)).toEqual(
      expect.arrayContaining(['m', 'p', 'h', 'T', 's', 'x', 'superheat', 'subcooling']),
    )
    expect(Object.keys(streamQuantities)).toHaveLength(8)
    expect(Object.keys(shaftQuantities).sort()).toEqual([
      'generatorEfficiency',
      'generatorInput',
      'generatorLoss',
      'generatorPower',
      'mechanicalEfficiency',
      'mechanicalLoss',
    ])
  })

  test('of the plant', () => {
    expect(quantitiesOfId(layout, 'plant').map(({ name }) => name)).toEqual(
      Object.keys(plantQuantities),
    )
    expect(Object.keys(plantQuantities)).toHaveLength(20)
    expect(plantQuantities.netPower?.dimension).toBe('power')
  })

  const described: [string, QuantityDescription][] = [
    ...kinds.flatMap((kind) =>
      Object.entries(kind.quantities).map(([name, one]): [string, QuantityDescription] => [
        `${kind.name}.${name}`,
        one,
      ]),
    ),
    ...Object.entries({ ...streamQuantities, ...shaftQuantities, ...plantQuantities }),
  ]

  test.each(described)('%s can be shown in every set of units', (_, { dimension, usual = 1 }) => {
    for (const { name } of unitSets) {
      expect(formatQuantity(usual, dimension, name).text).toMatch(/\d/)
    }
  })
})

test('every kind is found by its name', () => {
  for (const kind of kinds) expect(kindOf(kind.name)).toBe(kind)
  expect(kindOf('constructor')).toBeUndefined()
})
