/**
 * The saturation line, region 4 of IAPWS R7-97(2012), Eqs. (29) to (31). One implicit quadratic
 * holds pressure and temperature together, so both directions are explicit.
 */
import { region4 } from './rows/region4.ts'

const [n1, n2, n3, n4, n5, n6, n7, n8, n9, n10] = region4

/** Saturation temperature, K, of a pressure in Pa between 611.213 Pa and 22.064 MPa (Eq. (31)). */
export function saturationTemperatureOf(p: number): number {
  const beta2 = Math.sqrt(p * 1e-6)
  const beta = Math.sqrt(beta2)
  const e = beta2 + n3 * beta + n6
  const f = n1 * beta2 + n4 * beta + n7
  const g = n2 * beta2 + n5 * beta + n8
  const d = (2 * g) / (-f - Math.sqrt(f * f - 4 * e * g))
  const sum = n10 + d
  return 0.5 * (sum - Math.sqrt(sum * sum - 4 * (n9 + n10 * d)))
}

/** Saturation pressure, Pa, of a temperature in K between 273.15 K and 647.096 K (Eq. (30)). */
export function saturationPressureOf(T: number): number {
  const theta = T + n9 / (T - n10)
  const a = theta * theta + n1 * theta + n2
  const b = n3 * theta * theta + n4 * theta + n5
  const c = n6 * theta * theta + n7 * theta + n8
  const beta = (2 * c) / (-b + Math.sqrt(b * b - 4 * a * c))
  const beta2 = beta * beta
  return beta2 * beta2 * 1e6
}

/** dT/dp, K/Pa, of the saturation line at a pair of p and T on it, from the implicit equation. */
export function saturationSlope(p: number, T: number): number {
  const beta2 = Math.sqrt(p * 1e-6)
  const beta = Math.sqrt(beta2)
  const apart = T - n10
  const theta = T + n9 / apart
  const theta2 = theta * theta
  const toBeta = 2 * beta * (theta2 + n1 * theta + n2) + n3 * theta2 + n4 * theta + n5
  const toTheta = beta2 * (2 * theta + n1) + beta * (2 * n3 * theta + n4) + 2 * n6 * theta + n7
  const thetaToT = 1 - n9 / (apart * apart)
  return (-toBeta / (toTheta * thetaToT)) * (beta / (4 * p))
}

/**
 * T (K) and dT/dp (K/Pa) of a pressure in Pa, from slot `at` of an array into the slots given: Eq.
 * (31) and the slope of the implicit equation in one go.
 */
export function saturationLine(
  record: Float64Array,
  at: number,
  temperatureSlot: number,
  slopeSlot: number,
): void {
  const p = record[at] as number
  const beta2 = Math.sqrt(p * 1e-6)
  const beta = Math.sqrt(beta2)
  const e = beta2 + n3 * beta + n6
  const f = n1 * beta2 + n4 * beta + n7
  const g = n2 * beta2 + n5 * beta + n8
  const root = Math.sqrt(f * f - 4 * e * g)
  const d = (2 * g) / (-f - root)
  const sum = n10 + d
  const T = 0.5 * (sum - Math.sqrt(sum * sum - 4 * (n9 + n10 * d)))
  // d is theta: e theta^2 + f theta + g = 0, and its derivative to theta is the root.
  const toBeta = d * (d * (2 * beta + n3) + 2 * n1 * beta + n4) + 2 * n2 * beta + n5
  const apart = T - n10
  const thetaToT = 1 - n9 / (apart * apart)
  record[temperatureSlot] = T
  record[slopeSlot] = (-toBeta * beta) / (4 * p * root * thetaToT)
}
