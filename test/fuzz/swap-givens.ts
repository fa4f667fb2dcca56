import type { Random } from './random.ts'
import type { Known, Tableau } from './tableau.ts'

/** One given quantity freed and another given in its place, at the value of the known state. */
export interface Swap {
  readonly free: string
  readonly give: string
  readonly value: number
}

/** Sensitivities below this, in parts of the quantities' sizes, do not fix a quantity in practice. */
export const leastEffect = 1e-4

/** Values at which a quantity says nothing, or stands for an exact relation. */
export function hasTellingValue({ path, value }: Known): boolean {
  if (!(Math.abs(value) > 1e-9) || value === 1) return false
  if (path.endsWith('.x')) return value > 0.002 && value < 0.998
  if (path.endsWith('.superheat') || path.endsWith('.subcooling')) return value > 0.5
  return true
}

type Sort = 'flow' | 'pressure' | 'state' | 'unit' | 'whole'

function sortOf({ path, dimension }: Known, streams: ReadonlySet<string>): Sort {
  const owner = path.slice(0, path.indexOf('.'))
  if (owner === 'plant' || owner.startsWith('shaft')) return 'whole'
  if (!streams.has(owner)) return 'unit'
  if (dimension === 'massFlow') return 'flow'
  return dimension === 'pressure' ? 'pressure' : 'state'
}

/** Powers of the plant as a customer would ask for them. */
export const isPower = (path: string): boolean =>
  /^plant\.(net|gross|cycle)Power$|^shaft\d+\.generatorPower$/.test(path)

/**
 * Exchanges up to `count` givens for other quantities that the state fixes to first order. With
 * `power` the first of them is a power of the plant.
 */
export function swapGivens(
  tableau: Tableau,
  random: Random,
  count: number,
  power: boolean,
  streams: ReadonlySet<string>,
): Swap[] {
  const swaps: Swap[] = []
  for (let attempt = 0; attempt < 6 * count && swaps.length < count; attempt++) {
    const column = random.whole(0, tableau.columns.length - 1)
    const freed = tableau.columns[column]!
    // What has just been given stays, and a power asked for stays asked for.
    if (swaps.some(({ give }) => give === freed.path)) continue
    const bySort = new Map<Sort, number[]>()
    tableau.rows.forEach((known, row) => {
      if (!hasTellingValue(known) || Math.abs(tableau.entry(row, column)) < leastEffect) return
      if (swaps.some(({ free }) => free === known.path)) return
      const wanted = power && swaps.length === 0
      if (wanted && !isPower(known.path)) return
      const sort = sortOf(known, streams)
      bySort.set(sort, [...(bySort.get(sort) ?? []), row])
    })
    if (bySort.size === 0) continue
    const row = random.choose(random.choose([...bySort.values()]))
    const given = tableau.rows[row]!
    swaps.push({ free: freed.path, give: given.path, value: given.value })
    tableau.exchange(row, column)
  }
  return swaps
}
