import type { Point } from './geometry.ts'
import type { Route } from './routing.ts'

const corner = 6
const bridge = 6

/** Numbers in a path, to a tenth of a pixel. */
const short = (value: number): string => String(Math.round(value * 10) / 10)

const distance = (a: Point, b: Point): number => Math.abs(a[0] - b[0]) + Math.abs(a[1] - b[1])

const toward = (a: Point, b: Point, by: number): Point => [
  a[0] + Math.sign(b[0] - a[0]) * by,
  a[1] + Math.sign(b[1] - a[1]) * by,
]

/**
 * SVG path of a route: rounded corners, bridges over the crossings given, the end held back by
 * `head` px to leave room for the arrow.
 */
export function pathOf(route: Route, bridges: readonly Point[], head: number): string {
  const first = route[0]
  if (!first) return ''
  let path = `M${short(first[0])} ${short(first[1])}`
  const last = route.length - 1
  let start = first
  for (let i = 1; i <= last; i++) {
    const point = route[i] as Point
    const next = route[i + 1]
    const radius = next
      ? Math.min(corner, distance(route[i - 1] as Point, point) / 2, distance(point, next) / 2)
      : Math.min(head, distance(start, point))
    const end = toward(point, start, radius)
    path += straight(start, end, bridges)
    if (next) {
      const after = toward(point, next, radius)
      path += `Q${short(point[0])} ${short(point[1])} ${short(after[0])} ${short(after[1])}`
      start = after
    }
  }
  return path
}

function straight(start: Point, end: Point, bridges: readonly Point[]): string {
  let path = ''
  if (start[0] === end[0]) {
    const way = Math.sign(end[1] - start[1])
    const over = bridges
      .filter(
        (at) =>
          Math.abs(at[0] - start[0]) < 0.5 &&
          (at[1] - start[1]) * way > bridge + 1 &&
          (end[1] - at[1]) * way > bridge + 1,
      )
      .sort((p, q) => (p[1] - q[1]) * way)
    let reached = Number.NEGATIVE_INFINITY
    for (const at of over) {
      // Crossings closer together than a bridge is wide share one.
      if ((at[1] - bridge) * way < reached) continue
      path += `V${short(at[1] - bridge * way)}a${bridge} ${bridge} 0 0 ${way > 0 ? 1 : 0} 0 ${2 * bridge * way}`
      reached = (at[1] + bridge) * way
    }
  }
  return `${path}L${short(end[0])} ${short(end[1])}`
}

/** The arrow at the consumer: a triangle with its tip at the end of the route. */
export function arrowOf(route: Route, length: number, halfWidth: number): string {
  const tip = route.at(-1)
  const before = route.at(-2)
  if (!tip || !before) return ''
  const foot = toward(tip, before, Math.min(length, Math.max(4, distance(tip, before))))
  const along = tip[1] === before[1]
  const a: Point = along ? [foot[0], foot[1] - halfWidth] : [foot[0] - halfWidth, foot[1]]
  const b: Point = along ? [foot[0], foot[1] + halfWidth] : [foot[0] + halfWidth, foot[1]]
  return `M${short(tip[0])} ${short(tip[1])}L${short(a[0])} ${short(a[1])}L${short(b[0])} ${short(b[1])}Z`
}
