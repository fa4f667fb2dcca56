import type { Layout, Stream, Unit } from '../../src/document.ts'
import {
  around,
  type Box,
  centre,
  grid,
  onGrid,
  overlap,
  type Point,
  type Size,
} from './geometry.ts'
import { bodyOf, type Lie, placesOf, portKey } from './ports.ts'
import {
  crossings,
  findRoute,
  passesThrough,
  type Route,
  routeThrough,
  strain,
  type Terminal,
} from './routing.ts'
import { symbolOf } from './symbols/index.ts'
import type { Anchor } from './symbols/symbol.ts'

/** A unit as it stands on the sheet. */
export interface PlacedUnit extends Lie {
  readonly id: string
  readonly kind: string
  readonly label: string
  readonly size: Size
  readonly body: Box
  /** By port name, for the ports with a stream. */
  readonly anchors: Readonly<Record<string, Anchor>>
}

/** A stream as it runs over the sheet. */
export interface PlacedStream {
  readonly id: string
  readonly from: Terminal
  readonly to: Terminal
  readonly route: Route
  readonly bends: Stream['bends']
  /** Crossings that this stream bridges. */
  readonly bridges: readonly Point[]
}

/** A shaft's line and its generator. */
export interface PlacedShaft {
  readonly id: string
  readonly lines: readonly (readonly [Point, Point])[]
  /** Centre of the generator's circle. */
  readonly generator: Point | null
}

/** Where everything stands: what the layout says, what follows from it, and nothing that is computed by the balance. */
export interface Sheet {
  readonly units: ReadonlyMap<string, PlacedUnit>
  readonly streams: ReadonlyMap<string, PlacedStream>
  readonly shafts: ReadonlyMap<string, PlacedShaft>
  readonly extent: Box | null
}

export const emptySheet: Sheet = {
  units: new Map(),
  streams: new Map(),
  shafts: new Map(),
  extent: null,
}

export const generatorRadius = 16

interface End {
  readonly unit: string
  readonly port: string
}

function endOf(reference: string): End {
  const dot = reference.indexOf('.')
  return { unit: reference.slice(0, dot), port: reference.slice(dot + 1) }
}

const noOptions = {}

/** Units by id as they stand. */
export type Standing = ReadonlyMap<string, PlacedUnit>

/** Where the units of a layout stand, which way they are turned, and where their streams meet them. */
export function placeUnits(
  layout: Layout,
  moved: ReadonlyMap<string, Point> | null = null,
  previous: Standing = emptySheet.units,
): Standing {
  const lies = new Map<string, Lie>()
  const ends = endsOf(layout)
  const streamAt = new Map<string, Stream>()
  const counts = new Map<string, Record<string, number>>()
  for (const stream of layout.streams) {
    streamAt.set(stream.from, stream)
    streamAt.set(stream.to, stream)
  }
  for (const unit of layout.units) {
    counts.set(unit.id, {})
    const symbol = symbolOf(unit.kind)
    lies.set(unit.id, {
      symbol,
      form: { options: unit.options ?? noOptions, counts: counts.get(unit.id) ?? {} },
      mirrored: unit.mirrored ?? false,
      upended: false,
      at: moved?.get(unit.id) ?? unit.at,
    })
  }
  for (const { from, to } of ends.values()) {
    for (const end of [from, to]) {
      const lie = lies.get(end.unit)
      const found = lie && portKey(lie.symbol, end.port)
      if (!found?.key.endsWith('*')) continue
      const count = counts.get(end.unit) as Record<string, number>
      const base = found.key.slice(0, -1)
      count[base] = Math.max(count[base] ?? 0, found.number)
    }
  }

  turnAlongStreams(layout, lies, ends, streamAt)
  spacePorts(layout, lies, ends, streamAt)
  const chosen = choosePlaces(layout, lies, ends)

  const units = new Map<string, PlacedUnit>()
  for (const unit of layout.units) {
    const lie = lies.get(unit.id) as Lie
    units.set(
      unit.id,
      keep(previous.get(unit.id), {
        id: unit.id,
        kind: unit.kind,
        label: unit.label,
        ...lie,
        size: lie.symbol.size(lie.form),
        body: bodyOf(lie),
        anchors: chosen.get(unit.id) ?? {},
      }),
    )
  }
  return units
}

function endsOf(layout: Layout): Ends {
  return new Map(
    layout.streams.map(({ id, from, to }) => [id, { from: endOf(from), to: endOf(to) }]),
  )
}

/**
 * Draws a layout. `moved` holds units on their way under the pointer. What is unchanged since
 * `previous` keeps its identity, so that only what changed is painted again; streams that nothing
 * touched keep their routes.
 */
export function drawSheet(
  layout: Layout,
  moved: ReadonlyMap<string, Point> | null = null,
  previous: Sheet = emptySheet,
): Sheet {
  const ends = endsOf(layout)
  const units = placeUnits(layout, moved, previous.units)
  const shafts = new Map<string, PlacedShaft>()
  for (const shaft of layout.shafts) {
    shafts.set(shaft.id, keep(previous.shafts.get(shaft.id), placeShaft(shaft, units)))
  }

  const streams = placeStreams(layout, ends, units, shafts, previous)
  const boxes = [...units.values()].map((unit) => unit.body)
  for (const { route } of streams.values()) {
    for (const [x, y] of route) boxes.push({ x, y, width: 0, height: 0 })
  }
  for (const { generator } of shafts.values()) {
    if (generator) boxes.push(generatorBox(generator))
  }
  return { units, streams, shafts, extent: around(boxes) }
}

export function generatorBox([x, y]: Point): Box {
  const size = 2 * generatorRadius
  return { x: x - generatorRadius, y: y - generatorRadius, width: size, height: size }
}

/** The earlier object where the later says the same. */
function keep<T extends object>(earlier: T | undefined, later: T): T {
  return earlier && alike(earlier, later) ? earlier : later
}

function alike(a: unknown, b: unknown): boolean {
  if (a === b) return true
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false
  // Symbols are compared by identity: they hold functions.
  const keys = Object.keys(a)
  if (keys.length !== Object.keys(b).length) return false
  for (const key of keys) {
    if (!alike((a as Record<string, unknown>)[key], (b as Record<string, unknown>)[key])) {
      return false
    }
  }
  return true
}

type Ends = ReadonlyMap<string, { readonly from: End; readonly to: End }>

/** The far end of the stream at a port, as a point: its usual anchor, or the middle of a unit that turns. */
function farPoint(
  lies: ReadonlyMap<string, Lie>,
  ends: Ends,
  stream: Stream | undefined,
  unitId: string,
): Point | null {
  const both = stream && ends.get(stream.id)
  if (!both) return null
  const far = both.from.unit === unitId ? both.to : both.from
  const lie = lies.get(far.unit)
  if (!lie) return null
  if (lie.symbol.turns) return centre(bodyOf(lie))
  const place = placesOf(lie, far.port)?.[0]
  return place ? [place.x, place.y] : centre(bodyOf(lie))
}

/** Symbols that turn follow their streams: upright between what stands above and below. */
function turnAlongStreams(
  layout: Layout,
  lies: Map<string, Lie>,
  ends: Ends,
  streamAt: ReadonlyMap<string, Stream>,
): void {
  for (const unit of layout.units) {
    const lie = lies.get(unit.id) as Lie
    if (!lie.symbol.turns) continue
    const [inlet, outlet] = Object.keys(lie.symbol.ports)
    const own = centre(bodyOf(lie))
    const source = farPoint(lies, ends, streamAt.get(`${unit.id}.${inlet}`), unit.id)
    const target = farPoint(lies, ends, streamAt.get(`${unit.id}.${outlet}`), unit.id)
    if (!source && !target) continue
    const [x1, y1] = source ?? own
    const [x2, y2] = target ?? own
    const upright = standsUpright(own, source, target)
    lies.set(unit.id, {
      ...lie,
      form: { ...lie.form, upright },
      mirrored: !upright && (x2 === x1 ? lie.mirrored : x2 < x1),
      upended: upright && y2 < y1,
    })
  }
}

/** Upright where both neighbours, or the one there is, lie rather above and below than beside. */
function standsUpright(own: Point, source: Point | null, target: Point | null): boolean {
  const nearness = (other: Point | null) =>
    other ? Math.abs(other[0] - own[0]) - Math.abs(other[1] - own[1]) : 0
  const vertical = (other: Point | null) => other !== null && nearness(other) < 0
  if (source && target) {
    if (vertical(source) === vertical(target)) return vertical(source)
    // One of each: the straighter of the two decides.
    const slack = (other: Point) =>
      Math.min(Math.abs(other[0] - own[0]), Math.abs(other[1] - own[1]))
    return slack(source) <= slack(target) ? vertical(source) : vertical(target)
  }
  return vertical(source ?? target)
}

/** No symbol is drawn out of its shape for the sake of a straight stream. */
const widestPitch = 104

/** Spaces the ports of symbols that stretch, so that their streams fall straight where they can. */
function spacePorts(
  layout: Layout,
  lies: Map<string, Lie>,
  ends: Ends,
  streamAt: ReadonlyMap<string, Stream>,
): void {
  for (const unit of layout.units) {
    const lie = lies.get(unit.id) as Lie
    const spaced = lie.symbol.spaced
    if (!spaced) continue
    const count = lie.form.counts[spaced.port] ?? 0
    const ports = Array.from({ length: count }, (_, i) => `${spaced.port}${i + 1}`)
    const wanted = [...ports, spaced.last].map((port) =>
      straightBelow(lies, ends, streamAt.get(`${unit.id}.${port}`), unit),
    )
    const usual = lie.symbol.size(lie.form).width
    const room = roomBeside(lies, unit.id, lie)
    // Mirrored, the far edge stays where it is while the width is not known: two rounds settle it.
    let width = usual
    let pitches: number[] = []
    for (let round = 0; round < (lie.mirrored ? 3 : 1); round++) {
      pitches = stretched(
        wanted.map((x) =>
          x === null ? null : onGrid(lie.mirrored ? lie.at[0] + width - x : x - lie.at[0]),
        ),
        spaced.least,
        spaced.usual,
        Math.max(usual, room) - 8,
      )
      width = pitches.reduce((sum, pitch) => sum + pitch, 16)
    }
    lies.set(unit.id, { ...lie, form: { ...lie.form, pitches } })
  }
}

/** Pitches from the inlet at 8 to each port in turn; all multiples of 8. */
function stretched(
  wanted: readonly (number | null)[],
  least: number,
  usual: number,
  room: number,
): number[] {
  const pitches: number[] = []
  let x = 8
  wanted.forEach((want, i) => {
    const after = (wanted.length - 1 - i) * least
    const fits =
      want !== null && want - x >= least && want - x <= widestPitch && want + after <= room
    const next = fits ? want : x + usual
    pitches.push(next - x)
    x = next
  })
  return pitches
}

/** Where the far end of a stream lies below or above, so that it could fall straight: its x. */
function straightBelow(
  lies: ReadonlyMap<string, Lie>,
  ends: Ends,
  stream: Stream | undefined,
  unit: Unit,
): number | null {
  const both = stream && ends.get(stream.id)
  if (!both) return null
  const far = both.from.unit === unit.id ? both.to : both.from
  const lie = lies.get(far.unit)
  if (!lie) return null
  const place = placesOf(lie, far.port)?.find(({ side }) => side === 'top' || side === 'bottom')
  return place && place.x % grid === 0 ? place.x : null
}

/** Width that a unit may take before it meets another one beside it, px. */
function roomBeside(lies: ReadonlyMap<string, Lie>, id: string, lie: Lie): number {
  const own = bodyOf(lie)
  let room = 800
  for (const [other, otherLie] of lies) {
    if (other === id) continue
    const body = bodyOf(otherLie)
    if (body.y >= own.y + own.height || body.y + body.height <= own.y) continue
    const gap = body.x - lie.at[0]
    if (gap > 0) room = Math.min(room, gap - 8)
  }
  return room
}

/** One end of a stream with the places it may take. */
interface Ending extends End {
  readonly places: readonly Anchor[]
  chosen: Anchor
}

interface Span {
  readonly from: Ending
  readonly to: Ending
}

/** Chooses among the places of each port those between which the streams run with least strain. */
function choosePlaces(
  layout: Layout,
  lies: ReadonlyMap<string, Lie>,
  ends: Ends,
): Map<string, Record<string, Anchor>> {
  const spans = layout.streams.map((stream): Span => {
    const { from, to } = ends.get(stream.id) as { from: End; to: End }
    const fromLie = lies.get(from.unit)
    const toLie = lies.get(to.unit)
    const sources = (fromLie && placesOf(fromLie, from.port)) ?? [middle(fromLie, toLie)]
    const targets = (toLie && placesOf(toLie, to.port)) ?? [middle(toLie, fromLie)]
    return {
      from: { ...from, places: sources, chosen: sources[0] as Anchor },
      to: { ...to, places: targets, chosen: targets[0] as Anchor },
    }
  })
  for (const { from, to } of spans) {
    let least = Number.POSITIVE_INFINITY
    for (const [i, source] of from.places.entries()) {
      for (const [j, target] of to.places.entries()) {
        const cost = strainBetween(source, target) + 4 * (i + j)
        if (cost < least) {
          least = cost
          from.chosen = source
          to.chosen = target
        }
      }
    }
  }
  settleDots(spans)
  const chosen = new Map<string, Record<string, Anchor>>()
  for (const { from, to } of spans) {
    for (const end of [from, to]) {
      const anchors = chosen.get(end.unit) ?? {}
      anchors[end.port] = end.chosen
      chosen.set(end.unit, anchors)
    }
  }
  return chosen
}

const strainBetween = (a: Anchor, b: Anchor): number =>
  strain({ point: [a.x, a.y], side: a.side }, { point: [b.x, b.y], side: b.side })

/** Streams that meet in a dot share its sides: of all ways to part them the one of least strain. */
function settleDots(spans: readonly Span[]): void {
  const meeting = new Map<string, { own: Ending; far: Ending }[]>()
  for (const { from, to } of spans) {
    for (const [own, far] of [
      [from, to],
      [to, from],
    ] as const) {
      if (own.places.length <= 3) continue
      const there = meeting.get(own.unit)
      if (there) there.push({ own, far })
      else meeting.set(own.unit, [{ own, far }])
    }
  }
  // Twice, so that dots beside each other settle together.
  for (let round = 0; round < 2; round++) {
    for (const ends of meeting.values()) {
      if (ends.length <= 4) part(ends)
    }
  }
}

function part(ends: readonly { own: Ending; far: Ending }[]): void {
  let least = Number.POSITIVE_INFINITY
  let best: readonly Anchor[] = []
  const taken: Anchor[] = []
  const go = (i: number, cost: number) => {
    if (cost >= least) return
    const end = ends[i]
    if (!end) {
      least = cost
      best = [...taken]
      return
    }
    for (const [rank, place] of end.own.places.entries()) {
      if (taken.some((other) => other.side === place.side)) continue
      taken.push(place)
      go(i + 1, cost + strainBetween(place, end.far.chosen) + 4 * rank)
      taken.pop()
    }
  }
  go(0, 0)
  for (const [i, anchor] of best.entries()) {
    const end = ends[i]
    if (end) end.own.chosen = anchor
  }
}

/** For a port that the symbol does not know: the middle of the side that faces the other unit. */
function middle(lie: Lie | undefined, other: Lie | undefined): Anchor {
  if (!lie) return { x: 0, y: 0, side: 'right' }
  const body = bodyOf(lie)
  const [x, y] = centre(body)
  const facesRight = !other || centre(bodyOf(other))[0] >= x
  return { x: facesRight ? body.x + body.width : body.x, y, side: facesRight ? 'right' : 'left' }
}

function placeStreams(
  layout: Layout,
  ends: Ends,
  units: ReadonlyMap<string, PlacedUnit>,
  shafts: ReadonlyMap<string, PlacedShaft>,
  previous: Sheet,
): Map<string, PlacedStream> {
  const bodies = [...units.values()].map(({ id, body }) => ({ id, body }))
  for (const shaft of shafts.values()) {
    if (shaft.generator) bodies.push({ id: '', body: generatorBox(shaft.generator) })
  }
  const changed = bodies.filter(({ id, body }) => previous.units.get(id)?.body !== body)
  const wanted = layout.streams.flatMap((stream) => {
    const { from, to } = ends.get(stream.id) as { from: End; to: End }
    const source = units.get(from.unit)
    const target = units.get(to.unit)
    const a = source?.anchors[from.port]
    const b = target?.anchors[to.port]
    if (!source || !target || !a || !b) return []
    return [
      {
        stream,
        ends: [from.unit, to.unit],
        from: { point: [a.x, a.y] as Point, side: a.side, body: source.body },
        to: { point: [b.x, b.y] as Point, side: b.side, body: target.body },
      },
    ]
  })

  const routes = new Map<string, Route>()
  const open: typeof wanted = []
  for (const one of wanted) {
    const earlier = previous.streams.get(one.stream.id)
    if (one.stream.bends) {
      routes.set(one.stream.id, routeThrough(one.from, one.to, one.stream.bends))
    } else if (
      earlier &&
      earlier.bends === undefined &&
      alike(earlier.from, one.from) &&
      alike(earlier.to, one.to) &&
      !passesThrough(
        earlier.route,
        changed.filter(({ id }) => !one.ends.includes(id)).map(({ body }) => body),
      )
    ) {
      routes.set(one.stream.id, earlier.route)
    } else open.push(one)
  }
  // Those with least choice first: straight ones, then by length.
  open.sort((a, b) => strain(a.from, a.to) - strain(b.from, b.to))
  for (const one of open) {
    routes.set(
      one.stream.id,
      findRoute(one.from, one.to, {
        obstacles: bodies.filter(({ id }) => !one.ends.includes(id)).map(({ body }) => body),
        routes: [...routes.values()],
      }),
    )
  }

  const placed = new Map<string, PlacedStream>()
  const all = [...routes.values()]
  for (const { stream, from, to } of wanted) {
    const route = routes.get(stream.id) as Route
    const earlier = previous.streams.get(stream.id)
    placed.set(
      stream.id,
      keep(earlier, {
        id: stream.id,
        from,
        to,
        route,
        bends: stream.bends,
        bridges: crossings(route, all),
      }),
    )
  }
  return placed
}

function placeShaft(
  shaft: Layout['shafts'][number],
  units: ReadonlyMap<string, PlacedUnit>,
): PlacedShaft {
  const axisOf = (unit: PlacedUnit): number =>
    unit.at[1] + (unit.symbol.axis?.(unit.form) ?? unit.size.height / 2)
  const machines = [...shaft.turbines, ...shaft.pumps]
    .flatMap((id) => units.get(id) ?? [])
    .sort((a, b) => a.body.x - b.body.x)
  const lines: (readonly [Point, Point])[] = []
  for (let i = 1; i < machines.length; i++) {
    const a = machines[i - 1] as PlacedUnit
    const b = machines[i] as PlacedUnit
    const start: Point = [a.body.x + a.body.width, axisOf(a)]
    const end: Point = [b.body.x, axisOf(b)]
    if (start[1] === end[1]) lines.push([start, end])
    else {
      const x = onGrid((start[0] + end[0]) / 2)
      lines.push(
        [start, [x, start[1]]],
        [
          [x, start[1]],
          [x, end[1]],
        ],
        [[x, end[1]], end],
      )
    }
  }
  const first = machines[0]
  const last = machines.at(-1)
  if (!first || !last || shaft.generator === false) return { id: shaft.id, lines, generator: null }

  const bodies = [...units.values()].map((unit) => unit.body)
  const free = (at: Point) => !bodies.some((body) => overlap(body, generatorBox(at)))
  const right: Point = [last.body.x + last.body.width + 40, axisOf(last)]
  const left: Point = [first.body.x - 40, axisOf(first)]
  const generator = free(right) || !free(left) ? right : left
  lines.push(
    generator === right
      ? [
          [last.body.x + last.body.width, axisOf(last)],
          [right[0] - generatorRadius, right[1]],
        ]
      : [
          [left[0] + generatorRadius, left[1]],
          [first.body.x, axisOf(first)],
        ],
  )
  return { id: shaft.id, lines, generator }
}
