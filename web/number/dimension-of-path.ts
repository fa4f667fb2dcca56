import { type Dimension, describeQuantity, type Layout } from '../../src/document.ts'

/** What results that cannot be given measure, by name. */
const results: Readonly<Record<string, Dimension>> = {
  v: 'specificVolume',
  entropyGenerated: 'entropyFlow',
  exergyDestroyed: 'power',
  exergySupplied: 'power',
  exergyDelivered: 'power',
}

/** What the quantity at a path measures, one that cannot be given included. */
export function dimensionOfPath(layout: Layout, path: string): Dimension {
  return (
    describeQuantity(layout, path)?.dimension ??
    results[path.slice(path.lastIndexOf('.') + 1)] ??
    'number'
  )
}
