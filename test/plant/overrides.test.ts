import { describe, expect, test } from 'vitest'
import { setGiven } from '../../src/plant/edit/set-given.ts'
import { applyOverrides } from '../../src/plant/overrides.ts'
import { givenOf } from '../../src/plant/quantities.ts'
import { base, layoutOf, tappedMill } from './edit/sample-plant.ts'
import { invented } from './invented-catalogue.ts'

const layout = layoutOf(setGiven(tappedMill(), base, 's1.m', 5, invented))
const override = (free: string[], set: Record<string, number>) =>
  applyOverrides(layout, { free, set }, invented)

describe('freeing and setting by path', () => {
  test('first all are freed, then all are set', () => {
    const result = override(['s1.m', 'mill1.skill1'], { 's1.m': 7, 'plant.netPower': 4e7 })
    if (result.outcome === 'unusable') throw new Error(result.message)
    expect(givenOf(result.layout, 's1.m')).toBe(7)
    expect(givenOf(result.layout, 'mill1.skill1')).toBeUndefined()
    expect(givenOf(result.layout, 'plant.netPower')).toBe(4e7)
    expect(result.remarks).toEqual([])
    expect(givenOf(layout, 's1.m')).toBe(5)
    expect(result.layout.units[0]).toBe(layout.units[0])
  })

  test('freeing what is not given is remarked', () => {
    expect(override(['s2.p', 'plant.netPower', 's1.m'], {})).toMatchObject({
      outcome: 'layout',
      remarks: [
        { severity: 'remark', where: ['s2'], quantities: ['s2.p'] },
        { severity: 'remark', where: [], quantities: ['plant.netPower'] },
      ],
    })
  })

  test.each([
    [['s1.q'], {}, /^s1\.q: .*s1 has no quantity q/],
    [['mil1.skill1'], {}, /^mil1\.skill1: .*Did you mean mill1\?/],
    [[], { 'mill1.skil1': 1 }, /^\["mill1\.skil1"\]|^mill1\.skil1: .*Did you mean skill1\?/],
    [[], { netPower: 1 }, /dot/],
    [[], { 'plant.netPowr': 1 }, /Did you mean netPower\?/],
    [[], { 's1.m': Number.NaN }, /^s1\.m: .*not finite/],
    [[], { 'mill1.lift1': 1 }, /options and streams/],
  ])('%j, %j is refused by name', (free, set, why) => {
    const result = override(free, set as Record<string, number>)
    expect(result).toMatchObject({ outcome: 'unusable', message: expect.stringMatching(why) })
  })
})
