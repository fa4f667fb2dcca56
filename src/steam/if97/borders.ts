/** The border between regions 2 and 3, IAPWS R7-97(2012), Eqs. (5) and (6). */
import { boundary23 } from './rows/boundaries.ts'

const [n1, n2, n3, n4, n5] = boundary23

/** Pressure (Pa) of the border 2/3 at a temperature (K). */
export function borderPressure23(T: number): number {
  return (n1 + T * (n2 + T * n3)) * 1e6
}

/** Temperature (K) of the border 2/3 at a pressure (Pa). */
export function borderTemperature23(p: number): number {
  return n4 + Math.sqrt((p * 1e-6 - n5) / n3)
}

/** dT/dp (K/Pa) along the border 2/3 at a temperature (K) on it. */
export function borderSlope23(T: number): number {
  return 1e-6 / (2 * n3 * (T - n4))
}
