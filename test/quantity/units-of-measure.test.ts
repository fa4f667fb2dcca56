import { describe, expect, test } from 'vitest'
import type { Dimension } from '../../src/quantity/dimension.ts'
import { unitSets } from '../../src/quantity/unit-set.ts'
import {
  allUnitsOf,
  dimensionLabel,
  dimensions,
  fromShown,
  standardAtmosphere,
  toShown,
  unitNamed,
  unitOf,
  unitsOf,
} from '../../src/quantity/units-of-measure.ts'

/**
 * NIST Special Publication 811 (2008), appendix B.8: factors to the coherent SI unit, in the printed
 * digits. `exact`: printed in bold, all further digits zero.
 */
const published: readonly (readonly [Dimension, string, number, 'exact' | 'rounded'])[] = [
  ['pressure', 'bar', 1e5, 'exact'],
  ['pressure', 'mbar', 1e2, 'exact'],
  ['pressure', 'atm', 1.01325e5, 'exact'],
  ['pressure', 'kgf/cm²', 9.80665e4, 'exact'],
  ['pressure', 'psia', 6.894757e3, 'rounded'],
  ['pressure', 'mmHg', 1.333224e2, 'rounded'],
  ['pressure', 'Torr', 1.333224e2, 'rounded'],
  ['pressure', 'inHg', 3.386389e3, 'rounded'],
  ['pressure', 'mmH₂O', 9.80665, 'exact'],
  ['pressure', 'inH₂O', 2.490889e2, 'rounded'],
  ['pressureDifference', 'psi', 6.894757e3, 'rounded'],
  ['massFlow', 'lb/s', 4.535924e-1, 'rounded'],
  ['massFlow', 'lb/h', 1.259979e-4, 'rounded'],
  ['specificEnthalpy', 'Btu/lb', 2.326e3, 'exact'],
  ['specificEntropy', 'Btu/(lb °R)', 4.1868e3, 'exact'],
  ['specificHeat', 'Btu/(lb °F)', 4.1868e3, 'exact'],
  ['heatFlow', 'Btu/h', 2.930711e-1, 'rounded'],
  ['power', 'hp', 7.456999e2, 'rounded'],
  ['power', 'PS', 7.354988e2, 'rounded'],
  ['length', 'ft', 3.048e-1, 'exact'],
  ['length', 'in', 2.54e-2, 'exact'],
  ['velocity', 'ft/s', 3.048e-1, 'exact'],
  ['area', 'ft²', 9.290304e-2, 'exact'],
  ['area', 'in²', 6.4516e-4, 'exact'],
  ['volumeFlow', 'ft³/s', 2.831685e-2, 'rounded'],
  ['volumeFlow', 'gpm', 6.30902e-5, 'rounded'],
]

describe('factors of NIST SP 811, appendix B.8', () => {
  test.each(published)('%s in %s', (dimension, name, factor, exact) => {
    const unit = unitNamed(dimension, name)
    // Seven significant digits are printed: half of the last one is what rounding may take.
    const lastDigit = 10 ** (Math.floor(Math.log10(factor)) - 6)
    const tolerance = exact === 'exact' ? 1e-15 * factor : 0.500001 * lastDigit
    expect(Math.abs((unit?.factor ?? 0) - factor)).toBeLessThanOrEqual(tolerance)
  })

  test('others follow from the printed ones', () => {
    // 1 Btu = 1055.056 J, 1 kWh = 3.6e6 J; 1 Btu/°F = 1899.101 J/K; 1 lb/ft3 = 16.01846 kg/m3.
    expect(unitNamed('heatRate', 'Btu/kWh')?.factor).toBeCloseTo(1055.056 / 3.6e6, 9)
    const perHour = (unitNamed('conductance', 'Btu/(h °F)')?.factor ?? 0) * 3600
    expect(perHour).toBeCloseTo(1899.101, 3)
    expect(1 / (unitNamed('specificVolume', 'ft³/lb')?.factor ?? 0)).toBeCloseTo(16.01846, 5)
    // 1 ft4 = 8.630975e-3 m4.
    expect(1 / (unitNamed('lossConstant', '1/ft⁴')?.factor ?? 0)).toBeCloseTo(8.630975e-3, 9)
  })
})

describe('temperatures', () => {
  // BIPM SI Brochure, 9th edition, 2.3.1: t/°C = T/K - 273.15. SP 811, B.8: T = (t + 459.67)/1.8.
  test.each([
    ['°C', 0, 273.15],
    ['°C', 540, 813.15],
    ['°F', 32, 273.15],
    ['°F', 212, 373.15],
    ['°R', 491.67, 273.15],
    ['K', 300, 300],
  ])('%s: %d is %d K', (name, shown, kelvin) => {
    const unit = unitOf('temperature', { set: 'si', overrides: { temperature: name } })
    expect(unit.name).toBe(name)
    expect(fromShown(shown, unit)).toBeCloseTo(kelvin, 10)
    expect(toShown(kelvin, unit)).toBeCloseTo(shown, 10)
  })

  test('a difference has no zero point', () => {
    const fahrenheit = unitNamed('temperatureDifference', '°F')
    expect(fahrenheit && fromShown(9, fahrenheit)).toBeCloseTo(5, 12)
    expect(fahrenheit?.shift).toBeUndefined()
  })
})

test('the standard atmosphere is 101 325 Pa (10th CGPM, 1954)', () => {
  expect(standardAtmosphere).toBe(101325)
})

describe('the table', () => {
  test.each(dimensions)('%s: names are unique, every set shows a unit on offer', (dimension) => {
    const names = allUnitsOf(dimension).map((unit) => unit.name)
    expect(new Set(names).size).toBe(names.length)
    expect(dimensionLabel(dimension)).toMatch(/^[a-z]/)
    for (const { name } of unitSets) {
      expect(unitsOf(dimension)).toContain(unitOf(dimension, name))
    }
    for (const unit of allUnitsOf(dimension)) expect(unit.factor).toBeGreaterThan(0)
  })

  test('an override holds for its dimension only; one that does not exist is passed over', () => {
    const units = {
      set: 'metric',
      overrides: { pressure: 'MPa', massFlow: 'stone/fortnight' },
    } as const
    expect(unitOf('pressure', units).name).toBe('MPa')
    expect(unitOf('pressureDifference', units).name).toBe('bar')
    expect(unitOf('massFlow', units).name).toBe('kg/s')
  })

  test('small powers are shown in the smaller unit', () => {
    expect(unitOf('power', 'metric', 2.2e6).name).toBe('MW')
    expect(unitOf('power', 'metric', -76e3).name).toBe('kW')
    expect(unitOf('power', 'metric', 0).name).toBe('MW')
    expect(unitOf('power', 'metric').name).toBe('MW')
  })
})
