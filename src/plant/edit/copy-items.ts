import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Curve, Given, Givens, Layout, Plant, Stream, Unit } from '../document.ts'
import { splitPath } from '../paths.ts'
import { changeLayout, freeId, freeLabel, layoutNamed } from './change-layout.ts'
import { removeItems } from './remove-items.ts'
import { withTurbine } from './shafts.ts'

/**
 * Units and the streams between them as a plant of their own, ready to be written, read and pasted.
 * Streams to what is not copied stay behind, and so do curves against it.
 */
export function copyItems(
  plant: Plant,
  layoutId: string,
  ids: readonly string[],
  catalogue: Catalogue = standardCatalogue,
): Plant {
  const chosen = new Set(ids)
  const layout = layoutNamed(plant, layoutId)
  const others = layout.units.map(({ id }) => id).filter((id) => !chosen.has(id))
  const alone: Plant = { ...plant, layouts: [{ ...layout, cases: [], stated: [] }] }
  return removeItems(alone, layoutId, others, catalogue)
}

/**
 * Pastes what was copied, moved by px at 100 %, with new ids. Turbines are put on the first shaft with
 * a generator. `ids`: of the units and streams that have come.
 */
export function pasteItems(
  plant: Plant,
  layoutId: string,
  part: Plant,
  by: readonly [number, number],
  catalogue: Catalogue = standardCatalogue,
): { plant: Plant; ids: readonly string[] } {
  const [source] = part.layouts
  const ids = new Map<string, string>()
  if (!source) return { plant, ids: [] }
  const after = changeLayout(plant, layoutId, (layout) => {
    let grown: Layout = layout
    for (const unit of source.units) {
      const kind = catalogue.kindNamed(unit.kind)
      const id = freeId(grown, kind?.idStem ?? 'unit')
      ids.set(unit.id, id)
      const at = [unit.at[0] + by[0], unit.at[1] + by[1]] as const
      const copy: Unit = { ...unit, id, label: freeLabel(grown, unit.label), at }
      grown = { ...grown, units: [...grown.units, copy] }
      if (kind?.shaft === 'driving') grown = withTurbine(grown, id, catalogue)
    }
    for (const stream of source.streams) {
      const id = freeId(grown, 's')
      ids.set(stream.id, id)
      grown = { ...grown, streams: [...grown.streams, copyOfStream(stream, id, ids, by)] }
    }
    if (ids.size === 0) return layout
    // Curves may depend on what was copied after them: only now are all ids known.
    const fresh = new Set(ids.values())
    const settle = <T extends { readonly id: string; readonly given: Givens }>(owner: T): T =>
      fresh.has(owner.id) ? { ...owner, given: renamed(owner.given, ids) } : owner
    const basis = { ...grown.basis, ...copiedBases(source, ids) }
    return {
      ...grown,
      units: grown.units.map(settle),
      streams: grown.streams.map(settle),
      ...(Object.keys(basis).length > 0 && { basis }),
    }
  })
  return { plant: after, ids: [...ids.values()] }
}

/** What the copies' given numbers rest on. */
function copiedBases(
  source: Layout,
  ids: ReadonlyMap<string, string>,
): NonNullable<Layout['basis']> {
  return Object.fromEntries(
    Object.entries(source.basis ?? {}).flatMap(([path, basis]) => {
      const [id, name] = splitPath(path) ?? [path, '']
      const copy = ids.get(id)
      return copy === undefined ? [] : [[`${copy}.${name}`, basis]]
    }),
  )
}

function copyOfStream(
  stream: Stream,
  id: string,
  ids: ReadonlyMap<string, string>,
  [dx, dy]: readonly [number, number],
): Stream {
  const end = (reference: string) => {
    const [unit, port] = splitPath(reference) ?? [reference, '']
    return `${ids.get(unit) ?? unit}.${port}`
  }
  return {
    ...stream,
    id,
    from: end(stream.from),
    to: end(stream.to),
    ...(stream.bends && { bends: stream.bends.map(([x, y]) => [x + dx, y + dy] as const) }),
  }
}

/** Givens whose curves depend on the copies. A curve against a shaft, which is not copied, is freed. */
function renamed(givens: Givens, ids: ReadonlyMap<string, string>): Givens {
  const next: Record<string, Given> = {}
  for (const [name, given] of Object.entries(givens)) {
    const one = typeof given === 'number' ? given : renamedCurve(given, ids)
    if (one !== undefined) next[name] = one
  }
  return next
}

function renamedCurve(curve: Curve, ids: ReadonlyMap<string, string>): Curve | undefined {
  const [id, name] = splitPath(curve.against) ?? [curve.against, '']
  if (id === 'plant') return curve
  const copy = ids.get(id)
  return copy === undefined ? undefined : { ...curve, against: `${copy}.${name}` }
}

/** Copies units and the streams between them next to themselves. */
export function duplicateItems(
  plant: Plant,
  layoutId: string,
  ids: readonly string[],
  by: readonly [number, number],
  catalogue: Catalogue = standardCatalogue,
): { plant: Plant; ids: readonly string[] } {
  return pasteItems(plant, layoutId, copyItems(plant, layoutId, ids, catalogue), by, catalogue)
}
