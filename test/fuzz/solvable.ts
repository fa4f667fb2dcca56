import { analyse } from '../../src/balance/structure.ts'
import { assemble } from '../../src/balance/system.ts'
import type { Layout } from '../../src/plant/document.ts'
import { withGivens } from './draft.ts'
import { faultOf, solveFile } from './judge.ts'
import { KnownState } from './known-state.ts'
import { Random } from './random.ts'
import { randomPlant } from './random-plant.ts'
import { isPower, type Swap, swapGivens } from './swap-givens.ts'
import { Tableau } from './tableau.ts'

/** A plant that has an answer by construction. */
export interface Solvable {
  readonly layout: Layout
  /** The same plant with what a designer would give. */
  readonly base: Layout
  readonly swaps: readonly Swap[]
  readonly reheats: number
  readonly heaters: number
  readonly hasPowerGiven: boolean
}

/** Why a random plant is not used: it has no feasible state to read givens from. */
export interface Unusable {
  readonly layout: Layout
  readonly unusable: string
}

/** Draws a plant, solves it as designed, and turns some of its quantities round. */
export function drawSolvable(seed: number, place: number): Solvable | Unusable {
  const random = new Random(seed, place)
  const { layout: base, reheats, heaters } = randomPlant(random)
  const answer = solveFile(base, `${seed}:${place}`)
  const fault = faultOf(answer.balance)
  if (fault !== undefined) return { layout: base, unusable: fault }
  const state = KnownState.of(answer.balance.model)
  const tableau = Tableau.of(state)
  if (tableau === undefined) return { layout: base, unusable: 'rank' }
  const streams = new Set(base.streams.map(({ id }) => id))
  const power = random.chance(0.12)
  const large = random.chance(0.45)
  let swaps: Swap[] = []
  let most = 0
  for (let attempt = 0; attempt < (large ? 4 : 1) && most <= 20; attempt++) {
    const count = Math.max(power ? 1 : 0, Math.round(random.spread(0.6, 9)))
    const drawn = swapGivens(tableau.copy(), random, count, power, streams)
    const block = largestBlockOf(applySwaps(base, drawn))
    if (attempt > 0 && block <= most) continue
    swaps = drawn
    most = block
  }
  // The rank is tested again on the swapped system itself, from scratch.
  while (swaps.length > 0 && !hasFullRank(applySwaps(base, swaps), state)) {
    swaps = swaps.slice(0, -1)
  }
  return {
    layout: applySwaps(base, swaps),
    base,
    swaps,
    reheats,
    heaters,
    hasPowerGiven: swaps.some(({ give }) => isPower(give)),
  }
}

export function applySwaps(base: Layout, swaps: readonly Swap[]): Layout {
  return withGivens(
    base,
    swaps.map(({ free }) => free),
    new Map(swaps.map(({ give, value }) => [give, value])),
  )
}

/** Whether the layout's equations have full rank at a state known of the same plant. */
export function hasFullRank(layout: Layout, known: KnownState): boolean {
  const state = known.transferredTo(layout)
  const { linear, unknowns } = state.linearised((v) => state.sizeOf(v))
  return linear.rank === unknowns.length
}

function largestBlockOf(layout: Layout): number {
  let largest = 0
  for (const { variables } of analyse(assemble(layout)).blocks) {
    if (variables.length > largest) largest = variables.length
  }
  return largest
}

/** As few of the plant's swaps as still lead to the same fault. */
export function minimise(plant: Solvable, fault: string): Solvable {
  const known = KnownState.of(solveFile(plant.base, 'base').balance.model)
  let { swaps } = plant
  for (let k = 0; k < swaps.length; ) {
    const fewer = swaps.filter((_, i) => i !== k)
    const layout = applySwaps(plant.base, fewer)
    const isSame =
      hasFullRank(layout, known) && faultOf(solveFile(layout, 'fewer').balance) === fault
    if (isSame) swaps = fewer
    else k++
  }
  return { ...plant, swaps, layout: applySwaps(plant.base, swaps) }
}
