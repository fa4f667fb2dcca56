/**
 * Time of one state (T, s, v, x with all partials from p and h), in ns per call: medians over
 * repeated runs, beside the published sums written with Math.pow in the same run.
 *
 * cold: an empty record and a pressure not met lately; warm: the record holds a state 0.1 % away in
 * h at the same pressure; moved: 0.1 % away in both p and h, so that saturation is new as well.
 */
import {
  enthalpyAtPressureEntropy,
  enthalpyAtPressureTemperature,
  RESULT_SIZE,
  SATURATION_SIZE,
  STATE_SIZE,
  State,
  saturationAtPressure,
  state,
  stateAtPressureEnthalpy,
} from '../../src/steam/index.ts'
import { plainDenseState, plainState } from '../reference/plain-if97.ts'

// Before anything else is compiled: what the first plant waits for.
const begun = performance.now()
const plant = new Float64Array(100 * STATE_SIZE)
for (let pass = 0; pass < 12; pass++) {
  const factor = 1 + 0.01 / (pass + 1) ** 3
  for (let i = 0; i < 100; i++) {
    const p = 3e3 * 5e3 ** (i / 100)
    const h = [2.9e6, 0.4e6 * Math.min(1, 0.3 + i / 100), 1.2e6][i % 3] as number
    stateAtPressureEnthalpy(plant, i * STATE_SIZE, p * factor, h * factor)
  }
}
const solved = performance.now()
console.log(`first 12 passes over 100 states: ${(solved - begun).toFixed(1)} ms\n`)

/** States of one kind: pressures (Pa) and enthalpies (J/kg). */
interface Sample {
  readonly name: string
  readonly p: Float64Array
  readonly h: Float64Array
}

// As many states as a large plant has; more would measure the memory.
const COUNT = 256
const RUNS = 801

// A repeatable sequence of numbers between 0 and 1.
let seed = 12345
function random(): number {
  seed = (Math.imul(seed, 1664525) + 1013904223) >>> 0
  return seed / 4294967296
}

function sample(name: string, draw: () => readonly [number, number]): Sample {
  const p = new Float64Array(COUNT)
  const h = new Float64Array(COUNT)
  for (let i = 0; i < COUNT; ) {
    const [pressure, enthalpy] = draw()
    if (!Number.isFinite(enthalpy)) continue
    p[i] = pressure
    h[i] = enthalpy
    i += 1
  }
  return { name, p, h }
}

function enthalpyAt(p: number, T: number): number {
  const found = state({ p, T })
  return found.outcome === 'state' ? found.h : Number.NaN
}

const between = (low: number, high: number): number => low + (high - low) * random()
const spread = (low: number, high: number): number => low * (high / low) ** random()

const samples = [
  sample('region 1', () => {
    const p = spread(0.1e6, 16e6)
    const T = between(290, 600)
    const found = state({ p, T })
    return [p, found.outcome === 'state' && found.phase === 'liquid' ? found.h : Number.NaN]
  }),
  sample('region 2', () => {
    const p = spread(3e3, 16e6)
    const T = between(310, 850)
    const found = state({ p, T })
    return [p, found.outcome === 'state' && found.phase === 'vapour' ? found.h : Number.NaN]
  }),
  sample('region 3', () => {
    const p = between(22.5e6, 40e6)
    return [p, enthalpyAt(p, between(640, 670))]
  }),
  sample('wet', () => {
    const p = spread(3e3, 16e6)
    const found = state({ p, x: between(0.05, 0.98) })
    return [p, found.outcome === 'state' ? found.h : Number.NaN]
  }),
]

/** Median and least of repeated runs, ns per call. */
interface Time {
  readonly median: number
  readonly least: number
}

/**
 * Time per call over the states of a sample. Short passes come first, so that the pass as a whole
 * is compiled before it is timed.
 */
function time(pass: (count: number) => void, count = COUNT, runs = RUNS): Time {
  for (let i = 0; i < 5000; i++) pass(4)
  for (let i = 0; i < 100; i++) pass(count)
  const times: number[] = []
  for (let i = 0; i < runs; i++) {
    const start = process.hrtime.bigint()
    pass(count)
    times.push(Number(process.hrtime.bigint() - start) / count)
  }
  times.sort((x, y) => x - y)
  return { median: times[runs >> 1] as number, least: times[0] as number }
}

const records = new Float64Array(COUNT * STATE_SIZE)
const results = new Float64Array(COUNT * RESULT_SIZE)
const saturations = new Float64Array(COUNT * SATURATION_SIZE)
let sink = 0

function check(code: number): void {
  if (code !== 0) throw new Error(`outcome ${code}`)
}

function cold({ p, h }: Sample): (count: number) => void {
  let pf = 1
  return (count) => {
    // a pressure never met before, so that nothing is cached
    pf += 1e-9
    for (let i = 0; i < count; i++) {
      const at = i * STATE_SIZE
      records[at + State.region] = 0
      records[at + State.saturation] = 0
      check(stateAtPressureEnthalpy(records, at, (p[i] as number) * pf, h[i] as number))
    }
    sink += records[State.T] as number
  }
}

/** Each state and one nearby by turns, so that each call finds the other one in its record. */
function moving({ p, h }: Sample, dp: number, dh: number): (count: number) => void {
  let turn = 0
  let drift = 1
  return (count) => {
    turn = 1 - turn
    if (dp !== 0) drift += 1e-9
    const pf = drift + dp * turn
    const hf = 1 + dh * turn
    for (let i = 0; i < count; i++) {
      const code = stateAtPressureEnthalpy(
        records,
        i * STATE_SIZE,
        (p[i] as number) * pf,
        (h[i] as number) * hf,
      )
      check(code)
    }
    sink += records[State.T] as number
  }
}

function plain({ name, p, h }: Sample): (count: number) => void {
  const solve = name === 'region 3' ? plainDenseState : plainState
  return (count) => {
    for (let i = 0; i < count; i++) sink += solve(p[i] as number, h[i] as number).T
  }
}

const round = (value: number): string => value.toFixed(value < 10 ? 1 : 0)

function row(name: string, cells: readonly (string | number | Time)[]): void {
  const text = cells.map((cell) => {
    if (typeof cell === 'string') return cell
    return typeof cell === 'number' ? round(cell) : `${round(cell.median)} (${round(cell.least)})`
  })
  console.log(name.padEnd(30) + text.map((value) => value.padStart(16)).join(''))
}

console.log('ns per call: median (least)')
row('one dependent multiply-add', [
  time((count) => {
    let x = 1
    for (let i = 0; i < 64 * count; i++) x = x * 1.0000001 + 1e-9
    sink += x
  }).median / 64,
])
console.log('\nState from p and h with all partials')
row('', ['warm', 'moved', 'cold', 'plain', 'plain / cold'])
for (const each of samples) {
  const whenCold = time(cold(each))
  // the states are those of this sample: fill the records anew before each warm run
  cold(each)(COUNT)
  const whenWarm = time(moving(each, 0, -1e-3))
  cold(each)(COUNT)
  const whenMoved = time(moving(each, 1e-3, -1e-3))
  const whenPlain = time(plain(each), COUNT, 11)
  const ratio = whenPlain.least / whenCold.least
  row(each.name, [whenWarm, whenMoved, whenCold, whenPlain, ratio])
}

const collect = (globalThis as { gc?: () => void }).gc
if (collect !== undefined) {
  console.log('\nBytes allocated per call')
  for (const each of samples) {
    cold(each)(COUNT)
    const bytes = [moving(each, 0, -1e-3), moving(each, 1e-3, -1e-3)].map((pass) => {
      for (let i = 0; i < 5000; i++) pass(4)
      for (let i = 0; i < 100; i++) pass(COUNT)
      collect()
      const before = process.memoryUsage().heapUsed
      for (let i = 0; i < 50; i++) pass(COUNT)
      return (process.memoryUsage().heapUsed - before) / (50 * COUNT)
    })
    row(each.name, bytes)
  }
}

console.log('\nOther functions')
const [first, second, third, fourth] = samples as [Sample, Sample, Sample, Sample]
let drift = 1
row('saturation record', [
  time((count) => {
    drift += 1e-9
    for (let i = 0; i < count; i++) {
      const at = i * SATURATION_SIZE
      check(saturationAtPressure(saturations, at, (fourth.p[i] as number) * drift))
    }
  }),
])
for (const { name, p, h } of [first, second, third, fourth]) {
  const s = new Float64Array(COUNT)
  const T = new Float64Array(COUNT)
  for (let i = 0; i < COUNT; i++) {
    const found = state({ p: p[i] as number, h: h[i] as number })
    if (found.outcome === 'state') {
      s[i] = found.s
      T[i] = found.T
    }
  }
  row(`h(p, s), ${name}`, [
    time((count) => {
      for (let i = 0; i < count; i++) {
        check(enthalpyAtPressureEntropy(results, i * RESULT_SIZE, p[i] as number, s[i] as number))
      }
    }),
  ])
  if (name === 'wet') continue
  row(`h(p, T), ${name}`, [
    time((count) => {
      for (let i = 0; i < count; i++) {
        check(
          enthalpyAtPressureTemperature(results, i * RESULT_SIZE, p[i] as number, T[i] as number),
        )
      }
    }),
  ])
}
if (!Number.isFinite(sink)) throw new Error('a state is not finite')
