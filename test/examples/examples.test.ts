import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { readPlant, writePlant } from '../../src/document.ts'
import { balanceOfCase } from '../../src/engine.ts'

/*
 * The plants that are offered as examples: each reads without repairs, solves in every layout and case,
 * closes, and has no finding but those that it is meant to show.
 */

const folder = new URL('../../public/examples/', import.meta.url)
const text = (file: string): string => readFileSync(new URL(file, folder), 'utf8')

interface Entry {
  readonly file: string
  readonly title: string
  readonly shows: string
}

const list = JSON.parse(text('index.json')) as readonly Entry[]

/** Findings that an example is meant to show: `severity code where` by file. */
const meant: Readonly<Record<string, readonly string[]>> = {}

const plants = list.map(({ file, title }) => {
  const read = readPlant(text(file))
  if (read.outcome === 'unusable') throw new Error(`${file}: ${read.message}`)
  return { file, title, ...read }
})

test('the list names every example once, each in one sentence, the first one opened first', () => {
  const files = readdirSync(folder).filter((name) => name !== 'index.json')
  expect(list.map(({ file }) => file).sort()).toEqual(files.sort())
  expect(list[0]?.file).toBe('tarn-vale-1.json')
  for (const { shows } of list) expect(shows).toMatch(/^[A-Z0-9].*\.$/)
})

describe.each(plants)('$file', ({ file, title, plant, repairs }) => {
  test('reads without repairs, bears its title, and is written as it was read', () => {
    expect(repairs).toEqual([])
    expect(plant.title).toBe(title)
    expect(readPlant(writePlant(plant))).toMatchObject({ outcome: 'plant', plant })
  })

  const all = plant.layouts.flatMap((layout) =>
    [null, ...layout.cases.map(({ id }) => id)].map((id) => [layout.id, id] as const),
  )
  test.each(all)('layout %s, case %s is solved and closes', (layout, id) => {
    const answer = balanceOfCase(plant, layout, id)
    if (answer.outcome !== 'balance') throw new Error(answer.message)
    const { status, closure, findings } = answer.balance
    expect(status).toBe('solved')
    expect(closure?.mass).toBeLessThan(1e-9)
    expect(closure?.energy).toBeLessThan(1e-9)
    const found = findings.map(({ severity, code, where }) => `${severity} ${code} ${where}`)
    expect(found.filter((one) => !meant[file]?.includes(one))).toEqual([])
  })

  test('exhausts are dry enough, and units stand on the grid', () => {
    for (const layout of plant.layouts) {
      const answer = balanceOfCase(plant, layout.id, null)
      if (answer.outcome !== 'balance') throw new Error(answer.message)
      for (const { from, id } of layout.streams) {
        if (!from.endsWith('.exhaust')) continue
        const x = answer.balance.streams[id]?.x
        // Moisture at an LP exhaust: 10 to 13 % is the common limit; between wet sections it is higher.
        const p = answer.balance.streams[id]?.p as number
        if (typeof x === 'number' && p < 1e5) expect(x).toBeGreaterThan(0.87)
      }
      for (const { at } of layout.units) {
        expect(at[0] % 8).toBe(0)
        expect(at[1] % 8).toBe(0)
      }
    }
  })
})
