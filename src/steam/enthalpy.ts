/**
 * Enthalpy from pressure and one more quantity, with exact partials. Every function writes a RESULT
 * (value, partial to p, partial to the second argument) and answers with an outcome; a result is
 * left as it was when the outcome is not fine.
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
import { enthalpyAlong, region3Point } from './gap.ts'
import { borderTemperature23 } from './if97/borders.ts'
import { POINT_SIZE, Point, region1Point, region2Point, region5Point } from './if97/point.ts'
import { FIELD_SIZE, pointOfField, region3Field } from './if97/region3.ts'
import { saturationTemperatureOf } from './if97/saturation-line.ts'
import { Outcome, refuse } from './outcome.ts'
import { Result, Saturation } from './records.ts'
import { cachedSaturation, checkSaturationPressure, saturationCache } from './saturation.ts'

const point = new Float64Array(POINT_SIZE)
const field = new Float64Array(FIELD_SIZE)

/** Closer than this to the saturation temperature (K) p and T leave h open. */
export const saturationTemperatureBand = 1e-6
/** Round-off allowed at the limits of temperature, K. */
const temperatureSlack = 1e-7

export function write(
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
 * h (J/kg) of pressure (Pa) and temperature (K) by the forward equation. Below the critical
 * pressure a T within 1e-6 K of saturation is `onSaturation`.
 */
export function enthalpyAtPressureTemperature(
  out: Float64Array,
  at: number,
  p: number,
  T: number,
): number {
  const code = pointAtPressureTemperature(point, p, T)
  if (code !== Outcome.fine) return code
  return write(
    out,
    at,
    point[Point.h] as number,
    point[Point.hp] as number,
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
  if (p > borderPressure13) return densePoint(q, p, T)
  if (p < lowestSaturationPressure) {
    region2Point(q, p, T)
    return Outcome.fine
  }
  const above = T - saturationTemperatureOf(p)
  if (Math.abs(above) < saturationTemperatureBand) return refuse(Outcome.onSaturation, T, T - above)
  if (above < 0) region1Point(q, p, T)
  else region2Point(q, p, T)
  return Outcome.fine
}

/** The forward equations above 16.529 MPa and up to 1073.15 K. */
function densePoint(q: Float64Array, p: number, T: number): number {
  if (T <= borderTemperature13) {
    region1Point(q, p, T)
    return Outcome.fine
  }
  if (T >= borderTemperature23(p)) {
    region2Point(q, p, T)
    return Outcome.fine
  }
  if (p < criticalPressure) {
    const above = T - saturationTemperatureOf(p)
    if (Math.abs(above) < saturationTemperatureBand) {
      return refuse(Outcome.onSaturation, T, T - above)
    }
  }
  region3Point(q, p, T)
  return Outcome.fine
}

/** Refuses a pressure outside the formulation. */
export function refusePressure(p: number): number {
  if (!(p >= lowestPressure)) return refuse(Outcome.pressureLow, p, lowestPressure)
  return refuse(Outcome.pressureHigh, p, highestPressure)
}

/** Refuses a temperature outside the limits given, K. */
export function refuseTemperature(T: number, low: number, high: number): number {
  if (!(T >= low)) return refuse(Outcome.temperatureLow, T, low)
  return refuse(Outcome.temperatureHigh, T, high)
}

/**
 * h (J/kg) of pressure (Pa) and dryness fraction (not clamped: below 0 and above 1 the line between
 * h' and h'' is carried on). Refused without a saturation state.
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
  if (superheat < saturationTemperatureBand && p > borderPressure13) {
    return besideSaturation(out, at, slot, 1, superheat)
  }
  const slope = saturationCache[slot + Saturation.Tp] as number
  const T = (saturationCache[slot + Saturation.T] as number) + superheat
  if (!(T <= highestTemperature)) return refuseTemperature(T, lowestTemperature, highestTemperature)
  if (T > highestTemperature25) region5Point(point, p, T)
  else if (p <= borderPressure13 || T >= borderTemperature23(p)) region2Point(point, p, T)
  else region3Point(point, p, T)
  return write(
    out,
    at,
    superheat === 0
      ? (saturationCache[slot + Saturation.hV] as number)
      : (point[Point.h] as number),
    enthalpyAlong(point, slope),
    point[Point.cp] as number,
  )
}

/**
 * h within a millionth of a kelvin of saturation in region 3, where the density no longer follows
 * from p and T: the saturated enthalpy with cp at it.
 */
function besideSaturation(
  out: Float64Array,
  at: number,
  slot: number,
  side: number,
  above: number,
): number {
  const T = saturationCache[slot + Saturation.T] as number
  const v = saturationCache[slot + Saturation.vL + side] as number
  region3Field(field, 1 / v, T)
  pointOfField(point, field)
  const cp = point[Point.cp] as number
  const h = saturationCache[slot + Saturation.hL + side] as number
  const hp = saturationCache[slot + Saturation.hLp + side] as number
  return write(out, at, h + cp * above, hp, side === 0 ? -cp : cp)
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
  if (subcooling < saturationTemperatureBand && p > borderPressure13) {
    return besideSaturation(out, at, slot, 0, -subcooling)
  }
  const slope = saturationCache[slot + Saturation.Tp] as number
  const T = (saturationCache[slot + Saturation.T] as number) - subcooling
  if (!(T >= lowestTemperature - temperatureSlack)) {
    return refuseTemperature(T, lowestTemperature, highestTemperature)
  }
  if (T <= borderTemperature13) region1Point(point, p, T)
  else region3Point(point, p, T)
  return write(
    out,
    at,
    subcooling === 0
      ? (saturationCache[slot + Saturation.hL] as number)
      : (point[Point.h] as number),
    enthalpyAlong(point, slope),
    -(point[Point.cp] as number),
  )
}
