/**
 * Sparse LU factors of a matrix whose pattern stays while its numbers change. The first
 * factorisation chooses the order of pivots (H. M. Markowitz, Management Sci. 3, 1957, 255-269, with
 * threshold pivoting); later ones replay it without searching or allocating, until a pivot gets
 * too small for the order to be trusted.
 */

/** A pivot must be at least this part of the largest entry of its column when the order is chosen. */
const threshold = 0.05
/** Replayed pivots below this part of their row's largest entry ask for a new order. */
const replayThreshold = 1e-7
/** Below this, relative to the scaled rows (largest entry 1), a matrix counts as singular. */
const singular = 1e-13

export const Factors = { fine: 0, singular: 1 } as const

export class SparseLU {
  readonly n: number
  private readonly rowFirst: Int32Array
  private readonly columnOf: Int32Array
  private ordered = false
  /** By step: pivot row and column; and their inverses. */
  private readonly pivotRow: Int32Array
  private readonly pivotColumn: Int32Array
  private readonly stepOfColumn: Int32Array
  /** Factor rows in pivot order: entries before `diagonal` are L, from it on U. Columns are steps. */
  private factorFirst = new Int32Array(0)
  private factorColumn = new Int32Array(0)
  private factorValue = new Float64Array(0)
  private diagonal = new Int32Array(0)
  private readonly work: Float64Array
  /** When singular: a row and a column that could not be used. */
  singularRow = -1
  singularColumn = -1

  /** Pattern: row r has the columns `columnOf[rowFirst[r]] .. columnOf[rowFirst[r + 1] - 1]`. */
  constructor(n: number, rowFirst: Int32Array, columnOf: Int32Array) {
    this.n = n
    this.rowFirst = rowFirst
    this.columnOf = columnOf
    this.pivotRow = new Int32Array(n)
    this.pivotColumn = new Int32Array(n)
    this.stepOfColumn = new Int32Array(n)
    this.work = new Float64Array(n)
  }

  /** Factorises the matrix with these entries (in the pattern's order). */
  factorise(entries: Float64Array): number {
    if (this.ordered && this.replay(entries) === Factors.fine) return Factors.fine
    this.ordered = false
    if (this.chooseOrder(entries) !== Factors.fine) return Factors.singular
    this.ordered = true
    return this.replay(entries, true)
  }

  /** Solves A x = b in place. */
  solve(b: Float64Array, x: Float64Array): void {
    const { n, work, factorFirst, factorColumn, factorValue, diagonal } = this
    for (let k = 0; k < n; k++) {
      let sum = b[this.pivotRow[k]!]!
      const d = diagonal[k]!
      for (let e = factorFirst[k]!; e < d; e++) sum -= factorValue[e]! * work[factorColumn[e]!]!
      work[k] = sum
    }
    for (let k = n - 1; k >= 0; k--) {
      let sum = work[k]!
      const d = diagonal[k]!
      for (let e = d + 1; e < factorFirst[k + 1]!; e++) {
        sum -= factorValue[e]! * work[factorColumn[e]!]!
      }
      work[k] = sum / factorValue[d]!
    }
    for (let k = 0; k < n; k++) x[this.pivotColumn[k]!] = work[k]!
  }

  /** Solves A^T x = b in place. */
  solveTransposed(b: Float64Array, x: Float64Array): void {
    const { n, work, factorFirst, factorColumn, factorValue, diagonal } = this
    for (let k = 0; k < n; k++) work[k] = b[this.pivotColumn[k]!]!
    for (let k = 0; k < n; k++) {
      const d = diagonal[k]!
      const value = work[k]! / factorValue[d]!
      work[k] = value
      for (let e = d + 1; e < factorFirst[k + 1]!; e++) {
        work[factorColumn[e]!]! -= factorValue[e]! * value
      }
    }
    for (let k = n - 1; k >= 0; k--) {
      const value = work[k]!
      for (let e = factorFirst[k]!; e < diagonal[k]!; e++) {
        work[factorColumn[e]!]! -= factorValue[e]! * value
      }
    }
    for (let k = 0; k < n; k++) x[this.pivotRow[k]!] = work[k]!
  }

  private replay(entries: Float64Array, fresh = false): number {
    const { n, work, rowFirst, columnOf, factorFirst, factorColumn, factorValue, diagonal } = this
    for (let k = 0; k < n; k++) {
      const row = this.pivotRow[k]!
      const begin = factorFirst[k]!
      const end = factorFirst[k + 1]!
      for (let e = begin; e < end; e++) work[factorColumn[e]!] = 0
      let largest = 0
      for (let a = rowFirst[row]!; a < rowFirst[row + 1]!; a++) {
        work[this.stepOfColumn[columnOf[a]!]!] = entries[a]!
        const size = Math.abs(entries[a]!)
        if (size > largest) largest = size
      }
      const d = diagonal[k]!
      for (let e = begin; e < d; e++) {
        const j = factorColumn[e]!
        const dj = diagonal[j]!
        const multiplier = work[j]! / factorValue[dj]!
        work[j] = multiplier
        if (multiplier === 0) continue
        const stop = factorFirst[j + 1]!
        for (let u = dj + 1; u < stop; u++) {
          work[factorColumn[u]!]! -= multiplier * factorValue[u]!
        }
      }
      for (let e = begin; e < end; e++) factorValue[e] = work[factorColumn[e]!]!
      const pivot = Math.abs(factorValue[d]!)
      if (!(pivot > (fresh ? singular : replayThreshold) * largest)) {
        this.singularRow = row
        this.singularColumn = this.pivotColumn[k]!
        return Factors.singular
      }
    }
    return Factors.fine
  }

  /** Chooses pivots by Markowitz count on the numbers at hand and lays out the factors' pattern. */
  private chooseOrder(entries: Float64Array): number {
    const { n, rowFirst, columnOf } = this
    const rows: Map<number, number>[] = []
    const columns: Set<number>[] = Array.from({ length: n }, () => new Set<number>())
    for (let r = 0; r < n; r++) {
      const row = new Map<number, number>()
      for (let a = rowFirst[r]!; a < rowFirst[r + 1]!; a++) {
        row.set(columnOf[a]!, entries[a]!)
        columns[columnOf[a]!]!.add(r)
      }
      rows.push(row)
    }
    const lower: number[][] = Array.from({ length: n }, () => [])
    const upper: number[][] = new Array(n)
    const rowDone = new Uint8Array(n)
    const columnDone = new Uint8Array(n)
    const byCount = new CountQueue(n, (c) => columns[c]!.size)
    for (let k = 0; k < n; k++) {
      const pivot = this.choosePivot(rows, columns, byCount)
      if (pivot === undefined) {
        this.singularRow = rowDone.indexOf(0)
        this.singularColumn = columnDone.indexOf(0)
        return Factors.singular
      }
      const [r, c] = pivot
      this.pivotRow[k] = r
      this.pivotColumn[k] = c
      this.stepOfColumn[c] = k
      rowDone[r] = 1
      columnDone[c] = 1
      byCount.remove(c)
      const pivotEntries = rows[r]!
      const value = pivotEntries.get(c)!
      columns[c]!.delete(r)
      for (const other of columns[c]!) {
        const target = rows[other]!
        const multiplier = target.get(c)! / value
        target.delete(c)
        lower[other]!.push(k)
        for (const [column, entry] of pivotEntries) {
          if (column === c) continue
          const before = target.get(column)
          target.set(column, (before ?? 0) - multiplier * entry)
          if (before === undefined) {
            columns[column]!.add(other)
            byCount.update(column)
          }
        }
      }
      pivotEntries.delete(c)
      upper[k] = [...pivotEntries.keys()]
      for (const column of pivotEntries.keys()) {
        columns[column]!.delete(r)
        byCount.update(column)
      }
    }
    this.layOut(lower, upper)
    return Factors.fine
  }

  private choosePivot(
    rows: readonly Map<number, number>[],
    columns: readonly Set<number>[],
    byCount: CountQueue,
  ): readonly [number, number] | undefined {
    let best: readonly [number, number] | undefined
    let bestCost = Number.POSITIVE_INFINITY
    let looked = 0
    for (const c of byCount.ascending()) {
      const members = columns[c]!
      let largest = 0
      for (const r of members) largest = Math.max(largest, Math.abs(rows[r]!.get(c)!))
      if (!(largest > singular)) continue
      for (const r of members) {
        if (Math.abs(rows[r]!.get(c)!) < threshold * largest) continue
        const cost = (members.size - 1) * (rows[r]!.size - 1)
        if (cost < bestCost) {
          bestCost = cost
          best = [r, c]
        }
      }
      if (bestCost === 0 || ++looked >= 4) break
    }
    return best
  }

  private layOut(lower: readonly number[][], upper: readonly number[][]): void {
    const { n } = this
    const first = new Int32Array(n + 1)
    const diagonal = new Int32Array(n)
    let total = 0
    for (let k = 0; k < n; k++) {
      diagonal[k] = total + lower[this.pivotRow[k]!]!.length
      total = diagonal[k]! + 1 + upper[k]!.length
      first[k + 1] = total
    }
    const column = new Int32Array(total)
    for (let k = 0; k < n; k++) {
      let e = first[k]!
      for (const j of lower[this.pivotRow[k]!]!) column[e++] = j
      column[e++] = k
      for (const c of upper[k]!) column[e++] = this.stepOfColumn[c]!
    }
    this.factorFirst = first
    this.factorColumn = column
    this.factorValue = new Float64Array(total)
    this.diagonal = diagonal
  }
}

/** Columns in buckets by their count. */
class CountQueue {
  private readonly buckets: Set<number>[]
  private readonly bucketOf: Int32Array
  private readonly count: (column: number) => number

  constructor(n: number, count: (column: number) => number) {
    this.count = count
    this.buckets = Array.from({ length: n + 1 }, () => new Set<number>())
    this.bucketOf = new Int32Array(n)
    for (let c = 0; c < n; c++) {
      this.bucketOf[c] = count(c)
      this.buckets[count(c)]!.add(c)
    }
  }

  remove(column: number): void {
    this.buckets[this.bucketOf[column]!]!.delete(column)
    this.bucketOf[column] = -1
  }

  update(column: number): void {
    const before = this.bucketOf[column]!
    if (before < 0) return
    const now = this.count(column)
    if (now === before) return
    this.buckets[before]!.delete(column)
    this.buckets[now]!.add(column)
    this.bucketOf[column] = now
  }

  *ascending(): Generator<number> {
    for (let count = 1; count < this.buckets.length; count++) yield* this.buckets[count]!
  }
}
