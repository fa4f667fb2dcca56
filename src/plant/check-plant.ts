import { type Catalogue, standardCatalogue } from './catalogue.ts'
import type { ReadResult } from './read-plant.ts'

/** Checks what a file holds, of the version in force. */
export function checkPlant(_value: unknown, _catalogue: Catalogue = standardCatalogue): ReadResult {
  throw new Error('not there yet')
}
