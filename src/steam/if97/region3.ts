/**
 * Region 3 in density and temperature, with the solvers that find them. A FIELD holds, at rho and
 * T: p (Pa), h (J/kg), s (J/(kg K)), dp/drho and dp/dT, dh/drho and dh/dT, cv (J/(kg K)). The pairs
 * (p, h) and (p, s) stay regular through the critical point, where dp/drho vanishes.
 */
import { criticalDensity, criticalTemperature, gasConstant } from '../constants.ts'
import { Point, SUM_SIZE } from './point.ts'
import { boundary3ab } from './rows/boundaries.ts'
import {
  region3aTemperatureFromEnthalpy,
  region3aTemperatureFromEntropy,
  region3aVolumeFromEnthalpy,
  region3aVolumeFromEntropy,
  region3bTemperatureFromEnthalpy,
  region3bTemperatureFromEntropy,
  region3bVolumeFromEnthalpy,
  region3bVolumeFromEntropy,
  region3Potential,
} from './unrolled-region3.ts'

/** Slots of a field; rho (kg/m3) and T (K) are its inputs. */
export const Field = {
  p: 0,
  h: 1,
  s: 2,
  pRho: 3,
  pT: 4,
  hRho: 5,
  hT: 6,
  cv: 7,
  rho: 8,
  T: 9,
} as const
export const FIELD_SIZE = 10

const g = new Float64Array(SUM_SIZE)
// Constants of this module: an imported binding is looked up at each use.
const R = gasConstant
const rhoC = criticalDensity
const TC = criticalTemperature

function fieldAt(field: Float64Array): void {
  const rho = field[8] as number
  const T = field[9] as number
  const delta = rho / rhoC
  const tau = TC / T
  g[6] = delta
  g[7] = tau
  g[8] = Math.log(delta)
  region3Potential(g)
  const dPhi = delta * (g[1] as number)
  const tPhi = tau * (g[3] as number)
  const dtPhi = delta * tau * (g[4] as number)
  const rt = R * T
  const cv = -R * tau * tau * (g[5] as number)
  const pRho = rt * (2 * dPhi + delta * delta * (g[2] as number))
  const pT = rho * R * (dPhi - dtPhi)
  field[0] = rho * rt * dPhi
  field[1] = rt * (tPhi + dPhi)
  field[2] = R * (tPhi - (g[0] as number))
  field[3] = pRho
  field[4] = pT
  field[5] = (pRho - (T * pT) / rho) / rho
  field[6] = cv + pT / rho
  field[7] = cv
}

/** The field at a density (kg/m3) and a temperature (K). */
export function region3Field(field: Float64Array, rho: number, T: number): void {
  field[8] = rho
  field[9] = T
  fieldAt(field)
}

/**
 * Least dp/drho, Pa m3/kg, that partials at constant T divide by: it is 0 at the critical point.
 */
const leastSlope = 1e-6

// Slots and limits as constants of this module: an imported binding is looked up at each use.
const {
  T: atT,
  pRho: atPRho,
  rho: atRho,
  pT: atPT,
  h: atH,
  s: atS,
  cv: atCv,
  p: atP,
  hRho: atHRho,
  hT: atHT,
} = Field
const { h: ptH, s: ptS, v: ptV, cp: ptCp, vT: ptVT, vp: ptVp, hp: ptHp, p: ptP, T: ptT } = Point

/** Turns a field into a point (h, s, v, cp, dv/dT, dv/dp, dh/dp). */
export function pointOfField(point: Float64Array, field: Float64Array): void {
  const T = field[atT] as number
  const pRho = Math.max(field[atPRho] as number, leastSlope)
  const v = 1 / (field[atRho] as number)
  const pT = field[atPT] as number
  const vT = (v * v * pT) / pRho
  point[ptH] = field[atH] as number
  point[ptS] = field[atS] as number
  point[ptV] = v
  point[ptCp] = (field[atCv] as number) + T * pT * vT
  point[ptVT] = vT
  point[ptVp] = (-v * v) / pRho
  point[ptHp] = v - T * vT
  point[ptP] = field[atP] as number
  point[ptT] = T
}

/**
 * What a state of region 3 is sought from: p (Pa), h (J/kg) or s (J/(kg K)), and a guess of rho and
 * T (rho 0: the backward equations). The answer is left in the field.
 */
export const Sought = { p: 0, value: 1, rho: 2, T: 3 } as const
export const sought = new Float64Array(4)

/** Step (as part of rho and T) after which the error left is round-off: Newton squares it. */
const settled = 1e-8
const MOST_STEPS = 40

/**
 * The field at `sought` p and h. `liquidSide` chooses subregion 3a of the backward equations.
 * Answers whether it converged.
 */
export function region3AtEnthalpy(field: Float64Array, liquidSide: boolean): boolean {
  const rho = sought[Sought.rho] as number
  const T = sought[Sought.T] as number
  if (!(rho > 50 && rho < 900 && T > 600 && T < 900)) {
    const pi = (sought[Sought.p] as number) * 1e-8
    const h = sought[Sought.value] as number
    if (liquidSide) {
      backward(pi + 0.128, h / 2.1e6 - 0.727)
      region3aVolumeFromEnthalpy(g)
      sought[Sought.rho] = 1 / (0.0028 * (g[0] as number))
      backward(pi + 0.24, h / 2.3e6 - 0.615)
      region3aTemperatureFromEnthalpy(g)
      sought[Sought.T] = 760 * (g[0] as number)
    } else {
      backward(pi + 0.0661, h / 2.8e6 - 0.72)
      region3bVolumeFromEnthalpy(g)
      sought[Sought.rho] = 1 / (0.0088 * (g[0] as number))
      backward(pi + 0.298, h / 2.8e6 - 0.72)
      region3bTemperatureFromEnthalpy(g)
      sought[Sought.T] = 860 * (g[0] as number)
    }
  }
  return closeIn(field, atH)
}

/** The field at `sought` p and s, as `region3AtEnthalpy`. */
export function region3AtEntropy(field: Float64Array, liquidSide: boolean): boolean {
  const pi = (sought[Sought.p] as number) * 1e-8
  const s = sought[Sought.value] as number
  if (liquidSide) {
    backward(pi + 0.187, s / 4.4e3 - 0.755)
    region3aVolumeFromEntropy(g)
    sought[Sought.rho] = 1 / (0.0028 * (g[0] as number))
    backward(pi + 0.24, s / 4.4e3 - 0.703)
    region3aTemperatureFromEntropy(g)
    sought[Sought.T] = 760 * (g[0] as number)
  } else {
    backward(pi + 0.298, s / 5.3e3 - 0.816)
    region3bVolumeFromEntropy(g)
    sought[Sought.rho] = 1 / (0.0088 * (g[0] as number))
    backward(pi + 0.76, s / 5.3e3 - 0.818)
    region3bTemperatureFromEntropy(g)
    sought[Sought.T] = 860 * (g[0] as number)
  }
  return closeIn(field, atS)
}

function backward(x: number, y: number): void {
  g[6] = x
  g[7] = y
}

/**
 * Newton's steps in rho and T towards p and a second property, whose slot of the field is given.
 */
function closeIn(field: Float64Array, slot: number): boolean {
  const p = sought[Sought.p] as number
  const value = sought[Sought.value] as number
  let rho = sought[Sought.rho] as number
  let T = sought[Sought.T] as number
  for (let i = 0; i < MOST_STEPS; i++) {
    field[8] = rho
    field[9] = T
    fieldAt(field)
    const pRho = field[atPRho] as number
    const pT = field[atPT] as number
    const toRho = slot === atH ? (field[atHRho] as number) : -pT / (rho * rho)
    const toT = slot === atH ? (field[atHT] as number) : (field[atCv] as number) / T
    const offP = (field[atP] as number) - p
    const off = (field[slot] as number) - value
    const share = 1 / (pRho * toT - pT * toRho)
    const dRho = (offP * toT - off * pT) * share
    const dT = (off * pRho - offP * toRho) * share
    const sizeRho = Math.abs(dRho)
    const sizeT = Math.abs(dT)
    let factor = 1
    if (sizeRho > 0.1 * rho) factor = (0.1 * rho) / sizeRho
    if (factor * sizeT > 30) factor = 30 / sizeT
    rho -= factor * dRho
    T -= factor * dT
    if (sizeRho < settled * rho && sizeT < settled * T) {
      field[8] = rho
      field[9] = T
      fieldAt(field)
      return true
    }
  }
  return false
}

/**
 * Density (kg/m3) of p (Pa) and T (K) between two densities that enclose it, p rising with rho
 * between them; `field` is left at the answer.
 */
export function region3Density(
  field: Float64Array,
  p: number,
  T: number,
  guess: number,
  low: number,
  high: number,
): number {
  let below = low
  let above = high
  let rho = guess > low && guess < high ? guess : 0.5 * (low + high)
  for (let i = 0; i < 200; i++) {
    region3Field(field, rho, T)
    const off = (field[atP] as number) - p
    if (off < 0) below = rho
    else above = rho
    const step = off / (field[atPRho] as number)
    if (Math.abs(step) < 1e-14 * rho) break
    let next = rho - step
    if (!(next >= below && next <= above)) next = 0.5 * (below + above)
    if (next === rho || above - below < 1e-15 * rho) break
    rho = next
  }
  region3Field(field, rho, T)
  return rho
}

/** T (K) of p (Pa) at a density (kg/m3): p rises with T. `field` is left at the answer. */
export function region3Temperature(
  field: Float64Array,
  p: number,
  rho: number,
  low: number,
  high: number,
): number {
  let T = 0.5 * (low + high)
  for (let i = 0; i < MOST_STEPS; i++) {
    region3Field(field, rho, T)
    const step = ((field[atP] as number) - p) / (field[atPT] as number)
    T = Math.min(high + 50, Math.max(low - 50, T - step))
    if (Math.abs(step) < 1e-10 * T) break
  }
  region3Field(field, rho, T)
  return T
}

const [ab1, ab2, ab3, ab4] = boundary3ab

/**
 * Whether the sought p and h lie on the liquid's side, subregion 3a, above the critical pressure.
 */
export function onLiquidSide(of: Float64Array): boolean {
  const pi = (of[Sought.p] as number) * 1e-6
  return (of[Sought.value] as number) <= 1e3 * (ab1 + pi * (ab2 + pi * (ab3 + pi * ab4)))
}

/**
 * Densities of saturated liquid and steam between 16.5 MPa and the critical pressure, as rho_c + z
 * f(z) with z = sqrt((pc - p) / 1 MPa): our own fit, good to 0.5 %, only ever a first guess.
 */
const liquidFit = [
  186.6916, -110.9288, 134.5618, -282.1322, 442.854, -392.6707, 192.5622, -49.06103, 5.07725,
]
const vapourFit = [
  -173.4152, -130.7484, 1054.094, -2430.557, 3019.348, -2199.076, 935.4494, -214.9028, 20.58202,
]

function fitted(z: number, coefficients: readonly number[]): number {
  let sum = 0
  for (let i = coefficients.length - 1; i >= 0; i--) sum = sum * z + (coefficients[i] as number)
  return rhoC + z * sum
}

/**
 * Density (kg/m3) of the saturated liquid (side 1) or the dry saturated steam (side -1) at a pair
 * of p (Pa) and T (K) on the saturation line, p in Pa below the critical pressure by `gap` Pa. From
 * outside the density that is sought p(rho) bends one way only, so that Newton's steps close in
 * from there.
 */
export function region3SaturatedDensity(
  field: Float64Array,
  p: number,
  T: number,
  gap: number,
  side: number,
): number {
  const z = Math.sqrt(gap * 1e-6)
  let rho = fitted(z, side > 0 ? liquidFit : vapourFit)
  let last = Number.POSITIVE_INFINITY
  for (let i = 0; i < MOST_STEPS; i++) {
    region3Field(field, rho, T)
    const step = ((field[atP] as number) - p) / (field[atPRho] as number)
    const size = Math.abs(step)
    // Round-off reached: steps no longer shrink.
    if (i > 3 && size >= last) break
    last = size
    rho -= step
    // Newton squares the error as part of the distance to the critical density.
    if (size < 1e-8 * Math.abs(rho - rhoC)) break
  }
  region3Field(field, rho, T)
  return rho
}
