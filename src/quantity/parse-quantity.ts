import type { Dimension } from './dimension.ts'
import type { UnitChoice } from './unit-set.ts'

export type ParsedQuantity =
  | {
      readonly outcome: 'value'
      /** SI, pressures absolute. */
      readonly value: number
      /** Typed as gauge pressure or vacuum; converted with the standard atmosphere. */
      readonly gauge?: boolean
      /** A sentence to show beside the value, where something was assumed. */
      readonly note?: string
    }
  | { readonly outcome: 'unreadable'; readonly message: string }

/** Reads what a user types: '180 psi', '0.1 bar', '540 F', '60 %', '3.5/4 MPa', '12 barg'. */
export function parseQuantity(
  _text: string,
  _dimension: Dimension,
  _units: UnitChoice,
  _options?: { readonly unit?: string },
): ParsedQuantity {
  throw new Error('not there yet')
}
