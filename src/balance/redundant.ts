import { variablesOf } from '../equations/expression/index.ts'
import type { System } from './system.ts'

/** Sets that grow together. */
class Partition {
  private readonly parent: Int32Array

  constructor(size: number) {
    this.parent = Int32Array.from({ length: size }, (_, k) => k)
  }

  find(k: number): number {
    let root = k
    while (this.parent[root] !== root) root = this.parent[root]!
    while (this.parent[k] !== root) {
      const next = this.parent[k]!
      this.parent[k] = root
      k = next
    }
    return root
  }

  /** False when the two were together already. */
  join(a: number, b: number): boolean {
    const rootA = this.find(a)
    const rootB = this.find(b)
    if (rootA === rootB) return false
    this.parent[Math.max(rootA, rootB)] = Math.min(rootA, rootB)
    return true
  }
}

/**
 * Equations that follow from the others: one mass balance of every closed circuit, and pressure
 * equalities that only repeat others round a loop. The closure proves that they hold.
 */
export function redundantEquations(system: System): ReadonlySet<number> {
  const redundant = new Set<number>()
  leaveOutMassBalances(system, redundant)
  leaveOutPressureEqualities(system, redundant)
  return redundant
}

export interface MassBalance {
  /** Its place among the system's equations. */
  readonly equation: number
  readonly owner: string
  /** Places of the streams in it. */
  readonly streams: readonly number[]
  /** It holds a port without a stream. */
  readonly isOpen: boolean
}

/** The balances that sum flows with coefficients of plus or minus one. */
export function massBalancesOf(system: System): MassBalance[] {
  const { layout, equations, variables } = system
  const placeOf = new Map(layout.streams.map((stream, k) => [stream.id, k]))
  const balances: MassBalance[] = []
  /** By variable: the equation that met it last. */
  const usedBy = new Int32Array(variables.length).fill(-1)
  equations.forEach(({ equation, owner }, e) => {
    if (equation.role !== 'mass') return
    const used = variablesOf(equation)
    for (const index of used) usedBy[index] = e
    const streams: number[] = []
    // The ports are asked, not the variables: a flow given as 0 or 1 is folded away.
    for (const id of system.unitOf.get(owner)!.streams.values()) {
      const place = placeOf.get(id)!
      const flow = system.streamBase[place]!
      if (usedBy[flow] === e || isFolded(system, flow)) streams.push(place)
    }
    const isOpen = used.some((index) => variables[index]!.isPhantom)
    balances.push({ equation: e, owner, streams, isOpen })
  })
  return balances
}

function leaveOutMassBalances(system: System, redundant: Set<number>): void {
  const count = system.layout.streams.length
  const circuits = new Partition(count)
  /** By stream: how many of its two ends a mass balance closes. */
  const closedEnds = new Int32Array(count)
  const open = new Uint8Array(count)
  const balances = massBalancesOf(system).filter(({ streams }) => streams.length > 0)
  for (const { streams, isOpen } of balances) {
    for (const place of streams) {
      closedEnds[place]!++
      circuits.join(streams[0]!, place)
      if (isOpen) open[place] = 1
    }
  }
  const isOpen = new Map<number, boolean>()
  for (let place = 0; place < count; place++) {
    const root = circuits.find(place)
    if (closedEnds[place]! < 2 || open[place]) isOpen.set(root, true)
    else if (!isOpen.has(root)) isOpen.set(root, false)
  }
  // Of each closed circuit the balance with most streams goes: it is the least telling one.
  const chosen = new Map<number, { equation: number; streams: number }>()
  for (const { equation, streams } of balances) {
    const root = circuits.find(streams[0]!)
    if (isOpen.get(root) !== false) continue
    const best = chosen.get(root)
    if (best === undefined || streams.length > best.streams) {
      chosen.set(root, { equation, streams: streams.length })
    }
  }
  for (const { equation } of chosen.values()) redundant.add(equation)
}

function isFolded(system: System, index: number): boolean {
  return system.given[index] === 0 || system.given[index] === 1
}

function leaveOutPressureEqualities(system: System, redundant: Set<number>): void {
  const pressures = new Partition(system.variables.length)
  system.equations.forEach(({ equation: { left, right } }, e) => {
    if (left.kind !== 'variable' || right.kind !== 'variable') return
    if (system.variables[left.index]!.description.dimension !== 'pressure') return
    if (system.variables[right.index]!.description.dimension !== 'pressure') return
    if (!pressures.join(left.index, right.index)) redundant.add(e)
  })
}
