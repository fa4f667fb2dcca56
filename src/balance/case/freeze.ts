import type { Given, Layout, Unit } from '../../plant/document.ts'
import { type FreezeRule, portNamed } from '../../units/kind.ts'
import type { PlacedUnit } from '../placed-unit.ts'
import type { Balance } from '../solve.ts'
import type { System } from '../system.ts'
import { freedPressures } from './freed-pressures.ts'

/** Givens of a layout by path, being changed on the way to a case. */
export type GivenTable = Map<string, Given>

/** Reads every given of a layout. */
export function givensOf(layout: Layout): GivenTable {
  const table: GivenTable = new Map()
  const take = (owner: string, given: Readonly<Record<string, Given>>): void => {
    for (const [name, value] of Object.entries(given)) table.set(`${owner}.${name}`, value)
  }
  for (const unit of layout.units) take(unit.id, unit.given)
  for (const stream of layout.streams) take(stream.id, stream.given)
  for (const shaft of layout.shafts) take(shaft.id, shaft.given)
  take('plant', layout.plant.given)
  return table
}

/** The layout with these givens in place of its own. */
export function withGivens(layout: Layout, table: GivenTable): Layout {
  const byOwner = new Map<string, Record<string, Given>>()
  for (const [path, given] of table) {
    const dot = path.indexOf('.')
    const owner = path.slice(0, dot)
    const givens = byOwner.get(owner) ?? {}
    givens[path.slice(dot + 1)] = given
    byOwner.set(owner, givens)
  }
  const of = (id: string): Record<string, Given> => byOwner.get(id) ?? {}
  return {
    ...layout,
    units: layout.units.map((unit) => ({ ...unit, given: of(unit.id) })),
    streams: layout.streams.map((stream) => ({ ...stream, given: of(stream.id) })),
    shafts: layout.shafts.map((shaft) => ({ ...shaft, given: of(shaft.id) })),
    plant: { ...layout.plant, given: of('plant') },
  }
}

/** What the freeze did. */
export interface Frozen {
  /** Quantities that could not be frozen: they are not known in the hardware's solution. */
  readonly unfrozen: readonly { readonly unit: string; readonly quantity: string }[]
  /** By path of a given that was replaced: the hardware quantity that took its place. */
  readonly replaced: ReadonlyMap<string, string>
}

/**
 * Gives the hardware of one solution and frees what it replaces, unit by unit of the same id and
 * kind (contract, section 4). `special` may name another value than the hardware's own for a
 * quantity: the parts of a split group.
 */
export function freeze(
  design: Balance,
  hardware: Balance,
  table: GivenTable,
  special: ReadonlyMap<string, number>,
): Frozen {
  const { system } = design.model
  const unfrozen: { unit: string; quantity: string }[] = []
  const replaced = new Map<string, string>()
  const frozenShells = new Set<string>()
  const generatorShafts = new Set(
    system.layout.shafts
      .filter((shaft) => shaft.generator !== false)
      .flatMap((shaft) => [...shaft.turbines]),
  )
  for (const placed of system.units) {
    const { unit, kind, shape } = placed
    const other = hardware.model.system.unitOf.get(unit.id)
    if (kind.freezing === undefined || other === undefined || other.unit.kind !== unit.kind)
      continue
    const rules = kind.freezing({ shape, drivesGenerator: generatorShafts.has(unit.id) })
    for (const rule of rules) {
      const outcome = apply(rule, placed, other, design, hardware, table, special)
      if (outcome === 'frozen') {
        for (const name of rule.frees) {
          replaced.set(`${unit.id}.${name}`, `${unit.id}.${rule.quantity}`)
        }
      }
      if (outcome === 'unknown') unfrozen.push({ unit: unit.id, quantity: rule.quantity })
      if (outcome === 'frozen' && rule.frees.includes('pressure')) frozenShells.add(unit.id)
    }
  }
  const paths = freedPressures(
    system,
    (unit) => frozenShells.has(unit),
    (path) => table.has(path),
  )
  for (const path of paths) table.delete(path)
  return { unfrozen, replaced }
}

function apply(
  rule: FreezeRule,
  placed: PlacedUnit,
  other: PlacedUnit,
  design: Balance,
  hardware: Balance,
  table: GivenTable,
  special: ReadonlyMap<string, number>,
): 'frozen' | 'unknown' | 'left' {
  const { unit } = placed
  const path = `${unit.id}.${rule.quantity}`
  if (rule.onlyGiven && typeof table.get(path) !== 'number') return 'left'
  if (rule.needs && hardware.results.value(`${unit.id}.${rule.needs}`) === null) return 'left'
  const value = special.get(path) ?? hardware.results.value(path)
  if (value === null) return 'unknown'
  const law = rule.law && lawOf(rule.law, value, unit, placed, other, hardware, table)
  table.set(path, law ?? value)
  for (const name of rule.frees) table.delete(`${unit.id}.${name}`)
  if (rule.freesFlow) freeFlow(placed, design.model.system, table)
  return 'frozen'
}

function lawOf(
  law: NonNullable<FreezeRule['law']>,
  value: number,
  unit: Unit,
  placed: PlacedUnit,
  other: PlacedUnit,
  hardware: Balance,
  table: GivenTable,
): Given | undefined {
  const { against } = law
  const own = typeof against === 'string' ? unit.id : placed.streams.get(against.port)
  const theirs = typeof against === 'string' ? unit.id : other.streams.get(against.port)
  const name = typeof against === 'string' ? against : against.quantity
  if (own === undefined || theirs === undefined) return undefined
  const at = hardware.results.value(`${theirs}.${name}`)
  const exponent =
    typeof law.exponent === 'number' ? law.exponent : table.get(`${unit.id}.${law.exponent}`)
  if (at === null || at <= 0 || typeof exponent !== 'number') return undefined
  return { against: `${own}.${name}`, power: { at, value, exponent } }
}

/** A flow given on a unit's streams, or as their share of what another unit splits, gives way. */
function freeFlow(placed: PlacedUnit, system: System, table: GivenTable): void {
  for (const { stream, description } of placed.connections) {
    table.delete(`${stream}.m`)
    if (description.direction !== 'in') continue
    for (const producer of system.units) {
      const end = producer.connections.find((connection) => connection.stream === stream)
      if (end?.description.direction !== 'out') continue
      const number = portNamed(producer.kind.ports, end.name)?.number
      for (const [name, { each, dimension }] of Object.entries(producer.kind.quantities)) {
        if (each?.port !== end.port || dimension !== 'ratio') continue
        table.delete(`${producer.unit.id}.${name}${number}`)
      }
    }
  }
}
