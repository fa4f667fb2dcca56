import type { Rectangle } from './place-labels.ts'

/** What stands upright on a chart: temperature or enthalpy. */
export type Upright = 'T' | 'h'

/** From states to px: x = x0 + kx s, y = y0 + ky T (or h). */
export interface Geometry {
  /** Temperature unless given. */
  readonly upright?: Upright
  readonly plot: Rectangle
  readonly x0: number
  readonly kx: number
  readonly y0: number
  readonly ky: number
}

/** Values of one point of a path: s, T, h. */
const pointSize = 3

/** Where in a point stands what the chart draws upright. */
const columnOf = ({ upright }: Geometry): 1 | 2 => (upright === 'h' ? 2 : 1)

/** Height of a state, px. */
export function heightOf(
  geometry: Geometry,
  state: { readonly T: number; readonly h: number },
): number {
  return geometry.y0 + geometry.ky * (geometry.upright === 'h' ? state.h : state.T)
}

/** Coordinates are written to a tenth of a pixel; no eye sees more, and the text is a third as long. */
const round = (px: number): number => Math.round(px * 10) / 10

/** The `d` of an SVG path through points `start` to `end` (exclusive) of triples s, T, h. */
export function pathThrough(
  points: Float64Array,
  start: number,
  end: number,
  geometry: Geometry,
): string {
  const { x0, kx, y0, ky } = geometry
  const column = columnOf(geometry)
  let d = ''
  let lastX = Number.NaN
  let lastY = Number.NaN
  for (let i = start; i < end; i += 1) {
    const x = round(x0 + kx * (points[pointSize * i] as number))
    const y = round(y0 + ky * (points[pointSize * i + column] as number))
    if (x === lastX && y === lastY) continue
    d += `${d === '' ? 'M' : 'L'}${x} ${y}`
    lastX = x
    lastY = y
  }
  return d
}

/** A place on a path near to where the pointer is. */
export interface PathHit {
  /** Which path. */
  readonly path: number
  /** px from the pointer. */
  readonly distance: number
  readonly s: number
  readonly T: number
  readonly h: number
}

/**
 * The place on any of the paths nearest to (x, y), no further than `reach` px; undefined when there is
 * none. Path i has points starts[i] to starts[i + 1].
 */
export function nearestOnPaths(
  points: Float64Array,
  starts: Uint32Array,
  geometry: Geometry,
  x: number,
  y: number,
  reach: number,
): PathHit | undefined {
  const { x0, kx, y0, ky } = geometry
  const column = columnOf(geometry)
  let hit: PathHit | undefined
  let least = reach
  for (let path = 0; path + 1 < starts.length; path += 1) {
    const end = starts[path + 1] as number
    for (let i = starts[path] as number; i + 1 < end; i += 1) {
      const at = pointSize * i
      const s1 = points[at] as number
      const T1 = points[at + 1] as number
      const h1 = points[at + 2] as number
      const ds = (points[at + 3] as number) - s1
      const dT = (points[at + 4] as number) - T1
      const dh = (points[at + 5] as number) - h1
      const dx = kx * ds
      const dy = ky * (column === 1 ? dT : dh)
      const fromX = x - (x0 + kx * s1)
      const fromY = y - (y0 + ky * (column === 1 ? T1 : h1))
      const square = dx * dx + dy * dy
      const t = square > 0 ? Math.min(1, Math.max(0, (fromX * dx + fromY * dy) / square)) : 0
      const distance = Math.hypot(fromX - t * dx, fromY - t * dy)
      if (distance < least) {
        least = distance
        hit = { path, distance, s: s1 + t * ds, T: T1 + t * dT, h: h1 + t * dh }
      }
    }
  }
  return hit
}

/**
 * Where a line leaves the plot: the last of its points inside, moved on to the plot's edge. Undefined
 * when none is inside.
 */
export function lastInside(
  points: Float64Array,
  start: number,
  end: number,
  geometry: Geometry,
): { readonly x: number; readonly y: number; readonly edge: 'top' | 'right' | 'none' } | undefined {
  const { plot, x0, kx, y0, ky } = geometry
  const column = columnOf(geometry)
  const right = plot.x + plot.width
  const bottom = plot.y + plot.height
  for (let i = end - 1; i >= start; i -= 1) {
    const x = x0 + kx * (points[pointSize * i] as number)
    const y = y0 + ky * (points[pointSize * i + column] as number)
    if (x < plot.x || x > right || y < plot.y || y > bottom) continue
    if (i + 1 >= end) return { x, y, edge: 'none' }
    const dx = x0 + kx * (points[pointSize * (i + 1)] as number) - x
    const dy = y0 + ky * (points[pointSize * (i + 1) + column] as number) - y
    const toTop = dy < 0 ? (plot.y - y) / dy : Number.POSITIVE_INFINITY
    const toRight = dx > 0 ? (right - x) / dx : Number.POSITIVE_INFINITY
    const t = Math.min(1, toTop, toRight)
    return { x: x + t * dx, y: y + t * dy, edge: toTop < toRight ? 'top' : 'right' }
  }
  return undefined
}

/** The first point of a line within the plot, px; undefined when none is. */
export function firstInside(
  points: Float64Array,
  start: number,
  end: number,
  geometry: Geometry,
): { readonly x: number; readonly y: number } | undefined {
  const { plot, x0, kx, y0, ky } = geometry
  const column = columnOf(geometry)
  for (let i = start; i < end; i += 1) {
    const x = x0 + kx * (points[pointSize * i] as number)
    const y = y0 + ky * (points[pointSize * i + column] as number)
    const inside =
      x >= plot.x && x <= plot.x + plot.width && y >= plot.y && y <= plot.y + plot.height
    if (inside) return { x, y }
  }
  return undefined
}
