import type { Layout, Plant, Unit } from '../../../src/plant/document.ts'
import { connect } from '../../../src/plant/edit/connect.ts'
import { addUnit } from '../../../src/plant/edit/units.ts'
import { emptyPlant } from '../../../src/plant/empty-plant.ts'
import { readPlant } from '../../../src/plant/read-plant.ts'
import { writePlant } from '../../../src/plant/write-plant.ts'
import { invented } from '../invented-catalogue.ts'

export const base = 'base'

export function layoutOf(plant: Plant, id = base): Layout {
  const layout = plant.layouts.find((one) => one.id === id)
  if (!layout) throw new Error(`no layout ${id}`)
  return layout
}

export function unitOf(plant: Plant, id: string): Unit {
  const unit = layoutOf(plant).units.find((one) => one.id === id)
  if (!unit) throw new Error(`no unit ${id}`)
  return unit
}

/** The ends of all streams, by id. */
export function endsOf(plant: Plant): Record<string, string> {
  return Object.fromEntries(
    layoutOf(plant).streams.map(({ id, from, to }) => [id, `${from} > ${to}`]),
  )
}

/** One unit of each of these kinds: kettle1, mill1, tub1 ... */
export function plantOf(...kinds: string[]): Plant {
  return kinds.reduce(
    (plant, kind, i) => addUnit(plant, base, kind, [160 * i, 0], invented).plant,
    emptyPlant('Harrow Fen', invented),
  )
}

export function connected(plant: Plant, ...pairs: (readonly [string, string])[]): Plant {
  return pairs.reduce((one, [a, b]) => connect(one, base, a, b, {}, invented).plant, plant)
}

/** A mill with three taps to a tub: streams s1 (main), s2, s3, s4 (taps). */
export function tappedMill(): Plant {
  return connected(
    plantOf('kettle', 'mill', 'tub'),
    ['kettle1.steam', 'mill1.inlet'],
    ['mill1.tap', 'tub1.steam'],
    ['mill1.tap', 'tub1.steam'],
    ['mill1.tap', 'tub1.steam'],
  )
}

/** The layout with parts replaced, as a file would have it. */
export function withParts(plant: Plant, change: (layout: Layout) => Layout): Plant {
  const changed = {
    ...plant,
    layouts: plant.layouts.map((layout) => (layout.id === base ? change(layout) : layout)),
  }
  const read = readPlant(writePlant(changed, invented), invented)
  if (read.outcome === 'unusable') throw new Error(read.message)
  return changed
}

/** The plant with a unit's givens replaced. */
export function withGivensOf(plant: Plant, id: string, given: Unit['given']): Plant {
  return withParts(plant, (layout) => ({
    ...layout,
    units: layout.units.map((unit) => (unit.id === id ? { ...unit, given } : unit)),
  }))
}
