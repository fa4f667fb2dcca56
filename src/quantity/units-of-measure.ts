import type { Dimension } from './dimension.ts'
import type { UnitChoice } from './unit-set.ts'

/** A unit that values of one dimension are shown and typed in: SI value = (shown + shift) x factor. */
export interface UnitOfMeasure {
  readonly name: string
  readonly factor: number
  readonly shift?: number
}

/** The units of a dimension that a user may choose for display. */
export function unitsOf(_dimension: Dimension): readonly UnitOfMeasure[] {
  throw new Error('not there yet')
}

/** The unit that a dimension is shown in, for axes and column heads. */
export function unitOf(_dimension: Dimension, _units: UnitChoice): UnitOfMeasure {
  throw new Error('not there yet')
}

export function toShown(si: number, unit: UnitOfMeasure): number {
  return si / unit.factor - (unit.shift ?? 0)
}

export function fromShown(shown: number, unit: UnitOfMeasure): number {
  return (shown + (unit.shift ?? 0)) * unit.factor
}
