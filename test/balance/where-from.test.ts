import { readdirSync, readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import type { Figure, Origin, Piece } from '../../src/balance/answer.ts'
import { Model } from '../../src/balance/model.ts'
import type { Results } from '../../src/balance/results.ts'
import { solve } from '../../src/balance/solve.ts'
import { whereFrom } from '../../src/balance/where-from.ts'
import { type Layout, readPlant } from '../../src/document.ts'
import { printed, reckon } from './reckon.ts'

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

/** Half a unit of the last digit that a figure shows. */
function half(figure: string): number {
  const [mantissa = '', power] = figure.replace(/\u202f/g, '').split(' × 10')
  const exponent = Number(
    (power ?? '⁰')
      .replace('⁻', '-')
      .replace(/[⁰¹²³⁴⁵⁶⁷⁸⁹]/g, (one) => String('⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(one))),
  )
  return 0.5 * 10 ** (exponent - (mantissa.split('.')[1]?.length ?? 0))
}

/** Reckoned from its own figures, a line comes to its result, to half a unit of its last digit. */
function check(pieces: readonly Piece[], result: Figure, where: string): void {
  const text = printed(pieces)
  if (text.includes('curve(')) return
  const wanted = reckon(result.figure, '').value
  for (const side of text.split(' = ').length > 1 && !/[(,] ?\w+ = /.test(text)
    ? text.split(' = ')
    : [text]) {
    const { value, size } = reckon(side, result.unit)
    const inUnit = result.unit === '%' ? value * 100 : value
    // What is nought but for rounding is measured by the figures that it comes from.
    const allowed =
      result.figure === '0' ? 1e-6 * size : half(result.figure) * (1 + 1e-6) + 1e-9 * size
    expect(Math.abs(inUnit - wanted), `${where}: ${result.figure} = ${side}`).toBeLessThanOrEqual(
      allowed,
    )
  }
}

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
    check(figures, result, path)
    steps.forEach((step, k) => {
      check(step.figures, step.result, `${path}, step ${k + 1}`)
    })
    lines += 1 + steps.length
  }
  expect(lines).toBeGreaterThan(50)
})
