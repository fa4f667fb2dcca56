import { kindNamed, plantQuantities, shaftQuantities, streamQuantities } from '../units/index.ts'
import type { QuantityTable, UnitKind } from '../units/kind.ts'

/** What the plant file needs to know of a kind: all that it declares but its equations. */
export type Kind = Omit<UnitKind, 'equations' | 'totals'>

/** Every kind of unit and every quantity that a file may name. */
export interface Catalogue {
  readonly kindNamed: (name: string) => Kind | undefined
  readonly streamQuantities: QuantityTable
  readonly shaftQuantities: QuantityTable
  readonly plantQuantities: QuantityTable
}

/** The catalogue of the registry. */
export const standardCatalogue: Catalogue = {
  kindNamed,
  streamQuantities,
  shaftQuantities,
  plantQuantities,
}
