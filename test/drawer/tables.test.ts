import { describe, expect, test } from 'vitest'
import { exported, sorted, type Table } from '../../web/drawer/tables/table.ts'
import { tableBuilders } from '../../web/drawer/tables/tables.ts'
import { solvedExample } from './solved-example.ts'

const { source, asked } = solvedExample('public/examples/tarn-vale-2.json')
const build = (name: keyof typeof tableBuilders): Table => tableBuilders[name](source)

function cell(table: Table, key: string, column: string): string | number | null {
  const row = table.rows.find((one) => one.key === key)
  const at = table.columns.findIndex(({ id }) => id === column)
  expect(row, `${table.name} ${key}`).toBeDefined()
  expect(at, `${table.name} ${column}`).toBeGreaterThanOrEqual(0)
  return row?.cells[at] ?? null
}

describe('tables hold the balance as the command line prints it', () => {
  test('state points', () => {
    const table = build('states')
    expect(table.rows).toHaveLength(Object.keys(asked.streams).length)
    for (const [id, state] of Object.entries(asked.streams)) {
      for (const name of ['m', 'p', 'T', 'h', 's', 'v']) {
        const found = cell(table, id, name) as number
        expect(found / (state[name] as number)).toBeCloseTo(1, 9)
      }
      expect(cell(table, id, 'x')).toEqual(state.x)
    }
  })

  test('units, with closure, and exergy destroyed with its share', () => {
    const table = build('units')
    for (const { id } of source.layout.units) {
      const wanted = asked.units[id]?.exergyDestroyed
      if (typeof wanted !== 'number') continue
      const found = cell(table, id, 'exergyDestroyed') as number
      expect(Math.abs(found - wanted)).toBeLessThan(1e-6 * 1e8)
      const [massIn, massOut] = [cell(table, id, 'massIn'), cell(table, id, 'massOut')]
      if (typeof massIn === 'number' && typeof massOut === 'number') {
        expect(massIn).toBeCloseTo(massOut, 8)
      }
      expect(Math.abs(cell(table, id, 'energyImbalance') as number)).toBeLessThan(1)
    }
  })

  test('heat and power that units receive and deliver are the plant’s totals', () => {
    const table = build('units')
    const sum = (column: string, test: (value: number) => boolean) =>
      source.layout.units.reduce((total, { id }) => {
        const value = cell(table, id, column)
        return typeof value === 'number' && test(value) ? total + value : total
      }, 0)
    const plant = asked.plant as Record<string, number>
    expect(sum('heatReceived', (value) => value > 0) / (plant.heatInput ?? 0)).toBeCloseTo(1, 9)
    expect(sum('workDelivered', (value) => value > 0) / (plant.turbinePower ?? 0)).toBeCloseTo(1, 9)
    expect(sum('workDelivered', (value) => value < 0) / -(plant.pumpPower ?? 0)).toBeCloseTo(1, 9)
  })

  test('heaters: declared quantities, and rise, share and temperatures from the streams', () => {
    const table = build('heaters')
    const heaters = table.rows.filter(
      (row) => asked.units[row.owner]?.terminalDifference !== undefined,
    )
    expect(heaters.length).toBeGreaterThan(5)
    for (const { key } of heaters) {
      const wanted = asked.units[key]?.terminalDifference
      const approach = cell(table, key, 'terminalDifference') as number
      expect(approach).toBeCloseTo(wanted as number, 8)
      const outlet = cell(table, key, 'outletT')
      const saturation = cell(table, key, 'saturationT')
      if (typeof outlet === 'number' && typeof saturation === 'number') {
        expect(saturation - outlet).toBeCloseTo(approach, 6)
        expect(cell(table, key, 'rise')).toBeCloseTo(
          outlet - (cell(table, key, 'inletT') as number),
          9,
        )
      }
      const share = cell(table, key, 'steamShare') as number
      const main = asked.streams.main?.m as number
      expect(share * main).toBeCloseTo(cell(table, key, 'steamFlow') as number, 8)
    }
  })

  test('pumps and stage groups', () => {
    const pumps = build('pumps')
    const driven = Object.entries(asked.units).filter(([, its]) => its.npshAvailable !== undefined)
    expect(pumps.rows).toHaveLength(driven.length)
    for (const [id, its] of driven) {
      expect((cell(pumps, id, 'power') as number) / (its.power as number)).toBeCloseTo(1, 9)
      const rise = (cell(pumps, id, 'outletP') as number) - (cell(pumps, id, 'inletP') as number)
      expect(rise / (its.pressureRise as number)).toBeCloseTo(1, 9)
    }
    const groups = build('groups')
    const machines = Object.entries(asked.units).filter(([, its]) => its.groupEfficiency1)
    expect(machines.length).toBeGreaterThan(0)
    for (const [id, its] of machines) {
      const rows = groups.rows.filter(({ owner }) => owner === id)
      const power = rows.reduce((sum, { key }) => sum + (cell(groups, key, 'power') as number), 0)
      expect(power / (its.power as number)).toBeCloseTo(1, 9)
      rows.forEach(({ key }, i) => {
        expect(cell(groups, key, 'efficiencyDry')).toBeCloseTo(
          its[`groupEfficiency${i + 1}`] as number,
          12,
        )
      })
    }
  })

  test('totals name their basis; heat rates stand in kJ/kWh and Btu/kWh', () => {
    const rows = exported(build('totals'), 'us')
    const [head, ...body] = rows
    expect(head).toEqual(['Total', 'Symbol', 'Value', 'Unit', 'Basis'])
    const rate = asked.plant.unitHeatRate as number
    const its = body.filter(([name]) => name === 'Unit heat rate, net')
    expect(its.map((row) => row[3])).toEqual(['kJ/kWh', 'Btu/kWh'])
    // 1 J/J is 3600 kJ/kWh and 3600 / 1.05505585262 Btu/kWh (International Table Btu, NIST SP 811 B.8).
    expect(its[0]?.[2]).toBeCloseTo(rate * 3600, 6)
    expect(its[1]?.[2]).toBeCloseTo((rate * 3600) / 1.05505585262, 6)
    for (const row of body) expect(String(row[4]).length).toBeGreaterThan(10)
  })
})

describe('exported cells', () => {
  test('are in the chosen units, which the header names', () => {
    const table = build('states')
    const columns = ['name', 'p', 'T', 'm'].map((id) =>
      table.columns.findIndex((one) => one.id === id),
    )
    const [head, ...body] = exported(table, 'us', columns)
    expect(head).toEqual(['Stream', 'Pressure [psia]', 'Temperature [°F]', 'Flow [lb/h]'])
    table.rows.forEach((row, i) => {
      const state = asked.streams[row.key] as Record<string, number>
      // NIST SP 811, B.8: 1 psi is 6894.757 Pa, 1 lb is 0.45359237 kg.
      expect(body[i]?.[1]).toBeCloseTo((state.p as number) / 6894.757293168, 5)
      expect(body[i]?.[2]).toBeCloseTo((state.T as number) * 1.8 - 459.67, 6)
      expect(body[i]?.[3]).toBeCloseTo(((state.m as number) * 3600) / 0.45359237, 3)
    })
  })
})

describe('sorting', () => {
  const table = build('states')
  const at = table.columns.findIndex(({ id }) => id === 'x')

  test('puts numbers in order and what has none last, either way', () => {
    for (const falling of [false, true]) {
      const values = sorted(table, { column: 'x', falling }).map((row) => row.cells[at])
      const numbers = values.filter((value) => typeof value === 'number')
      expect(numbers.length).toBeGreaterThan(1)
      expect(values.slice(0, numbers.length)).toEqual(
        [...numbers].sort((a, b) => (falling ? b - a : a - b)),
      )
      expect(values.slice(numbers.length).every((value) => value === null)).toBe(true)
    }
  })

  test('orders words with numbers in them as people do', () => {
    const names = sorted(build('heaters'), { column: 'id', falling: false }).map(
      ({ owner }) => owner,
    )
    const heaters = names.filter((name) => /^h\d/.test(name))
    expect(heaters).toEqual([...heaters].sort((a, b) => Number(a.slice(1)) - Number(b.slice(1))))
  })
})
