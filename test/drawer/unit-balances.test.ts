import { expect, test } from 'vitest'
import { addUnit, connect, emptyPlant } from '../../src/document.ts'
import { stateRows } from '../../web/drawer/stream-rows.ts'
import { unitBalance, unitStreams } from '../../web/drawer/unit-balances.ts'

function plantOfTwo() {
  const empty = emptyPlant('Plant')
  const layoutId = empty.layouts[0]?.id ?? ''
  const boiler = addUnit(empty, layoutId, 'boiler', [0, 0])
  const turbine = addUnit(boiler.plant, layoutId, 'turbine', [200, 0])
  const steam = connect(turbine.plant, layoutId, `${boiler.id}.steam`, `${turbine.id}.inlet`)
  const pump = addUnit(steam.plant, layoutId, 'pump', [100, 200])
  const feed = connect(pump.plant, layoutId, `${pump.id}.discharge`, `${boiler.id}.feedwater`)
  const layout = feed.plant.layouts[0]
  if (!layout) throw new Error('the plant has a layout')
  return { layout, boiler: boiler.id, turbine: turbine.id, steam: steam.id, feed: feed.id }
}

test('a unit is balanced from the streams at its ports', () => {
  const { layout, boiler, steam, feed } = plantOfTwo()
  const its = unitStreams(layout).find(({ unit }) => unit.id === boiler)
  expect(its?.entering).toEqual([feed])
  expect(its?.leaving).toEqual([steam])
  if (!its) return
  const values: Record<string, number> = {
    [`${steam}.m`]: 10,
    [`${steam}.h`]: 3.4e6,
    [`${feed}.m`]: 10,
    [`${feed}.h`]: 0.8e6,
  }
  expect(unitBalance(its, (path) => values[path] ?? null)).toEqual({
    massIn: 10,
    massOut: 10,
    energyIn: 8e6,
    energyOut: 34e6,
  })
  const open = unitBalance(its, (path) => (path === `${feed}.h` ? null : (values[path] ?? null)))
  expect(open.massIn).toBe(10)
  expect(open.energyIn).toBeNull()
})

test('the table of states groups by what is carried, what is selected first, each stream once', () => {
  const { layout, turbine, steam, feed } = plantOfTwo()
  const brief = (selected: readonly string[]) =>
    stateRows(layout, selected).map((row) => (row.type === 'head' ? row.name : row.id))
  expect(brief([])).toEqual(['Steam', steam, 'Water', feed])
  const label = layout.units.find(({ id }) => id === turbine)?.label ?? ''
  const rows = brief([turbine])
  expect(rows[0]?.toLowerCase()).toBe(`at ${label}`.toLowerCase())
  expect(rows.slice(1)).toEqual([steam, 'Water', feed])
})
