/**
 * The forward equations at one point, in SI units: a POINT holds h (J/kg), s (J/(kg K)), v (m3/kg),
 * cp (J/(kg K)), dv/dT at constant p, dv/dp and dh/dp at constant T. All first partials of a
 * single-phase state follow from these.
 */
import { gasConstant } from '../constants.ts'
import { region1Potential } from './unrolled-region1.ts'
import { lowPressure2, region2LowPotential, region2Potential } from './unrolled-region2.ts'
import { region5Potential } from './unrolled-region5.ts'

/**
 * Slots of a point; p (Pa), T (K), the reduced inverse temperature tau and, for steam, ln(p / 1
 * MPa) are its inputs, and the enthalpy aimed at (J/kg) where there is one.
 */
export const Point = {
  h: 0,
  s: 1,
  v: 2,
  cp: 3,
  vT: 4,
  vp: 5,
  hp: 6,
  p: 7,
  T: 8,
  tau: 9,
  log: 10,
  goal: 11,
} as const
export const POINT_SIZE = 12

/** Size of the array that a generated sum reads its inputs from and writes its outputs to. */
export const SUM_SIZE = 12

// Inputs and outputs pass through arrays: a number passed to or from a function that is not inlined
// would be allocated.
const g = new Float64Array(SUM_SIZE)
// A constant of this module: an imported binding is looked up at each use.
const R = gasConstant
const lowPressure = lowPressure2

/** R T*, R / p*, 1 / p* and T* of a region's reducing quantities. */
function scalesOf(Tstar: number, pstar: number): Float64Array {
  return Float64Array.of(R * Tstar, R / pstar, 1 / pstar, Tstar)
}
export const scales1: Float64Array = scalesOf(1386, 16.53e6)
export const scales2: Float64Array = scalesOf(540, 1e6)
const scales5 = scalesOf(1000, 1e6)

/** Fills a point from gamma's derivatives in `g`. */
function fromGibbs(point: Float64Array, scales: Float64Array): void {
  const T = point[8] as number
  const perVolume = scales[1] as number
  const tau = point[9] as number
  const gTau = g[3] as number
  const gPi = g[1] as number
  const gPiTau = g[4] as number
  const volumeT = perVolume * T
  point[0] = (scales[0] as number) * gTau
  point[1] = R * (tau * gTau - (g[0] as number))
  point[2] = volumeT * gPi
  point[3] = -R * tau * tau * (g[5] as number)
  point[4] = perVolume * (gPi - tau * gPiTau)
  point[5] = volumeT * (scales[2] as number) * (g[2] as number)
  // v - T dv/dT without the cancellation that it has in a thin gas
  point[6] = perVolume * (scales[3] as number) * gPiTau
}

function region1At(point: Float64Array): void {
  g[6] = 7.1 - (point[7] as number) * (scales1[2] as number)
  g[7] = (point[9] as number) - 1.222
  region1Potential(g)
  fromGibbs(point, scales1)
}

function region2At(point: Float64Array): void {
  const pi = (point[7] as number) * 1e-6
  g[6] = pi
  g[7] = point[9] as number
  g[8] = point[10] as number
  if (pi < lowPressure) region2LowPotential(g)
  else region2Potential(g)
  fromGibbs(point, scales2)
}

function region5At(point: Float64Array): void {
  g[6] = (point[7] as number) * 1e-6
  g[7] = point[9] as number
  g[8] = point[10] as number
  region5Potential(g)
  fromGibbs(point, scales5)
}

/** Region 1 at p (Pa) and T (K). */
export function region1Point(point: Float64Array, p: number, T: number): void {
  point[7] = p
  point[8] = T
  point[9] = 1386 / T
  region1At(point)
}

/** Region 2 at p (Pa) and T (K). */
export function region2Point(point: Float64Array, p: number, T: number): void {
  point[7] = p
  point[8] = T
  point[9] = 540 / T
  point[10] = Math.log(p * 1e-6)
  region2At(point)
}

/** Region 5 at p (Pa) and T (K). */
export function region5Point(point: Float64Array, p: number, T: number): void {
  point[7] = p
  point[8] = T
  point[9] = 1000 / T
  point[10] = Math.log(p * 1e-6)
  region5At(point)
}

/**
 * Region 5 at the point's p and T, which is all but settled: T, s and v then follow the last, tiny
 * step that brings h to the point's goal to round-off, to first order; the derivatives stay.
 */
export function region5Settled(point: Float64Array): void {
  point[9] = 1000 / (point[8] as number)
  point[10] = Math.log((point[7] as number) * 1e-6)
  region5At(point)
  const T = point[8] as number
  const h = point[11] as number
  const off = h - (point[0] as number)
  const step = off / (point[3] as number)
  point[0] = h
  point[1] = (point[1] as number) + off / T
  point[2] = (point[2] as number) + step * (point[4] as number)
  point[8] = T + step
}
