import { Model } from '../../src/balance/model.ts'
import { type Balance, solve } from '../../src/balance/solve.ts'
import { readPlant } from '../../src/document.ts'
import type { Layout } from '../../src/plant/document.ts'
import { plantOf } from './draft.ts'
import { KnownState } from './known-state.ts'

/** Largest residual of any equation that an answer may leave, relative to its terms. */
const residualTolerance = 1e-8
/** What the contract allows the closure to be. */
const closureTolerance = 1e-9

export interface Answer {
  readonly balance: Balance
  /** Time from the file's text to the answer, ms. */
  readonly milliseconds: number
  readonly largestBlock: number
}

/** Reads a plant's file and solves it cold. */
export function solveFile(layout: Layout, title: string): Answer {
  const text = JSON.stringify(plantOf(layout, title))
  const start = performance.now()
  const read = readPlant(text)
  if (read.outcome === 'unusable') throw new Error(`${title}: ${read.message}`)
  const model = new Model(read.plant.layouts[0]!)
  const balance = solve(model)
  const milliseconds = performance.now() - start
  let largestBlock = 0
  for (const { variables } of model.structure.blocks) {
    if (variables.length > largestBlock) largestBlock = variables.length
  }
  return { balance, milliseconds, largestBlock }
}

/** What is wrong with an answer that should be `solved`; undefined when nothing is. */
export function faultOf(balance: Balance): string | undefined {
  if (balance.status !== 'solved') {
    const first = balance.findings.find(({ severity }) => severity === 'error')
    return `${balance.status}${first ? ` ${first.code}` : ''}`
  }
  const { mass, energy } = balance.closure!
  if (!(mass <= closureTolerance && energy <= closureTolerance)) return 'closure'
  return notANumber(balance) ?? missedEquation(balance.model) ?? openPlant(balance)
}

const shown = ['m', 'p', 'h', 'T', 's', 'v'] as const

/** In every status: what has no value is null, never NaN or infinite without being said so. */
export function notANumber({ model, results, status }: Balance): string | undefined {
  const { states } = results
  const { lost } = model.program
  for (let k = 0; k < states.phases.length; k++) {
    const base = model.system.streamBase[k]!
    const known = !lost[base] && !lost[base + 1] && !lost[base + 2]
    // An answer that cannot be may hold a state for which there are no properties.
    const names = status === 'solved' ? shown : shown.slice(0, 3)
    for (const name of names) {
      if (known && !Number.isFinite(states.get(k, name))) return 'not a number'
    }
  }
  for (let v = 0; v < model.system.variables.length; v++) {
    if (!lost[v] && !Number.isFinite(model.values[v]!)) return 'not a number'
  }
  return undefined
}

/** Every equation holds, those that the solver leaves out included. */
function missedEquation(model: Model): string | undefined {
  const state = KnownState.of(model)
  const { size } = state.worstResidual()
  return size > residualTolerance ? 'equation not met' : undefined
}

/** First law over the whole plant, from streams and totals alone. */
function openPlant({ model, results }: Balance): string | undefined {
  const { layout } = model.system
  const value = (path: string): number => results.value(path) ?? Number.NaN
  const kindOf = new Map(layout.units.map(({ id, kind }) => [id, kind]))
  const kindAt = (port: string): string => kindOf.get(port.slice(0, port.indexOf('.')))!
  let mass = 0
  let energy = 0
  let largest = 0
  for (const { id, from, to } of layout.streams) {
    const m = value(`${id}.m`)
    const h = value(`${id}.h`)
    largest = Math.max(largest, m)
    let sign = (kindAt(from) === 'supply' ? 1 : 0) - (kindAt(to) === 'offtake' ? 1 : 0)
    // What a heat user keeps leaves the plant as what it sends back.
    if (kindAt(from) === 'heatUser') sign -= 1 / value(`${from.split('.')[0]}.returnFraction`) - 1
    mass += sign * m
    energy += sign * m * h
  }
  for (const { id, kind } of layout.units) {
    if (kind === 'pipe') energy -= value(`${id}.heatLoss`)
  }
  const plant = (name: string): number => value(`plant.${name}`)
  energy += plant('heatInput') + plant('recoveredHeat') + plant('pumpPower')
  energy -= plant('turbinePower') + plant('heatRejected') + plant('processHeat')
  const scale = Math.max(plant('heatInput'), largest * 1e5)
  const closes = Math.abs(mass) <= 1e-8 * largest && Math.abs(energy) <= 1e-8 * scale
  return closes ? undefined : 'plant does not close'
}
