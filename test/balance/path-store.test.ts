import { readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import { curvesOf, isobarsOf } from '../../src/balance/chart-data.ts'
import { Model } from '../../src/balance/model.ts'
import { Results } from '../../src/balance/results.ts'
import { solve } from '../../src/balance/solve.ts'
import { type Layout, type Plant, readPlant } from '../../src/document.ts'

const read = readPlant(
  readFileSync(new URL('../reference/cases/o2-reheat.json', import.meta.url), 'utf8'),
)
const layout = (read as { plant: Plant }).plant.layouts[0] as Layout
const hot = layout.streams.find(({ given }) => typeof given.T === 'number') as Layout['streams'][0]

test('paths kept from the balance before are those that would be worked out anew', () => {
  const model = new Model(layout)
  const results = new Results(model)
  const index = model.system.indexOf.get(`${hot.id}.T`) as number
  // There and back, by large and by vanishing steps: most paths move, some stay.
  for (const by of [0, 20, 20, 20 + 1e-6, -15, 0]) {
    model.set(index, (hot.given.T as number) + by)
    const kept = solve(model, results)
    const fresh = solve(new Model(changed(by)))
    const [a, b] = [curvesOf(kept), curvesOf(fresh)]
    expect(a.starts).toEqual(b.starts)
    expectNear(a.points, b.points)
    expectNear(a.flows, b.flows)
    expectNear(isobarsOf(kept).points, isobarsOf(fresh).points)
  }
})

function changed(by: number): Layout {
  const T = (hot.given.T as number) + by
  return {
    ...layout,
    streams: layout.streams.map((stream) =>
      stream.id === hot.id ? { ...stream, given: { ...stream.given, T } } : stream,
    ),
  }
}

function expectNear(found: Float64Array, wanted: Float64Array): void {
  expect(found.length).toBe(wanted.length)
  found.forEach((value, i) => {
    const other = wanted[i] as number
    expect(Math.abs(value - other)).toBeLessThanOrEqual(1e-7 * Math.abs(other) + 1e-9)
  })
}
