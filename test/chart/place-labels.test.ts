import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  InkGrid,
  type LabelRequest,
  type PlacedLabel,
  placeLabels,
  type Rectangle,
} from '../../web/chart/place-labels.ts'

const bounds = { x: 0, y: 0, width: 300, height: 500 }

function label(id: string, x: number, y: number, width = 60, height = 14): LabelRequest {
  return { id, x, y, width, height }
}

function overlap(a: Rectangle, b: Rectangle): boolean {
  return a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height
}

function within(a: Rectangle): boolean {
  return (
    a.x >= bounds.x &&
    a.y >= bounds.y &&
    a.x + a.width <= bounds.x + bounds.width &&
    a.y + a.height <= bounds.y + bounds.height
  )
}

describe('placing labels', () => {
  it('never lays one over another or over what is taken, whatever the points', () => {
    const requests = fc.array(
      fc.record({
        x: fc.integer({ min: -20, max: 320 }),
        y: fc.integer({ min: -20, max: 520 }),
        width: fc.integer({ min: 5, max: 140 }),
      }),
      { maxLength: 14 },
    )
    const boxes = fc.array(
      fc.record({
        x: fc.integer({ min: 0, max: 280 }),
        y: fc.integer({ min: 0, max: 480 }),
        width: fc.integer({ min: 1, max: 80 }),
        height: fc.integer({ min: 1, max: 40 }),
      }),
      { maxLength: 4 },
    )
    fc.assert(
      fc.property(requests, boxes, (points, taken) => {
        const placed = placeLabels(
          points.map(({ x, y, width }, i) => label(`${i}`, x, y, width)),
          bounds,
          { taken },
        )
        for (const [i, one] of placed.entries()) {
          expect(within(one)).toBe(true)
          expect(taken.some((box) => overlap(one, box))).toBe(false)
          expect(placed.slice(i + 1).some((other) => overlap(one, other))).toBe(false)
        }
      }),
      { numRuns: 300 },
    )
  })

  it('places every label where there is room, beside its point', () => {
    const requests = [label('a', 150, 60), label('b', 150, 200), label('c', 150, 350)]
    const placed = placeLabels(requests, bounds)
    expect(placed.map(({ id }) => id)).toEqual(['a', 'b', 'c'])
    for (const [i, one] of placed.entries()) {
      const { x, y } = requests[i] as LabelRequest
      expect(one.leader).toBe(false)
      expect(Math.abs(one.x + one.width - x)).toBeLessThan(12)
      expect(Math.abs(one.y + one.height / 2 - y)).toBeLessThan(1)
    }
  })

  it('leaves out the later ones of more than fit', () => {
    const crowd = Array.from({ length: 60 }, (_, i) => label(`${i}`, 150, 250, 100))
    const placed = placeLabels(crowd, bounds)
    expect(placed.length).toBeGreaterThan(3)
    expect(placed.length).toBeLessThan(crowd.length)
    expect(placed[0]?.id).toBe('0')
  })

  it('keeps clear of the lines when another side is free', () => {
    const grid = new InkGrid(bounds)
    grid.addLine(0, 100, 148, 100, 5)
    const [placed] = placeLabels([label('a', 150, 100)], bounds, { ink: grid.inkIn })
    expect(placed?.x).toBeGreaterThan(150)
    expect(grid.inkIn(placed as Rectangle)).toBe(0)
  })

  it('keeps a label where it was while the place still serves', () => {
    const before = placeLabels([label('a', 150, 100)], bounds, {
      ink: ({ x }) => (x < 150 ? 20 : 0),
    })
    expect((before[0] as PlacedLabel).x).toBeGreaterThan(150)
    // The left side is free again, but not better by enough to make the label jump.
    const [kept] = placeLabels([label('a', 152, 101)], bounds, { before })
    expect(kept?.place).toBe(before[0]?.place)
    const [moved] = placeLabels([label('a', 152, 101)], bounds, {
      before,
      ink: ({ x }) => (x < 150 ? 0 : 50),
    })
    expect(moved?.place).not.toBe(before[0]?.place)
  })
})

describe('the grid of ink', () => {
  it('counts the heaviest line of each cell and nothing elsewhere', () => {
    const grid = new InkGrid(bounds, 10)
    grid.addLine(5, 5, 95, 5, 2)
    grid.addLine(5, 6, 95, 6, 3)
    expect(grid.inkIn({ x: 0, y: 0, width: 99, height: 9 })).toBe(30)
    expect(grid.inkIn({ x: 0, y: 20, width: 99, height: 9 })).toBe(0)
  })

  it('takes lines that leave the sheet', () => {
    const grid = new InkGrid(bounds)
    grid.addLine(-50, 100, 400, 100, 1)
    grid.addLine(0, 0, Number.NaN, 10, 1)
    grid.addLine(0, 0, 1e12, 10, 1)
    expect(grid.inkIn({ x: 280, y: 95, width: 19, height: 10 })).toBeGreaterThan(0)
  })
})
