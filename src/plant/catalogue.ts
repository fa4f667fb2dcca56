import {
  kindNamed,
  kinds,
  plantQuantities,
  quantitiesOfShaft,
  streamQuantities,
} from '../units/index.ts'
import type { QuantityTable, UnitKind } from '../units/kind.ts'

/** What all but the equations need to know of a kind. */
export type Kind = Omit<UnitKind, 'equations' | 'totals' | 'starts'>

/** Every kind of unit and every quantity that a file may name. */
export interface Catalogue {
  /** In the order of the rail. */
  readonly kinds: readonly Kind[]
  readonly kindNamed: (name: string) => Kind | undefined
  readonly streamQuantities: QuantityTable
  /** Of a shaft with or without a generator. */
  readonly shaftQuantities: (generator: boolean) => QuantityTable
  readonly plantQuantities: QuantityTable
}

/** The catalogue of the registry. */
export const standardCatalogue: Catalogue = {
  kinds,
  kindNamed,
  streamQuantities,
  shaftQuantities: quantitiesOfShaft,
  plantQuantities,
}
