import { readdirSync, readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import type { Origin } from '../../src/balance/answer.ts'
import { Model } from '../../src/balance/model.ts'
import type { Results } from '../../src/balance/results.ts'
import { solve } from '../../src/balance/solve.ts'
import { whereFrom } from '../../src/balance/where-from.ts'
import { type Layout, readPlant } from '../../src/document.ts'
import { checkLine } from './check-line.ts'
import { printed } from './reckon.ts'

const folders = ['public/examples', 'test/reference/cases']
const files = folders.flatMap((folder) =>
  readdirSync(folder)
    .filter((name) => /(?<!\.expected|index)\.json$/.test(name))
    .map((name) => `${folder}/${name}`),
)

interface Solved {
  readonly name: string
  readonly model: Model
  readonly results: Results
}

function layoutsOf(file: string): readonly (readonly [string, Layout])[] {
  const read = readPlant(readFileSync(file, 'utf8'))
  if (read.outcome !== 'plant') throw new Error(`${file}: ${read.message}`)
  return read.plant.layouts.map((layout) => [`${file} ${layout.id}`, layout] as const)
}

const solved: readonly Solved[] = files.flatMap(layoutsOf).flatMap(([name, layout]) => {
  const model = new Model(layout)
  const { status, results } = solve(model)
  return status === 'solved' ? [{ name, model, results }] : []
})

test('there are examples and reference plants to ask', () => {
  expect(solved.length).toBeGreaterThan(8)
})

test.for(solved)('$name: net power is traced to givens and constants alone', (one) => {
  const { model, results } = one
  const asked = new Set<string>()
  const queue = ['plant.netPower']
  const ends = new Set<string>()
  for (let path = queue.pop(); path !== undefined; path = queue.pop()) {
    if (asked.has(path)) continue
    asked.add(path)
    const { how, inputs, with: together } = whereFrom(model, path, results)
    expect(how, path).not.toBe('open')
    if (how === 'given') ends.add(path)
    else expect(how === 'together' ? together.length : 1, path).toBeGreaterThan(0)
    queue.push(...inputs)
  }
  expect(ends.size).toBeGreaterThan(0)
  for (const path of ends) {
    const index = model.system.indexOf.get(path) as number
    expect(model.system.given[index], path).not.toBeNaN()
  }
})

test.for(
  solved.flatMap((one) => (['si', 'metric', 'us'] as const).map((units) => ({ ...one, units }))),
)('$name: every line agrees with its own figures, $units', { timeout: 120_000 }, (one) => {
  const { model, results, units } = one
  let lines = 0
  for (const path of results.paths) {
    const origin: Origin = whereFrom(model, path, results, units)
    if (origin.how === 'given' || origin.how === 'open') continue
    expect(origin.worked, path).toBeDefined()
    const { figures, steps, result } = origin.worked as NonNullable<Origin['worked']>
    checkLine(printed(figures), result, path)
    steps.forEach((step, k) => {
      checkLine(printed(step.figures), step.result, `${path}, step ${k + 1}`)
    })
    lines += 1 + steps.length
  }
  expect(lines).toBeGreaterThan(50)
})
