import type { Dimension } from './dimension.ts'

/** Coherent SI with the usual prefixes; bar and degrees Celsius; US customary. */
export type UnitSetName = 'si' | 'metric' | 'us'

/** A set of units, or a set with some dimensions shown in another unit. */
export type UnitChoice =
  | UnitSetName
  | {
      readonly set: UnitSetName
      /** Dimension to the name of a unit of `unitsOf(dimension)`; names that do not exist are passed over. */
      readonly overrides?: Readonly<Partial<Record<Dimension, string>>>
    }

/** The sets that the user chooses from. */
export const unitSets = [
  { name: 'si', label: 'SI', sample: 'kPa, K' },
  { name: 'metric', label: 'Bar and Celsius', sample: 'bar, °C' },
  { name: 'us', label: 'US customary', sample: 'psia, °F' },
] as const satisfies readonly {
  readonly name: UnitSetName
  readonly label: string
  readonly sample: string
}[]
