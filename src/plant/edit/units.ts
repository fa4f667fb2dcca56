import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Layout, Options, Plant, Unit } from '../document.ts'
import { quantitiesOf } from '../quantities.ts'
import { usualGivens } from '../usual-givens.ts'
import { changeEach, changeLayout, freeId, freeLabel } from './change-layout.ts'
import { EditRefused } from './edit-refused.ts'
import { restructure } from './restructure.ts'
import { withTurbine } from './shafts.ts'

/**
 * Adds a unit with its usual quantities given; one that drives a shaft is put on the first with a
 * generator, or on a new one. `at`: its top left corner, px at 100 %.
 */
export function addUnit(
  plant: Plant,
  layoutId: string,
  kindName: string,
  at: readonly [number, number],
  catalogue: Catalogue = standardCatalogue,
): { plant: Plant; id: string } {
  const kind = catalogue.kindNamed(kindName)
  if (!kind) throw new EditRefused(`There is no kind of unit called ${kindName}.`)
  let id = ''
  const after = changeLayout(plant, layoutId, (layout) => {
    id = freeId(layout, kind.idStem)
    const bare: Unit = { id, kind: kind.name, label: freeLabel(layout, kind.label), at, given: {} }
    const unit = { ...bare, given: usualGivens(quantitiesOf(layout, bare, catalogue)) }
    const added = { ...layout, units: [...layout.units, unit] }
    return kind.shaft === 'driving' ? withTurbine(added, id, catalogue) : added
  })
  return { plant: after, id }
}

function changeUnits(
  plant: Plant,
  layoutId: string,
  ids: readonly string[],
  change: (unit: Unit) => Unit,
): Plant {
  const chosen = new Set(ids)
  return changeLayout(plant, layoutId, (layout) => {
    const units = changeEach(layout.units, (unit) => (chosen.has(unit.id) ? change(unit) : unit))
    return units === layout.units ? layout : { ...layout, units }
  })
}

/** Moves units by px at 100 %. Bends of streams between two of them move along. */
export function moveUnits(
  plant: Plant,
  layoutId: string,
  ids: readonly string[],
  by: readonly [number, number],
): Plant {
  const [dx, dy] = by
  if (dx === 0 && dy === 0) return plant
  const moved = changeUnits(plant, layoutId, ids, (unit) => ({
    ...unit,
    at: [unit.at[0] + dx, unit.at[1] + dy],
  }))
  const chosen = new Set(ids)
  const isChosen = (end: string) => chosen.has(end.slice(0, end.indexOf('.')))
  return changeLayout(moved, layoutId, (layout) => {
    const streams = changeEach(layout.streams, (stream) =>
      stream.bends && isChosen(stream.from) && isChosen(stream.to)
        ? { ...stream, bends: stream.bends.map(([x, y]) => [x + dx, y + dy] as const) }
        : stream,
    )
    return streams === layout.streams ? layout : { ...layout, streams }
  })
}

/** Sets units at places, px at 100 %: aligning, tidying. */
export function placeUnits(
  plant: Plant,
  layoutId: string,
  places: Readonly<Record<string, readonly [number, number]>>,
): Plant {
  return changeUnits(plant, layoutId, Object.keys(places), (unit) => {
    const at = places[unit.id]
    return !at || (at[0] === unit.at[0] && at[1] === unit.at[1]) ? unit : { ...unit, at }
  })
}

/** Turns units left to right, and back. */
export function mirrorUnits(plant: Plant, layoutId: string, ids: readonly string[]): Plant {
  return changeUnits(plant, layoutId, ids, ({ mirrored, ...unit }) =>
    mirrored ? unit : { ...unit, mirrored: true },
  )
}

/** The label of a unit, stream or shaft; an empty one of a stream or shaft is taken away. */
export function setLabel(plant: Plant, layoutId: string, id: string, label: string): Plant {
  return changeLayout(plant, layoutId, (layout) => {
    const units = changeEach(layout.units, (unit) =>
      unit.id === id && unit.label !== label ? { ...unit, label } : unit,
    )
    const streams = changeEach(layout.streams, (one) =>
      one.id === id ? labelled(one, label) : one,
    )
    const shafts = changeEach(layout.shafts, (one) => (one.id === id ? labelled(one, label) : one))
    return units === layout.units && streams === layout.streams && shafts === layout.shafts
      ? layout
      : { ...layout, units, streams, shafts }
  })
}

function labelled<T extends { readonly label?: string }>(one: T, label: string): T {
  if ((one.label ?? '') === label) return one
  const { label: _, ...bare } = one
  return (label === '' ? bare : { ...bare, label }) as T
}

/**
 * Sets an option of a unit; false, an empty list or undefined takes it away. Quantities that come with
 * the option arrive at their usual values, those that go with it are freed.
 */
export function setOption(
  plant: Plant,
  layoutId: string,
  unitId: string,
  option: string,
  value: boolean | readonly number[] | undefined,
  catalogue: Catalogue = standardCatalogue,
): Plant {
  return changeLayout(plant, layoutId, (layout) => {
    const unit = layout.units.find(({ id }) => id === unitId)
    const kind = unit && catalogue.kindNamed(unit.kind)
    const description = kind?.options?.[option]
    if (!unit || !description) throw new EditRefused(`${unitId} has no option ${option}.`)
    if (value !== undefined && (typeof value !== 'boolean') !== (description.list !== undefined)) {
      throw new EditRefused(
        `${description.label} takes ${description.list ? 'a list' : 'yes or no'}.`,
      )
    }
    const { [option]: now, ...others } = unit.options ?? {}
    const isOff = value === undefined || value === false || (value !== true && value.length === 0)
    if (isOff ? now === undefined : sameOption(now, value)) return layout
    const options: Options = isOff ? others : { ...others, [option]: value }
    return restructure(layout, withOptions(layout, unit, options), [], catalogue)
  })
}

function sameOption(a: Options[string] | undefined, b: Options[string]): boolean {
  return typeof a === 'object' && typeof b === 'object'
    ? a.length === b.length && a.every((number, i) => number === b[i])
    : a === b
}

function withOptions(layout: Layout, unit: Unit, options: Options): Layout {
  const { options: _, ...bare } = unit
  const changed = Object.keys(options).length === 0 ? bare : { ...bare, options }
  return { ...layout, units: layout.units.map((one) => (one === unit ? changed : one)) }
}
