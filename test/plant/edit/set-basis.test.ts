import { readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import {
  basisOf,
  duplicateItems,
  type Layout,
  type Plant,
  readPlant,
  removeItems,
  setBasis,
  setGiven,
  writePlant,
} from '../../../src/document.ts'
import { sameBalance } from '../../../web/store/same-balance.ts'

const text = readFileSync('test/reference/cases/o5-seven.json', 'utf8')

function read(file: string): Plant {
  const result = readPlant(file)
  if (result.outcome !== 'plant') throw new Error(result.message)
  return result.plant
}

const plant = read(text)
const layoutId = plant.layouts[0]?.id ?? ''
const layoutOf = (one: Plant) => one.layouts[0] as Layout
const path = 'hp.groupEfficiency2'
const basis = { source: 'maker', note: 'Data sheet 12', uncertainty: 0.005 } as const
const based = setBasis(plant, layoutId, path, basis)

test('what a number rests on goes into the file and comes back', () => {
  expect(basisOf(layoutOf(based), path)).toEqual(basis)
  expect(basisOf(layoutOf(read(writePlant(based))), path)).toEqual(basis)
  expect(writePlant(read(writePlant(based)))).toBe(writePlant(based))
})

test('it changes no balance', () => {
  expect(sameBalance(plant, based)).toBe(true)
})

test('an empty one is none', () => {
  const emptied = setBasis(based, layoutId, path, { note: '  ' })
  expect(layoutOf(emptied)).not.toHaveProperty('basis')
  expect(writePlant(emptied)).toBe(writePlant(plant))
})

test('only a given number rests on something, and no longer once it is freed', () => {
  expect(() => setBasis(plant, layoutId, 'hp.power', basis)).toThrow('not given')
  expect(() => setBasis(plant, layoutId, path, { uncertainty: -1 })).toThrow('below zero')
  expect(basisOf(layoutOf(setGiven(based, layoutId, path, undefined)), path)).toBeUndefined()
  expect(basisOf(layoutOf(setGiven(based, layoutId, path, 0.9)), path)).toEqual(basis)
})

test('it follows a numbered quantity, goes with its unit, and is copied with it', () => {
  const closed = removeItems(based, layoutId, ['e7'])
  expect(basisOf(layoutOf(closed), 'hp.groupEfficiency1')).toEqual(basis)
  expect(basisOf(layoutOf(closed), path)).toBeUndefined()
  expect(layoutOf(removeItems(based, layoutId, ['hp'])).basis ?? {}).toEqual({})
  const heater = setBasis(plant, layoutId, 'h5.terminalDifference', basis)
  const { plant: doubled, ids } = duplicateItems(heater, layoutId, ['h5'], [10, 10])
  expect(basisOf(layoutOf(doubled), `${ids[0]}.terminalDifference`)).toEqual(basis)
})

test.each([
  [{ source: 'rumour' }, 'a source is assumed, maker, measured'],
  [{ uncertainty: -1 }, 'not below zero'],
  [{}, 'a source, a note or an uncertainty'],
  [{ page: 3 }, 'no key page'],
])('a file with the basis %j is refused by its place', (wrong, why) => {
  const file = JSON.parse(writePlant(based))
  file.layouts[0].basis = { [path]: wrong }
  const result = readPlant(JSON.stringify(file))
  expect(result.outcome === 'unusable' && result.message).toContain(why)
  expect(result.outcome === 'unusable' && result.message).toContain('layouts[0].basis')
})

test('a basis of a quantity that the layout does not have is refused by name', () => {
  const file = JSON.parse(writePlant(plant))
  file.layouts[0].basis = { 'hp.groupEfficiency9': basis }
  const result = readPlant(JSON.stringify(file))
  expect(result.outcome === 'unusable' && result.message).toContain('groupEfficiency9')
})
