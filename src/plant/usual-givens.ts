import type { Givens } from './document.ts'
import type { QuantityEntry } from './quantities.ts'

/** The quantities with which a new unit, shaft or plant arrives, given at their usual values. */
export function usualGivens(entries: readonly QuantityEntry[]): Givens {
  const given: Record<string, number> = {}
  for (const { name, description } of entries) {
    if (description.given && description.usual !== undefined) given[name] = description.usual
  }
  return given
}
