import { readFileSync } from 'node:fs'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { Model } from '../../src/balance/model.ts'
import { solve } from '../../src/balance/solve.ts'
import { type Layout, readPlant } from '../../src/document.ts'
import { withGivens } from '../../src/plant/overrides.ts'

const folder = 'public/examples/'

function layoutOf(file: string): Layout {
  const read = readPlant(readFileSync(folder + file, 'utf8'))
  if (read.outcome !== 'plant') throw new Error(read.message)
  return read.plant.layouts[0] as Layout
}

/** Paths given as numbers, but for those at 0 or 1, which are folded away. */
function givensOf({ units, streams, shafts }: Layout): string[] {
  return [...units, ...streams, ...shafts].flatMap(({ id, given }) =>
    Object.entries(given)
      .filter(([, value]) => typeof value === 'number' && value !== 0 && value !== 1)
      .map(([name]) => `${id}.${name}`),
  )
}

describe('where several numbers are missing, the first remedies fix everything together', () => {
  test.each(['one-heater.json', 'tarn-vale-1.json', 'harrow-fen.json'])('%s', (file) => {
    const layout = layoutOf(file)
    const whole = solve(new Model(layout))
    expect(whole.status).toBe('solved')
    const givens = givensOf(layout)
    fc.assert(
      fc.property(fc.subarray(givens, { minLength: 2, maxLength: 6 }), (freed) => {
        const short = withGivens(layout, new Map(freed.map((path) => [path, undefined])))
        const finding = solve(new Model(short)).findings.find(
          ({ missing }) => missing !== undefined && missing > 1,
        )
        // What only describes leaves nothing short when it is freed.
        if (!finding) return
        const first = (finding.remedies ?? []).slice(0, finding.missing)
        const given = withGivens(
          short,
          new Map(first.map(({ path }) => [path, whole.results.value(path) ?? undefined])),
        )
        const { findings } = solve(new Model(given))
        // By the structure: a temperature that turns out to be one of saturation is another matter.
        const structural = ['underspecified', 'overspecified']
        expect(findings.filter(({ code }) => structural.includes(code))).toEqual([])
      }),
      { numRuns: 25 },
    )
  })
})

test('they are what a plant is laid out by: pressures and temperatures before flows', () => {
  const layout = layoutOf('one-heater.json')
  const freed = ['main.m', 'main.p', 'main.T', 'condenser.pressure']
  const { findings } = solve(
    new Model(withGivens(layout, new Map(freed.map((path) => [path, undefined])))),
  )
  const [finding] = findings
  expect(finding?.missing).toBe(4)
  expect(finding?.remedies?.slice(0, 4).map(({ path }) => path)).toEqual([
    'condenser.pressure',
    'main.p',
    'main.T',
    'main.m',
  ])
  expect(finding?.message).toBe(
    '4 numbers are missing. These would do together: Condenser, pressure; Main steam, pressure; Main steam, temperature; Main steam, flow.',
  )
})
