import { type Catalogue, standardCatalogue } from '../catalogue.ts'
import type { Layout, Plant, PortReference, Stream } from '../document.ts'
import { findPort, type PortAddress, portReference, portsOf, separateLines } from '../ports.ts'
import { labelOf } from '../quantities.ts'
import { changeLayout, freeId, layoutNamed } from './change-layout.ts'
import { EditRefused } from './edit-refused.ts'
import {
  type Renumbering,
  renumberEnds,
  withMoved,
  withNumber,
  withoutNumbers,
} from './renumbering.ts'
import { restructure } from './restructure.ts'

export type Connection =
  | { readonly allowed: true }
  /** One plain sentence. */
  | { readonly allowed: false; readonly why: string }

export interface ConnectOptions {
  /**
   * A number of a repeated port that is taken makes room: the streams from there on move to the next
   * number. So a bleed is put between two others.
   */
  readonly insert?: boolean
}

/** An end that a stream can be connected to. */
interface End extends PortAddress {
  readonly reference: PortReference
}

type Ends =
  | { readonly allowed: true; readonly from: End; readonly to: End }
  | { readonly allowed: false; readonly why: string }

const refused = (why: string) => ({ allowed: false, why }) as const

/** Whether a stream may run between two ports, whichever of them is the outlet. */
export function canConnect(
  layout: Layout,
  from: PortReference,
  to: PortReference,
  options: ConnectOptions = {},
  catalogue: Catalogue = standardCatalogue,
): Connection {
  const ends = findEnds(layout, from, to, options, catalogue)
  return ends.allowed ? { allowed: true } : ends
}

function findEnds(
  layout: Layout,
  one: PortReference,
  other: PortReference,
  options: ConnectOptions,
  catalogue: Catalogue,
): Ends {
  const [first, second] = findPair(layout, one, other, catalogue)
  if (!first || !second) return refused(`There is no port ${first ? other : one}.`)
  if (first.description.direction === second.description.direction) {
    return refused(
      first.description.direction === 'out'
        ? 'Both ends are outlets: a stream runs from an outlet to an inlet.'
        : 'Both ends are inlets: a stream runs from an outlet to an inlet.',
    )
  }
  const [source, target] = first.description.direction === 'out' ? [first, second] : [second, first]
  if (source.unit === target.unit && !separateLines(source.kind, source.port, target.port)) {
    return refused(
      `A stream cannot lead from ${labelOf(layout, source.unit.id)} straight back into it.`,
    )
  }
  const [leaves, takes] = [source.description.carries, target.description.carries]
  if (leaves !== takes && leaves !== 'any' && takes !== 'any') {
    return refused(
      `${portLabel(layout, source)} carries ${leaves}, and ${portLabel(layout, target)} takes ${takes}.`,
    )
  }
  const from = freeEnd(layout, source, options, catalogue)
  if (typeof from === 'string') return refused(from)
  const to = freeEnd(layout, target, options, catalogue)
  return typeof to === 'string' ? refused(to) : { allowed: true, from, to }
}

/** Both ports; where a bare name means an outlet and numbered inlets too, the one that fits the other. */
function findPair(
  layout: Layout,
  one: PortReference,
  other: PortReference,
  catalogue: Catalogue,
): readonly [PortAddress?, PortAddress?] {
  const first = findPort(layout, one, catalogue)
  const second = findPort(layout, other, catalogue, first && opposite(first))
  if (!first || !second || first.description.direction !== second.description.direction) {
    return [first, second]
  }
  return [findPort(layout, one, catalogue, opposite(second)), second]
}

function opposite({ description }: PortAddress): 'in' | 'out' {
  return description.direction === 'in' ? 'out' : 'in'
}

/** 'Outlet of Heater 5'. */
function portLabel(layout: Layout, { unit, description, number }: PortAddress): string {
  const numbered = number === undefined ? description.label : `${description.label} ${number}`
  return `${numbered} of ${labelOf(layout, unit.id)}`
}

/** The end with the number that a stream takes there, or why none can be connected. */
function freeEnd(
  layout: Layout,
  address: PortAddress,
  { insert = false }: ConnectOptions,
  catalogue: Catalogue,
): End | string {
  const { unit, port, description, number } = address
  const all = portsOf(layout, unit, catalogue).filter((one) => one.port === port)
  if (!description.repeated) {
    const stream = all[0]?.stream
    if (stream === undefined) return { ...address, reference: portReference(address) }
    return `${portLabel(layout, address)} is connected already, to ${stream}.`
  }
  // The open port comes after those in use.
  const next = all.length
  if (number === undefined || number === next || (insert && number < next)) {
    const taken = number ?? next
    return { ...address, number: taken, reference: portReference(address, taken) }
  }
  return number < next
    ? `${portLabel(layout, address)} is connected already, to ${all[number - 1]?.stream}.`
    : `The next free one is ${portLabel(layout, { ...address, number: next })}.`
}

function arriving(end: End): Renumbering[] {
  return end.number === undefined ? [] : [withNumber(end.unit.id, end.port, end.number)]
}

/**
 * Adds a stream. The ends may come in either order; a repeated port's bare name takes the next free
 * number. Throws `EditRefused` where `canConnect` says no.
 */
export function connect(
  plant: Plant,
  layoutId: string,
  from: PortReference,
  to: PortReference,
  options: ConnectOptions = {},
  catalogue: Catalogue = standardCatalogue,
): { plant: Plant; id: string } {
  const layout = layoutNamed(plant, layoutId)
  const ends = findEnds(layout, from, to, options, catalogue)
  if (!ends.allowed) throw new EditRefused(ends.why)
  const id = freeId(layout, 's')
  const stream: Stream = { id, from: ends.from.reference, to: ends.to.reference, given: {} }
  const renumberings = [...arriving(ends.from), ...arriving(ends.to)]
  const streams = [...renumbered(layout, layout.streams, renumberings, catalogue), stream]
  const after = restructure(layout, { ...layout, streams }, renumberings, catalogue)
  return { plant: changeLayout(plant, layoutId, () => after), id }
}

function renumbered(
  layout: Layout,
  streams: readonly Stream[],
  renumberings: readonly Renumbering[],
  catalogue: Catalogue,
): readonly Stream[] {
  return renumberEnds(streams, layout, renumberings, ({ kind }) => catalogue.kindNamed(kind))
}

/** Whether one end of a stream may move to another port. */
export function canReconnect(
  layout: Layout,
  streamId: string,
  end: 'from' | 'to',
  port: PortReference,
  catalogue: Catalogue = standardCatalogue,
): Connection {
  const stream = layout.streams.find(({ id }) => id === streamId)
  if (!stream) return refused(`There is no stream ${streamId}.`)
  const moved = movedEnd(layout, stream, end, port, catalogue)
  return typeof moved === 'string' ? refused(moved) : { allowed: true }
}

/** The new end, the old one where the port is the same, or why it cannot move. */
function movedEnd(
  layout: Layout,
  stream: Stream,
  end: 'from' | 'to',
  port: PortReference,
  catalogue: Catalogue,
): End | { readonly same: true } | string {
  const direction = end === 'from' ? 'out' : 'in'
  const address = findPort(layout, port, catalogue, direction)
  if (!address) return `There is no port ${port}.`
  const now = findPort(layout, stream[end], catalogue)
  if (now && now.unit === address.unit && now.port === address.port) return { same: true }
  if (address.description.direction !== direction) {
    return end === 'from' ? 'A stream starts at an outlet.' : 'A stream ends at an inlet.'
  }
  // As if the stream were not there: only then are the ports it holds free for it.
  const without = { ...layout, streams: layout.streams.filter((one) => one !== stream) }
  const others =
    end === 'from'
      ? [port, bare(layout, stream.to, catalogue)]
      : [bare(layout, stream.from, catalogue), port]
  const ends = findEnds(without, others[0] ?? '', others[1] ?? '', {}, catalogue)
  return ends.allowed ? ends[end] : ends.why
}

/** A reference without its number: with the stream gone, the number may have no stream before it. */
function bare(layout: Layout, reference: PortReference, catalogue: Catalogue): PortReference {
  const address = findPort(layout, reference, catalogue)
  return address ? `${address.unit.id}.${address.port}` : reference
}

/**
 * Moves one end of a stream to another port; the stream keeps its id and what is given on it. Throws
 * `EditRefused` where `canReconnect` says no.
 */
export function reconnect(
  plant: Plant,
  layoutId: string,
  streamId: string,
  end: 'from' | 'to',
  port: PortReference,
  catalogue: Catalogue = standardCatalogue,
): Plant {
  return changeLayout(plant, layoutId, (layout) => {
    const stream = layout.streams.find(({ id }) => id === streamId)
    if (!stream) throw new EditRefused(`There is no stream ${streamId}.`)
    const moved = movedEnd(layout, stream, end, port, catalogue)
    if (typeof moved === 'string') throw new EditRefused(moved)
    if ('same' in moved) return layout
    const now = findPort(layout, stream[end], catalogue)
    const renumberings = [
      ...(now?.number === undefined
        ? []
        : [withoutNumbers(now.unit.id, now.port, new Set([now.number]))]),
      ...arriving(moved),
    ]
    const { bends: _, ...straight } = stream
    const streams = renumbered(layout, layout.streams, renumberings, catalogue).map((one) =>
      one.id === streamId ? { ...straight, ...otherEnd(one, end), [end]: moved.reference } : one,
    )
    return restructure(layout, { ...layout, streams }, renumberings, catalogue)
  })
}

function otherEnd({ from, to }: Stream, end: 'from' | 'to'): { from: string; to: string } {
  return end === 'from' ? { from: '', to } : { from, to: '' }
}

/**
 * Gives a stream at a repeated port another number there: a bleed appended last becomes the first.
 * Streams between close up; what lies between the ports (a turbine's groups) stays where it is.
 */
export function renumberPort(
  plant: Plant,
  layoutId: string,
  reference: PortReference,
  number: number,
  catalogue: Catalogue = standardCatalogue,
): Plant {
  return changeLayout(plant, layoutId, (layout) => {
    const address = findPort(layout, reference, catalogue)
    const { number: now } = address ?? {}
    if (!address || now === undefined) throw new EditRefused(`${reference} has no number.`)
    const count = portsOf(layout, address.unit, catalogue).filter(
      (one) => one.port === address.port && one.stream !== undefined,
    ).length
    if (!Number.isInteger(number) || number < 1 || number > count || now > count) {
      throw new EditRefused(`The numbers of ${portLabel(layout, address)} run from 1 to ${count}.`)
    }
    if (number === now) return layout
    const renumberings = [withMoved(address.unit.id, address.port, now, number)]
    const streams = renumbered(layout, layout.streams, renumberings, catalogue)
    return restructure(layout, { ...layout, streams }, renumberings, catalogue)
  })
}
