import { readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import {
  compareLayouts,
  copyLayout,
  moveUnits,
  type Plant,
  readPlant,
  setGiven,
} from '../../src/document.ts'

function example(file: string): Plant {
  const url = new URL(`../../public/examples/${file}`, import.meta.url)
  const read = readPlant(readFileSync(url, 'utf8'))
  if (read.outcome === 'unusable') throw new Error(read.message)
  return read.plant
}

test('a copy differs in nothing but what its machines say of their origin', () => {
  const { plant } = copyLayout(example('tarn-vale-2.json'), 'base', 'Copy')
  const [base, copy] = plant.layouts
  const { units, streams, givens } = compareLayouts(base!, copy!)
  expect(units.map(({ id, where }) => [id, where])).toEqual([
    ['hp', 'both'],
    ['ip', 'both'],
    ['lp', 'both'],
  ])
  expect(streams).toEqual([])
  expect(givens).toEqual([])
})

test('drawing makes no difference; a given, a freed one and a case do', () => {
  const before = example('tarn-vale-2.json')
  const moved = moveUnits(before, 'base', ['h5'], [80, 0])
  const given = setGiven(moved, 'base', 'condenser.pressure', 6000)
  const freed = setGiven(given, 'base', 'main.m', undefined)
  const [base] = before.layouts
  const [other] = freed.layouts
  const s75 = base!.cases.find(({ id }) => id === 's75')!
  expect(compareLayouts(base!, other!)).toEqual({
    units: [],
    streams: [],
    givens: [
      { path: 'condenser.pressure', first: 5200, second: 6000 },
      { path: 'main.m', first: 120, second: undefined },
    ],
  })
  expect(compareLayouts(base!, base!, s75).givens).toEqual([
    { path: 'main.m', first: 90, second: 120 },
  ])
})

test('an added heater: what is only there, what is joined otherwise, by name', () => {
  const [base, proposal] = example('heater-8.json').layouts
  const { units, streams } = compareLayouts(base!, proposal!)
  const only = (where: string) =>
    [...units, ...streams].filter((one) => one.where === where).map(({ id }) => id)
  expect(only('first')).toEqual([])
  expect(only('second')).toEqual(['h8', 'e8', 'b8', 'b8h', 'c5', 'd8'])
  // Heater 2's water and heater 3's drain go to the new heater; bleeds 2 and 1 have moved by one.
  expect(only('both')).toEqual(['hp', 'ip', 'lp', 'b2', 'b1', 'c3', 'd3'])
  expect(units.find(({ id }) => id === 'h8')?.label).toBe('Heater 8')
})
