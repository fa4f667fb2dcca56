/**
 * Enthalpy from pressure and entropy or volume: the isobar is walked from cold to hot, region by region,
 * each ending at a border where both sides are known; entropy and volume rise along it.
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
import {
  border,
  enthalpyAlong,
  entropyAlong,
  highSide,
  lowSide,
  sidesOfBorder13,
  sidesOfBorder23,
  sidesOfBorder25,
  volumeAlong,
} from './gap.ts'
import { borderTemperature23 } from './if97/borders.ts'
import { POINT_SIZE, Point, region1Point, region2Point, region5Point } from './if97/point.ts'
import { FIELD_SIZE, Field, found, region3AtEntropy, region3Temperature } from './if97/region3.ts'
import { region1TemperatureFromEntropy } from './if97/unrolled-region1.ts'
import {
  region2aTemperatureFromEntropy,
  region2bTemperatureFromEntropy,
  region2cTemperatureFromEntropy,
} from './if97/unrolled-region2.ts'
import { Outcome, refuse } from './outcome.ts'
import { Saturation } from './records.ts'
import { cachedSaturation, saturationCache } from './saturation.ts'

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
 * h (J/kg) of pressure (Pa) and entropy (J/(kg K)), in any region. dh/dp at constant s is v and dh/ds at
 * constant p is T in a single phase; within the wet region, and in a gap between two regions, the
 * partials are those of the mixture of both sides.
 */
export function enthalpyAtPressureEntropy(
  out: Float64Array,
  at: number,
  p: number,
  s: number,
): number {
  if (!(p >= lowestPressure && p <= highestPressure)) return refusePressure(p)
  if (!Number.isFinite(s)) return refuse(s > 0 ? Outcome.entropyHigh : Outcome.entropyLow, s, 0)
  if (p >= criticalPressure) return denseEntropy(out, at, p, s, SUPERCRITICAL)
  if (p < lowestSaturationPressure) return steamEntropy(out, at, p, s)
  const slot = cachedSaturation(p)
  if (s < (saturationCache[slot + Saturation.sL] as number)) {
    return p > borderPressure13 ? denseEntropy(out, at, p, s, LIQUID) : liquidEntropy(out, at, p, s)
  }
  if (s > (saturationCache[slot + Saturation.sV] as number)) {
    return p > borderPressure13 ? denseEntropy(out, at, p, s, VAPOUR) : steamEntropy(out, at, p, s)
  }
  return wetForm(out, at, slot, s, Saturation.sL)
}

/** h between saturated liquid and steam by s or v, whose slot of the liquid's side is given. */
function wetForm(out: Float64Array, at: number, slot: number, value: number, of: number): number {
  const first = saturationCache[slot + of] as number
  const firstP = saturationCache[slot + of + DERIVATIVES] as number
  const width = (saturationCache[slot + of + 1] as number) - first
  const widthP = (saturationCache[slot + of + DERIVATIVES + 1] as number) - firstP
  const hL = saturationCache[slot + Saturation.hL] as number
  const dh = (saturationCache[slot + Saturation.hV] as number) - hL
  const hLp = saturationCache[slot + Saturation.hLp] as number
  const dhp = (saturationCache[slot + Saturation.hVp] as number) - hLp
  const x = (value - first) / width
  const xp = -(firstP + x * widthP) / width
  return write(out, at, hL + x * dh, hLp + x * dhp + xp * dh, dh / width)
}

/** From a saturated property's slot to that of its derivative. */
const DERIVATIVES = Saturation.hLp - Saturation.hL

/** h between both sides of a border by s or v, whose slot of a point is given. */
function gapForm(out: Float64Array, at: number, value: number, of: number): number {
  const T = border[0] as number
  const slope = border[1] as number
  const first = lowSide[of] as number
  const width = (highSide[of] as number) - first
  const firstP = alongBorder(lowSide, T, slope, of)
  const widthP = alongBorder(highSide, T, slope, of) - firstP
  const h = lowSide[Point.h] as number
  const dh = (highSide[Point.h] as number) - h
  const hp = enthalpyAlong(lowSide, slope)
  const dhp = enthalpyAlong(highSide, slope) - hp
  const part = (value - first) / width
  const partP = -(firstP + part * widthP) / width
  return write(out, at, h + part * dh, hp + part * dhp + partP * dh, dh / width)
}

function alongBorder(q: Float64Array, T: number, slope: number, of: number): number {
  return of === Point.s ? entropyAlong(q, T, slope) : volumeAlong(q, slope)
}

function denseEntropy(out: Float64Array, at: number, p: number, s: number, side: number): number {
  if (side !== VAPOUR && s < mostEntropy13) {
    if (s < leastEntropy13) return liquidEntropy(out, at, p, s)
    region1Point(point, p, borderTemperature13)
    if (s <= (point[Point.s] as number)) return liquidEntropy(out, at, p, s)
  }
  if (side !== LIQUID && s > leastEntropy23) {
    if (s > mostEntropy23) return steamEntropy(out, at, p, s)
    region2Point(point, p, borderTemperature23(p))
    if (s >= (point[Point.s] as number)) return steamEntropy(out, at, p, s)
  }
  // The critical entropy parts subregion 3a from 3b.
  const liquidSide = side === LIQUID || (side === SUPERCRITICAL && s <= criticalEntropy)
  if (!region3AtEntropy(field, p, s, liquidSide)) return refuse(Outcome.entropyHigh, s, s)
  const T = found[1] as number
  if (T < borderTemperature13) {
    sidesOfBorder13(p)
    return gapForm(out, at, s, Point.s)
  }
  if (side !== LIQUID && T > borderTemperature23(p)) {
    sidesOfBorder23(p)
    return gapForm(out, at, s, Point.s)
  }
  return write(out, at, field[Field.h] as number, 1 / (found[0] as number), T)
}

/** Entropy at the critical point, J/(kg K). */
const criticalEntropy = 4412.02148223476

/** Step (as part of T) after which h, s and v at the next T follow from Taylor's terms to round-off. */
const settled = 1e-7

function liquidEntropy(out: Float64Array, at: number, p: number, s: number): number {
  let T = Math.min(640, Math.max(265, region1TemperatureFromEntropy(p * 1e-6, s * 1e-3 + 2)))
  for (let i = 0; i < MOST_STEPS; i++) {
    region1Point(point, p, T)
    const step = ((s - (point[Point.s] as number)) * T) / (point[Point.cp] as number)
    if (Math.abs(step) < settled * T) return finishEntropy(out, at, p, s, T, step)
    T = Math.min(640, Math.max(265, T + step))
  }
  return refuseEntropy(p, s)
}

function steamEntropy(out: Float64Array, at: number, p: number, s: number): number {
  let T = Math.min(1075, Math.max(265, steamGuess(p, s)))
  let stuck = 0
  for (let i = 0; i < MOST_STEPS && stuck < 3; i++) {
    region2Point(point, p, T)
    const step = ((s - (point[Point.s] as number)) * T) / (point[Point.cp] as number)
    if (Math.abs(step) < settled * T) {
      if (T + step > highestTemperature25) break
      return finishEntropy(out, at, p, s, T, step)
    }
    // s is concave in T: a bounded step never swings.
    T = Math.min(1075, Math.max(265, T + Math.min(step, T)))
    stuck = T === 1075 || T === 265 ? stuck + 1 : 0
  }
  if (T < 300) return refuseEntropy(p, s)
  return hotEntropy(out, at, p, s)
}

function steamGuess(p: number, s: number): number {
  const pi = p * 1e-6
  if (p < lowestSaturationPressure) return 600
  if (pi <= 4) return region2aTemperatureFromEntropy(Math.sqrt(Math.sqrt(pi)), s / 2e3 - 2)
  if (s >= 5.85e3) return region2bTemperatureFromEntropy(pi, 10 - s / 785.3)
  return region2cTemperatureFromEntropy(pi, 2 - s / 2925.1)
}

/** The last step of T, so short that the trapezium under T(s) is h to round-off. */
function finishEntropy(
  out: Float64Array,
  at: number,
  p: number,
  s: number,
  T: number,
  step: number,
): number {
  const end = T + step
  if (end < lowestTemperature - temperatureSlack) return refuseEntropy(p, s)
  const h = (point[Point.h] as number) + (T + 0.5 * step) * (s - (point[Point.s] as number))
  return write(out, at, h, (point[Point.v] as number) + (point[Point.vT] as number) * step, end)
}

function refuseEntropy(p: number, s: number): number {
  if (p < lowestSaturationPressure) region2Point(point, p, lowestTemperature)
  else region1Point(point, p, lowestTemperature)
  return refuse(Outcome.entropyLow, s, point[Point.s] as number)
}

/** Above 1073.15 K: the gap there or region 5. */
function hotEntropy(out: Float64Array, at: number, p: number, s: number): number {
  if (p > highestPressure5) {
    region2Point(point, p, highestTemperature25)
    const most = point[Point.s] as number
    if (s > most * (1 + 1e-12)) return refuse(Outcome.entropyHigh, s, most)
    return write(out, at, point[Point.h] as number, point[Point.v] as number, highestTemperature25)
  }
  sidesOfBorder25(p)
  if (s < (highSide[Point.s] as number)) return gapForm(out, at, s, Point.s)
  let T = 1500
  for (let i = 0; i < MOST_STEPS; i++) {
    region5Point(point, p, T)
    const step = ((s - (point[Point.s] as number)) * T) / (point[Point.cp] as number)
    if (Math.abs(step) < settled * T) {
      if (T + step > highestTemperature + temperatureSlack) break
      return finishEntropy(out, at, p, s, T, step)
    }
    if (T === 2400 && step > 0) break
    T = Math.min(2400, Math.max(1000, T + step))
  }
  region5Point(point, p, highestTemperature)
  return refuse(Outcome.entropyHigh, s, point[Point.s] as number)
}

/**
 * h (J/kg) of pressure (Pa) and specific volume (m3/kg), in any region. Cold water has two temperatures
 * for one volume (the density maximum near 277 K): the warmer one is meant.
 */
export function enthalpyAtPressureVolume(
  out: Float64Array,
  at: number,
  p: number,
  v: number,
): number {
  if (!(p >= lowestPressure && p <= highestPressure)) return refusePressure(p)
  if (!Number.isFinite(v)) return refuse(v > 0 ? Outcome.volumeHigh : Outcome.volumeLow, v, 0)
  let wetSlot = -1
  if (p >= lowestSaturationPressure && p < criticalPressure) {
    wetSlot = cachedSaturation(p)
    const vL = saturationCache[wetSlot + Saturation.vL] as number
    const vV = saturationCache[wetSlot + Saturation.vV] as number
    if (v >= vL && v <= vV) return wetForm(out, at, wetSlot, v, Saturation.vL)
    const T = saturationCache[wetSlot + Saturation.T] as number
    if (p <= borderPressure13) {
      return v < vL
        ? volumeWithin(out, at, p, v, 1, lowestTemperature, T)
        : steamVolume(out, at, p, v, T)
    }
  }
  if (p < lowestSaturationPressure) return steamVolume(out, at, p, v, lowestTemperature)
  return denseVolume(out, at, p, v)
}

/** Above 16.529 MPa and outside the two-phase zone. */
function denseVolume(out: Float64Array, at: number, p: number, v: number): number {
  region1Point(point, p, borderTemperature13)
  if (v <= (point[Point.v] as number)) {
    return volumeWithin(out, at, p, v, 1, lowestTemperature, borderTemperature13)
  }
  const T23 = borderTemperature23(p)
  region2Point(point, p, T23)
  if (v >= (point[Point.v] as number)) return steamVolume(out, at, p, v, T23)
  const rho = 1 / v
  const T = region3Temperature(field, p, rho, borderTemperature13, T23)
  if (T < borderTemperature13) {
    sidesOfBorder13(p)
    return gapForm(out, at, v, Point.v)
  }
  if (T > T23) {
    sidesOfBorder23(p)
    return gapForm(out, at, v, Point.v)
  }
  const pT = field[Field.pT] as number
  // dT/dp at constant v is 1/pT; dT/dv at constant p follows from dp = 0.
  const hp = (field[Field.hT] as number) / pT
  const rhoToT = -(field[Field.pRho] as number) / pT
  const hv = -((field[Field.hRho] as number) + (field[Field.hT] as number) * rhoToT) * rho * rho
  return write(out, at, field[Field.h] as number, hp, hv)
}

function steamVolume(out: Float64Array, at: number, p: number, v: number, from: number): number {
  region2Point(point, p, highestTemperature25)
  const most = point[Point.v] as number
  if (v <= most * (1 + 1e-12)) return volumeWithin(out, at, p, v, 2, from, highestTemperature25)
  if (p > highestPressure5) return refuse(Outcome.volumeHigh, v, most)
  sidesOfBorder25(p)
  if (v < (highSide[Point.v] as number)) return gapForm(out, at, v, Point.v)
  return volumeWithin(out, at, p, v, 5, highestTemperature25, highestTemperature)
}

/** T between two temperatures of one region of pressure and temperature, by Newton within a bracket. */
function volumeWithin(
  out: Float64Array,
  at: number,
  p: number,
  v: number,
  region: number,
  from: number,
  to: number,
): number {
  let low = from
  let high = to
  let T = 0.5 * (low + high)
  for (let i = 0; i < 200; i++) {
    regionPoint(region, p, T)
    const slope = point[Point.vT] as number
    const off = (point[Point.v] as number) - v
    // Water below its density maximum lies on the other branch.
    if (slope <= 0 || off < 0) low = T
    else high = T
    let next = T - off / slope
    if (!(slope > 0 && next >= low && next <= high)) next = 0.5 * (low + high)
    const step = Math.abs(next - T)
    T = next
    if (step < 1e-14 * T) break
  }
  regionPoint(region, p, T)
  const off = (point[Point.v] as number) - v
  if (Math.abs(off) > 1e-10 * v) {
    return refuse(off > 0 ? Outcome.volumeLow : Outcome.volumeHigh, v, point[Point.v] as number)
  }
  const cp = point[Point.cp] as number
  const vT = point[Point.vT] as number
  const vp = point[Point.vp] as number
  const hp = (point[Point.hp] as number) - (cp * vp) / vT
  return write(out, at, point[Point.h] as number, hp, cp / vT)
}

function regionPoint(region: number, p: number, T: number): void {
  if (region === 1) region1Point(point, p, T)
  else if (region === 2) region2Point(point, p, T)
  else region5Point(point, p, T)
}
