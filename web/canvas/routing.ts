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

function conflictPrice(a: Point, b: Point, routes: readonly Route[]): number {
  let sum = 0
  const level = a[1] === b[1]
  const along = level ? 0 : 1
  const across = level ? 1 : 0
  const least = Math.min(a[along], b[along])
  const most = Math.max(a[along], b[along])
  for (const route of routes) {
    for (let i = 1; i < route.length; i++) {
      const c = route[i - 1] as Point
      const d = route[i] as Point
      if ((c[1] === d[1]) === level) {
        const apart = Math.abs(c[across] - a[across])
        if (apart >= spacing) continue
        const shared =
          Math.min(most, Math.max(c[along], d[along])) -
          Math.max(least, Math.min(c[along], d[along]))
        if (shared > 0) sum += price.beside * (shared + 16) * (apart === 0 ? 2 : 1)
      } else {
        const at = c[along]
        const low = Math.min(c[across], d[across])
        const high = Math.max(c[across], d[across])
        if (at > least && at < most && a[across] > low && a[across] < high) sum += price.crossing
        else if (at >= least && at <= most && a[across] >= low && a[across] <= high) {
          // A corner on another stream reads as a joint.
          sum += price.crossing
        }
      }
    }
  }
  return sum
}

function priceOf(route: Route, from: Terminal, to: Terminal, around: Surroundings, most: number) {
  const last = route.length - 1
  let sum = length(route) + price.bend * (last - 1)
  if (last > 1) {
    for (const [a, b] of [
      [route[0], route[1]],
      [route[last - 1], route[last]],
    ]) {
      sum += price.cramped * Math.max(0, easy - manhattan(a as Point, b as Point))
    }
  }
  for (let i = 1; i <= last; i++) {
    const a = route[i - 1] as Point
    const b = route[i] as Point
    for (const box of around.obstacles) {
      if (enters(a, b, box, clearance - 1)) sum += price.through
    }
    // Its own units a stream may touch at its ends, but neither cross nor hug.
    if (enters(a, b, from.body, i === 1 ? -1 : clearance - 1)) {
      sum += i === 1 || enters(a, b, from.body, -1) ? price.through : price.hugging
    }
    if (enters(a, b, to.body, i === last ? -1 : clearance - 1)) {
      sum += i === last || enters(a, b, to.body, -1) ? price.through : price.hugging
    }
    if (sum >= most) return sum
    sum += conflictPrice(a, b, around.routes)
    if (sum >= most) return sum
  }
  return sum
}

/** Coordinates worth trying between two ends: near each, halfway, and along the edges of what stands between. */
function tracks(
  a: number,
  b: number,
  low: number,
  high: number,
  edges: readonly number[],
): number[] {
  const found = new Set<number>()
  for (let step = 0; step <= 6; step++) {
    for (const end of [a, b]) {
      found.add(onGrid(end) + step * grid)
      found.add(onGrid(end) - step * grid)
    }
  }
  const middle = onGrid((a + b) / 2)
  for (let step = -2; step <= 2; step++) found.add(middle + step * grid)
  for (const edge of edges) if (edge >= low && edge <= high) found.add(edge)
  return [...found]
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

  const room = 240
  const left = Math.min(a[0], b[0], from.body.x, to.body.x) - room
  const right =
    Math.max(a[0], b[0], from.body.x + from.body.width, to.body.x + to.body.width) + room
  const top = Math.min(a[1], b[1], from.body.y, to.body.y) - room
  const bottom =
    Math.max(a[1], b[1], from.body.y + from.body.height, to.body.y + to.body.height) + room

  const xEdges: number[] = []
  const yEdges: number[] = []
  const edgesOf = (box: Box) => {
    for (const away of [2, 3, 4]) {
      xEdges.push(onGrid(box.x) - away * grid, onGrid(box.x + box.width) + away * grid)
      yEdges.push(onGrid(box.y) - away * grid, onGrid(box.y + box.height) + away * grid)
    }
  }
  edgesOf(from.body)
  edgesOf(to.body)
  for (const box of around.obstacles) {
    if (box.x < right && box.x + box.width > left && box.y < bottom && box.y + box.height > top) {
      edgesOf(box)
    }
  }
  const xs = tracks(a[0], b[0], left, right, xEdges)
  const ys = tracks(a[1], b[1], top, bottom, yEdges)

  let best: Route | null = null
  let least = Number.POSITIVE_INFINITY
  // Between ends that face each other from nearby the corners may come close to the units.
  const facing = (b[0] - a[0]) * out[0] + (b[1] - a[1]) * out[1]
  const tight =
    from.side !== to.side && facing > 0 && facing < 2 * stub ? Math.min(4, facing / 2) : stub
  const consider = (points: readonly Point[]) => {
    const bare = length(points) + price.bend * (points.length - 2)
    if (bare >= least) return
    const route = tidied(points)
    if (!leaves(route, out, back, tight)) return
    const cost = priceOf(route, from, to, around, least)
    if (cost < least) {
      least = cost
      best = route
    }
  }

  const fromLevel = isHorizontal(from.side)
  const toLevel = isHorizontal(to.side)
  const near = (values: readonly number[], end: number, way: number): number[] =>
    values
      .filter((value) => (value - end) * way >= tight)
      .sort((p, q) => Math.abs(p - end) - Math.abs(q - end))
      .slice(0, 12)

  if (fromLevel && toLevel) {
    if (a[1] === b[1]) consider([a, b])
    for (const x of xs) consider([a, [x, a[1]], [x, b[1]], b])
    for (const x1 of near(xs, a[0], out[0])) {
      for (const x2 of near(xs, b[0], back[0])) {
        for (const y of ys) consider([a, [x1, a[1]], [x1, y], [x2, y], [x2, b[1]], b])
      }
    }
  } else if (!fromLevel && !toLevel) {
    if (a[0] === b[0]) consider([a, b])
    for (const y of ys) consider([a, [a[0], y], [b[0], y], b])
    for (const y1 of near(ys, a[1], out[1])) {
      for (const y2 of near(ys, b[1], back[1])) {
        for (const x of xs) consider([a, [a[0], y1], [x, y1], [x, y2], [b[0], y2], b])
      }
    }
  } else if (fromLevel) {
    consider([a, [b[0], a[1]], b])
    for (const x of xs) for (const y of ys) consider([a, [x, a[1]], [x, y], [b[0], y], b])
  } else {
    consider([a, [a[0], b[1]], b])
    for (const y of ys) for (const x of xs) consider([a, [a[0], y], [x, y], [x, b[1]], b])
  }
  return best ?? tidied([a, [a[0], b[1]], b])
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

/** Where the upright straights of a route cross level ones of others: there a bridge is drawn. */
export function crossings(route: Route, others: Iterable<Route>): Point[] {
  const found: Point[] = []
  for (const other of others) {
    if (other === route) continue
    for (let i = 1; i < route.length; i++) {
      const a = route[i - 1] as Point
      const b = route[i] as Point
      if (a[0] !== b[0]) continue
      const top = Math.min(a[1], b[1])
      const bottom = Math.max(a[1], b[1])
      for (let j = 1; j < other.length; j++) {
        const c = other[j - 1] as Point
        const d = other[j] as Point
        if (c[1] !== d[1] || c[1] <= top || c[1] >= bottom) continue
        if (a[0] > Math.min(c[0], d[0]) && a[0] < Math.max(c[0], d[0])) found.push([a[0], c[1]])
      }
    }
  }
  return found
}
