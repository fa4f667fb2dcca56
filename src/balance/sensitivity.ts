import {
  iteratedResidual,
  Outcome,
  type Tape,
  TapeBuilder,
  type Variable,
} from '../equations/expression/index.ts'
import { Factors, GradientProgram, SparseLU } from '../equations/newton/index.ts'
import type { Model } from './model.ts'
import { boundsOf } from './ranges.ts'
import { assemble } from './system.ts'

/** One block, laid out for transposed solves. */
interface BlockSweep {
  readonly variables: Int32Array
  readonly rows: Int32Array
  readonly gradient: GradientProgram
  /** Partials of the block's equations to everything in them. */
  readonly entries: Float64Array
  /** Entries to the block's own variables, with their row and column. */
  readonly own: Int32Array
  readonly ownRow: Int32Array
  readonly ownColumn: Int32Array
  /** Entries to variables of other blocks and to givens, with their row. */
  readonly foreign: Int32Array
  readonly foreignRow: Int32Array
  readonly scaled: Float64Array
  readonly factors: SparseLU
  readonly size: Float64Array
  readonly rowScale: Float64Array
  readonly right: Float64Array
  readonly multipliers: Float64Array
  usable: boolean
}

/**
 * Derivatives of any quantity to every given one at a solution, exact to first order, by one
 * transposed sweep over the blocks. The equations are taken unfolded: a loss that is 0 today still
 * has a worth.
 */
export class Sensitivity {
  private readonly model: Model
  private readonly tape: Tape
  private readonly sweeps: readonly BlockSweep[]
  private readonly scale: Float64Array
  private readonly adjoint: Float64Array
  /** By variable that a curve gives: the row of the curve's equation. */
  private readonly curveRows = new Map<
    number,
    { readonly sweep: BlockSweep; readonly at: number }
  >()

  constructor(model: Model) {
    this.model = model
    const { structure, system } = model
    const { equations } = assemble(system.layout, { ...model.options, fold: false })
    const builder = new TapeBuilder(system.variables.length)
    const seeds = structure.blocks.map((block) =>
      block.equations.map((e) => builder.lower(iteratedResidual(equations[e]!.equation))),
    )
    this.tape = builder.finish()
    const work = new Float64Array(this.tape.values.length)
    this.sweeps = structure.blocks.map(({ variables }, k) => {
      const gradient = new GradientProgram(builder, seeds[k]!, () => true, work)
      return layOut(variables, builder.rowsBehind(seeds[k]!), gradient)
    })
    equations.forEach(({ origin, equation }, e) => {
      if (origin !== 'curve' || equation.left.kind !== 'variable') return
      structure.blocks.forEach((block, k) => {
        const at = block.equations.indexOf(e)
        const { index } = equation.left as Variable
        if (at >= 0) this.curveRows.set(index, { sweep: this.sweeps[k]!, at })
      })
    })
    this.scale = boundsOf(system.variables).scale
    this.adjoint = new Float64Array(system.variables.length)
    this.refresh()
  }

  /** Takes over the model's present solution. */
  refresh(): void {
    const { values } = this.tape
    const { given } = this.model.system
    values.set(this.model.values.subarray(0, given.length))
    for (let v = 0; v < given.length; v++) if (!Number.isNaN(given[v]!)) values[v] = given[v]!
    for (const sweep of this.sweeps) sweep.usable = this.linearise(sweep)
  }

  private linearise(sweep: BlockSweep): boolean {
    const { variables, entries, own, ownRow, ownColumn, scaled, size, rowScale } = sweep
    const { lost } = this.model.program
    if (lost[variables[0]!]) return false
    if (this.tape.evaluate(sweep.rows) !== Outcome.fine) return false
    sweep.gradient.evaluate(this.tape, entries)
    for (let j = 0; j < variables.length; j++) {
      const index = variables[j]!
      size[j] = Math.max(Math.abs(this.tape.values[index]!), this.scale[index]! * 1e-2)
    }
    rowScale.fill(0)
    for (let e = 0; e < own.length; e++) {
      const entry = Math.abs(entries[own[e]!]! * size[ownColumn[e]!]!)
      if (entry > rowScale[ownRow[e]!]!) rowScale[ownRow[e]!] = entry
    }
    for (let i = 0; i < rowScale.length; i++) rowScale[i] = rowScale[i]! > 0 ? 1 / rowScale[i]! : 0
    for (let e = 0; e < own.length; e++) {
      scaled[e] = entries[own[e]!]! * size[ownColumn[e]!]! * rowScale[ownRow[e]!]!
    }
    return sweep.factors.factorise(scaled) === Factors.fine
  }

  /**
   * Derivatives of a quantity (by variable index) to all given ones, SI over SI, by variable index.
   * The array is reused by the next call.
   */
  of(target: number): Float64Array {
    const { adjoint } = this
    adjoint.fill(0)
    adjoint[target] = 1
    for (let k = this.sweeps.length - 1; k >= 0; k--) {
      if (this.sweeps[k]!.usable) this.sweepBlock(this.sweeps[k]!)
    }
    return adjoint
  }

  /**
   * Derivative of the quantity asked for last to the logarithm of a given curve as a whole: what it
   * does when all of the curve's values grow alike. `curved`: index of the variable that it gives.
   */
  byScaleOfCurve(curved: number): number {
    const row = this.curveRows.get(curved)
    if (row === undefined || !row.sweep.usable) return 0
    // The residual is value less curve: its partial to the logarithm of the curve is minus the value.
    return row.sweep.multipliers[row.at]! * this.tape.values[curved]!
  }

  private sweepBlock(sweep: BlockSweep): void {
    const { adjoint } = this
    const { variables, size, rowScale, right, multipliers, foreign, foreignRow, entries } = sweep
    let touched = false
    for (let j = 0; j < variables.length; j++) {
      const index = variables[j]!
      if (adjoint[index] !== 0) touched = true
      right[j] = adjoint[index]! * size[j]!
      adjoint[index] = 0
    }
    if (!touched) {
      multipliers.fill(0)
      return
    }
    sweep.factors.solveTransposed(right, multipliers)
    for (let i = 0; i < multipliers.length; i++) multipliers[i]! *= rowScale[i]!
    for (let e = 0; e < foreign.length; e++) {
      const index = sweep.gradient.entryVariable[foreign[e]!]!
      adjoint[index]! -= multipliers[foreignRow[e]!]! * entries[foreign[e]!]!
    }
  }
}

/** Splits a block's partials into those to its own variables (factorised) and those to others. */
function layOut(
  variables: readonly number[],
  rows: Int32Array,
  gradient: GradientProgram,
): BlockSweep {
  const n = variables.length
  const place = new Map(variables.map((index, j) => [index, j]))
  const first = new Int32Array(n + 1)
  const own: number[] = []
  const ownRow: number[] = []
  const ownColumn: number[] = []
  const foreign: number[] = []
  const foreignRow: number[] = []
  for (let i = 0; i < n; i++) {
    for (let e = gradient.entryFirst[i]!; e < gradient.entryFirst[i + 1]!; e++) {
      const column = place.get(gradient.entryVariable[e]!)
      if (column === undefined) {
        foreign.push(e)
        foreignRow.push(i)
      } else {
        own.push(e)
        ownRow.push(i)
        ownColumn.push(column)
      }
    }
    first[i + 1] = own.length
  }
  return {
    variables: Int32Array.from(variables),
    rows,
    gradient,
    entries: new Float64Array(gradient.entryVariable.length),
    own: Int32Array.from(own),
    ownRow: Int32Array.from(ownRow),
    ownColumn: Int32Array.from(ownColumn),
    foreign: Int32Array.from(foreign),
    foreignRow: Int32Array.from(foreignRow),
    scaled: new Float64Array(own.length),
    factors: new SparseLU(n, first, Int32Array.from(ownColumn)),
    size: new Float64Array(n),
    rowScale: new Float64Array(n),
    right: new Float64Array(n),
    multipliers: new Float64Array(n),
    usable: false,
  }
}
