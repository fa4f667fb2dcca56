import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  decompose,
  incidence,
  maximumMatching,
  Part,
  transpose,
} from '../../../src/equations/structure/index.ts'
import { bruteMatching, columnsOf, graphs } from './graphs.ts'

/*
 * By definition (Dulmage and Mendelsohn): a row is over-determined when some maximum matching does
 * without it, a column under-determined when some maximum matching does without it; the columns of
 * over-determined rows and the rows of under-determined columns go with them.
 */

describe('the parts of a graph', () => {
  it('are what the definition says', () => {
    fc.assert(
      fc.property(graphs, (graph) => {
        const most = bruteMatching(graph)
        const parts = decompose(graph, maximumMatching(graph))
        const overRows = new Set<number>()
        const overColumns = new Set<number>()
        const underColumns = new Set<number>()
        for (let r = 0; r < graph.rows; r++) {
          if (bruteMatching(graph, r) !== most) continue
          overRows.add(r)
          for (const c of columnsOf(graph, r)) overColumns.add(c)
        }
        for (let c = 0; c < graph.columnCount; c++) {
          if (bruteMatching(graph, -1, c) === most) underColumns.add(c)
        }
        for (let r = 0; r < graph.rows; r++) {
          const isUnder = columnsOf(graph, r).some((c) => underColumns.has(c))
          const expected = overRows.has(r) ? Part.over : isUnder ? Part.under : Part.square
          expect(parts.rows[r]).toBe(expected)
        }
        for (let c = 0; c < graph.columnCount; c++) {
          const expected = underColumns.has(c)
            ? Part.under
            : overColumns.has(c)
              ? Part.over
              : Part.square
          expect(parts.columns[c]).toBe(expected)
        }
      }),
      { numRuns: 1000 },
    )
  })

  it('do not depend on which maximum matching was found', () => {
    fc.assert(
      fc.property(graphs, (graph) => {
        const parts = decompose(graph, maximumMatching(graph))
        // The same graph with its rows in the opposite order finds another matching.
        const turned = incidence(
          Array.from({ length: graph.rows }, (_, r) =>
            columnsOf(graph, graph.rows - 1 - r).reverse(),
          ),
          graph.columnCount,
        )
        const other = decompose(turned, maximumMatching(turned))
        expect(other.columns).toEqual(parts.columns)
        expect([...other.rows].reverse()).toEqual([...parts.rows])
      }),
    )
  })

  it('exchange over and under when rows and columns do', () => {
    const swapped = [Part.square, Part.under, Part.over]
    fc.assert(
      fc.property(graphs, (graph) => {
        const parts = decompose(graph, maximumMatching(graph))
        const other = transpose(graph)
        const turned = decompose(other, maximumMatching(other))
        expect([...turned.rows]).toEqual([...parts.columns].map((part) => swapped[part]))
        expect([...turned.columns]).toEqual([...parts.rows].map((part) => swapped[part]))
      }),
    )
  })

  it('of a chain of 200,000 rows with one column too many are all under-determined', () => {
    const n = 200_000
    const graph = incidence(
      Array.from({ length: n }, (_, r) => [r, r + 1]),
      n + 1,
    )
    const parts = decompose(graph, maximumMatching(graph))
    expect(parts.rows.every((part) => part === Part.under)).toBe(true)
    expect(parts.columns.every((part) => part === Part.under)).toBe(true)
  })
})
