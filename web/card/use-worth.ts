import { useEffect } from 'react'
import type { Worth } from '../../src/messages.ts'
import { useQuestionStore, wantWorth } from '../store/questions.ts'

export interface WorthShown {
  /** At fixed performance, SI; null where it has none. */
  readonly fixed: number | null
  /** With the hardware frozen; null where that has no meaning, undefined while it is being worked out. */
  readonly frozen: number | null | undefined
  readonly step: number
}

/** Keeps the worths up to date while whoever calls is on screen. */
export function useWorthWanted(): void {
  useEffect(() => wantWorth(), [])
}

/** What a practical step of a given number is worth; undefined where nothing is known. */
export function useWorth(path: string): WorthShown | undefined {
  const fixed = useQuestionStore(({ worths }) => worths.get(path))
  const frozen = useQuestionStore(({ frozenWorths }) => frozenWorths.get(path))
  const isFrozenKnown = useQuestionStore(({ frozenWorths }) => frozenWorths.size > 0)
  return shownWorth(fixed, frozen, isFrozenKnown)
}

function shownWorth(
  fixed: Worth | undefined,
  frozen: Worth | undefined,
  isFrozenKnown: boolean,
): WorthShown | undefined {
  return (
    fixed && {
      fixed: fixed.fixed,
      frozen: isFrozenKnown ? (frozen?.frozen ?? null) : undefined,
      step: fixed.step,
    }
  )
}
