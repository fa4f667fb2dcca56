import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import type { Dimension } from '../../src/quantity/dimension.ts'
import { parseQuantity } from '../../src/quantity/parse-quantity.ts'
import { unitSets } from '../../src/quantity/unit-set.ts'
import { allUnitsOf, dimensions, fromShown } from '../../src/quantity/units-of-measure.ts'

function read(text: string, dimension: Dimension, unit?: string): number {
  const result = parseQuantity(text, dimension, 'metric', unit === undefined ? {} : { unit })
  if (result.outcome !== 'value') throw new Error(result.message)
  return result.value
}

function refusal(text: string, dimension: Dimension): string {
  const result = parseQuantity(text, dimension, 'metric')
  if (result.outcome === 'value') throw new Error(`${text} was read as ${result.value}`)
  return result.message
}

describe('what users type', () => {
  // Figures from the factors of NIST SP 811 (psi 6894.757 Pa), worked out by hand.
  test.each<[string, Dimension, number]>([
    ['180 psi', 'pressure', 1.241056e6],
    ['180 psia', 'pressure', 1.241056e6],
    ['0.1 bar', 'pressure', 1e4],
    ['0.1bar', 'pressure', 1e4],
    ['12 bar abs', 'pressure', 12e5],
    ['12 bara', 'pressure', 12e5],
    ['10 ata', 'pressure', 980665],
    ['3.5/4 MPa', 'pressure', 0.875e6],
    ['5 mpa', 'pressure', 5e6],
    ['700 kPa(a)', 'pressure', 7e5],
    ['540 F', 'temperature', 555.3722],
    ['540 °F', 'temperature', 555.3722],
    ['540 deg F', 'temperature', 555.3722],
    ['540 C', 'temperature', 813.15],
    ['540 º C', 'temperature', 813.15],
    ['540', 'temperature', 813.15],
    ['813.15 K', 'temperature', 813.15],
    ['9 F', 'temperatureDifference', 5],
    ['60 %', 'ratio', 0.6],
    ['60', 'ratio', 0.6],
    ['60 percent', 'ratio', 0.6],
    ['0.6 fraction', 'ratio', 0.6],
    ['1e5 Pa', 'pressure', 1e5],
    ['1e5', 'number', 1e5],
    ['952 397 lb/hr', 'massFlow', 120],
    ['432 t/h', 'massFlow', 120],
    ['1000 Btu/lbm', 'specificEnthalpy', 2.326e6],
    ['1 Btu/lb/R', 'specificEntropy', 4186.8],
    ['1 kJ/kg·K', 'specificEntropy', 1000],
    ['1 kJ/kg-K', 'specificEntropy', 1000],
    ['1 kJ/(kg·K)', 'specificHeat', 1000],
    ['3412.14 Btu/kWh', 'heatRate', 1],
    ['3600 kJ per kWh', 'heatRate', 1],
    ['1.2 × 10⁻⁵', 'flowConstant', 1.2e-5],
    ['1.2*10^3 kW', 'power', 1.2e6],
    ['(12+3)*2', 'massFlow', 30],
    ['−1.0', 'temperatureDifference', -1],
    ['-(2+1) K', 'temperatureDifference', -3],
  ])('%s as a %s', (text, dimension, si) => {
    const value = read(text, dimension)
    expect(Math.abs(value - si)).toBeLessThanOrEqual(1e-6 * Math.abs(si))
  })

  test('a bare number has the unit that the field shows', () => {
    expect(read('80', 'power', 'kW')).toBe(80e3)
    expect(read('80', 'power', 'MW')).toBe(80e6)
    expect(read('80 kW', 'power', 'MW')).toBe(80e3)
  })

  test('every unit is read by each of its names', () => {
    for (const dimension of dimensions) {
      for (const unit of allUnitsOf(dimension)) {
        for (const name of [unit.name, ...(unit.also ?? [])]) {
          if (name === '') continue
          expect([dimension, name, read(`2.5 ${name}`, dimension)]).toEqual([
            dimension,
            name,
            fromShown(2.5, unit),
          ])
        }
      }
    }
  })
})

describe('gauge pressure and vacuum', () => {
  // The standard atmosphere is 101 325 Pa, 760 mmHg, 29.92 inHg, 14.696 psi.
  test.each([
    ['12 barg', 13.01325e5],
    ['12 bar(g)', 13.01325e5],
    ['12 bar g', 13.01325e5],
    ['12 bar gauge', 13.01325e5],
    ['0 psig', 101325],
    ['100 kPag', 201325],
    ['10 atü', 980665 + 101325],
    ['700 mmHg vacuum', 101325 - 700 * 133.3224],
    ['60 mmHg vac', 101325 - 60 * 133.3224],
    ['28 inHg vac.', 101325 - 28 * 3386.389],
    ['-0.5 barg', 51325],
  ])('%s is flagged and converted', (text, pascal) => {
    const result = parseQuantity(text, 'pressure', 'metric')
    expect(result).toMatchObject({ outcome: 'value', gauge: true })
    if (result.outcome !== 'value') return
    expect(Math.abs(result.value - pascal)).toBeLessThan(1)
    expect(result.note).toContain('absolute')
    expect(result.note).toContain('1.01325 bar')
  })

  // The edges: nothing at all is left at full vacuum, and the atmosphere begins where gauge does.
  test.each([
    ['0 barg', 101325],
    ['0 mmHg vacuum', 101325],
    ['-1.01325 barg', 0],
    ['1.01325 bar vacuum', 0],
    ['101325 Pa vacuum', 0],
    ['101.325 kPa vac', 0],
    ['760 Torr vacuum', 0],
    ['1 atm vacuum', 0],
    ['0.0001 barg', 101335],
    ['-101.324 kPag', 1],
    // 1 psi is 6894.757 Pa, 1 inHg 3386.389 Pa, 1 mmHg 133.3224 Pa (NIST SP 811, B.8).
    ['-14.69 psig', 101325 - 14.69 * 6894.757],
    ['29.92 inHg vacuum', 101325 - 29.92 * 3386.389],
    ['759.9 mmHg vacuum', 101325 - 759.9 * 133.3224],
    ['3000 psig', 3000 * 6894.757 + 101325],
  ])('%s, at an edge', (text, pascal) => {
    const result = parseQuantity(text, 'pressure', 'metric')
    expect(result).toMatchObject({ outcome: 'value', gauge: true })
    if (result.outcome !== 'value') return
    expect(result.value).toBeGreaterThanOrEqual(0)
    expect(Math.abs(result.value - pascal)).toBeLessThanOrEqual(2e-7 * 101325 + 2e-7 * pascal)
  })

  test.each(['760.1 mmHg vacuum', '29.93 inHg vacuum', '-14.7 psig', '-1.01326 barg'])(
    '%s is beyond full vacuum',
    (text) => {
      expect(refusal(text, 'pressure')).toMatch(/full vacuum.*1\.01325 bar/)
    },
  )

  test('what is typed means the same whatever set is shown', () => {
    for (const text of ['12 barg', '60 mmHg vac', '180 psi', '0.1 bar', '5 kPa']) {
      const [first, ...others] = unitSets.map(({ name }) => parseQuantity(text, 'pressure', name))
      for (const other of others) {
        expect(other).toMatchObject({ outcome: 'value', value: (first as { value: number }).value })
      }
    }
  })

  test('the note tells the absolute pressure in the unit shown', () => {
    const note = (text: string, unit: string) => {
      const result = parseQuantity(text, 'pressure', 'metric', { unit })
      return result.outcome === 'value' ? result.note : result.message
    }
    expect(note('12 barg', 'bar')).toBe(
      'Gauge pressure, taken as 13.01 bar absolute with the standard atmosphere of 1.01325 bar.',
    )
    expect(note('700 mmHg vacuum', 'kPa')).toBe(
      'Vacuum, taken as 7.999 kPa absolute with the standard atmosphere of 101.325 kPa.',
    )
    expect(note('0 psig', 'psia')).toMatch(/^Gauge pressure, taken as 14\.70 psia absolute/)
  })

  test('an absolute pressure is not flagged', () => {
    expect(parseQuantity('12 bar', 'pressure', 'metric')).toEqual({ outcome: 'value', value: 12e5 })
    expect(parseQuantity('60 mmHg', 'pressure', 'metric')).not.toHaveProperty('gauge')
  })

  test('a difference has no gauge; a vacuum has an end', () => {
    expect(refusal('1 barg', 'pressureDifference')).toContain('neither gauge nor absolute')
    expect(refusal('800 mmHg vacuum', 'pressure')).toContain('full vacuum')
    expect(refusal('-2 barg', 'pressure')).toContain('full vacuum')
  })
})

describe('what cannot be read says why, and what to write', () => {
  test.each<[string, Dimension, RegExp]>([
    ['', 'massFlow', /^Nothing is written\. Write it like 100 kg\/s\.$/],
    ['   ', 'massFlow', /^Nothing is written\./],
    ['1,5', 'pressure', /comma.*point/],
    ['1.234,5 bar', 'pressure', /comma/],
    ['12,000 lb/h', 'massFlow', /comma/],
    ['abc', 'pressure', /abc is not a number/],
    ['1.2.3', 'number', /not a number/],
    ['5)', 'number', /too many/],
    ['(5', 'number', /bracket is missing/],
    ['5*', 'massFlow', /\* is not a unit/],
    ['1/0', 'number', /divides by zero/],
    ['1e999', 'number', /finite/],
    ['5 mPa', 'pressure', /write MPa/],
    ['5 mW', 'power', /write MW/],
    ['540 F', 'pressure', /F is a unit of temperature; here a pressure is wanted, in bar/],
    ['5 furlongs', 'length', /furlongs is not a unit known for a length\. Write m/],
    ['-300 C', 'temperature', /absolute zero/],
    ['-1 bar', 'pressure', /cannot be negative/],
    ['NaN', 'pressure', /not a number/],
    ['Infinity', 'pressure', /not a number/],
  ])('%j as a %s', (text, dimension, expected) => {
    expect(refusal(text, dimension)).toMatch(expected)
  })

  test('no text throws or gives what is not a number', { timeout: 60_000 }, () => {
    const pieces = fc.constantFrom(
      '1',
      '.',
      '5e',
      '(',
      ')',
      '-',
      '/',
      '*',
      ' ',
      'bar',
      'g',
      '%',
      '⁻⁵',
      ',',
    )
    const text = fc.oneof(
      fc.string({ unit: 'binary' }),
      fc.array(pieces).map((parts) => parts.join('')),
      fc.constant('('.repeat(100_000)),
    )
    fc.assert(
      fc.property(text, fc.constantFrom(...dimensions), (typed, dimension) => {
        const result = parseQuantity(typed, dimension, 'us')
        if (result.outcome === 'value') expect(Number.isFinite(result.value)).toBe(true)
        else expect(result.message.length).toBeGreaterThan(10)
      }),
    )
  })
})
