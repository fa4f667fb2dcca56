import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import type { Dimension } from '../../src/quantity/dimension.ts'
import { type FormatOptions, formatQuantity } from '../../src/quantity/format-quantity.ts'
import { parseQuantity } from '../../src/quantity/parse-quantity.ts'
import { unitSets } from '../../src/quantity/unit-set.ts'
import { dimensions, unitsOf } from '../../src/quantity/units-of-measure.ts'

const metric = (value: number, dimension: Dimension, options?: FormatOptions) => {
  const { text, unit } = formatQuantity(value, dimension, 'metric', options)
  return `${text} ${unit}`.trim()
}

describe('the digits a value deserves', () => {
  test.each<[number, Dimension, string]>([
    [130e5, 'pressure', '130.0 bar'],
    [25.018e5, 'pressure', '25.02 bar'],
    [6.2e5, 'pressure', '6.200 bar'],
    [5200, 'pressure', '0.0520 bar'],
    [9.99996e5, 'pressure', '10.00 bar'],
    [813.15, 'temperature', '540.0 °C'],
    [-1, 'temperatureDifference', '−1.0 K'],
    [120, 'massFlow', '120.0 kg/s'],
    [5.4644, 'massFlow', '5.464 kg/s'],
    [3445.06e3, 'specificEnthalpy', '3445.1 kJ/kg'],
    [6576.5, 'specificEntropy', '6.5765 kJ/(kg K)'],
    [0.00109312, 'specificVolume', '0.001093 m³/kg'],
    [0.26409, 'specificVolume', '0.2641 m³/kg'],
    [0.93472, 'dryness', '0.9347'],
    [0.4005, 'ratio', '40.05 %'],
    [2.226e6, 'power', '2.226 MW'],
    [76.2e3, 'power', '76.20 kW'],
    [8988.5 / 3600, 'heatRate', '8988.5 kJ/kWh'],
    [927.7e3, 'conductance', '927.7 kW/K'],
    [12_345_600, 'conductance', '12\u202f346 kW/K'],
    [0.8, 'number', '0.8'],
  ])('%d %s', (value, dimension, expected) => {
    expect(metric(value, dimension)).toBe(expected)
  })

  test('what rounds to nothing is a plain zero, never minus zero', () => {
    expect(metric(-1e-14, 'temperatureDifference')).toBe('0.0 K')
    expect(metric(-1e-14, 'massFlow')).toBe('0 kg/s')
    expect(metric(-0, 'power')).toBe('0 MW')
  })

  test('a given value keeps the digits it was given', () => {
    const given = { digits: 'given' } as const
    expect(metric(0.015, 'ratio', given)).toBe('1.5 %')
    expect(metric(0.87123, 'ratio', given)).toBe('87.123 %')
    expect(metric(5.65, 'temperatureDifference', given)).toBe('5.65 K')
    expect(metric(130e5, 'pressure', given)).toBe('130.0 bar')
    expect(metric(1e-7, 'massFlow', given)).toBe('0.0000001 kg/s')
    // A third has no end: no more digits than a solved value.
    expect(metric(1 / 3, 'massFlow', given)).toBe('0.3333 kg/s')
  })

  test('a value given in another unit has the digits of any value', () => {
    const inUs = (value: number, dimension: Dimension) =>
      formatQuantity(value, dimension, 'us', { digits: 'given' }).text
    expect(inUs(6.2e5, 'pressure')).toBe('89.92')
    for (let tenths = 1; tenths < 1000; tenths++) {
      const bar = inUs(tenths * 1e4, 'pressure').replace(/\D/g, '')
      expect(bar.length, `${tenths / 10} bar`).toBeLessThanOrEqual(5)
      // Tenths of a kelvin are hundredths of a degree Fahrenheit: these have an end.
      const degrees = inUs(273.15 + tenths / 10, 'temperature')
      expect(Number(degrees)).toBeCloseTo(32 + 0.18 * tenths, 8)
      expect(metric(273.15 + tenths / 1000, 'temperature', { digits: 'given' })).toBe(
        `${(tenths / 1000).toFixed(3).replace(/0{1,2}$/, '')} °C`,
      )
    }
  })

  test('a column keeps its unit, a change its sign', () => {
    expect(metric(76.2e3, 'power', { unit: 'MW' })).toBe('0.076 MW')
    expect(metric(1.5, 'temperatureDifference', { signed: true })).toBe('+1.5 K')
    expect(metric(-1.5, 'temperatureDifference', { signed: true })).toBe('−1.5 K')
    expect(metric(1e-9, 'temperatureDifference', { signed: true })).toBe('0.0 K')
  })

  test('sizes beyond reason take a power of ten', () => {
    expect(metric(1.2345e21, 'power')).toBe('1.234 × 10¹⁵ MW')
    expect(metric(1e-12, 'pressure', { digits: 'given' })).toBe('1 × 10⁻¹⁷ bar')
  })

  test('not a number is a dash', () => {
    for (const value of [Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]) {
      expect(formatQuantity(value, 'power', 'us')).toEqual({ text: '–', unit: 'MW' })
    }
  })
})

describe('whatever the value', () => {
  const anyUnit = fc.constantFrom(
    ...dimensions.flatMap((dimension) =>
      unitsOf(dimension).map(({ name }) => [dimension, name] as const),
    ),
  )
  const anySet = fc.constantFrom(...unitSets.map(({ name }) => name))

  test('the text holds figures and no NaN', { timeout: 60_000 }, () => {
    fc.assert(
      fc.property(fc.double(), fc.constantFrom(...dimensions), anySet, (value, dimension, set) => {
        for (const digits of ['shown', 'given', 'all'] as const) {
          const { text } = formatQuantity(value, dimension, set, { digits })
          expect(text).not.toMatch(/NaN|Infinity|undefined/)
          if (Math.abs(value) < 1e290) expect(text).toMatch(/\d/)
          if (!Number.isFinite(value)) expect(text).toBe('–')
        }
      }),
    )
  })

  test('the text for editing brings the value back', { timeout: 60_000 }, () => {
    const value = fc.double({ min: 1e-9, max: 1e12, noNaN: true })
    fc.assert(
      fc.property(value, anyUnit, anySet, (si, [dimension, unit], set) => {
        const { text } = formatQuantity(si, dimension, set, { digits: 'all', unit })
        const read = parseQuantity(text, dimension, set, { unit })
        expect(read.outcome).toBe('value')
        if (read.outcome !== 'value') return
        // Temperatures near absolute zero lose digits to the shift of their scale.
        const size = dimension === 'temperature' ? Math.max(si, 300) : si
        expect(Math.abs(read.value - si)).toBeLessThanOrEqual(1e-14 * size)
      }),
    )
  })

  test('the text shown can be typed again, digit groups, minus and all', {
    timeout: 60_000,
  }, () => {
    const value = fc.double({ min: 1, max: 1e9, noNaN: true })
    fc.assert(
      fc.property(value, anyUnit, (si, [dimension, unit]) => {
        const shown = formatQuantity(si, dimension, 'si', { unit })
        const read = parseQuantity(`${shown.text} ${shown.unit}`, dimension, 'metric')
        expect(read.outcome).toBe('value')
      }),
    )
  })
})
