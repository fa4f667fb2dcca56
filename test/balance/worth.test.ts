import { readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import { solveCase } from '../../src/balance/case/solve-case.ts'
import { Model } from '../../src/balance/model.ts'
import { Questions } from '../../src/balance/questions.ts'
import { solve } from '../../src/balance/solve.ts'
import { type Layout, readPlant } from '../../src/document.ts'
import type { Worth } from '../../src/messages.ts'

const read = readPlant(readFileSync('test/reference/cases/o5-seven.json', 'utf8'))
if (read.outcome !== 'plant') throw new Error(read.message)
const { plant } = read
const layout = plant.layouts[0] as Layout

function ask(model: Model, target: string, frozen = false): readonly Worth[] {
  const questions = new Questions()
  questions.takeOver(solve(model))
  const answer = questions.answer({ type: 'worth', target, frozen })
  if (answer.type !== 'worth') throw new Error('another answer than asked for')
  return answer.worths
}

/** Half the difference that a step up and a step down make, times `parts`. */
function stepped(target: string, path: string, step: number): number {
  const model = new Model(layout)
  const index = model.system.indexOf.get(path) as number
  const value = model.system.given[index] as number
  const at = (change: number): number => {
    // A value of 0 or 1 changes the structure: a model of its own.
    const changed = model.set(index, value + change) ? model : modelWith(path, value + change)
    return solve(changed).results.value(target) ?? Number.NaN
  }
  const small = step / 256
  return ((at(small) - at(-small)) / 2) * 256
}

function modelWith(path: string, value: number): Model {
  const [id, name] = path.split('.') as [string, string]
  const set = <T extends { readonly id: string; readonly given: object }>(one: T): T =>
    one.id === id ? { ...one, given: { ...one.given, [name]: value } } : one
  return new Model({
    ...layout,
    units: layout.units.map(set),
    streams: layout.streams.map(set),
    shafts: layout.shafts.map(set),
  })
}

test.for(['plant.unitHeatRate', 'plant.netPower'])(
  'worth of every given for %s is what a small step does, solved anew',
  { timeout: 120_000 },
  (target) => {
    const worths = ask(new Model(layout), target)
    expect(worths.length).toBeGreaterThan(60)
    const whole = Math.max(...worths.map(({ fixed }) => Math.abs(fixed)))
    for (const { path, step, fixed } of worths) {
      const value = layoutValue(path)
      // One-sided: what may not fall below nought cannot be stepped down.
      if (value === 0 || value === 1) continue
      expect(Math.abs(fixed - stepped(target, path, step)), path).toBeLessThan(
        2e-3 * Math.abs(fixed) + 1e-5 * whole,
      )
    }
  },
)

function layoutValue(path: string): number {
  const model = new Model(layout)
  return model.system.given[model.system.indexOf.get(path) as number] as number
}

test('a temperature, which is no unknown of its own, has its worths too', () => {
  const worths = ask(new Model(layout), 'fw.T')
  for (const path of ['h7.terminalDifference', 'b7.p']) {
    const { step, fixed } = worths.find((one) => one.path === path) as Worth
    expect(fixed / stepped('fw.T', path, step), path).toBeCloseTo(1, 3)
  }
})

test('worth with the hardware frozen is what a small step does to the frozen plant', () => {
  const worths = ask(new Model(layout), 'plant.unitHeatRate', true)
  const frozenCase = (path: string, value: number): number => {
    const one = {
      id: 'frozen',
      name: 'Frozen',
      frozen: true,
      loadControl: 'sliding',
      given: { [path]: value },
    } as const
    const changed = { ...plant, layouts: [{ ...layout, cases: [one] }] }
    const solved = solveCase(changed, layout.id, 'frozen')
    if (solved.outcome === 'unusable') throw new Error(solved.message)
    return solved.balance.results.value('plant.unitHeatRate') ?? Number.NaN
  }
  for (const path of ['cd.coolingInletT', 'cd.coolingFlow', 'hp.groupEfficiency1', 'main.T']) {
    const { step, frozen } = worths.find((one) => one.path === path) as Worth
    const value = layoutValue(path)
    const small = step / 16
    const wanted = ((frozenCase(path, value + small) - frozenCase(path, value - small)) / 2) * 16
    expect((frozen as number) / wanted, path).toBeCloseTo(1, 2)
  }
})

test('the hardware is frozen as it is now, not as it was when the plant was opened', () => {
  const model = new Model(layout)
  const questions = new Questions()
  questions.takeOver(solve(model))
  const worth = (): number | null => {
    const answer = questions.answer({
      type: 'worth',
      target: 'plant.netPower',
      frozen: true,
    })
    const found = answer.type === 'worth' ? answer.worths : []
    return found.find(({ path }) => path === 'main.m')?.frozen ?? null
  }
  worth()
  model.set(model.system.indexOf.get('main.m') as number, 90)
  questions.takeOver(solve(model))
  const again = worth()
  const fresh = ask(modelWith('main.m', 90), 'plant.netPower', true)
  expect(
    (again as number) / (fresh.find(({ path }) => path === 'main.m')?.frozen ?? 0),
  ).toBeCloseTo(1, 6)
})

test('a target that the plant does not have has no worths', () => {
  expect(ask(new Model(layout), 'plant.nothing')).toEqual([])
})

test('an approach whose conductance follows the flow is worth what fouling costs per kelvin', () => {
  const file = readPlant(readFileSync('public/examples/tarn-vale-2.json', 'utf8'))
  if (file.outcome !== 'plant') throw new Error(file.message)
  const base = file.plant.layouts[0] as Layout
  const model = new Model(base)
  const { results } = solve(model)
  const { step, frozen } = ask(new Model(base), 'plant.unitHeatRate', true).find(
    ({ path }) => path === 'h5.terminalDifference',
  ) as Worth
  const water = base.streams.find(({ to }) => to === 'h5.water')?.id ?? ''
  const law = (scale: number) => {
    const power = {
      at: results.value(`${water}.m`) as number,
      value: (results.value('h5.conductance') as number) * scale,
      exponent: results.value('h5.conductanceExponent') as number,
    }
    const one = {
      id: 'fouled',
      name: 'Fouled',
      frozen: true,
      loadControl: 'sliding',
      given: { 'h5.conductance': { against: `${water}.m`, power } },
    } as const
    const changed = { ...file.plant, layouts: [{ ...base, cases: [one] }] }
    const solved = solveCase(changed, base.id, 'fouled')
    if (solved.outcome === 'unusable') throw new Error(solved.message)
    const read = (path: string) => solved.balance.results.value(path) as number
    return { rate: read('plant.unitHeatRate'), approach: read('h5.terminalDifference') }
  }
  const [clean, fouled] = [law(1.002), law(0.998)]
  const wanted = ((fouled.rate - clean.rate) / (fouled.approach - clean.approach)) * step
  expect((frozen as number) / wanted).toBeCloseTo(1, 2)
})
