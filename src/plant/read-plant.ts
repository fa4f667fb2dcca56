import { type Catalogue, standardCatalogue } from './catalogue.ts'
import type { Plant } from './document.ts'

/** Something that a file lacked and that was put right without touching its physics. */
export interface Repair {
  readonly severity: 'remark'
  readonly code: 'repaired'
  /** Ids of units, streams and shafts. */
  readonly where: readonly string[]
  readonly quantities: readonly string[]
  readonly message: string
}

export type ReadResult =
  | { readonly outcome: 'plant'; readonly plant: Plant; readonly repairs: readonly Repair[] }
  /** One line that names the place: line and column, or `layouts[0].units[3].given.foo`. */
  | { readonly outcome: 'unusable'; readonly message: string }

/** Reads the text of a plant file. Nothing is thrown, whatever the text. */
export function readPlant(_text: string, _catalogue: Catalogue = standardCatalogue): ReadResult {
  throw new Error('not there yet')
}
