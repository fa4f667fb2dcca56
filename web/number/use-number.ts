import type { Given } from '../../src/document.ts'
import { useConflicting, useMeaningless, useValue } from '../store/balance-store.ts'
import { useGiven } from '../store/plant-store.ts'

export type NumberState = 'given' | 'solved' | 'open' | 'conflicting' | 'none'

export interface NumberShown {
  /** Given: an input. Solved: a result. Open: nothing fixes it yet. Conflicting: one of the givens that are too many. None: it has no meaning here. */
  readonly state: NumberState
  /** SI; null while open. */
  readonly value: number | null
  readonly given: Given | undefined
}

/** What a number of the plant is at this moment: input or result, and how much. */
export function useNumber(path: string): NumberShown {
  const given = useGiven(path)
  const solved = useValue(path)
  const conflicting = useConflicting(path)
  const meaningless = useMeaningless(path)
  // A given number is shown as the plant has it, before the balance has caught up with it.
  const value = typeof given === 'number' ? given : solved
  const state =
    given !== undefined
      ? conflicting
        ? 'conflicting'
        : 'given'
      : value === null
        ? meaningless
          ? 'none'
          : 'open'
        : 'solved'
  return { state, value, given }
}
