import { DenseQR } from './dense.ts'

/** One row of a sparse matrix. */
export interface Row {
  readonly columns: readonly number[]
  readonly partials: readonly number[]
}

/** A pivot below this part of its row's largest entry is not taken for a step of elimination. */
const leastPivot = 1e-6

/**
 * Least-squares answers and rank of a system whose rows agree. Rows with one unknown and unknowns in
 * one row are eliminated first, which changes nothing; what is left goes to a dense factorisation.
 */
export class LinearSystem {
  readonly rank: number
  private readonly rows: readonly Row[]
  private readonly columnCount: number
  /** Row and column eliminated, known before the core (in order) and after it (in reverse order). */
  private readonly before: (readonly [row: number, column: number])[] = []
  private readonly after: (readonly [row: number, column: number])[] = []
  private readonly coreRows: readonly number[]
  private readonly coreColumns: readonly number[]
  private readonly core: DenseQR

  /** Rows scaled to largest entry 1. */
  constructor(rows: readonly Row[], columnCount: number, tolerance: number) {
    this.rows = rows
    this.columnCount = columnCount
    const rowDone = new Uint8Array(rows.length)
    const columnDone = new Uint8Array(columnCount)
    this.eliminate(rowDone, columnDone)
    this.coreColumns = Array.from({ length: columnCount }, (_, c) => c).filter(
      (c) => !columnDone[c],
    )
    this.coreRows = rows.map((_, r) => r).filter((r) => !rowDone[r])
    const place = new Map(this.coreColumns.map((c, k) => [c, k]))
    const height = this.coreRows.length
    const matrix = new Float64Array(height * this.coreColumns.length)
    this.coreRows.forEach((r, i) => {
      rows[r]!.columns.forEach((c, k) => {
        const column = place.get(c)
        if (column !== undefined) matrix[column * height + i] = rows[r]!.partials[k]!
      })
    })
    this.core = new DenseQR(height, this.coreColumns.length, matrix)
    this.rank = this.before.length + this.after.length + this.core.rank(tolerance)
  }

  private eliminate(rowDone: Uint8Array, columnDone: Uint8Array): void {
    const { rows } = this
    const rowsOf: number[][] = Array.from({ length: this.columnCount }, () => [])
    rows.forEach(({ columns }, r) => {
      for (const c of columns) rowsOf[c]!.push(r)
    })
    const open = (r: number): number[] => rows[r]!.columns.filter((c) => !columnDone[c])
    const isPivot = (r: number, c: number): boolean => {
      const { columns, partials } = rows[r]!
      return Math.abs(partials[columns.indexOf(c)]!) > leastPivot
    }
    const take = (r: number, c: number, list: (readonly [number, number])[]): void => {
      list.push([r, c])
      rowDone[r] = 1
      columnDone[c] = 1
    }
    for (let changed = true; changed; ) {
      changed = false
      for (let r = 0; r < rows.length; r++) {
        if (rowDone[r]) continue
        const left = open(r)
        // A row without unknowns agrees with the others and says nothing.
        if (left.length === 0) rowDone[r] = 1
        else if (left.length === 1 && isPivot(r, left[0]!)) {
          take(r, left[0]!, this.before)
          changed = true
        }
      }
    }
    for (let changed = true; changed; ) {
      changed = false
      for (let c = 0; c < this.columnCount; c++) {
        if (columnDone[c]) continue
        const left = rowsOf[c]!.filter((r) => !rowDone[r])
        if (left.length === 1 && isPivot(left[0]!, c)) {
          take(left[0]!, c, this.after)
          changed = true
        }
      }
    }
  }

  /** The answer for a right side; all columns are taken as independent. */
  solve(right: Float64Array): Float64Array {
    const x = new Float64Array(this.columnCount)
    const known = (r: number, but: number): number => {
      const { columns, partials } = this.rows[r]!
      let sum = right[r]!
      columns.forEach((c, k) => {
        if (c !== but) sum -= partials[k]! * x[c]!
      })
      return sum
    }
    const pivot = (r: number, c: number): void => {
      const { columns, partials } = this.rows[r]!
      x[c] = known(r, c) / partials[columns.indexOf(c)]!
    }
    for (const [r, c] of this.before) pivot(r, c)
    if (this.coreColumns.length > 0) {
      const b = Float64Array.from(this.coreRows, (r) => known(r, -1))
      const answer = this.core.solve(b)
      this.coreColumns.forEach((c, k) => {
        x[c] = answer[k]!
      })
    }
    for (const [r, c] of this.after.toReversed()) pivot(r, c)
    return x
  }
}
