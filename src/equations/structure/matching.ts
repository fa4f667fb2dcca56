/** A bipartite graph in compressed rows: row r meets the columns `columns[first[r]] ..`. */
export interface Incidence {
  readonly rows: number
  readonly columnCount: number
  readonly first: Int32Array
  readonly columns: Int32Array
}

export interface Matching {
  /** By row: its column, or -1. */
  readonly columnOfRow: Int32Array
  /** By column: its row, or -1. */
  readonly rowOfColumn: Int32Array
  readonly size: number
}

/** Builds the graph from lists of columns, one a row. */
export function incidence(lists: readonly (readonly number[])[], columnCount: number): Incidence {
  const first = new Int32Array(lists.length + 1)
  let total = 0
  for (let r = 0; r < lists.length; r++) {
    total += lists[r]!.length
    first[r + 1] = total
  }
  const columns = new Int32Array(total)
  let at = 0
  for (const list of lists) for (const column of list) columns[at++] = column
  return { rows: lists.length, columnCount, first, columns }
}

/**
 * A maximum matching (J. E. Hopcroft and R. M. Karp, SIAM J. Comput. 2, 1973, 225-231), started
 * greedily with the rows that have the fewest columns. Deterministic.
 */
export function maximumMatching(graph: Incidence): Matching {
  const { rows, columnCount, first, columns } = graph
  const columnOfRow = new Int32Array(rows).fill(-1)
  const rowOfColumn = new Int32Array(columnCount).fill(-1)
  let size = greedy(graph, columnOfRow, rowOfColumn)
  const distance = new Int32Array(rows)
  const queue = new Int32Array(rows)
  const next = new Int32Array(rows)
  const path = new Int32Array(rows)
  for (;;) {
    let head = 0
    let tail = 0
    for (let r = 0; r < rows; r++) {
      if (columnOfRow[r]! < 0) {
        distance[r] = 0
        queue[tail++] = r
      } else distance[r] = -1
    }
    let reachable = false
    while (head < tail) {
      const r = queue[head++]!
      for (let k = first[r]!; k < first[r + 1]!; k++) {
        const partner = rowOfColumn[columns[k]!]!
        if (partner < 0) reachable = true
        else if (distance[partner]! < 0) {
          distance[partner] = distance[r]! + 1
          queue[tail++] = partner
        }
      }
    }
    if (!reachable) break
    next.set(first.subarray(0, rows))
    for (let r = 0; r < rows; r++) {
      if (
        columnOfRow[r]! < 0 &&
        augment(graph, r, columnOfRow, rowOfColumn, distance, next, path)
      ) {
        size++
      }
    }
  }
  return { columnOfRow, rowOfColumn, size }
}

function greedy(graph: Incidence, columnOfRow: Int32Array, rowOfColumn: Int32Array): number {
  const { rows, first, columns } = graph
  let size = 0
  const order = Array.from({ length: rows }, (_, r) => r)
  order.sort((a, b) => first[a + 1]! - first[a]! - (first[b + 1]! - first[b]!) || a - b)
  for (const r of order) {
    for (let k = first[r]!; k < first[r + 1]!; k++) {
      if (rowOfColumn[columns[k]!]! < 0) {
        rowOfColumn[columns[k]!] = r
        columnOfRow[r] = columns[k]!
        size++
        break
      }
    }
  }
  return size
}

/** Depth-first search along the levels, without recursion: plants may have thousands of rows. */
function augment(
  graph: Incidence,
  start: number,
  columnOfRow: Int32Array,
  rowOfColumn: Int32Array,
  distance: Int32Array,
  next: Int32Array,
  path: Int32Array,
): boolean {
  const { first, columns } = graph
  let depth = 0
  path[0] = start
  while (depth >= 0) {
    const r = path[depth]!
    if (next[r]! >= first[r + 1]!) {
      distance[r] = -1
      depth--
      if (depth >= 0) next[path[depth]!]!++
      continue
    }
    const partner = rowOfColumn[columns[next[r]!]!]!
    if (partner < 0) {
      for (let d = depth; d >= 0; d--) {
        const row = path[d]!
        const column = columns[next[row]!]!
        columnOfRow[row] = column
        rowOfColumn[column] = row
      }
      return true
    }
    if (distance[partner]! === distance[r]! + 1) path[++depth] = partner
    else next[r]!++
  }
  return false
}
