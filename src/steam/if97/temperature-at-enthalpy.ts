/**
 * T from p and h within one region, to round-off of the forward equation. With h = R T* dgamma/dtau
 * the equation to solve is one in tau alone; Halley's step converges with the third power of the
 * error.
 */
import { gasConstant } from '../constants.ts'
import { POINT_SIZE, Point, region5Point } from './point.ts'
import { boundary2bc } from './rows/boundaries.ts'
import { region1Slopes, region1TemperatureFromEnthalpy } from './unrolled-region1.ts'
import {
  lowPressure2,
  region2aTemperatureFromEnthalpy,
  region2bTemperatureFromEnthalpy,
  region2cTemperatureFromEnthalpy,
  region2LowSlopes,
  region2Slopes,
} from './unrolled-region2.ts'

const g = new Float64Array(9)
const point5 = new Float64Array(POINT_SIZE)

/**
 * What a temperature is sought from: p (Pa), h (J/kg), a guess of T (K; 0: the backward equations)
 * and the T (K) at which the region ends towards region 3 or saturation. The answer is left in T,
 * and in tau for regions 1 and 2.
 */
export const Asked = { p: 0, h: 1, guess: 2, limit: 3, T: 4, tau: 5 } as const
export const ASKED_SIZE = 6

/**
 * Below this step of tau (as part of tau) the error left, of the third power of the step, is below
 * 1e-13: `settlePoint` takes the rest.
 */
const settled = 1e-5
/** Steps before a solution is given up; from the backward equations two are enough. */
const MOST_STEPS = 30

/**
 * Beyond a border (K) an iterate may stray this far: within the region h rises with T and the
 * answer is the only one, further out the equations bend back.
 */
const stray = 0.5

// Slots and limits as constants of this module: an imported binding is looked up at each use.
const { p: askP, h: askH, limit: askLimit, guess: askGuess, tau: askTau, T: askT } = Asked

// 1 / (R T*) of regions 1 and 2, kg/J.
const perScale1 = 1 / (gasConstant * 1386)
const lowPressure = lowPressure2
const perScale2 = 1 / (gasConstant * 540)

/** The step of tau from the derivatives of gamma to tau in `g`. */
function halley(off: number): number {
  const slope = g[1] as number
  const bend = off * (g[2] as number)
  const square = slope * slope
  // Far off, where the curve bends too much for Halley's step, Newton's.
  return bend < square ? (2 * off * slope) / (2 * square - bend) : off / slope
}

/** Region 1: T of the asked p and h, up to the asked limit. */
export function region1TemperatureAtEnthalpy(asked: Float64Array): void {
  const p = asked[askP] as number
  const h = asked[askH] as number
  const most = (asked[askLimit] as number) + stray
  let T = asked[askGuess] as number
  if (!(T > 260 && T < most)) {
    g[6] = p * 1e-6
    g[7] = h * (1 / 2.5e6) + 1
    region1TemperatureFromEnthalpy(g)
    T = g[0] as number
    if (!(T > 265)) T = 265
    else if (T > most) T = most
  }
  const target = h * perScale1
  const least = 1386 / most
  let tau = 1386 / T
  g[6] = 7.1 - p * (1 / 16.53e6)
  for (let i = 0; i < MOST_STEPS; i++) {
    g[7] = tau - 1.222
    region1Slopes(g)
    const step = halley((g[0] as number) - target)
    tau -= step
    if (tau > 5.3) tau = 5.3
    else if (tau < least) tau = least
    if (Math.abs(step) < settled * tau) break
  }
  asked[askTau] = tau
  asked[askT] = 1386 / tau
}

/** Region 2: T of the asked p and h, from the asked limit on and never above 1075 K. */
export function region2TemperatureAtEnthalpy(asked: Float64Array): void {
  const pi = (asked[askP] as number) * 1e-6
  const h = asked[askH] as number
  const least = (asked[askLimit] as number) - stray
  let T = asked[askGuess] as number
  if (!(T > least && T < 1075)) {
    region2Guess(pi, h)
    T = g[0] as number
    if (!(T > least)) T = least
    else if (T > 1075) T = 1075
  }
  const target = h * perScale2
  const most = 540 / least
  let tau = 540 / T
  g[6] = pi
  for (let i = 0; i < MOST_STEPS; i++) {
    g[7] = tau
    if (pi < lowPressure) region2LowSlopes(g)
    else region2Slopes(g)
    const step = halley((g[0] as number) - target)
    tau -= step
    if (tau > most) tau = most
    else if (tau < 0.5023) tau = 0.5023
    if (Math.abs(step) < settled * tau) break
  }
  asked[askTau] = tau
  asked[askT] = 540 / tau
}

/**
 * Backward equations of region 2, Eqs. (22) to (24), with the boundary 2b/2c, Eq. (21); T in g[0].
 */
function region2Guess(pi: number, h: number): void {
  const eta = h * (1 / 2e6)
  g[6] = pi
  if (pi <= 4) {
    g[7] = eta - 2.1
    region2aTemperatureFromEnthalpy(g)
    return
  }
  if (pi > 6.5467) {
    const border = boundary2bc[3] + Math.sqrt((pi - boundary2bc[4]) / boundary2bc[2])
    if (h < border * 1e3) {
      g[6] = pi + 25
      g[7] = eta - 1.8
      region2cTemperatureFromEnthalpy(g)
      return
    }
  }
  g[6] = pi - 2
  g[7] = eta - 2.6
  region2bTemperatureFromEnthalpy(g)
}

/** Region 5: T of the asked p and h by Newton's steps; the limit is not used. */
export function region5TemperatureAtEnthalpy(asked: Float64Array): void {
  const p = asked[askP] as number
  const h = asked[askH] as number
  const guess = asked[askGuess] as number
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
  asked[askT] = T
}
