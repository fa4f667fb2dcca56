import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { Factors, SparseLU } from '../../../src/equations/newton/index.ts'

type Matrix = readonly (readonly number[])[]

/** Gauss elimination with complete pivoting; null when singular to `tolerance`. */
function denseSolve(matrix: Matrix, b: readonly number[], tolerance = 1e-12): number[] | null {
  const n = matrix.length
  const a = matrix.map((row, r) => [...row, b[r]!])
  const order = Array.from({ length: n }, (_, k) => k)
  for (let k = 0; k < n; k++) {
    let pr = k
    let pc = k
    for (let r = k; r < n; r++) {
      for (let c = k; c < n; c++) if (Math.abs(a[r]![c]!) > Math.abs(a[pr]![pc]!)) [pr, pc] = [r, c]
    }
    if (Math.abs(a[pr]![pc]!) < tolerance) return null
    ;[a[k], a[pr]] = [a[pr]!, a[k]!]
    for (const row of a) [row[k], row[pc]] = [row[pc]!, row[k]!]
    ;[order[k], order[pc]] = [order[pc]!, order[k]!]
    for (let r = k + 1; r < n; r++) {
      const factor = a[r]![k]! / a[k]![k]!
      for (let c = k; c <= n; c++) a[r]![c]! -= factor * a[k]![c]!
    }
  }
  const x = new Array<number>(n).fill(0)
  for (let k = n - 1; k >= 0; k--) {
    let sum = a[k]![n]!
    for (let c = k + 1; c < n; c++) sum -= a[k]![c]! * x[order[c]!]!
    x[order[k]!] = sum / a[k]![k]!
  }
  return x
}

interface Pattern {
  readonly n: number
  readonly rowFirst: Int32Array
  readonly columnOf: Int32Array
}

function patternOf(n: number, cells: ReadonlySet<number>): Pattern {
  const rowFirst = new Int32Array(n + 1)
  const columns: number[] = []
  for (let r = 0; r < n; r++) {
    for (let c = 0; c < n; c++) if (cells.has(r * n + c)) columns.push(c)
    rowFirst[r + 1] = columns.length
  }
  return { n, rowFirst, columnOf: Int32Array.from(columns) }
}

function denseOf({ n, rowFirst, columnOf }: Pattern, entries: ArrayLike<number>): number[][] {
  return Array.from({ length: n }, (_, r) => {
    const row = new Array<number>(n).fill(0)
    for (let a = rowFirst[r]!; a < rowFirst[r + 1]!; a++) row[columnOf[a]!] = entries[a]!
    return row
  })
}

const transposed = (matrix: Matrix): number[][] =>
  matrix.map((_, r) => matrix.map((row) => row[r]!))

/** Rows scaled to largest entry 1, as the callers of the factors do. */
function scaled({ n, rowFirst }: Pattern, entries: readonly number[]): Float64Array {
  const result = Float64Array.from(entries)
  for (let r = 0; r < n; r++) {
    let largest = 0
    for (let a = rowFirst[r]!; a < rowFirst[r + 1]!; a++) {
      largest = Math.max(largest, Math.abs(entries[a]!))
    }
    for (let a = rowFirst[r]!; a < rowFirst[r + 1]!; a++) if (largest > 0) result[a]! /= largest
  }
  return result
}

const entry = fc.oneof(
  { weight: 6, arbitrary: fc.double({ min: -1, max: 1, noNaN: true }) },
  { weight: 1, arbitrary: fc.constantFrom(0, 1, -1, 1e-6) },
)

/** A sparse pattern with two sets of numbers in it. */
const cases = fc.integer({ min: 1, max: 12 }).chain((n) =>
  fc
    .tuple(
      fc.shuffledSubarray(
        Array.from({ length: n }, (_, k) => k),
        { minLength: n, maxLength: n },
      ),
      fc.array(fc.nat({ max: n * n - 1 }), { maxLength: 3 * n }),
    )
    .chain(([order, extra]) => {
      const pattern = patternOf(n, new Set([...order.map((c, r) => r * n + c), ...extra]))
      const numbers = fc.array(entry, {
        minLength: pattern.columnOf.length,
        maxLength: pattern.columnOf.length,
      })
      const side = fc.array(fc.double({ min: -1, max: 1, noNaN: true }), {
        minLength: n,
        maxLength: n,
      })
      return fc.tuple(fc.constant(pattern), numbers, numbers, side)
    }),
)

function expectAnswer(matrix: Matrix, x: ArrayLike<number>, b: readonly number[]): void {
  let size = 1
  for (let k = 0; k < x.length; k++) size = Math.max(size, Math.abs(x[k]!))
  matrix.forEach((row, r) => {
    const sum = row.reduce((total, value, c) => total + value * x[c]!, 0)
    expect(Math.abs(sum - b[r]!)).toBeLessThan(1e-9 * size)
  })
}

describe('sparse factors', () => {
  it('solve what a dense solver solves, with numbers put in anew as well', () => {
    let solved = 0
    fc.assert(
      fc.property(cases, ([pattern, first, second, b]) => {
        const lu = new SparseLU(pattern.n, pattern.rowFirst, pattern.columnOf)
        const x = new Float64Array(pattern.n)
        for (const numbers of [first, second, first]) {
          const entries = scaled(pattern, numbers)
          const matrix = denseOf(pattern, entries)
          // Between clearly regular and clearly singular either outcome is right.
          const regular = denseSolve(matrix, b, 1e-6)
          const outcome = lu.factorise(entries)
          if (regular === null) continue
          expect(outcome).toBe(Factors.fine)
          solved++
          lu.solve(Float64Array.from(b), x)
          expectAnswer(matrix, x, b)
          lu.solveTransposed(Float64Array.from(b), x)
          expectAnswer(transposed(matrix), x, b)
        }
      }),
      { numRuns: 500 },
    )
    expect(solved).toBeGreaterThan(500)
  })

  it('say when a matrix is singular in numbers', () => {
    fc.assert(
      fc.property(cases, fc.nat(), ([pattern, numbers], which) => {
        const { n, rowFirst } = pattern
        // A row of zeros.
        const entries = scaled(pattern, numbers)
        const row = which % n
        entries.fill(0, rowFirst[row]!, rowFirst[row + 1]!)
        const lu = new SparseLU(n, pattern.rowFirst, pattern.columnOf)
        expect(lu.factorise(entries)).toBe(Factors.singular)
        expect(lu.singularRow).toBeGreaterThanOrEqual(0)
        expect(lu.singularColumn).toBeGreaterThanOrEqual(0)
      }),
    )
  })

  it('find rows that repeat each other', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 2, max: 8 }),
        fc.array(fc.integer({ min: -8, max: 8 }), { minLength: 64, maxLength: 64 }),
        (n, dice) => {
          const pattern = patternOf(n, new Set(Array.from({ length: n * n }, (_, k) => k)))
          const numbers = dice.slice(0, n * n)
          // The last row is the sum of two others.
          for (let c = 0; c < n; c++) {
            numbers[(n - 1) * n + c] = numbers[c]! + (n > 2 ? numbers[n + c]! : 0)
          }
          const lu = new SparseLU(n, pattern.rowFirst, pattern.columnOf)
          expect(lu.factorise(scaled(pattern, numbers))).toBe(Factors.singular)
        },
      ),
    )
  })

  it('choose a new order when the old pivots vanish, and after a singular matrix', () => {
    const pattern = patternOf(2, new Set([0, 1, 2, 3]))
    const lu = new SparseLU(2, pattern.rowFirst, pattern.columnOf)
    const x = new Float64Array(2)
    expect(lu.factorise(Float64Array.of(1, 0.1, 0.1, 1))).toBe(Factors.fine)
    expect(lu.factorise(Float64Array.of(0, 1, 1, 0))).toBe(Factors.fine)
    lu.solve(Float64Array.of(3, 5), x)
    expect([...x]).toEqual([5, 3])
    expect(lu.factorise(Float64Array.of(1, 1, 1, 1))).toBe(Factors.singular)
    expect(lu.factorise(Float64Array.of(1, 1, 1, -1))).toBe(Factors.fine)
    lu.solve(Float64Array.of(4, 2), x)
    expect([...x]).toEqual([3, 1])
  })

  it('fill in nothing on a chain of 20,000', () => {
    const n = 20_000
    const rowFirst = new Int32Array(n + 1)
    const columns: number[] = []
    const entries: number[] = []
    for (let r = 0; r < n; r++) {
      columns.push(r)
      entries.push(1)
      if (r > 0) {
        columns.push(r - 1)
        entries.push(-0.5)
      }
      rowFirst[r + 1] = columns.length
    }
    const lu = new SparseLU(n, rowFirst, Int32Array.from(columns))
    expect(lu.factorise(Float64Array.from(entries))).toBe(Factors.fine)
    const x = new Float64Array(n)
    lu.solve(new Float64Array(n).fill(1), x)
    // x_r = 1 + x_(r-1) / 2 tends to 2.
    expect(x[0]).toBe(1)
    expect(x[1]).toBe(1.5)
    expect(x[n - 1]).toBeCloseTo(2, 12)
  })
})
