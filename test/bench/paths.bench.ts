/**
 * Time of all that the charts need of a balance (process paths, isobars, profiles, accounts) at a plant
 * of some 60 streams: medians over repeated balances, in ms. `same`: nothing changed since the balance
 * before; `edit`: the main steam temperature moves by 0.1 K each time, so that most states do; `fresh`:
 * nothing is remembered.
 */
import { readFileSync } from 'node:fs'
import { curvesOf, isobarsOf } from '../../src/balance/chart-data.ts'
import { derivedNames, derivedOf } from '../../src/balance/derived.ts'
import { heatProfilesOf } from '../../src/balance/heat-profile.ts'
import { Model } from '../../src/balance/model.ts'
import { Results } from '../../src/balance/results.ts'
import { solve } from '../../src/balance/solve.ts'
import { readPlant } from '../../src/document.ts'

const file = process.argv[2] ?? new URL('../reference/cases/o5-seven.json', import.meta.url)
const read = readPlant(readFileSync(file, 'utf8'))
if (read.outcome !== 'plant') throw new Error('The plant of the benchmark cannot be read.')
const layout = read.plant.layouts[0]
if (!layout) throw new Error('The plant of the benchmark has no layout.')

const model = new Model(layout)
const results = new Results(model)
let balance = solve(model, results)
const streams = layout.streams.length
console.log(`${streams} streams, ${balance.status}`)

const median = (times: number[]): number =>
  times.sort((a, b) => a - b)[Math.floor(times.length / 2)] as number

function time(name: string, before: (i: number) => void, run: () => unknown): void {
  for (let i = 0; i < 60; i++) {
    before(i)
    run()
  }
  const times: number[] = []
  for (let i = 0; i < 400; i++) {
    before(i)
    const start = performance.now()
    run()
    times.push(performance.now() - start)
  }
  console.log(`${name.padEnd(28)} ${median(times).toFixed(3)} ms`)
}

const hot = layout.streams.find(({ given }) => typeof given.T === 'number')
const index = hot ? model.system.indexOf.get(`${hot.id}.T`) : undefined
const first = hot ? (hot.given.T as number) : 0
const edit = (i: number): void => {
  if (index !== undefined) model.set(index, first + 0.1 * (i % 20))
  balance = solve(model, results)
}

time(
  'paths, same',
  () => {},
  () => curvesOf(balance),
)
time('paths, edit', edit, () => curvesOf(balance))
time(
  'paths, fresh model',
  () => {
    balance = solve(new Model(layout))
  },
  () => curvesOf(balance),
)
time(
  'isobars, same',
  () => {},
  () => isobarsOf(balance),
)
time('isobars, edit', edit, () => isobarsOf(balance))
const names = derivedNames(balance)
time('derived', edit, () => derivedOf(balance, names))
time('profiles, edit', edit, () => heatProfilesOf(balance))
