import { graphlib, layout as layOut } from '@dagrejs/dagre'
import type { Layout } from '../../../src/document.ts'
import { type Box, grid, grown, onGrid, overlap, type Point } from '../geometry.ts'
import { bodyOf, type Lie, placesOf } from '../ports.ts'
import { placeUnits } from '../standing.ts'
import { symbolOf } from '../symbols/index.ts'
import { Differences } from './differences.ts'
import { type Chain, type Reading, readLines, type Step } from './lines.ts'

/** Where a unit is to stand, and which way it is turned. */
export interface TidyPlace {
  readonly at: Point
  readonly mirrored: boolean
}

export type TidyPlaces = ReadonlyMap<string, TidyPlace>

/** Between units in a row, px. */
const gap = 32
/** Between machines on a shaft. */
const machineGap = 48
/** Of the canvas in a window of 1440 by 900. */
const usualShape = 0.52
/** What the machines above and the drains below take of the height. */
const aboveAndBelow = 232
/** The usual distance of a machine's ports, where nothing below asks for another. */
const usualPitch = 40

/** A unit on its way to its place: its symbol as it will lie, and its ports from its top left corner. */
class Part {
  readonly id: string
  readonly lie: Lie
  readonly body: Box

  constructor(id: string, lie: Lie) {
    this.id = id
    this.lie = lie
    this.body = bodyOf(lie)
  }

  /** Where a port is on a side, or the first place of it; from the corner of the unit. */
  port(name: string, side?: 'top' | 'bottom'): Point {
    const places = placesOf(this.lie, name)
    const place = places?.find((one) => one.side === side) ?? places?.[0]
    return place ? [place.x, place.y] : [this.lie.at[0], this.lie.at[1]]
  }

  hasSide(name: string, side: 'top' | 'bottom' | 'left' | 'right'): boolean {
    return placesOf(this.lie, name)?.some((one) => one.side === side) ?? false
  }

  /** From the corner to the middle of what is drawn. */
  get middle(): Point {
    return [this.body.x + this.body.width / 2, this.body.y + this.body.height / 2]
  }
}

/**
 * A drawing of the whole layout: the steam path along the top with its machines on one line, feedwater
 * running back along the bottom, bleeds falling between them, drains below. Units in `pinned` stay where
 * they are, and the rest is set about them. What no rule of the trade reaches is laid out in layers.
 * `shape`: height over width of where it is shown, which the drawing follows within reason.
 */
export function tidy(
  layout: Layout,
  pinned: ReadonlySet<string> = new Set(),
  shape = usualShape,
): TidyPlaces {
  const reading = readLines(layout)
  const parts = partsOf(layout, reading)
  const places = new Map<string, Point>()
  if (reading) placeLines(reading, parts, places, shape)
  const rest = layout.units.map(({ id }) => id).filter((id) => !places.has(id))
  if (reading) placeBeside(layout, rest, parts, places)
  else placeInLayers(layout, rest, parts, places)

  moveToPins(layout, pinned, parts, places)
  const result = new Map<string, TidyPlace>()
  for (const unit of layout.units) {
    const at = places.get(unit.id)
    const part = parts.get(unit.id)
    if (!at || !part) continue
    result.set(
      unit.id,
      pinned.has(unit.id)
        ? { at: unit.at, mirrored: unit.mirrored ?? false }
        : { at: [onGrid(at[0]), onGrid(at[1])], mirrored: part.lie.mirrored },
    )
  }
  return result
}

function partsOf(layout: Layout, reading: Reading | null): Map<string, Part> {
  const backwards = new Map(reading?.water.map((step) => [step.id, step]))
  // Behind the last machine and on bleed lines steam falls.
  const last = reading?.steam.findLastIndex(({ id }) => isSpaced(layout, id)) ?? 0
  const steam = new Set(reading?.steam.map(({ id }) => id))
  const falling = new Set([
    ...(reading?.steam.slice(last + 1) ?? []).map(({ id }) => id),
    ...(reading?.chains ?? []).flatMap(({ from, units }) => (steam.has(from.id) ? units : [])),
  ])
  const parts = new Map<string, Part>()
  for (const { id, symbol, form } of placeUnits(layout).values()) {
    const { pitches: _, upright: __, ...plain } = form
    const upright = symbol.turns && falling.has(id)
    const lie: Lie = {
      symbol,
      form: upright ? { ...plain, upright } : plain,
      mirrored: false,
      upended: false,
      at: [0, 0],
    }
    // On its way back the water comes from the right.
    const inlet = backwards.get(id)?.inlet
    const fromLeft = inlet && placesOf(lie, inlet)?.[0].side === 'left'
    parts.set(id, new Part(id, fromLeft ? { ...lie, mirrored: true } : lie))
  }
  return parts
}

const isSpaced = (layout: Layout, id: string): boolean =>
  symbolOf(layout.units.find((unit) => unit.id === id)?.kind ?? '').spaced !== undefined
const isMachine = (part: Part | undefined): part is Part => part?.lie.symbol.spaced !== undefined
const isDot = (part: Part): boolean => part.body.width <= grid

/** The lines of the plant: first along, then down. */
function placeLines(
  { steam, water, chains }: Reading,
  parts: ReadonlyMap<string, Part>,
  places: Map<string, Point>,
  shape: number,
): void {
  const rules = new Differences()
  const part = (id: string) => parts.get(id) as Part
  const machines = steam.filter(({ id }) => isMachine(parts.get(id)))
  const first = steam.indexOf(machines[0] as Step)
  const last = steam.indexOf(machines.at(-1) as Step)
  const boiler = steam[0] as Step
  const lead = steam.slice(1, first)
  const tail = steam.slice(last + 1)
  const sink = tail.at(-1)
  const right = (id: string) => part(id).body.x + part(id).body.width

  // Machines, their ports in order.
  const outlets = (step: Step): string[] => {
    const { spaced } = part(step.id).lie.symbol
    const count = part(step.id).lie.form.counts[spaced?.port ?? ''] ?? 0
    return [
      ...Array.from({ length: count }, (_, i) => `${spaced?.port}${i + 1}`),
      spaced?.last ?? '',
    ]
  }
  const end = (step: Step) => `${step.id}.${outlets(step).at(-1)}`
  for (const step of machines) {
    const least = part(step.id).lie.symbol.spaced?.least ?? usualPitch
    let before = step.id
    outlets(step).forEach((port, i) => {
      const from = i === 0 ? grid : 0
      const last = i === outlets(step).length - 1
      rules.behind(
        before,
        `${step.id}.${port}`,
        from + (last ? usualPitch : i === 0 ? usualPitch : least),
      )
      rules.behind(`${step.id}.${port}`, before, -from - 104)
      before = `${step.id}.${port}`
    })
  }

  // The steam path.
  rules.behind(boiler.id, (machines[0] as Step).id, right(boiler.id) + gap)
  let before = boiler.id
  let reach = part(boiler.id).port(boiler.outlet ?? '')[0] + gap
  for (const { id } of lead) {
    rules.behind(before, id, reach)
    before = id
    reach = right(id) + gap
  }
  if (lead.length > 0) rules.behind(before, (machines[0] as Step).id, reach)
  machines.slice(1).forEach((machine, i) => {
    const earlier = machines[i] as Step
    rules.behind(end(earlier), machine.id, grid + machineGap)
    let behind = end(earlier)
    let away = gap
    const between = steam.slice(steam.indexOf(earlier) + 1, steam.indexOf(machine))
    between.forEach(({ id, inlet }, j) => {
      if (j === 0 && isDot(part(id))) rules.exactly(behind, id, -part(id).middle[0])
      else rules.behind(behind, id, away - part(id).port(inlet ?? '')[0])
      behind = id
      away = right(id) + gap
    })
    if (between.length > 0) rules.behind(behind, machine.id, away - grid)
  })
  for (const { id, inlet } of tail) {
    const machine = machines.at(-1) as Step
    const at = part(id).hasSide(inlet ?? '', 'top')
      ? part(id).port(inlet ?? '', 'top')[0]
      : part(id).middle[0]
    rules.exactly(end(machine), id, -at)
  }

  // Feedwater, from left to right against its flow.
  const row = [...water].reverse()
  const feed = part(boiler.id).middle[0]
  row.forEach(({ id }, i) => {
    const neighbour = row[i - 1]
    if (neighbour) rules.behind(neighbour.id, id, right(neighbour.id) - part(id).body.x + gap)
    else rules.behind(boiler.id, id, feed + gap)
  })
  const nearest = row.at(-1)
  if (nearest && sink) {
    const out = part(sink.id).port(sinkOutlet(part(sink.id), sink), 'bottom')[0]
    const inlet = nearest.inlet ?? ''
    const under =
      part(nearest.id).hasSide(inlet, 'top') &&
      rules.exactly(sink.id, nearest.id, out - part(nearest.id).port(inlet, 'top')[0])
    if (!under) rules.behind(nearest.id, sink.id, right(nearest.id) + gap - out)
  }

  // Bleeds fall straight where the order of things lets them, from the left.
  const onWater = new Map(row.map(({ id }, i) => [id, i]))
  const bleeds = chains
    .filter((chain) => onWater.has(chain.to.id) && steam.some(({ id }) => id === chain.from.id))
    .sort((a, b) => (onWater.get(a.to.id) ?? 0) - (onWater.get(b.to.id) ?? 0))
  const straight = new Set<string>()
  for (const { from, to } of bleeds) {
    const offset = part(to.id).port(to.port, 'top')[0]
    const dropped = rules.exactly(
      ...((isMachine(parts.get(from.id))
        ? [`${from.id}.${from.port}`, to.id, -offset]
        : [from.id, to.id, fallsFrom(part(from.id), from.port) - offset]) as [
        string,
        string,
        number,
      ]),
    )
    if (dropped) straight.add(`${from.id}.${from.port}`)
  }
  for (const step of machines) {
    // Ports with nothing straight below stand at their usual distance.
    let behind = step.id
    outlets(step).forEach((port, i) => {
      const name = `${step.id}.${port}`
      if (!straight.has(name)) rules.behind(behind, name, (i === 0 ? grid : 0) + usualPitch)
      behind = name
    })
  }

  const x = (id: string): number => rules.get(id) ?? 0
  const start = (step: Step): number => {
    // Leftmost, a machine may begin too early: its first group is as long as usual.
    const ports = outlets(step)
    return Math.max(x(step.id), x(`${step.id}.${ports[0]}`) - grid - usualPitch)
  }

  // Down the sheet.
  const half = (step: Step) => part(step.id).body.height / 2
  const axis = 0
  const inner = Math.max(...machines.slice(0, -1).map(half), 24)
  const middle = onGrid(axis + inner + 32)
  const deepest = half(machines.at(-1) as Step)
  const tailDepth = tail.reduce((sum, { id }) => sum + part(id).body.height + 40, 0)
  const falls = chains.some(({ units }) => units.length > 0)
  const width = Math.max(
    ...steam.map(({ id }) => x(id) + part(id).body.width),
    x(end(machines.at(-1) as Step)),
  )
  const fall = Math.min(280, Math.max(falls ? 184 : 152, shape * width - aboveAndBelow))
  const bottom = onGrid(
    Math.max(middle + fall, axis + deepest + tailDepth + (tail.length > 0 ? 88 : 40)),
  )
  const set = (id: string, left: number, middleY: number) => {
    places.set(id, [left, middleY - part(id).middle[1]])
  }
  places.set(boiler.id, [x(boiler.id), axis - 16])
  for (const { id } of lead) set(id, x(id), axis - 56)
  for (const step of machines) {
    const { lie } = part(step.id)
    places.set(step.id, [start(step), axis - (lie.symbol.axis?.(lie.form) ?? 0)])
  }
  const inMachines = new Set(machines.map(({ id }) => id))
  for (const { id } of steam.slice(first, last)) {
    if (!inMachines.has(id)) set(id, x(id), middle)
  }
  const room =
    bottom - 40 - (axis + deepest) - tail.reduce((s, { id }) => s + part(id).body.height, 0)
  let y = axis + deepest
  tail.forEach(({ id }, i) => {
    y += i === tail.length - 1 ? Math.max(40, room / (tail.length + 1)) : 40
    places.set(id, [x(id), onGrid(y - part(id).body.y)])
    y += part(id).body.height
  })
  for (const { id, outlet } of row) {
    // A vessel that lets its water out below stands over the line.
    const above = outlet !== null && !part(id).hasSide(outlet, 'left') && !isDot(part(id))
    const up = above && part(id).hasSide(outlet, 'bottom') ? 64 : 0
    set(id, x(id), bottom - up)
  }
  placeChains(chains, parts, places, { middle, bottom, steam: new Set(steam.map(({ id }) => id)) })
}

function sinkOutlet(part: Part, { inlet }: Step): string {
  const names = Object.keys(part.lie.symbol.ports)
  return (
    names.find((name) => name !== inlet && part.hasSide(name, 'bottom') && !name.endsWith('*')) ??
    ''
  )
}

/** How far from its corner a stream falls out of a unit that is no machine. */
const fallsFrom = (part: Part, port: string): number =>
  isDot(part) ? part.middle[0] : part.port(port, 'bottom')[0]

/** Units on bleed lines over the heaters that they lead to, those on drain lines below the row. */
function placeChains(
  chains: readonly Chain[],
  parts: ReadonlyMap<string, Part>,
  places: Map<string, Point>,
  levels: { readonly middle: number; readonly bottom: number; readonly steam: ReadonlySet<string> },
): void {
  for (const { from, units, to } of chains) {
    if (units.length === 0) continue
    const source = parts.get(from.id)
    const target = parts.get(to.id)
    const a = places.get(from.id)
    const b = places.get(to.id)
    if (!source || !target || !a || !b) continue
    const start: Point = [a[0] + source.port(from.port)[0], a[1] + source.port(from.port)[1]]
    const port = target.port(to.port)
    const stop: Point = [b[0] + port[0], b[1] + port[1]]
    const isBleed = levels.steam.has(from.id)
    units.forEach((id, i) => {
      const part = parts.get(id)
      if (!part) return
      const share = (i + 1) / (units.length + 1)
      let at: Point
      if (isBleed) {
        // Below the reheater's level and clear of the heater's label.
        const top = Math.max(levels.middle + 32, start[1] + 24)
        const low = stop[1] - 56
        at = [stop[0], low > top ? top + (low - top) * share : (start[1] + stop[1]) / 2]
      } else {
        at = [start[0] + (stop[0] - start[0]) * share, levels.bottom + 72]
      }
      places.set(id, freePlace(part, at, parts, places))
    })
  }
}

const boxAt = (part: Part, at: Point): Box => ({
  x: at[0] + part.body.x,
  y: at[1] + part.body.y,
  width: part.body.width,
  height: part.body.height,
})

/** The corner nearest to where its middle is wanted at which a unit keeps clear of those that stand. */
function freePlace(
  part: Part,
  middle: Point,
  parts: ReadonlyMap<string, Part>,
  places: ReadonlyMap<string, Point>,
  apart = 20,
): Point {
  const taken = [...places].flatMap(([id, at]) => {
    const other = parts.get(id)
    return other && id !== part.id ? [grown(boxAt(other, at), apart)] : []
  })
  const x0 = onGrid(middle[0] - part.middle[0])
  const y0 = onGrid(middle[1] - part.middle[1])
  for (let ring = 0; ring < 80; ring++) {
    const steps = Math.max(1, ring * 8)
    for (let step = 0; step < steps; step++) {
      const angle = (2 * Math.PI * step) / steps
      const at: Point = [
        x0 + onGrid(2 * grid * ring * Math.cos(angle)),
        y0 + onGrid(2 * grid * ring * Math.sin(angle)),
      ]
      if (!taken.some((box) => overlap(box, boxAt(part, at)))) return at
    }
  }
  return [x0, y0]
}

/** What hangs on the lines: near what it is connected to, the best connected first. */
function placeBeside(
  layout: Layout,
  rest: readonly string[],
  parts: Map<string, Part>,
  places: Map<string, Point>,
): void {
  const waiting = new Set(rest)
  while (waiting.size > 0) {
    let best: { id: string; at: Point; count: number } | null = null
    for (const id of waiting) {
      const ends = neighbours(layout, id, parts, places)
      if (ends.length === 0 || (best && ends.length <= best.count)) continue
      const middle = (axis: 0 | 1) => ends.reduce((sum, { at }) => sum + at[axis], 0) / ends.length
      best = { id, at: [middle(0), middle(1)], count: ends.length }
    }
    if (!best) break
    const part = parts.get(best.id)
    waiting.delete(best.id)
    if (part) places.set(best.id, freePlace(part, best.at, parts, places, 28))
  }
  // Separate networks below all else.
  placeInLayers(layout, [...waiting], parts, places)
}

/** Where streams come from or go to, a little off the unit that stands there. */
function neighbours(
  layout: Layout,
  id: string,
  parts: ReadonlyMap<string, Part>,
  places: ReadonlyMap<string, Point>,
): { readonly at: Point }[] {
  return layout.streams.flatMap(({ from, to }) => {
    const end = from.startsWith(`${id}.`) ? to : to.startsWith(`${id}.`) ? from : null
    if (end === null) return []
    const dot = end.indexOf('.')
    const part = parts.get(end.slice(0, dot))
    const at = part && places.get(part.id)
    if (!part || !at) return []
    const place = placesOf(part.lie, end.slice(dot + 1))?.[0]
    const [x, y] = place ? [place.x, place.y] : part.middle
    const away = 64
    const [ox, oy] = place
      ? ({ left: [-1, 0], right: [1, 0], top: [0, -1], bottom: [0, 1] } as const)[place.side]
      : [0, 1]
    return [{ at: [at[0] + x + ox * away, at[1] + y + oy * away] as Point }]
  })
}

/** In layers from left to right, as the streams run. */
function placeInLayers(
  layout: Layout,
  ids: readonly string[],
  parts: ReadonlyMap<string, Part>,
  places: Map<string, Point>,
): void {
  if (ids.length === 0) return
  const graph = new graphlib.Graph({ multigraph: true })
  graph.setGraph({ rankdir: 'LR', nodesep: 48, ranksep: 72, edgesep: 16 })
  graph.setDefaultEdgeLabel(() => ({}))
  const chosen = new Set(ids)
  for (const id of ids) {
    const { width = 0, height = 0 } = parts.get(id)?.body ?? {}
    graph.setNode(id, { width, height })
  }
  for (const { id, from, to } of layout.streams) {
    const source = from.slice(0, from.indexOf('.'))
    const target = to.slice(0, to.indexOf('.'))
    if (chosen.has(source) && chosen.has(target)) graph.setEdge(source, target, {}, id)
  }
  layOut(graph)
  let top = 0
  for (const [id, at] of places) {
    const part = parts.get(id)
    if (part) top = Math.max(top, at[1] + part.body.y + part.body.height + 80)
  }
  for (const id of ids) {
    const part = parts.get(id)
    const node = graph.node(id) as { x: number; y: number } | undefined
    if (part && node) {
      places.set(id, [onGrid(node.x - part.middle[0]), onGrid(top + node.y - part.middle[1])])
    }
  }
}

/** The whole beside the pinned units: moved as they ask on average, and off those that it would cover. */
function moveToPins(
  layout: Layout,
  pinned: ReadonlySet<string>,
  parts: ReadonlyMap<string, Part>,
  places: Map<string, Point>,
): void {
  const fixed = layout.units.filter(({ id }) => pinned.has(id) && places.has(id))
  const margin = 40
  let by: Point = [
    margin - Math.min(...[...places.values()].map(([x]) => x)),
    margin - Math.min(...[...places.values()].map(([, y]) => y)),
  ]
  if (fixed.length > 0) {
    const mean = (axis: 0 | 1) =>
      fixed.reduce((sum, { id, at }) => sum + at[axis] - (places.get(id)?.[axis] ?? 0), 0) /
      fixed.length
    by = [onGrid(mean(0)), onGrid(mean(1))]
  }
  for (const [id, [x, y]] of places) places.set(id, [onGrid(x + by[0]), onGrid(y + by[1])])
  if (fixed.length === 0) return
  for (const { id, at } of fixed) places.set(id, at)
  for (const [id, at] of [...places]) {
    const part = parts.get(id)
    if (!part || pinned.has(id)) continue
    const covers = fixed.some((unit) => {
      const other = parts.get(unit.id)
      return other && overlap(grown(boxAt(other, unit.at), 16), boxAt(part, at))
    })
    if (!covers) continue
    const middle: Point = [at[0] + part.middle[0], at[1] + part.middle[1]]
    places.set(id, freePlace(part, middle, parts, places))
  }
}
