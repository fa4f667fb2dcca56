import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Layout, Plant } from '../document.ts'
import { splitPath } from '../paths.ts'
import { findPort } from '../ports.ts'
import { changeLayout } from './change-layout.ts'
import { type Renumbering, renumberEnds, withoutNumbers } from './renumbering.ts'
import { restructure } from './restructure.ts'
import { withoutUnits } from './shafts.ts'

/**
 * Removes units, streams and shafts; ids that nothing bears are passed over. The streams of a unit go
 * with it, a shaft goes with its last turbine. Numbered ports close up, and what is given for them
 * moves along; curves and cases lose what names the removed.
 */
export function removeItems(
  plant: Plant,
  layoutId: string,
  ids: readonly string[],
  catalogue: Catalogue = standardCatalogue,
): Plant {
  const removed = new Set(ids)
  return changeLayout(plant, layoutId, (layout) => {
    const units = layout.units.filter(({ id }) => !removed.has(id))
    const gone = new Set(layout.units.map(({ id }) => id).filter((id) => removed.has(id)))
    const isGone = (end: string) => gone.has(splitPath(end)?.[0] ?? '')
    const streams = layout.streams.filter(
      ({ id, from, to }) => !removed.has(id) && !isGone(from) && !isGone(to),
    )
    const shafts = withoutUnits(layout.shafts, gone).filter(({ id }) => !removed.has(id))
    if (
      units.length === layout.units.length &&
      streams.length === layout.streams.length &&
      shafts.length === layout.shafts.length
    ) {
      return layout
    }
    const staying = new Set(streams)
    const renumberings = closingUp(
      layout,
      layout.streams.filter((stream) => !staying.has(stream)).flatMap(({ from, to }) => [from, to]),
      catalogue,
    )
    const renumbered = renumberEnds(streams, layout, renumberings, ({ kind }) =>
      catalogue.kindNamed(kind),
    )
    return restructure(
      layout,
      { ...layout, units, streams: renumbered, shafts },
      renumberings,
      catalogue,
    )
  })
}

/** How ports are renumbered when the streams at these ends go. */
function closingUp(
  layout: Layout,
  ends: readonly string[],
  catalogue: Catalogue,
): readonly Renumbering[] {
  const freed = new Map<string, { unit: string; port: string; numbers: Set<number> }>()
  for (const end of ends) {
    const address = findPort(layout, end, catalogue)
    if (address?.number === undefined) continue
    const key = `${address.unit.id}.${address.port}`
    const one = freed.get(key) ?? { unit: address.unit.id, port: address.port, numbers: new Set() }
    one.numbers.add(address.number)
    freed.set(key, one)
  }
  return [...freed.values()].map(({ unit, port, numbers }) => withoutNumbers(unit, port, numbers))
}
