import { readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import { Model } from '../../src/balance/model.ts'
import { solve } from '../../src/balance/solve.ts'
import { type Layout, readPlant } from '../../src/document.ts'

/* The same file gives the same answer, whatever the model was asked before. */

function layoutOf(file: string): Layout {
  const read = readPlant(readFileSync(`public/examples/${file}`, 'utf8'))
  if (read.outcome !== 'plant') throw new Error(read.message)
  return read.plant.layouts[0] as Layout
}

test.each([
  ['tarn-vale-1.json', 'main.p', [1e104, -5, 1e3, 1.241e6]],
  ['tarn-vale-1.json', 'main.T', [5273.15, 100]],
  ['tarn-vale-1.json', 'main.m', [-40, 1e99]],
  ['tarn-vale-1.json', 'condenser.pressure', [9e6, -1]],
  ['tarn-vale-2.json', 'main.p', [1e104, 1e3]],
  ['tarn-vale-2.json', 'h5.terminalDifference', [200, -90]],
  ['harrow-fen.json', 'plant.netPower', [1e12, -1e7]],
] as const)('%s: %s beyond all measure, and back', (file, path, values) => {
  const layout = layoutOf(file)
  const cold = solve(new Model(layout))
  expect(cold.status).toBe('solved')
  const model = new Model(layout)
  const index = model.system.indexOf.get(path) as number
  const given = model.system.given[index] as number
  solve(model)
  for (const value of values) {
    expect(model.set(index, value)).toBe(true)
    solve(model)
    expect(model.set(index, given)).toBe(true)
    const back = solve(model)
    expect(back.status).toBe('solved')
    for (const { path: other } of model.system.variables) {
      const wanted = cold.results.value(other)
      const found = back.results.value(other)
      if (wanted === null || found === null) expect(found).toBe(wanted)
      else expect(Math.abs(found - wanted)).toBeLessThanOrEqual(1e-9 * Math.abs(wanted) + 1e-9)
    }
  }
})
