import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Layout, Plant, PortReference } from '../document.ts'

export type Connection =
  | { readonly allowed: true }
  | { readonly allowed: false; readonly why: string }

/** Whether a stream may run between two ports, whichever of them is the outlet. */
export function canConnect(
  _layout: Layout,
  _from: PortReference,
  _to: PortReference,
  _catalogue: Catalogue = standardCatalogue,
): Connection {
  throw new Error('not there yet')
}

/** Adds a stream. The ends may come in either order; a repeated port's bare name takes the next free number. */
export function connect(
  _plant: Plant,
  _layoutId: string,
  _from: PortReference,
  _to: PortReference,
  _catalogue: Catalogue = standardCatalogue,
): { plant: Plant; id: string } {
  throw new Error('not there yet')
}

/** Moves one end of a stream to another port. */
export function reconnect(
  _plant: Plant,
  _layoutId: string,
  _streamId: string,
  _end: 'from' | 'to',
  _port: PortReference,
  _catalogue: Catalogue = standardCatalogue,
): Plant {
  throw new Error('not there yet')
}
