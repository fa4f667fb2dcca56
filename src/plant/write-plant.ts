import { type Catalogue, standardCatalogue } from './catalogue.ts'
import type {
  Case,
  Curve,
  Given,
  Givens,
  Layout,
  Options,
  Plant,
  Stream,
  Unit,
} from './document.ts'
import {
  type QuantityEntry,
  quantitiesOf,
  quantitiesOfPlant,
  quantitiesOfShaft,
  quantitiesOfStream,
} from './quantities.ts'

/**
 * The text of the plant file. The same plant gives the same text, whatever edits led to it: keys
 * stand in the order of the catalogue, and what fits on a line stands on one, so that two files can
 * be compared line by line.
 */
export function writePlant(plant: Plant, catalogue: Catalogue = standardCatalogue): string {
  const file = {
    format: plant.format,
    version: plant.version,
    title: plant.title,
    layouts: plant.layouts.map((layout) => layoutInOrder(layout, catalogue)),
  }
  return `${written(file, '')}\n`
}

function layoutInOrder(layout: Layout, catalogue: Catalogue): unknown {
  const { id, name, ambient, units, streams, shafts, plant, cases, stated, basis } = layout
  return {
    id,
    name,
    ambient: { T: ambient.T, p: ambient.p },
    units: units.map((unit) => unitInOrder(layout, unit, catalogue)),
    streams: streams.map((stream) => streamInOrder(stream, catalogue)),
    shafts: shafts.map((shaft) => ({
      id: shaft.id,
      label: shaft.label,
      turbines: shaft.turbines,
      pumps: shaft.pumps,
      generator: shaft.generator,
      given: givensInOrder(shaft.given, quantitiesOfShaft(shaft, catalogue)),
    })),
    plant: { given: givensInOrder(plant.given, quantitiesOfPlant(catalogue)) },
    cases: cases.map((one) => caseInOrder(one)),
    stated,
    basis:
      basis &&
      inOrder(basis, [], ({ source, note, uncertainty }) => ({ source, note, uncertainty })),
  }
}

function unitInOrder(layout: Layout, unit: Unit, catalogue: Catalogue): unknown {
  const known = Object.keys(catalogue.kindNamed(unit.kind)?.options ?? {})
  return {
    id: unit.id,
    kind: unit.kind,
    label: unit.label,
    at: unit.at,
    mirrored: unit.mirrored,
    options: unit.options && optionsInOrder(unit.options, known),
    given: givensInOrder(unit.given, quantitiesOf(layout, unit, catalogue)),
  }
}

function streamInOrder(stream: Stream, catalogue: Catalogue): unknown {
  return {
    id: stream.id,
    label: stream.label,
    from: stream.from,
    to: stream.to,
    given: givensInOrder(stream.given, quantitiesOfStream(stream, catalogue)),
    bends: stream.bends,
  }
}

function caseInOrder(one: Case): unknown {
  const { id, name, frozen, hardwareFrom, loadControl, given, free, outOfService } = one
  return {
    id,
    name,
    frozen,
    hardwareFrom: hardwareFrom && { layout: hardwareFrom.layout, case: hardwareFrom.case },
    loadControl,
    given: given && inOrder(given, Object.keys(given).sort(byText), givenInOrder),
    free,
    outOfService,
  }
}

function optionsInOrder(options: Options, known: readonly string[]): unknown {
  return inOrder(options, known, (option) => option)
}

function givensInOrder(given: Givens, entries: readonly QuantityEntry[]): unknown {
  return inOrder(
    given,
    entries.map(({ name }) => name),
    givenInOrder,
  )
}

/** The known names first, in their order; any others after them, so that nothing is lost. */
function inOrder<T>(
  record: Readonly<Record<string, T>>,
  known: readonly string[],
  change: (value: T) => unknown,
): Record<string, unknown> {
  const names = new Set([...known.filter((name) => Object.hasOwn(record, name))])
  for (const name of Object.keys(record).sort(byText)) names.add(name)
  return Object.fromEntries([...names].map((name) => [name, change(record[name] as T)]))
}

function byText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0
}

function givenInOrder(given: Given): unknown {
  return typeof given === 'number' ? given : curveInOrder(given)
}

function curveInOrder(curve: Curve): unknown {
  if ('points' in curve) return { against: curve.against, points: curve.points }
  const { at, value, exponent } = curve.power
  return { against: curve.against, power: { at, value, exponent } }
}

const widest = 100

/**
 * JSON, an object or list on one line where it fits. Keys without a value are left out. `before`: the
 * characters that stand before it on its line.
 */
function written(value: unknown, indent: string, before = indent.length): string {
  const line = onOneLine(value)
  // A comma may follow.
  const fits = before + line.length + 1 <= widest
  if (fits || typeof value !== 'object' || value === null) return line
  const inner = `${indent}  `
  if (Array.isArray(value)) {
    const lines = value.map((one) => inner + written(one, inner))
    return `[\n${lines.join(',\n')}\n${indent}]`
  }
  const lines = membersOf(value).map(([key, one]) => {
    const start = `${inner}${JSON.stringify(key)}: `
    return start + written(one, inner, start.length)
  })
  return `{\n${lines.join(',\n')}\n${indent}}`
}

function onOneLine(value: unknown): string {
  if (typeof value !== 'object' || value === null) return JSON.stringify(value) ?? 'null'
  if (Array.isArray(value)) return `[${value.map((one) => onOneLine(one)).join(', ')}]`
  const members = membersOf(value).map(([key, one]) => `${JSON.stringify(key)}: ${onOneLine(one)}`)
  return members.length === 0 ? '{}' : `{ ${members.join(', ')} }`
}

function membersOf(value: object): [string, unknown][] {
  return Object.entries(value).filter(([, one]) => one !== undefined)
}
