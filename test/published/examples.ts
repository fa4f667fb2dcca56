import { beforeAll, describe, expect, test } from 'vitest'
import data from '../reference/examples.json'
import { type LayoutParts, type Look, layoutOf, solved } from './build-layout.ts'

/*
 * Worked examples of handbooks (../reference/examples.json): what the book prints, and the same
 * recomputed from IAPWS-IF97 with another implementation, pump work as v dp. Each quantity is held
 * against both: against the print to half a per cent, against the recomputed value far closer. A
 * print that the data call wrong must be off by what they say.
 */

interface Printed {
  readonly quantity: string
  readonly printed: number
  readonly recomputed: number
  readonly diff_percent: number
  readonly agrees: boolean
  readonly why?: string
}

interface Example {
  readonly id: string
  readonly title: string
  readonly source: string
  readonly answers: readonly Printed[]
  readonly also_recomputed: Readonly<Record<string, number>>
}

export const examples: readonly Example[] = data.examples as unknown as readonly Example[]

/** Agreement with the print: the limit of the data for rows without one of their own. */
const printLimit = 0.005
/**
 * Agreement with the recomputed value: its seven digits, and the backward equations with which it
 * finds states of given entropy (consistent to some 1e-6 in enthalpy).
 */
const digits = 5e-6

/** An answer whose recomputed value rests on something else than the plant does. */
interface Loose {
  readonly value: number
  readonly within: number
}

export type Answers = Readonly<Record<string, number | Loose>>

/**
 * An answer that pump work enters: the books take v dp at the suction's v, the plant h(p, s), in which
 * the water is compressed a little (0.18 % less work at 8 MPa, 0.34 % at 15 MPa).
 */
export function pumped(value: number, within = 1e-4): Loose {
  return { value, within }
}

export const kJ = 1e3
export const MW = 1e6
/** 0 °C in K. */
export const zero = 273.15

export const solutionOf = (parts: LayoutParts): Look => solved(layoutOf(parts)).at

/** Tests of one example. `only`: the part that is built so far; see waiting.ts. */
export function describeExample(id: string, solve: () => Answers, only?: readonly string[]): void {
  const example = examples.find((one) => one.id === id)
  if (example === undefined) throw new Error(`there is no example ${id}`)
  const isBuilt = (name: string): boolean => only === undefined || only.includes(name)
  describe(`${id}, ${example.title} (${example.source})`, () => {
    let answers: Answers = {}
    beforeAll(() => {
      answers = solve()
    })
    const read = (name: string): Loose => {
      const answer = answers[name]
      if (answer === undefined) throw new Error(`${id} does not answer ${name}`)
      return typeof answer === 'number' ? { value: answer, within: digits } : answer
    }
    const check = (name: string, recomputed: number): Loose => {
      const answer = read(name)
      expect(Math.abs(answer.value / recomputed - 1)).toBeLessThanOrEqual(answer.within)
      return answer
    }
    for (const { quantity, printed, recomputed, diff_percent, agrees, why } of example.answers) {
      if (!isBuilt(quantity)) continue
      if (agrees) {
        test(`${quantity} = ${printed}`, () => {
          const { value, within } = check(quantity, recomputed)
          expect(Math.abs(value / printed - 1)).toBeLessThanOrEqual(printLimit + within)
        })
      } else {
        test(`${quantity} = ${recomputed}, not the printed ${printed}: ${why}`, () => {
          const { value } = check(quantity, recomputed)
          const off = 100 * (recomputed / printed - 1)
          expect(Math.abs(off - diff_percent)).toBeLessThanOrEqual(0.001)
          expect(Math.abs(off)).toBeGreaterThan(100 * printLimit)
          expect(Math.sign(value - printed)).toBe(Math.sign(off))
        })
      }
    }
    for (const [quantity, recomputed] of Object.entries(example.also_recomputed)) {
      if (!isBuilt(quantity)) continue
      test(`${quantity} = ${recomputed} (recomputed, not printed)`, () => {
        check(quantity, recomputed)
      })
    }
  })
}
