import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Plant } from '../document.ts'

/** Corner points that the user has moved, px at 100 %; none: the route is found anew. */
export function setBends(
  _plant: Plant,
  _layoutId: string,
  _streamId: string,
  _bends: readonly (readonly [number, number])[],
): Plant {
  throw new Error('not there yet')
}

/** Puts a unit that is there into a stream: the stream ends at `inlet`, a new one runs on from `outlet`. */
export function insertOnStream(
  _plant: Plant,
  _layoutId: string,
  _streamId: string,
  _unitId: string,
  _ports?: { readonly inlet: string; readonly outlet: string },
  _catalogue: Catalogue = standardCatalogue,
): { plant: Plant; id: string } {
  throw new Error('not there yet')
}
