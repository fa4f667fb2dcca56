/** Enthalpy from pressure and volume, which rises along an isobar (but for cold water). */
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
import { POINT_SIZE, Point, region1Point, region2Point, region5Point } from './if97/point.ts'
import { FIELD_SIZE, Field, region3Temperature } from './if97/region3.ts'
import { Outcome, refuse } from './outcome.ts'
import { Saturation } from './records.ts'
import { cachedSaturation, saturationCache } from './saturation.ts'

// Slots and limits as constants of this module: an imported binding is looked up at each use.
const { vL: satVL, vV: satVV, T: satT } = Saturation
const { h: ptH, cp: ptCp, v: ptV, vT: ptVT, vp: ptVp, hp: ptHp } = Point
const { h: ofH, pT: ofPT, hT: ofHT, pRho: ofPRho, hRho: ofHRho } = Field
const pressure13 = borderPressure13
const critical = criticalPressure
const leastSaturation = lowestSaturationPressure
const cache = saturationCache

const point = new Float64Array(POINT_SIZE)
const field = new Float64Array(FIELD_SIZE)
/** p (Pa) and v (m3/kg) of the call under way. */
const asked = new Float64Array(2)

/**
 * h (J/kg) of pressure (Pa) and specific volume (m3/kg), in any region. Cold water has two
 * temperatures for one volume (the density maximum near 277 K): the warmer one is meant.
 */
export function enthalpyAtPressureVolume(
  out: Float64Array,
  at: number,
  p: number,
  v: number,
): number {
  if (!(p >= lowestPressure && p <= highestPressure)) return refusePressure(p)
  asked[0] = p
  asked[1] = v
  if (!Number.isFinite(v)) return refuse(v > 0 ? Outcome.volumeHigh : Outcome.volumeLow, v, 0)
  let wetSlot = -1
  if (p >= leastSaturation && p < critical) {
    wetSlot = cachedSaturation(p)
    const vL = cache[wetSlot + satVL] as number
    const vV = cache[wetSlot + satVV] as number
    if (v >= vL && v <= vV) return wetForm(out, at, asked, wetSlot, satVL)
    const T = cache[wetSlot + satT] as number
    if (p <= pressure13) {
      return v < vL
        ? volumeWithin(out, at, p, v, 1, lowestTemperature, T)
        : steamVolume(out, at, p, v, T)
    }
  }
  if (p < leastSaturation) return steamVolume(out, at, p, v, lowestTemperature)
  return denseVolume(out, at, p, v)
}

/** Above 16.529 MPa and outside the two-phase zone. */
function denseVolume(out: Float64Array, at: number, p: number, v: number): number {
  region1Point(point, p, borderTemperature13)
  if (v <= (point[ptV] as number)) {
    return volumeWithin(out, at, p, v, 1, lowestTemperature, borderTemperature13)
  }
  const T23 = borderTemperature23(p)
  region2Point(point, p, T23)
  if (v >= (point[ptV] as number)) return steamVolume(out, at, p, v, T23)
  const rho = 1 / v
  const T = region3Temperature(field, p, rho, borderTemperature13, T23)
  if (T < borderTemperature13) {
    sidesOfBorder13(p)
    return gapForm(out, at, asked, ptV)
  }
  if (T > T23) {
    sidesOfBorder23(p)
    return gapForm(out, at, asked, ptV)
  }
  const pT = field[ofPT] as number
  // dT/dp at constant v is 1/pT; dT/dv at constant p follows from dp = 0.
  const hp = (field[ofHT] as number) / pT
  const rhoToT = -(field[ofPRho] as number) / pT
  const hv = -((field[ofHRho] as number) + (field[ofHT] as number) * rhoToT) * rho * rho
  return write(out, at, field[ofH] as number, hp, hv)
}

function steamVolume(out: Float64Array, at: number, p: number, v: number, from: number): number {
  region2Point(point, p, highestTemperature25)
  const most = point[ptV] as number
  if (v <= most * (1 + 1e-12)) return volumeWithin(out, at, p, v, 2, from, highestTemperature25)
  if (p > highestPressure5) return refuse(Outcome.volumeHigh, v, most)
  sidesOfBorder25(p)
  if (v < (highSide[ptV] as number)) return gapForm(out, at, asked, ptV)
  return volumeWithin(out, at, p, v, 5, highestTemperature25, highestTemperature)
}

/**
 * T between two temperatures of one region of pressure and temperature, by Newton within a bracket.
 */
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
    const slope = point[ptVT] as number
    const off = (point[ptV] as number) - v
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
  const off = (point[ptV] as number) - v
  if (Math.abs(off) > 1e-10 * v) {
    return refuse(off > 0 ? Outcome.volumeLow : Outcome.volumeHigh, v, point[ptV] as number)
  }
  const cp = point[ptCp] as number
  const vT = point[ptVT] as number
  const vp = point[ptVp] as number
  const hp = (point[ptHp] as number) - (cp * vp) / vT
  return write(out, at, point[ptH] as number, hp, cp / vT)
}

function regionPoint(region: number, p: number, T: number): void {
  if (region === 1) region1Point(point, p, T)
  else if (region === 2) region2Point(point, p, T)
  else region5Point(point, p, T)
}
