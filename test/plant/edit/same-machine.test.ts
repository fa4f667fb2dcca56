import { readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import {
  bleedInSameMachine,
  copyLayout,
  EditRefused,
  heaterInSameMachine,
  type Plant,
  readPlant,
} from '../../../src/document.ts'
import { balanceOfCase } from '../../../src/engine.ts'

function example(file: string): Plant {
  const url = new URL(`../../../public/examples/${file}`, import.meta.url)
  const read = readPlant(readFileSync(url, 'utf8'))
  if (read.outcome === 'unusable') throw new Error(read.message)
  return read.plant
}

function solved(plant: Plant, layout: string, one: string | null) {
  const answer = balanceOfCase(plant, layout, one)
  if (answer.outcome === 'unusable') throw new Error(answer.message)
  expect(answer.balance.status).toBe('solved')
  return answer.balance
}

test('a heater on a new bleed: the split, the hardware and the cascade of drains are written', () => {
  const base = example('tarn-vale-2.json')
  const { plant: copied, id: proposal } = copyLayout(base, 'base', 'Heater 8')
  const { plant, id } = heaterInSameMachine(copied, proposal, {
    turbine: 'lp',
    group: 2,
    pressure: 1.32e5,
    base: 'base',
    water: 'c3',
    label: 'Heater 8',
  })
  const layout = plant.layouts.find((one) => one.id === proposal)!
  const lp = layout.units.find((unit) => unit.id === 'lp')!
  expect(lp.options?.splitFrom).toEqual([1, 2, 2, 3, 4])
  const ends = layout.streams.map(({ from, to }) => `${from} ${to}`)
  expect(ends).toContain(`lp.bleed2 ${id}.steam1`)
  expect(ends).toContain(`h2.outlet ${id}.water`)
  expect(ends).toContain(`${id}.outlet h3.water`)
  expect(ends).toContain(`h3.drain ${id}.drain1`)
  expect(ends).toContain(`${id}.drain h2.drain1`)
  for (const one of layout.cases.filter(({ frozen }) => frozen)) {
    expect(one.hardwareFrom).toEqual({ layout: 'base' })
  }
  // The same proposal as the example's, less the pressure loss of its bleed line.
  const own = solved(plant, proposal, 's75').plant.netPower as number
  const drawn = solved(example('heater-8.json'), 'proposal', 's75').plant.netPower as number
  expect(own / drawn).toBeCloseTo(1, 3)
  expect(own).toBeGreaterThan(solved(base, 'base', 's75').plant.netPower as number)
})

test('the machine as it is keeps a layout of its own', () => {
  const plant = example('tarn-vale-2.json')
  const bleed = { turbine: 'lp', group: 2, pressure: 1.3e5, base: 'base' }
  expect(() => bleedInSameMachine(plant, 'base', bleed, 'h2.steam2')).toThrow(EditRefused)
})

test('what is no stage group, no turbine or no water between two heaters is refused by name', () => {
  const { plant, id } = copyLayout(example('tarn-vale-2.json'), 'base', 'Proposal')
  const bleed = { turbine: 'lp', group: 5, pressure: 1.3e5, base: 'base' }
  expect(() => bleedInSameMachine(plant, id, bleed, 'h2.steam2')).toThrow('stage groups 1 to 4')
  expect(() => bleedInSameMachine(plant, id, { ...bleed, turbine: 'h2' }, 'h2.steam2')).toThrow(
    'h2 has no bleeds',
  )
  expect(() =>
    heaterInSameMachine(plant, id, { ...bleed, group: 2, water: 'c1', label: 'Heater 8' }),
  ).toThrow('between two heaters')
})
