import { equalParts } from './difference.ts'
import type { Given, Givens } from './document.ts'

/** Givens with one more, one changed or (undefined) one less; the very same where that changes nothing. */
export function withGiven(givens: Givens, name: string, given: Given | undefined): Givens {
  if (given === undefined) {
    if (!Object.hasOwn(givens, name)) return givens
    const { [name]: _, ...rest } = givens
    return rest
  }
  // Minus zero is zero: the file cannot tell them apart.
  const value = given === 0 ? 0 : given
  if (Object.hasOwn(givens, name) && equalParts(givens[name], value)) return givens
  return { ...givens, [name]: value }
}
