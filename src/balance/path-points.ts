/**
 * Points along a curve of states, few and where they are needed. One curve is in the making at a time;
 * its nodes live here so that nothing is allocated.
 */

/** Values of one point: s, T, h. */
export const POINT_SIZE = 3

/** A growable list of points. Reused from balance to balance it allocates only while it grows. */
export class PointList {
  /** Triples; only the first `count` points mean anything. */
  values = new Float64Array(POINT_SIZE * 1024)
  /** Number of points. */
  count = 0

  add(s: number, T: number, h: number): void {
    const at = POINT_SIZE * this.count
    if (at === this.values.length) {
      const larger = new Float64Array(2 * this.values.length)
      larger.set(this.values)
      this.values = larger
    }
    this.values[at] = s
    this.values[at + 1] = T
    this.values[at + 2] = h
    this.count += 1
  }

  /** Takes over the points `start` to `end` (exclusive) of another list. */
  append(other: PointList, start: number, end: number): void {
    const needed = POINT_SIZE * (this.count + end - start)
    if (needed > this.values.length) {
      const larger = new Float64Array(Math.max(needed, 2 * this.values.length))
      larger.set(this.values)
      this.values = larger
    }
    this.values.set(
      other.values.subarray(POINT_SIZE * start, POINT_SIZE * end),
      POINT_SIZE * this.count,
    )
    this.count += end - start
  }

  clear(): void {
    this.count = 0
  }

  /** The points so far, in an array of their own. */
  copy(): Float64Array {
    return this.values.slice(0, POINT_SIZE * this.count)
  }
}

/** Spans that the flatness is measured against: about those of a whole chart. J/(kg K), K, J/kg. */
const ENTROPY_SPAN = 10_000
const TEMPERATURE_SPAN = 600
const ENTHALPY_SPAN = 4e6

/**
 * Greatest distance of a chord from its path, as a share of the spans: a pixel where the chart is
 * magnified twenty times.
 */
const PATH_FLATNESS = 1 / 10_000

/** Below this miss, in the same shares, a piece is straight: round-off on a plateau. */
const STRAIGHT = 1e-9

/** The most points that one path takes. */
const MOST_PATH_POINTS = 48

/** The most points that any curve takes. */
const MOST_POINTS = 160

/** Finds the state at t and leaves it in `reached`; false where there is none. */
export type Evaluate = (t: number) => boolean

/** J/(kg K), K, J/kg */
export const reached = { s: 0, T: 0, h: 0 }

/** The points of the path in the making, chained in order of t by `next`. */
export const nodes = {
  count: 0,
  t: new Float64Array(MOST_POINTS),
  s: new Float64Array(MOST_POINTS),
  T: new Float64Array(MOST_POINTS),
  h: new Float64Array(MOST_POINTS),
  next: new Int32Array(MOST_POINTS),
  /** How far the chord to the next node misses the path, by the state halfway; 0 if not to be split. */
  miss: new Float64Array(MOST_POINTS),
  /** That state. */
  middleS: new Float64Array(MOST_POINTS),
  middleT: new Float64Array(MOST_POINTS),
  middleH: new Float64Array(MOST_POINTS),
}

/** Adds a state after the node `after` (-1: the first) and returns its node. */
export function addNode(t: number, s: number, T: number, h: number, after: number): number {
  const node = nodes.count
  nodes.count += 1
  nodes.t[node] = t
  nodes.s[node] = s
  nodes.T[node] = T
  nodes.h[node] = h
  nodes.miss[node] = 0
  if (after < 0) nodes.next[node] = -1
  else {
    nodes.next[node] = nodes.next[after] as number
    nodes.next[after] = node
  }
  return node
}

/** Distance of (x, y) from the line through (x1, y1) and (x2, y2). */
function distance(x: number, y: number, x1: number, y1: number, x2: number, y2: number): number {
  const dx = x2 - x1
  const dy = y2 - y1
  const length = Math.hypot(dx, dy)
  if (length === 0) return Math.hypot(x - x1, y - y1)
  return Math.abs((x - x1) * dy - (y - y1) * dx) / length
}

/** Finds the state halfway to the next node and how far the chord misses it. */
function measure(node: number, evaluate: Evaluate): void {
  const next = nodes.next[node] as number
  nodes.miss[node] = 0
  if (!evaluate(((nodes.t[node] as number) + (nodes.t[next] as number)) / 2)) return
  const { s, T, h } = reached
  nodes.middleS[node] = s
  nodes.middleT[node] = T
  nodes.middleH[node] = h
  const x = s / ENTROPY_SPAN
  const x1 = (nodes.s[node] as number) / ENTROPY_SPAN
  const x2 = (nodes.s[next] as number) / ENTROPY_SPAN
  nodes.miss[node] = Math.max(
    distance(
      x,
      T / TEMPERATURE_SPAN,
      x1,
      (nodes.T[node] as number) / TEMPERATURE_SPAN,
      x2,
      (nodes.T[next] as number) / TEMPERATURE_SPAN,
    ),
    distance(
      x,
      h / ENTHALPY_SPAN,
      x1,
      (nodes.h[node] as number) / ENTHALPY_SPAN,
      x2,
      (nodes.h[next] as number) / ENTHALPY_SPAN,
    ),
  )
}

/** Makes the state halfway from `node` to the next a node of its own. */
function split(node: number): number {
  const next = nodes.next[node] as number
  return addNode(
    ((nodes.t[node] as number) + (nodes.t[next] as number)) / 2,
    nodes.middleS[node] as number,
    nodes.middleT[node] as number,
    nodes.middleH[node] as number,
    node,
  )
}

/** Splits the worst chord until all are flat or the points are used up; `most` is 160 or fewer. */
export function refine(
  first: number,
  evaluate: Evaluate,
  flatness = PATH_FLATNESS,
  most = MOST_PATH_POINTS,
): void {
  let node = first
  while ((nodes.next[node] as number) >= 0 && nodes.count < most) {
    const next = nodes.next[node] as number
    measure(node, evaluate)
    // Every curved piece is halved once: an inflection may put its middle on the chord by chance.
    if ((nodes.miss[node] as number) > STRAIGHT) {
      const middle = split(node)
      measure(node, evaluate)
      measure(middle, evaluate)
    }
    node = next
  }
  while (nodes.count < most) {
    let worst = -1
    let miss = flatness
    for (let candidate = 0; candidate < nodes.count; candidate += 1) {
      if ((nodes.miss[candidate] as number) > miss) {
        miss = nodes.miss[candidate] as number
        worst = candidate
      }
    }
    if (worst < 0) return
    const middle = split(worst)
    // Halving a chord divides its miss by four; near the limit the halves need no look.
    if (miss < 2 * flatness) {
      nodes.miss[worst] = 0
      continue
    }
    measure(worst, evaluate)
    measure(middle, evaluate)
  }
}

/** Begins a new curve. */
export function clearNodes(): void {
  nodes.count = 0
}

/** Writes the curve from its first node on; returns the number of points. */
export function write(first: number, out: PointList): number {
  let written = 0
  for (let node = first; node >= 0; node = nodes.next[node] as number) {
    out.add(nodes.s[node] as number, nodes.T[node] as number, nodes.h[node] as number)
    written += 1
  }
  return written
}
