import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { type Case, type Plant, readPlant } from '../../src/document.ts'
import { type AskedBalance, balanceOfCase, createEngine } from '../../src/engine.ts'
import type { BalanceMessage } from '../../src/messages.ts'
import { type Line, partLoads, runPartLoad } from './part-load-lines.ts'

/*
 * Off design on two examples: what must hold of a machine that stays what it is. The script
 * part-load.ts runs every example in steps of 1 %; here it is steps of 10 %.
 */

function example(file: string): Plant {
  const url = new URL(`../../public/examples/${file}`, import.meta.url)
  const read = readPlant(readFileSync(url, 'utf8'))
  if (read.outcome === 'unusable') throw new Error(read.message)
  return read.plant
}

function withCase(plant: Plant, one: Omit<Case, 'id' | 'name'>): Plant {
  const [layout] = plant.layouts
  return { ...plant, layouts: [{ ...layout!, cases: [{ id: 'it', name: 'It', ...one }] }] }
}

function solve(plant: Plant, id: string | null): AskedBalance {
  const answer = balanceOfCase(plant, plant.layouts[0]!.id, id)
  if (answer.outcome === 'unusable') throw new Error(answer.message)
  expect(answer.balance.status).toBe('solved')
  return answer.balance
}

type Numbers = Readonly<Record<string, number | string | null>>

/** Largest relative difference of two balances, and where. */
function farthest(one: AskedBalance, other: AskedBalance): readonly [number, string] {
  let worst: readonly [number, string] = [0, '']
  const look = (a: Numbers, b: Numbers, owner: string): void => {
    for (const [name, x] of Object.entries(a)) {
      const y = b[name]
      if (typeof x !== 'number' || typeof y !== 'number') {
        // A quantity that is none in one and a number in the other has changed its meaning.
        if (x !== y) worst = [1, `${owner}.${name}`]
        continue
      }
      const size = Math.max(Math.abs(x), Math.abs(y), sizes[name] ?? 1e-3)
      const difference = Math.abs(x - y) / size
      if (difference > worst[0]) worst = [difference, `${owner}.${name}`]
    }
  }
  for (const part of ['streams', 'units', 'shafts'] as const) {
    for (const [id, numbers] of Object.entries(one[part])) {
      look(numbers as Numbers, other[part][id] as Numbers, id)
    }
  }
  look(one.plant, other.plant, 'plant')
  return worst
}

/** Differences of large numbers: an approach of 0 K is judged by the size of approaches. SI. */
const sizes: Readonly<Record<string, number>> = {
  terminalDifference: 10,
  superheat: 10,
  subcooling: 10,
  entropyGenerated: 100,
  exergyDestroyed: 1e5,
  pressureDrop: 1e5,
  processHeat: 1e5,
  recoveredHeat: 1e5,
}

describe.each(['tarn-vale-2.json', 'tarn-vale-3.json'])('%s', (file) => {
  const plant = example(file)
  const design = solve(plant, null)
  const loads = partLoads(plant)

  test.each(['sliding', 'throttled', 'wideOpen'] as const)(
    'frozen at design load and %s, it is the design to 1e-8',
    (loadControl) => {
      const given: Record<string, number> = loadControl === 'wideOpen' ? {} : { 'main.m': 120 }
      const [difference, where] = farthest(
        design,
        solve(withCase(plant, { frozen: true, loadControl, given }), 'it'),
      )
      expect(difference, where).toBeLessThan(1e-8)
    },
  )

  const shares = [1, 0.9, 0.8, 0.7, 0.6, 0.5, 0.4, 0.3]
  const lines = new Map(
    loads.map((load) => [load.control, shares.map((share) => runPartLoad(plant, load, share))]),
  )
  const rates = (control: 'sliding' | 'throttled' | 'wideOpen'): number[] =>
    (lines.get(control) as Line[]).map(({ heatRate }) => heatRate ?? Number.NaN)

  test('every load control reaches 30 % without a gap', () => {
    expect([...lines.keys()].sort()).toEqual(['sliding', 'throttled', 'wideOpen'])
    for (const all of lines.values()) {
      expect(all.map(({ status }) => status)).toEqual(shares.map(() => 'solved'))
    }
  })

  test('the heat rate rises as the load falls', () => {
    for (const control of lines.keys()) {
      const found = rates(control)
      found.slice(1).forEach((rate, i) => {
        expect(rate, `${control} at ${shares[i + 1]}`).toBeGreaterThan(found[i]!)
      })
    }
  })

  test('throttling is never better than sliding pressure', () => {
    const sliding = rates('sliding')
    rates('throttled').forEach((rate, i) => {
      if (shares[i] === 1) expect(rate / sliding[i]!).toBeCloseTo(1, 9)
      else expect(rate, `at ${shares[i]}`).toBeGreaterThan(sliding[i]!)
    })
  })

  test('pressures between the groups fall with the flow, as the ellipse law says', () => {
    const half = solve(
      withCase(plant, { frozen: true, loadControl: 'sliding', given: { 'main.m': 60 } }),
      'it',
    )
    for (const [turbine, group, from, to] of [
      ['ip', 2, 'b5', 'ipx'],
      ['lp', 2, 'b3', 'b2'],
    ] as const) {
      const stream = (id: string) => half.streams[id] as Record<string, number>
      const [a, b] = [stream(from), stream(to)]
      const outlets = turbine === 'ip' ? ['ipx'] : ['b2', 'b1', 'lpx']
      const flow = outlets.reduce((sum, id) => sum + stream(id).m!, 0)
      const constant = design.units[turbine]?.[`flowConstant${group}`] as number
      const law = constant * Math.sqrt(a.p! / a.v!) * Math.sqrt(1 - (b.p! / a.p!) ** 2)
      expect(flow / law).toBeCloseTo(1, 8)
      // Far from choking the pressure follows the flow closely.
      const atDesign = design.streams[from] as Record<string, number>
      const flowAtDesign = outlets.reduce(
        (sum, id) => sum + (design.streams[id] as Record<string, number>).m!,
        0,
      )
      expect(a.p! / atDesign.p! / (flow / flowAtDesign)).toBeCloseTo(1, 1)
    }
  })

  const without = (heater: string): AskedBalance =>
    solve(
      withCase(plant, {
        frozen: true,
        loadControl: 'sliding',
        given: { 'main.m': 120 },
        outOfService: [heater],
      }),
      'it',
    )

  test('an HP heater out of service: more output and a worse heat rate at the same main steam', () => {
    for (const heater of ['h7', 'h6']) {
      const { plant: totals, units } = without(heater)
      expect(totals.netPower, heater).toBeGreaterThan(design.plant.netPower as number)
      expect(totals.unitHeatRate, heater).toBeGreaterThan(design.plant.unitHeatRate as number)
      expect(units[heater]?.heat).toBeNull()
    }
  })

  // The deaerator makes up for it with dearer steam: the boiler's heat stays, the output falls.
  test('a heater before the deaerator out of service: less output from the same heat', () => {
    const { plant: totals } = without('h3')
    expect((totals.heatInput as number) / (design.plant.heatInput as number)).toBeCloseTo(1, 2)
    expect(totals.netPower).toBeLessThan(design.plant.netPower as number)
    expect(totals.unitHeatRate).toBeGreaterThan(design.plant.unitHeatRate as number)
  })

  test('warm and cold give the same', () => {
    const one = withCase(plant, { frozen: true, loadControl: 'sliding', given: { 'main.m': 84 } })
    const balanceFrom = (engine: ReturnType<typeof createEngine>, id: string | null, which = one) =>
      engine
        .answer({ type: 'solve', sequence: 1, plant: which, layout: 'base', case: id })
        .find((answer): answer is BalanceMessage => answer.type === 'balance')!
    const cold = balanceFrom(createEngine(), 'it')
    const engine = createEngine()
    balanceFrom(engine, null)
    for (const m of [110, 60, 100]) {
      balanceFrom(
        engine,
        'it',
        withCase(plant, { frozen: true, loadControl: 'sliding', given: { 'main.m': m } }),
      )
    }
    const warm = balanceFrom(engine, 'it')
    expect(warm.status).toBe('solved')
    cold.values.forEach((value, i) => {
      const other = warm.values[i]!
      if (Number.isNaN(value)) expect(other).toBeNaN()
      else expect(Math.abs(value - other)).toBeLessThan(1e-8 * Math.max(Math.abs(value), 1e-3))
    })
  })
})
