/**
 * Region 3 in density and temperature, with the solvers that find them. A FIELD holds, at rho and T:
 * p (Pa), h (J/kg), s (J/(kg K)), dp/drho and dp/dT, dh/drho and dh/dT, cv (J/(kg K)). The pairs (p, h)
 * and (p, s) stay regular through the critical point, where dp/drho vanishes.
 */
import { criticalDensity, criticalTemperature, gasConstant } from '../constants.ts'
import { Point } from './point.ts'
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

/** Slots of a field. */
export const Field = { p: 0, h: 1, s: 2, pRho: 3, pT: 4, hRho: 5, hT: 6, cv: 7 } as const
export const FIELD_SIZE = 8

const g = new Float64Array(6)

/** The field at a density (kg/m3) and a temperature (K). */
export function region3Field(field: Float64Array, rho: number, T: number): void {
  const delta = rho / criticalDensity
  const tau = criticalTemperature / T
  region3Potential(g, delta, tau, Math.log(delta))
  const dPhi = delta * (g[1] as number)
  const tPhi = tau * (g[3] as number)
  const dtPhi = delta * tau * (g[4] as number)
  const rt = gasConstant * T
  const cv = -gasConstant * tau * tau * (g[5] as number)
  const pRho = rt * (2 * dPhi + delta * delta * (g[2] as number))
  const pT = rho * gasConstant * (dPhi - dtPhi)
  field[0] = rho * rt * dPhi
  field[1] = rt * (tPhi + dPhi)
  field[2] = gasConstant * (tPhi - (g[0] as number))
  field[3] = pRho
  field[4] = pT
  field[5] = (pRho - (T * pT) / rho) / rho
  field[6] = cv + pT / rho
  field[7] = cv
}

/** Least dp/drho, Pa m3/kg, that partials at constant T divide by: it is 0 at the critical point. */
const leastSlope = 1e-6

/** Turns a field at rho and T into a point (h, s, v, cp, dv/dT, dv/dp, dh/dp). */
export function pointOfField(
  point: Float64Array,
  field: Float64Array,
  rho: number,
  T: number,
): void {
  const pRho = Math.max(field[Field.pRho] as number, leastSlope)
  const v = 1 / rho
  const pT = field[Field.pT] as number
  const vT = (v * v * pT) / pRho
  point[Point.h] = field[Field.h] as number
  point[Point.s] = field[Field.s] as number
  point[Point.v] = v
  point[Point.cp] = (field[Field.cv] as number) + T * pT * vT
  point[Point.vT] = vT
  point[Point.vp] = (-v * v) / pRho
  point[Point.hp] = v - T * vT
}

/** Density and temperature, the answer of the solvers in two unknowns. */
export const found = new Float64Array(2)

/** Step (as part of rho and T) after which the error left is round-off: Newton squares it. */
const settled = 1e-8
const MOST_STEPS = 40

const scratch = new Float64Array(FIELD_SIZE)

/**
 * rho and T of p (Pa) and h (J/kg), left in `found`; `field` then holds the field there. The guess is
 * rho and T; rho 0 starts from the backward equations. Answers whether it converged.
 */
export function region3AtEnthalpy(
  field: Float64Array,
  p: number,
  h: number,
  liquidSide: boolean,
  rhoGuess: number,
  TGuess: number,
): boolean {
  let rho = rhoGuess
  let T = TGuess
  if (!(rho > 50 && rho < 900 && T > 600 && T < 900)) {
    const pi = p * 1e-8
    if (liquidSide) {
      rho = 1 / (0.0028 * region3aVolumeFromEnthalpy(pi + 0.128, h / 2.1e6 - 0.727))
      T = 760 * region3aTemperatureFromEnthalpy(pi + 0.24, h / 2.3e6 - 0.615)
    } else {
      rho = 1 / (0.0088 * region3bVolumeFromEnthalpy(pi + 0.0661, h / 2.8e6 - 0.72))
      T = 860 * region3bTemperatureFromEnthalpy(pi + 0.298, h / 2.8e6 - 0.72)
    }
  }
  for (let i = 0; i < MOST_STEPS; i++) {
    region3Field(field, rho, T)
    const pRho = field[Field.pRho] as number
    const pT = field[Field.pT] as number
    const hRho = field[Field.hRho] as number
    const hT = field[Field.hT] as number
    const offP = (field[Field.p] as number) - p
    const offH = (field[Field.h] as number) - h
    const det = pRho * hT - pT * hRho
    const dRho = (offP * hT - offH * pT) / det
    const dT = (offH * pRho - offP * hRho) / det
    const factor = Math.min(1, (0.1 * rho) / Math.abs(dRho), 30 / Math.abs(dT))
    rho -= factor * dRho
    T -= factor * dT
    if (Math.abs(dRho) < settled * rho && Math.abs(dT) < settled * T) {
      region3Field(field, rho, T)
      found[0] = rho
      found[1] = T
      return true
    }
  }
  return false
}

/** rho and T of p (Pa) and s (J/(kg K)), as `region3AtEnthalpy`. */
export function region3AtEntropy(
  field: Float64Array,
  p: number,
  s: number,
  liquidSide: boolean,
): boolean {
  const pi = p * 1e-8
  let rho: number
  let T: number
  if (liquidSide) {
    rho = 1 / (0.0028 * region3aVolumeFromEntropy(pi + 0.187, s / 4.4e3 - 0.755))
    T = 760 * region3aTemperatureFromEntropy(pi + 0.24, s / 4.4e3 - 0.703)
  } else {
    rho = 1 / (0.0088 * region3bVolumeFromEntropy(pi + 0.298, s / 5.3e3 - 0.816))
    T = 860 * region3bTemperatureFromEntropy(pi + 0.76, s / 5.3e3 - 0.818)
  }
  for (let i = 0; i < MOST_STEPS; i++) {
    region3Field(field, rho, T)
    const pRho = field[Field.pRho] as number
    const pT = field[Field.pT] as number
    const sRho = -pT / (rho * rho)
    const sT = (field[Field.cv] as number) / T
    const offP = (field[Field.p] as number) - p
    const offS = (field[Field.s] as number) - s
    const det = pRho * sT - pT * sRho
    const dRho = (offP * sT - offS * pT) / det
    const dT = (offS * pRho - offP * sRho) / det
    const factor = Math.min(1, (0.1 * rho) / Math.abs(dRho), 30 / Math.abs(dT))
    rho -= factor * dRho
    T -= factor * dT
    if (Math.abs(dRho) < settled * rho && Math.abs(dT) < settled * T) {
      region3Field(field, rho, T)
      found[0] = rho
      found[1] = T
      return true
    }
  }
  return false
}

/**
 * Density (kg/m3) of p (Pa) and T (K) between two densities that enclose it, p rising with rho between
 * them; `field` is left at the answer.
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
    const off = (field[Field.p] as number) - p
    if (off < 0) below = rho
    else above = rho
    const step = off / (field[Field.pRho] as number)
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
    const step = ((field[Field.p] as number) - p) / (field[Field.pT] as number)
    T = Math.min(high + 50, Math.max(low - 50, T - step))
    if (Math.abs(step) < 1e-10 * T) break
  }
  region3Field(field, rho, T)
  return T
}

/** Whether an enthalpy (J/kg) lies on the liquid's side, subregion 3a, above the critical pressure. */
export function onLiquidSide(p: number, h: number): boolean {
  const pi = p * 1e-6
  const [a, b, c, d] = boundary3ab
  return h <= 1e3 * (a + pi * (b + pi * (c + pi * d)))
}

/**
 * Densities of saturated liquid and steam between 16.5 MPa and the critical pressure, as rho_c + z f(z)
 * with z = sqrt((pc - p) / 1 MPa): our own fit, good to 0.5 %, only ever a first guess.
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
  return criticalDensity + z * sum
}

/**
 * Density (kg/m3) of the saturated liquid (side 1) or the dry saturated steam (side -1) at a pair of p
 * (Pa) and T (K) on the saturation line, p in Pa below the critical pressure by `gap` Pa. From outside
 * the density that is sought p(rho) bends one way only, so that Newton's steps close in from there.
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
    const step = ((field[Field.p] as number) - p) / (field[Field.pRho] as number)
    const size = Math.abs(step)
    // Round-off reached: steps no longer shrink.
    if (i > 3 && size >= last) break
    last = size
    rho -= step
    if (size < 1e-14 * rho) break
  }
  region3Field(field, rho, T)
  return rho
}

/** The field in use by callers that keep none of their own. */
export const region3Scratch: Float64Array = scratch
