import fc from 'fast-check'
import { type Incidence, incidence } from '../../../src/equations/structure/index.ts'

/** Small random graphs, rectangular, from empty to full. */
export const graphs: fc.Arbitrary<Incidence> = fc
  .tuple(fc.nat({ max: 7 }), fc.nat({ max: 7 }), fc.double({ min: 0.05, max: 0.9, noNaN: true }))
  .chain(([rows, columns, density]) =>
    fc
      .array(
        fc.array(fc.double({ min: 0, max: 1, noNaN: true }), {
          minLength: columns,
          maxLength: columns,
        }),
        { minLength: rows, maxLength: rows },
      )
      .map((dice) =>
        incidence(
          dice.map((row) => row.flatMap((die, c) => (die < density ? [c] : []))),
          columns,
        ),
      ),
  )

export function columnsOf(graph: Incidence, row: number): number[] {
  return [...graph.columns.subarray(graph.first[row]!, graph.first[row + 1]!)]
}

/** Size of the largest matching by trying everything, without some rows and columns. */
export function bruteMatching(graph: Incidence, withoutRow = -1, withoutColumn = -1): number {
  // By set of used columns: the most rows matched so far.
  let best = new Map<number, number>([[0, 0]])
  for (let r = 0; r < graph.rows; r++) {
    if (r === withoutRow) continue
    const next = new Map(best)
    for (const [used, size] of best) {
      for (const c of columnsOf(graph, r)) {
        if (c === withoutColumn || used & (1 << c)) continue
        const key = used | (1 << c)
        if ((next.get(key) ?? -1) < size + 1) next.set(key, size + 1)
      }
    }
    best = next
  }
  return Math.max(...best.values())
}
