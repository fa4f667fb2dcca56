import { describe, expect, test } from 'vitest'
import {
  applyDifference,
  DifferenceMismatch,
  difference,
  invertDifference,
} from '../../src/plant/difference.ts'
import { removeItems } from '../../src/plant/edit/remove-items.ts'
import { setGiven } from '../../src/plant/edit/set-given.ts'
import { addUnit, moveUnits } from '../../src/plant/edit/units.ts'
import { base, layoutOf, tappedMill } from './edit/sample-plant.ts'
import { invented } from './invented-catalogue.ts'

describe('a difference', () => {
  const plant = tappedMill()

  test('holds no more than what changed', () => {
    const given = setGiven(plant, base, 's1.m', 5, invented)
    expect(difference(plant, given)).toEqual({
      changes: [{ at: ['layouts', 0, 'streams', 0, 'given', 'm'], after: 5 }],
    })
    const changed = setGiven(given, base, 's1.m', 6, invented)
    expect(difference(given, changed)).toEqual({
      changes: [{ at: ['layouts', 0, 'streams', 0, 'given', 'm'], before: 5, after: 6 }],
    })
    const { plant: added } = addUnit(plant, base, 'tub', [0, 0], invented)
    expect(difference(plant, added)).toEqual({
      changes: [
        { at: ['layouts', 0, 'units'], index: 3, removed: [], added: [layoutOf(added).units[3]] },
      ],
    })
    const moved = moveUnits(plant, base, ['mill1'], [8, 0])
    expect(difference(plant, moved).changes).toHaveLength(1)
    expect(difference(plant, plant)).toEqual({ changes: [] })
    // Equal in every part, though not the same: nothing changed.
    expect(difference(plant, structuredClone(plant))).toEqual({ changes: [] })
  })

  test('leads there and back, and shares what it does not touch', () => {
    const after = removeItems(plant, base, ['s3'], invented)
    const change = difference(plant, after)
    const there = applyDifference(plant, change)
    expect(there).toEqual(after)
    expect(layoutOf(there).units[0]).toBe(layoutOf(plant).units[0])
    expect(applyDifference(there, invertDifference(change))).toEqual(plant)
  })

  test('does not apply to a plant that it does not start from', () => {
    const given = setGiven(plant, base, 's1.m', 5, invented)
    const freeing = invertDifference(difference(plant, given))
    expect(() => applyDifference(plant, freeing)).toThrow(DifferenceMismatch)
    const bare = removeItems(plant, base, ['kettle1', 'mill1', 'tub1'], invented)
    const undo = invertDifference(
      difference(plant, addUnit(plant, base, 'tub', [0, 0], invented).plant),
    )
    expect(() => applyDifference(bare, undo)).toThrow(DifferenceMismatch)
  })
})
