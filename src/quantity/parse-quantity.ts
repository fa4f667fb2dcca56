import type { Dimension } from './dimension.ts'
import { evaluateNumber } from './evaluate-number.ts'
import { formatQuantity } from './format-quantity.ts'
import type { UnitChoice } from './unit-set.ts'
import {
  allUnitsOf,
  dimensionLabel,
  dimensions,
  fromShown,
  standardAtmosphere,
  type UnitOfMeasure,
  unitNamed,
  unitOf,
  unitsOf,
} from './units-of-measure.ts'

export type ParsedQuantity =
  | {
      readonly outcome: 'value'
      /** SI, pressures absolute. */
      readonly value: number
      /** Typed as gauge pressure or as vacuum: converted with the standard atmosphere. */
      readonly gauge?: true
      /** A sentence to show beside the value, where something was assumed. */
      readonly note?: string
    }
  | {
      readonly outcome: 'unreadable'
      /** What is wrong and what to write instead. */
      readonly message: string
    }

export interface ParseOptions {
  /** Name of the unit that a bare number has: the one that the field shows. */
  readonly unit?: string
}

/**
 * Reads what a user types: '180 psi', '0.1 bar', '540 F', '60 %', '3.5/4 MPa', '12 barg',
 * '60 mmHg vacuum'. A bare number has the unit shown. Nothing is thrown, whatever the text.
 */
export function parseQuantity(
  text: string,
  dimension: Dimension,
  units: UnitChoice,
  options: ParseOptions = {},
): ParsedQuantity {
  const shownUnit = unitNamed(dimension, options.unit) ?? unitOf(dimension, units)
  const number = evaluateNumber(text)
  if (number.outcome === 'unreadable') {
    const sample = `${sampleOf(dimension, units)} ${shownUnit.name}`.trim()
    return { outcome: 'unreadable', message: `${number.message} Write it like ${sample}.` }
  }
  const typed = number.rest === '' ? shownUnit : findUnit(number.rest, dimension)
  const asPressure = typed || dimension !== 'pressure' ? undefined : findPressure(number.rest)
  const unit = typed ?? asPressure?.unit
  if (!unit) return { outcome: 'unreadable', message: unknownUnit(number.rest, dimension) }
  const read = fromShown(number.value, unit)
  const basis = asPressure?.basis ?? 'absolute'
  const value =
    basis === 'gauge'
      ? read + standardAtmosphere
      : basis === 'vacuum'
        ? standardAtmosphere - read
        : read
  const impossible = whyImpossible(value, dimension, basis)
  if (impossible) return { outcome: 'unreadable', message: impossible }
  if (basis === 'absolute') return { outcome: 'value', value }
  const absolute = formatQuantity(value, dimension, units, { unit: shownUnit.name })
  const atmosphere = formatQuantity(standardAtmosphere, dimension, units, {
    unit: shownUnit.name,
    digits: 'given',
  })
  const kind = basis === 'gauge' ? 'Gauge pressure' : 'Vacuum'
  return {
    outcome: 'value',
    value,
    gauge: true,
    note: `${kind}, taken as ${absolute.text} ${absolute.unit} absolute with the standard atmosphere of ${atmosphere.text} ${atmosphere.unit}.`,
  }
}

/** A value in keeping with the dimension, for messages. SI. */
const samples: Partial<Record<Dimension, number>> = {
  pressure: 12e5,
  pressureDifference: 0.5e5,
  temperature: 813.15,
  temperatureDifference: 5,
  massFlow: 100,
  specificEnthalpy: 3000e3,
  power: 50e6,
  heatFlow: 50e6,
  ratio: 0.85,
  dryness: 0.95,
  heatRate: 2.5,
}

function sampleOf(dimension: Dimension, units: UnitChoice): string {
  const { text } = formatQuantity(samples[dimension] ?? 1, dimension, units, { digits: 'given' })
  return text.replace(/\.0+$/, '')
}

function whyImpossible(
  value: number,
  dimension: Dimension,
  basis: 'absolute' | 'gauge' | 'vacuum',
): string | undefined {
  if (!Number.isFinite(value)) return 'This is beyond the range of numbers. Write a smaller one.'
  if (dimension === 'temperature' && value < 0) {
    return 'This is below absolute zero (0 K, −273.15 °C, −459.67 °F). Write a higher temperature.'
  }
  if (dimension !== 'pressure' || value >= 0) return undefined
  return basis === 'absolute'
    ? 'An absolute pressure cannot be negative. For gauge pressure write the unit with a g, like barg or psig.'
    : 'This is more than a full vacuum. Pressures below the atmosphere end at 1.01325 bar of vacuum.'
}

/**
 * A unit as it is compared: written plainly, without spaces, brackets, dots, degree signs, and with
 * one stroke only, so that kJ/(kg K), kJ/kg/K and kJ/kg·K are the same.
 */
function normalForm(unit: string): string {
  const words = unit
    .replace(/º/g, '°')
    .normalize('NFKC')
    .replace(/\b(per\s?cent|pct)\b/gi, '%')
    .replace(/\bper mille?\b/gi, '‰')
    .replace(/\bper unit\b/gi, 'perunit')
    .replace(/\bper\b/gi, '/')
    .replace(/\b(hr|hrs|hour|hours)\b/gi, 'h')
    .replace(/\b(sec|second|seconds)\b/gi, 's')
    .replace(/\b(lbm|lbs)\b/gi, 'lb')
    .replace(/\bdeg(rees?)?(?=[\sCFRK]|$)/gi, '')
    .replace(/[\s°()[\]·⋅*^.]/g, '')
    .replace(/(?<=[A-Za-z])-(?=[A-Za-z])/g, '')
  const [first, ...others] = words.split('/')
  return others.length === 0 ? words : `${first}/${others.join('')}`
}

interface Names {
  readonly exact: ReadonlyMap<string, UnitOfMeasure>
  readonly folded: ReadonlyMap<string, UnitOfMeasure>
}

const namesOf = new Map<Dimension, Names>()

function namesFor(dimension: Dimension): Names {
  let names = namesOf.get(dimension)
  if (!names) {
    const exact = new Map<string, UnitOfMeasure>()
    const folded = new Map<string, UnitOfMeasure>()
    for (const unit of allUnitsOf(dimension)) {
      for (const name of [unit.name, ...(unit.also ?? [])]) {
        const form = normalForm(name)
        if (!exact.has(form)) exact.set(form, unit)
        if (!folded.has(form.toLowerCase())) folded.set(form.toLowerCase(), unit)
      }
    }
    names = { exact, folded }
    namesOf.set(dimension, names)
  }
  return names
}

/** mPa and mW are milli-, and a thousand million times too small to be meant: they must not pass as MPa and MW. */
const milli = /^m(Pa|W)/

function findUnit(text: string, dimension: Dimension): UnitOfMeasure | undefined {
  const form = normalForm(text)
  if (form === '') return undefined
  const { exact, folded } = namesFor(dimension)
  return exact.get(form) ?? (milli.test(form) ? undefined : folded.get(form.toLowerCase()))
}

type Basis = 'absolute' | 'gauge' | 'vacuum'

const bases: readonly (readonly [RegExp, Basis])[] = [
  [/^(.*?)[\s(_-]*vac(?:uum)?\.?\)?$/i, 'vacuum'],
  [/^(.*?)[\s(_-]*gau?ge\)?$/i, 'gauge'],
  [/^(.*?)[\s(_-]*abs(?:olute)?\.?\)?$/i, 'absolute'],
  [/^(.*?)[\s(_-]*[gü]\)?$/i, 'gauge'],
  [/^(.*?)[\s(_-]*a\)?$/i, 'absolute'],
]

/** A pressure unit that says what it is measured from: barg, kPa(a), psig, inHg vacuum. */
function findPressure(text: string): { unit: UnitOfMeasure; basis: Basis } | undefined {
  for (const [pattern, basis] of bases) {
    const [, bare] = pattern.exec(text.trim()) ?? []
    const unit = bare ? findUnit(bare, 'pressure') : undefined
    if (unit) return { unit, basis }
  }
  return undefined
}

function unknownUnit(text: string, dimension: Dimension): string {
  const names = unitsOf(dimension)
    .map(({ name }) => name)
    .filter((name) => name !== '')
  const [first, ...others] = names.slice(0, 5)
  const choice = first === undefined ? 'no unit' : [first, ...others].join(', ')
  const label = dimensionLabel(dimension)
  if (dimension === 'pressureDifference' && findPressure(text)) {
    return `A pressure difference has neither gauge nor absolute: write ${choice}.`
  }
  const capital = milli.test(normalForm(text)) && findFolded(text, dimension)
  if (capital) return `${text} would be milli-; write ${capital.name}.`
  const other = dimensions.find((one) => one !== dimension && findUnit(text, one))
  return other
    ? `${text} is a unit of ${dimensionLabel(other)}; here a ${label} is wanted, in ${choice}.`
    : `${text} is not a unit known for a ${label}. Write ${choice}.`
}

function findFolded(text: string, dimension: Dimension): UnitOfMeasure | undefined {
  return namesFor(dimension).folded.get(normalForm(text).toLowerCase())
}
