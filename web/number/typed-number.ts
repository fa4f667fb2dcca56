import {
  formatQuantity,
  parseQuantity,
  type QuantityDescription,
  type UnitChoice,
  unitOf,
  whyNotGiven,
} from '../../src/document.ts'
import { readLayout } from '../store/plant-store.ts'

export type Typed =
  | { readonly outcome: 'value'; readonly value: number; readonly note?: string }
  /** Nothing typed: a given is freed, a solved one stays solved. */
  | { readonly outcome: 'empty' }
  | { readonly outcome: 'refused'; readonly message: string }

/** Reads what was typed into a number's field. */
export function readTyped(
  text: string,
  path: string,
  description: QuantityDescription,
  units: UnitChoice,
  /** Name of the unit that stands beside the field: a bare number has it. */
  unit?: string,
): Typed {
  if (text.trim() === '') return { outcome: 'empty' }
  const parsed = parseQuantity(text, description.dimension, units, unitOption(unit))
  if (parsed.outcome === 'unreadable') return { outcome: 'refused', message: parsed.message }
  const why = whyNotGiven(readLayout(), path, parsed.value)
  if (why) return { outcome: 'refused', message: why }
  return {
    outcome: 'value',
    value: parsed.value,
    ...(parsed.note ? { note: parsed.note } : {}),
  }
}

/** Digits for a field: all that the value needs when it is given, those shown when it is solved. */
export function fieldText(
  value: number,
  description: QuantityDescription,
  units: UnitChoice,
  given: boolean,
  /** Name of the unit that stands beside the field, whatever would suit the value. */
  unit?: string,
): string {
  return formatQuantity(value, description.dimension, units, {
    digits: given ? 'given' : 'shown',
    ...unitOption(unit),
  }).text
}

/** The name of the unit in which a field opens: it stays while the field is open. */
export function fieldUnit(
  value: number | null,
  description: QuantityDescription,
  units: UnitChoice,
): string {
  return unitOf(description.dimension, units, value ?? undefined).name
}

function unitOption(unit: string | undefined): { readonly unit?: string } {
  return unit === undefined ? {} : { unit }
}

/** What one press of an arrow key changes a value by, SI. */
export function stepOf(description: QuantityDescription, value: number): number {
  return description.step ?? (value === 0 ? 1 : Math.abs(value) / 100)
}

/**
 * What a typed text comes to, where that is not plain: gauge pressure and vacuum, another unit, a sum.
 * Nothing while the text is untouched, plain or cannot be read yet.
 */
export function typedNote(
  text: string,
  first: string,
  path: string,
  description: QuantityDescription,
  units: UnitChoice,
  unit: string,
): string | undefined {
  if (text === first || /^\s*[-+−]?[\d.\s]*$/.test(text)) return undefined
  const read = readTyped(text, path, description, units, unit)
  if (read.outcome !== 'value') return undefined
  if (read.note !== undefined) return read.note
  const shown = formatQuantity(read.value, description.dimension, units, { digits: 'given', unit })
  return `That is ${`${shown.text} ${shown.unit}`.trim()}.`
}

/**
 * A value reached by steps, as it would be typed: without the digits that only the conversion left.
 * Null where it cannot be given.
 */
export function roundedStep(
  value: number,
  path: string,
  description: QuantityDescription,
  units: UnitChoice,
  unit: string,
): number | null {
  const read = readTyped(
    fieldText(value, description, units, true, unit),
    path,
    description,
    units,
    unit,
  )
  return read.outcome === 'value' ? read.value : null
}

/** 'Usual -3 to 5 K: practice for ...', or nothing where no range is declared. */
export function usualText(description: QuantityDescription, units: UnitChoice): string | undefined {
  const { range, usual, basis, dimension } = description
  const say = (value: number) => formatQuantity(value, dimension, units, { digits: 'given' })
  const because = basis ? ` (${basis})` : ''
  if (range) {
    const most = say(range[1])
    const least = formatQuantity(range[0], dimension, units, { digits: 'given', unit: most.unit })
    return `Usual ${least.text} to ${most.text} ${most.unit}`.trimEnd() + because
  }
  if (usual !== undefined) {
    const { text, unit } = say(usual)
    return `Usual ${text} ${unit}`.trimEnd() + because
  }
  return undefined
}
