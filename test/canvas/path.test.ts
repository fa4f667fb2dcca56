import { describe, expect, it } from 'vitest'
import { arrowOf, pathOf } from '../../web/canvas/path.ts'
import { arrowSize, patternOf, streamWidth } from '../../web/canvas/stream-style.ts'

describe('pathOf', () => {
  it('rounds corners with 6 px and holds the end back for the arrow', () => {
    const path = pathOf(
      [
        [0, 0],
        [100, 0],
        [100, 80],
      ],
      [],
      10,
    )
    expect(path).toBe('M0 0L94 0Q100 0 100 6L100 70')
  })

  it('bridges a crossing to the right, whichever way the stream runs', () => {
    const down = pathOf(
      [
        [0, 0],
        [0, 100],
      ],
      [[0, 50]],
      0,
    )
    expect(down).toBe('M0 0V44a6 6 0 0 1 0 12L0 100')
    const up = pathOf(
      [
        [0, 100],
        [0, 0],
      ],
      [[0, 50]],
      0,
    )
    expect(up).toBe('M0 100V56a6 6 0 0 0 0 -12L0 0')
  })

  it('draws no bridge where a corner is too near', () => {
    const path = pathOf(
      [
        [0, 0],
        [0, 100],
      ],
      [[0, 4]],
      0,
    )
    expect(path).toBe('M0 0L0 100')
  })
})

describe('arrowOf', () => {
  it('has its tip at the consumer', () => {
    expect(
      arrowOf(
        [
          [0, 0],
          [50, 0],
        ],
        10,
        4,
      ),
    ).toBe('M50 0L40 -4L40 4Z')
  })
})

describe('the style of streams', () => {
  it('lets area carry the flow: width 1.25 px and up to 4.5 more by the root of the share', () => {
    expect(streamWidth(120, 120)).toBe(5.75)
    expect(streamWidth(30, 120)).toBe(3.5)
    expect(streamWidth(0, 120)).toBe(1.25)
    expect(streamWidth(null, 0)).toBe(1.25)
  })

  it('shows phase as pattern, and no flow or no answer as neither', () => {
    expect(patternOf('liquid', 3)).toBe('liquid')
    expect(patternOf('wet', 3)).toBe('wet')
    expect(patternOf('vapour', 3)).toBe('steam')
    expect(patternOf('vapour', 0)).toBe('none')
    expect(patternOf('none', null)).toBe('none')
  })

  it('draws larger arrows on wider streams', () => {
    expect(arrowSize(5.75).half).toBeGreaterThan(arrowSize(1.25).half)
  })
})
