import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Layout, Options, Plant, Unit } from '../document.ts'
import { emptyLayout } from '../empty-plant.ts'
import { shapeOf } from '../ports.ts'
import { changeLayout, layoutNamed } from './change-layout.ts'
import { EditRefused } from './edit-refused.ts'

/** The first of `stem`, `stem2` ... that no other has. */
function freeLayoutId(plant: Plant, stem: string): string {
  const taken = new Set(plant.layouts.map(({ id }) => id))
  for (let number = 1; ; number++) {
    const id = number === 1 ? stem : `${stem}${number}`
    if (!taken.has(id)) return id
  }
}

/** Adds a layout without units. */
export function addLayout(
  plant: Plant,
  name: string,
  catalogue: Catalogue = standardCatalogue,
): { plant: Plant; id: string } {
  const id = freeLayoutId(plant, 'layout')
  return { plant: { ...plant, layouts: [...plant.layouts, emptyLayout(id, name, catalogue)] }, id }
}

/**
 * Adds a copy of a layout, to become a proposal. Its machines stay those of the original: frozen cases
 * that took the hardware from the layout's own givens take it from the original, and options that say
 * where each part of a machine comes from are set, so that they follow when bleeds are put in.
 */
export function copyLayout(
  plant: Plant,
  layoutId: string,
  name: string,
  catalogue: Catalogue = standardCatalogue,
): { plant: Plant; id: string } {
  const original = layoutNamed(plant, layoutId)
  const id = freeLayoutId(plant, 'proposal')
  const copy: Layout = {
    ...original,
    id,
    name,
    units: original.units.map((unit) => withOrigins(original, unit, catalogue)),
    cases: original.cases.map((one) =>
      one.frozen && !one.hardwareFrom ? { ...one, hardwareFrom: { layout: layoutId } } : one,
    ),
  }
  const at = plant.layouts.indexOf(original) + 1
  return { plant: { ...plant, layouts: plant.layouts.toSpliced(at, 0, copy) }, id }
}

/** Lists with one entry for each part of a machine start as 1, 2, 3 ...: every part is its own origin. */
function withOrigins(layout: Layout, unit: Unit, catalogue: Catalogue): Unit {
  const kind = catalogue.kindNamed(unit.kind)
  const origins: Record<string, readonly number[]> = {}
  for (const [name, { list }] of Object.entries(kind?.options ?? {})) {
    if (!kind || !list || !('each' in list) || unit.options?.[name] !== undefined) continue
    const { port, extra } = list.each
    const count = (shapeOf(layout, unit, kind).streams[port] ?? 0) + extra
    origins[name] = Array.from({ length: count }, (_, i) => i + 1)
  }
  if (Object.keys(origins).length === 0) return unit
  const options: Options = { ...unit.options, ...origins }
  return { ...unit, options }
}

/** Why a layout cannot go, as a sentence; nothing where it can. */
export function whyNotRemoved(plant: Plant, layoutId: string): string | undefined {
  if (plant.layouts.length < 2) return 'A plant keeps at least one layout.'
  for (const { id, name, cases } of plant.layouts) {
    const user = cases.find(({ hardwareFrom }) => hardwareFrom?.layout === layoutId)
    if (id !== layoutId && user) {
      return `Case ${user.name} of layout ${name} takes its hardware from this layout.`
    }
  }
  return undefined
}

/** Removes a layout. Throws `EditRefused` where `whyNotRemoved` has something to say. */
export function removeLayout(plant: Plant, layoutId: string): Plant {
  layoutNamed(plant, layoutId)
  const why = whyNotRemoved(plant, layoutId)
  if (why !== undefined) throw new EditRefused(why)
  return { ...plant, layouts: plant.layouts.filter(({ id }) => id !== layoutId) }
}

export function setLayoutName(plant: Plant, layoutId: string, name: string): Plant {
  return changeLayout(plant, layoutId, (layout) =>
    layout.name === name ? layout : { ...layout, name },
  )
}

/** The state of the surroundings, K and Pa, to which exergy refers. */
export function setAmbient(
  plant: Plant,
  layoutId: string,
  ambient: Partial<Layout['ambient']>,
): Plant {
  const { T, p } = { ...layoutNamed(plant, layoutId).ambient, ...ambient }
  if (!(Number.isFinite(T) && T > 0)) throw new EditRefused('The temperature is above 0 K.')
  if (!(Number.isFinite(p) && p > 0)) throw new EditRefused('The pressure is above zero.')
  return changeLayout(plant, layoutId, (layout) =>
    layout.ambient.T === T && layout.ambient.p === p ? layout : { ...layout, ambient: { T, p } },
  )
}
