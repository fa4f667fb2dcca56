import { variablesOf } from '../equations/expression/index.ts'
import { redundantEquations } from './redundant.ts'
import { analyse, type Structure } from './structure.ts'
import type { System } from './system.ts'

/*
 * A plant asked in an unusual way (so much power, this bleed's flow) has a sibling that a designer
 * would ask for: pressures, temperatures, efficiencies and approaches given, the rest follows. It
 * falls into small blocks and has one sensible answer, from which the plant itself can be reached.
 */

/** A plant with other quantities given: what a designer would give. */
export interface Design {
  /** The same equations, with `fixed` given (their values are still to be chosen) and `released` not. */
  readonly system: System
  readonly structure: Structure
  /** Quantities given in the plant and not in its design. */
  readonly released: readonly number[]
  /** Quantities given in its design and not in the plant; as many. */
  readonly fixed: readonly number[]
}

/**
 * How much a designer would rather give a quantity than have it follow. Below `steady` a given is a
 * result to a designer and may be released.
 */
const preference = {
  /** Heats, powers, conductances, flow constants: they follow. */
  result: 0,
  stateProperty: 0.2,
  givenEnthalpy: 0.25,
  enthalpy: 0.3,
  difference: 0.4,
  flow: 0.6,
  pressure: 1,
  expandedFlow: 1.4,
  ratio: 2,
  raisedPressure: 2.5,
  temperature: 2.6,
  mainFlow: 3.25,
  givenFlow: 3.2,
  givenMainFlow: 3.3,
  designedEnthalpy: 3.5,
  steady: 3.6,
  shellPressure: 3.9,
  designedPressure: 4,
  given: 4.5,
  usual: 5,
} as const

/** Dimensions of what belongs to a unit's design, where it is given. */
const designDimensions: ReadonlySet<string> = new Set([
  'pressureDifference',
  'temperatureDifference',
  'temperature',
  'length',
  'area',
  'specificHeat',
])

/** Ways in which designers differ. */
export const designVariants = 2

/** By variable: the preference. The second variant lets every flow but the main one follow. */
function preferences(system: System, variant: number): Float64Array {
  const { variables, units, given } = system
  const rank = new Float64Array(variables.length)
  const isGiven = (v: number): boolean => !Number.isNaN(given[v]!)
  variables.forEach(({ description, isState, path, owner }, v) => {
    const { dimension } = description
    if (isState) {
      if (dimension === 'massFlow')
        rank[v] = isGiven(v) && variant === 0 ? preference.givenFlow : preference.flow
      else if (dimension === 'pressure') {
        rank[v] = isGiven(v) ? preference.given : preference.pressure
      } else rank[v] = isGiven(v) ? preference.givenEnthalpy : preference.enthalpy
      return
    }
    const isTotal = path.startsWith('plant.') && owner === 'plant'
    if (description.given) rank[v] = preference.usual
    else if (description.designed) rank[v] = preference.given
    else if (dimension === 'pressure') {
      rank[v] = isGiven(v) ? preference.given : preference.shellPressure
    } else if (dimension === 'ratio' && !isTotal) {
      rank[v] = isGiven(v) ? preference.given : preference.ratio
    } else if (designDimensions.has(dimension)) {
      rank[v] = isGiven(v) ? preference.given : preference.difference
    }
  })
  for (const { kind, connections } of units) {
    for (const { description, stream, base } of connections) {
      if (description.direction !== 'out') continue
      const designed = description.designed ?? []
      const setsState = designed.includes('T')
      for (const name of ['T', 'x', 's', 'superheat', 'subcooling']) {
        const index = system.indexOf.get(`${stream}.${name}`)
        if (index === undefined) continue
        rank[index] = setsState
          ? preference.given
          : name === 'T'
            ? preference.temperature
            : preference.stateProperty
      }
      if (setsState) rank[base + 2] = preference.designedEnthalpy
      if (designed.includes('m')) {
        rank[base] = isGiven(base) ? preference.givenMainFlow : preference.mainFlow
      } else if (!isGiven(base) && designed.includes('p') && !setsState) {
        rank[base] = preference.expandedFlow
      }
      if (isGiven(base + 1)) continue
      if (designed.includes('p')) rank[base + 1] = preference.designedPressure
      else if (kind.raisesPressure) rank[base + 1] = preference.raisedPressure
    }
  }
  return rank
}

/** The design of a plant; undefined where every given is a designer's already, or none is found. */
export function designOf(system: System, open: readonly number[], variant = 0): Design | undefined {
  const { variables, equations } = system
  const count = variables.length
  const rank = preferences(system, variant)
  const isOpen = new Uint8Array(count)
  for (const v of open) isOpen[v] = 1
  const isGiven = (v: number): boolean => !Number.isNaN(system.given[v]!)
  const mayBeReleased = (v: number): boolean =>
    // Givens of exactly 0 and 1 are folded into the equations.
    isGiven(v) && system.given[v] !== 0 && system.given[v] !== 1 && rank[v]! < preference.steady
  const rowsOf: number[][] = Array.from({ length: count }, () => [])
  const redundant = redundantEquations(system)
  equations.forEach(({ equation }, e) => {
    if (redundant.has(e)) return
    for (const v of variablesOf(equation)) {
      if (!isGiven(v) || mayBeReleased(v)) rowsOf[v]!.push(e)
    }
  })
  const columns: number[] = []
  for (let v = 0; v < count; v++) {
    if (isOpen[v] || rowsOf[v]!.length === 0) continue
    if (!isGiven(v) || mayBeReleased(v)) columns.push(v)
  }
  columns.sort((a, b) => rank[a]! - rank[b]! || a - b)
  const left = unmatchedInOrder(rowsOf, columns, equations.length)
  const released = columns.filter((v) => isGiven(v) && !left.has(v))
  const fixed = [...left].filter((v) => !isGiven(v))
  if (released.length === 0 || fixed.length !== released.length) return undefined
  const given = system.given.slice()
  for (const v of released) given[v] = Number.NaN
  // Any number that is not folded: only what is given matters to the structure.
  for (const v of fixed) given[v] = 0.5
  const design = { ...system, given }
  const structure = analyse(design)
  if (structure.missing > 0 || structure.excess > 0) return undefined
  return { system: design, structure, released, fixed }
}

/**
 * Matches columns to rows in order, each by an augmenting path, and returns those left over: of all
 * sets that can be left over the one that comes last in the order (a greedy basis of the
 * transversal matroid; J. Edmonds and D. R. Fulkerson, J. Res. NBS 69B, 1965, 147-153).
 */
function unmatchedInOrder(
  rowsOf: readonly (readonly number[])[],
  order: readonly number[],
  rowCount: number,
): Set<number> {
  const columnOfRow = new Int32Array(rowCount).fill(-1)
  const seenBy = new Int32Array(rowCount).fill(-1)
  const left = new Set<number>()
  order.forEach((column, stamp) => {
    // Depth first along alternating paths, without recursion.
    const path: { column: number; next: number; row: number }[] = [{ column, next: 0, row: -1 }]
    while (path.length > 0) {
      const top = path[path.length - 1]!
      const rows = rowsOf[top.column]!
      if (top.next === 0) {
        const free = rows.find((row) => columnOfRow[row]! < 0)
        if (free !== undefined) {
          top.row = free
          for (const step of path) columnOfRow[step.row] = step.column
          return
        }
      }
      if (top.next >= rows.length) {
        path.pop()
        continue
      }
      const row = rows[top.next++]!
      if (seenBy[row] === stamp) continue
      seenBy[row] = stamp
      top.row = row
      path.push({ column: columnOfRow[row]!, next: 0, row: -1 })
    }
    left.add(column)
  })
  return left
}
