import type { Incidence, Matching } from './matching.ts'

/** Which part of the Dulmage-Mendelsohn decomposition a row or column belongs to. */
export const Part = { square: 0, over: 1, under: 2 } as const

export interface Parts {
  readonly rows: Uint8Array
  readonly columns: Uint8Array
}

/**
 * The coarse decomposition (A. L. Dulmage and N. S. Mendelsohn, Canad. J. Math. 10, 1958, 517-534):
 * rows that alternating paths reach from unmatched rows are over-determined, columns that they
 * reach from unmatched columns under-determined, the rest is square.
 */
export function decompose(graph: Incidence, matching: Matching): Parts {
  const { rows: rowCount, columnCount, first, columns } = graph
  const rows = new Uint8Array(rowCount)
  const columnParts = new Uint8Array(columnCount)
  const stack: number[] = []
  for (let r = 0; r < rowCount; r++) {
    if (matching.columnOfRow[r]! < 0) {
      rows[r] = Part.over
      stack.push(r)
    }
  }
  while (stack.length > 0) {
    const r = stack.pop()!
    for (let k = first[r]!; k < first[r + 1]!; k++) {
      const column = columns[k]!
      if (columnParts[column] === Part.over) continue
      columnParts[column] = Part.over
      const partner = matching.rowOfColumn[column]!
      if (partner >= 0 && rows[partner] !== Part.over) {
        rows[partner] = Part.over
        stack.push(partner)
      }
    }
  }
  const transposed = transpose(graph)
  for (let c = 0; c < columnCount; c++) {
    if (matching.rowOfColumn[c]! < 0) {
      columnParts[c] = Part.under
      stack.push(c)
    }
  }
  while (stack.length > 0) {
    const c = stack.pop()!
    for (let k = transposed.first[c]!; k < transposed.first[c + 1]!; k++) {
      const row = transposed.columns[k]!
      if (rows[row] === Part.under) continue
      rows[row] = Part.under
      const partner = matching.columnOfRow[row]!
      if (partner >= 0 && columnParts[partner] !== Part.under) {
        columnParts[partner] = Part.under
        stack.push(partner)
      }
    }
  }
  return { rows, columns: columnParts }
}

/** Rows and columns exchanged. */
export function transpose(graph: Incidence): Incidence {
  const first = new Int32Array(graph.columnCount + 1)
  for (const column of graph.columns) first[column + 1]!++
  for (let c = 0; c < graph.columnCount; c++) first[c + 1]! += first[c]!
  const next = first.slice(0, graph.columnCount)
  const columns = new Int32Array(graph.columns.length)
  for (let r = 0; r < graph.rows; r++) {
    for (let k = graph.first[r]!; k < graph.first[r + 1]!; k++) {
      const column = graph.columns[k]!
      columns[next[column]!++] = r
    }
  }
  return { rows: graph.columnCount, columnCount: graph.rows, first, columns }
}
