import { type Catalogue, type Kind, standardCatalogue } from '../catalogue.ts'
import type { Layout, Plant, Stream } from '../document.ts'
import { findPort, type PortOfUnit, portReference, portsOf } from '../ports.ts'
import { changeEach, changeLayout, freeId, layoutNamed } from './change-layout.ts'
import { type Connection, canConnect } from './connect.ts'
import { EditRefused } from './edit-refused.ts'
import { renumberEnds, withNumber } from './renumbering.ts'
import { restructure } from './restructure.ts'

/** Corner points that the user has moved, px at 100 %; none: the route is found anew. */
export function setBends(
  plant: Plant,
  layoutId: string,
  streamId: string,
  bends: readonly (readonly [number, number])[],
): Plant {
  return changeLayout(plant, layoutId, (layout) => {
    const streams = changeEach(layout.streams, (stream) => {
      if (stream.id !== streamId) return stream
      const { bends: now = [], ...straight } = stream
      const isSame =
        now.length === bends.length &&
        now.every(([x, y], i) => x === bends[i]?.[0] && y === bends[i]?.[1])
      if (isSame) return stream
      return bends.length === 0 ? straight : { ...straight, bends }
    })
    return streams === layout.streams ? layout : { ...layout, streams }
  })
}

/** Names of the ports by which a unit is put into a stream. */
export interface InsertionPorts {
  readonly inlet: string
  readonly outlet: string
}

/** Whether a unit that is there can be put into a stream, and by which ports. */
export function canInsertOnStream(
  layout: Layout,
  streamId: string,
  unitId: string,
  ports?: InsertionPorts,
  catalogue: Catalogue = standardCatalogue,
): Connection & { readonly ports?: InsertionPorts } {
  const stream = layout.streams.find(({ id }) => id === streamId)
  const unit = layout.units.find(({ id }) => id === unitId)
  const kind = unit && catalogue.kindNamed(unit.kind)
  if (!stream || !unit || !kind) return { allowed: false, why: 'There is nothing to insert here.' }
  if (stream.from.startsWith(`${unitId}.`) || stream.to.startsWith(`${unitId}.`)) {
    return { allowed: false, why: 'The stream is connected to this unit already.' }
  }
  let why = `Nothing can flow through ${unit.label || unitId}.`
  // As if the stream were not there: its ends are to be free.
  const without = { ...layout, streams: layout.streams.filter((one) => one !== stream) }
  const [from, to] = [stream.from, stream.to].map((end) => bare(layout, end, catalogue))
  for (const one of ports ? [ports] : waysThrough(portsOf(layout, unit, catalogue), kind)) {
    const into = canConnect(without, from ?? '', `${unitId}.${one.inlet}`, {}, catalogue)
    const out = canConnect(without, `${unitId}.${one.outlet}`, to ?? '', {}, catalogue)
    if (into.allowed && out.allowed) return { allowed: true, ports: one }
    why = into.allowed ? (out.allowed ? why : out.why) : into.why
  }
  return { allowed: false, why }
}

function bare(layout: Layout, reference: string, catalogue: Catalogue): string {
  const address = findPort(layout, reference, catalogue)
  return address ? `${address.unit.id}.${address.port}` : reference
}

/**
 * Pairs of open ports that a stream can run through, the likeliest first: what passes through
 * unchanged, then required ports, then the others.
 */
function waysThrough(ports: readonly PortOfUnit[], kind: Kind): InsertionPorts[] {
  const open = ports.filter(({ stream }) => stream === undefined)
  const inlets = open.filter(({ description }) => description.direction === 'in')
  const outlets = open.filter(({ description }) => description.direction === 'out')
  const passes = (a: PortOfUnit, b: PortOfUnit) =>
    kind.passes?.some(([one, other]) => one === a.port && other === b.port) ?? false
  const rank = (a: PortOfUnit, b: PortOfUnit) =>
    (passes(a, b) ? 0 : 4) + (a.description.optional ? 2 : 0) + (b.description.optional ? 1 : 0)
  return inlets
    .flatMap((a) => outlets.map((b) => ({ inlet: a.name, outlet: b.name, rank: rank(a, b) })))
    .sort((a, b) => a.rank - b.rank)
}

/**
 * Puts a unit that is there into a stream: the stream ends at its inlet, keeping its id and what is
 * given on it, and a new one (`id`) runs on from its outlet. Throws `EditRefused` where
 * `canInsertOnStream` says no.
 */
export function insertOnStream(
  plant: Plant,
  layoutId: string,
  streamId: string,
  unitId: string,
  ports?: InsertionPorts,
  catalogue: Catalogue = standardCatalogue,
): { plant: Plant; id: string } {
  const layout = layoutNamed(plant, layoutId)
  const answer = canInsertOnStream(layout, streamId, unitId, ports, catalogue)
  if (!answer.allowed || !answer.ports) {
    throw new EditRefused(answer.allowed ? 'There is nothing to insert here.' : answer.why)
  }
  const inlet = numberedEnd(layout, `${unitId}.${answer.ports.inlet}`, 'in', catalogue)
  const outlet = numberedEnd(layout, `${unitId}.${answer.ports.outlet}`, 'out', catalogue)
  const id = freeId(layout, 's')
  const renumberings = [inlet, outlet].flatMap(({ port, number }) =>
    number === undefined ? [] : [withNumber(unitId, port, number)],
  )
  const renumbered = renumberEnds(layout.streams, layout, renumberings, ({ kind }) =>
    catalogue.kindNamed(kind),
  )
  const streams = renumbered.flatMap((stream): Stream[] => {
    if (stream.id !== streamId) return [stream]
    const { bends: _, ...straight } = stream
    return [
      { ...straight, to: inlet.reference },
      { id, from: outlet.reference, to: stream.to, given: {} },
    ]
  })
  const after = restructure(layout, { ...layout, streams }, renumberings, catalogue)
  return { plant: changeLayout(plant, layoutId, () => after), id }
}

/** The port with the number that the stream takes there. */
function numberedEnd(
  layout: Layout,
  end: string,
  direction: 'in' | 'out',
  catalogue: Catalogue,
): { reference: string; port: string; number?: number } {
  const address = findPort(layout, end, catalogue, direction)
  if (!address) throw new EditRefused(`There is no port ${end}.`)
  const { unit, port, description } = address
  if (!description.repeated) return { reference: portReference(address), port }
  const number = portsOf(layout, unit, catalogue).filter((one) => one.port === port).length
  return { reference: portReference(address, number), port, number }
}
