import {
  type Dimension,
  describeQuantity,
  formatQuantity,
  type Layout,
} from '../../src/document.ts'
import { readUnitChoice } from '../store/settings-store.ts'

/*
 * Rooms for numbers on the sheet are kept at the width of a usual number in the units in force, so that
 * nothing moves because a digit changed.
 */

/** Typical of a power station, SI. */
const usual: Partial<Record<Dimension, number>> = {
  heatFlow: 46.68e6,
  power: 46.68e6,
  pressure: 145.8e5,
  temperature: 813.4,
  specificEnthalpy: 3445.1e3,
  specificEntropy: 6576.5,
  massFlow: 120.4,
  dryness: 0.9352,
}

function usualText(dimension: Dimension): string {
  const { text, unit } = formatQuantity(usual[dimension] ?? 100.5, dimension, readUnitChoice())
  return `${text} ${unit}`
}

/** What a unit's chief figure looks like; that of a generator without a path. */
export function usualFigure(layout: Layout, path?: string): string {
  const dimension = path === undefined ? 'power' : describeQuantity(layout, path)?.dimension
  return usualText(dimension ?? 'power')
}

/** A quantity of a stream: 'p', 'T', 'h' ... */
const dimensions: Readonly<Record<string, Dimension>> = {
  p: 'pressure',
  T: 'temperature',
  h: 'specificEnthalpy',
  s: 'specificEntropy',
  x: 'dryness',
  m: 'massFlow',
}

export function usualPart(name: string): string {
  return usualText(dimensions[name] ?? 'pressure')
}
