import { readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import { type Plant, readPlant } from '../../src/document.ts'
import { createEngine } from '../../src/engine.ts'
import type { BalanceMessage, EqualBasis, NamesMessage } from '../../src/messages.ts'

function example(file: string): Plant {
  const url = new URL(`../../public/examples/${file}`, import.meta.url)
  const read = readPlant(readFileSync(url, 'utf8'))
  if (read.outcome === 'unusable') throw new Error(read.message)
  return read.plant
}

function solve(plant: Plant, layout: string, id: string | null, equal?: EqualBasis) {
  const answers = createEngine().answer({
    type: 'solve',
    sequence: 1,
    plant,
    layout,
    case: id,
    ...(equal && { equal }),
  })
  const unusable = answers.find((answer) => answer.type === 'unusable')
  if (unusable) return unusable.message
  const names = answers.find((answer): answer is NamesMessage => answer.type === 'names')!
  const balance = answers.find((answer): answer is BalanceMessage => answer.type === 'balance')!
  const value = (path: string): number => balance.values[names.paths.indexOf(path)]!
  return { status: balance.status, names, value }
}

type Solved = Exclude<ReturnType<typeof solve>, string>

const plant = example('heater-8.json')
const base = solve(plant, 'base', 's75') as Solved

test.each([
  ['power', 'plant.netPower'],
  ['fuel', 'plant.fuelHeat'],
  ['steam', 'main.m'],
] as const)('the proposal at equal %s, in a case and in the design', (basis, path) => {
  const value = base.value(path)
  for (const id of ['s75', null]) {
    const other = solve(plant, 'proposal', id, { basis, value }) as Solved
    expect(other.status).toBe('solved')
    expect(other.value(path) / value).toBeCloseTo(1, 9)
    expect(other.names.given.includes('main.m')).toBe(basis === 'steam')
  }
})

test('one more heater saves fuel at equal power and gains power at equal fuel', () => {
  const power = { basis: 'power', value: base.value('plant.netPower') } as const
  const fuel = { basis: 'fuel', value: base.value('plant.fuelHeat') } as const
  const saving = solve(plant, 'proposal', 's75', power) as Solved
  const gaining = solve(plant, 'proposal', 's75', fuel) as Solved
  expect(saving.value('plant.fuelHeat')).toBeLessThan(base.value('plant.fuelHeat'))
  expect(gaining.value('plant.netPower')).toBeGreaterThan(base.value('plant.netPower'))
})

test('a plant whose power is given is compared at the steam of another', () => {
  const works = example('double-reheat.json')
  const other = solve(works, 'base', null, { basis: 'steam', value: 400 }) as Solved
  expect(other.value('main.m')).toBeCloseTo(400, 6)
  expect(other.value('plant.netPower')).toBeLessThan(600e6)
})

test('where nothing sets the load, it says so', () => {
  const [layout] = plant.layouts
  const streams = layout!.streams.map((one) =>
    one.id === 'main'
      ? { ...one, given: { p: 13e6, T: 813.15 } }
      : one.id === 'c1'
        ? { ...one, given: { m: 94.69 } }
        : one,
  )
  const answer = solve({ ...plant, layouts: [{ ...layout!, streams, cases: [] }] }, 'base', null, {
    basis: 'power',
    value: 140e6,
  })
  expect(answer).toContain('nothing sets the load')
})
