import type { Curve, Given, Givens } from './document.ts'
import type { KnownPaths } from './known-paths.ts'
import {
  listAt,
  numberAt,
  objectAt,
  pairAt,
  refuse,
  strictObjectAt,
  textAt,
  within,
} from './place.ts'

/** A given: a finite number or a well-formed curve. Whether its path exists is checked later. */
export function givenAt(value: unknown, place: string): Given {
  if (typeof value === 'number') return numberAt(value, place)
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    refuse(place, 'a given is a number or a curve against another quantity.')
  }
  return curveAt(value, place)
}

const powerKeys = ['at', 'value', 'exponent']

function curveAt(value: unknown, place: string): Curve {
  const curve = strictObjectAt(value, place, ['against', 'points', 'power'], 'a curve')
  const against = textAt(curve.against, `${place}.against`)
  if ((curve.points === undefined) === (curve.power === undefined)) {
    refuse(place, 'a curve has either points or power.')
  }
  if (curve.points !== undefined)
    return { against, points: pointsAt(curve.points, `${place}.points`) }
  const here = `${place}.power`
  const law = strictObjectAt(curve.power, here, powerKeys, 'a power law')
  const power = {
    at: numberAt(law.at, `${here}.at`),
    value: numberAt(law.value, `${here}.value`),
    exponent: numberAt(law.exponent, `${here}.exponent`),
  }
  if (power.at === 0) refuse(`${here}.at`, 'a power law needs a point other than zero.')
  return { against, power }
}

function pointsAt(value: unknown, place: string): readonly (readonly [number, number])[] {
  const points = listAt(value, place).map((point, i) => pairAt(point, `${place}[${i}]`))
  if (points.length < 2) refuse(place, 'a curve has at least two points.')
  points.forEach(([r], i) => {
    const before = points[i - 1]
    if (before && !(r > before[0])) {
      refuse(`${place}[${i}]`, `the points do not rise: ${r} follows ${before[0]}.`)
    }
  })
  return points
}

/** Givens by name (or, in a case, by path), each well formed. Absent: none. */
export function givensAt(value: unknown, place: string): Givens {
  if (value === undefined) return {}
  // From entries: a key named __proto__ is a key like any other, and refused as such later.
  return Object.fromEntries(
    Object.entries(objectAt(value, place)).map(([name, given]) => [
      name,
      givenAt(given, within(place, name)),
    ]),
  )
}

/** The path that a curve depends on exists and is not the curve's own. */
export function checkCurve(given: Given, path: string, place: string, known: KnownPaths): void {
  if (typeof given === 'number') return
  if (!known.has(given.against)) {
    refuse(`${place}.against`, `there is no quantity ${given.against}: ${known.why(given.against)}`)
  }
  if (given.against === path) {
    refuse(`${place}.against`, `the curve of ${path} cannot depend on ${path} itself.`)
  }
}
