import { checkCurve, givensAt } from './check-given.ts'
import type { Case, Layout } from './document.ts'
import type { KnownPaths } from './known-paths.ts'
import { suggestion } from './nearest-name.ts'
import {
  booleanAt,
  listAt,
  nonEmptyTextAt,
  refuse,
  refuseTwins,
  strictObjectAt,
  textAt,
  textListAt,
  within,
} from './place.ts'
import type { NoteRepair } from './remark.ts'

const caseKeys = [
  'id',
  'name',
  'frozen',
  'hardwareFrom',
  'loadControl',
  'given',
  'free',
  'outOfService',
]

const loadControls = ['sliding', 'throttled', 'wideOpen'] as const

/** The cases of a layout. Absent: none. */
export function casesAt(value: unknown, place: string, note: NoteRepair): readonly Case[] {
  if (value === undefined) return []
  const cases = listAt(value, place).map((one, i) => caseAt(one, `${place}[${i}]`, note))
  refuseTwins(
    cases.map(({ id }) => id),
    (i) => `${place}[${i}]`,
  )
  return cases
}

function caseAt(value: unknown, place: string, note: NoteRepair): Case {
  const file = strictObjectAt(value, place, caseKeys, 'a case')
  const id = nonEmptyTextAt(file.id, `${place}.id`)
  if (file.name === undefined) note(`${place}.name`, `the case is called ${id}`)
  return {
    id,
    name: file.name === undefined ? id : textAt(file.name, `${place}.name`),
    ...(file.frozen !== undefined && { frozen: booleanAt(file.frozen, `${place}.frozen`) }),
    ...(file.hardwareFrom !== undefined && {
      hardwareFrom: hardwareAt(file.hardwareFrom, `${place}.hardwareFrom`),
    }),
    ...(file.loadControl !== undefined && {
      loadControl: loadControlAt(file.loadControl, `${place}.loadControl`),
    }),
    ...(file.given !== undefined && { given: givensAt(file.given, `${place}.given`) }),
    ...(file.free !== undefined && { free: textListAt(file.free, `${place}.free`) }),
    ...(file.outOfService !== undefined && {
      outOfService: textListAt(file.outOfService, `${place}.outOfService`),
    }),
  }
}

function hardwareAt(value: unknown, place: string): NonNullable<Case['hardwareFrom']> {
  const file = strictObjectAt(value, place, ['layout', 'case'], 'hardwareFrom')
  return {
    layout: textAt(file.layout, `${place}.layout`),
    ...(file.case !== undefined && { case: textAt(file.case, `${place}.case`) }),
  }
}

function loadControlAt(value: unknown, place: string): NonNullable<Case['loadControl']> {
  const text = textAt(value, place)
  const found = loadControls.find((one) => one === text)
  return found ?? refuse(place, `one of ${loadControls.join(', ')} should stand here, not ${text}.`)
}

/** What the cases of a layout name exists. */
export function checkCasePaths(layout: Layout, place: string, known: KnownPaths): void {
  const units = new Set(layout.units.map(({ id }) => id))
  layout.cases.forEach(({ given = {}, free = [], outOfService = [] }, i) => {
    const here = `${place}.cases[${i}]`
    for (const [path, one] of Object.entries(given)) {
      const at = within(`${here}.given`, path)
      if (!known.has(path)) refuse(at, known.why(path))
      checkCurve(one, path, at, known)
    }
    free.forEach((path, k) => {
      if (!known.has(path)) refuse(`${here}.free[${k}]`, known.why(path))
    })
    outOfService.forEach((id, k) => {
      if (!units.has(id)) {
        refuse(`${here}.outOfService[${k}]`, `there is no unit ${id}.${suggestion(id, units)}`)
      }
    })
  })
}
