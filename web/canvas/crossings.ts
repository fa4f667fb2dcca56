import type { Point } from './geometry.ts'
import type { Route } from './routing.ts'

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
