import { type Catalogue, standardCatalogue } from './catalogue.ts'
import { checkCurve, givenAt } from './check-given.ts'
import type { Given, Givens, Layout } from './document.ts'
import { withGiven } from './givens.ts'
import { knownPaths } from './known-paths.ts'
import { splitPath } from './paths.ts'
import { refuse, Unusable } from './place.ts'
import { givenOf } from './quantities.ts'
import type { Remark } from './remark.ts'

/** What is freed and set on top of a layout's own givens: by a case, or on the command line. */
export interface Overrides {
  readonly free: readonly string[]
  readonly set: Readonly<Record<string, Given>>
}

export type Overridden =
  | { readonly outcome: 'layout'; readonly layout: Layout; readonly remarks: readonly Remark[] }
  /** One line that names the path. */
  | { readonly outcome: 'unusable'; readonly message: string }

/**
 * Frees, then sets. A path that the layout does not have is refused by name, with the nearest that it
 * has; freeing what is not given is remarked.
 */
export function applyOverrides(
  layout: Layout,
  { free, set }: Overrides,
  catalogue: Catalogue = standardCatalogue,
): Overridden {
  const known = knownPaths(layout, catalogue)
  const remarks: Remark[] = []
  try {
    const changes = new Map<string, Given | undefined>()
    for (const path of free) {
      if (!known.has(path)) refuse(path, `this cannot be freed: ${known.why(path)}`)
      if (givenOf(layout, path) === undefined && !changes.has(path)) remarks.push(notGiven(path))
      changes.set(path, undefined)
    }
    for (const [path, given] of Object.entries(set)) {
      if (!known.has(path)) refuse(path, `this cannot be set: ${known.why(path)}`)
      checkCurve(givenAt(given, path), path, path, known)
      changes.set(path, given)
    }
    return { outcome: 'layout', layout: withGivens(layout, changes), remarks }
  } catch (fault) {
    if (fault instanceof Unusable) return { outcome: 'unusable', message: fault.message }
    throw fault
  }
}

function notGiven(path: string): Remark {
  const id = splitPath(path)?.[0] ?? path
  return {
    severity: 'remark',
    code: 'freed-not-given',
    where: id === 'plant' ? [] : [id],
    quantities: [path],
    message: `${path} is to be freed, but it is not given.`,
  }
}

/** The layout with these paths given, or freed where there is no given. The paths must exist. */
export function withGivens(
  layout: Layout,
  changes: ReadonlyMap<string, Given | undefined>,
): Layout {
  const byOwner = new Map<string, [string, Given | undefined][]>()
  for (const [path, given] of changes) {
    const [id, name] = splitPath(path) ?? ['', path]
    const list = byOwner.get(id) ?? []
    list.push([name, given])
    byOwner.set(id, list)
  }
  const givens = (id: string, given: Givens): Givens =>
    (byOwner.get(id) ?? []).reduce((all, [name, one]) => withGiven(all, name, one), given)
  const set = <T extends { readonly id: string; readonly given: Givens }>(owner: T): T => {
    const given = givens(owner.id, owner.given)
    return given === owner.given ? owner : { ...owner, given }
  }
  return {
    ...layout,
    units: layout.units.map(set),
    streams: layout.streams.map(set),
    shafts: layout.shafts.map(set),
    plant: { given: givens('plant', layout.plant.given) },
  }
}
