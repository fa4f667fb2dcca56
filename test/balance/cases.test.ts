import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { type Given, type Layout, readPlant } from '../../src/document.ts'
import { type AskedBalance, balanceOf } from '../../src/engine.ts'
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
  const plant = readPlant(text)
  if (plant.outcome === 'unusable') return plant.message
  const { layouts } = plant.plant
  const layout =
    run.layout === null ? layouts[0] : layouts.find((candidate) => candidate.id === run.layout)
  if (layout === undefined) return `there is no layout ${run.layout}`
  // As the command line prints it: without what JSON cannot say.
  return JSON.parse(JSON.stringify(balanceOf(overridden(layout, run)))) as AskedBalance
}

/** First all that is freed, then all that is set. */
function overridden(layout: Layout, { free, set }: ExpectedRun): Layout {
  const change = <T extends { readonly given: Layout['plant']['given'] }>(
    id: string,
    owner: T,
  ): T => {
    const given: Record<string, Given> = { ...owner.given }
    const own = (path: string): boolean => path.startsWith(`${id}.`)
    const nameIn = (path: string): string => path.slice(id.length + 1)
    for (const path of free) if (own(path)) delete given[nameIn(path)]
    for (const [path, value] of Object.entries(set)) if (own(path)) given[nameIn(path)] = value
    return { ...owner, given }
  }
  return {
    ...layout,
    units: layout.units.map((unit) => change(unit.id, unit)),
    streams: layout.streams.map((stream) => change(stream.id, stream)),
    shafts: layout.shafts.map((shaft) => change(shaft.id, shaft)),
    plant: change('plant', layout.plant),
  }
}

/** Paths of numbers that JSON could not have carried. */
function notFinite(value: unknown, path = ''): string[] {
  if (typeof value === 'number') return Number.isFinite(value) ? [] : [path]
  if (typeof value !== 'object' || value === null) return []
  return Object.entries(value).flatMap(([key, one]) => notFinite(one, `${path}.${key}`))
}
