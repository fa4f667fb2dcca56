import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Plant } from '../document.ts'

/** Removes units, streams and shafts; the streams of a unit go with it, an empty shaft with its last turbine. */
export function removeItems(
  _plant: Plant,
  _layoutId: string,
  _ids: readonly string[],
  _catalogue: Catalogue = standardCatalogue,
): Plant {
  throw new Error('not there yet')
}
