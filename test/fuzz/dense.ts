/**
 * Householder QR of a dense matrix with as many rows as columns or more, with column pivoting (G.
 * Golub, Numer. Math. 7, 1965, 206-216): rank, and least-squares answers. Slow and plain on purpose:
 * what it says about a system does not depend on the solver's own sparse factors.
 */
export class DenseQR {
  readonly rows: number
  readonly columns: number
  /** Column by column. */
  private readonly a: Float64Array
  private readonly beta: Float64Array
  private readonly diagonal: Float64Array
  private readonly order: Int32Array

  /** Takes `a` (column by column) over and overwrites it. */
  constructor(rows: number, columns: number, a: Float64Array) {
    this.rows = rows
    this.columns = columns
    this.a = a
    const steps = Math.min(rows, columns)
    this.beta = new Float64Array(steps)
    this.diagonal = new Float64Array(steps)
    this.order = Int32Array.from({ length: columns }, (_, k) => k)
    const norms = new Float64Array(columns)
    for (let c = 0; c < columns; c++) norms[c] = this.norm(c, 0)
    for (let k = 0; k < steps; k++) this.step(k, norms)
  }

  /** Square of a column's length from row `from` on. */
  private norm(column: number, from: number): number {
    let sum = 0
    const base = column * this.rows
    for (let r = from; r < this.rows; r++) sum += this.a[base + r]! * this.a[base + r]!
    return sum
  }

  private step(k: number, norms: Float64Array): void {
    const { a, rows, columns } = this
    let best = k
    for (let c = k + 1; c < columns; c++) if (norms[c]! > norms[best]!) best = c
    if (best !== k) this.exchange(k, best, norms)
    const base = k * rows
    const length = Math.sqrt(this.norm(k, k))
    this.diagonal[k] = length
    if (length === 0) return
    const head = a[base + k]!
    const alpha = head > 0 ? -length : length
    a[base + k] = head - alpha
    this.beta[k] = 1 / (length * (length + Math.abs(head)))
    this.diagonal[k] = alpha
    for (let c = k + 1; c < columns; c++) {
      const other = c * rows
      let dot = 0
      for (let r = k; r < rows; r++) dot += a[base + r]! * a[other + r]!
      if (dot !== 0) {
        dot *= this.beta[k]!
        for (let r = k; r < rows; r++) a[other + r]! -= dot * a[base + r]!
      }
      const gone = a[other + k]!
      const left = norms[c]! - gone * gone
      norms[c] = left > 1e-8 * norms[c]! ? left : this.norm(c, k + 1)
    }
  }

  private exchange(k: number, other: number, norms: Float64Array): void {
    const { a, rows, order } = this
    for (let r = 0; r < rows; r++) {
      const held = a[k * rows + r]!
      a[k * rows + r] = a[other * rows + r]!
      a[other * rows + r] = held
    }
    norms[other] = norms[k]!
    const held = order[k]!
    order[k] = order[other]!
    order[other] = held
  }

  /** Pivots larger than this part of the largest one. */
  rank(tolerance: number): number {
    let rank = 0
    const largest = Math.abs(this.diagonal[0] ?? 0)
    for (const pivot of this.diagonal) if (Math.abs(pivot) > tolerance * largest) rank++
    return rank
  }

  /** Least-squares answer, all columns taken as independent; overwrites `b`. */
  solve(b: Float64Array): Float64Array {
    const { a, rows, columns, order, diagonal } = this
    for (let k = 0; k < columns; k++) {
      const base = k * rows
      let dot = 0
      for (let r = k; r < rows; r++) dot += a[base + r]! * b[r]!
      dot *= this.beta[k]!
      for (let r = k; r < rows; r++) b[r]! -= dot * a[base + r]!
    }
    const x = new Float64Array(columns)
    for (let k = columns - 1; k >= 0; k--) {
      let sum = b[k]!
      for (let c = k + 1; c < columns; c++) sum -= a[c * rows + k]! * x[order[c]!]!
      x[order[k]!] = sum / diagonal[k]!
    }
    return x
  }
}
