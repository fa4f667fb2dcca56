/**
 * T from p and h within one region, to round-off of the forward equation. With h = R T* dgamma/dtau
 * the equation to solve is one in tau alone: the backward equation and one of Newton's steps, or a
 * state nearby, lead so close that all that is left follows from the derivatives there.
 */
import { gasConstant } from '../constants.ts'
import { POINT_SIZE, Point, region5Point, SUM_SIZE } from './point.ts'
import { boundary2bc } from './rows/boundaries.ts'
import {
  region1Potential,
  region1Slopes,
  region1TemperatureFromEnthalpy,
} from './unrolled-region1.ts'
import {
  lowPressure2,
  region2aTemperatureFromEnthalpy,
  region2bTemperatureFromEnthalpy,
  region2cTemperatureFromEnthalpy,
  region2LowPotential,
  region2LowSlopes,
  region2Potential,
  region2Slopes,
} from './unrolled-region2.ts'

/** gamma and its derivatives at the last tau that a settled state stands beside. */
export const gibbs: Float64Array = new Float64Array(SUM_SIZE)
// A constant of this module: an export is looked up at each use.
const g = gibbs
const point5 = new Float64Array(POINT_SIZE)

/**
 * What a temperature is sought from: p (Pa), h (J/kg), a guess of T (K; 0: none) and the T (K) at
 * which the region ends towards region 3 or saturation. The answer for regions 1 and 2 is tau + step,
 * with the derivatives of gamma at tau in `gibbs`, for region 5 it is T.
 */
export const Asked = { p: 0, h: 1, guess: 2, limit: 3, T: 4, tau: 5, step: 6, log: 7 } as const
export const ASKED_SIZE = 8

/**
 * Step of tau (as part of tau) after which T, s and v follow to its third power and their partials
 * to its second: below 1e-12 of themselves, round-off at most places.
 */
const settled = 1e-7
/** Steps before a solution is given up; two are enough from anywhere within a region. */
const MOST_STEPS = 30

/**
 * Beyond a border (K) an iterate may stray this far: within the region h rises with T and the
 * answer is the only one, further out the equations bend back.
 */
const stray = 0.5

// Slots and limits as constants of this module: an imported binding is looked up at each use.
const {
  p: askP,
  h: askH,
  limit: askLimit,
  guess: askGuess,
  tau: askTau,
  T: askT,
  step: askStep,
  log: askLog,
} = Asked

// 1 / (R T*) of regions 1 and 2, kg/J.
const perScale1 = 1 / (gasConstant * 1386)
const lowPressure = lowPressure2
const perScale2 = 1 / (gasConstant * 540)

/** tau of region 1 at 261.5 K and of region 2 at 1075 K. */
const mostTau1 = 5.3
const leastTau2 = 540 / 1075

/**
 * The step of tau that brings dgamma/dtau to the value in the asked step, to second order; in its
 * place.
 */
function stepTo(asked: Float64Array): void {
  const perSlope = 1 / (g[5] as number)
  const first = ((asked[askStep] as number) - (g[3] as number)) * perSlope
  asked[askStep] = first - 0.5 * first * first * (g[9] as number) * perSlope
}

/** Region 1: tau of the asked p and h, up to the asked limit, from the asked guess if there is one. */
export function region1TemperatureAtEnthalpy(asked: Float64Array): void {
  const p = asked[askP] as number
  const target = (asked[askH] as number) * perScale1
  const guess = asked[askGuess] as number
  const x = 7.1 - p * (1 / 16.53e6)
  const hottest = (asked[askLimit] as number) + stray
  const least = 1386 / hottest
  let tau: number
  if (guess > 260 && guess < hottest) tau = 1386 / guess
  else {
    g[6] = p * 1e-6
    g[7] = (asked[askH] as number) * (1 / 2.5e6) + 1
    region1TemperatureFromEnthalpy(g)
    tau = Math.min(Math.max(1386 / (g[0] as number), least), mostTau1)
    g[6] = x
    g[7] = tau - 1.222
    region1Slopes(g)
    tau += (target - (g[0] as number)) / (g[1] as number)
    tau = Math.min(Math.max(tau, least), mostTau1)
  }
  g[6] = x
  for (let i = 0; i < MOST_STEPS; i++) {
    g[7] = tau - 1.222
    region1Potential(g)
    asked[askTau] = tau
    asked[askStep] = target
    stepTo(asked)
    const step = asked[askStep] as number
    if (Math.abs(step) < settled * tau) break
    tau = Math.min(Math.max(tau + step, least), mostTau1)
  }
}

/**
 * Region 2: tau of the asked p and h, from the asked limit on and never above 1075 K, from the asked
 * guess if there is one, with ln(p / 1 MPa) in the asked log.
 */
export function region2TemperatureAtEnthalpy(asked: Float64Array): void {
  const pi = (asked[askP] as number) * 1e-6
  const target = (asked[askH] as number) * perScale2
  const guess = asked[askGuess] as number
  const coldest = (asked[askLimit] as number) - stray
  const most = 540 / coldest
  const low = pi < lowPressure
  let tau: number
  if (guess > coldest && guess < 1075) tau = 540 / guess
  else {
    region2Guess(pi, asked[askH] as number)
    tau = Math.min(Math.max(540 / (g[0] as number), leastTau2), most)
    g[6] = pi
    g[7] = tau
    if (low) region2LowSlopes(g)
    else region2Slopes(g)
    tau += (target - (g[0] as number)) / (g[1] as number)
    tau = Math.min(Math.max(tau, leastTau2), most)
  }
  g[6] = pi
  g[8] = asked[askLog] as number
  for (let i = 0; i < MOST_STEPS; i++) {
    g[7] = tau
    if (low) region2LowPotential(g)
    else region2Potential(g)
    asked[askTau] = tau
    asked[askStep] = target
    stepTo(asked)
    const step = asked[askStep] as number
    if (Math.abs(step) < settled * tau) break
    tau = Math.min(Math.max(tau + step, leastTau2), most)
  }
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
