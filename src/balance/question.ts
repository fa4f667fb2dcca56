/** What may be asked of a balance beside its numbers. Types only. */
import type { UnitChoice } from '../quantity/unit-set.ts'
import type { Origin, OwnEquation } from './answer.ts'
import type { Worth } from './worth.ts'

/** Asked of the balance solved last, and only after it has been sent. */
export type Question =
  /** Which equation fixed a quantity, in symbols and in figures of these units. */
  | { readonly type: 'whereFrom'; readonly path: string; readonly units: UnitChoice }
  /**
   * What a practical step of each given number does to a target; with the hardware frozen too where
   * `frozen` says so, which takes longer.
   */
  | { readonly type: 'worth'; readonly target: string; readonly frozen: boolean }
  /** The equations of a unit, shaft or of the plant. */
  | { readonly type: 'equations'; readonly owner: string; readonly units: UnitChoice }

/** `null` where there is no balance to ask. */
export type QuestionAnswer =
  | { readonly type: 'whereFrom'; readonly origin: Origin | null }
  | {
      readonly type: 'worth'
      readonly target: string
      readonly frozen: boolean
      /** Empty while the plant is not solved or the target open. */
      readonly worths: readonly Worth[]
    }
  | { readonly type: 'equations'; readonly equations: readonly OwnEquation[] }
