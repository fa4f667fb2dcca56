import { Factors, SparseLU } from '../equations/newton/index.ts'
import { massBalancesOf } from './redundant.ts'
import type { System } from './system.ts'

/** Keeps repeated balances (of closed circuits) from making the system singular. */
const regularisation = 1e-9
/** Energy balances count relative to this enthalpy, J/kg. */
const enthalpyScale = 1e6
/** A flow guessed below this part of a bleed is raised to it: what flows, flows forward. */
const leastPart = 0.05

/** Power of a plant for each kg/s of its main steam, J/kg. */
const specificPower = 1.1e6
/** Conductance of a heater for each kg/s that it heats, J/(kg K). */
const specificConductance = 1e4
/** Density of water in pumps, kg/m3, about. */
const density = 900
/** By choice: what is known may all belong to small parts of the plant. */
const flowFactors = [1, 10, 1, 100, 3, 30, 1, 300, 0.3] as const
/** Main flow of a plant of which nothing is known, kg/s. */
const usualFlow = 100

/** One balance: the sum of coefficient times flow is zero. */
interface Balance {
  readonly streams: number[]
  readonly coefficients: number[]
}

/**
 * The size of the largest flow, by what is known: flows, powers and heats, what pumps displace,
 * conductances. Each can belong to a small part of the plant, so the largest counts.
 */
export function mainFlow(
  system: System,
  values: Float64Array,
  known: (index: number) => boolean,
  choice = 0,
): number {
  let largest = 0
  for (const { connections } of system.units) {
    for (const { description, base } of connections) {
      if (description.designed?.includes('m') && known(base)) largest = Math.abs(values[base]!)
    }
  }
  if (largest > 0) return largest
  for (const base of system.streamBase) {
    if (known(base)) largest = Math.max(largest, Math.abs(values[base]!))
  }
  system.variables.forEach(({ description, owner }, index) => {
    if (!known(index) || description.given) return
    const size = Math.abs(values[index]!)
    const kind = system.unitOf.get(owner)?.kind
    const { dimension } = description
    let flow = 0
    if (dimension === 'power' || dimension === 'heatFlow') flow = size / specificPower
    else if (dimension === 'volumeFlow' && kind?.raisesPressure) flow = size * density
    else if (dimension === 'conductance' && kind?.passes) flow = size / specificConductance
    if (Number.isFinite(flow)) largest = Math.max(largest, flow)
  })
  return (largest > 0 ? largest : usualFlow) * flowFactors[choice % flowFactors.length]!
}

/**
 * Shifts guessed flows as little as it takes, relative to their size, for mass to be conserved in
 * every unit and energy in those that only mix or exchange heat, at the guessed enthalpies.
 * `bleed` is the size of a bleed, kg/s.
 */
export function balanceFlows(
  system: System,
  values: Float64Array,
  known: (index: number) => boolean,
  bleed: number,
): void {
  const open: number[] = []
  const column = new Int32Array(system.streamBase.length).fill(-1)
  system.streamBase.forEach((base, k) => {
    if (known(base)) return
    column[k] = open.length
    open.push(k)
  })
  if (open.length === 0) return
  const balances = flowBalances(system, values)
  const n = open.length
  // Least squares with constraints: [I Aᵀ; A -ε] [y; λ] = [0; -A m0], m = m0 (1 + y).
  const rows: { columns: number[]; entries: number[] }[] = open.map((_, j) => ({
    columns: [j],
    entries: [1],
  }))
  const right = new Float64Array(n + balances.length)
  balances.forEach(({ streams, coefficients }, i) => {
    const row = { columns: [n + i], entries: [-regularisation] }
    streams.forEach((k, at) => {
      const flow = values[system.streamBase[k]!]!
      right[n + i]! -= coefficients[at]! * flow
      const j = column[k]!
      if (j < 0) return
      const entry = coefficients[at]! * flow
      const seen = row.columns.indexOf(j)
      if (seen >= 0) {
        row.entries[seen]! += entry
        const mirrored = rows[j]!.columns.indexOf(n + i)
        rows[j]!.entries[mirrored]! += entry
        return
      }
      row.columns.push(j)
      row.entries.push(entry)
      rows[j]!.columns.push(n + i)
      rows[j]!.entries.push(entry)
    })
    rows.push(row)
  })
  scaleRows(rows, right)
  const first = new Int32Array(rows.length + 1)
  rows.forEach((row, r) => {
    first[r + 1] = first[r]! + row.columns.length
  })
  const factors = new SparseLU(
    rows.length,
    first,
    Int32Array.from(rows.flatMap((row) => row.columns)),
  )
  const entries = Float64Array.from(rows.flatMap((row) => row.entries))
  if (factors.factorise(entries) !== Factors.fine) return
  const solution = new Float64Array(rows.length)
  factors.solve(right, solution)
  open.forEach((k, j) => {
    const base = system.streamBase[k]!
    const flow = values[base]! * (1 + solution[j]!)
    if (Number.isFinite(flow)) values[base] = Math.max(flow, leastPart * bleed)
  })
}

function scaleRows(
  rows: readonly { readonly columns: number[]; readonly entries: number[] }[],
  right: Float64Array,
): void {
  rows.forEach(({ entries }, r) => {
    let largest = 0
    for (const entry of entries) largest = Math.max(largest, Math.abs(entry))
    if (largest === 0) return
    for (let k = 0; k < entries.length; k++) entries[k]! /= largest
    right[r]! /= largest
  })
}

function flowBalances(system: System, values: Float64Array): Balance[] {
  const balances: Balance[] = []
  const place = new Map(system.layout.streams.map((stream, k) => [stream.id, k]))
  for (const { owner, streams } of massBalancesOf(system)) {
    const { connections } = system.unitOf.get(owner)!
    const coefficients = streams.map((k) => {
      const id = system.layout.streams[k]!.id
      const here = connections.find(({ stream }) => stream === id)
      return here?.description.direction === 'in' ? 1 : -1
    })
    balances.push({ streams: [...streams], coefficients })
  }
  for (const { kind, connections, open } of system.units) {
    if (kind.secondLaw !== 'adiabatic' || kind.shaft !== undefined || open.length > 0) continue
    const energy: Balance = { streams: [], coefficients: [] }
    for (const { stream, description } of connections) {
      const sign = description.direction === 'in' ? 1 : -1
      const k = place.get(stream)!
      energy.streams.push(k)
      energy.coefficients.push((sign * values[system.streamBase[k]! + 2]!) / enthalpyScale)
    }
    balances.push(energy)
  }
  return balances
}
