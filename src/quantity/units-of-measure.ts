import type { Dimension } from './dimension.ts'
import type { UnitChoice, UnitSetName } from './unit-set.ts'

/** How many digits a value in a unit deserves. */
export type Digits =
  /** A fixed number of decimals; of a given value at least `given`. */
  | { readonly decimals: number; readonly given?: number }
  /** Significant digits, but at most `most` decimals; `trimmed`: without zeros at the end. */
  | { readonly significant: number; readonly most: number; readonly trimmed?: true }

/** A unit that values of one dimension are shown and typed in: SI value = (shown + shift) x factor. */
export interface UnitOfMeasure {
  readonly name: string
  readonly factor: number
  readonly shift?: number
  readonly digits: Digits
  /** Other ways to type it; case, spaces, brackets and degree signs do not matter. */
  readonly also?: readonly string[]
  /** Understood when typed, not offered for display. */
  readonly typedOnly?: true
}

interface DimensionRow {
  /** Within a sentence: 'a pressure', 'a mass flow'. */
  readonly label: string
  readonly units: readonly UnitOfMeasure[]
  /** Names of `units`; where there are two, the second shows what is below one of the first. */
  readonly shown: Readonly<Record<UnitSetName, readonly [string, string?]>>
}

/*
 * Factors, exact by definition or built from exact ones:
 * BIPM, The International System of Units (SI Brochure), 9th edition, 2019, tables 4, 7 and 8;
 * NIST Special Publication 811, 2008 edition, appendix B, sections B.6 to B.9.
 */

/** International foot, m (SP 811, B.6). */
const foot = 0.3048
const inch = 0.0254
/** Avoirdupois pound, kg (SP 811, B.8, note 22). */
const pound = 0.45359237
/** Standard acceleration of free fall, m/s2 (SI Brochure, 3rd CGPM, 1901). */
const gravity = 9.80665
const poundForce = pound * gravity
const poundPerSquareInch = poundForce / inch ** 2
/** British thermal unit of the International Table, J: that 1 Btu/lb is 2326 J/kg (SP 811, B.8, note 9). */
const britishThermalUnit = 2326 * pound
/** Calorie of the International Table, J (SP 811, B.8, note 9). */
const calorie = 4.1868
const hour = 3600
const kilowattHour = 3.6e6
/** US gallon: 231 cubic inches, m3. */
const gallon = 231 * inch ** 3
/** Millimetre of mercury, conventional: 13595.1 kg/m3 under standard gravity, Pa (SP 811, B.8, note 12). */
const millimetreOfMercury = 13.5951 * gravity
/** Millimetre of water, conventional: 1000 kg/m3 under standard gravity, Pa. */
const millimetreOfWater = gravity

/** Standard atmosphere, Pa (10th CGPM, 1954; SP 811, B.8). */
export const standardAtmosphere = 101325

const four = (most: number): Digits => ({ significant: 4, most })

const pressures = (poundsName: string): readonly UnitOfMeasure[] => [
  { name: 'bar', factor: 1e5, digits: four(4) },
  { name: 'mbar', factor: 100, digits: four(2), also: ['millibar'] },
  { name: 'MPa', factor: 1e6, digits: four(5), also: ['N/mm2'] },
  { name: 'kPa', factor: 1e3, digits: four(3), also: ['kN/m2'] },
  { name: 'Pa', factor: 1, digits: four(1), also: ['N/m2'] },
  {
    name: poundsName,
    factor: poundPerSquareInch,
    digits: four(3),
    also: ['psi', 'lbf/in2', 'lb/in2'],
  },
  { name: 'kgf/cm²', factor: gravity * 1e4, digits: four(4), also: ['kg/cm2', 'kp/cm2', 'at'] },
  { name: 'atm', factor: standardAtmosphere, digits: four(4) },
  { name: 'mmHg', factor: millimetreOfMercury, digits: four(1), also: ['mm of Hg'] },
  { name: 'Torr', factor: standardAtmosphere / 760, digits: four(1), typedOnly: true },
  {
    name: 'inHg',
    factor: millimetreOfMercury * 25.4,
    digits: four(3),
    also: ['in of Hg', '"Hg', 'inch Hg'],
  },
  { name: 'mmH₂O', factor: millimetreOfWater, digits: four(1), also: ['mmWC', 'mm of H2O'] },
  { name: 'mH₂O', factor: millimetreOfWater * 1e3, digits: four(3), also: ['mWC', 'm of H2O'] },
  {
    name: 'inH₂O',
    factor: millimetreOfWater * 25.4,
    digits: four(2),
    also: ['inWC', 'in of H2O', '"H2O'],
  },
]

const powers: readonly UnitOfMeasure[] = [
  { name: 'MW', factor: 1e6, digits: four(3) },
  { name: 'kW', factor: 1e3, digits: four(2) },
  { name: 'W', factor: 1, digits: four(1) },
  { name: 'hp', factor: 550 * foot * poundForce, digits: four(1), also: ['horsepower', 'bhp'] },
  { name: 'PS', factor: 75 * gravity, digits: four(1), typedOnly: true },
]

const heats: readonly UnitOfMeasure[] = [
  { name: 'MW', factor: 1e6, digits: four(3), also: ['MJ/s'] },
  { name: 'kW', factor: 1e3, digits: four(2), also: ['kJ/s'] },
  { name: 'W', factor: 1, digits: four(1), also: ['J/s'] },
  { name: 'GJ/h', factor: 1e9 / hour, digits: four(3) },
  { name: 'MMBtu/h', factor: (1e6 * britishThermalUnit) / hour, digits: four(3) },
  { name: 'kBtu/h', factor: (1e3 * britishThermalUnit) / hour, digits: four(2) },
  { name: 'Btu/h', factor: britishThermalUnit / hour, digits: four(0) },
  { name: 'Gcal/h', factor: (1e9 * calorie) / hour, digits: four(3) },
  { name: 'kcal/h', factor: (1e3 * calorie) / hour, digits: four(0), typedOnly: true },
]

/** Of every dimension its units, the SI unit or one of its multiples first among the metric ones. */
const table: Readonly<Record<Dimension, DimensionRow>> = {
  massFlow: {
    label: 'mass flow',
    units: [
      { name: 'kg/s', factor: 1, digits: four(4) },
      { name: 't/h', factor: 1000 / hour, digits: four(3), also: ['tonne/h'] },
      { name: 'kg/h', factor: 1 / hour, digits: four(1) },
      { name: 'lb/h', factor: pound / hour, digits: four(1), also: ['pph'] },
      { name: 'klb/h', factor: (1000 * pound) / hour, digits: four(3), also: ['kpph'] },
      { name: 'lb/s', factor: pound, digits: four(4) },
    ],
    shown: { si: ['kg/s'], metric: ['kg/s'], us: ['lb/h'] },
  },
  pressure: {
    label: 'pressure',
    units: pressures('psia'),
    shown: { si: ['kPa'], metric: ['bar'], us: ['psia'] },
  },
  pressureDifference: {
    label: 'pressure difference',
    units: pressures('psi'),
    shown: { si: ['kPa'], metric: ['bar'], us: ['psi'] },
  },
  temperature: {
    label: 'temperature',
    units: [
      { name: '°C', factor: 1, shift: 273.15, digits: { decimals: 1 }, also: ['Celsius'] },
      { name: 'K', factor: 1, digits: { decimals: 2, given: 1 }, also: ['kelvin'] },
      { name: '°F', factor: 5 / 9, shift: 459.67, digits: { decimals: 1 }, also: ['Fahrenheit'] },
      { name: '°R', factor: 5 / 9, digits: { decimals: 1 }, also: ['Rankine'] },
    ],
    shown: { si: ['K'], metric: ['°C'], us: ['°F'] },
  },
  temperatureDifference: {
    label: 'temperature difference',
    units: [
      { name: 'K', factor: 1, digits: { decimals: 1 }, also: ['°C', 'kelvin', 'Celsius'] },
      { name: '°F', factor: 5 / 9, digits: { decimals: 1 }, also: ['°R', 'Fahrenheit', 'Rankine'] },
    ],
    shown: { si: ['K'], metric: ['K'], us: ['°F'] },
  },
  specificEnthalpy: {
    label: 'specific enthalpy',
    units: [
      { name: 'kJ/kg', factor: 1e3, digits: { decimals: 1 } },
      { name: 'J/kg', factor: 1, digits: { decimals: 0 } },
      { name: 'MJ/kg', factor: 1e6, digits: { decimals: 4 } },
      { name: 'Btu/lb', factor: 2326, digits: { decimals: 1 } },
      { name: 'kcal/kg', factor: 1e3 * calorie, digits: { decimals: 1 } },
    ],
    shown: { si: ['kJ/kg'], metric: ['kJ/kg'], us: ['Btu/lb'] },
  },
  specificEntropy: {
    label: 'specific entropy',
    units: [
      { name: 'kJ/(kg K)', factor: 1e3, digits: { decimals: 4 } },
      { name: 'J/(kg K)', factor: 1, digits: { decimals: 1 } },
      { name: 'Btu/(lb °R)', factor: 1e3 * calorie, digits: { decimals: 4 }, also: ['Btu/lb°F'] },
      { name: 'kcal/(kg K)', factor: 1e3 * calorie, digits: { decimals: 4 } },
    ],
    shown: { si: ['kJ/(kg K)'], metric: ['kJ/(kg K)'], us: ['Btu/(lb °R)'] },
  },
  specificVolume: {
    label: 'specific volume',
    units: [
      { name: 'm³/kg', factor: 1, digits: four(6) },
      { name: 'L/kg', factor: 1e-3, digits: four(4), also: ['dm3/kg'] },
      { name: 'ft³/lb', factor: foot ** 3 / pound, digits: four(5) },
    ],
    shown: { si: ['m³/kg'], metric: ['m³/kg'], us: ['ft³/lb'] },
  },
  specificHeat: {
    label: 'specific heat capacity',
    units: [
      { name: 'kJ/(kg K)', factor: 1e3, digits: { decimals: 3 } },
      { name: 'J/(kg K)', factor: 1, digits: { decimals: 0 } },
      { name: 'Btu/(lb °F)', factor: 1e3 * calorie, digits: { decimals: 4 }, also: ['Btu/lb°R'] },
      { name: 'kcal/(kg K)', factor: 1e3 * calorie, digits: { decimals: 4 } },
    ],
    shown: { si: ['kJ/(kg K)'], metric: ['kJ/(kg K)'], us: ['Btu/(lb °F)'] },
  },
  power: {
    label: 'power',
    units: powers,
    shown: { si: ['MW', 'kW'], metric: ['MW', 'kW'], us: ['MW', 'kW'] },
  },
  heatFlow: {
    label: 'heat flow',
    units: heats,
    shown: { si: ['MW', 'kW'], metric: ['MW', 'kW'], us: ['MMBtu/h', 'kBtu/h'] },
  },
  ratio: {
    label: 'ratio',
    units: [
      { name: '%', factor: 0.01, digits: { decimals: 2, given: 1 } },
      { name: '‰', factor: 0.001, digits: { decimals: 1 }, also: ['per mille'], typedOnly: true },
      { name: 'fraction', factor: 1, digits: { decimals: 4 }, also: ['of 1', '1', 'per unit'] },
    ],
    shown: { si: ['%'], metric: ['%'], us: ['%'] },
  },
  dryness: {
    label: 'dryness fraction',
    units: [
      { name: '', factor: 1, digits: { decimals: 4 }, also: ['fraction', 'dry'] },
      { name: '%', factor: 0.01, digits: { decimals: 2 } },
    ],
    shown: { si: [''], metric: [''], us: [''] },
  },
  number: {
    label: 'number',
    units: [{ name: '', factor: 1, digits: { significant: 4, most: 4, trimmed: true } }],
    shown: { si: [''], metric: [''], us: [''] },
  },
  area: {
    label: 'area',
    units: [
      { name: 'm²', factor: 1, digits: four(4) },
      { name: 'cm²', factor: 1e-4, digits: four(2) },
      { name: 'ft²', factor: foot ** 2, digits: four(3) },
      { name: 'in²', factor: inch ** 2, digits: four(2) },
    ],
    shown: { si: ['m²'], metric: ['m²'], us: ['ft²'] },
  },
  velocity: {
    label: 'velocity',
    units: [
      { name: 'm/s', factor: 1, digits: { decimals: 1 } },
      { name: 'ft/s', factor: foot, digits: { decimals: 1 }, also: ['fps'] },
      {
        name: 'ft/min',
        factor: foot / 60,
        digits: { decimals: 0 },
        also: ['fpm'],
        typedOnly: true,
      },
    ],
    shown: { si: ['m/s'], metric: ['m/s'], us: ['ft/s'] },
  },
  volumeFlow: {
    label: 'volume flow',
    units: [
      { name: 'm³/s', factor: 1, digits: four(5) },
      { name: 'm³/h', factor: 1 / hour, digits: four(2) },
      { name: 'L/s', factor: 1e-3, digits: four(3) },
      { name: 'ft³/s', factor: foot ** 3, digits: four(4), also: ['cfs'] },
      { name: 'gpm', factor: gallon / 60, digits: four(1), also: ['gal/min', 'US gpm'] },
      { name: 'L/min', factor: 1e-3 / 60, digits: four(2), typedOnly: true },
    ],
    shown: { si: ['m³/s'], metric: ['m³/s'], us: ['ft³/s'] },
  },
  length: {
    label: 'length',
    units: [
      { name: 'm', factor: 1, digits: { decimals: 2, given: 1 } },
      { name: 'ft', factor: foot, digits: { decimals: 1 }, also: ['feet', 'foot'] },
      { name: 'mm', factor: 1e-3, digits: { decimals: 0 } },
      { name: 'cm', factor: 1e-2, digits: { decimals: 1 }, typedOnly: true },
      { name: 'in', factor: inch, digits: { decimals: 1 }, also: ['inch', '"'] },
    ],
    shown: { si: ['m'], metric: ['m'], us: ['ft'] },
  },
  conductance: {
    label: 'conductance',
    units: [
      { name: 'kW/K', factor: 1e3, digits: four(3), also: ['kW/°C'] },
      { name: 'MW/K', factor: 1e6, digits: four(4), also: ['MW/°C'] },
      { name: 'W/K', factor: 1, digits: four(1), also: ['W/°C'] },
      {
        name: 'kBtu/(h °F)',
        factor: ((1e3 * britishThermalUnit) / hour) * 1.8,
        digits: four(3),
      },
      { name: 'Btu/(h °F)', factor: (britishThermalUnit / hour) * 1.8, digits: four(0) },
    ],
    shown: { si: ['kW/K'], metric: ['kW/K'], us: ['kBtu/(h °F)'] },
  },
  heatRate: {
    label: 'heat rate',
    units: [
      { name: 'kJ/kWh', factor: 1e3 / kilowattHour, digits: { decimals: 1 } },
      { name: 'J/J', factor: 1, digits: { decimals: 4 }, also: ['kJ/kJ', 'kW/kW', 'MW/MW'] },
      { name: 'Btu/kWh', factor: britishThermalUnit / kilowattHour, digits: { decimals: 1 } },
      { name: 'kcal/kWh', factor: (1e3 * calorie) / kilowattHour, digits: { decimals: 1 } },
    ],
    shown: { si: ['J/J'], metric: ['kJ/kWh'], us: ['Btu/kWh'] },
  },
  steamRate: {
    label: 'steam rate',
    units: [
      { name: 'kg/kWh', factor: 1 / kilowattHour, digits: { decimals: 3 }, also: ['t/MWh'] },
      { name: 'kg/MJ', factor: 1e-6, digits: { decimals: 4 } },
      { name: 'lb/kWh', factor: pound / kilowattHour, digits: { decimals: 3 } },
    ],
    shown: { si: ['kg/MJ'], metric: ['kg/kWh'], us: ['lb/kWh'] },
  },
  entropyFlow: {
    label: 'entropy flow',
    units: [
      { name: 'kW/K', factor: 1e3, digits: four(3) },
      { name: 'W/K', factor: 1, digits: four(1) },
      { name: 'kBtu/(h °R)', factor: ((1e3 * britishThermalUnit) / hour) * 1.8, digits: four(3) },
    ],
    shown: { si: ['kW/K'], metric: ['kW/K'], us: ['kBtu/(h °R)'] },
  },
  flowConstant: {
    label: 'flow constant',
    units: [
      { name: 'm²', factor: 1, digits: four(7) },
      { name: 'cm²', factor: 1e-4, digits: four(4) },
      { name: 'in²', factor: inch ** 2, digits: four(4) },
    ],
    shown: { si: ['m²'], metric: ['m²'], us: ['in²'] },
  },
  lossConstant: {
    label: 'loss constant',
    units: [
      { name: '1/m⁴', factor: 1, digits: four(3), also: ['m-4'] },
      { name: '1/ft⁴', factor: 1 / foot ** 4, digits: four(3), also: ['ft-4'] },
    ],
    shown: { si: ['1/m⁴'], metric: ['1/m⁴'], us: ['1/ft⁴'] },
  },
}

/** Every dimension, in the order of the table. */
export const dimensions = Object.keys(table) as readonly Dimension[]

/** A dimension's name within a sentence: 'mass flow'. */
export function dimensionLabel(dimension: Dimension): string {
  return table[dimension].label
}

/** All units of a dimension, those understood only when typed too. */
export function allUnitsOf(dimension: Dimension): readonly UnitOfMeasure[] {
  return table[dimension].units
}

/** The units of a dimension that a user may choose for display. */
export function unitsOf(dimension: Dimension): readonly UnitOfMeasure[] {
  return table[dimension].units.filter((unit) => !unit.typedOnly)
}

/** A unit by its name, as `unitsOf` has it. */
export function unitNamed(
  dimension: Dimension,
  name: string | undefined,
): UnitOfMeasure | undefined {
  return name === undefined ? undefined : table[dimension].units.find((unit) => unit.name === name)
}

/**
 * The unit that a dimension is shown in, for axes, column heads and fields. With a value (SI) the
 * one that suits its size: kW below 1 MW.
 */
export function unitOf(dimension: Dimension, units: UnitChoice, value?: number): UnitOfMeasure {
  const { set, overrides } =
    typeof units === 'string' ? { set: units } : { overrides: {}, ...units }
  const chosen = unitNamed(dimension, overrides?.[dimension])
  if (chosen) return chosen
  const [first, second] = table[dimension].shown[set]
  const large = unitNamed(dimension, first) as UnitOfMeasure
  const small = unitNamed(dimension, second)
  const isSmall = value !== undefined && value !== 0 && Math.abs(value) < large.factor
  return small && isSmall ? small : large
}

/** SI to the number shown in a unit. */
export function toShown(si: number, unit: UnitOfMeasure): number {
  return si / unit.factor - (unit.shift ?? 0)
}

/** The number shown in a unit to SI. */
export function fromShown(shown: number, unit: UnitOfMeasure): number {
  return (shown + (unit.shift ?? 0)) * unit.factor
}
