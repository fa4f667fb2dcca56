import type { Layout, Stream } from '../../src/document.ts'
import { crossings, levelStraights } from './crossings.ts'
import { type End, type Ends, endsOf } from './ends.ts'
import { around, type Box, onGrid, overlap, type Point } from './geometry.ts'
import { alike, keep } from './keep.ts'
import {
  findRoute,
  passesThrough,
  type Route,
  routeThrough,
  strain,
  type Terminal,
} from './routing.ts'
import { type PlacedUnit, placeUnits, type Standing } from './standing.ts'

/** A stream as it runs over the sheet. */
export interface PlacedStream {
  readonly id: string
  readonly from: Terminal
  readonly to: Terminal
  readonly route: Route
  readonly bends: Stream['bends']
  /** Crossings that this stream bridges. */
  readonly bridges: readonly Point[]
  /** Found in haste while a unit was moved: it is found anew when the unit stands. */
  readonly quick?: true
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
  readonly units: Standing
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

  const streams = placeStreams(layout, ends, units, shafts, previous, moved !== null)
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

function placeStreams(
  layout: Layout,
  ends: Ends,
  units: ReadonlyMap<string, PlacedUnit>,
  shafts: ReadonlyMap<string, PlacedShaft>,
  previous: Sheet,
  moving: boolean,
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
      (moving || !earlier.quick) &&
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
  const quick = new Set<string>()
  for (const one of wanted) {
    const kept = routes.get(one.stream.id)
    const earlier = previous.streams.get(one.stream.id)
    if (kept && earlier?.quick && kept === earlier.route) quick.add(one.stream.id)
  }
  for (const one of open) {
    if (moving) quick.add(one.stream.id)
    routes.set(
      one.stream.id,
      findRoute(one.from, one.to, {
        obstacles: bodies.filter(({ id }) => !one.ends.includes(id)).map(({ body }) => body),
        routes: [...routes.values()],
        quick: moving,
      }),
    )
  }

  const placed = new Map<string, PlacedStream>()
  const level = levelStraights(routes.values())
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
        bridges: crossings(route, level),
        ...(quick.has(stream.id) && { quick: true }),
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
