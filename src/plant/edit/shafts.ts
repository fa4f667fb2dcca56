import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Layout, Plant, Shaft } from '../document.ts'
import { quantitiesOfShaft } from '../quantities.ts'
import { usualGivens } from '../usual-givens.ts'
import { changeEach, changeLayout, freeId, keep } from './change-layout.ts'
import { EditRefused } from './edit-refused.ts'
import { restructure } from './restructure.ts'

/** Puts a turbine on the first shaft with a generator, or on a new one. */
export function withTurbine(layout: Layout, turbine: string, catalogue: Catalogue): Layout {
  const first = layout.shafts.find(({ generator }) => generator !== false)
  if (!first)
    return { ...layout, shafts: [...layout.shafts, newShaft(layout, [turbine], catalogue)] }
  const longer = { ...first, turbines: [...first.turbines, turbine] }
  return { ...layout, shafts: layout.shafts.map((shaft) => (shaft === first ? longer : shaft)) }
}

/** A shaft with a generator and its usual quantities given. */
function newShaft(layout: Layout, turbines: readonly string[], catalogue: Catalogue): Shaft {
  const bare: Shaft = { id: freeId(layout, 'shaft'), turbines, pumps: [], given: {} }
  return { ...bare, given: usualGivens(quantitiesOfShaft(bare, catalogue)) }
}

/**
 * The shafts without these units. A shaft that loses its last turbine goes, and the pumps it drove
 * have their own drives again.
 */
export function withoutUnits(shafts: readonly Shaft[], ids: ReadonlySet<string>): readonly Shaft[] {
  const stays = (id: string) => !ids.has(id)
  const thinned = changeEach(shafts, (shaft) => {
    const turbines = keep(shaft.turbines, stays)
    const pumps = keep(shaft.pumps, stays)
    return turbines === shaft.turbines && pumps === shaft.pumps
      ? shaft
      : { ...shaft, turbines, pumps }
  })
  const emptied = new Set(
    thinned
      .filter((shaft, i) => shaft.turbines.length === 0 && (shafts[i]?.turbines.length ?? 0) > 0)
      .map(({ id }) => id),
  )
  return keep(thinned, ({ id }) => !emptied.has(id))
}

/**
 * Puts a turbine or a pump on a shaft, on a new one (`'new'`, for turbines), or on none (null). It
 * leaves the one that it was on.
 */
export function putOnShaft(
  plant: Plant,
  layoutId: string,
  unitId: string,
  shaftId: string | 'new' | null,
  catalogue: Catalogue = standardCatalogue,
): Plant {
  return changeLayout(plant, layoutId, (layout) => {
    const unit = layout.units.find(({ id }) => id === unitId)
    const role = unit && catalogue.kindNamed(unit.kind)?.shaft
    if (!unit || !role) throw new EditRefused(`${unitId} is nothing that stands on a shaft.`)
    const list = role === 'driving' ? 'turbines' : 'pumps'
    const target = layout.shafts.find(({ id }) => id === shaftId)
    const isNew = shaftId === 'new' && !target
    if (shaftId !== null && !isNew && !target) {
      throw new EditRefused(`There is no shaft ${shaftId}.`)
    }
    if (isNew && role === 'driven') throw new EditRefused('A shaft needs a turbine that drives it.')
    const others = layout.shafts.filter((one) => one !== target)
    const isThere = target?.[list].includes(unitId) ?? false
    const isElsewhere = others.some((shaft) => shaft[list].includes(unitId))
    if (isThere && !isElsewhere) return layout
    if (!target && !isNew && !isElsewhere) return layout
    const joined = changeEach(layout.shafts, (shaft) =>
      shaft === target && !isThere ? { ...shaft, [list]: [...shaft[list], unitId] } : shaft,
    )
    const rest = withoutUnits(
      joined.filter(({ id }) => id !== target?.id),
      new Set([unitId]),
    )
    const staying = new Set(rest.map(({ id }) => id))
    const byId = new Map(rest.map((shaft) => [shaft.id, shaft]))
    const shafts = joined
      .filter(({ id }) => id === target?.id || staying.has(id))
      .map((shaft) => byId.get(shaft.id) ?? shaft)
    const after = { ...layout, shafts }
    return restructure(
      layout,
      isNew ? { ...after, shafts: [...shafts, newShaft(layout, [unitId], catalogue)] } : after,
      [],
      catalogue,
    )
  })
}

/** Whether a shaft drives a generator. Without one its generator quantities go; with one they are usual. */
export function setGenerator(
  plant: Plant,
  layoutId: string,
  shaftId: string,
  generator: boolean,
  catalogue: Catalogue = standardCatalogue,
): Plant {
  return changeLayout(plant, layoutId, (layout) => {
    const shaft = layout.shafts.find(({ id }) => id === shaftId)
    if (!shaft) throw new EditRefused(`There is no shaft ${shaftId}.`)
    if ((shaft.generator !== false) === generator) return layout
    const { generator: _, ...bare } = shaft
    const changed: Shaft = generator ? bare : { ...bare, generator: false }
    const shafts = layout.shafts.map((one) => (one === shaft ? changed : one))
    return restructure(layout, { ...layout, shafts }, [], catalogue)
  })
}
