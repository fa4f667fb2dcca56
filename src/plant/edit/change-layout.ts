import type { Layout, Plant } from '../document.ts'
import { EditRefused } from './edit-refused.ts'

export function layoutNamed(plant: Plant, layoutId: string): Layout {
  const layout = plant.layouts.find(({ id }) => id === layoutId)
  if (!layout) throw new EditRefused(`There is no layout ${layoutId}.`)
  return layout
}

/** The plant with one layout changed; the very same plant where the change gives back the same layout. */
export function changeLayout(
  plant: Plant,
  layoutId: string,
  change: (layout: Layout) => Layout,
): Plant {
  const before = layoutNamed(plant, layoutId)
  const after = change(before)
  if (after === before) return plant
  return {
    ...plant,
    layouts: plant.layouts.map((layout) => (layout === before ? after : layout)),
  }
}

/** A list with some of its things changed; the very same list where none was. */
export function changeEach<T>(list: readonly T[], change: (one: T) => T): readonly T[] {
  let changed = false
  const result = list.map((one) => {
    const next = change(one)
    changed ||= next !== one
    return next
  })
  return changed ? result : list
}

/** As `filter`, but the very same list where nothing goes. */
export function keep<T>(list: readonly T[], stays: (one: T) => boolean): readonly T[] {
  return list.every(stays) ? list : list.filter(stays)
}

/** The first of `stem1`, `stem2` ... that is no id of the layout. */
export function freeId(layout: Layout, stem: string): string {
  const taken = new Set([...layout.units, ...layout.streams, ...layout.shafts].map((one) => one.id))
  for (let number = 1; ; number++) {
    const id = `${stem}${number}`
    if (!taken.has(id)) return id
  }
}

/** The label itself, or with the first number that no unit's label has: 'Pump', 'Pump 2'. */
export function freeLabel(layout: Layout, label: string): string {
  const taken = new Set(layout.units.map((unit) => unit.label))
  if (!taken.has(label)) return label
  const bare = label.replace(/ \d+$/, '')
  for (let number = 2; ; number++) {
    const numbered = `${bare} ${number}`
    if (!taken.has(numbered)) return numbered
  }
}
