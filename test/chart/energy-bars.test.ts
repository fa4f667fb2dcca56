import { describe, expect, test } from 'vitest'
import { chartText } from '../../web/chart/chart-text.ts'
import { barIn, energyAccount } from '../../web/chart/energy-bars.ts'
import { solvedExample } from '../drawer/solved-example.ts'

const { source, asked } = solvedExample('public/examples/tarn-vale-2.json')
const account = energyAccount(source)
const sum = (bars: readonly { readonly value: number }[]): number =>
  bars.reduce((total, { value }) => total + value, 0)

describe('where the energy goes', () => {
  test('bars are ranked and add up to what enters', () => {
    expect(account).toBeDefined()
    if (!account) return
    for (const bars of [account.energy, account.destroyed]) {
      expect(bars.map(({ value }) => value)).toEqual(
        bars.map(({ value }) => value).sort((a, b) => b - a),
      )
    }
    // Bars too small to be seen are left out: a millionth of what enters each.
    expect(sum(account.energy) / account.energyEntering).toBeCloseTo(1, 4)
    const gone = sum(account.exergyLeaving) + sum(account.destroyed)
    expect(gone / account.exergyEntering).toBeCloseTo(1, 4)
  })

  test('names what the balance has', () => {
    const net = account?.energy.find(({ item }) => item === 'netPower')
    expect(net?.value).toBeCloseTo(asked.plant.netPower as number, 3)
    expect(account?.energyEntering).toBeCloseTo(asked.plant.fuelHeat as number, 3)
    const { names, balance } = source
    expect(net && barIn(names, balance, net, 'energy')).toBe(net?.value)
  })

  test('says nothing while the balance is open', () => {
    const open = { ...source.balance, status: 'underspecified' as const }
    expect(energyAccount({ ...source, balance: open })).toBeUndefined()
  })
})

describe('charts as data', () => {
  const rowsOf = (chart: 'ts' | 'tq' | 'energy') =>
    chartText(chart, source, 'metric')
      .split('\r\n')
      .map((line) => line.split('\t'))

  test('the processes in the chosen units, point by point', () => {
    const [head, ...rows] = rowsOf('ts')
    expect(head?.slice(3)).toEqual(['m [kg/s]', 's [kJ/(kg K)]', 'T [°C]', 'h [kJ/kg]'])
    const { points } = source.balance.curves
    expect(rows).toHaveLength(points.length / 3)
    rows.forEach((row, i) => {
      expect(Number(row[4])).toBeCloseTo((points[3 * i] as number) / 1000, 8)
      expect(Number(row[5])).toBeCloseTo((points[3 * i + 1] as number) - 273.15, 6)
      expect(Number(row[6])).toBeCloseTo((points[3 * i + 2] as number) / 1000, 5)
    })
  })

  test('heat profiles and the account in every row as many cells as the header', () => {
    for (const chart of ['tq', 'energy'] as const) {
      const [head, ...rows] = rowsOf(chart)
      expect(rows.length).toBeGreaterThan(10)
      for (const row of rows) expect(row).toHaveLength(head?.length ?? 0)
    }
  })
})
