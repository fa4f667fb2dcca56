import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  blocksInOrder,
  type Incidence,
  incidence,
  maximumMatching,
} from '../../../src/equations/structure/index.ts'
import { columnsOf } from './graphs.ts'

/** Square graphs with a perfect matching hidden in them. */
const squares: fc.Arbitrary<Incidence> = fc.nat({ max: 9 }).chain((n) =>
  fc
    .tuple(
      fc.shuffledSubarray(
        Array.from({ length: n }, (_, k) => k),
        { minLength: n, maxLength: n },
      ),
      fc.array(fc.tuple(fc.nat({ max: Math.max(0, n - 1) }), fc.nat({ max: Math.max(0, n - 1) })), {
        maxLength: 2 * n,
      }),
    )
    .map(([order, extra]) => {
      const lists = order.map((column) => new Set([column]))
      for (const [r, c] of extra) lists[r]?.add(c)
      return incidence(
        lists.map((list) => [...list]),
        n,
      )
    }),
)

/** By pair of rows: the first needs the second, directly or through others. */
function needs(graph: Incidence, rowOfColumn: Int32Array): boolean[][] {
  const n = graph.rows
  const reach = Array.from({ length: n }, (_, r) => {
    const line = new Array<boolean>(n).fill(false)
    line[r] = true
    for (const c of columnsOf(graph, r)) line[rowOfColumn[c]!] = true
    return line
  })
  for (let k = 0; k < n; k++) {
    for (let i = 0; i < n; i++) {
      if (!reach[i]![k]) continue
      for (let j = 0; j < n; j++) if (reach[k]![j]) reach[i]![j] = true
    }
  }
  return reach
}

describe('blocks in solving order', () => {
  it('hold each row once, and together exactly those that need each other', () => {
    fc.assert(
      fc.property(squares, (graph) => {
        const matching = maximumMatching(graph)
        const blocks = blocksInOrder(graph, matching, () => true)
        const blockOf = new Map(blocks.flatMap((block, k) => block.map((row) => [row, k])))
        expect(blocks.flat().length).toBe(graph.rows)
        expect(blockOf.size).toBe(graph.rows)
        const reach = needs(graph, matching.rowOfColumn)
        for (let i = 0; i < graph.rows; i++) {
          for (let j = 0; j < graph.rows; j++) {
            expect(blockOf.get(i) === blockOf.get(j)).toBe(reach[i]![j]! && reach[j]![i]!)
          }
        }
      }),
      { numRuns: 1000 },
    )
  })

  it('need only columns of earlier blocks and their own', () => {
    fc.assert(
      fc.property(squares, (graph) => {
        const matching = maximumMatching(graph)
        const known = new Set<number>()
        for (const block of blocksInOrder(graph, matching, () => true)) {
          for (const row of block) known.add(matching.columnOfRow[row]!)
          for (const row of block) {
            for (const column of columnsOf(graph, row)) expect(known).toContain(column)
          }
        }
      }),
    )
  })

  it('leave out rows that do not take part', () => {
    fc.assert(
      fc.property(squares, (graph) => {
        const matching = maximumMatching(graph)
        const blocks = blocksInOrder(graph, matching, (row) => row % 2 === 0)
        const expected = Array.from({ length: graph.rows }, (_, r) => r).filter((r) => r % 2 === 0)
        expect(blocks.flat().sort((a, b) => a - b)).toEqual(expected)
      }),
    )
  })

  it('take a chain of 200,000 rows, and a ring of as many, without running out of stack', () => {
    const n = 200_000
    const chain = incidence(
      Array.from({ length: n }, (_, r) => (r + 1 < n ? [r, r + 1] : [r])),
      n,
    )
    const inOrder = blocksInOrder(chain, maximumMatching(chain), () => true)
    expect(inOrder.length).toBe(n)
    expect(inOrder[0]).toEqual([n - 1])
    const ring = incidence(
      Array.from({ length: n }, (_, r) => [r, (r + 1) % n]),
      n,
    )
    expect(blocksInOrder(ring, maximumMatching(ring), () => true).length).toBe(1)
  })
})
