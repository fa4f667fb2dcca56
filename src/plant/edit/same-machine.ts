import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Layout, Plant, PortReference, Unit } from '../document.ts'
import { shapeOf } from '../ports.ts'
import { changeLayout, layoutNamed } from './change-layout.ts'
import { connect, reconnect } from './connect.ts'
import { EditRefused } from './edit-refused.ts'
import { setGiven } from './set-given.ts'
import { insertOnStream } from './streams.ts'
import { addUnit, setOption } from './units.ts'

/** A bleed put into a machine that stays what it was. */
export interface NewBleed {
  readonly turbine: string
  /** The stage group that is parted, from 1. */
  readonly group: number
  /** Where the new bleed lies on the group's expansion, Pa. */
  readonly pressure: number
  /** The layout in which the machine stands as it is. */
  readonly base: string
}

/**
 * Puts a bleed into a turbine "in the same machine" and leads it to a port: the group is parted, its
 * parts name the group that they come from (`splitFrom`), and every frozen case takes its hardware from
 * the base. Throws `EditRefused` where the base is the layout itself or has no such turbine.
 */
export function bleedInSameMachine(
  plant: Plant,
  layoutId: string,
  { turbine, group, pressure, base }: NewBleed,
  to: PortReference,
  catalogue: Catalogue = standardCatalogue,
): { plant: Plant; id: string } {
  const layout = layoutNamed(plant, layoutId)
  if (base === layoutId) {
    throw new EditRefused(
      'The machine as it is must stay in a layout of its own: propose a change of this one first.',
    )
  }
  const unit = layout.units.find(({ id }) => id === turbine)
  const kind = unit && catalogue.kindNamed(unit.kind)
  const found = Object.entries(kind?.options ?? {}).find(([, { list }]) => list && 'each' in list)
  if (!unit || !kind || !found) throw new EditRefused(`${turbine} has no bleeds.`)
  const [option, { list }] = found
  const { port, extra } = (list as { each: { port: string; extra: number } }).each
  const standing = layoutNamed(plant, base).units.find(({ id }) => id === turbine)
  if (standing?.kind !== unit.kind) {
    throw new EditRefused(`${layoutNamed(plant, base).name} has no ${unit.label}.`)
  }
  const groups = (shapeOf(layout, unit, kind).streams[port] ?? 0) + extra
  if (!Number.isInteger(group) || group < 1 || group > groups) {
    throw new EditRefused(`${unit.label} has stage groups 1 to ${groups}.`)
  }
  const origins = unit.options?.[option] ?? Array.from({ length: groups }, (_, i) => i + 1)
  let next = setOption(plant, layoutId, turbine, option, origins, catalogue)
  const connected = connect(
    next,
    layoutId,
    `${turbine}.${port}${group}`,
    to,
    { insert: true },
    catalogue,
  )
  next = setGiven(connected.plant, layoutId, `${connected.id}.p`, pressure, catalogue)
  next = changeLayout(next, layoutId, (one) => onHardwareOf(one, base))
  return { plant: next, id: connected.id }
}

function onHardwareOf(layout: Layout, base: string): Layout {
  const cases = layout.cases.map((one) =>
    one.frozen && !one.hardwareFrom ? { ...one, hardwareFrom: { layout: base } } : one,
  )
  return cases.every((one, i) => one === layout.cases[i]) ? layout : { ...layout, cases }
}

/** A heater on a new bleed, in the water between two that are there. */
export interface NewHeater extends NewBleed {
  /** The water stream that it is put on. */
  readonly water: string
  readonly label: string
}

/**
 * A new heater on a new bleed in the same machine, equipped like the heater that the water comes from:
 * put on the water between two, its drain led to that one, and the drain that went there from the next
 * heater led to the new one. It stands between its neighbours, below their row where there is no room.
 * Throws `EditRefused` where the stream does not lead from one heater to another of its kind.
 */
export function heaterInSameMachine(
  plant: Plant,
  layoutId: string,
  heater: NewHeater,
  catalogue: Catalogue = standardCatalogue,
): { plant: Plant; id: string } {
  const layout = layoutNamed(plant, layoutId)
  const stream = layout.streams.find(({ id }) => id === heater.water)
  const [before, after] = [stream?.from, stream?.to].map((end) =>
    layout.units.find(({ id }) => end?.startsWith(`${id}.`)),
  )
  const kind = before && catalogue.kindNamed(before.kind)
  const steam = Object.entries(kind?.ports ?? {}).find(
    ([, port]) => port.direction === 'in' && port.carries === 'steam',
  )?.[0]
  const way = kind?.passes?.find(([, out]) => stream?.from === `${before?.id}.${out}`)
  if (!stream || !before || !after || !way || !steam || after.kind !== before.kind) {
    throw new EditRefused('Choose the water between two heaters of one kind.')
  }
  const added = addUnit(plant, layoutId, before.kind, between(before, after), catalogue)
  const { id } = added
  const like = changeLayout(added.plant, layoutId, (one) => ({
    ...one,
    units: one.units.map((unit) => (unit.id === id ? likeNeighbour(unit, before, heater) : unit)),
  }))
  const ports = { inlet: way[0], outlet: way[1] }
  let next = insertOnStream(like, layoutId, stream.id, id, ports, catalogue).plant
  next = bleedInSameMachine(next, layoutId, heater, `${id}.${steam}1`, catalogue).plant
  const cascade = layout.streams.find(
    ({ from, to }) =>
      from.startsWith(`${after.id}.`) && to.startsWith(`${before.id}.`) && from !== stream.from,
  )
  if (!cascade) return { plant: next, id }
  const [out, into] = [cascade.from, cascade.to].map((end) => end.slice(end.indexOf('.') + 1))
  next = reconnect(next, layoutId, cascade.id, 'to', `${id}.${into}`, catalogue)
  next = connect(next, layoutId, `${id}.${out}`, `${before.id}.${into}`, {}, catalogue).plant
  return { plant: next, id }
}

function likeNeighbour(unit: Unit, neighbour: Unit, { label }: NewHeater): Unit {
  const { options, given, mirrored } = neighbour
  return { ...unit, label, given, ...(options && { options }), ...(mirrored && { mirrored }) }
}

function between(before: Unit, after: Unit): readonly [number, number] {
  const middle = (i: 0 | 1): number => Math.round((before.at[i] + after.at[i]) / 16) * 8
  const near = Math.abs(before.at[0] - after.at[0]) < 128 && before.at[1] === after.at[1]
  return [middle(0), middle(1) + (near ? 88 : 0)]
}
