import type { Model } from '../../src/balance/model.ts'
import { assemble, type System } from '../../src/balance/system.ts'
import {
  type Expression,
  forEachVariableOf,
  residual,
  type Tape,
  TapeBuilder,
} from '../../src/equations/expression/index.ts'
import type { Layout } from '../../src/plant/document.ts'
import type { Dimension } from '../../src/quantity/dimension.ts'
import { SATURATION_SIZE, Saturation, saturationAtPressure } from '../../src/steam/index.ts'
import { dryness, entropy, subcooling, superheat, temperature } from '../../src/steam/operations.ts'
import { LinearSystem, type Row } from './linear-system.ts'

/*
 * A system at a state that is known to satisfy it: residuals, the whole Jacobian, its rank. The rows
 * are all equations of the system, those that the solver leaves out included.
 */

/** What counts as a change of the first order: the value itself, of a temperature 100 K. */
export function sizeOf(value: number, dimension: Dimension): number {
  if (dimension === 'temperature') return 100
  if (dimension === 'specificEnthalpy') return 1e6
  if (dimension === 'specificEntropy') return 1e3
  return Math.abs(value)
}

/** Pivots of the scaled Jacobian below this part of the largest count as zero. */
const rankTolerance = 1e-10

/** Partials of one slot of an evaluated tape to the variables, by a reverse sweep over all rows. */
class Sweep {
  private readonly tape: Tape
  private readonly variables: number
  private readonly adjoint: Float64Array
  private readonly rowOfSlot = new Map<number, number>()

  constructor(tape: Tape, variables: number) {
    this.tape = tape
    this.variables = variables
    this.adjoint = new Float64Array(tape.values.length)
    tape.slots.forEach((slot, row) => {
      this.rowOfSlot.set(slot, row)
    })
  }

  partials(slot: number): Row {
    const { tape, adjoint, variables } = this
    adjoint.fill(0)
    adjoint[slot] = 1
    for (let row = this.rowOfSlot.get(slot) ?? -1; row >= 0; row--) {
      const weight = adjoint[tape.slots[row]!]!
      if (weight === 0) continue
      for (let k = tape.first[row]!; k < tape.first[row + 1]!; k++) {
        adjoint[tape.operands[k]!]! += weight * tape.partials[k]!
      }
    }
    const columns: number[] = []
    const partials: number[] = []
    for (let v = 0; v < variables; v++) {
      if (adjoint[v] === 0) continue
      columns.push(v)
      partials.push(adjoint[v]!)
    }
    return { columns, partials }
  }
}

/** Quantities of streams as expressions of pressure and enthalpy, where the system has none. */
const relations = { T: temperature, s: entropy, x: dryness, superheat, subcooling } as const

/** A stream's quantity that follows from its state, with its value and partials. */
export interface Related extends Row {
  readonly path: string
  readonly value: number
}

/** Equation residuals and partials of a system at given values of its variables. */
export class KnownState {
  readonly system: System
  readonly values: Float64Array
  /** By variable: has no value in this state. */
  private readonly lost: Uint8Array
  private readonly tape: Tape
  private readonly seeds: readonly number[]
  private readonly sweep: Sweep
  /** By equation: it needs a variable without a value (1). */
  private readonly open: Uint8Array

  /** `lost` marks variables that the state leaves open; equations that need them are left out. */
  constructor(system: System, values: ArrayLike<number>, lost: Uint8Array) {
    const count = system.variables.length
    this.system = system
    this.lost = lost
    this.values = Float64Array.from({ length: count }, (_, k) => values[k]!)
    const builder = new TapeBuilder(count)
    this.seeds = system.equations.map(({ equation }) => builder.lower(residual(equation)))
    this.tape = builder.finish()
    this.sweep = new Sweep(this.tape, count)
    this.open = Uint8Array.from(system.equations, ({ equation }) => {
      let open = 0
      forEachVariableOf(equation, (v) => {
        if (lost[v]) open = 1
      })
      return open
    })
    this.evaluate(this.values)
  }

  private evaluate(values: Float64Array): void {
    this.tape.values.set(values)
    // A row that is refused keeps what it had: only equations of lost variables need it.
    for (let row = 0; row < this.tape.slots.length; row++) this.tape.evaluate(Int32Array.of(row))
  }

  /**
   * The state with whatever is saturated moved a little off the plateau, to the side that it belongs
   * to: on the line itself the slope of T against h is either of two.
   */
  private offSaturation(): Float64Array {
    const moved = this.values.slice()
    const record = new Float64Array(SATURATION_SIZE)
    for (const base of this.system.streamBase) {
      const h = this.values[base + 2]!
      if (saturationAtPressure(record, 0, this.values[base + 1]!) !== 0) continue
      if (Math.abs(h - record[Saturation.hL]!) < 1e-8 * h) moved[base + 2] = h * (1 - 1e-7)
      if (Math.abs(h - record[Saturation.hV]!) < 1e-8 * h) moved[base + 2] = h * (1 + 1e-7)
    }
    return moved
  }

  static of(model: Model): KnownState {
    return new KnownState(model.system, model.values, model.program.lost)
  }

  /** The same state of the same plant with other quantities given. */
  transferredTo(layout: Layout): KnownState {
    const system = assemble(layout)
    const related = new Map(this.related().map(({ path, value }) => [path, value]))
    const values = new Float64Array(system.variables.length)
    const lost = new Uint8Array(system.variables.length)
    system.variables.forEach(({ path }, v) => {
      const before = this.system.indexOf.get(path)
      if (before !== undefined) {
        values[v] = this.values[before]!
        lost[v] = this.lost[before]!
      } else values[v] = related.get(path) ?? Number.NaN
      if (Number.isNaN(values[v])) lost[v] = 1
    })
    return new KnownState(system, values, lost)
  }

  /** Every quantity that has a value, by path. */
  quantities(): Map<string, number> {
    const quantities = new Map(this.related().map(({ path, value }) => [path, value]))
    this.system.variables.forEach(({ path }, v) => {
      if (!this.lost[v]) quantities.set(path, this.values[v]!)
    })
    return quantities
  }

  /** What counts as a change of the first order of a variable; see `sizeOf` of quantities. */
  sizeOf(variable: number): number {
    const { dimension } = this.system.variables[variable]!.description
    return Math.max(sizeOf(this.values[variable]!, dimension), 1e-12)
  }

  private row(equation: number): Row | undefined {
    if (this.open[equation]) return undefined
    return this.sweep.partials(this.seeds[equation]!)
  }

  /** The largest residual, each relative to the largest of its terms, and where it is. */
  worstResidual(): { readonly size: number; readonly equation: string } {
    this.evaluate(this.values)
    let size = 0
    let equation = ''
    this.system.equations.forEach(({ owner, key }, e) => {
      const row = this.row(e)
      if (row === undefined) return
      let scale = 1e-300
      row.columns.forEach((v, k) => {
        scale = Math.max(scale, Math.abs(row.partials[k]! * this.values[v]!))
      })
      const relative = Math.abs(this.tape.values[this.seeds[e]!]!) / scale
      if (relative > size || Number.isNaN(relative)) {
        size = Number.isNaN(relative) ? Number.POSITIVE_INFINITY : relative
        equation = `${owner}.${key}`
      }
    })
    return { size, equation }
  }

  /** The unknowns that the state fixes. */
  unknowns(): number[] {
    const { given, variables } = this.system
    const unknowns: number[] = []
    for (let v = 0; v < variables.length; v++) {
      if (Number.isNaN(given[v]!) && !this.lost[v]) unknowns.push(v)
    }
    return unknowns
  }

  /** Scaled rows of the Jacobian to all variables: entries times the variable's size. */
  private rows(size: (variable: number) => number): Row[] {
    this.evaluate(this.offSaturation())
    const rows: Row[] = []
    for (let e = 0; e < this.seeds.length; e++) {
      const row = this.row(e)
      if (row === undefined) continue
      const scaled = row.partials.map((partial, k) => partial * size(row.columns[k]!))
      const largest = Math.max(...scaled.map(Math.abs), 1e-300)
      rows.push({ columns: row.columns, partials: scaled.map((entry) => entry / largest) })
    }
    return rows
  }

  /** The Jacobian to the unknowns, ready to be solved, with the rows that go with it. */
  linearised(size: (variable: number) => number): {
    readonly linear: LinearSystem
    readonly rows: readonly Row[]
    readonly unknowns: readonly number[]
  } {
    const unknowns = this.unknowns()
    const place = new Map(unknowns.map((v, k) => [v, k]))
    const rows = this.rows(size)
    const own = rows.map((row) => {
      const columns: number[] = []
      const partials: number[] = []
      row.columns.forEach((v, k) => {
        const column = place.get(v)
        if (column === undefined) return
        columns.push(column)
        partials.push(row.partials[k]!)
      })
      return { columns, partials }
    })
    return { linear: new LinearSystem(own, unknowns.length, rankTolerance), rows, unknowns }
  }

  /** Quantities of streams that the system does not hold as variables. */
  related(): Related[] {
    const { layout, indexOf, streamBase } = this.system
    const found: Related[] = []
    layout.streams.forEach(({ id }, k) => {
      const base = streamBase[k]!
      if (this.lost[base + 1] || this.lost[base + 2]) return
      for (const [name, relation] of Object.entries(relations)) {
        const path = `${id}.${name}`
        if (indexOf.has(path)) continue
        const builder = new TapeBuilder(2)
        const slot = builder.lower(relation(leaf(0, 'p'), leaf(1, 'h')))
        const tape = builder.finish()
        tape.values[0] = this.values[base + 1]!
        tape.values[1] = this.values[base + 2]!
        if (tape.evaluate(Int32Array.from(tape.slots, (_, row) => row)) !== 0) continue
        const { columns, partials } = new Sweep(tape, 2).partials(slot)
        found.push({
          path,
          value: tape.values[slot]!,
          columns: columns.map((column) => base + 1 + column),
          partials,
        })
      }
    })
    return found
  }
}

const leaf = (index: number, name: string): Expression => ({ kind: 'variable', index, name })
