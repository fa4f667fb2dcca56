/**
 * The borders 1/3, 2/3 and 2/5, where the formulation itself jumps by up to some 0.1 kJ/kg: both
 * sides at a pressure, and what lies between them. A state within a gap takes the border's
 * temperature, all else passes linearly from one side to the other, like a change of phase.
 */
import {
  borderTemperature13,
  criticalPressure,
  criticalTemperature,
  highestTemperature25,
} from './constants.ts'
import { borderSlope23, borderTemperature23 } from './if97/borders.ts'
import { POINT_SIZE, Point, region1Point, region2Point, region5Point } from './if97/point.ts'
import { FIELD_SIZE, pointOfField, region3Density } from './if97/region3.ts'
import { saturationPressureOf } from './if97/saturation-line.ts'
import { region3VolumeOf } from './if97/volume-region3.ts'
import { Saturation } from './records.ts'
import { cachedSaturation, saturationCache } from './saturation.ts'

/** The side of the lower temperature and that of the higher one, as points at the border. */
export const lowSide = new Float64Array(POINT_SIZE)
export const highSide = new Float64Array(POINT_SIZE)

/** The border's temperature (K) and dT/dp (K/Pa) along it, of the last border asked for. */
export const border = new Float64Array(2)

const field = new Float64Array(FIELD_SIZE)

/** Density bracket of region 3, kg/m3. */
const leastDensity = 40
const mostDensity = 900

/** Below this temperature (K) p(rho) keeps rising for a while within the two-phase zone. */
const clearOfCritical = 640

/** Region 3 at p (Pa) and T (K) as a point. Not for a pair on the saturation line. */
export function region3Point(point: Float64Array, p: number, T: number): void {
  let low = leastDensity
  let high = mostDensity
  if (T < criticalTemperature) {
    const saturated = Math.min(saturationPressureOf(T), criticalPressure * (1 - 1e-12))
    const slot = cachedSaturation(saturated)
    // At 623.15 K the record is of regions 1 and 2: the formulation's jump needs some room.
    const room = T < clearOfCritical ? 1e-3 : 0
    if (p > saturated) low = (1 - room) / (saturationCache[slot + Saturation.vL] as number)
    else high = (1 + room) / (saturationCache[slot + Saturation.vV] as number)
  }
  region3Density(field, p, T, 1 / region3VolumeOf(p, T), low, high)
  pointOfField(point, field)
}

/** Both sides of the border 1/3 at p (Pa). */
export function sidesOfBorder13(p: number): void {
  border[0] = borderTemperature13
  border[1] = 0
  region1Point(lowSide, p, borderTemperature13)
  region3Point(highSide, p, borderTemperature13)
}

/** Both sides of the border 2/3 at p (Pa). */
export function sidesOfBorder23(p: number): void {
  const T = borderTemperature23(p)
  border[0] = T
  border[1] = borderSlope23(T)
  region3Point(lowSide, p, T)
  region2Point(highSide, p, T)
}

/** Both sides of the border 2/5 at p (Pa). */
export function sidesOfBorder25(p: number): void {
  border[0] = highestTemperature25
  border[1] = 0
  region2Point(lowSide, p, highestTemperature25)
  region5Point(highSide, p, highestTemperature25)
}

/** dh/dp of a point along a line of slope dT/dp. */
export function enthalpyAlong(q: Float64Array, slope: number): number {
  return (q[Point.hp] as number) + (q[Point.cp] as number) * slope
}

/** ds/dp of a point at T along a line of slope dT/dp. */
export function entropyAlong(q: Float64Array, T: number, slope: number): number {
  return ((q[Point.cp] as number) / T) * slope - (q[Point.vT] as number)
}

/** dv/dp of a point along a line of slope dT/dp. */
export function volumeAlong(q: Float64Array, slope: number): number {
  return (q[Point.vp] as number) + (q[Point.vT] as number) * slope
}
