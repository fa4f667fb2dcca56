/** Door for the window: the plant file, its edits and differences, the catalogue of kinds, quantities. */
import { standardCatalogue } from './plant/catalogue.ts'
import type { QuantityTable } from './units/kind.ts'

export * from './plant/catalogue.ts'
export * from './plant/check-plant.ts'
export * from './plant/compare-layouts.ts'
export * from './plant/difference.ts'
export * from './plant/document.ts'
export * from './plant/edit/cases.ts'
export * from './plant/edit/connect.ts'
export * from './plant/edit/copy-items.ts'
export * from './plant/edit/edit-refused.ts'
export * from './plant/edit/layouts.ts'
export * from './plant/edit/move-layout.ts'
export * from './plant/edit/remove-and-join.ts'
export * from './plant/edit/remove-items.ts'
export * from './plant/edit/same-machine.ts'
export * from './plant/edit/set-basis.ts'
export * from './plant/edit/set-given.ts'
export * from './plant/edit/shafts.ts'
export * from './plant/edit/streams.ts'
export * from './plant/edit/swap-unit.ts'
export * from './plant/edit/titles.ts'
export * from './plant/edit/units.ts'
export * from './plant/empty-plant.ts'
export * from './plant/monotone-slopes.ts'
export * from './plant/overrides.ts'
export * from './plant/paths.ts'
export * from './plant/ports.ts'
export * from './plant/quantities.ts'
export * from './plant/read-plant.ts'
export * from './plant/remark.ts'
export * from './plant/write-plant.ts'
export type { Dimension } from './quantity/dimension.ts'
export * from './quantity/format-quantity.ts'
export * from './quantity/parse-quantity.ts'
export * from './quantity/unit-set.ts'
export * from './quantity/units-of-measure.ts'
export {
  derivedStreamQuantities,
  derivedUnitQuantities,
  stageGroupQuantities,
} from './units/derived-quantities.ts'
export { kindNamed as kindOf, kinds } from './units/index.ts'
export type {
  KindGroup,
  OptionDescription,
  QuantityDescription,
  QuantityTable,
} from './units/kind.ts'
export { phaseNames } from './units/phases.ts'

/** What every stream has; all of these can be given. */
export const streamQuantities: QuantityTable = standardCatalogue.streamQuantities
/** What a shaft with a generator has. */
export const shaftQuantities: QuantityTable = standardCatalogue.shaftQuantities(true)
/** The plant's totals. */
export const plantQuantities: QuantityTable = standardCatalogue.plantQuantities
