import { forEachVariableOf } from '../equations/expression/index.ts'
import type { Model } from './model.ts'

/**
 * Paths of the given quantities on which some quantities depend, nearest first: those in the
 * equations that fixed them, then in the equations of what went into these, and so on. At most
 * `most`.
 */
export function givensBehind(model: Model, paths: readonly string[], most: number): string[] {
  const { system, structure } = model
  const blockOf = new Map<number, number>()
  structure.blocks.forEach(({ variables }, k) => {
    for (const index of variables) blockOf.set(index, k)
  })
  const found: string[] = []
  const seen = new Set<number>()
  const seenBlocks = new Set<number>()
  let layer = paths.flatMap((path) => variablesBehind(model, path))
  while (layer.length > 0 && found.length < most) {
    const next: number[] = []
    for (const index of layer) {
      if (seen.has(index)) continue
      seen.add(index)
      const isGiven = !Number.isNaN(system.given[index]!) || system.curved[index] === 1
      if (isGiven) found.push(system.variables[index]!.path)
      const block = blockOf.get(index)
      if (block === undefined || seenBlocks.has(block)) continue
      seenBlocks.add(block)
      for (const e of structure.blocks[block]!.equations) {
        // Unfolded, so that a loss given as 0 is among what a quantity depends on.
        forEachVariableOf(model.unfolded.equations[e]!.equation, (other) => next.push(other))
      }
    }
    layer = next
  }
  return found.slice(0, most)
}

/** Variables behind a path; a further quantity of a stream's state follows from p and h. */
export function variablesBehind(model: Model, path: string): number[] {
  const { indexOf } = model.system
  const index = indexOf.get(path)
  if (index !== undefined) return [index]
  const owner = path.slice(0, path.lastIndexOf('.'))
  return [`${owner}.p`, `${owner}.h`].flatMap((one) => {
    const found = indexOf.get(one)
    return found === undefined ? [] : [found]
  })
}
