import { type Box, grid, isHorizontal, onGrid, outward, type Point, type Side } from './geometry.ts'

/** An end of a stream: where it meets a unit, and the side by which it leaves or enters. */
export interface Terminal {
  readonly point: Point
  readonly side: Side
  /** What the strokes of its unit cover. */
  readonly body: Box
}

/** Corner points from end to end, alternately horizontal and vertical, ends included. */
export type Route = readonly Point[]

/** What a new route heeds. */
export interface Surroundings {
  /** Bodies of units that are neither end. */
  readonly obstacles: readonly Box[]
  /** Routes that are drawn already. */
  readonly routes: readonly Route[]
  /** Under the pointer a good route at once is worth more than the best. */
  readonly quick?: boolean
}

/** Streams keep this far from units they do not belong to, px. */
const clearance = 8
/** Least length of a stream between its unit and its first corner, px: room for the arrow. */
const stub = 16
/** Length that looks well there. */
const easy = 24
/** Parallel streams keep this far apart, px. */
const spacing = 12

/** What a route is charged, in px of length. */
const price = { bend: 40, crossing: 60, beside: 6, through: 4000, hugging: 400, cramped: 2 }

const manhattan = (a: Point, b: Point): number => Math.abs(a[0] - b[0]) + Math.abs(a[1] - b[1])

/**
 * Corners that a stream between two terminals needs with nothing in its way. Decides, with the
 * distance, which of several places of a port a stream takes.
 */
export function cornersNeeded(
  from: { readonly point: Point; readonly side: Side },
  to: { readonly point: Point; readonly side: Side },
): number {
  const out = outward[from.side]
  const back = outward[to.side]
  const dx = to.point[0] - from.point[0]
  const dy = to.point[1] - from.point[1]
  const ahead = dx * out[0] + dy * out[1]
  const facing = -(dx * back[0] + dy * back[1])
  if (isHorizontal(from.side) !== isHorizontal(to.side)) {
    return ahead >= clearance && facing >= clearance ? 1 : 3
  }
  if (from.side === to.side) return 2
  if (ahead < clearance) return 4
  return (isHorizontal(from.side) ? dy : dx) === 0 ? 0 : 2
}

/** Distance and corners in one figure, px. */
export function strain(
  from: { readonly point: Point; readonly side: Side },
  to: { readonly point: Point; readonly side: Side },
): number {
  // Out and back again by the same side is a detour.
  const detour = from.side === to.side ? 2 * stub : 0
  return manhattan(from.point, to.point) + detour + price.bend * cornersNeeded(from, to)
}

function length(route: Route): number {
  let sum = 0
  for (let i = 1; i < route.length; i++) sum += manhattan(route[i - 1] as Point, route[i] as Point)
  return sum
}

/** Without points that repeat or lie on a straight between their neighbours. */
export function tidied(points: readonly Point[]): Point[] {
  const kept: Point[] = []
  for (const point of points) {
    const last = kept.at(-1)
    if (last && last[0] === point[0] && last[1] === point[1]) continue
    const before = kept.at(-2)
    if (
      last &&
      before &&
      ((before[0] === last[0] && last[0] === point[0]) ||
        (before[1] === last[1] && last[1] === point[1]))
    ) {
      kept[kept.length - 1] = point
    } else kept.push(point)
  }
  return kept
}

/** True where the straight from a to b enters the box. */
function enters(a: Point, b: Point, box: Box, margin: number): boolean {
  return (
    Math.max(a[0], b[0]) > box.x - margin &&
    Math.min(a[0], b[0]) < box.x + box.width + margin &&
    Math.max(a[1], b[1]) > box.y - margin &&
    Math.min(a[1], b[1]) < box.y + box.height + margin
  )
}

/** True where the route passes through any of the boxes. */
export function passesThrough(
  route: Route,
  boxes: readonly Box[],
  margin = clearance - 1,
): boolean {
  for (let i = 1; i < route.length; i++) {
    for (const box of boxes) {
      if (enters(route[i - 1] as Point, route[i] as Point, box, margin)) return true
    }
  }
  return false
}

/** Straights of the streams that are there, level and upright ones apart: place, least and most along it. */
interface Straights {
  readonly level: readonly number[]
  readonly upright: readonly number[]
}

interface Region {
  readonly left: number
  readonly right: number
  readonly top: number
  readonly bottom: number
}

function straightsOf(routes: readonly Route[], region: Region): Straights {
  const level: number[] = []
  const upright: number[] = []
  for (const route of routes) {
    for (let i = 1; i < route.length; i++) {
      const [x1, y1] = route[i - 1] as Point
      const [x2, y2] = route[i] as Point
      const left = Math.min(x1, x2)
      const right = Math.max(x1, x2)
      const top = Math.min(y1, y2)
      const bottom = Math.max(y1, y2)
      if (right < region.left || left > region.right) continue
      if (bottom < region.top || top > region.bottom) continue
      if (y1 === y2) level.push(y1, left, right)
      else upright.push(x1, top, bottom)
    }
  }
  return { level, upright }
}

/** What a straight from a to b is charged for lying beside, crossing or touching others. */
function conflictPrice(a: Point, b: Point, { level, upright }: Straights): number {
  const isLevel = a[1] === b[1]
  const at = isLevel ? a[1] : a[0]
  const from = isLevel ? a[0] : a[1]
  const to = isLevel ? b[0] : b[1]
  const least = Math.min(from, to)
  const most = Math.max(from, to)
  let sum = 0
  const parallel = isLevel ? level : upright
  for (let i = 0; i < parallel.length; i += 3) {
    const apart = Math.abs((parallel[i] as number) - at)
    if (apart >= spacing) continue
    const shared =
      Math.min(most, parallel[i + 2] as number) - Math.max(least, parallel[i + 1] as number)
    if (shared > 0) sum += price.beside * (shared + 16) * (apart === 0 ? 2 : 1)
  }
  const across = isLevel ? upright : level
  for (let i = 0; i < across.length; i += 3) {
    const place = across[i] as number
    // A corner on another stream reads as a joint: touching costs as much as crossing.
    if (
      place >= least &&
      place <= most &&
      at >= (across[i + 1] as number) &&
      at <= (across[i + 2] as number)
    ) {
      sum += price.crossing
    }
  }
  return sum
}

interface Task {
  readonly from: Terminal
  readonly to: Terminal
  readonly obstacles: readonly Box[]
  readonly straights: Straights
  /** Prices of straights met before: level and upright ones by their place, then by their ends. */
  readonly known: readonly [Prices, Prices]
}

type Prices = Map<number, Map<number, Map<number, number>>>

/** What a straight is charged for units in its way and for other streams. */
function straightPrice(a: Point, b: Point, task: Task): number {
  const isLevel = a[1] === b[1]
  const at = isLevel ? a[1] : a[0]
  const from = isLevel ? a[0] : a[1]
  const to = isLevel ? b[0] : b[1]
  const least = Math.min(from, to)
  const most = Math.max(from, to)
  // Many routes share most of their straights.
  const prices = task.known[isLevel ? 0 : 1]
  const there = prices.get(at) ?? new Map<number, Map<number, number>>()
  if (there.size === 0) prices.set(at, there)
  const starting = there.get(least) ?? new Map<number, number>()
  if (starting.size === 0) there.set(least, starting)
  let sum = starting.get(most)
  if (sum === undefined) {
    sum = conflictPrice(a, b, task.straights)
    for (const box of task.obstacles) {
      if (enters(a, b, box, clearance - 1)) sum += price.through
    }
    starting.set(most, sum)
  }
  return sum
}

/** The price of a route, or any figure from `most` up where it comes to that. */
function priceOf(route: Route, task: Task, most: number): number {
  const { from, to } = task
  const last = route.length - 1
  let sum = length(route) + price.bend * (last - 1)
  if (last > 1) {
    const first = manhattan(route[0] as Point, route[1] as Point)
    const final = manhattan(route[last - 1] as Point, route[last] as Point)
    sum += price.cramped * (Math.max(0, easy - first) + Math.max(0, easy - final))
  }
  for (let i = 1; i <= last && sum < most; i++) {
    const a = route[i - 1] as Point
    const b = route[i] as Point
    sum += straightPrice(a, b, task)
    // Its own units a stream may touch at its ends, but neither cross nor hug.
    if (enters(a, b, from.body, i === 1 ? -1 : clearance - 1)) {
      sum += i === 1 || enters(a, b, from.body, -1) ? price.through : price.hugging
    }
    if (enters(a, b, to.body, i === last ? -1 : clearance - 1)) {
      sum += i === last || enters(a, b, to.body, -1) ? price.through : price.hugging
    }
  }
  return sum
}

/** A coordinate to try, and how far it lies beyond the two ends. */
interface Track {
  readonly at: number
  readonly beyond: number
}

/**
 * Coordinates worth trying between two ends: near each, halfway, and along the edges of what stands
 * about; those that make the way no longer first, the middle ones leading.
 */
function tracks(a: number, b: number, edges: readonly number[]): Track[] {
  const found = new Set<number>()
  for (let step = 0; step <= 6; step++) {
    for (const end of [a, b]) {
      found.add(onGrid(end) + step * grid)
      found.add(onGrid(end) - step * grid)
    }
  }
  const middle = onGrid((a + b) / 2)
  for (let step = -2; step <= 2; step++) found.add(middle + step * grid)
  for (const edge of edges) found.add(edge)
  const low = Math.min(a, b)
  const high = Math.max(a, b)
  const all: Track[] = []
  for (const at of found) all.push({ at, beyond: Math.max(0, low - at, at - high) })
  return all.sort(
    (p, q) => p.beyond - q.beyond || Math.abs(p.at - middle) - Math.abs(q.at - middle),
  )
}

/**
 * An orthogonal route between two terminals: the cheapest by length, corners, crossings and
 * nearness among the shapes of up to five straights over the tracks that suggest themselves.
 */
export function findRoute(from: Terminal, to: Terminal, around: Surroundings): Route {
  const a = from.point
  const b = to.point
  const out = outward[from.side]
  const back = outward[to.side]
  const region: Region = {
    left: Math.min(a[0], b[0], from.body.x, to.body.x) - room,
    right: Math.max(a[0], b[0], from.body.x + from.body.width, to.body.x + to.body.width) + room,
    top: Math.min(a[1], b[1], from.body.y, to.body.y) - room,
    bottom: Math.max(a[1], b[1], from.body.y + from.body.height, to.body.y + to.body.height) + room,
  }
  const obstacles = around.obstacles.filter(
    (box) =>
      box.x < region.right &&
      box.x + box.width > region.left &&
      box.y < region.bottom &&
      box.y + box.height > region.top,
  )
  const task: Task = {
    from,
    to,
    obstacles,
    straights: straightsOf(around.routes, region),
    known: [new Map(), new Map()],
  }

  const xEdges: number[] = []
  const yEdges: number[] = []
  for (const box of [from.body, to.body, ...obstacles]) {
    for (let away = 2; away <= 4; away++) {
      const { x, y, width, height } = box
      xEdges.push(onGrid(x) - away * grid, onGrid(x + width) + away * grid)
      yEdges.push(onGrid(y) - away * grid, onGrid(y + height) + away * grid)
    }
  }
  const few = around.quick ? 16 : Number.POSITIVE_INFINITY
  const xs = tracks(a[0], b[0], xEdges).slice(0, few)
  const ys = tracks(a[1], b[1], yEdges).slice(0, few)
  const nearest = around.quick ? 3 : 10

  // Between ends that face each other from nearby the corners may come close to the units.
  const facing = (b[0] - a[0]) * out[0] + (b[1] - a[1]) * out[1]
  const tight =
    from.side !== to.side && facing > 0 && facing < 2 * stub ? Math.min(4, facing / 2) : stub

  let best: Route | null = null
  let least = Number.POSITIVE_INFINITY
  const direct = manhattan(a, b)
  /** True where a route of that length and so many corners could still be the cheapest. */
  const worth = (more: number, corners: number) => direct + more + price.bend * corners < least
  const consider = (...points: readonly Point[]) => {
    const route = tidied(points)
    if (!leaves(route, out, back, tight)) return
    const cost = priceOf(route, task, least)
    if (cost < least) {
      least = cost
      best = route
    }
  }

  const fromLevel = isHorizontal(from.side)
  const toLevel = isHorizontal(to.side)
  if (fromLevel && toLevel) {
    if (a[1] === b[1]) consider(a, b)
    for (const { at: x, beyond } of xs) {
      if (!worth(2 * beyond, 2)) break
      consider(a, [x, a[1]], [x, b[1]], b)
    }
    for (const x1 of near(xs, a[0], out[0], tight, nearest)) {
      for (const x2 of near(xs, b[0], back[0], tight, nearest)) {
        const more = detour(a[0], x1, x2, b[0])
        for (const { at: y, beyond } of ys) {
          if (!worth(more + 2 * beyond, 4)) break
          consider(a, [x1, a[1]], [x1, y], [x2, y], [x2, b[1]], b)
        }
      }
    }
  } else if (!fromLevel && !toLevel) {
    if (a[0] === b[0]) consider(a, b)
    for (const { at: y, beyond } of ys) {
      if (!worth(2 * beyond, 2)) break
      consider(a, [a[0], y], [b[0], y], b)
    }
    for (const y1 of near(ys, a[1], out[1], tight, nearest)) {
      for (const y2 of near(ys, b[1], back[1], tight, nearest)) {
        const more = detour(a[1], y1, y2, b[1])
        for (const { at: x, beyond } of xs) {
          if (!worth(more + 2 * beyond, 4)) break
          consider(a, [a[0], y1], [x, y1], [x, y2], [b[0], y2], b)
        }
      }
    }
  } else {
    consider(a, fromLevel ? [b[0], a[1]] : [a[0], b[1]], b)
    for (const { at: x, beyond: beyondX } of xs) {
      if (!worth(2 * beyondX, 3)) break
      for (const { at: y, beyond: beyondY } of ys) {
        if (!worth(2 * beyondX + 2 * beyondY, 3)) break
        if (fromLevel) consider(a, [x, a[1]], [x, y], [b[0], y], b)
        else consider(a, [a[0], y], [x, y], [x, b[1]], b)
      }
    }
  }
  return best ?? tidied([a, [a[0], b[1]], b])
}

/** How far round the two ends a route may go, px. */
const room = 240

/** Tracks on the outer side of an end, the nearest few. */
function near(
  all: readonly Track[],
  end: number,
  way: number,
  least: number,
  most: number,
): number[] {
  return all
    .map(({ at }) => at)
    .filter((at) => (at - end) * way >= least)
    .sort((p, q) => Math.abs(p - end) - Math.abs(q - end))
    .slice(0, most)
}

/** What the way over two places between is longer than the direct one, along one axis. */
function detour(a: number, first: number, second: number, b: number): number {
  return Math.abs(first - a) + Math.abs(second - first) + Math.abs(b - second) - Math.abs(b - a)
}

/** True where the first straight leaves outward and the last one arrives inward, each long enough. */
function leaves(route: Route, out: Point, back: Point, least: number): boolean {
  const [first, second] = route
  const last = route.at(-1)
  const beforeLast = route.at(-2)
  if (!first || !second || !last || !beforeLast) return false
  const leaving = (second[0] - first[0]) * out[0] + (second[1] - first[1]) * out[1]
  const arriving = (beforeLast[0] - last[0]) * back[0] + (beforeLast[1] - last[1]) * back[1]
  const needed = route.length === 2 ? 0 : least
  return leaving > 0 && arriving > 0 && leaving >= needed && arriving >= needed
}

/**
 * The route through corners that the user has set. When a unit has moved since, the corners next to
 * it follow, so that the stream still leaves and enters along its sides; every other corner stays.
 */
export function routeThrough(from: Terminal, to: Terminal, bends: readonly Point[]): Route {
  if (bends.length === 0) return tidied([from.point, to.point])
  const corners = bends.map((bend): [number, number] => [bend[0], bend[1]])
  const first = corners[0] as [number, number]
  const last = corners.at(-1) as [number, number]
  first[isHorizontal(from.side) ? 1 : 0] = from.point[isHorizontal(from.side) ? 1 : 0]
  last[isHorizontal(to.side) ? 1 : 0] = to.point[isHorizontal(to.side) ? 1 : 0]
  const points: Point[] = [from.point]
  let level = isHorizontal(from.side)
  for (const next of [...corners, to.point]) {
    const here = points.at(-1) as Point
    if (here[0] !== next[0] && here[1] !== next[1]) {
      points.push(level ? [next[0], here[1]] : [here[0], next[1]])
      level = !level
    }
    points.push(next)
    level = !level
  }
  return tidied(points)
}
