import type { Model } from '../../src/balance/model.ts'
import { boundsOf } from '../../src/balance/ranges.ts'
import { Starts } from '../../src/balance/starts.ts'
import { iteratedResidual, type Tape, TapeBuilder } from '../../src/equations/expression/index.ts'

/**
 * The same equations the plain way, to compare with: all unknowns at once, Jacobian by
 * one-sided differences, dense elimination with row exchanges, steps halved until the residual falls.
 * Begins at the same first guesses.
 */
export class DenseNewton {
  readonly n: number
  private readonly tape: Tape
  private readonly rows: Int32Array
  private readonly seeds: Int32Array
  private readonly variables: Int32Array
  private readonly first: Float64Array
  private readonly scale: Float64Array
  private readonly matrix: Float64Array
  private readonly residuals: Float64Array
  private readonly shifted: Float64Array

  constructor(model: Model) {
    const { system, structure } = model
    const { blocks } = structure
    const builder = new TapeBuilder(system.variables.length)
    const equations = blocks.flatMap((block) => [...block.equations])
    this.seeds = Int32Array.from(equations, (e) =>
      builder.lower(iteratedResidual(system.equations[e]!.equation)),
    )
    this.tape = builder.finish()
    this.rows = Int32Array.from(this.tape.slots, (_, row) => row)
    this.variables = Int32Array.from(blocks.flatMap((block) => [...block.variables]))
    this.n = this.variables.length
    this.first = new Float64Array(system.variables.length)
    system.given.forEach((value, v) => {
      if (!Number.isNaN(value)) this.first[v] = value
    })
    new Starts(system, this.first, (v) => !Number.isNaN(system.given[v]!)).fill()
    const { scale } = boundsOf(system.variables)
    this.scale = Float64Array.from(this.variables, (v) =>
      Math.max(Math.abs(this.first[v]!), 1e-2 * scale[v]!),
    )
    this.matrix = new Float64Array(this.n * this.n)
    this.residuals = new Float64Array(this.n)
    this.shifted = new Float64Array(this.n)
  }

  /** Iterations needed, or -1. */
  solve(): number {
    const { n, tape, variables, first, residuals, scale } = this
    tape.values.set(first)
    if (!this.evaluate(residuals)) return -1
    for (let iteration = 1; iteration <= 50; iteration++) {
      this.difference()
      const rowScale = this.scaleRows()
      const step = this.eliminate(rowScale)
      const before = tape.values.slice()
      const norm = this.norm(residuals, rowScale)
      let length = 0
      for (let j = 0; j < n; j++) length = Math.max(length, Math.abs(step[j]!))
      let share = 1
      for (; share > 1e-4; share /= 2) {
        let inside = true
        for (let j = 0; j < n; j++) {
          const v = variables[j]!
          tape.values[v] = before[v]! + share * step[j]! * scale[j]!
          if (Number.isNaN(tape.values[v]!)) inside = false
        }
        if (!inside || !this.evaluate(this.shifted)) continue
        // Close to the answer round-off decides which residual is smaller: the full step is right.
        if (length < 1e-6 || this.norm(this.shifted, rowScale) < norm) break
      }
      residuals.set(this.shifted)
      if (length < 1e-6) return iteration
      if (share <= 1e-4) return -1
    }
    return -1
  }

  value(variable: number): number {
    return this.tape.values[variable]!
  }

  private evaluate(into: Float64Array): boolean {
    if (this.tape.evaluate(this.rows) !== 0) return false
    for (let i = 0; i < this.n; i++) into[i] = this.tape.values[this.seeds[i]!]!
    return true
  }

  private norm(values: Float64Array, rowScale: Float64Array): number {
    let sum = 0
    for (let i = 0; i < this.n; i++) sum += (values[i]! * rowScale[i]!) ** 2
    return Math.sqrt(sum)
  }

  /** Column by column, every equation evaluated once for each unknown. */
  private difference(): void {
    const { n, tape, variables, matrix, residuals, shifted, scale } = this
    for (let j = 0; j < n; j++) {
      const v = variables[j]!
      const held = tape.values[v]!
      for (const size of [1e-7, -1e-7]) {
        tape.values[v] = held + size * scale[j]!
        if (!this.evaluate(shifted)) continue
        for (let i = 0; i < n; i++) matrix[i * n + j] = (shifted[i]! - residuals[i]!) / size
        break
      }
      tape.values[v] = held
    }
    this.evaluate(shifted)
  }

  private scaleRows(): Float64Array {
    const { n, matrix } = this
    const factors = new Float64Array(n)
    for (let i = 0; i < n; i++) {
      let largest = 0
      for (let j = 0; j < n; j++) largest = Math.max(largest, Math.abs(matrix[i * n + j]!))
      factors[i] = largest > 0 ? 1 / largest : 1
      for (let j = 0; j < n; j++) matrix[i * n + j]! *= factors[i]!
    }
    return factors
  }

  /** Solves matrix * step = -residuals, rows scaled. */
  private eliminate(factors: Float64Array): Float64Array {
    const { n, matrix, residuals } = this
    const b = new Float64Array(n)
    const order = Int32Array.from({ length: n }, (_, k) => k)
    for (let i = 0; i < n; i++) b[i] = -residuals[i]! * factors[i]!
    for (let k = 0; k < n; k++) {
      let best = k
      for (let r = k + 1; r < n; r++) {
        if (Math.abs(matrix[order[r]! * n + k]!) > Math.abs(matrix[order[best]! * n + k]!)) best = r
      }
      const held = order[k]!
      order[k] = order[best]!
      order[best] = held
      const pivotRow = order[k]! * n
      const pivot = matrix[pivotRow + k]!
      for (let r = k + 1; r < n; r++) {
        const row = order[r]! * n
        const factor = matrix[row + k]! / pivot
        if (factor === 0) continue
        for (let c = k; c < n; c++) matrix[row + c]! -= factor * matrix[pivotRow + c]!
        b[order[r]!]! -= factor * b[order[k]!]!
      }
    }
    const x = new Float64Array(n)
    for (let k = n - 1; k >= 0; k--) {
      let sum = b[order[k]!]!
      for (let c = k + 1; c < n; c++) sum -= matrix[order[k]! * n + c]! * x[c]!
      x[k] = sum / matrix[order[k]! * n + k]!
    }
    return x
  }
}
