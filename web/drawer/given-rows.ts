import { type Layout, labelOf, type QuantityEntry, quantitiesOfId } from '../../src/document.ts'

/** A given quantity in the table of all of them. */
export interface GivenRow extends QuantityEntry {
  /** What bears it: 'Heater 5'. */
  readonly owner: string
  readonly ownerLabel: string
  /** The kind of quantity, whoever bears it: its label without number, and what it measures. */
  readonly sort: string
}

/** Every quantity of a layout that is given, in the order of the units. */
export function givenRows(layout: Layout, isGiven: (path: string) => boolean): readonly GivenRow[] {
  const owners = [
    'plant',
    ...layout.units.map(({ id }) => id),
    ...layout.streams.map(({ id }) => id),
    ...layout.shafts.map(({ id }) => id),
  ]
  return owners.flatMap((owner) =>
    quantitiesOfId(layout, owner)
      .filter(({ path }) => isGiven(path))
      .map((entry) => ({
        ...entry,
        owner,
        ownerLabel: labelOf(layout, owner),
        sort: `${entry.description.label}/${entry.description.dimension}`,
      })),
  )
}

/** The kinds of quantity among the rows, each with how often it is given; the frequent first. */
export function sortsOf(
  rows: readonly GivenRow[],
): readonly { readonly sort: string; readonly label: string; readonly count: number }[] {
  const found = new Map<string, { sort: string; label: string; count: number }>()
  for (const { sort, description } of rows) {
    const before = found.get(sort)
    if (before) before.count += 1
    else found.set(sort, { sort, label: description.label, count: 1 })
  }
  return [...found.values()].sort((a, b) => b.count - a.count || (a.label < b.label ? -1 : 1))
}
