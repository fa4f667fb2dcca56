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
  readonly notes: string
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

interface Options {
  /**
   * Where a book carries a slip of its own into later numbers, the data hold the consistent value
   * as well, or it follows from what they hold: by quantity, under which name, or the number. Held
   * against that; a print further off than the limit counts as wrong.
   */
  readonly instead?: Readonly<Record<string, string | number>>
  /** Recomputed values that rest on assumptions which no plant shares. */
  readonly skip?: readonly string[]
}

/** Tests of one example: `solve` gives its answers in the book's units. */
export function describeExample(
  id: string,
  solve: () => Answers,
  { instead = {}, skip = [] }: Options = {},
): void {
  const example = examples.find((one) => one.id === id)
  if (example === undefined) throw new Error(`there is no example ${id}`)
  const { title, source, notes, also_recomputed: also } = example
  describe(`${id}, ${title} (${source})`, () => {
    let answers: Answers = {}
    beforeAll(() => {
      answers = solve()
    })
    const check = (name: string, recomputed: number): Loose => {
      const answer = answers[name]
      if (answer === undefined) throw new Error(`${id} does not answer ${name}`)
      const { value, within } =
        typeof answer === 'number' ? { value: answer, within: digits } : answer
      expect(Math.abs(value / recomputed - 1)).toBeLessThanOrEqual(within)
      return { value, within }
    }
    for (const { quantity, printed, recomputed, diff_percent, agrees, why } of example.answers) {
      const other = instead[quantity]
      const right =
        other === undefined ? recomputed : typeof other === 'number' ? other : also[other]!
      const isWrong = other === undefined ? !agrees : Math.abs(right / printed - 1) > printLimit
      if (!isWrong) {
        test(`${quantity} = ${printed}`, () => {
          const { value, within } = check(quantity, right)
          expect(Math.abs(value / printed - 1)).toBeLessThanOrEqual(printLimit + within)
        })
        continue
      }
      test(`${quantity} = ${right}, not the printed ${printed}: ${why ?? notes}`, () => {
        const { value } = check(quantity, right)
        const off = 100 * (right / printed - 1)
        if (other === undefined) expect(Math.abs(off - diff_percent)).toBeLessThanOrEqual(0.001)
        expect(Math.abs(off)).toBeGreaterThan(100 * printLimit)
        expect(Math.sign(value - printed)).toBe(Math.sign(off))
      })
    }
    const used = new Set<string | number>([...Object.values(instead), ...skip])
    for (const [quantity, recomputed] of Object.entries(also)) {
      if (used.has(quantity)) continue
      test(`${quantity} = ${recomputed} (recomputed, not printed)`, () => {
        check(quantity, recomputed)
      })
    }
  })
}
