import type { Catalogue, Kind } from './catalogue.ts'
import { basesAt } from './check-basis.ts'
import { casesAt, checkCasePaths } from './check-cases.ts'
import { checkCurve, givensAt } from './check-given.ts'
import { checkStreamEnds } from './check-streams.ts'
import type { Layout, Options, Shaft, Stream, Unit } from './document.ts'
import { type KnownPaths, knownPaths } from './known-paths.ts'
import { suggestion } from './nearest-name.ts'
import {
  booleanAt,
  listAt,
  nonEmptyTextAt,
  numberAt,
  pairAt,
  refuse,
  refuseTwins,
  strictObjectAt,
  textAt,
  textListAt,
  within,
} from './place.ts'
import type { NoteRepair } from './remark.ts'

const layoutKeys = [
  'id',
  'name',
  'ambient',
  'units',
  'streams',
  'shafts',
  'plant',
  'cases',
  'stated',
  'basis',
]
const unitKeys = ['id', 'kind', 'label', 'at', 'options', 'given', 'mirrored']
const streamKeys = ['id', 'label', 'from', 'to', 'given', 'bends']
const shaftKeys = ['id', 'label', 'turbines', 'pumps', 'generator', 'given']

/** Reads one layout; throws `Unusable` where it cannot be one. */
export function checkLayout(
  value: unknown,
  place: string,
  catalogue: Catalogue,
  note: NoteRepair,
): Layout {
  const file = strictObjectAt(value, place, layoutKeys, 'a layout')
  const id = nonEmptyTextAt(file.id, `${place}.id`)
  const all = (key: 'units' | 'streams' | 'shafts', optional = false) =>
    optional && file[key] === undefined ? [] : listAt(file[key], `${place}.${key}`)
  const units = all('units').map((one, i) =>
    unitAt(one, `${place}.units[${i}]`, i, catalogue, note),
  )
  const streams = all('streams').map((one, i) => streamAt(one, `${place}.streams[${i}]`))
  const shafts = all('shafts', true).map((one, i) => shaftAt(one, `${place}.shafts[${i}]`))
  const totals =
    file.plant === undefined
      ? {}
      : strictObjectAt(file.plant, `${place}.plant`, ['given'], 'the plant of a layout')
  const layout: Layout = {
    id,
    name: nameAt(file.name, `${place}.name`, id, note),
    ambient: ambientAt(file.ambient, `${place}.ambient`),
    units,
    streams,
    shafts,
    plant: { given: givensAt(totals.given, `${place}.plant.given`) },
    cases: casesAt(file.cases, `${place}.cases`, note),
    stated: statedAt(file.stated, `${place}.stated`),
    ...(file.basis !== undefined && { basis: basesAt(file.basis, `${place}.basis`) }),
  }
  const items = [
    ...units.map((unit, i) => [unit.id, `${place}.units[${i}]`] as const),
    ...streams.map((stream, i) => [stream.id, `${place}.streams[${i}]`] as const),
    ...shafts.map((shaft, i) => [shaft.id, `${place}.shafts[${i}]`] as const),
  ]
  refuseTwins(
    items.map(([item]) => item),
    (i) => items[i]?.[1] ?? place,
  )
  checkStreamEnds(layout, place, catalogue)
  checkShafts(layout, place, catalogue)
  checkQuantities(layout, place, catalogue)
  return layout
}

/** A name that a user gave, or one that serves until then. */
function nameAt(value: unknown, place: string, otherwise: string, note: NoteRepair): string {
  if (value !== undefined) return textAt(value, place)
  note(place, `it is called ${otherwise}`)
  return otherwise
}

function ambientAt(value: unknown, place: string): Layout['ambient'] {
  const ambient = strictObjectAt(value, place, ['T', 'p'], 'the ambient state')
  const T = numberAt(ambient.T, `${place}.T`)
  const p = numberAt(ambient.p, `${place}.p`)
  if (T <= 0) refuse(`${place}.T`, 'a temperature in kelvin is above zero.')
  if (p <= 0) refuse(`${place}.p`, 'an absolute pressure is above zero.')
  return { T, p }
}

/** Stated figures are kept as they are; only numbers that are none are refused. */
function statedAt(value: unknown, place: string): readonly unknown[] {
  if (value === undefined) return []
  const list = listAt(value, place)
  refuseInfinite(list, place)
  return list
}

function refuseInfinite(value: unknown, place: string): void {
  if (typeof value === 'number') numberAt(value, place)
  else if (Array.isArray(value)) {
    value.forEach((one, i) => {
      refuseInfinite(one, `${place}[${i}]`)
    })
  } else if (typeof value === 'object' && value !== null) {
    for (const [key, one] of Object.entries(value)) refuseInfinite(one, within(place, key))
  }
}

const idForm = /^[A-Za-z][A-Za-z0-9_-]*$/

function idAt(value: unknown, place: string): string {
  const id = textAt(value, place)
  if (!idForm.test(id)) {
    refuse(
      place,
      `the id ${JSON.stringify(id)} is ill-formed: it starts with a letter, and letters, digits, - and _ follow.`,
    )
  }
  if (id === 'plant') refuse(place, 'the id plant is kept for the totals of the plant.')
  return id
}

function unitAt(
  value: unknown,
  place: string,
  index: number,
  catalogue: Catalogue,
  note: NoteRepair,
): Unit {
  const file = strictObjectAt(value, place, unitKeys, named('a unit', value))
  const id = idAt(file.id, `${place}.id`)
  const kindName = textAt(file.kind, `${place}.kind`)
  const kind = catalogue.kindNamed(kindName)
  if (!kind) {
    const nearest = suggestion(
      kindName,
      catalogue.kinds.map(({ name }) => name),
    )
    refuse(`${place}.kind`, `unit ${id} is of kind ${kindName}, which is not known.${nearest}`)
  }
  if (file.label === undefined) note(`${place}.label`, `unit ${id} is labelled ${kind.label}`, [id])
  if (file.at === undefined) note(`${place}.at`, `unit ${id} is set on a grid`, [id])
  return {
    id,
    kind: kindName,
    label: file.label === undefined ? kind.label : textAt(file.label, `${place}.label`),
    at: file.at === undefined ? gridPlace(index) : pairAt(file.at, `${place}.at`),
    ...(file.options !== undefined && {
      options: optionsAt(file.options, `${place}.options`, id, kind),
    }),
    given: givensAt(file.given, `${place}.given`),
    ...(file.mirrored !== undefined && {
      mirrored: booleanAt(file.mirrored, `${place}.mirrored`),
    }),
  }
}

/** Where a unit without a place goes, px. */
function gridPlace(index: number): readonly [number, number] {
  return [80 + 160 * (index % 8), 40 + 160 * Math.floor(index / 8)]
}

function optionsAt(value: unknown, place: string, id: string, kind: Kind): Options {
  const known = kind.options ?? {}
  const names = Object.keys(known)
  const options = strictObjectAt(value, place, names, `${id} (${kind.name})`, 'option')
  const checked = Object.entries(options).map(([name, option]) => {
    const here = within(place, name)
    return [
      name,
      known[name]?.list ? wholeNumbersAt(option, here) : booleanAt(option, here),
    ] as const
  })
  return Object.fromEntries(checked)
}

function wholeNumbersAt(value: unknown, place: string): readonly number[] {
  return listAt(value, place).map((one, i) => {
    const number = numberAt(one, `${place}[${i}]`)
    if (Number.isInteger(number) && number >= 1) return number
    return refuse(`${place}[${i}]`, `a whole number from 1 should stand here, not ${number}.`)
  })
}

function streamAt(value: unknown, place: string): Stream {
  const file = strictObjectAt(value, place, streamKeys, named('a stream', value))
  return {
    id: idAt(file.id, `${place}.id`),
    ...(file.label !== undefined && { label: textAt(file.label, `${place}.label`) }),
    from: textAt(file.from, `${place}.from`),
    to: textAt(file.to, `${place}.to`),
    given: givensAt(file.given, `${place}.given`),
    ...(file.bends !== undefined && {
      bends: listAt(file.bends, `${place}.bends`).map((one, i) =>
        pairAt(one, `${place}.bends[${i}]`),
      ),
    }),
  }
}

function shaftAt(value: unknown, place: string): Shaft {
  const file = strictObjectAt(value, place, shaftKeys, named('a shaft', value))
  return {
    id: idAt(file.id, `${place}.id`),
    ...(file.label !== undefined && { label: textAt(file.label, `${place}.label`) }),
    turbines: textListAt(file.turbines, `${place}.turbines`),
    pumps: file.pumps === undefined ? [] : textListAt(file.pumps, `${place}.pumps`),
    ...(file.generator !== undefined && {
      generator: booleanAt(file.generator, `${place}.generator`),
    }),
    given: givensAt(file.given, `${place}.given`),
  }
}

/** 'unit h5' where the thing has an id to be named by. */
function named(what: string, value: unknown): string {
  const id = typeof value === 'object' && value !== null && 'id' in value ? value.id : undefined
  return typeof id === 'string' ? `${what.replace(/^an? /, '')} ${id}` : what
}

function checkShafts(layout: Layout, place: string, catalogue: Catalogue): void {
  const units = new Map(layout.units.map((unit) => [unit.id, unit]))
  const check = (ids: readonly string[], here: string, role: 'driving' | 'driven', id: string) => {
    ids.forEach((member, i) => {
      const unit = units.get(member)
      if (!unit) {
        refuse(
          `${here}[${i}]`,
          `shaft ${id} names ${member}, but there is no such unit.${suggestion(member, units.keys())}`,
        )
      }
      if (catalogue.kindNamed(unit.kind)?.shaft !== role) {
        const list = role === 'driving' ? 'drives a shaft' : 'is driven by a shaft'
        refuse(`${here}[${i}]`, `${member} is a ${unit.kind}, and none of these ${list}.`)
      }
      if (ids.indexOf(member) !== i) refuse(`${here}[${i}]`, `shaft ${id} names ${member} twice.`)
    })
  }
  layout.shafts.forEach((shaft, i) => {
    const here = `${place}.shafts[${i}]`
    check(shaft.turbines, `${here}.turbines`, 'driving', shaft.id)
    check(shaft.pumps, `${here}.pumps`, 'driven', shaft.id)
  })
}

/** Every given belongs to a quantity that its owner has, every curve and case to a path that exists. */
function checkQuantities(layout: Layout, place: string, catalogue: Catalogue): void {
  const known = knownPaths(layout, catalogue)
  const owners = (list: 'units' | 'streams' | 'shafts') =>
    layout[list].forEach((owner, i) => {
      checkGivens(owner.id, owner.given, `${place}.${list}[${i}].given`, known)
    })
  owners('units')
  owners('streams')
  owners('shafts')
  checkGivens('plant', layout.plant.given, `${place}.plant.given`, known)
  checkCasePaths(layout, place, known)
  for (const path of Object.keys(layout.basis ?? {})) {
    if (!known.has(path)) refuse(within(`${place}.basis`, path), known.why(path))
  }
}

function checkGivens(id: string, given: Unit['given'], place: string, known: KnownPaths): void {
  for (const [name, one] of Object.entries(given)) {
    const path = `${id}.${name}`
    const here = within(place, name)
    if (!known.has(path)) refuse(here, known.why(path))
    checkCurve(one, path, here, known)
  }
}
