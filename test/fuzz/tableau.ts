import type { Dimension } from '../../src/quantity/dimension.ts'
import { streamQuantities } from '../../src/units/index.ts'
import { type KnownState, sizeOf } from './known-state.ts'

/** A quantity of the known state. */
export interface Known {
  readonly path: string
  readonly value: number
  readonly dimension: Dimension
}

/**
 * How every quantity that follows at the known state depends on every given one, to first order:
 * d(row)/d(column), both in parts of their sizes. Giving a quantity in place of another exchanges a
 * row and a column, which is possible where their entry is not zero.
 */
export class Tableau {
  readonly rows: Known[]
  readonly columns: Known[]
  /** Row by row. */
  private readonly entries: Float64Array

  private constructor(rows: Known[], columns: Known[], entries: Float64Array) {
    this.rows = rows
    this.columns = columns
    this.entries = entries
  }

  /** Undefined where the state is not the only one nearby. */
  static of(state: KnownState): Tableau | undefined {
    const { system, values } = state
    const known = (v: number): Known => ({
      path: system.variables[v]!.path,
      value: values[v]!,
      dimension: system.variables[v]!.description.dimension,
    })
    const size = (v: number): number => state.sizeOf(v)
    const { linear, rows, unknowns } = state.linearised(size)
    if (linear.rank < unknowns.length) return undefined
    const columns: Known[] = []
    const answers: Float64Array[] = []
    const rightSides = new Map<number, Float64Array>()
    rows.forEach((row, r) => {
      row.columns.forEach((v, k) => {
        if (Number.isNaN(system.given[v]!)) return
        let side = rightSides.get(v)
        if (side === undefined) {
          side = new Float64Array(rows.length)
          rightSides.set(v, side)
        }
        side[r] = -row.partials[k]!
      })
    })
    for (const [v, side] of rightSides) {
      columns.push(known(v))
      answers.push(linear.solve(side))
    }
    const place = new Map(unknowns.map((v, k) => [v, k]))
    const related = state.related()
    const all: Known[] = [
      ...unknowns.map(known),
      ...related.map(({ path, value }) => {
        const name = path.slice(path.lastIndexOf('.') + 1) as keyof typeof streamQuantities
        return { path, value, dimension: streamQuantities[name].dimension }
      }),
    ]
    const entries = new Float64Array(all.length * columns.length)
    const given = [...rightSides.keys()]
    answers.forEach((answer, c) => {
      for (let r = 0; r < unknowns.length; r++) entries[r * columns.length + c] = answer[r]!
      related.forEach((quantity, k) => {
        let sum = 0
        quantity.columns.forEach((v, i) => {
          const at = place.get(v)
          const part = at === undefined ? (given[c] === v ? 1 : 0) : answer[at]!
          sum += quantity.partials[i]! * part * size(v)
        })
        const r = unknowns.length + k
        entries[r * columns.length + c] =
          sum / Math.max(sizeOf(all[r]!.value, all[r]!.dimension), 1e-12)
      })
    })
    return new Tableau(all, columns, entries)
  }

  copy(): Tableau {
    return new Tableau([...this.rows], [...this.columns], this.entries.slice())
  }

  entry(row: number, column: number): number {
    return this.entries[row * this.columns.length + column]!
  }

  /** Gives what stood in a row in place of what stood in a column. */
  exchange(row: number, column: number): void {
    const { entries } = this
    const width = this.columns.length
    const pivot = this.entry(row, column)
    const base = row * width
    for (let c = 0; c < width; c++) if (c !== column) entries[base + c]! /= -pivot
    entries[base + column] = 1 / pivot
    for (let r = 0; r < this.rows.length; r++) {
      if (r === row) continue
      const factor = entries[r * width + column]!
      if (factor === 0) continue
      for (let c = 0; c < width; c++) {
        if (c !== column) entries[r * width + c]! += factor * entries[base + c]!
      }
      entries[r * width + column] = factor / pivot
    }
    const entering = this.rows[row]!
    this.rows[row] = this.columns[column]!
    this.columns[column] = entering
  }
}
