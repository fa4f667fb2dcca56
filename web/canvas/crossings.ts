import type { Point } from './geometry.ts'
import type { Route } from './routing.ts'

/** Level straights of all routes: height, left and right end, three numbers each. */
export type LevelStraights = readonly number[]

export function levelStraights(routes: Iterable<Route>): LevelStraights {
  const found: number[] = []
  for (const route of routes) {
    for (let i = 1; i < route.length; i++) {
      const [x1, y1] = route[i - 1] as Point
      const [x2, y2] = route[i] as Point
      if (y1 === y2) found.push(y1, Math.min(x1, x2), Math.max(x1, x2))
    }
  }
  return found
}

/** Where the upright straights of a route cross level ones of others: there a bridge is drawn. */
export function crossings(route: Route, level: LevelStraights): Point[] {
  const found: Point[] = []
  for (let i = 1; i < route.length; i++) {
    const a = route[i - 1] as Point
    const b = route[i] as Point
    const x = a[0]
    if (x !== b[0]) continue
    const top = Math.min(a[1], b[1])
    const bottom = Math.max(a[1], b[1])
    // A route's own level straights end at its corners: inside none of them does it cross itself.
    for (let j = 0; j < level.length; j += 3) {
      const y = level[j] as number
      if (y <= top || y >= bottom) continue
      if (x > (level[j + 1] as number) && x < (level[j + 2] as number)) found.push([x, y])
    }
  }
  return found
}
