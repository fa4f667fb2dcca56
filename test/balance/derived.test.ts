import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { type DerivedNames, derivedNames, derivedOf } from '../../src/balance/derived.ts'
import { Model } from '../../src/balance/model.ts'
import { type Balance, solve } from '../../src/balance/solve.ts'
import { type Layout, readPlant } from '../../src/document.ts'

const root = new URL('../../', import.meta.url)

/** Every example of the window and every reference plant that solves, layout by layout. */
const layouts: [string, Layout][] = []
for (const folder of ['public/examples/', 'test/reference/cases/']) {
  for (const file of readdirSync(new URL(folder, root))) {
    if (!file.endsWith('.json') || file.includes('expected')) continue
    const read = readPlant(readFileSync(new URL(folder + file, root), 'utf8'))
    if (read.outcome !== 'plant') continue
    for (const layout of read.plant.layouts) layouts.push([`${file} ${layout.id}`, layout])
  }
}

interface Read {
  readonly balance: Balance
  readonly names: DerivedNames
  value(path: string): number
  /** Energy and exergy of one side of the account, W. */
  side(name: 'enters' | 'leaves' | 'destroyed'): readonly [energy: number, exergy: number]
}

function readOf(layout: Layout): Read {
  const balance = solve(new Model(layout))
  const names = derivedNames(balance)
  const derived = derivedOf(balance, names)
  return {
    balance,
    names,
    value: (path) =>
      balance.results.value(path) ?? (derived.values[names.paths.indexOf(path)] as number),
    side(name) {
      let energy = 0
      let exergy = 0
      names.account.forEach(({ side, item }, k) => {
        // Losses of shafts and drives are exergy destroyed; they stand with what leaves as energy.
        const lost = item === 'shaftLoss' || item === 'driveLoss'
        if (side === name) energy += derived.account[2 * k] as number
        if (lost ? name === 'destroyed' : side === name)
          exergy += derived.account[2 * k + 1] as number
      })
      return [energy, exergy]
    },
  }
}

describe.each(layouts)('%s', (_, layout) => {
  const { balance, side, value, names } = readOf(layout)
  const isSolved = balance.status === 'solved'

  test.runIf(isSolved)('energy that enters the plant leaves it', () => {
    const [entering] = side('enters')
    const [leaving] = side('leaves')
    expect(entering).toBeGreaterThan(0)
    expect(Math.abs(entering - leaving) / entering).toBeLessThan(1e-6)
  })

  test.runIf(isSolved)('exergy that enters is destroyed in the units or leaves', () => {
    const [, entering] = side('enters')
    const [, leaving] = side('leaves')
    const [, destroyed] = side('destroyed')
    expect(entering).toBeGreaterThan(0)
    expect(Math.abs(entering - leaving - destroyed) / entering).toBeLessThan(1e-6)
  })

  test.runIf(isSolved)('the groups of a machine give its power together', () => {
    for (const { unit, kind } of balance.model.system.units) {
      if (!kind.stageGroups) continue
      const powers = names.paths.filter((path) =>
        new RegExp(`^${unit.id}\\.group\\d+\\.power$`).test(path),
      )
      expect(powers.length).toBeGreaterThan(0)
      const sum = powers.reduce((total, path) => total + value(path), 0)
      const power = value(`${unit.id}.power`)
      expect(Math.abs(sum - power) / Math.abs(power)).toBeLessThan(1e-9)
    }
  })

  test.runIf(isSolved)('efficiencies are between 0 and 1', () => {
    for (const path of names.paths) {
      if (!/exergeticEfficiency|efficiencyWet|moisture/.test(path)) continue
      const number = value(path)
      if (Number.isNaN(number)) continue
      expect(number, path).toBeGreaterThanOrEqual(0)
      expect(number, path).toBeLessThanOrEqual(1 + 1e-9)
    }
  })
})

test('there are plants to test', () => {
  expect(layouts.length).toBeGreaterThan(5)
})

test('wet efficiency follows from dry efficiency and moisture by Baumann’s rule', () => {
  // Contract, section 3: eta (1 - a w (y_in + y_out)/2); with the inlet saturated w is 1.
  const saturated = layouts.find(([name]) => name.startsWith('o6-saturated'))
  expect(saturated).toBeDefined()
  const { value, names, balance } = readOf((saturated as [string, Layout])[1])
  let seen = 0
  for (const { unit, kind } of balance.model.system.units) {
    if (!kind.stageGroups) continue
    for (let i = 2; names.paths.includes(`${unit.id}.group${i}.flow`); i++) {
      const group = (name: string, k = i) => value(`${unit.id}.group${k}.${name}`)
      // Between two wet states without moisture removal the mean moisture is that of the ends.
      if (!(group('moisture', i - 1) > 0) || unit.options?.moistureRemoval) continue
      const mean = (group('moisture', i - 1) + group('moisture')) / 2
      const factor = value(`${unit.id}.wetnessFactor`)
      const expected = group('efficiencyDry') * (1 - factor * mean)
      expect(group('efficiencyWet')).toBeCloseTo(expected, 9)
      seen++
    }
  }
  expect(seen).toBeGreaterThan(0)
})
