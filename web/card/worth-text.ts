import {
  type Dimension,
  formatQuantity,
  type QuantityDescription,
  toShown,
  type UnitChoice,
  unitOf,
} from '../../src/document.ts'
import { differenceOf } from '../number/difference-of.ts'

/** Of a target's size, what still counts as a change worth telling. */
const resolution = 1e-6
const mostDecimals = 5

/**
 * What a step does to a target, signed, without unit: so many decimals that a millionth of the target
 * shows, and '0' for what is less.
 */
export function worthText(
  change: number,
  target: number,
  dimension: Dimension,
  units: UnitChoice,
): string {
  const unit = unitOf(dimension, units, target)
  const size = Math.abs(toShown(target, { ...unit, shift: 0 })) || 1
  const shown = change / unit.factor
  const decimals = Math.min(mostDecimals, Math.max(0, Math.round(-Math.log10(resolution * size))))
  const text = Math.abs(shown).toFixed(decimals)
  if (Number(text) === 0) return '0'
  const [whole = '', rest] = text.split('.')
  const grouped = whole.length >= 5 ? whole.replace(/\B(?=(\d{3})+$)/g, '\u202f') : whole
  return `${shown < 0 ? '−' : '+'}${grouped}${rest === undefined ? '' : `.${rest}`}`
}

/** The unit that worths of a target are told in. */
export function worthUnit(target: number, dimension: Dimension, units: UnitChoice): string {
  const { name } = unitOf(dimension, units, target)
  return dimension === 'temperature' && name === '°C' ? 'K' : name
}

/** One practical step: 'K' where it is one of the unit shown, else '10 kW/K'. */
export function stepText(
  step: number,
  { dimension }: Pick<QuantityDescription, 'dimension'>,
  units: UnitChoice,
): string {
  const { text, unit } = formatQuantity(step, differenceOf(dimension), units, { digits: 'given' })
  const number = Number(text.replace(/\u202f/g, ''))
  if (unit === '') return number === 1 ? '1' : trimmed(text)
  return number === 1 ? unit : `${trimmed(text)} ${unit}`
}

const trimmed = (text: string): string =>
  text.includes('.') && !text.includes('×') ? text.replace(/\.?0+$/, '') : text

/** 'per K or %': what the steps of a list are, or 'per step' where they are many. */
export function perText(steps: readonly string[]): string {
  const distinct = [...new Set(steps)]
  if (distinct.length === 0 || distinct.length > 3) return 'per step'
  const [last] = distinct.slice(-1)
  return `per ${distinct.length === 1 ? last : `${distinct.slice(0, -1).join(', ')} or ${last}`}`
}
