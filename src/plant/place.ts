import { oneLine } from './migrate.ts'
import { suggestion } from './nearest-name.ts'

/** Why a file is unusable. Thrown and caught within the checks: it never leaves them. */
export class Unusable extends Error {}

/** Gives up on the file, naming the place: `layouts[0].units[3].given.foo`. */
export function refuse(place: string, why: string): never {
  throw new Unusable(oneLine(place === '' ? why : `${place}: ${why}`))
}

/** `units[3].given` and `foo` to `units[3].given.foo`; names that are no words stand in brackets. */
export function within(place: string, key: string): string {
  if (!/^[A-Za-z_$][\w$]*$/.test(key)) return `${place}[${JSON.stringify(key.slice(0, 80))}]`
  return place === '' ? key : `${place}.${key}`
}

function described(value: unknown): string {
  if (value === undefined) return 'nothing does'
  if (value === null) return 'it is null'
  if (Array.isArray(value)) return 'it is a list'
  if (typeof value === 'object') return 'it is an object'
  return `it is ${String(JSON.stringify(value)).slice(0, 80)}`
}

export function objectAt(value: unknown, place: string): Readonly<Record<string, unknown>> {
  if (typeof value === 'object' && value !== null && !Array.isArray(value)) {
    return value as Readonly<Record<string, unknown>>
  }
  return refuse(place, `an object should stand here; ${described(value)}.`)
}

/** An object with no other keys than these. `of` names the thing, with its id where it has one. */
export function strictObjectAt(
  value: unknown,
  place: string,
  keys: readonly string[],
  of: string,
  what: 'key' | 'option' = 'key',
): Readonly<Record<string, unknown>> {
  const object = objectAt(value, place)
  for (const key of Object.keys(object)) {
    if (!keys.includes(key)) {
      refuse(within(place, key), `${of} has no ${what} ${key}.${suggestion(key, keys)}`)
    }
  }
  return object
}

export function listAt(value: unknown, place: string): readonly unknown[] {
  if (Array.isArray(value)) return value
  return refuse(place, `a list should stand here; ${described(value)}.`)
}

export function textAt(value: unknown, place: string): string {
  if (typeof value === 'string') return value
  return refuse(place, `a text should stand here; ${described(value)}.`)
}

export function nonEmptyTextAt(value: unknown, place: string): string {
  const text = textAt(value, place)
  return text === '' ? refuse(place, 'this must not be empty.') : text
}

export function numberAt(value: unknown, place: string): number {
  if (typeof value !== 'number') {
    return refuse(place, `a number should stand here; ${described(value)}.`)
  }
  if (Number.isFinite(value)) return value
  return refuse(place, 'this number is not finite.')
}

export function booleanAt(value: unknown, place: string): boolean {
  if (typeof value === 'boolean') return value
  return refuse(place, `true or false should stand here; ${described(value)}.`)
}

/** Two numbers: px on the canvas, or a point of a curve. */
export function pairAt(value: unknown, place: string): readonly [number, number] {
  const list = listAt(value, place)
  if (list.length !== 2) refuse(place, `two numbers should stand here, not ${list.length}.`)
  return [numberAt(list[0], `${place}[0]`), numberAt(list[1], `${place}[1]`)]
}

export function textListAt(value: unknown, place: string): readonly string[] {
  return listAt(value, place).map((one, i) => textAt(one, `${place}[${i}]`))
}

/** No two things of a list bear the same id. */
export function refuseTwins(ids: readonly string[], place: (index: number) => string): void {
  const first = new Map<string, number>()
  ids.forEach((id, i) => {
    const earlier = first.get(id)
    if (earlier !== undefined) {
      refuse(`${place(i)}.id`, `the id ${id} is taken already, by ${place(earlier)}.`)
    }
    first.set(id, i)
  })
}
