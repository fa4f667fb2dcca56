/**
 * Enthalpy from pressure and one more quantity, with exact partials. Every function writes a RESULT
 * (value, partial to p, partial to the second argument) and answers with an outcome; a result is left
 * as it was when the outcome is not fine.
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
import { POINT_SIZE, Point, region1Point, region2Point, region5Point } from './if97/point.ts'
import { saturationTemperatureOf } from './if97/saturation-line.ts'
import { Outcome, refuse } from './outcome.ts'
import { Result, Saturation } from './records.ts'
import { cachedSaturation, checkSaturationPressure, saturationCache } from './saturation.ts'

const point = new Float64Array(POINT_SIZE)

/** Closer than this to the saturation temperature (K) p and T leave h open. */
export const saturationTemperatureBand = 1e-6
/** Round-off allowed at the limits of temperature, K. */
const temperatureSlack = 1e-7

function write(
  out: Float64Array,
  at: number,
  value: number,
  first: number,
  second: number,
): number {
  out[at + Result.value] = value
  out[at + Result.first] = first
  out[at + Result.second] = second
  return Outcome.fine
}

/**
 * h (J/kg) of pressure (Pa) and temperature (K) by the forward equation. Below the critical pressure a
 * T within 1e-6 K of saturation is `onSaturation`.
 */
export function enthalpyAtPressureTemperature(
  out: Float64Array,
  at: number,
  p: number,
  T: number,
): number {
  const code = pointAtPressureTemperature(point, p, T)
  if (code !== Outcome.fine) return code
  return writeTemperatureForm(out, at, T)
}

function writeTemperatureForm(out: Float64Array, at: number, T: number): number {
  return write(
    out,
    at,
    point[Point.h] as number,
    (point[Point.v] as number) - T * (point[Point.vT] as number),
    point[Point.cp] as number,
  )
}

/** The forward equations at p (Pa) and T (K), the region being decided from them. */
export function pointAtPressureTemperature(q: Float64Array, p: number, T: number): number {
  if (!(p >= lowestPressure && p <= highestPressure)) return refusePressure(p)
  if (!(T >= lowestTemperature - temperatureSlack && T <= highestTemperature + temperatureSlack)) {
    return refuseTemperature(T, lowestTemperature, highestTemperature)
  }
  if (T > highestTemperature25) {
    if (p > highestPressure5) return refuseTemperature(T, lowestTemperature, highestTemperature25)
    region5Point(q, p, T)
    return Outcome.fine
  }
  if (p > borderPressure13) return refuse(Outcome.pressureHigh, p, borderPressure13)
  if (p < lowestSaturationPressure) {
    region2Point(q, p, T)
    return Outcome.fine
  }
  const above = T - saturationTemperatureOf(p)
  if (Math.abs(above) < saturationTemperatureBand) return refuse(Outcome.onSaturation, T, T - above)
  if (above < 0 && T <= borderTemperature13) region1Point(q, p, T)
  else region2Point(q, p, T)
  return Outcome.fine
}

function refusePressure(p: number): number {
  if (!Number.isFinite(p)) return refuse(Outcome.notFinite, p, lowestPressure)
  if (p < lowestPressure) return refuse(Outcome.pressureLow, p, lowestPressure)
  return refuse(Outcome.pressureHigh, p, highestPressure)
}

function refuseTemperature(T: number, low: number, high: number): number {
  if (!Number.isFinite(T)) return refuse(Outcome.notFinite, T, low)
  if (T < low) return refuse(Outcome.temperatureLow, T, low)
  return refuse(Outcome.temperatureHigh, T, high)
}

/**
 * h (J/kg) of pressure (Pa) and dryness fraction (not clamped: below 0 and above 1 the line between h'
 * and h'' is carried on). Refused without a saturation state.
 */
export function enthalpyAtPressureDryness(
  out: Float64Array,
  at: number,
  p: number,
  x: number,
): number {
  const code = checkSaturationPressure(p)
  if (code !== Outcome.fine) return code
  const slot = cachedSaturation(p)
  const hL = saturationCache[slot + Saturation.hL] as number
  const hLp = saturationCache[slot + Saturation.hLp] as number
  const width = (saturationCache[slot + Saturation.hV] as number) - hL
  return write(
    out,
    at,
    hL + x * width,
    hLp + x * ((saturationCache[slot + Saturation.hVp] as number) - hLp),
    width,
  )
}

/** h (J/kg) of pressure (Pa) and superheat T - Tsat(p) (K); 0 means dry saturated steam. */
export function enthalpyAtPressureSuperheat(
  out: Float64Array,
  at: number,
  p: number,
  superheat: number,
): number {
  const code = checkSaturationPressure(p)
  if (code !== Outcome.fine) return code
  if (!(superheat >= 0)) return refuse(Outcome.differenceLow, superheat, 0)
  const slot = cachedSaturation(p)
  const T = (saturationCache[slot + Saturation.T] as number) + superheat
  if (T > highestTemperature) return refuse(Outcome.temperatureHigh, T, highestTemperature)
  if (T > highestTemperature25) region5Point(point, p, T)
  else region2Point(point, p, T)
  const cp = point[Point.cp] as number
  const slope = saturationCache[slot + Saturation.Tp] as number
  const hp = (point[Point.v] as number) - T * (point[Point.vT] as number) + cp * slope
  return write(out, at, point[Point.h] as number, hp, cp)
}

/** h (J/kg) of pressure (Pa) and subcooling Tsat(p) - T (K); 0 means saturated liquid. */
export function enthalpyAtPressureSubcooling(
  out: Float64Array,
  at: number,
  p: number,
  subcooling: number,
): number {
  const code = checkSaturationPressure(p)
  if (code !== Outcome.fine) return code
  if (!(subcooling >= 0)) return refuse(Outcome.differenceLow, subcooling, 0)
  const slot = cachedSaturation(p)
  const T = (saturationCache[slot + Saturation.T] as number) - subcooling
  if (T < lowestTemperature - temperatureSlack) {
    return refuse(Outcome.temperatureLow, T, lowestTemperature)
  }
  region1Point(point, p, T)
  const cp = point[Point.cp] as number
  const slope = saturationCache[slot + Saturation.Tp] as number
  const hp = (point[Point.v] as number) - T * (point[Point.vT] as number) + cp * slope
  return write(out, at, point[Point.h] as number, hp, -cp)
}

/**
 * h (J/kg) of pressure (Pa) and entropy (J/(kg K)), in any region; dh/dp at constant s is v, dh/ds at
 * constant p is T, within the wet region those of the mixture of both saturated states.
 */
export function enthalpyAtPressureEntropy(
  out: Float64Array,
  at: number,
  p: number,
  s: number,
): number {
  if (!(p >= lowestPressure && p < criticalPressure)) return refusePressure(p)
  let region = 2
  if (p >= lowestSaturationPressure) {
    const slot = cachedSaturation(p)
    const sL = saturationCache[slot + Saturation.sL] as number
    const sV = saturationCache[slot + Saturation.sV] as number
    if (s >= sL && s <= sV) return wetEnthalpyAtEntropy(out, at, slot, s)
    if (s < sL) region = 1
  }
  const start =
    region === 1 || p >= lowestSaturationPressure ? saturationTemperatureOf(p) : lowestTemperature
  let T = start
  for (let i = 0; i < 50; i++) {
    if (region === 1) region1Point(point, p, T)
    else region2Point(point, p, T)
    const step = (((point[Point.s] as number) - s) * T) / (point[Point.cp] as number)
    const before = T
    T = Math.min(region === 1 ? 640 : 1079, Math.max(265, T - step))
    if (Math.abs(T - before) < 1e-12 * T) break
  }
  if (T > highestTemperature25) return refuse(Outcome.entropyHigh, s, point[Point.s] as number)
  if (T < lowestTemperature - temperatureSlack) {
    return refuse(Outcome.entropyLow, s, point[Point.s] as number)
  }
  return write(out, at, point[Point.h] as number, point[Point.v] as number, T)
}

function wetEnthalpyAtEntropy(out: Float64Array, at: number, slot: number, s: number): number {
  const sL = saturationCache[slot + Saturation.sL] as number
  const hL = saturationCache[slot + Saturation.hL] as number
  const sLp = saturationCache[slot + Saturation.sLp] as number
  const hLp = saturationCache[slot + Saturation.hLp] as number
  const ds = (saturationCache[slot + Saturation.sV] as number) - sL
  const dh = (saturationCache[slot + Saturation.hV] as number) - hL
  const dsp = (saturationCache[slot + Saturation.sVp] as number) - sLp
  const dhp = (saturationCache[slot + Saturation.hVp] as number) - hLp
  const x = (s - sL) / ds
  const xp = -(sLp + x * dsp) / ds
  return write(out, at, hL + x * dh, hLp + x * dhp + xp * dh, dh / ds)
}

/**
 * h (J/kg) of pressure (Pa) and specific volume (m3/kg). Cold water has two temperatures for one
 * volume (the density maximum near 277 K): the warmer one is meant.
 */
export function enthalpyAtPressureVolume(
  out: Float64Array,
  at: number,
  p: number,
  v: number,
): number {
  if (!(p >= lowestPressure && p < criticalPressure)) return refusePressure(p)
  let region = 2
  if (p >= lowestSaturationPressure) {
    const slot = cachedSaturation(p)
    const vL = saturationCache[slot + Saturation.vL] as number
    const vV = saturationCache[slot + Saturation.vV] as number
    if (v >= vL && v <= vV) {
      const hL = saturationCache[slot + Saturation.hL] as number
      const dh = (saturationCache[slot + Saturation.hV] as number) - hL
      const hLp = saturationCache[slot + Saturation.hLp] as number
      const vLp = saturationCache[slot + Saturation.vLp] as number
      const dv = vV - vL
      const x = (v - vL) / dv
      const xp = -(vLp + x * ((saturationCache[slot + Saturation.vVp] as number) - vLp)) / dv
      const dhp = (saturationCache[slot + Saturation.hVp] as number) - hLp
      return write(out, at, hL + x * dh, hLp + x * dhp + xp * dh, dh / dv)
    }
    if (v < vL) region = 1
  }
  const saturated = p >= lowestSaturationPressure ? saturationTemperatureOf(p) : lowestTemperature
  let low = region === 1 ? lowestTemperature : saturated
  let high = region === 1 ? saturated : highestTemperature25
  let T = 0.5 * (low + high)
  for (let i = 0; i < 100; i++) {
    if (region === 1) region1Point(point, p, T)
    else region2Point(point, p, T)
    const slope = point[Point.vT] as number
    const off = (point[Point.v] as number) - v
    if (slope <= 0 || off < 0) low = T
    else high = T
    let next = T - off / slope
    if (!(next > low && next < high)) next = 0.5 * (low + high)
    const step = Math.abs(next - T)
    T = next
    if (step < 1e-13 * T) break
  }
  const off = (point[Point.v] as number) - v
  if (Math.abs(off) > 1e-9 * v) {
    return refuse(off > 0 ? Outcome.volumeLow : Outcome.volumeHigh, v, point[Point.v] as number)
  }
  const cp = point[Point.cp] as number
  const vT = point[Point.vT] as number
  const hp = (point[Point.v] as number) - T * vT - (cp * (point[Point.vp] as number)) / vT
  return write(out, at, point[Point.h] as number, hp, cp / vT)
}
