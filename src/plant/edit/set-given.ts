import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Given, Layout, Plant } from '../document.ts'

/** Why a value cannot be given for a path, as a sentence; nothing where it can. */
export function whyNotGiven(
  _layout: Layout,
  _path: string,
  _given: Given,
  _catalogue: Catalogue = standardCatalogue,
): string | undefined {
  throw new Error('not there yet')
}

/** Gives a quantity (`hp.power`, `plant.netPower`), or frees it with undefined. */
export function setGiven(
  _plant: Plant,
  _layoutId: string,
  _path: string,
  _given: Given | undefined,
  _catalogue: Catalogue = standardCatalogue,
): Plant {
  throw new Error('not there yet')
}
