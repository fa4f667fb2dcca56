import { describe, expect, it } from 'vitest'
import { isobarPoints, PointList } from '../../src/balance/paths.ts'
import type { Geometry } from '../../web/chart/geometry.ts'
import { axisTicks, isobarLabels, roundedPressure } from '../../web/chart/isobar-labels.ts'
import { roundTicks } from '../../web/chart/view.ts'

/** The fitted view in a plot of 300 by 600 px. */
const geometry: Geometry = {
  plot: { x: 40, y: 30, width: 300, height: 600 },
  x0: 40,
  kx: 300 / 9200,
  y0: 630 + 273.15,
  ky: -1,
}
const chartWidth = 378
const width = (text: string) => 7 * text.length

function isobarsAt(pressures: readonly number[]) {
  const out = new PointList()
  const starts = [0]
  for (const p of pressures) {
    isobarPoints(p, out)
    starts.push(out.count)
  }
  return {
    pressures: Float64Array.from(pressures),
    points: out.copy(),
    starts: Uint32Array.from(starts),
  }
}

describe('the marks at the isobars', () => {
  const pressures = [5200, 26e3, 78e3, 2.1e5, 5.9e5, 13.5e5, 25e5, 27e5, 39e5, 130e5]
  const labels = isobarLabels(isobarsAt(pressures), geometry, chartWidth, 'metric', width)

  it('begin with the highest pressure and name the unit once', () => {
    expect(labels[0]).toMatchObject({ text: '130', unit: 'bar' })
    expect(labels.slice(1).every(({ unit }) => unit === '')).toBe(true)
    expect(labels.map(({ text }) => text)).toContain('0.052')
  })

  it('stand above the plot or right of it, within the chart', () => {
    const right = geometry.plot.x + geometry.plot.width
    for (const { x, y, width: wide, height } of labels) {
      expect(y + height <= geometry.plot.y || x >= right).toBe(true)
      expect(x + wide).toBeLessThanOrEqual(chartWidth)
    }
  })

  it('do not touch each other', () => {
    for (const [i, a] of labels.entries()) {
      for (const b of labels.slice(i + 1)) {
        const apart =
          a.x + a.width < b.x ||
          b.x + b.width < a.x ||
          a.y + a.height <= b.y ||
          b.y + b.height <= a.y
        expect(apart).toBe(true)
      }
    }
  })

  it('are none without isobars', () => {
    expect(isobarLabels(isobarsAt([]), geometry, chartWidth, 'metric', width)).toEqual([])
  })
})

describe('a pressure as a mark', () => {
  it('has two digits, or whole numbers from a hundred on', () => {
    expect(roundedPressure(130.4e5, 'metric').text).toBe('130')
    expect(roundedPressure(25.02e5, 'metric').text).toBe('25')
    expect(roundedPressure(6.2e5, 'metric').text).toBe('6.2')
    expect(roundedPressure(5200, 'metric').text).toBe('0.052')
  })
})

describe('the ticks of an axis', () => {
  it('are round in the unit shown and placed in SI', () => {
    const round = (low: number, high: number) => roundTicks(low, high, 6)
    const celsius = axisTicks([273.15, 873.15], 'temperature', 'metric', round)
    expect(celsius.unit).toBe('°C')
    expect(celsius.shown).toEqual([0, 100, 200, 300, 400, 500, 600])
    expect(celsius.si[1]).toBeCloseTo(373.15, 9)
    const fahrenheit = axisTicks([273.15, 873.15], 'temperature', 'us', round)
    // 200 °F is 366.483 K.
    expect(fahrenheit.shown[0]).toBe(200)
    expect(fahrenheit.si[0]).toBeCloseTo(366.4833, 4)
  })
})
