import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { incidence, maximumMatching } from '../../../src/equations/structure/index.ts'
import { bruteMatching, columnsOf, graphs } from './graphs.ts'

describe('a maximum matching', () => {
  it('is as large as any that can be found by trying everything', () => {
    fc.assert(
      fc.property(graphs, (graph) => {
        expect(maximumMatching(graph).size).toBe(bruteMatching(graph))
      }),
      { numRuns: 1000 },
    )
  })

  it('pairs rows and columns that meet, each at most once', () => {
    fc.assert(
      fc.property(graphs, (graph) => {
        const { columnOfRow, rowOfColumn, size } = maximumMatching(graph)
        let pairs = 0
        columnOfRow.forEach((column, row) => {
          if (column < 0) return
          pairs++
          expect(columnsOf(graph, row)).toContain(column)
          expect(rowOfColumn[column]).toBe(row)
        })
        expect(pairs).toBe(size)
        expect(rowOfColumn.filter((row) => row >= 0).length).toBe(size)
      }),
    )
  })

  it('is the same whenever the graph is the same', () => {
    fc.assert(
      fc.property(graphs, (graph) => {
        expect(maximumMatching(graph)).toEqual(maximumMatching(graph))
      }),
    )
  })

  it('turns a whole chain round, 200,000 rows long, without running out of stack', () => {
    // Row r meets columns r and r + 1; the last row only its own column: greedy choices must all move.
    const n = 200_000
    const lists = Array.from({ length: n }, (_, r) => (r < n - 1 ? [r + 1, r] : [n - 1, n - 2]))
    lists.push([n - 1])
    const { size } = maximumMatching(incidence(lists, n))
    expect(size).toBe(n)
  })
})
