import { Outcome } from '../equations/expression/index.ts'
import { Outcome as SteamOutcome } from './outcome.ts'

/** The outcome of an expression from that of a steam function. */
export function expressionOutcome(outcome: number): number {
  if (outcome === SteamOutcome.fine) return Outcome.fine
  return outcome === SteamOutcome.onSaturation ? Outcome.onSaturation : Outcome.outsideRange
}
