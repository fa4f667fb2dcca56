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
import { highSide, lowSide, sidesOfBorder13, sidesOfBorder23, sidesOfBorder25 } from './gap.ts'
import { borderTemperature23 } from './if97/borders.ts'
import { Point, region1Point, region2Point, region5Point, region5Settled } from './if97/point.ts'
import { Field, onLiquidSide, region3AtEnthalpy, Sought, sought } from './if97/region3.ts'
import {
  Asked,
  region1TemperatureAtEnthalpy,
  region2TemperatureAtEnthalpy,
  region5TemperatureAtEnthalpy,
} from './if97/temperature-at-enthalpy.ts'
import { Outcome, refuse } from './outcome.ts'
import { Saturation, State } from './records.ts'
import { fillSaturation } from './saturation.ts'
import {
  asked as fillAsked,
  fillBeside,
  fillField,
  field as fillFieldFrom,
  fillGap,
  fillPoint,
  point as fillPointFrom,
  fillWet,
} from './state-fill.ts'

// Slots and limits as constants of this module: an imported binding is looked up at each use.
const {
  p: atP,
  h: atH,
  region: atRegion,
  saturation: atSaturation,
  T: atT,
  Tp: atTp,
  Th: atTh,
  Thh: atThh,
  v: atV,
  vp: atVp,
  vh: atVh,
  subcritical: atSubcritical,
  log: atLog,
} = State
const { hL: satHL, hV: satHV, T: satT, vL: satVL, vV: satVV } = Saturation
const { h: ptH, T: ptT, p: ptP, goal: ptGoal } = Point
const {
  p: askP,
  h: askH,
  guess: askGuess,
  limit: askLimit,
  T: askT,
  tau: askTau,
  step: askStep,
  log: askLog,
} = Asked
const asked = fillAsked
const point = fillPointFrom
const field = fillFieldFrom
const pressure13 = borderPressure13
const critical = criticalPressure
const leastSaturation = lowestSaturationPressure
const least = lowestPressure
const most = highestPressure
const coldest = lowestTemperature
const border25 = highestTemperature25
const border13 = borderTemperature13

/** p (Pa) and h (J/kg) of the state asked for, see `stateAtRequest`. */
export const stateRequest: Float64Array = asked

// Where a state above 16.529 MPa lies to the two-phase zone.
const LIQUID = 0
const VAPOUR = 1
const SUPERCRITICAL = 2

/** How far a state foretells another one of regions 1 and 2 closely, J/kg and as part of p. */
const nextEnthalpy = 6e3
const nextPressure = 3e-3
/** How far a state of region 3 foretells another one, J/kg. */
const nearEnthalpy = 1e5

// Bounds of h (J/kg) along the borders 1/3 and 2/3 from 16.529 to 100 MPa.
const leastEnthalpy13 = 1.55e6
const mostEnthalpy13 = 1.68e6
const leastEnthalpy23 = 2.55e6
const mostEnthalpy23 = 2.83e6

/** Within this part of h' or h'' a state counts as saturated, so as wet. */
const saturationBand = 1e-9
/** Least width of that band, J/kg: h' passes through zero near 273.16 K. */
const leastBand = 1e-6
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
 * h'(p) and h''(p) first; T follows from the forward equation of the region to round-off. A state
 * that the record already holds is the first guess; it does not change the digits.
 *
 * Holds from 1 Pa to 100 MPa (50 MPa above 1073.15 K) and from 273.15 K to 2273.15 K. Below 611.213
 * Pa there is steam only. An h within a gap between two regions takes the border's temperature.
 * When the answer is not 0 the state is as it was.
 */
export function stateAtPressureEnthalpy(
  record: Float64Array,
  at: number,
  p: number,
  h: number,
): number {
  // Short enough to be inlined: numbers passed on to a longer function would be allocated.
  asked[askP] = p
  asked[askH] = h
  return stateAtRequest(record, at)
}

/**
 * As `stateAtPressureEnthalpy`, from p and h in the first two slots of `stateRequest`: for callers
 * that are too long to have that function inlined and would have their numbers allocated.
 */
export function stateAtRequest(record: Float64Array, at: number): number {
  const code = solve(record, at)
  if (code !== Outcome.fine) restoreSaturation(record, at)
  return code
}

/**
 * After a refusal: the saturation record is again that of the state that the record still holds.
 */
function restoreSaturation(record: Float64Array, at: number): void {
  if (record[at + atRegion] === 0 || record[at + atSubcritical] === 0) return
  asked[askP] = record[at + atP] as number
  takeSaturation(record, at)
}

/** The saturation record of the pressure asked for. */
function takeSaturation(record: Float64Array, at: number): void {
  const p = asked[askP] as number
  const saturation = at + atSaturation
  if (record[saturation] === p) return
  record[saturation] = p
  fillSaturation(record, saturation)
}

function solve(record: Float64Array, at: number): number {
  const p = asked[askP] as number
  const h = asked[askH] as number
  if (record[at + atP] === p && record[at + atH] === h && record[at + atRegion] !== 0) {
    return Outcome.fine
  }
  if (!(p >= least && p <= most && Number.isFinite(h))) return refuseAsked()
  if (p >= critical) return dense(record, at, SUPERCRITICAL)
  if (p < leastSaturation) return steam(record, at, 0)
  takeSaturation(record, at)
  const saturation = at + atSaturation
  const hL = record[saturation + satHL] as number
  const hV = record[saturation + satHV] as number
  if (h < hL) {
    if (h < hL - bandAround(hL)) {
      return p > pressure13 ? dense(record, at, LIQUID) : liquid(record, at, 1)
    }
  } else if (h > hV + saturationBand * hV) {
    return p > pressure13 ? dense(record, at, VAPOUR) : steam(record, at, 1)
  }
  fillWet(record, at)
  return Outcome.fine
}

/** A pressure out of range, or an enthalpy that is no number or infinite. */
function refuseAsked(): number {
  const p = asked[askP] as number
  const h = asked[askH] as number
  if (!(p >= least)) return refuse(Outcome.pressureLow, p, least)
  if (p > most) return refuse(Outcome.pressureHigh, p, most)
  if (h > 0) {
    if (p > highestPressure5) region2Point(point, p, border25)
    else region5Point(point, p, highestTemperature)
    return refuse(Outcome.enthalpyHigh, h, point[ptH] as number)
  }
  if (p < leastSaturation) region2Point(point, p, coldest)
  else region1Point(point, p, coldest)
  return refuse(Outcome.enthalpyLow, h, point[ptH] as number)
}

/** The guess: the temperature that the record's state foretells; 0 when it is of another region. */
function foretell(record: Float64Array, at: number, region: number): void {
  if (record[at + atRegion] !== region) {
    asked[askGuess] = 0
    return
  }
  const dp = (asked[askP] as number) - (record[at + atP] as number)
  const dh = (asked[askH] as number) - (record[at + atH] as number)
  const along = (record[at + atTh] as number) + 0.5 * dh * (record[at + atThh] as number)
  asked[askGuess] = (record[at + atT] as number) + (record[at + atTp] as number) * dp + along * dh
}

/** The same for regions 1 and 2, whose backward equations are the better guess from further away. */
function foretellNext(record: Float64Array, at: number, region: number): void {
  const p = asked[askP] as number
  const dp = Math.abs(p - (record[at + atP] as number))
  const dh = Math.abs((asked[askH] as number) - (record[at + atH] as number))
  if (dp < nextPressure * p && dh < nextEnthalpy) foretell(record, at, region)
  else asked[askGuess] = 0
}

function liquid(record: Float64Array, at: number, subcritical: number): number {
  const p = asked[askP] as number
  asked[askLimit] = p > pressure13 ? border13 : (record[at + atSaturation + satT] as number)
  foretellNext(record, at, 1)
  region1TemperatureAtEnthalpy(asked)
  const T = 1386 / ((asked[askTau] as number) + (asked[askStep] as number))
  if (!(T >= coldest - temperatureSlack)) {
    region1Point(point, p, coldest)
    return refuse(Outcome.enthalpyLow, asked[askH] as number, point[ptH] as number)
  }
  asked[askT] = T
  fillBeside(record, at, 1, subcritical)
  return Outcome.fine
}

function steam(record: Float64Array, at: number, subcritical: number): number {
  const p = asked[askP] as number
  asked[askLog] =
    record[at + atP] === p && record[at + atRegion] === 2
      ? (record[at + atLog] as number)
      : Math.log(p * 1e-6)
  if ((asked[askH] as number) > highestEnthalpy2) return hotSteam(record, at, subcritical)
  if (p > pressure13) limitByBorder23()
  else if (subcritical === 1) {
    asked[askLimit] = record[at + atSaturation + satT] as number
  } else asked[askLimit] = coldest
  foretellNext(record, at, 2)
  region2TemperatureAtEnthalpy(asked)
  const T = 540 / ((asked[askTau] as number) + (asked[askStep] as number))
  if (T > border25) return hotSteam(record, at, subcritical)
  if (!(T >= coldest - temperatureSlack)) {
    region2Point(point, p, coldest)
    return refuse(Outcome.enthalpyLow, asked[askH] as number, point[ptH] as number)
  }
  asked[askT] = T
  record[at + atLog] = asked[askLog] as number
  fillBeside(record, at, 2, subcritical)
  return Outcome.fine
}

/** Beyond region 2: the gap at 1073.15 K or region 5. */
function hotSteam(record: Float64Array, at: number, subcritical: number): number {
  const p = asked[askP] as number
  const h = asked[askH] as number
  if (p > highestPressure5) {
    region2Point(point, p, border25)
    const most = point[ptH] as number
    if (h > most * (1 + 1e-12)) return refuse(Outcome.enthalpyHigh, h, most)
    record[at + atLog] = asked[askLog] as number
    fillPoint(record, at, 2, subcritical)
    return Outcome.fine
  }
  sidesOfBorder25(p)
  if (h < (highSide[ptH] as number)) {
    record[at + atLog] = asked[askLog] as number
    fillGap(record, at, 2, subcritical)
    return Outcome.fine
  }
  foretell(record, at, 5)
  region5TemperatureAtEnthalpy(asked)
  const T = asked[askT] as number
  if (T > highestTemperature + temperatureSlack) {
    region5Point(point, p, highestTemperature)
    return refuse(Outcome.enthalpyHigh, h, point[ptH] as number)
  }
  point[ptP] = p
  point[ptT] = T
  point[ptGoal] = h
  region5Settled(point)
  fillPoint(record, at, 5, subcritical)
  return Outcome.fine
}

/**
 * Above 16.529 MPa: region 1, 3 or 2 (5) by the enthalpies at the borders. At a border region 1 or
 * 2 goes first, so that an overlap of both sides has one answer.
 */
function dense(record: Float64Array, at: number, side: number): number {
  const p = asked[askP] as number
  const h = asked[askH] as number
  const subcritical = side === SUPERCRITICAL ? 0 : 1
  if (side !== VAPOUR && h < mostEnthalpy13) {
    if (h < leastEnthalpy13) return liquid(record, at, subcritical)
    region1Point(lowSide, p, border13)
    if (h <= (lowSide[ptH] as number)) return liquid(record, at, subcritical)
  }
  if (side !== LIQUID && h > leastEnthalpy23) {
    if (h > mostEnthalpy23) return steam(record, at, subcritical)
    region2Point(highSide, p, borderTemperature23(p))
    if (h >= (highSide[ptH] as number)) return steam(record, at, subcritical)
  }
  if (!solveDense(record, at, side)) return refuse(Outcome.enthalpyHigh, h, h)
  const T = field[Field.T] as number
  if (T < border13) {
    sidesOfBorder13(p)
    fillGap(record, at, 1, subcritical)
    return Outcome.fine
  }
  if (side !== LIQUID) {
    limitByBorder23()
    if (T > (asked[askLimit] as number)) {
      sidesOfBorder23(p)
      fillGap(record, at, 3, subcritical)
      return Outcome.fine
    }
  }
  fillField(record, at, subcritical)
  return Outcome.fine
}

function limitByBorder23(): void {
  asked[askLimit] = borderTemperature23(asked[askP] as number)
}

/** The field of region 3, started from the record's state where that foretells it. */
function solveDense(record: Float64Array, at: number, side: number): boolean {
  const p = asked[askP] as number
  const h = asked[askH] as number
  sought[Sought.p] = p
  sought[Sought.value] = h
  const liquidSide = side === LIQUID || (side === SUPERCRITICAL && onLiquidSide(sought))
  if (record[at + atRegion] === 3 && near(record, at)) {
    foretell(record, at, 3)
    const v =
      (record[at + atV] as number) +
      (record[at + atVp] as number) * (p - (record[at + atP] as number)) +
      (record[at + atVh] as number) * (h - (record[at + atH] as number))
    sought[Sought.rho] = 1 / v
    sought[Sought.T] = asked[askGuess] as number
    if (region3AtEnthalpy(field, liquidSide) && (field[Field.pRho] as number) > 0) {
      if (side === SUPERCRITICAL) return true
      // A first guess from across the two-phase zone may settle there: only the own side counts.
      const saturation = at + atSaturation
      const v3 = 1 / (field[Field.rho] as number)
      if (side === LIQUID && v3 <= (record[saturation + satVL] as number)) return true
      if (side === VAPOUR && v3 >= (record[saturation + satVV] as number)) return true
    }
  }
  sought[Sought.rho] = 0
  return region3AtEnthalpy(field, liquidSide)
}

/** Whether the record's state lies so near that its partials point at the one asked for. */
function near(record: Float64Array, at: number): boolean {
  const p = asked[askP] as number
  const h = asked[askH] as number
  return (
    Math.abs(p - (record[at + atP] as number)) < 0.1 * p &&
    Math.abs(h - (record[at + atH] as number)) < nearEnthalpy
  )
}
