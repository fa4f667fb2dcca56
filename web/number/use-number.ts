import type { Given } from '../../src/document.ts'
import { useConflicting, useOutcome } from '../store/balance-store.ts'
import { useGiven } from '../store/plant-store.ts'

export type NumberState = 'given' | 'solved' | 'open' | 'conflicting' | 'none'

export interface NumberShown {
  /**
   * Given: an input. Solved: a result. Open: nothing fixes it yet. Conflicting: one of the givens that
   * are too many. None: it has no meaning here.
   */
  readonly state: NumberState
  /** SI; null while open. */
  readonly value: number | null
  readonly given: Given | undefined
}

/** What a number of the plant is at this moment: input or result, and how much. */
export function useNumber(path: string): NumberShown {
  const given = useGiven(path)
  const outcome = useOutcome(path)
  const conflicting = useConflicting(path)
  const solved = outcome === 'none' ? null : outcome
  if (given === undefined) {
    const state = solved !== null ? 'solved' : outcome === 'none' ? 'none' : 'open'
    return { state, value: solved, given }
  }
  // A given number is shown as the plant has it, before the balance has caught up with it.
  const value = typeof given === 'number' ? given : solved
  return { state: conflicting ? 'conflicting' : 'given', value, given }
}
