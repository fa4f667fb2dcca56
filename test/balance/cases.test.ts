import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { applyOverrides, readPlant } from '../../src/document.ts'
import { type AskedBalance, balanceOfCase } from '../../src/engine.ts'
import { type ExpectedFile, type ExpectedRun, faultsOf, nameOf } from './expected-run.ts'

/*
 * Plant files with expected answers computed by another implementation from IAPWS-IF97
 * (../reference/cases): whatever is copied there is run.
 */

const folder = new URL('../reference/cases/', import.meta.url)
const read = (name: string): string => readFileSync(new URL(name, folder), 'utf8')

const suffix = '.expected.json'
const names = readdirSync(folder)
  .filter((name) => name.endsWith(suffix))
  .map((name) => name.slice(0, -suffix.length))

describe.each(names)('%s', (name) => {
  const file = JSON.parse(read(name + suffix)) as ExpectedFile
  const text = read(`${name}.json`)
  test.each(file.runs.map((run, k) => [nameOf(run, k), run] as const))('%s', (_, run) => {
    const answer = answerTo(text, run)
    if (typeof answer === 'string') {
      expect(run.status).toBe('unusable')
      expect(answer.split('\n')).toHaveLength(1)
      for (const named of run.findingMustName ?? []) expect(answer).toContain(named)
      return
    }
    expect(faultsOf(answer, file, run)).toEqual([])
    expect(notFinite(answer)).toEqual([])
  })
})

/** What the command line would print; a line of text where the file or the call is unusable. */
function answerTo(text: string, run: ExpectedRun): AskedBalance | string {
  const read = readPlant(text)
  if (read.outcome === 'unusable') return read.message
  const { layouts } = read.plant
  const layout = run.layout === null ? layouts[0] : layouts.find(({ id }) => id === run.layout)
  if (layout === undefined) return `there is no layout ${run.layout}`
  const overrides = { free: run.free, set: run.set }
  const checked = applyOverrides(layout, overrides)
  if (checked.outcome === 'unusable') return checked.message
  const solved = balanceOfCase(read.plant, layout.id, run.case, overrides)
  if (solved.outcome === 'unusable') return solved.message
  // As the command line prints it: without what JSON cannot say.
  return JSON.parse(JSON.stringify(solved.balance)) as AskedBalance
}

/** Paths of numbers that JSON could not have carried. */
function notFinite(value: unknown, path = ''): string[] {
  if (typeof value === 'number') return Number.isFinite(value) ? [] : [path]
  if (typeof value !== 'object' || value === null) return []
  return Object.entries(value).flatMap(([key, one]) => notFinite(one, `${path}.${key}`))
}
