/**
 * Enthalpy from pressure and entropy: the isobar is walked from cold to hot, region by region, each
 * ending at a border where both sides are known; entropy rises along it.
 */
import {
  borderPressure13,
  borderTemperature13,
  criticalPressure,
  highestPressure,
  highestPressure5,
  highestTemperature,
  highestTemperature25,
  lowestPressure,
  lowestSaturationPressure,
  lowestTemperature,
} from './constants.ts'
import { refusePressure, write } from './enthalpy.ts'
import { gapForm, wetForm } from './enthalpy-between.ts'
import { highSide, sidesOfBorder13, sidesOfBorder23, sidesOfBorder25 } from './gap.ts'
import { borderTemperature23 } from './if97/borders.ts'
import {
  POINT_SIZE,
  Point,
  region1Point,
  region2Point,
  region5Point,
  SUM_SIZE,
} from './if97/point.ts'
import { FIELD_SIZE, Field, region3AtEntropy, Sought, sought } from './if97/region3.ts'
import { region1TemperatureFromEntropy } from './if97/unrolled-region1.ts'
import {
  region2aTemperatureFromEntropy,
  region2bTemperatureFromEntropy,
  region2cTemperatureFromEntropy,
} from './if97/unrolled-region2.ts'
import { Outcome, refuse } from './outcome.ts'
import { Result, Saturation } from './records.ts'
import { cachedSaturation, saturationCache } from './saturation.ts'

// Slots and limits as constants of this module: an imported binding is looked up at each use.
const { sL: satSL, sV: satSV } = Saturation
const { h: ptH, s: ptS, cp: ptCp, v: ptV, vT: ptVT } = Point
const { value: outValue, first: outFirst, second: outSecond } = Result
const { T: ofT, h: ofH, rho: ofRho } = Field
const pressure13 = borderPressure13
const critical = criticalPressure
const leastSaturation = lowestSaturationPressure
const cache = saturationCache

const point = new Float64Array(POINT_SIZE)
const field = new Float64Array(FIELD_SIZE)

/** Round-off allowed at the limits of temperature, K. */
const temperatureSlack = 1e-7
const MOST_STEPS = 60

// Bounds of s (J/(kg K)) along the borders 1/3 and 2/3 from 16.529 to 100 MPa.
const leastEntropy13 = 3.39e3
const mostEntropy13 = 3.79e3
const leastEntropy23 = 5.04e3
const mostEntropy23 = 5.27e3

// Where an isobar above 16.529 MPa is looked at.
const LIQUID = 0
const VAPOUR = 1
const SUPERCRITICAL = 2

/**
 * h (J/kg) of pressure (Pa) and entropy (J/(kg K)), in any region. dh/dp at constant s is v and
 * dh/ds at constant p is T in a single phase; within the wet region, and in a gap between two
 * regions, the partials are those of the mixture of both sides.
 */
export function enthalpyAtPressureEntropy(
  out: Float64Array,
  at: number,
  p: number,
  s: number,
): number {
  // Short enough to be inlined: numbers passed on to a longer function would be allocated.
  asked[0] = p
  asked[1] = s
  return entropyForm(out, at)
}

/**
 * p (Pa) and s (J/(kg K)) or v (m3/kg) of the call under way; T (K) of the last step and the step.
 */
const asked = new Float64Array(4)
const g = new Float64Array(SUM_SIZE)

function entropyForm(out: Float64Array, at: number): number {
  const p = asked[0] as number
  const s = asked[1] as number
  if (!(p >= lowestPressure && p <= highestPressure)) return refusePressure(p)
  if (s === Number.POSITIVE_INFINITY) return refuseHighEntropy()
  if (!Number.isFinite(s)) return refuseEntropy()
  if (p >= critical) return denseEntropy(out, at, SUPERCRITICAL)
  if (p < leastSaturation) return steamEntropy(out, at)
  const slot = cachedSaturation(p)
  if (s < (cache[slot + satSL] as number)) {
    return p > pressure13 ? denseEntropy(out, at, LIQUID) : liquidEntropy(out, at)
  }
  if (s > (cache[slot + satSV] as number)) {
    return p > pressure13 ? denseEntropy(out, at, VAPOUR) : steamEntropy(out, at)
  }
  return wetForm(out, at, asked, slot, satSL)
}

function denseEntropy(out: Float64Array, at: number, side: number): number {
  const p = asked[0] as number
  const s = asked[1] as number
  if (side !== VAPOUR && s < mostEntropy13) {
    if (s < leastEntropy13) return liquidEntropy(out, at)
    region1Point(point, p, borderTemperature13)
    if (s <= (point[ptS] as number)) return liquidEntropy(out, at)
  }
  if (side !== LIQUID && s > leastEntropy23) {
    if (s > mostEntropy23) return steamEntropy(out, at)
    region2Point(point, p, borderTemperature23(p))
    if (s >= (point[ptS] as number)) return steamEntropy(out, at)
  }
  // The critical entropy parts subregion 3a from 3b.
  const liquidSide = side === LIQUID || (side === SUPERCRITICAL && s <= criticalEntropy)
  sought[Sought.p] = p
  sought[Sought.value] = s
  if (!region3AtEntropy(field, liquidSide)) return refuse(Outcome.entropyHigh, s, s)
  const T = field[ofT] as number
  if (T < borderTemperature13) {
    sidesOfBorder13(p)
    return gapForm(out, at, asked, ptS)
  }
  if (side !== LIQUID && T > borderTemperature23(p)) {
    sidesOfBorder23(p)
    return gapForm(out, at, asked, ptS)
  }
  return write(out, at, field[ofH] as number, 1 / (field[ofRho] as number), T)
}

/** Entropy at the critical point, J/(kg K). */
const criticalEntropy = 4412.02148223476

/**
 * Step (as part of T) after which h, s and v at the next T follow from Taylor's terms to round-off.
 */
const settled = 1e-7

function liquidEntropy(out: Float64Array, at: number): number {
  const p = asked[0] as number
  const s = asked[1] as number
  g[6] = p * 1e-6
  g[7] = s * 1e-3 + 2
  region1TemperatureFromEntropy(g)
  let T = Math.min(640, Math.max(265, g[0] as number))
  for (let i = 0; i < MOST_STEPS; i++) {
    region1Point(point, p, T)
    const step = ((s - (point[ptS] as number)) * T) / (point[ptCp] as number)
    if (Math.abs(step) < settled * T) {
      asked[2] = T
      asked[3] = step
      return finishEntropy(out, at)
    }
    T = Math.min(640, Math.max(265, T + step))
  }
  return refuseEntropy()
}

function steamEntropy(out: Float64Array, at: number): number {
  const p = asked[0] as number
  const s = asked[1] as number
  steamGuess()
  let T = Math.min(1075, Math.max(265, g[0] as number))
  let stuck = 0
  for (let i = 0; i < MOST_STEPS && stuck < 3; i++) {
    region2Point(point, p, T)
    const step = ((s - (point[ptS] as number)) * T) / (point[ptCp] as number)
    if (Math.abs(step) < settled * T) {
      if (T + step > highestTemperature25) break
      asked[2] = T
      asked[3] = step
      return finishEntropy(out, at)
    }
    // s is concave in T: a bounded step never swings.
    T = Math.min(1075, Math.max(265, T + Math.min(step, T)))
    stuck = T === 1075 || T === 265 ? stuck + 1 : 0
  }
  if (T < 300) return refuseEntropy()
  return hotEntropy(out, at)
}

/** Backward equations of region 2, Eqs. (25) to (27); T in g[0]. */
function steamGuess(): void {
  const p = asked[0] as number
  const s = asked[1] as number
  const pi = p * 1e-6
  if (p < leastSaturation) {
    g[0] = 600
  } else if (pi <= 4) {
    g[6] = Math.sqrt(Math.sqrt(pi))
    g[7] = s / 2e3 - 2
    region2aTemperatureFromEntropy(g)
  } else if (s >= 5.85e3) {
    g[6] = pi
    g[7] = 10 - s / 785.3
    region2bTemperatureFromEntropy(g)
  } else {
    g[6] = pi
    g[7] = 2 - s / 2925.1
    region2cTemperatureFromEntropy(g)
  }
}

/** The last step of T, so short that the trapezium under T(s) is h to round-off. */
function finishEntropy(out: Float64Array, at: number): number {
  const T = asked[2] as number
  const step = asked[3] as number
  const end = T + step
  if (end < lowestTemperature - temperatureSlack) return refuseEntropy()
  const rise = (asked[1] as number) - (point[ptS] as number)
  out[at + outValue] = (point[ptH] as number) + (T + 0.5 * step) * rise
  out[at + outFirst] = (point[ptV] as number) + (point[ptVT] as number) * step
  out[at + outSecond] = end
  return Outcome.fine
}

function refuseEntropy(): number {
  const p = asked[0] as number
  if (p < leastSaturation) region2Point(point, p, lowestTemperature)
  else region1Point(point, p, lowestTemperature)
  return refuse(Outcome.entropyLow, asked[1] as number, point[ptS] as number)
}

/** Above 1073.15 K: the gap there or region 5. */
function hotEntropy(out: Float64Array, at: number): number {
  const p = asked[0] as number
  const s = asked[1] as number
  if (p > highestPressure5) {
    region2Point(point, p, highestTemperature25)
    if (s > (point[ptS] as number) * (1 + 1e-12)) return refuseHighEntropy()
    return write(out, at, point[ptH] as number, point[ptV] as number, highestTemperature25)
  }
  sidesOfBorder25(p)
  if (s < (highSide[ptS] as number)) return gapForm(out, at, asked, ptS)
  let T = 1500
  for (let i = 0; i < MOST_STEPS; i++) {
    region5Point(point, p, T)
    const step = ((s - (point[ptS] as number)) * T) / (point[ptCp] as number)
    if (Math.abs(step) < settled * T) {
      if (T + step > highestTemperature + temperatureSlack) break
      asked[2] = T
      asked[3] = step
      return finishEntropy(out, at)
    }
    if (T === 2400 && step > 0) break
    T = Math.min(2400, Math.max(1000, T + step))
  }
  return refuseHighEntropy()
}

function refuseHighEntropy(): number {
  const p = asked[0] as number
  if (p > highestPressure5) region2Point(point, p, highestTemperature25)
  else region5Point(point, p, highestTemperature)
  return refuse(Outcome.entropyHigh, asked[1] as number, point[ptS] as number)
}
