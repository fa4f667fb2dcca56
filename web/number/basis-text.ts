import {
  basisOf,
  describeQuantity,
  formatQuantity,
  type Layout,
  type Source,
  type UnitChoice,
} from '../../src/document.ts'
import { differenceOf } from './difference-of.ts'

export const sourceWords: Readonly<Record<Source, string>> = {
  assumed: 'Assumed',
  maker: "Maker's figure",
  measured: 'Measured',
}

/** What a given number rests on: 'Measured ± 0.5 K: test of May'; nothing where nothing is said. */
export function basisText(layout: Layout, path: string, units: UnitChoice): string | undefined {
  const basis = basisOf(layout, path)
  if (!basis) return undefined
  const { source, note, uncertainty } = basis
  const quantity = describeQuantity(layout, path)
  const spread =
    uncertainty === undefined || !quantity
      ? ''
      : (() => {
          const { text, unit } = formatQuantity(
            uncertainty,
            differenceOf(quantity.dimension),
            units,
            { digits: 'given' },
          )
          return ` ± ${`${text} ${unit}`.trim()}`
        })()
  const head = `${source ? sourceWords[source] : ''}${spread}`.trim()
  return [head, note].filter(Boolean).join(': ') || undefined
}
