import type { Dimension } from './dimension.ts'
import type { UnitChoice } from './unit-set.ts'
import { fromShown, toShown, type UnitOfMeasure, unitNamed, unitOf } from './units-of-measure.ts'

export interface FormatOptions {
  /** Name of the unit to show, where a column or a field keeps one unit for all its values. */
  readonly unit?: string
  /**
   * `shown` (the default): the digits that a solved value deserves. `given`: and every digit that a
   * given value has beyond them. `all`: just the digits that bring the same number back when they
   * are read again, for a field being edited; plain characters, no digit groups.
   */
  readonly digits?: 'shown' | 'given' | 'all'
  /** A plus before what is above zero, for changes. */
  readonly signed?: boolean
}

export interface FormattedQuantity {
  readonly text: string
  /** Empty where the dimension has no unit. */
  readonly unit: string
}

/** What stands for a number that there is not. */
export const noNumber = '–'

const minus = '−'
/** Parts groups of three digits (ISO 80000-1, 7.3.1: a small space); never breaks a line. */
const narrowSpace = '\u202f'
/** Beyond this a number is written with a power of ten. */
const largest = 1e9
/** A given value is shown with at most this many digits. */
const mostGivenDigits = 9

/**
 * A value (SI) ready to read: `{ text: '540.0', unit: '°C' }`. Never NaN: an en dash where the value
 * is not finite, or beyond the range of numbers in its unit.
 */
export function formatQuantity(
  value: number,
  dimension: Dimension,
  units: UnitChoice,
  options: FormatOptions = {},
): FormattedQuantity {
  const { digits = 'shown', signed = false } = options
  const unit = unitNamed(dimension, options.unit) ?? unitOf(dimension, units, value)
  const shown = toShown(value, unit)
  if (!Number.isFinite(shown)) return { text: noNumber, unit: unit.name }
  if (digits === 'all') return { text: shortest(value, unit), unit: unit.name }
  const text = Math.abs(shown) >= largest ? withPower(shown) : withDigits(shown, unit, digits)
  const sign = signed && shown > 0 && /[1-9]/.test(text) ? '+' : ''
  return { text: sign + text, unit: unit.name }
}

function withDigits(shown: number, unit: UnitOfMeasure, digits: 'shown' | 'given'): string {
  const wanted = decimalsOf(shown, unit, digits)
  const isGiven = digits === 'given'
  const decimals = isGiven ? decimalsOfGiven(shown, wanted, unit) : wanted
  if (decimals === undefined) return withPower(shown)
  const fixed = shown.toFixed(decimals)
  if (Number(fixed) === 0) return isGiven && shown !== 0 ? withPower(shown) : zero(unit, decimals)
  const isTrimmed = 'trimmed' in unit.digits && decimals === wanted
  return written(isTrimmed ? trimmed(fixed) : fixed)
}

/** A zero with decimals where their number is fixed, else bare. */
function zero(unit: UnitOfMeasure, decimals: number): string {
  return 'decimals' in unit.digits ? (0).toFixed(decimals) : '0'
}

function decimalsOf(shown: number, { digits }: UnitOfMeasure, kind: 'shown' | 'given'): number {
  if ('decimals' in digits) {
    return kind === 'given' ? (digits.given ?? digits.decimals) : digits.decimals
  }
  if (shown === 0) return 0
  // The exponent after rounding: 9.9996 has four significant digits as 10.00.
  const [, exponent] = shown.toExponential(digits.significant - 1).split('e')
  return Math.min(digits.most, Math.max(0, digits.significant - 1 - Number(exponent)))
}

/**
 * What a conversion may round off a value, relative, and of the shift of its scale: a few roundings of
 * double precision. Were it more, values given in another unit would be taken for long ones by chance.
 */
const conversionRounds = 1e-13
const shiftRounds = 1e-15

/** Decimals enough for all of a given value, or those of any value where no end is in sight. */
function decimalsOfGiven(
  shown: number,
  wanted: number,
  { shift = 0 }: UnitOfMeasure,
): number | undefined {
  if (shown === 0) return wanted
  const before = Math.max(0, Math.floor(Math.log10(Math.abs(shown))) + 1)
  for (let decimals = wanted; decimals <= 12; decimals++) {
    const rest = Math.abs(Number(shown.toFixed(decimals)) - shown)
    if (rest <= conversionRounds * Math.abs(shown) + shiftRounds * shift) {
      return before + decimals <= mostGivenDigits || decimals === wanted ? decimals : wanted
    }
  }
  return Math.abs(shown) < 1e-6 ? undefined : wanted
}

function trimmed(fixed: string): string {
  return fixed.includes('.') ? fixed.replace(/\.?0+$/, '') : fixed
}

/** With a true minus, and digits in groups of three from five digits on. */
function written(fixed: string): string {
  const [whole = '', decimals] = fixed.replace('-', '').split('.')
  const grouped = whole.length >= 5 ? whole.replace(/\B(?=(\d{3})+$)/g, narrowSpace) : whole
  const sign = fixed.startsWith('-') ? minus : ''
  return sign + grouped + (decimals === undefined ? '' : `.${decimals}`)
}

const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹'

/** 1.234 × 10⁻⁵ */
function withPower(shown: number): string {
  const [mantissa = '', exponent = ''] = shown.toExponential(3).split('e')
  const power = exponent
    .replace('+', '')
    .replace('-', '⁻')
    .replace(/\d/g, (digit) => superscripts.charAt(Number(digit)))
  return `${written(trimmed(mantissa))} × 10${power}`
}

/** Reading back comes so close to the value, relative: a few roundings of double precision. */
const readsBackWithin = 2e-15

/** The shortest text that is read back as the same value, roundings of the conversion apart. */
function shortest(value: number, unit: UnitOfMeasure): string {
  const shown = toShown(value, unit)
  for (let digits = 1; digits < 17; digits++) {
    const text = plain(shown.toPrecision(digits))
    const back = fromShown(Number(text), unit)
    if (Math.abs(back - value) <= readsBackWithin * Math.abs(value)) return text
  }
  return plain(shown.toPrecision(17))
}

/** Without a power of ten where the number is of an ordinary size. */
function plain(text: string): string {
  const number = Number(text)
  const size = Math.abs(number)
  return size === 0 || (size >= 1e-6 && size < 1e15) ? String(number) : number.toExponential()
}
