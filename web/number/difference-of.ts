import type { Dimension } from '../../src/document.ts'

/** What a change or a spread of a dimension is measured in: of temperatures a difference. */
export function differenceOf(dimension: Dimension): Dimension {
  if (dimension === 'temperature') return 'temperatureDifference'
  return dimension === 'pressure' ? 'pressureDifference' : dimension
}
