import type { Catalogue } from '../catalogue.ts'
import type { Case, Given, Givens, Layout, Unit } from '../document.ts'
import {
  type QuantityEntry,
  quantitiesOf,
  quantitiesOfPlant,
  quantitiesOfShaft,
  quantitiesOfStream,
} from '../quantities.ts'
import { usualGivens } from '../usual-givens.ts'
import { changeEach, keep } from './change-layout.ts'
import { newName, type Renumbering, renumberOptions, splitFromName } from './renumbering.ts'

type Entries = ReadonlyMap<string, readonly QuantityEntry[]>

function allEntries(layout: Layout, catalogue: Catalogue): Entries {
  const entries = new Map<string, readonly QuantityEntry[]>()
  for (const unit of layout.units) entries.set(unit.id, quantitiesOf(layout, unit, catalogue))
  for (const stream of layout.streams) entries.set(stream.id, quantitiesOfStream(stream, catalogue))
  for (const shaft of layout.shafts) entries.set(shaft.id, quantitiesOfShaft(shaft, catalogue))
  entries.set('plant', quantitiesOfPlant(catalogue))
  return entries
}

/**
 * Settles a layout after its structure has changed (streams, options, units, generators), so that the
 * file stays whole: givens of quantities that are no more go, quantities that come are given at their
 * usual values where a new unit would have them, numbered ones follow their ports, curves and cases
 * follow what they name; a curve against a quantity that is no more is freed.
 */
export function restructure(
  before: Layout,
  after: Layout,
  renumberings: readonly Renumbering[],
  catalogue: Catalogue,
): Layout {
  const renumbered = renumberUnitOptions(after, renumberings, catalogue)
  const earlier = allEntries(before, catalogue)
  const later = allEntries(renumbered, catalogue)
  const names = new Names(earlier, later, renumberings)
  const settle = <T extends { readonly id: string; readonly given: Givens }>(owner: T): T => {
    const given = names.settled(owner.id, owner.given)
    return given === owner.given ? owner : { ...owner, given }
  }
  const plantGiven = names.settled('plant', renumbered.plant.given)
  const unitIds = new Set(renumbered.units.map(({ id }) => id))
  const basis = renumbered.basis && settledBases(renumbered.basis, names)
  return {
    ...renumbered,
    ...(basis && { basis }),
    units: changeEach(renumbered.units, settle),
    streams: changeEach(renumbered.streams, settle),
    shafts: changeEach(renumbered.shafts, settle),
    plant: plantGiven === renumbered.plant.given ? renumbered.plant : { given: plantGiven },
    cases: changeEach(renumbered.cases, (one) => settledCase(one, names, unitIds)),
  }
}

function renumberUnitOptions(
  layout: Layout,
  renumberings: readonly Renumbering[],
  catalogue: Catalogue,
): Layout {
  if (renumberings.length === 0) return layout
  const units = changeEach(layout.units, (unit): Unit => {
    const kind = catalogue.kindNamed(unit.kind)
    if (!kind) return unit
    let { options } = unit
    for (const change of renumberings) {
      if (change.unit === unit.id) options = renumberOptions(options, kind, change)
    }
    return options === unit.options || !options ? unit : { ...unit, options }
  })
  return units === layout.units ? layout : { ...layout, units }
}

/** What each path of the layout before is called afterwards. */
class Names {
  /** Old path to new; undefined: no more. Paths that keep their name are not in it. */
  private readonly moved = new Map<string, string | undefined>()
  private readonly known = new Set<string>()
  private readonly earlier: Entries
  private readonly later: Entries
  private readonly renumberings: readonly Renumbering[]

  constructor(earlier: Entries, later: Entries, renumberings: readonly Renumbering[]) {
    this.earlier = earlier
    this.later = later
    this.renumberings = renumberings
    for (const change of renumberings) {
      for (const entry of earlier.get(change.unit) ?? []) {
        const name = newName(entry, change)
        if (name !== entry.name) {
          this.moved.set(entry.path, name === undefined ? undefined : `${change.unit}.${name}`)
        }
      }
    }
    for (const entries of later.values()) for (const { path } of entries) this.known.add(path)
  }

  /** The path's new name, if it still is one. */
  path(old: string): string | undefined {
    const path = this.moved.has(old) ? this.moved.get(old) : old
    return path !== undefined && this.known.has(path) ? path : undefined
  }

  /** A given with what it depends on renamed; undefined where that is no more. */
  given(given: Given): Given | undefined {
    if (typeof given === 'number') return given
    const against = this.path(given.against)
    if (against === undefined) return undefined
    return against === given.against ? given : { ...given, against }
  }

  /** The givens of an owner, renamed, rid of what is no more, and with what has come. */
  settled(id: string, given: Givens): Givens {
    const before = this.earlier.get(id)
    const next: Record<string, Given> = {}
    let changed = false
    for (const [name, one] of Object.entries(given)) {
      const path = this.path(`${id}.${name}`)
      const kept = path === undefined ? undefined : this.given(one)
      const newName = path?.slice(id.length + 1)
      if (newName !== undefined && kept !== undefined) next[newName] = kept
      changed ||= newName !== name || kept !== one
    }
    if (before) {
      for (const [name, one] of Object.entries(this.arrived(id, before, given))) {
        if (Object.hasOwn(next, name)) continue
        next[name] = one
        changed = true
      }
    }
    return changed ? next : given
  }

  /** Quantities that were not there before and that a new unit would have given. */
  private arrived(id: string, before: readonly QuantityEntry[], given: Givens): Givens {
    const old = new Set(
      before.map(({ path }) => (this.moved.has(path) ? this.moved.get(path) : path)),
    )
    const fresh = (this.later.get(id) ?? []).filter(({ path }) => !old.has(path))
    const arrived: Record<string, Given> = { ...usualGivens(fresh) }
    for (const change of this.renumberings) {
      if (change.unit !== id) continue
      for (const entry of fresh) {
        const source = splitFromName(entry, change)
        const inherited = source === undefined ? undefined : given[source]
        const kept = inherited === undefined ? undefined : this.given(inherited)
        if (kept !== undefined) arrived[entry.name] = kept
      }
    }
    return arrived
  }
}

function settledCase(one: Case, names: Names, units: ReadonlySet<string>): Case {
  const given = one.given && settledCaseGivens(one.given, names)
  const free = one.free && settledPaths(one.free, names)
  const outOfService = one.outOfService && keep(one.outOfService, (id) => units.has(id))
  if (given === one.given && free === one.free && outOfService === one.outOfService) return one
  return {
    ...one,
    ...(given && { given }),
    ...(free && { free }),
    ...(outOfService && { outOfService }),
  }
}

function settledBases(
  bases: NonNullable<Layout['basis']>,
  names: Names,
): NonNullable<Layout['basis']> {
  const next = Object.fromEntries(
    Object.entries(bases).flatMap(([path, basis]) => {
      const newPath = names.path(path)
      return newPath === undefined ? [] : [[newPath, basis]]
    }),
  )
  const isSame = Object.keys(bases).every((path) => Object.hasOwn(next, path))
  return isSame && Object.keys(next).length === Object.keys(bases).length ? bases : next
}

function settledCaseGivens(given: Givens, names: Names): Givens {
  let changed = false
  const next: Record<string, Given> = {}
  for (const [path, one] of Object.entries(given)) {
    const newPath = names.path(path)
    const kept = newPath === undefined ? undefined : names.given(one)
    if (newPath !== undefined && kept !== undefined) next[newPath] = kept
    changed ||= newPath !== path || kept !== one
  }
  return changed ? next : given
}

function settledPaths(paths: readonly string[], names: Names): readonly string[] {
  const next = paths.map((path) => names.path(path)).filter((path) => path !== undefined)
  return next.length === paths.length && next.every((path, i) => path === paths[i]) ? paths : next
}
