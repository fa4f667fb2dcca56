import { describe, expect, it } from 'vitest'
import { type Family, Tally, tryPlant } from '../fuzz/tally.ts'

/*
 * A short part of `npm run fuzz`, always the same plants: a change that makes one of them unsolvable,
 * or answered wrongly, shows here by its place. The long run is what counts.
 */

const seed = 7
const patience = 120_000

function tryMany(family: Family, count: number): { tally: Tally; faults: string[] } {
  const tally = new Tally()
  const faults: string[] = []
  for (let place = 0; place < count; place++) {
    const outcome = tryPlant(family, seed, place)
    tally.take(outcome)
    if (outcome.fault !== undefined) {
      faults.push(`${seed}:${place} ${outcome.spoiling ?? ''} ${outcome.fault}`)
    }
  }
  return { tally, faults }
}

describe('random plants', () => {
  it('with an answer are solved from their file alone', { timeout: patience }, () => {
    const { tally, faults } = tryMany('solvable', 80)
    expect(tally.used).toBeGreaterThan(75)
    expect(faults).toEqual([])
  })

  it('spoilt on purpose are answered rightly, and mended by what is offered', {
    timeout: patience,
  }, () => {
    const { tally, faults } = tryMany('unsolvable', 30)
    expect(tally.used).toBeGreaterThan(27)
    expect(faults).toEqual([])
  })

  it('are the same for the same seed and place', () => {
    const one = tryPlant('solvable', seed, 3)
    const other = tryPlant('solvable', seed, 3)
    expect({ ...other, milliseconds: 0 }).toEqual({ ...one, milliseconds: 0 })
  })
})
