import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import { givenAt } from '../check-given.ts'
import type { Given, Givens, Layout, Plant } from '../document.ts'
import { withGiven } from '../givens.ts'
import { splitPath } from '../paths.ts'
import { Unusable } from '../place.ts'
import { describeQuantity } from '../quantities.ts'
import { changeEach, changeLayout } from './change-layout.ts'
import { EditRefused } from './edit-refused.ts'
import { withBasis } from './set-basis.ts'

/** Why a value cannot be given for a path, as a sentence; nothing where it can. */
export function whyNotGiven(
  layout: Layout,
  path: string,
  given: Given,
  catalogue: Catalogue = standardCatalogue,
): string | undefined {
  if (!describeQuantity(layout, path, catalogue)) return `There is no quantity ${path}.`
  try {
    givenAt(given, '')
  } catch (fault) {
    if (!(fault instanceof Unusable)) throw fault
    return fault.message.charAt(0).toUpperCase() + fault.message.slice(1)
  }
  if (typeof given === 'number') return undefined
  if (given.against === path) return 'A curve cannot depend on the quantity that it gives.'
  return describeQuantity(layout, given.against, catalogue)
    ? undefined
    : `There is no quantity ${given.against} for the curve to depend on.`
}

/**
 * Gives a quantity (`hp.power`, `plant.netPower`), or frees it with undefined. Throws `EditRefused`
 * where `whyNotGiven` has something to say.
 */
export function setGiven(
  plant: Plant,
  layoutId: string,
  path: string,
  given: Given | undefined,
  catalogue: Catalogue = standardCatalogue,
): Plant {
  return changeLayout(plant, layoutId, (layout) => {
    const why = given === undefined ? undefined : whyNotGiven(layout, path, given, catalogue)
    if (why !== undefined) throw new EditRefused(why)
    const [id, name] = splitPath(path) ?? ['', '']
    const set = <T extends { readonly id: string; readonly given: Givens }>(owner: T): T => {
      if (owner.id !== id) return owner
      const next = withGiven(owner.given, name, given)
      return next === owner.given ? owner : { ...owner, given: next }
    }
    const plantGiven =
      id === 'plant' ? withGiven(layout.plant.given, name, given) : layout.plant.given
    const units = changeEach(layout.units, set)
    const streams = changeEach(layout.streams, set)
    const shafts = changeEach(layout.shafts, set)
    // A number that is solved rests on the others.
    const settled = given === undefined ? withBasis(layout, path, undefined) : layout
    return units === layout.units &&
      streams === layout.streams &&
      shafts === layout.shafts &&
      plantGiven === layout.plant.given
      ? layout
      : {
          ...settled,
          units,
          streams,
          shafts,
          plant: plantGiven === layout.plant.given ? layout.plant : { given: plantGiven },
        }
  })
}
