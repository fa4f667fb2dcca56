import { forEachVariableOf } from '../equations/expression/index.ts'
import type { Block } from '../equations/newton/index.ts'
import {
  blocksInOrder,
  decompose,
  incidence,
  maximumMatching,
  Part,
} from '../equations/structure/index.ts'
import { redundantEquations } from './redundant.ts'
import type { System } from './system.ts'

/** A part of the equations that is short of numbers or has too many. */
export interface Misfit {
  /** How many numbers are missing, or too many. */
  readonly count: number
  /** Variables each of which, given alone (or freed alone), lowers the count. */
  readonly variables: readonly number[]
  /** Streams with an open pressure or enthalpy: any other quantity of their state helps as well. */
  readonly streams: readonly string[]
  readonly equations: readonly number[]
}

/** What can be solved, in which order, and what cannot. */
export interface Structure {
  readonly blocks: readonly Block[]
  /** The first of the blocks that only describe. */
  readonly describingFrom: number
  readonly missing: number
  readonly excess: number
  readonly under: readonly Misfit[]
  readonly over: readonly Misfit[]
  readonly equationCount: number
  /** Unknowns that no block solves for. */
  readonly open: readonly number[]
}

/** By equation: its unknown variables. */
function unknownsByEquation(system: System): number[][] {
  return system.equations.map(({ equation }) => {
    const unknowns: number[] = []
    forEachVariableOf(equation, (index) => {
      if (Number.isNaN(system.given[index]!)) unknowns.push(index)
    })
    return unknowns
  })
}

interface Peeled {
  readonly equation: number
  readonly variable: number
}

/**
 * Peels quantities that only describe: again and again an equation with an unknown that occurs
 * nowhere else and is no stream's m, p or h goes, with that unknown.
 */
function peel(
  system: System,
  unknowns: readonly number[][],
  gone: Uint8Array,
): { readonly peeled: readonly Peeled[]; readonly count: Int32Array } {
  const count = new Int32Array(system.variables.length)
  const users: number[][] = Array.from({ length: system.variables.length }, () => [])
  unknowns.forEach((list, e) => {
    if (gone[e]) return
    for (const index of list) {
      count[index]!++
      users[index]!.push(e)
    }
  })
  const peeled: Peeled[] = []
  const queue: number[] = []
  for (let v = 0; v < count.length; v++) {
    if (count[v] === 1 && !system.variables[v]!.isState) queue.push(v)
  }
  for (let at = 0; at < queue.length; at++) {
    const variable = queue[at]!
    if (count[variable] !== 1) continue
    const equation = users[variable]!.find((e) => !gone[e])!
    gone[equation] = 1
    peeled.push({ equation, variable })
    for (const index of unknowns[equation]!) {
      count[index]!--
      if (index !== variable && count[index] === 1 && !system.variables[index]!.isState) {
        queue.push(index)
      }
    }
  }
  return { peeled, count }
}

/** Finds the blocks in solving order and the parts that are short or have too many. */
export function analyse(system: System): Structure {
  const { variables, equations } = system
  const unknowns = unknownsByEquation(system)
  const redundant = redundantEquations(system)
  const gone = new Uint8Array(equations.length)
  for (const e of redundant) gone[e] = 1
  const { peeled, count } = peel(system, unknowns, gone)

  // The core on integers: rows are the equations left, columns the unknowns in them.
  const rows: number[] = []
  for (let e = 0; e < equations.length; e++) if (!gone[e]) rows.push(e)
  const columnOf = new Int32Array(variables.length).fill(-1)
  const columns: number[] = []
  for (let v = 0; v < variables.length; v++) {
    if (!Number.isNaN(system.given[v]!)) continue
    if (count[v]! > 0 || variables[v]!.isState) {
      columnOf[v] = columns.length
      columns.push(v)
    }
  }
  const graph = incidence(
    rows.map((e) => unknowns[e]!.map((v) => columnOf[v]!)),
    columns.length,
  )
  const matching = maximumMatching(graph)
  const parts = decompose(graph, matching)
  const blocks: Block[] = blocksInOrder(
    graph,
    matching,
    (row) => parts.rows[row] === Part.square,
  ).map((block) => ({
    equations: block.map((row) => rows[row]!),
    variables: block.map((row) => columns[matching.columnOfRow[row]!]!),
  }))
  const describingFrom = blocks.length
  for (let k = peeled.length - 1; k >= 0; k--) {
    blocks.push({ equations: [peeled[k]!.equation], variables: [peeled[k]!.variable] })
  }

  const partOf = new Int8Array(variables.length)
  columns.forEach((v, c) => {
    partOf[v] = parts.columns[c]!
  })
  const under = underParts(system, unknowns, rows, columns, parts, graph)
  const counted = under.filter((part) => part.hasState)
  const candidates = candidatesBeyond(system, unknowns, peeled, columnOf, counted)
  const open = columns.filter((_, c) => parts.columns[c] !== Part.square)
  const solved = new Uint8Array(variables.length)
  for (const block of blocks) for (const v of block.variables) solved[v] = 1
  for (let v = 0; v < variables.length; v++) {
    if (!solved[v] && Number.isNaN(system.given[v]!) && columnOf[v]! < 0) open.push(v)
  }
  const over = overParts(system, rows, parts, matching.columnOfRow, graph)
  return {
    blocks,
    describingFrom,
    missing: counted.reduce((sum, part) => sum + part.count, 0),
    excess: over.reduce((sum, part) => sum + part.count, 0),
    under: counted.map((part, k) => ({
      count: part.count,
      variables: [...part.columns, ...candidates[k]!].filter((v) => canBeGiven(system, v)),
      streams: openStreams(system, part.columns),
      equations: part.rows,
    })),
    over,
    equationCount: equations.length - redundant.size,
    open,
  }
}

function canBeGiven(system: System, index: number): boolean {
  const { isPhantom } = system.variables[index]!
  return !isPhantom && !system.curved[index]
}

interface UnderPart {
  readonly count: number
  readonly columns: readonly number[]
  readonly rows: readonly number[]
  readonly hasState: boolean
}

/** The under-determined part, split where nothing connects it. */
function underParts(
  system: System,
  unknowns: readonly number[][],
  rows: readonly number[],
  columns: readonly number[],
  parts: { readonly rows: Uint8Array; readonly columns: Uint8Array },
  graph: { readonly rows: number },
): UnderPart[] {
  const owner = new Map<number, number[]>()
  columns.forEach((v, c) => {
    if (parts.columns[c] === Part.under) owner.set(v, [])
  })
  for (let row = 0; row < graph.rows; row++) {
    if (parts.rows[row] !== Part.under) continue
    for (const v of unknowns[rows[row]!]!) owner.get(v)?.push(rows[row]!)
  }
  const seenVariables = new Set<number>()
  const found: UnderPart[] = []
  for (const start of owner.keys()) {
    if (seenVariables.has(start)) continue
    const group = new Set<number>()
    const members: number[] = []
    const stack = [start]
    seenVariables.add(start)
    while (stack.length > 0) {
      const v = stack.pop()!
      members.push(v)
      for (const e of owner.get(v)!) {
        if (group.has(e)) continue
        group.add(e)
        for (const other of unknowns[e]!) {
          if (owner.has(other) && !seenVariables.has(other)) {
            seenVariables.add(other)
            stack.push(other)
          }
        }
      }
    }
    found.push({
      count: members.length - group.size,
      columns: members.sort((a, b) => a - b),
      rows: [...group].sort((a, b) => a - b),
      hasState: members.some((v) => system.variables[v]!.isState),
    })
  }
  return found
}

/**
 * Describing quantities that would fix an open part when given: their equation reaches it and holds
 * no other quantity that could give way instead.
 */
function candidatesBeyond(
  system: System,
  unknowns: readonly number[][],
  peeled: readonly Peeled[],
  columnOf: Int32Array,
  parts: readonly UnderPart[],
): number[][] {
  const settled = 0
  const slack = -1
  const state = new Int32Array(system.variables.length)
  const isPeeled = new Uint8Array(system.variables.length)
  for (const { variable } of peeled) isPeeled[variable] = 1
  for (let v = 0; v < state.length; v++) {
    if (Number.isNaN(system.given[v]!) && columnOf[v]! < 0 && !isPeeled[v]) state[v] = slack
  }
  parts.forEach((part, k) => {
    for (const v of part.columns) state[v] = k + 1
  })
  const found: number[][] = parts.map(() => [])
  for (let k = peeled.length - 1; k >= 0; k--) {
    const { equation, variable } = peeled[k]!
    let reached = settled
    for (const v of unknowns[equation]!) {
      if (v === variable) continue
      if (state[v] === slack) {
        reached = slack
        break
      }
      if (state[v]! > 0) reached = state[v]!
    }
    state[variable] = reached
    if (reached > 0) found[reached - 1]!.push(variable)
  }
  return found
}

/** Streams whose pressure or enthalpy is open in the part. */
function openStreams(system: System, columns: readonly number[]): string[] {
  const ids = new Set<string>()
  for (const v of columns) {
    const { isState, path, owner } = system.variables[v]!
    if (isState && !path.endsWith('.m')) ids.add(owner)
  }
  return [...ids]
}

/** The over-determined part, split where nothing connects it, with the givens that could go. */
function overParts(
  system: System,
  rows: readonly number[],
  parts: { readonly rows: Uint8Array; readonly columns: Uint8Array },
  columnOfRow: Int32Array,
  graph: { readonly first: Int32Array; readonly columns: Int32Array; readonly rows: number },
): Misfit[] {
  const rowsOfColumn = new Map<number, number[]>()
  for (let row = 0; row < graph.rows; row++) {
    if (parts.rows[row] !== Part.over) continue
    for (let k = graph.first[row]!; k < graph.first[row + 1]!; k++) {
      const list = rowsOfColumn.get(graph.columns[k]!)
      if (list) list.push(row)
      else rowsOfColumn.set(graph.columns[k]!, [row])
    }
  }
  const seen = new Set<number>()
  const found: Misfit[] = []
  for (let start = 0; start < graph.rows; start++) {
    if (parts.rows[start] !== Part.over || seen.has(start)) continue
    const group: number[] = []
    const stack = [start]
    seen.add(start)
    while (stack.length > 0) {
      const row = stack.pop()!
      group.push(row)
      for (let k = graph.first[row]!; k < graph.first[row + 1]!; k++) {
        for (const other of rowsOfColumn.get(graph.columns[k]!) ?? []) {
          if (!seen.has(other)) {
            seen.add(other)
            stack.push(other)
          }
        }
      }
    }
    group.sort((a, b) => a - b)
    const givens = new Set<number>()
    for (const row of group) {
      forEachVariableOf(system.equations[rows[row]!]!.equation, (index) => {
        if (!Number.isNaN(system.given[index]!)) givens.add(index)
      })
      const { origin, equation } = system.equations[rows[row]!]!
      if (origin === 'curve' && equation.left.kind === 'variable') givens.add(equation.left.index)
    }
    found.push({
      count: group.filter((row) => columnOfRow[row]! < 0).length,
      variables: [...givens].sort((a, b) => a - b),
      streams: [],
      equations: group.map((row) => rows[row]!),
    })
  }
  return found
}
