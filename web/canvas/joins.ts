import {
  addUnit,
  canConnect,
  connect,
  findPort,
  insertOnStream,
  kinds,
  type Layout,
  type Plant,
  portsOf,
} from '../../src/document.ts'
import { onGrid, type Point } from './geometry.ts'
import type { Route } from './routing.ts'

/** Connections to places that are taken: a branch or a junction is put into the stream that is there. */

export type Way = 'in' | 'out'

/** The end of a connection: a port, free or taken, or a point on a stream. */
export type ConnectionEnd =
  | { readonly port: string }
  | { readonly stream: string; readonly at: Point }

export function layoutOf(plant: Plant, layoutId: string): Layout {
  const layout = plant.layouts.find((one) => one.id === layoutId)
  if (!layout) throw new Error(`No layout ${layoutId}.`)
  return layout
}

/** The kind that parts one stream into several, or joins several to one: known by its ports alone. */
function dividingKind(way: Way): { name: string; single: string; repeated: string } | null {
  for (const kind of kinds) {
    const ports = Object.entries(kind.ports)
    const [first, second] = ports
    if (ports.length !== 2 || !first || !second) continue
    const repeated = ports.find(([, port]) => port.repeated)
    const single = ports.find(([, port]) => !port.repeated)
    if (repeated && single && repeated[1].direction === way && single[1].direction !== way) {
      return { name: kind.name, single: single[0], repeated: repeated[0] }
    }
  }
  return null
}

export function streamAtPort(layout: Layout, port: string): string | undefined {
  return layout.streams.find((stream) => stream.from === port || stream.to === port)?.id
}

/** Whether a port lets out or takes in. */
export function wayOf(layout: Layout, reference: string): Way | null {
  const dot = reference.indexOf('.')
  const unit = layout.units.find((one) => one.id === reference.slice(0, dot))
  const name = reference.slice(dot + 1)
  const port = unit && portsOf(layout, unit).find((one) => one.name === name)
  return port?.description.direction ?? null
}

/** Puts a branch (way `out`) or a junction (`in`) into a stream; answers with its free port. */
function openStream(
  plant: Plant,
  layoutId: string,
  streamId: string,
  way: Way,
  at: Point,
): { readonly plant: Plant; readonly port: string } {
  const kind = dividingKind(way)
  if (!kind) throw new Error('There is no kind of unit that parts or joins streams.')
  const corner = [onGrid(at[0]) - 8, onGrid(at[1]) - 8] as const
  const added = addUnit(plant, layoutId, kind.name, corner)
  const ports =
    way === 'out'
      ? { inlet: kind.single, outlet: `${kind.repeated}1` }
      : { inlet: `${kind.repeated}1`, outlet: kind.single }
  const inserted = insertOnStream(added.plant, layoutId, streamId, added.id, ports)
  return { plant: inserted.plant, port: `${added.id}.${kind.repeated}2` }
}

/** Room that a branch or junction wants on either side along its line, px. */
const room = 32

/**
 * Where on a route a branch or junction finds room: on the first stretch from the given end that is long
 * enough, else in the middle of the longest.
 */
export function nearEnd(route: Route, end: 'from' | 'to'): Point {
  const points = end === 'from' ? route : [...route].reverse()
  let best: Point = points[0] ?? [0, 0]
  let longest = 0
  for (let i = 1; i < points.length; i++) {
    const [ax, ay] = points[i - 1] as Point
    const [bx, by] = points[i] as Point
    const length = Math.abs(bx - ax) + Math.abs(by - ay)
    if (length <= longest) continue
    longest = length
    const away = Math.min(room, length / 2)
    best = [ax + Math.sign(bx - ax) * away, ay + Math.sign(by - ay) * away]
    if (length >= 2 * room) break
  }
  return best
}

/**
 * Connects two ends, putting branches and junctions in where they are taken.
 * `routeOf`: where streams run, for the places of what is put in.
 */
export function connectEnds(
  plant: Plant,
  layoutId: string,
  from: ConnectionEnd,
  to: ConnectionEnd,
  routeOf: (stream: string) => Route | undefined,
): { readonly plant: Plant; readonly id: string } {
  const layout = layoutOf(plant, layoutId)
  const way = ('port' in from && wayOf(layout, from.port)) || opposite(layout, to)
  const first = freed(plant, layoutId, from, way, routeOf)
  const second = freed(first.plant, layoutId, to, way === 'out' ? 'in' : 'out', routeOf)
  return connect(second.plant, layoutId, first.port, second.port)
}

function opposite(layout: Layout, end: ConnectionEnd): Way {
  return 'port' in end && wayOf(layout, end.port) === 'out' ? 'in' : 'out'
}

function freed(
  plant: Plant,
  layoutId: string,
  end: ConnectionEnd,
  way: Way,
  routeOf: (stream: string) => Route | undefined,
): { readonly plant: Plant; readonly port: string } {
  if ('stream' in end) return openStream(plant, layoutId, end.stream, way, end.at)
  const layout = layoutOf(plant, layoutId)
  const stream = streamAtPort(layout, end.port)
  if (stream === undefined) return { plant, port: end.port }
  if (way === 'in' && bare(layout, end.port) !== end.port) {
    return { plant, port: bare(layout, end.port) }
  }
  const at = nearEnd(routeOf(stream) ?? [], way === 'out' ? 'from' : 'to')
  return openStream(plant, layoutId, stream, way, at)
}

export type Verdict =
  | { readonly allowed: true; readonly joins?: Way }
  | { readonly allowed: false; readonly why: string }

/** Whether two ports can be connected, be it by a branch or a junction put into the stream at the second. */
export function judge(layout: Layout, from: string, to: string): Verdict {
  const stream = streamAtPort(layout, to)
  const ownStream = streamAtPort(layout, from)
  if (stream !== undefined && stream === ownStream) {
    return { allowed: false, why: 'They are connected already.' }
  }
  // As if the streams there were not: branch and junction leave their ports to them.
  const without = {
    ...layout,
    streams: layout.streams.filter(({ id }) => id !== stream && id !== ownStream),
  }
  const verdict = canConnect(without, bare(layout, from), bare(layout, to))
  if (!verdict.allowed || stream === undefined) return verdict
  const way = wayOf(layout, to)
  // A further numbered inlet needs no junction.
  if (way === 'in' && bare(layout, to) !== to) return verdict
  return way && dividingKind(way)
    ? { allowed: true, joins: way }
    : { allowed: false, why: 'A stream is connected here already.' }
}

/** A reference to a repeated port without its number: the next free one is meant. */
function bare(layout: Layout, reference: string): string {
  const address = findPort(layout, reference)
  return address ? `${address.unit.id}.${address.port}` : reference
}
