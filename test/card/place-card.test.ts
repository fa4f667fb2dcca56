import fc from 'fast-check'
import { expect, test } from 'vitest'
import { type Box, type Obstacle, placeCard } from '../../web/card/place-card.ts'

const area = { width: 900, height: 560 }
const size = { width: 240, height: 200 }

const covers = (place: { left: number; top: number }, box: Box): boolean =>
  place.left < box.left + box.width &&
  box.left < place.left + size.width &&
  place.top < box.top + box.height &&
  box.top < place.top + size.height

test('the card stands beside the selected thing and covers none of what is drawn', () => {
  const unit: Obstacle = { left: 400, top: 250, width: 60, height: 40, weight: 20 }
  const place = placeCard(size, area, [unit], unit, null)
  expect(covers(place, unit)).toBe(false)
  expect(Math.hypot(place.left + 120 - 430, place.top + 100 - 270)).toBeLessThan(240)
})

test('a place that covers nothing is kept, one that has come to cover something is left', () => {
  const unit: Obstacle = { left: 700, top: 400, width: 60, height: 40, weight: 4 }
  const kept = placeCard(size, area, [unit], unit, { left: 40, top: 40 })
  expect(kept).toEqual({ left: 40, top: 40 })
  const line: Obstacle = { left: 100, top: 0, width: 12, height: 560, weight: 1 }
  const moved = placeCard(size, area, [unit, line], unit, { left: 40, top: 40 })
  expect(covers(moved, line)).toBe(false)
  expect(covers(moved, unit)).toBe(false)
})

test('where something must be covered it is lines rather than symbols', () => {
  const lines: Obstacle[] = Array.from({ length: 30 }, (_, i) => ({
    left: 30 * i,
    top: 0,
    width: 12,
    height: 560,
    weight: 1,
  }))
  const unit: Obstacle = { left: 0, top: 0, width: 900, height: 300, weight: 20 }
  const place = placeCard(size, area, [...lines, unit], unit, null)
  expect(covers(place, unit)).toBe(false)
})

test('the card stays within the canvas wherever things stand', () => {
  const box = fc.record({
    left: fc.integer({ min: -200, max: 1000 }),
    top: fc.integer({ min: -200, max: 700 }),
    width: fc.integer({ min: 1, max: 400 }),
    height: fc.integer({ min: 1, max: 400 }),
    weight: fc.constantFrom(1, 4, 20),
  })
  fc.assert(
    fc.property(fc.array(box, { maxLength: 20 }), (obstacles) => {
      const place = placeCard(size, area, obstacles, obstacles[0] ?? null, null)
      expect(place.left).toBeGreaterThanOrEqual(0)
      expect(place.top).toBeGreaterThanOrEqual(0)
      expect(place.left + size.width).toBeLessThanOrEqual(area.width)
      expect(place.top + size.height).toBeLessThanOrEqual(area.height)
    }),
    { numRuns: 60 },
  )
})
