import { describe, expect, it } from 'vitest'
import { crossings, levelStraights } from '../../web/canvas/crossings.ts'
import type { Box, Point, Side } from '../../web/canvas/geometry.ts'
import {
  cornersNeeded,
  findRoute,
  passesThrough,
  type Route,
  routeThrough,
  type Terminal,
  tidied,
} from '../../web/canvas/routing.ts'

const nothing = { obstacles: [], routes: [] }

/** A terminal in the middle of a side of a box. */
function on(body: Box, side: Side): Terminal {
  const x =
    side === 'left' ? body.x : side === 'right' ? body.x + body.width : body.x + body.width / 2
  const y =
    side === 'top' ? body.y : side === 'bottom' ? body.y + body.height : body.y + body.height / 2
  return { point: [x, y], side, body }
}

const box = (x: number, y: number): Box => ({ x, y, width: 48, height: 32 })

function isOrthogonal(route: Route): boolean {
  return route.every((point, i) => {
    const before = route[i - 1]
    return !before || (point[0] === before[0]) !== (point[1] === before[1])
  })
}

const sides: readonly Side[] = ['left', 'right', 'top', 'bottom']
const places: readonly Point[] = [
  [200, 0],
  [200, 120],
  [0, 160],
  [-200, 96],
  [-200, -120],
  [8, -160],
  [96, 64],
]

describe('findRoute', () => {
  it('runs straight between sides that face each other', () => {
    const route = findRoute(on(box(0, 0), 'right'), on(box(200, 0), 'left'), nothing)
    expect(route).toEqual([
      [48, 16],
      [200, 16],
    ])
  })

  it('runs at right angles from any side to any side, outward first and inward last, through neither unit', () => {
    for (const from of sides) {
      for (const to of sides) {
        for (const [x, y] of places) {
          const start = on(box(0, 0), from)
          const end = on(box(x, y), to)
          const route = findRoute(start, end, nothing)
          const name = `${from} to ${to} at ${x},${y}: ${JSON.stringify(route)}`
          expect(isOrthogonal(route), name).toBe(true)
          expect(route[0], name).toEqual(start.point)
          expect(route.at(-1), name).toEqual(end.point)
          const inner = [start.body, end.body].map((body) => ({
            x: body.x + 2,
            y: body.y + 2,
            width: body.width - 4,
            height: body.height - 4,
          }))
          expect(passesThrough(route, inner, 0), name).toBe(false)
        }
      }
    }
  })

  it('goes round a unit that stands between', () => {
    const between = { x: 100, y: -40, width: 48, height: 112 }
    const route = findRoute(on(box(0, 0), 'right'), on(box(200, 0), 'left'), {
      obstacles: [between],
      routes: [],
    })
    expect(passesThrough(route, [between])).toBe(false)
    expect(isOrthogonal(route)).toBe(true)
  })

  it('keeps beside a stream that is there already', () => {
    const first = findRoute(on(box(0, 0), 'bottom'), on(box(200, 0), 'bottom'), nothing)
    const start: Terminal = { point: [8, 32], side: 'bottom', body: box(0, 0) }
    const end: Terminal = { point: [240, 32], side: 'bottom', body: box(200, 0) }
    const second = findRoute(start, end, { obstacles: [], routes: [first] })
    const lowest = (route: Route) => Math.max(...route.map((point) => point[1]))
    expect(Math.abs(lowest(second) - lowest(first))).toBeGreaterThanOrEqual(12)
  })
})

describe('cornersNeeded', () => {
  it('counts corners with nothing in the way', () => {
    const right = { point: [0, 0] as Point, side: 'right' as Side }
    expect(cornersNeeded(right, { point: [100, 0], side: 'left' })).toBe(0)
    expect(cornersNeeded(right, { point: [100, 50], side: 'left' })).toBe(2)
    expect(cornersNeeded(right, { point: [100, 50], side: 'top' })).toBe(1)
    expect(cornersNeeded(right, { point: [100, 50], side: 'bottom' })).toBe(3)
    expect(cornersNeeded(right, { point: [100, 50], side: 'right' })).toBe(2)
    expect(cornersNeeded(right, { point: [-100, 50], side: 'left' })).toBe(4)
  })
})

describe('routeThrough', () => {
  it('lets the corners next to a moved unit follow and leaves the others', () => {
    const bends: Point[] = [
      [100, 16],
      [100, 80],
      [160, 80],
      [160, 216],
    ]
    const start = on(box(0, 40), 'right')
    const end = on(box(200, 200), 'left')
    const route = routeThrough(start, end, bends)
    expect(isOrthogonal(route)).toBe(true)
    expect(route).toEqual([
      [48, 56],
      [100, 56],
      [100, 80],
      [160, 80],
      [160, 216],
      [200, 216],
    ])
  })
})

describe('crossings', () => {
  it('are where upright straights cross level ones of other streams', () => {
    const upright: Route = [
      [50, 0],
      [50, 100],
    ]
    const level: Route = [
      [0, 40],
      [100, 40],
    ]
    expect(crossings(upright, levelStraights([upright, level]))).toEqual([[50, 40]])
    expect(crossings(level, levelStraights([upright, level]))).toEqual([])
  })

  it('are none where streams only meet', () => {
    const upright: Route = [
      [50, 0],
      [50, 100],
    ]
    const meets: Route = [
      [50, 40],
      [100, 40],
    ]
    expect(crossings(upright, levelStraights([meets]))).toEqual([])
  })
})

describe('tidied', () => {
  it('drops repeated points and those on a straight', () => {
    expect(
      tidied([
        [0, 0],
        [10, 0],
        [10, 0],
        [20, 0],
        [20, 5],
      ]),
    ).toEqual([
      [0, 0],
      [20, 0],
      [20, 5],
    ])
  })
})
