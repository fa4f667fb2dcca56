/**
 * Time from a plant's file object to its balance, in microseconds: medians over repeated runs.
 *
 * The plant: reheat, seven mixing heaters with a pump each (reheat-plants.ts). cold: a model that has
 * never been solved, from first guesses; warm: one given number changed and changed back by turns.
 * Beside it the same equations as one dense Newton iteration with finite differences (dense-newton.ts),
 * a hundred such plants in one file, and the growth of the times with the size of the plant.
 */
import { Model } from '../../src/balance/model.ts'
import { Results } from '../../src/balance/results.ts'
import { Sensitivity } from '../../src/balance/sensitivity.ts'
import { solve } from '../../src/balance/solve.ts'
import { analyse } from '../../src/balance/structure.ts'
import { assemble } from '../../src/balance/system.ts'
import type { Layout } from '../../src/plant/document.ts'
import { withGivens } from '../fuzz/draft.ts'
import { DenseNewton } from './dense-newton.ts'
import { heaterRow, reheatPlants } from './reheat-plants.ts'

/** Median time of `work` on what `prepare` makes for each run, µs. */
function median<T>(
  prepare: () => T,
  work: (prepared: T) => unknown,
  least = 60,
  seconds = 1,
): number {
  const times: number[] = []
  const end = performance.now() + 1000 * seconds
  while (times.length < least || performance.now() < end) {
    const prepared = prepare()
    const start = process.hrtime.bigint()
    work(prepared)
    times.push(Number(process.hrtime.bigint() - start) / 1000)
    if (times.length >= 5000) break
  }
  times.sort((a, b) => a - b)
  return times[times.length >> 1]!
}

function mustSolve(model: Model, name: string): void {
  const { status, closure } = solve(model)
  if (status !== 'solved' || !(closure!.energy < 1e-9)) throw new Error(`${name}: ${status}`)
}

const line = (name: string, time: number, note = ''): void => {
  const text = time < 10 ? time.toFixed(2) : time.toFixed(0)
  console.log(`${name.padEnd(44)}${text.padStart(10)}${note === '' ? '' : `   ${note}`}`)
}

const flowGiven = reheatPlants(1)
const power = solve(new Model(flowGiven)).results.value('plant.netPower')!
const powerGiven = withGivens(flowGiven, ['s1.m'], new Map([['plant.netPower', power]]))
for (const [name, layout] of [
  ['flow given', flowGiven],
  ['power given', powerGiven],
] as const) {
  const model = new Model(layout)
  mustSolve(model, name)
  const largest = Math.max(...model.structure.blocks.map(({ variables }) => variables.length))
  console.log(
    `${name}: ${layout.units.length} units, ${layout.streams.length} streams, ${model.structure.equationCount} equations, ${model.structure.blocks.length} blocks, largest ${largest}`,
  )
}

console.log('\nOne plant, µs (median)')
const assembling = median(
  () => flowGiven,
  (layout) => new Model(layout),
  200,
  3,
)
line('assembling, from the file object', assembling, 'of which:')
const system = assemble(flowGiven)
line(
  '  equations',
  median(() => flowGiven, assemble),
)
line(
  '  structure',
  median(() => system, analyse),
)
const fresh = (layout: Layout) => () => new Model(layout)
const coldFlow = median(fresh(flowGiven), (model) => model.solve(), 200, 3)
line('cold, flow given', coldFlow)
const coldPower = median(fresh(powerGiven), (model) => model.solve(), 200, 3)
line('cold, power given', coldPower)
line(
  'cold with results and findings',
  median(fresh(flowGiven), (model) => solve(model)),
)

/** Last bleed of the plant: where its pressure is given. */
const lastBleed = `${flowGiven.streams.find(({ from }) => from === 'turbine3.bleed4')!.id}.p`
for (const [name, layout, path, values] of [
  ['warm, flow changed', flowGiven, 's1.m', [120, 118]],
  ['warm, bleed pressure changed', flowGiven, lastBleed, [20e3, 21e3]],
  ['warm, power changed', powerGiven, 'plant.netPower', [power, 0.98 * power]],
] as const) {
  const model = new Model(layout)
  mustSolve(model, name)
  const index = model.system.indexOf.get(path)!
  let turn = 0
  line(
    name,
    median(
      () => values[turn++ & 1]!,
      (value) => {
        if (!model.set(index, value)) throw new Error(`${path} cannot be changed`)
        model.solve()
      },
    ),
  )
}
const solved = new Model(flowGiven)
mustSolve(solved, 'flow given')
const results = new Results(solved)
line(
  'reading all results',
  median(
    () => results,
    (all) => all.refresh(),
  ),
)
const sensitivity = new Sensitivity(solved)
const target = solved.system.indexOf.get('plant.unitHeatRate')!
line(
  'adjoint: one heat rate to all givens',
  median(
    () => sensitivity,
    (all) => {
      all.refresh()
      return all.of(target)
    },
  ),
)

console.log('\nThe same equations as one dense Newton iteration with finite differences')
for (const [name, layout, own] of [
  ['flow given', flowGiven, coldFlow],
  ['power given', powerGiven, coldPower],
] as const) {
  const dense = new DenseNewton(new Model(layout))
  const iterations = dense.solve()
  if (iterations < 0) throw new Error('the dense iteration does not converge')
  const time = median(
    () => dense,
    (one) => one.solve(),
    15,
  )
  line(
    `${name}, ${dense.n} unknowns, ${iterations} iterations`,
    time,
    `${(time / own).toFixed(0)} times`,
  )
}

console.log('\nA hundred plants in one file')
const hundred = reheatPlants(100)
const assemblingMany = median(
  () => hundred,
  (layout) => new Model(layout),
  5,
  2,
)
const coldMany = median(fresh(hundred), (model) => model.solve(), 5, 2)
line('assembling', assemblingMany, `${(assemblingMany / assembling).toFixed(0)} times one`)
line('cold', coldMany, `${(coldMany / coldFlow).toFixed(0)} times one`)
line(
  'both',
  assemblingMany + coldMany,
  `${((assemblingMany + coldMany) / (assembling + coldFlow)).toFixed(0)} times one`,
)

/** Slope of log time against log streams, by least squares. */
function exponentOf(points: readonly (readonly [streams: number, time: number])[]): number {
  const logs = points.map(([streams, time]) => [Math.log(streams), Math.log(time)] as const)
  const mean = (k: 0 | 1): number => logs.reduce((sum, point) => sum + point[k], 0) / logs.length
  const [x, y] = [mean(0), mean(1)]
  const over = logs.reduce((sum, point) => sum + (point[0] - x) * (point[1] - y), 0)
  return over / logs.reduce((sum, point) => sum + (point[0] - x) ** 2, 0)
}

function growth(name: string, layouts: readonly Layout[]): void {
  console.log(`\nGrowth: ${name}`)
  const assemblies: [number, number][] = []
  const solutions: [number, number][] = []
  for (const layout of layouts) {
    const streams = layout.streams.length
    const model = new Model(layout)
    mustSolve(model, `${name}, ${streams} streams`)
    const largest = Math.max(...model.structure.blocks.map(({ variables }) => variables.length))
    const assembly = median(
      () => layout,
      (one) => new Model(one),
      3,
      0.5,
    )
    const solution = median(fresh(layout), (one) => one.solve(), 3, 0.5)
    assemblies.push([streams, assembly])
    solutions.push([streams, solution])
    line(
      `${streams} streams, largest block ${largest}`,
      assembly,
      `assembling; cold ${solution.toFixed(0)}`,
    )
  }
  console.log(
    `exponents: assembling ${exponentOf(assemblies).toFixed(2)}, cold ${exponentOf(solutions).toFixed(2)}`,
  )
}

growth(
  'plants side by side, flow given',
  [1, 3, 10, 30, 100, 172].map((count) => reheatPlants(count)),
)
growth(
  'heaters in a row, flow given',
  [10, 30, 100, 300, 1000, 2000].map((count) => heaterRow(count)),
)
growth(
  'heaters in a row, power given: one block',
  [10, 30, 100, 300, 1000].map((count) =>
    withGivens(heaterRow(count), ['s1.m'], new Map([['plant.netPower', 150e6]])),
  ),
)
