import { type Catalogue, standardCatalogue } from './catalogue.ts'
import type { Plant } from './document.ts'

/** The text of the plant file: the same plant gives the same text. */
export function writePlant(_plant: Plant, _catalogue: Catalogue = standardCatalogue): string {
  throw new Error('not there yet')
}
