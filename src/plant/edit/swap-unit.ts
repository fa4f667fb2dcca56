import { type Catalogue, type Kind, standardCatalogue } from '../catalogue.ts'
import type { Layout, Options, Plant, Stream, Unit } from '../document.ts'
import { findPort, portReference, portsOf } from '../ports.ts'
import { quantitiesOf } from '../quantities.ts'
import { usualGivens } from '../usual-givens.ts'
import { changeLayout, freeLabel, layoutNamed } from './change-layout.ts'
import { canConnect } from './connect.ts'
import { EditRefused } from './edit-refused.ts'
import { removeItems } from './remove-items.ts'
import { restructure } from './restructure.ts'
import { withoutUnits, withTurbine } from './shafts.ts'

/** How a stream's end goes over to the new kind: its new reference, by the stream's id and end. */
type Refitted = ReadonlyMap<string, string>

/**
 * Makes a unit one of another kind in its place. It keeps its id, a label of its own, the streams that
 * a port of the new kind can take, and options and givens that the new kind has too; streams that fit
 * nowhere go (`dropped`), new quantities arrive at their usual values.
 */
export function swapUnit(
  plant: Plant,
  layoutId: string,
  unitId: string,
  kindName: string,
  catalogue: Catalogue = standardCatalogue,
): { plant: Plant; dropped: readonly string[] } {
  const kind = catalogue.kindNamed(kindName)
  const layout = layoutNamed(plant, layoutId)
  const unit = layout.units.find(({ id }) => id === unitId)
  if (!kind) throw new EditRefused(`There is no kind of unit called ${kindName}.`)
  if (!unit) throw new EditRefused(`There is no unit ${unitId}.`)
  if (unit.kind === kind.name) return { plant, dropped: [] }
  const own = layout.streams.filter((stream) => endsAt(stream, unitId).length > 0)
  const kept = refit(layout, unit, kind, own, catalogue).streams
  const dropped = own.filter((stream) => !kept.includes(stream)).map(({ id }) => id)
  const thinned = removeItems(plant, layoutId, dropped, catalogue)
  const after = changeLayout(thinned, layoutId, (before) => {
    const now = before.units.find(({ id }) => id === unitId) ?? unit
    const streams = before.streams.filter((stream) => endsAt(stream, unitId).length > 0)
    const { ends } = refit(before, now, kind, streams, catalogue)
    const moved = before.streams.map((stream): Stream => {
      const from = ends.get(`${stream.id} from`) ?? stream.from
      const to = ends.get(`${stream.id} to`) ?? stream.to
      return from === stream.from && to === stream.to ? stream : { ...stream, from, to }
    })
    const swapped = swappedUnit(before, now, kind, catalogue)
    const units = before.units.map((one) => (one === now ? swapped : one))
    const next = onShafts({ ...before, units, streams: moved }, unitId, kind, catalogue)
    return restructure(before, withUsual(next, unitId, catalogue), [], catalogue)
  })
  return { plant: after, dropped }
}

function endsAt(stream: Stream, unitId: string): ('from' | 'to')[] {
  return (['from', 'to'] as const).filter((end) => stream[end].startsWith(`${unitId}.`))
}

function swappedUnit(layout: Layout, unit: Unit, kind: Kind, catalogue: Catalogue): Unit {
  const { options: earlier = {}, ...rest } = unit
  const options: Options = Object.fromEntries(
    Object.entries(earlier).filter(
      ([name, value]) =>
        kind.options?.[name] && (typeof value === 'boolean') === !kind.options[name].list,
    ),
  )
  // 'Valve 2' was named after its kind; a name of its own stays.
  const usual = catalogue.kindNamed(unit.kind)?.label ?? ''
  const isUsual = unit.label.replace(/ \d+$/, '') === usual
  const others = { ...layout, units: layout.units.filter((one) => one !== unit) }
  return {
    ...rest,
    kind: kind.name,
    label: isUsual ? freeLabel(others, kind.label) : unit.label,
    ...(Object.keys(options).length > 0 && { options }),
  }
}

/** What every unit of the kind arrives with is given where nothing of that name was there before. */
function withUsual(layout: Layout, unitId: string, catalogue: Catalogue): Layout {
  const units = layout.units.map((unit) =>
    unit.id === unitId
      ? { ...unit, given: { ...usualGivens(quantitiesOf(layout, unit, catalogue)), ...unit.given } }
      : unit,
  )
  return { ...layout, units }
}

function onShafts(layout: Layout, id: string, kind: Kind, catalogue: Catalogue): Layout {
  const on = layout.shafts.find(
    ({ turbines, pumps }) => turbines.includes(id) || pumps.includes(id),
  )
  const stays = kind.shaft === 'driving' ? on?.turbines : kind.shaft ? on?.pumps : undefined
  if (stays?.includes(id)) return layout
  const off = on ? { ...layout, shafts: withoutUnits(layout.shafts, new Set([id])) } : layout
  return kind.shaft === 'driving' ? withTurbine(off, id, catalogue) : off
}

/**
 * The streams that the new kind can take, in order, and their new ends. A port of the same name is
 * tried first, then required ports.
 */
function refit(
  layout: Layout,
  unit: Unit,
  kind: Kind,
  own: readonly Stream[],
  catalogue: Catalogue,
): { readonly streams: readonly Stream[]; readonly ends: Refitted } {
  const ends = new Map<string, string>()
  const kept: Stream[] = []
  const units = layout.units.map((one) => (one === unit ? { ...one, kind: kind.name } : one))
  const others = layout.streams.filter((stream) => !own.includes(stream))
  // Streams through ports of the same name first, or another would take their place.
  const earlier = catalogue.kindNamed(unit.kind)
  const sameFirst = [...own].sort((a, b) => Number(isSame(b)) - Number(isSame(a)))
  function isSame(stream: Stream): boolean {
    return endsAt(stream, unit.id).every((end) => {
      const port = findPort(layout, stream[end], catalogue)?.port ?? ''
      return kind.ports[port]?.direction === earlier?.ports[port]?.direction
    })
  }
  let streams: readonly Stream[] = others
  for (const stream of sameFirst) {
    // A stream from a unit to itself has two ends there; it is too odd to be kept.
    const [end, second] = endsAt(stream, unit.id)
    if (!end || second) continue
    const far = end === 'from' ? stream.to : stream.from
    const now = { ...layout, units, streams }
    const farPort = findPort(now, far, catalogue)
    const farEnd = farPort ? `${farPort.unit.id}.${farPort.port}` : far
    const place = candidates(now, unit.id, kind, stream, end, catalogue).find(
      (name) => canConnect(now, `${unit.id}.${name}`, farEnd, {}, catalogue).allowed,
    )
    if (place === undefined) continue
    const reference = `${unit.id}.${place}`
    ends.set(`${stream.id} ${end}`, reference)
    kept.push(stream)
    streams = [...streams, { ...stream, [end]: reference }]
  }
  return { streams: kept, ends }
}

/** Open ports of the right direction by name and number, the likeliest first. */
function candidates(
  layout: Layout,
  unitId: string,
  kind: Kind,
  stream: Stream,
  end: 'from' | 'to',
  catalogue: Catalogue,
): string[] {
  const unit = layout.units.find(({ id }) => id === unitId)
  if (!unit) return []
  const was = stream[end].slice(unitId.length + 1).replace(/\d+$/, '')
  const direction = end === 'from' ? 'out' : 'in'
  const isSame = (port: string) => port === was || kind.ports[port]?.stem === was
  return portsOf(layout, unit, catalogue)
    .filter(
      (port) =>
        port.stream === undefined &&
        port.description.direction === direction &&
        // An optional port (a vent, a blowdown) has a purpose of its own.
        (isSame(port.port) || !port.description.optional),
    )
    .sort((a, b) => Number(isSame(b.port)) - Number(isSame(a.port)))
    .map(({ port, number }) =>
      portReference({ unit, kind, port, description: kind.ports[port]! }, number).slice(
        unitId.length + 1,
      ),
    )
}
