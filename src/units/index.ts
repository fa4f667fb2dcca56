import type { QuantityTable, UnitKind } from './kind.ts'

/** Every kind of unit, in the order of the rail. */
export const kinds: readonly Omit<UnitKind, 'equations' | 'totals'>[] = []

export function kindNamed(name: string): Omit<UnitKind, 'equations' | 'totals'> | undefined {
  return kinds.find((kind) => kind.name === name)
}

export const shaftQuantities: QuantityTable = {}
export const plantQuantities: QuantityTable = {}
export const streamQuantities: QuantityTable = {}
