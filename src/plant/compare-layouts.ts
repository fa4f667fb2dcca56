import { equalParts } from './difference.ts'
import type { Case, Given, Givens, Layout } from './document.ts'
import { withGivens } from './overrides.ts'
import { labelOf } from './quantities.ts'

/** A unit or stream that two layouts do not have alike. */
export interface ItemDifference {
  readonly id: string
  readonly label: string
  /** Only in the first, only in the second, or in both with other ends, kind or options. */
  readonly where: 'first' | 'second' | 'both'
}

/** What is given in one layout or case and not, or otherwise, in another; of things that both have. */
export interface GivenDifference {
  readonly path: string
  readonly first: Given | undefined
  readonly second: Given | undefined
}

export interface LayoutComparison {
  readonly units: readonly ItemDifference[]
  readonly streams: readonly ItemDifference[]
  readonly givens: readonly GivenDifference[]
}

/** What differs between two layouts, or cases of them, in units, streams and givens; drawing aside. */
export function compareLayouts(
  first: Layout,
  second: Layout,
  firstCase?: Case,
  secondCase?: Case,
): LayoutComparison {
  const [a, b] = [withCase(first, firstCase), withCase(second, secondCase)]
  return {
    units: compareItems(
      a,
      b,
      a.units,
      b.units,
      (one, other) => one.kind === other.kind && equalParts(one.options ?? {}, other.options ?? {}),
    ),
    streams: compareItems(
      a,
      b,
      a.streams,
      b.streams,
      (one, other) => one.from === other.from && one.to === other.to,
    ),
    givens: compareGivens(a, b),
  }
}

function withCase(layout: Layout, one: Case | undefined): Layout {
  if (!one) return layout
  const changes = new Map<string, Given | undefined>(
    (one.free ?? []).map((path) => [path, undefined]),
  )
  for (const [path, given] of Object.entries(one.given ?? {})) changes.set(path, given)
  return withGivens(layout, changes)
}

interface Item {
  readonly id: string
}

function compareItems<T extends Item>(
  a: Layout,
  b: Layout,
  first: readonly T[],
  second: readonly T[],
  alike: (one: T, other: T) => boolean,
): ItemDifference[] {
  const others = new Map(second.map((one) => [one.id, one]))
  const differences: ItemDifference[] = []
  for (const one of first) {
    const other = others.get(one.id)
    if (!other) differences.push({ id: one.id, label: labelOf(a, one.id), where: 'first' })
    else if (!alike(one, other)) {
      differences.push({ id: one.id, label: labelOf(a, one.id), where: 'both' })
    }
  }
  const own = new Set(first.map(({ id }) => id))
  for (const { id } of second) {
    if (!own.has(id)) differences.push({ id, label: labelOf(b, id), where: 'second' })
  }
  return differences
}

function givensOf(layout: Layout): ReadonlyMap<string, Givens> {
  const owners = [...layout.units, ...layout.streams, ...layout.shafts]
  return new Map([
    ...owners.map(({ id, given }) => [id, given] as const),
    ['plant', layout.plant.given],
  ])
}

function compareGivens(a: Layout, b: Layout): GivenDifference[] {
  const [first, second] = [givensOf(a), givensOf(b)]
  const differences: GivenDifference[] = []
  for (const [id, given] of first) {
    const other = second.get(id)
    if (!other) continue
    for (const name of new Set([...Object.keys(given), ...Object.keys(other)])) {
      if (equalParts(given[name], other[name])) continue
      differences.push({ path: `${id}.${name}`, first: given[name], second: other[name] })
    }
  }
  return differences
}
