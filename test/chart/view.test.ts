import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  fittedView,
  panned,
  roundTicks,
  tickDigits,
  type View,
  zoomed,
} from '../../web/chart/view.ts'

const whole: View = { s: [0, 9200], y: [273.15, 873.15] }

describe('the fitted view', () => {
  it('holds the dome foot, 0 °C and the hottest state with room above it', () => {
    const view = fittedView(838, 7600)
    // s'' at 273.15 K is 9.156 kJ/(kg K): IAPWS R7-97(2012), by its equations.
    expect(view.s[0]).toBe(0)
    expect(view.s[1]).toBeGreaterThanOrEqual(9156)
    expect(view.y[0]).toBe(273.15)
    expect(view.y[1]).toBeGreaterThan(838 + 20)
  })

  it('does not shift with a small edit', () => {
    expect(fittedView(813.15, 7600)).toEqual(fittedView(815, 7650))
  })

  it('serves an empty plant', () => {
    expect(fittedView(Number.NEGATIVE_INFINITY, 0)).toEqual(whole)
    expect(fittedView(Number.NaN, Number.NaN)).toEqual(whole)
  })
})

describe('zooming', () => {
  it('leaves the point under the pointer where it is', () => {
    const view = zoomed(whole, 0.5, 6500, 600)
    expect((6500 - view.s[0]) / (view.s[1] - view.s[0])).toBeCloseTo(6500 / 9200, 10)
    expect((600 - view.y[0]) / (view.y[1] - view.y[0])).toBeCloseTo((600 - 273.15) / 600, 10)
    expect(view.y[1] - view.y[0]).toBeCloseTo(300, 10)
  })

  it('and panning never leave a view that cannot be drawn', () => {
    const step = fc.record({
      factor: fc.double({ min: 0.01, max: 100, noNaN: true }),
      s: fc.double({ min: 0, max: 9200, noNaN: true }),
      T: fc.double({ min: 274, max: 1000, noNaN: true }),
    })
    fc.assert(
      fc.property(fc.array(step, { maxLength: 12 }), (steps) => {
        let view = whole
        for (const { factor, s, T } of steps) {
          view = panned(zoomed(view, factor, s, T), s - 4600, T - 600)
          expect(view.s[1] - view.s[0]).toBeGreaterThanOrEqual(149)
          expect(view.y[1] - view.y[0]).toBeGreaterThanOrEqual(9.9)
          expect(view.s[0]).toBeGreaterThanOrEqual(-1501)
          expect(view.y[1]).toBeLessThanOrEqual(1401)
        }
      }),
    )
  })

  it('out and in again comes back', () => {
    const view = zoomed(zoomed(whole, 1.1, 5000, 500), 1 / 1.1, 5000, 500)
    expect(view.s[0]).toBeCloseTo(0, 6)
    expect(view.y[1]).toBeCloseTo(873.15, 6)
  })
})

describe('ticks', () => {
  it('are round, within the ends, and about as many as asked for', () => {
    expect(roundTicks(0, 9.2, 8)).toEqual([0, 2, 4, 6, 8])
    expect(roundTicks(0, 9.2, 9.5)).toEqual([0, 1, 2, 3, 4, 5, 6, 7, 8, 9])
    expect(roundTicks(0, 600, 7)).toEqual([0, 100, 200, 300, 400, 500, 600])
    expect(roundTicks(32, 1112, 7)).toEqual([200, 400, 600, 800, 1000])
    expect(roundTicks(-0.4, 0.4, 4)).toEqual([-0.4, -0.2, 0, 0.2, 0.4])
  })

  it('are none where there is no range', () => {
    expect(roundTicks(1, 1, 5)).toEqual([])
    expect(roundTicks(Number.NaN, 5, 5)).toEqual([])
  })

  it('show the digits that tell them apart', () => {
    expect(tickDigits([0, 100, 200])).toBe(0)
    expect(tickDigits([6.2, 6.4])).toBe(1)
    expect(tickDigits([6.25, 6.3, 6.35])).toBe(2)
    expect(tickDigits([0.5, 1])).toBe(1)
  })
})
