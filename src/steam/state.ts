/** States from pressure and enthalpy, with all first partials: the kernel's hot function. */
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
import { FIELD_SIZE, Field, found, onLiquidSide, region3AtEnthalpy } from './if97/region3.ts'
import {
  region1TemperatureAtEnthalpy,
  region2TemperatureAtEnthalpy,
  region5TemperatureAtEnthalpy,
} from './if97/temperature-at-enthalpy.ts'
import { Outcome, refuse } from './outcome.ts'
import { SATURATION_SIZE, Saturation, State } from './records.ts'
import { cachedSaturation, saturationCache } from './saturation.ts'

const point = new Float64Array(POINT_SIZE)
const other = new Float64Array(POINT_SIZE)
const field = new Float64Array(FIELD_SIZE)

// Where a state above 16.529 MPa lies to the two-phase zone.
const LIQUID = 0
const VAPOUR = 1
const SUPERCRITICAL = 2

// Bounds of h (J/kg) along the borders 1/3 and 2/3 from 16.529 to 100 MPa.
const leastEnthalpy13 = 1.55e6
const mostEnthalpy13 = 1.68e6
const leastEnthalpy23 = 2.55e6
const mostEnthalpy23 = 2.83e6

/** Within this part of h' or h'' a state counts as saturated, so as wet. */
const saturationBand = 1e-9
/** Least width of that band, J/kg: h' passes through zero near 273.16 K. */
const leastBand = 1e-4
/** Above every enthalpy of region 2, J/kg: 4160.7 kJ/kg at 1073.15 K and no pressure. */
const highestEnthalpy2 = 4.17e6
/** Round-off allowed at the limits of temperature, K. */
const temperatureSlack = 1e-7

/** How far from a saturated enthalpy (J/kg) a state still counts as saturated, J/kg. */
export function bandAround(h: number): number {
  const band = saturationBand * Math.abs(h)
  return Math.max(band, leastBand)
}

/**
 * Fills a state record from pressure (Pa) and enthalpy (J/kg). The region is decided from h against
 * h'(p) and h''(p) first; T follows from the forward equation of the region to round-off. A state that
 * the record already holds is the first guess; it does not change the digits.
 *
 * Holds from 1 Pa to 100 MPa (50 MPa above 1073.15 K) and from 273.15 K to 2273.15 K. Below
 * 611.213 Pa there is steam only. An h within a gap between two regions takes the border's temperature.
 * When the answer is not 0 the state is as it was.
 */
export function stateAtPressureEnthalpy(
  record: Float64Array,
  at: number,
  p: number,
  h: number,
): number {
  if (record[at + State.p] === p && record[at + State.h] === h && record[at + State.region] !== 0) {
    return Outcome.fine
  }
  if (!(p >= lowestPressure && p <= highestPressure && Number.isFinite(h))) {
    return refusePressure(p, h)
  }
  if (p >= criticalPressure) return dense(record, at, p, h, SUPERCRITICAL)
  if (p < lowestSaturationPressure) return steam(record, at, p, h, 0)
  const saturation = at + State.saturation
  if (record[saturation] !== p) {
    const slot = cachedSaturation(p)
    for (let i = 0; i < SATURATION_SIZE; i++) {
      record[saturation + i] = saturationCache[slot + i] as number
    }
  }
  const hL = record[saturation + Saturation.hL] as number
  if (h < hL - bandAround(hL)) {
    return p > borderPressure13 ? dense(record, at, p, h, LIQUID) : liquid(record, at, p, h, 1)
  }
  const hV = record[saturation + Saturation.hV] as number
  if (h > hV + bandAround(hV)) {
    return p > borderPressure13 ? dense(record, at, p, h, VAPOUR) : steam(record, at, p, h, 1)
  }
  return wet(record, at, p, h)
}

function refusePressure(p: number, h: number): number {
  if (!(p >= lowestPressure)) return refuse(Outcome.pressureLow, p, lowestPressure)
  if (p > highestPressure) return refuse(Outcome.pressureHigh, p, highestPressure)
  return refuse(h > 0 ? Outcome.enthalpyHigh : Outcome.enthalpyLow, h, 0)
}

/** The temperature that the record's state foretells at p and h; 0 when it is of another region. */
function foretold(record: Float64Array, at: number, p: number, h: number, region: number): number {
  if (record[at + State.region] !== region) return 0
  return (
    (record[at + State.T] as number) +
    (record[at + State.Tp] as number) * (p - (record[at + State.p] as number)) +
    (record[at + State.Th] as number) * (h - (record[at + State.h] as number))
  )
}

function liquid(
  record: Float64Array,
  at: number,
  p: number,
  h: number,
  subcritical: number,
): number {
  const ceiling =
    p > borderPressure13
      ? borderTemperature13
      : (record[at + State.saturation + Saturation.T] as number)
  const T = region1TemperatureAtEnthalpy(p, h, foretold(record, at, p, h, 1), ceiling)
  if (!(T >= lowestTemperature - temperatureSlack)) {
    region1Point(other, p, lowestTemperature)
    return refuse(Outcome.enthalpyLow, h, other[Point.h] as number)
  }
  region1Point(point, p, T)
  fill(record, at, p, h, T, 1, subcritical)
  return Outcome.fine
}

function steam(
  record: Float64Array,
  at: number,
  p: number,
  h: number,
  subcritical: number,
): number {
  let floor = lowestTemperature
  if (p > borderPressure13) floor = borderTemperature23(p)
  else if (subcritical === 1) floor = record[at + State.saturation + Saturation.T] as number
  const T =
    h > highestEnthalpy2
      ? highestTemperature
      : region2TemperatureAtEnthalpy(p, h, foretold(record, at, p, h, 2), floor)
  if (T > highestTemperature25) return hotSteam(record, at, p, h, subcritical)
  if (T < lowestTemperature - temperatureSlack) {
    region2Point(other, p, lowestTemperature)
    return refuse(Outcome.enthalpyLow, h, other[Point.h] as number)
  }
  region2Point(point, p, T)
  fill(record, at, p, h, T, 2, subcritical)
  return Outcome.fine
}

/** Beyond region 2: the gap at 1073.15 K or region 5. */
function hotSteam(
  record: Float64Array,
  at: number,
  p: number,
  h: number,
  subcritical: number,
): number {
  if (p > highestPressure5) {
    region2Point(point, p, highestTemperature25)
    const most = point[Point.h] as number
    if (h > most * (1 + 1e-12)) return refuse(Outcome.enthalpyHigh, h, most)
    fill(record, at, p, h, highestTemperature25, 2, subcritical)
    return Outcome.fine
  }
  sidesOfBorder25(p)
  if (h < (highSide[Point.h] as number)) {
    fillGap(record, at, p, h, 2, subcritical)
    return Outcome.fine
  }
  const T = region5TemperatureAtEnthalpy(p, h, foretold(record, at, p, h, 5))
  if (T > highestTemperature + temperatureSlack) {
    region5Point(other, p, highestTemperature)
    return refuse(Outcome.enthalpyHigh, h, other[Point.h] as number)
  }
  region5Point(point, p, T)
  fill(record, at, p, h, T, 5, subcritical)
  return Outcome.fine
}

/** Writes a single-phase state from the forward equations in `point`. */
function fill(
  record: Float64Array,
  at: number,
  p: number,
  h: number,
  T: number,
  region: number,
  subcritical: number,
): void {
  const v = point[Point.v] as number
  const Th = 1 / (point[Point.cp] as number)
  const vT = point[Point.vT] as number
  const Tp = -(point[Point.hp] as number) * Th
  const sh = 1 / T
  record[at + State.p] = p
  record[at + State.h] = h
  record[at + State.T] = T
  record[at + State.s] = point[Point.s] as number
  record[at + State.v] = v
  record[at + State.Tp] = Tp
  record[at + State.Th] = Th
  record[at + State.sp] = -v * sh
  record[at + State.sh] = sh
  record[at + State.vp] = (point[Point.vp] as number) + vT * Tp
  record[at + State.vh] = vT * Th
  record[at + State.region] = region
  dryness(record, at, h, subcritical)
}

/** x with its partials from the saturation record, or zeros where it is not defined. */
function dryness(record: Float64Array, at: number, h: number, subcritical: number): void {
  record[at + State.subcritical] = subcritical
  if (subcritical === 0) {
    record[at + State.x] = 0
    record[at + State.xp] = 0
    record[at + State.xh] = 0
    return
  }
  const saturation = at + State.saturation
  const hL = record[saturation + Saturation.hL] as number
  const hLp = record[saturation + Saturation.hLp] as number
  const xh = 1 / ((record[saturation + Saturation.hV] as number) - hL)
  const x = (h - hL) * xh
  record[at + State.x] = x
  record[at + State.xh] = xh
  record[at + State.xp] = -(hLp + x * ((record[saturation + Saturation.hVp] as number) - hLp)) * xh
}

/** Writes a state within a gap between two regions, from both sides of the border as gap.ts has them. */
function fillGap(
  record: Float64Array,
  at: number,
  p: number,
  h: number,
  region: number,
  subcritical: number,
): void {
  const T = border[0] as number
  const slope = border[1] as number
  const low = lowSide[Point.h] as number
  const width = (highSide[Point.h] as number) - low
  const part = (h - low) / width
  const lowP = enthalpyAlong(lowSide, slope)
  const partP = -(lowP + part * (enthalpyAlong(highSide, slope) - lowP)) / width
  const s = lowSide[Point.s] as number
  const ds = (highSide[Point.s] as number) - s
  const v = lowSide[Point.v] as number
  const dv = (highSide[Point.v] as number) - v
  const sp = entropyAlong(lowSide, T, slope)
  const vp = volumeAlong(lowSide, slope)
  record[at + State.p] = p
  record[at + State.h] = h
  record[at + State.T] = T
  record[at + State.s] = s + part * ds
  record[at + State.v] = v + part * dv
  record[at + State.Tp] = slope
  record[at + State.Th] = 0
  record[at + State.sp] = sp + part * (entropyAlong(highSide, T, slope) - sp) + partP * ds
  record[at + State.sh] = ds / width
  record[at + State.vp] = vp + part * (volumeAlong(highSide, slope) - vp) + partP * dv
  record[at + State.vh] = dv / width
  record[at + State.region] = region
  dryness(record, at, h, subcritical)
}

/**
 * Above 16.529 MPa: region 1, 3 or 2 (5) by the enthalpies at the borders. At a border region 1 or 2
 * goes first, so that an overlap of both sides has one answer.
 */
function dense(record: Float64Array, at: number, p: number, h: number, side: number): number {
  const subcritical = side === SUPERCRITICAL ? 0 : 1
  if (side !== VAPOUR && h < mostEnthalpy13) {
    if (h < leastEnthalpy13) return liquid(record, at, p, h, subcritical)
    region1Point(lowSide, p, borderTemperature13)
    if (h <= (lowSide[Point.h] as number)) return liquid(record, at, p, h, subcritical)
  }
  if (side !== LIQUID && h > leastEnthalpy23) {
    if (h > mostEnthalpy23) return steam(record, at, p, h, subcritical)
    region2Point(highSide, p, borderTemperature23(p))
    if (h >= (highSide[Point.h] as number)) return steam(record, at, p, h, subcritical)
  }
  if (!solveDense(record, at, p, h, side)) return refuse(Outcome.enthalpyHigh, h, h)
  const T = found[1] as number
  if (T < borderTemperature13) {
    sidesOfBorder13(p)
    fillGap(record, at, p, h, 1, subcritical)
  } else if (side !== LIQUID && T > borderTemperature23(p)) {
    sidesOfBorder23(p)
    fillGap(record, at, p, h, 3, subcritical)
  } else fillField(record, at, p, h, subcritical)
  return Outcome.fine
}

/** Density and temperature of region 3 into `found`, from the record's state when it foretells them. */
function solveDense(record: Float64Array, at: number, p: number, h: number, side: number): boolean {
  const liquidSide = side === LIQUID || (side === SUPERCRITICAL && onLiquidSide(p, h))
  const T = foretold(record, at, p, h, 3)
  if (T !== 0) {
    const v =
      (record[at + State.v] as number) +
      (record[at + State.vp] as number) * (p - (record[at + State.p] as number)) +
      (record[at + State.vh] as number) * (h - (record[at + State.h] as number))
    if (region3AtEnthalpy(field, p, h, liquidSide, 1 / v, T)) {
      if (side === SUPERCRITICAL) return true
      // A first guess from across the two-phase zone may settle there: only the own side counts.
      const saturation = at + State.saturation
      const v3 = 1 / (found[0] as number)
      if (side === LIQUID && v3 <= (record[saturation + Saturation.vL] as number)) return true
      if (side === VAPOUR && v3 >= (record[saturation + Saturation.vV] as number)) return true
    }
  }
  return region3AtEnthalpy(field, p, h, liquidSide, 0, 0)
}

/** Writes a state of region 3 from `field` and `found`. */
function fillField(
  record: Float64Array,
  at: number,
  p: number,
  h: number,
  subcritical: number,
): void {
  const v = 1 / (found[0] as number)
  const T = found[1] as number
  const pRho = field[Field.pRho] as number
  const pT = field[Field.pT] as number
  const hRho = field[Field.hRho] as number
  const hT = field[Field.hT] as number
  const share = 1 / (pRho * hT - pT * hRho)
  const sh = 1 / T
  record[at + State.p] = p
  record[at + State.h] = h
  record[at + State.T] = T
  record[at + State.s] = field[Field.s] as number
  record[at + State.v] = v
  record[at + State.Tp] = -hRho * share
  record[at + State.Th] = pRho * share
  record[at + State.sp] = -v * sh
  record[at + State.sh] = sh
  record[at + State.vp] = -v * v * hT * share
  record[at + State.vh] = v * v * pT * share
  record[at + State.region] = 3
  dryness(record, at, h, subcritical)
}

function wet(record: Float64Array, at: number, p: number, h: number): number {
  const saturation = at + State.saturation
  dryness(record, at, h, 1)
  const x = record[at + State.x] as number
  const xp = record[at + State.xp] as number
  const xh = record[at + State.xh] as number
  const s = record[saturation + Saturation.sL] as number
  const ds = (record[saturation + Saturation.sV] as number) - s
  const sp = record[saturation + Saturation.sLp] as number
  const v = record[saturation + Saturation.vL] as number
  const dv = (record[saturation + Saturation.vV] as number) - v
  const vp = record[saturation + Saturation.vLp] as number
  record[at + State.p] = p
  record[at + State.h] = h
  record[at + State.T] = record[saturation + Saturation.T] as number
  record[at + State.s] = s + x * ds
  record[at + State.v] = v + x * dv
  record[at + State.Tp] = record[saturation + Saturation.Tp] as number
  record[at + State.Th] = 0
  record[at + State.sp] = sp + x * ((record[saturation + Saturation.sVp] as number) - sp) + xp * ds
  record[at + State.sh] = xh * ds
  record[at + State.vp] = vp + x * ((record[saturation + Saturation.vVp] as number) - vp) + xp * dv
  record[at + State.vh] = xh * dv
  record[at + State.region] = 4
  return Outcome.fine
}
