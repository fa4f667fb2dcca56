import type { Given, Layout } from '../../plant/document.ts'
import { Model } from '../model.ts'
import { type Balance, solve } from '../solve.ts'
import type { AssemblyOptions } from '../system.ts'
import { givensOf, withGivens } from './freeze.ts'

/** Steps are halved down to this part of the way. */
const shortest = 1 / 512

/**
 * Solves a case from its design: at once when Newton's method reaches it, else by moving the given
 * numbers from what they are in the design to what the case gives, in as many steps as it takes.
 */
export function continueTo(layout: Layout, options: AssemblyOptions, design: Balance): Balance {
  const fromDesign = (path: string): number | null => design.results.value(path)
  const model = new Model(layout, options)
  model.startFrom(fromDesign)
  // Where something is short or too much, solving says what; there is nothing to walk to.
  if (model.structure.missing > 0 || model.structure.excess > 0) return solve(model)
  // Near the design no other start is worth the search: steps towards the case are.
  if (model.solveFromThere()) return solve(model)
  const path = walk(layout, options, fromDesign)
  if (path !== undefined) {
    const last = new Model(layout, options)
    last.startFrom(path)
    if (last.solveFromThere()) return solve(last)
  }
  model.startFrom(fromDesign)
  return solve(model)
}

/** Values just before the case itself, or undefined where the way breaks off. */
function walk(
  layout: Layout,
  options: AssemblyOptions,
  fromDesign: (path: string) => number | null,
): ((path: string) => number | null) | undefined {
  const goal = givensOf(layout)
  const start = new Map<string, number>()
  for (const [path, given] of goal) {
    const value = fromDesign(path)
    if (typeof given === 'number' && value !== null && value !== given) start.set(path, value)
  }
  let values = fromDesign
  let done = 0
  let step = 1 / 4
  while (done < 1) {
    const next = Math.min(1, done + step)
    const table = new Map<string, Given>(goal)
    for (const [path, value] of start) {
      table.set(path, value + next * ((goal.get(path) as number) - value))
    }
    const model = new Model(withGivens(layout, table), options)
    model.startFrom(values)
    if (model.solveFromThere()) {
      values = (path) => model.value(path)
      done = next
      step = Math.min(step * 2, 1)
    } else {
      step /= 2
      if (step < shortest) return undefined
    }
  }
  return values
}
