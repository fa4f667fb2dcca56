import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { Outcome, TapeBuilder } from '../../../src/equations/expression/index.ts'
import { GradientProgram } from '../../../src/equations/newton/index.ts'
import { twins } from '../expression/random-expression.ts'

describe('reverse sweeps laid out once', () => {
  it('give the chain rule forwards for every seed, however often they run', () => {
    fc.assert(
      fc.property(
        fc.array(twins, { minLength: 1, maxLength: 4 }),
        fc.array(fc.tuple(...[0, 1, 2].map(() => fc.double({ min: 0.5, max: 2, noNaN: true }))), {
          minLength: 1,
          maxLength: 3,
        }),
        (seeds, places) => {
          const builder = new TapeBuilder(3)
          const slots = seeds.map(({ expression }) => builder.lower(expression))
          const tape = builder.finish()
          const adjoint = new Float64Array(tape.values.length)
          // A row is active when an operand is; rows come after their operands.
          const active = new Set([0, 1, 2])
          tape.slots.forEach((slot, row) => {
            if (builder.operandsOf(row).some((operand) => active.has(operand))) active.add(slot)
          })
          const isActive = (slot: number): boolean => active.has(slot)
          const gradient = new GradientProgram(builder, slots, isActive, adjoint)
          const entries = new Float64Array(gradient.entryVariable.length)
          for (const at of places) {
            tape.values.set(at)
            const rows = Int32Array.from(tape.slots, (_, row) => row)
            if (tape.evaluate(rows) !== Outcome.fine) continue
            gradient.evaluate(tape, entries)
            expect(adjoint.every((value) => value === 0)).toBe(true)
            // Forwards: derivatives of every slot to one variable at a time.
            for (let v = 0; v < 3; v++) {
              const tangent = new Float64Array(tape.values.length)
              tangent[v] = 1
              tape.slots.forEach((slot, row) => {
                for (let k = tape.first[row]!; k < tape.first[row + 1]!; k++) {
                  tangent[slot]! += tape.partials[k]! * tangent[tape.operands[k]!]!
                }
              })
              slots.forEach((slot, i) => {
                let entry = 0
                for (let e = gradient.entryFirst[i]!; e < gradient.entryFirst[i + 1]!; e++) {
                  if (gradient.entryVariable[e] === v) entry = entries[e]!
                }
                if (!Number.isFinite(tangent[slot]!)) return
                expect(Math.abs(entry - tangent[slot]!)).toBeLessThanOrEqual(
                  1e-10 * Math.max(1, Math.abs(tangent[slot]!)),
                )
              })
            }
          }
        },
      ),
      { numRuns: 300 },
    )
  })
})
