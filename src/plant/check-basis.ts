import type { Basis, Source } from './document.ts'
import { numberAt, objectAt, refuse, strictObjectAt, textAt, within } from './place.ts'

export const sources: readonly Source[] = ['assumed', 'maker', 'measured']

/** What given numbers rest on, by path. */
export function basesAt(value: unknown, place: string): Readonly<Record<string, Basis>> {
  return Object.fromEntries(
    Object.entries(objectAt(value, place)).map(([path, basis]) => [
      path,
      basisAt(basis, within(place, path)),
    ]),
  )
}

function basisAt(value: unknown, place: string): Basis {
  const file = strictObjectAt(value, place, ['source', 'note', 'uncertainty'], 'a basis')
  const basis: Basis = {
    ...(file.source !== undefined && { source: sourceAt(file.source, `${place}.source`) }),
    ...(file.note !== undefined && { note: textAt(file.note, `${place}.note`) }),
    ...(file.uncertainty !== undefined && {
      uncertainty: uncertaintyAt(file.uncertainty, `${place}.uncertainty`),
    }),
  }
  if (Object.keys(basis).length === 0) {
    refuse(place, 'a basis has a source, a note or an uncertainty.')
  }
  return basis
}

function sourceAt(value: unknown, place: string): Source {
  const text = textAt(value, place)
  return (
    sources.find((source) => source === text) ??
    refuse(place, `a source is ${sources.join(', ')}, not ${JSON.stringify(text.slice(0, 80))}.`)
  )
}

function uncertaintyAt(value: unknown, place: string): number {
  const number = numberAt(value, place)
  return number >= 0 ? number : refuse(place, 'an uncertainty is not below zero.')
}
