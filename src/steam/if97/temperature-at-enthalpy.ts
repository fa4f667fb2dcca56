/**
 * T from p and h within one region, to round-off of the forward equation. With h = R T* dgamma/dtau the
 * equation to solve is one in tau alone; Halley's step converges with the third power of the error.
 */
import { gasConstant } from '../constants.ts'
import { POINT_SIZE, Point, region5Point } from './point.ts'
import { boundary2bc } from './rows/boundaries.ts'
import { region1Slopes, region1TemperatureFromEnthalpy } from './unrolled-region1.ts'
import {
  region2aTemperatureFromEnthalpy,
  region2bTemperatureFromEnthalpy,
  region2cTemperatureFromEnthalpy,
  region2Slopes,
} from './unrolled-region2.ts'

const g = new Float64Array(3)
const point5 = new Float64Array(POINT_SIZE)

/**
 * Below this step of tau (as part of tau) the next one is round-off: the error left is of the third
 * power of the step.
 */
const settled = 1e-6
/** Steps before a solution is given up; from the backward equations two are enough. */
const MOST_STEPS = 30

/**
 * Beyond a border (K) an iterate may stray this far: within the region h rises with T and the answer is
 * the only one, further out the equations bend back.
 */
const stray = 0.5

/**
 * Region 1: T (K) of p (Pa) and h (J/kg). `guess` 0 starts from the backward equation; `ceiling` (K) is
 * the saturation temperature or the border to region 3.
 */
export function region1TemperatureAtEnthalpy(
  p: number,
  h: number,
  guess: number,
  ceiling: number,
): number {
  const x = 7.1 - p / 16.53e6
  const target = h / (gasConstant * 1386)
  const most = ceiling + stray
  let T =
    guess > 260 && guess < most ? guess : region1TemperatureFromEnthalpy(p * 1e-6, h / 2.5e6 + 1)
  if (!(T > 265)) T = 265
  else if (T > most) T = most
  const least = 1386 / most
  let tau = 1386 / T
  for (let i = 0; i < MOST_STEPS; i++) {
    region1Slopes(g, x, tau - 1.222)
    const off = (g[0] as number) - target
    const slope = g[1] as number
    const bend = off * (g[2] as number)
    const square = slope * slope
    // Far off, where the curve bends too much for Halley's step, Newton's.
    const step = bend < square ? (2 * off * slope) / (2 * square - bend) : off / slope
    tau -= step
    if (tau > 5.3) tau = 5.3
    else if (tau < least) tau = least
    if (Math.abs(step) < settled * tau) break
  }
  return 1386 / tau
}

/**
 * Region 2: T (K) of p (Pa) and h (J/kg), never above 1075 K. `guess` 0 starts from the backward
 * equations; `floor` (K) is the saturation temperature, the border to region 3 or 273.15 K.
 */
export function region2TemperatureAtEnthalpy(
  p: number,
  h: number,
  guess: number,
  floor: number,
): number {
  const pi = p * 1e-6
  const target = h / (gasConstant * 540)
  const least = floor - stray
  let T = guess > least && guess < 1075 ? guess : region2Guess(pi, h)
  if (!(T > least)) T = least
  else if (T > 1075) T = 1075
  const most = 540 / least
  let tau = 540 / T
  for (let i = 0; i < MOST_STEPS; i++) {
    region2Slopes(g, pi, tau)
    const off = (g[0] as number) - target
    const slope = g[1] as number
    const bend = off * (g[2] as number)
    const square = slope * slope
    // Far off, where the curve bends too much for Halley's step, Newton's.
    const step = bend < square ? (2 * off * slope) / (2 * square - bend) : off / slope
    tau -= step
    if (tau > most) tau = most
    else if (tau < 0.5023) tau = 0.5023
    if (Math.abs(step) < settled * tau) break
  }
  return 540 / tau
}

/** Backward equations of region 2, Eqs. (22) to (24), with the boundary 2b/2c, Eq. (21). */
function region2Guess(pi: number, h: number): number {
  if (pi <= 4) return region2aTemperatureFromEnthalpy(pi, h / 2e6 - 2.1)
  if (pi > 6.5467) {
    const border = boundary2bc[3] + Math.sqrt((pi - boundary2bc[4]) / boundary2bc[2])
    if (h < border * 1e3) return region2cTemperatureFromEnthalpy(pi + 25, h / 2e6 - 1.8)
  }
  return region2bTemperatureFromEnthalpy(pi - 2, h / 2e6 - 2.6)
}

/** Region 5: T (K) of p (Pa) and h (J/kg) from 1073.15 K on; Newton's steps in T. */
export function region5TemperatureAtEnthalpy(p: number, h: number, guess: number): number {
  // cp is near 2.2 kJ/(kg K) at 1073 K and 2.9 at 2273 K: the straight line is close enough.
  let T = guess > 1000 ? guess : 1073.15 + (h - 4.1e6) / 2.6e3
  for (let i = 0; i < MOST_STEPS; i++) {
    if (T < 1000) T = 1000
    else if (T > 2400) T = 2400
    region5Point(point5, p, T)
    const step = ((point5[Point.h] as number) - h) / (point5[Point.cp] as number)
    T -= step
    if (Math.abs(step) < 1e-8 * T) break
  }
  return T
}
