import { expect, test } from 'vitest'
import { type Arranged, aligned, distributed } from '../../web/canvas/arranging.ts'

/** A body 4 px within its unit's corner. */
const unit = (id: string, x: number, y: number, width: number, height: number): Arranged => ({
  id,
  at: [x, y],
  body: { x: x + 4, y: y + 4, width, height },
})

const units = [unit('a', 0, 0, 24, 24), unit('b', 104, 40, 40, 40), unit('c', 80, 96, 56, 8)]

test('edges line up with the outermost, on the grid', () => {
  expect(aligned(units, 'left')).toEqual({ a: [0, 0], b: [0, 40], c: [0, 96] })
  expect(aligned(units, 'right')).toEqual({ a: [120, 0], b: [104, 40], c: [88, 96] })
  expect(aligned(units, 'top')).toEqual({ a: [0, 0], b: [104, 0], c: [80, 0] })
  expect(aligned(units, 'bottom')).toEqual({ a: [0, 80], b: [104, 64], c: [80, 96] })
})

test('middles line up halfway between the outermost', () => {
  // Middles at 16, 64 and 104: halfway 60.
  expect(aligned(units, 'across')).toEqual({ a: [0, 48], b: [104, 40], c: [80, 56] })
})

test('machines among each other line up by their shafts', () => {
  const machines = [
    { ...unit('hp', 0, 0, 80, 64), axis: 32 },
    { ...unit('lp', 160, 8, 120, 92), axis: 56 },
  ]
  const after = aligned(machines, 'across')
  expect((after.hp?.[1] ?? 0) + 32).toBe((after.lp?.[1] ?? 0) + 48)
})

test('gaps become equal; the outermost stay', () => {
  const row = [unit('a', 0, 0, 24, 24), unit('b', 40, 0, 40, 24), unit('c', 208, 0, 24, 24)]
  // 232 from end to end, 88 filled: two gaps of 72.
  expect(distributed(row, 'across')).toEqual({ a: [0, 0], b: [96, 0], c: [208, 0] })
  expect(distributed(row.slice(0, 2), 'across')).toEqual({})
})
