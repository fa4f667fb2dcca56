/**
 * Volume of region 3 from pressure and temperature, IAPWS SR5-05(2016): the first guess of a
 * density.
 */
import { criticalPressure, criticalTemperature } from '../constants.ts'
import { region3SubregionBoundaries } from './rows/boundaries.ts'
import { region3Volume } from './rows/region3-volume.ts'
import { saturationTemperatureOf } from './saturation-line.ts'

type Boundary = keyof typeof region3SubregionBoundaries | 'ef'

/** Temperature (K) of a boundary between subregions at a pressure (Pa), Eqs. (1) to (3) and (4). */
export function subregionBoundary(name: Boundary, p: number): number {
  const pi = p * 1e-6
  if (name === 'ef') return 3.727888004 * (pi - 22.064) + 647.096
  const base = name === 'ab' || name === 'op' || name === 'wx' ? Math.log(pi) : pi
  let T = 0
  for (const { I, n } of region3SubregionBoundaries[name]) T += n * base ** I
  return T
}

/** Saturation pressure at 643.15 K, Pa: where the subregions near the critical point begin. */
const nearCritical = 2.10434e7

/**
 * Below a pressure (Pa): boundaries in the order of temperature and the subregions between them.
 */
const ranges: readonly (readonly [number, readonly Boundary[], string])[] = [
  [22.5e6, ['cd', 'qu', 'rx', 'jk'], 'cq?rk'],
  [23e6, ['cd', 'gh', 'mn', 'ef', 'op', 'ij', 'jk'], 'clmnopjk'],
  [23.5e6, ['cd', 'gh', 'ef', 'ij', 'jk'], 'clhijk'],
  [25e6, ['cd', 'gh', 'ef', 'ij', 'jk'], 'cghijk'],
  [40e6, ['cd', 'ab', 'ef'], 'cdef'],
  [Number.POSITIVE_INFINITY, ['ab'], 'ab'],
]

/** The subregion's letter at p (Pa) and T (K), SR5-05 Tables 2 and 10. */
export function subregionOf(p: number, T: number): string {
  if (p <= nearCritical) return belowNearCritical(p, T)
  const [, boundaries, letters] = ranges.find(([most]) => p <= most) ?? ranges[0] ?? [0, [], 'a']
  const k = boundaries.findIndex((name) => T <= subregionBoundary(name, p))
  const letter = letters[k < 0 ? boundaries.length : k] as string
  return letter === '?' ? besideCritical(p, T) : letter
}

function belowNearCritical(p: number, T: number): string {
  const liquid = T <= saturationTemperatureOf(p)
  // 19.00881189 MPa is where the boundary cd meets saturation.
  if (p <= 19.00881189e6) return liquid ? 'c' : 't'
  if (liquid) return T <= subregionBoundary('cd', p) ? 'c' : 's'
  if (p <= 20.5e6) return 't'
  return T <= subregionBoundary('jk', p) ? 'r' : 'k'
}

function besideCritical(p: number, T: number): string {
  if (p > criticalPressure) {
    if (T <= subregionBoundary('uv', p)) return 'u'
    if (T <= subregionBoundary('ef', p)) return p > 22.11e6 ? 'v' : 'y'
    if (T <= subregionBoundary('wx', p)) return p > 22.11e6 ? 'w' : 'z'
    return 'x'
  }
  if (T <= Math.min(saturationTemperatureOf(p), criticalTemperature)) {
    return p > 21.93161551e6 && T > subregionBoundary('uv', p) ? 'y' : 'u'
  }
  return p > 21.90096265e6 && T <= subregionBoundary('wx', p) ? 'z' : 'x'
}

/** v (m3/kg) by the backward equation of one subregion at p (Pa) and T (K). */
export function subregionVolume(letter: string, p: number, T: number): number {
  const of = region3Volume[letter]
  if (of === undefined) throw new RangeError(`Region 3 has no subregion ${letter}`)
  const x = p / of.pressure - of.a
  const y = T / of.temperature - of.b
  const xc = of.c === 1 ? x : x ** of.c
  const yd = of.d === 1 ? y : y ** of.d
  let sum = 0
  for (const { I, J, n } of of.terms) sum += n * xc ** I * yd ** J
  if (of.exponential) return of.volume * Math.exp(sum)
  return of.volume * (of.e === 1 ? sum : sum ** of.e)
}

/** v (m3/kg) of region 3 at p (Pa) and T (K) by the backward equations. */
export function region3VolumeOf(p: number, T: number): number {
  return subregionVolume(subregionOf(p, T), p, T)
}
