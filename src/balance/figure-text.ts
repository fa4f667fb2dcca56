import type { Dimension } from '../quantity/dimension.ts'
import { evaluateNumber } from '../quantity/evaluate-number.ts'
import { formatQuantity } from '../quantity/format-quantity.ts'
import type { UnitChoice } from '../quantity/unit-set.ts'
import { fromShown, toShown, type UnitOfMeasure } from '../quantity/units-of-measure.ts'

/** A figure that reads back this close to its value needs no more digits, relative. */
const exact = 1e-12
const mostDecimals = 15

/**
 * A value in a unit, with the digits that it deserves and `extra` more, unless those say it exactly
 * already.
 */
export function figureText(
  value: number,
  dimension: Dimension,
  unit: UnitOfMeasure,
  units: UnitChoice,
  extra: number,
  isGiven: boolean,
): string {
  const { text } = formatQuantity(value, dimension, units, {
    unit: unit.name,
    digits: isGiven ? 'given' : 'shown',
  })
  if (extra === 0 || text === '–') return text
  const read = readBack(text, unit)
  if (read === value || (read !== undefined && Math.abs(read - value) <= exact * Math.abs(value))) {
    return text
  }
  const shown = toShown(value, unit)
  if (text.includes('×')) return withPower(shown, 3 + extra)
  const decimals = (text.split('.')[1]?.length ?? 0) + extra
  // A figure of fixed decimals may show nothing of a small value yet.
  return decimals > mostDecimals ? withPower(shown, extra) : grouped(shown.toFixed(decimals))
}

/** The value, SI, that a reader takes from a figure. */
export function readBack(text: string, unit: UnitOfMeasure): number | undefined {
  const number = evaluateNumber(text)
  return number.outcome === 'value' ? fromShown(number.value, unit) : undefined
}

/** As formatQuantity writes it: true minus, narrow spaces between groups of three from five digits. */
function grouped(fixed: string): string {
  const [whole = '', decimals] = fixed.replace('-', '').split('.')
  const parted = whole.length >= 5 ? whole.replace(/\B(?=(\d{3})+$)/g, '\u202f') : whole
  const sign = fixed.startsWith('-') ? '−' : ''
  return sign + parted + (decimals === undefined ? '' : `.${decimals}`)
}

function withPower(shown: number, decimals: number): string {
  const [mantissa = '', exponent = ''] = shown.toExponential(decimals).split('e')
  const power = exponent
    .replace('+', '')
    .replace('-', '⁻')
    .replace(/\d/g, (digit) => '⁰¹²³⁴⁵⁶⁷⁸⁹'.charAt(Number(digit)))
  return `${grouped(mantissa)} × 10${power}`
}
