import type { Tape, TapeBuilder } from '../expression/tape.ts'

/**
 * The partials of some slots to chosen variables, as reverse sweeps laid out once: for each seed a
 * list of (row's slot, operand's place, operand's slot), in an order in which every row's adjoint
 * is complete before it is handed down.
 */
export class GradientProgram {
  /** By seed: where its links begin in `links` (threes). */
  private readonly first: Int32Array
  private readonly links: Int32Array
  private readonly seeds: Int32Array
  /** By seed: its entries; variable slot of each entry. */
  readonly entryFirst: Int32Array
  readonly entryVariable: Int32Array
  private readonly adjoint: Float64Array

  /**
   * `isActive` tells which slots depend on the variables of interest, `assigned` which rows give
   * variables their values.
   */
  constructor(
    builder: TapeBuilder,
    seeds: readonly number[],
    isActive: (slot: number) => boolean,
    adjoint: Float64Array,
    assigned?: ReadonlyMap<number, number>,
  ) {
    this.adjoint = adjoint
    this.seeds = Int32Array.from(seeds)
    const first = [0]
    const links: number[] = []
    const entryFirst = [0]
    const entryVariable: number[] = []
    for (const seed of seeds) {
      const rows = new Set<number>()
      const variables = new Set<number>()
      const stack = [seed]
      while (stack.length > 0) {
        const slot = stack.pop()!
        const row = assigned?.get(slot) ?? builder.rowOf(slot)
        if (row < 0) {
          variables.add(slot)
          continue
        }
        if (rows.has(row)) continue
        rows.add(row)
        for (const operand of builder.operandsOf(row)) if (isActive(operand)) stack.push(operand)
      }
      // A row comes after its operands, so descending rows hand adjoints down in the right order.
      for (const row of [...rows].sort((a, b) => b - a)) {
        let at = builder.firstOperand(row)
        for (const operand of builder.operandsOf(row)) {
          if (isActive(operand)) links.push(builder.slotOfRow(row), at, operand)
          at++
        }
      }
      first.push(links.length)
      entryVariable.push(...[...variables].sort((a, b) => a - b))
      entryFirst.push(entryVariable.length)
    }
    this.first = Int32Array.from(first)
    this.links = Int32Array.from(links)
    this.entryFirst = Int32Array.from(entryFirst)
    this.entryVariable = Int32Array.from(entryVariable)
  }

  /** Writes the partials of every seed to its variables, in the order of `entryVariable`. */
  evaluate(tape: Tape, entries: Float64Array): void {
    const { adjoint, links, first, entryFirst, entryVariable, seeds } = this
    const { partials } = tape
    for (let i = 0; i < seeds.length; i++) {
      adjoint[seeds[i]!] = 1
      for (let k = first[i]!; k < first[i + 1]!; k += 3) {
        adjoint[links[k + 2]!]! += adjoint[links[k]!]! * partials[links[k + 1]!]!
      }
      for (let e = entryFirst[i]!; e < entryFirst[i + 1]!; e++) {
        entries[e] = adjoint[entryVariable[e]!]!
        adjoint[entryVariable[e]!] = 0
      }
      for (let k = first[i]!; k < first[i + 1]!; k += 3) adjoint[links[k]!] = 0
      adjoint[seeds[i]!] = 0
    }
  }
}
