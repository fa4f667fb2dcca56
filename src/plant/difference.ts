import type { Plant } from './document.ts'

/** From one plant to another and back; plain data, as small as the change. */
export interface Difference {
  readonly changes: readonly unknown[]
}

export function difference(_before: Plant, _after: Plant): Difference {
  throw new Error('not there yet')
}

export function applyDifference(_plant: Plant, _change: Difference): Plant {
  throw new Error('not there yet')
}

export function invertDifference(_change: Difference): Difference {
  throw new Error('not there yet')
}
