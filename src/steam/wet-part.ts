import { type Operation, Outcome } from '../equations/expression/index.ts'
import { expressionOutcome } from './expression-outcome.ts'
import { Outcome as SteamOutcome } from './outcome.ts'
import { RESULT_SIZE } from './records.ts'
import { drySaturatedEnthalpyAtEntropy } from './saturation.ts'

/**
 * The share of an isentropic drop that lies below saturation: (h''(s) - h_s)/(h_in - h_s), 1 from a
 * wet inlet, 0 where the drop ends dry. Operands: moisture at the inlet, h_in, s, h_s.
 */
export const wetPartOperation: Operation = {
  name: 'wetPart',
  memory: RESULT_SIZE,
  evaluate(tape, row) {
    const k = tape.first[row]!
    const { values, operands, partials, memory } = tape
    partials.fill(0, k, k + 4)
    const slot = tape.slotOf(row)
    if (values[operands[k]!]! > 0) {
      values[slot] = 1
      return Outcome.fine
    }
    const at = tape.memoryAt[row]!
    const outcome = drySaturatedEnthalpyAtEntropy(memory, at, values[operands[k + 2]!]!)
    if (outcome === SteamOutcome.entropyHigh) {
      // No saturated state has that much entropy: the drop ends dry.
      values[slot] = 0
      return Outcome.fine
    }
    if (outcome !== SteamOutcome.fine) return expressionOutcome(outcome)
    const below = memory[at]! - values[operands[k + 3]!]!
    const drop = values[operands[k + 1]!]! - values[operands[k + 3]!]!
    const share = drop === 0 ? 0 : below / drop
    if (share > 0 && share < 1) {
      values[slot] = share
      partials[k + 1] = -share / drop
      partials[k + 2] = memory[at + 1]! / drop
      partials[k + 3] = (share - 1) / drop
    } else values[slot] = share >= 1 ? 1 : 0
    return Outcome.fine
  },
  print: ([, start, s, end]) => ({
    text: `wet part(${start!.text}, ${s!.text}, ${end!.text})`,
    strength: 4,
  }),
}
