import type { Dimension } from './dimension.ts'
import type { UnitChoice } from './unit-set.ts'

export interface FormatOptions {
  /** Name of the unit to show, where a column or a field keeps one unit for all its values. */
  readonly unit?: string
  /** `given` shows every digit that a given value needs, `all` those that bring back the very same number. */
  readonly digits?: 'shown' | 'given' | 'all'
  /** A plus before what is above zero, for changes. */
  readonly signed?: boolean
}

/** A number ready to read, never NaN: an en dash where the value is not finite. */
export function formatQuantity(
  _value: number,
  _dimension: Dimension,
  _units: UnitChoice,
  _options?: FormatOptions,
): { readonly text: string; readonly unit: string } {
  throw new Error('not there yet')
}
