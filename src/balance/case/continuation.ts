import type { Given, Layout } from '../../plant/document.ts'
import type { Dimension } from '../../quantity/dimension.ts'
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
  model.startFrom(scaledToLoad(layout, design))
  // Where something is short or too much, solving says what; there is nothing to walk to.
  if (model.structure.missing > 0 || model.structure.excess > 0) return solve(model)
  // Near the design no other start is worth the search: steps towards the case are.
  let direct = answerFromThere(model)
  if (direct?.status === 'solved') return direct
  const path = walk(layout, options, fromDesign)
  if (path !== undefined) {
    const last = new Model(layout, options)
    last.startFrom(path)
    const walked = answerFromThere(last)
    if (walked?.status === 'solved') return walked
    direct ??= walked
  }
  if (direct !== undefined) return direct
  model.startFrom(fromDesign)
  return solve(model)
}

/** The answer that the start leads to, possible or not; undefined where it leads to none. */
function answerFromThere(model: Model): Balance | undefined {
  return model.solveFromThere() ? solve(model, undefined, false) : undefined
}

/** A condenser's pressure and the like do not follow the load. Pa. */
const leastFollowing = 50e3
/** Quantities that grow with the load. */
const following: ReadonlySet<Dimension> = new Set(['massFlow', 'power', 'heatFlow', 'volumeFlow'])

/** The design's values brought to the case's load: flows, powers and the pressures they cause. */
function scaledToLoad(layout: Layout, design: Balance): (path: string) => number | null {
  const load = loadOf(layout, design)
  const { indexOf, variables } = design.model.system
  return (path) => {
    const value = design.results.value(path)
    const index = indexOf.get(path)
    if (value === null || index === undefined || load === 1) return value
    const { dimension } = variables[index]!.description
    if (following.has(dimension)) return value * load
    return dimension === 'pressure' && value > leastFollowing
      ? Math.max(leastFollowing, value * load)
      : value
  }
}

/** The case's largest given flow or power over the design's. */
function loadOf(layout: Layout, design: Balance): number {
  const { indexOf, variables } = design.model.system
  let largest = 0
  let load = 1
  for (const [path, given] of givensOf(layout)) {
    const index = indexOf.get(path)
    const before = design.results.value(path)
    if (typeof given !== 'number' || index === undefined || before === null || before <= 0) continue
    const { description, isState } = variables[index]!
    const { dimension } = description
    const isFlow = dimension === 'massFlow' && isState
    const isPower =
      dimension === 'power' && path.startsWith('plant.') && path !== 'plant.otherAuxiliary'
    const size = isFlow ? before : isPower ? before / powerPerFlow : 0
    if (size <= largest || given <= 0) continue
    largest = size
    load = given / before
  }
  return load
}
/** Makes powers and flows comparable, J/kg. */
const powerPerFlow = 1e6

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
