import { describe, expect, test } from 'vitest'
import type { Dimension } from '../../src/quantity/dimension.ts'
import { formatQuantity } from '../../src/quantity/format-quantity.ts'
import { parseQuantity } from '../../src/quantity/parse-quantity.ts'
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
 * Printed factors to the coherent SI unit, in the printed digits: NIST Special Publication 811 (2008),
 * appendix B.8. `exact`: printed in bold, all further digits zero.
 */
const printed = {
  atmosphere: [1.01325e5, 'exact'],
  bar: [1e5, 'exact'],
  millibar: [1e2, 'exact'],
  kilogramForcePerSquareCentimetre: [9.80665e4, 'exact'],
  poundForcePerSquareInch: [6.894757e3, 'rounded'],
  torr: [1.333224e2, 'rounded'],
  millimetreOfMercury: [1.333224e2, 'rounded'],
  inchOfMercury: [3.386389e3, 'rounded'],
  millimetreOfWater: [9.80665, 'exact'],
  centimetreOfWater: [98.0665, 'exact'],
  inchOfWater: [2.490889e2, 'rounded'],
  pound: [4.535924e-1, 'rounded'],
  poundPerHour: [1.259979e-4, 'rounded'],
  poundPerSecond: [4.535924e-1, 'rounded'],
  britishThermalUnit: [1.055056e3, 'rounded'],
  britishThermalUnitPerHour: [2.930711e-1, 'rounded'],
  britishThermalUnitPerPound: [2.326e3, 'exact'],
  britishThermalUnitPerPoundDegree: [4.1868e3, 'exact'],
  britishThermalUnitPerDegree: [1.899101e3, 'rounded'],
  calorie: [4.1868, 'exact'],
  caloriePerGram: [4.1868e3, 'exact'],
  caloriePerGramDegree: [4.1868e3, 'exact'],
  kilowattHour: [3.6e6, 'exact'],
  hour: [3.6e3, 'exact'],
  minute: [60, 'exact'],
  horsepower: [7.456999e2, 'rounded'],
  metricHorsepower: [7.354988e2, 'rounded'],
  foot: [3.048e-1, 'exact'],
  inch: [2.54e-2, 'exact'],
  footPerSecond: [3.048e-1, 'exact'],
  footPerMinute: [5.08e-3, 'exact'],
  squareFoot: [9.290304e-2, 'exact'],
  squareInch: [6.4516e-4, 'exact'],
  cubicFootPerSecond: [2.831685e-2, 'rounded'],
  gallonPerMinute: [6.30902e-5, 'rounded'],
  footToTheFourth: [8.630975e-3, 'rounded'],
  poundPerCubicFoot: [1.601846e1, 'rounded'],
  litre: [1e-3, 'exact'],
  tonne: [1e3, 'exact'],
} as const satisfies Readonly<Record<string, readonly [number, 'exact' | 'rounded']>>

type Printed = keyof typeof printed

/** A factor: of powers of ten alone, or built from printed ones. */
interface Built {
  /** Prefixes of the SI (ISO 80000-1, 6.5) and what stands for per cent and per mille. */
  readonly ten?: number
  readonly times?: readonly Printed[]
  readonly per?: readonly Printed[]
}

const of = (...times: readonly Printed[]): Built => ({ times })
const si: Built = {}
const ten = (power: number, more: Built = {}): Built => ({ ...more, ten: 10 ** power })

const pressures = (pounds: string): Readonly<Record<string, Built>> => ({
  bar: of('bar'),
  mbar: of('millibar'),
  MPa: ten(6),
  kPa: ten(3),
  Pa: si,
  [pounds]: of('poundForcePerSquareInch'),
  'kgf/cm²': of('kilogramForcePerSquareCentimetre'),
  atm: of('atmosphere'),
  mmHg: of('millimetreOfMercury'),
  Torr: of('torr'),
  inHg: of('inchOfMercury'),
  'mmH₂O': of('millimetreOfWater'),
  'mH₂O': ten(2, of('centimetreOfWater')),
  'inH₂O': of('inchOfWater'),
})

const factors: Readonly<Record<Dimension, Readonly<Record<string, Built>>>> = {
  massFlow: {
    'kg/s': si,
    't/h': { times: ['tonne'], per: ['hour'] },
    'kg/h': { per: ['hour'] },
    'lb/h': of('poundPerHour'),
    'klb/h': ten(3, of('poundPerHour')),
    'lb/s': of('poundPerSecond'),
  },
  pressure: pressures('psia'),
  pressureDifference: pressures('psi'),
  // The size of a degree; where the scales begin stands below.
  temperature: { '°C': si, K: si, '°F': { ten: 1 / 1.8 }, '°R': { ten: 1 / 1.8 } },
  temperatureDifference: { K: si, '°F': { ten: 1 / 1.8 } },
  specificEnthalpy: {
    'kJ/kg': ten(3),
    'J/kg': si,
    'MJ/kg': ten(6),
    'Btu/lb': of('britishThermalUnitPerPound'),
    'kcal/kg': of('caloriePerGram'),
  },
  specificEntropy: {
    'kJ/(kg K)': ten(3),
    'J/(kg K)': si,
    'Btu/(lb °R)': of('britishThermalUnitPerPoundDegree'),
    'kcal/(kg K)': of('caloriePerGramDegree'),
  },
  specificVolume: { 'm³/kg': si, 'L/kg': of('litre'), 'ft³/lb': { per: ['poundPerCubicFoot'] } },
  specificHeat: {
    'kJ/(kg K)': ten(3),
    'J/(kg K)': si,
    'Btu/(lb °F)': of('britishThermalUnitPerPoundDegree'),
    'kcal/(kg K)': of('caloriePerGramDegree'),
  },
  power: {
    MW: ten(6),
    kW: ten(3),
    W: si,
    hp: of('horsepower'),
    PS: of('metricHorsepower'),
  },
  heatFlow: {
    MW: ten(6),
    kW: ten(3),
    W: si,
    'GJ/h': ten(9, { per: ['hour'] }),
    'MMBtu/h': ten(6, of('britishThermalUnitPerHour')),
    'kBtu/h': ten(3, of('britishThermalUnitPerHour')),
    'Btu/h': of('britishThermalUnitPerHour'),
    'Gcal/h': ten(9, { times: ['calorie'], per: ['hour'] }),
    'kcal/h': ten(3, { times: ['calorie'], per: ['hour'] }),
  },
  ratio: { '%': ten(-2), '‰': ten(-3), fraction: si },
  dryness: { '': si, '%': ten(-2) },
  number: { '': si },
  area: { 'm²': si, 'cm²': ten(-4), 'ft²': of('squareFoot'), 'in²': of('squareInch') },
  velocity: { 'm/s': si, 'ft/s': of('footPerSecond'), 'ft/min': of('footPerMinute') },
  volumeFlow: {
    'm³/s': si,
    'm³/h': { per: ['hour'] },
    'L/s': of('litre'),
    'ft³/s': of('cubicFootPerSecond'),
    gpm: of('gallonPerMinute'),
    'L/min': { times: ['litre'], per: ['minute'] },
  },
  length: { m: si, ft: of('foot'), mm: ten(-3), cm: ten(-2), in: of('inch') },
  conductance: {
    'kW/K': ten(3),
    'MW/K': ten(6),
    'W/K': si,
    'kBtu/(h °F)': ten(3, { times: ['britishThermalUnitPerDegree'], per: ['hour'] }),
    'Btu/(h °F)': { times: ['britishThermalUnitPerDegree'], per: ['hour'] },
  },
  heatRate: {
    'kJ/kWh': ten(3, { per: ['kilowattHour'] }),
    'J/J': si,
    'Btu/kWh': { times: ['britishThermalUnit'], per: ['kilowattHour'] },
    'kcal/kWh': ten(3, { times: ['calorie'], per: ['kilowattHour'] }),
  },
  steamRate: {
    'kg/kWh': { per: ['kilowattHour'] },
    'kg/MJ': ten(-6),
    'lb/kWh': { times: ['pound'], per: ['kilowattHour'] },
  },
  entropyFlow: {
    'kW/K': ten(3),
    'W/K': si,
    'kBtu/(h °R)': ten(3, { times: ['britishThermalUnitPerDegree'], per: ['hour'] }),
  },
  flowConstant: { 'm²': si, 'cm²': ten(-4), 'in²': of('squareInch') },
  lossConstant: { '1/m⁴': si, '1/ft⁴': { per: ['footToTheFourth'] } },
}

/** What rounding to seven printed digits may take of a factor, relative to it. */
function rounding(one: Printed): number {
  const [value, kind] = printed[one]
  const lastDigit = 10 ** (Math.floor(Math.log10(value)) - 6)
  return kind === 'exact' ? 0 : (0.500001 * lastDigit) / value
}

describe('every factor, from those of NIST SP 811, appendix B.8', () => {
  test.each(dimensions)('all units of %s are checked', (dimension) => {
    expect(Object.keys(factors[dimension]).sort()).toEqual(
      allUnitsOf(dimension)
        .map(({ name }) => name)
        .sort(),
    )
  })

  test.each(
    dimensions.flatMap((dimension) =>
      Object.entries(factors[dimension]).map(([name, built]) => [dimension, name, built] as const),
    ),
  )('%s in %s', (dimension, name, { ten: power = 1, times = [], per = [] }) => {
    let factor = power
    for (const one of times) factor *= printed[one][0]
    for (const one of per) factor /= printed[one][0]
    const allowed = 1e-15 + [...times, ...per].reduce((sum, one) => sum + rounding(one), 0)
    const found = unitNamed(dimension, name)?.factor ?? Number.NaN
    expect(Math.abs(found / factor - 1)).toBeLessThanOrEqual(allowed)
  })
})

describe('a set of units changes no value', () => {
  const sizes = [1e-7, 0.0123456789, 1, 27.5, 813.15, 5200, 143.7e6, 9.87654321e11]

  test.each(dimensions)('a %s is the same in every unit that it can be read in', (dimension) => {
    for (const unit of allUnitsOf(dimension)) {
      for (const value of sizes) {
        const back = fromShown(toShown(value, unit), unit)
        // Near absolute zero a temperature loses what the shift of its scale rounds off.
        const size = unit.shift === undefined ? value : Math.max(value, unit.shift)
        expect(Math.abs(back - value), `${value} in ${unit.name}`).toBeLessThanOrEqual(1e-15 * size)
      }
    }
  })

  test.each(dimensions)('a given %s goes through the sets and comes back', (dimension) => {
    for (const value of sizes) {
      let now = value
      for (const { name: set } of [...unitSets, ...unitSets]) {
        const { text, unit } = formatQuantity(now, dimension, set, { digits: 'all' })
        const read = parseQuantity(text, dimension, set, { unit })
        if (read.outcome !== 'value') throw new Error(read.message)
        now = read.value
      }
      expect(Math.abs(now - value)).toBeLessThanOrEqual(2e-14 * Math.max(value, 300))
    }
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
