import { type Catalogue, type Kind, standardCatalogue } from '../catalogue.ts'
import type { Givens, Layout, Plant, Stream, Unit } from '../document.ts'
import { withGiven } from '../givens.ts'
import { splitPath } from '../paths.ts'
import { findPort, shapeOf } from '../ports.ts'
import { changeLayout, layoutNamed } from './change-layout.ts'
import { canConnect } from './connect.ts'
import { removeItems } from './remove-items.ts'
import { restructure } from './restructure.ts'

/**
 * Removes units, streams and shafts as `removeItems` does, and joins again the lines that removed
 * units stood in: the stream before such a unit runs on to where the one behind it went. It keeps its
 * id and what is given on it, and takes over what still holds of the other. A branch or junction that
 * is left with one way through goes too. `joined`: ids of the streams that were joined.
 */
export function removeAndJoin(
  plant: Plant,
  layoutId: string,
  ids: readonly string[],
  catalogue: Catalogue = standardCatalogue,
): { plant: Plant; joined: readonly string[] } {
  const before = layoutNamed(plant, layoutId)
  const joined = new Set<string>()
  const removed = new Set(ids)
  let after = plant
  for (const unit of before.units) {
    if (removed.has(unit.id)) after = bridged(after, layoutId, unit, removed, joined, catalogue)
  }
  after = removeItems(after, layoutId, ids, catalogue)
  const idle = layoutNamed(after, layoutId).units.filter((unit) =>
    isIdle(unit, before, layoutNamed(after, layoutId), catalogue),
  )
  for (const unit of idle) after = bridged(after, layoutId, unit, removed, joined, catalogue)
  after = removeItems(
    after,
    layoutId,
    idle.map(({ id }) => id),
    catalogue,
  )
  const streams = new Set(layoutNamed(after, layoutId).streams.map(({ id }) => id))
  return { plant: after, joined: [...joined].filter((id) => streams.has(id)) }
}

/** Ports through which a line runs on, the likeliest first: what passes, else what carries the same. */
function waysThrough(kind: Kind): readonly (readonly [string, string])[] {
  // Taking a machine out of a steam path is no repair of it.
  if (kind.shaft === 'driving') return []
  if (kind.passes) return kind.passes
  const ports = Object.entries(kind.ports).filter(
    ([, port]) => !port.optional && port.carries !== 'any',
  )
  return ports.flatMap(([inlet, a]) =>
    ports.flatMap(([outlet, b]) =>
      a.direction === 'in' && b.direction === 'out' && a.carries === b.carries
        ? [[inlet, outlet] as const]
        : [],
    ),
  )
}

/** Only parts or joins streams: two ports, one of them repeated, and nothing that happens between. */
function isDividing(kind: Kind): boolean {
  const ports = Object.values(kind.ports)
  return ports.length === 2 && ports.filter((port) => port.repeated).length === 1
}

/** A branch or junction with a single way through, which had more before. */
function isIdle(unit: Unit, before: Layout, after: Layout, catalogue: Catalogue): boolean {
  const kind = catalogue.kindNamed(unit.kind)
  if (!kind || !isDividing(kind)) return false
  const counts = Object.values(shapeOf(after, unit, kind).streams)
  const earlier = Object.values(shapeOf(before, unit, kind).streams)
  return counts.every((count) => count === 1) && earlier.some((count) => count > 1)
}

/** The plant with the lines through a unit led past it; the unit itself stays for now. */
function bridged(
  plant: Plant,
  layoutId: string,
  unit: Unit,
  removed: ReadonlySet<string>,
  joined: Set<string>,
  catalogue: Catalogue,
): Plant {
  const kind = catalogue.kindNamed(unit.kind)
  if (!kind) return plant
  return changeLayout(plant, layoutId, (layout) => {
    let changed = layout
    for (const [inlet, outlet] of waysThrough(kind)) {
      const first = only(changed, unit, inlet, 'to', removed, catalogue)
      const second = only(changed, unit, outlet, 'from', removed, catalogue)
      if (!first || !second || first === second) continue
      const without = {
        ...changed,
        streams: changed.streams.filter((one) => one !== first && one !== second),
      }
      const [from, to] = [first.from, second.to].map((end) => bare(changed, end, catalogue))
      if (!canConnect(without, from ?? '', to ?? '', {}, catalogue).allowed) continue
      const { bends: _, ...straight } = first
      const label = first.label ?? second.label
      const one: Stream = {
        ...straight,
        ...(label === undefined ? {} : { label }),
        to: second.to,
        given: givenTogether(first.given, second.given, isDividing(kind)),
      }
      const streams = changed.streams
        .filter((stream) => stream !== second)
        .map((stream) => (stream === first ? one : stream))
      changed = restructure(changed, { ...changed, streams }, [], catalogue)
      joined.add(one.id)
    }
    return changed
  })
}

/** The one stream at a port that can run on; where there are several, the only one that leads somewhere. */
function only(
  layout: Layout,
  unit: Unit,
  port: string,
  end: 'from' | 'to',
  removed: ReadonlySet<string>,
  catalogue: Catalogue,
): Stream | undefined {
  const there = layout.streams.filter((stream) => {
    if (removed.has(stream.id) || !stream[end].startsWith(`${unit.id}.`)) return false
    return findPort(layout, stream[end], catalogue)?.port === port
  })
  if (there.length === 1) return there[0]
  const far = end === 'from' ? 'to' : 'from'
  const staying = there.filter((stream) => !removed.has(splitPath(stream[far])?.[0] ?? ''))
  return staying.length === 1 ? staying[0] : undefined
}

function bare(layout: Layout, reference: string, catalogue: Catalogue): string {
  const address = findPort(layout, reference, catalogue)
  return address ? `${address.unit.id}.${address.port}` : reference
}

/**
 * What was given before the unit still holds. Of what was given behind it the flow does, and all of
 * it where the unit changed nothing.
 */
function givenTogether(first: Givens, second: Givens, unchanged: boolean): Givens {
  return Object.entries(second).reduce(
    (all, [name, given]) =>
      Object.hasOwn(all, name) || !(unchanged || name === 'm') ? all : withGiven(all, name, given),
    first,
  )
}
