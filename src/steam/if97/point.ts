/**
 * The forward equations at one point, in SI units: a POINT holds h (J/kg), s (J/(kg K)), v (m3/kg),
 * cp (J/(kg K)), dv/dT at constant p, dv/dp and dh/dp at constant T. All first partials of a
 * single-phase state follow from these.
 */
import { gasConstant } from '../constants.ts'
import { region1Potential } from './unrolled-region1.ts'
import { region2Potential } from './unrolled-region2.ts'
import { region5Potential } from './unrolled-region5.ts'

/** Slots of a point. */
export const Point = { h: 0, s: 1, v: 2, cp: 3, vT: 4, vp: 5, hp: 6 } as const
export const POINT_SIZE = 7

const g = new Float64Array(6)

/** Fills a point from gamma's derivatives in `g` with the reducing temperature and pressure. */
function fromGibbs(point: Float64Array, T: number, Tstar: number, pstar: number): void {
  const tau = Tstar / T
  const gTau = g[3] as number
  const gPi = g[1] as number
  const volumeScale = gasConstant / pstar
  point[0] = gasConstant * Tstar * gTau
  point[1] = gasConstant * (tau * gTau - (g[0] as number))
  point[2] = volumeScale * T * gPi
  point[3] = -gasConstant * tau * tau * (g[5] as number)
  point[4] = volumeScale * (gPi - tau * (g[4] as number))
  point[5] = (volumeScale * T * (g[2] as number)) / pstar
  // v - T dv/dT without the cancellation that it has in a thin gas
  point[6] = volumeScale * Tstar * (g[4] as number)
}

/** Region 1 at p (Pa) and T (K). */
export function region1Point(point: Float64Array, p: number, T: number): void {
  region1Potential(g, 7.1 - p / 16.53e6, 1386 / T - 1.222)
  fromGibbs(point, T, 1386, 16.53e6)
}

/** Region 2 at p (Pa) and T (K). */
export function region2Point(point: Float64Array, p: number, T: number): void {
  const pi = p * 1e-6
  region2Potential(g, pi, 540 / T, Math.log(pi))
  fromGibbs(point, T, 540, 1e6)
}

/** Region 5 at p (Pa) and T (K). */
export function region5Point(point: Float64Array, p: number, T: number): void {
  const pi = p * 1e-6
  region5Potential(g, pi, 1000 / T, Math.log(pi))
  fromGibbs(point, T, 1000, 1e6)
}
