/** States of an isotherm with a given entropy or enthalpy: there may be more than one. */
import {
  criticalTemperature,
  highestPressure,
  highestPressure5,
  highestTemperature,
  highestTemperature25,
  lowestPressure,
  lowestTemperature,
} from './constants.ts'
import { pointAtPressureTemperature } from './enthalpy.ts'
import { POINT_SIZE, Point } from './if97/point.ts'
import { Outcome, refuse } from './outcome.ts'
import { SATURATION_SIZE, Saturation } from './records.ts'
import { saturationAtTemperature } from './saturation.ts'
import {
  range,
  type SteamRange,
  type SteamSeveral,
  type SteamState,
  several,
  stateAtPressureTemperature,
  wetState,
} from './steam-state.ts'

const saturation = new Float64Array(SATURATION_SIZE)
const point = new Float64Array(POINT_SIZE)

/** How far beyond 0 and 1 a dryness fraction still counts as saturated. */
const besideWet = 1e-8

/** Points of an isotherm that are looked at between its ends, to tell one answer from several. */
const ISOTHERM_POINTS = 160

/**
 * States of an isotherm with a given s or h (the slot of a point): the steam's branch up to
 * saturation, the wet region, the liquid's branch.
 */
export function stateOnIsotherm(
  T: number,
  value: number,
  of: number,
): SteamState | SteamRange | SteamSeveral {
  if (!(T >= lowestTemperature && T <= highestTemperature)) {
    const low = !(T >= lowestTemperature)
    const limit = low ? lowestTemperature : highestTemperature
    return range(refuse(low ? Outcome.temperatureLow : Outcome.temperatureHigh, T, limit))
  }
  const most = T > highestTemperature25 ? highestPressure5 : highestPressure
  const answers: SteamState[] = []
  const extremes = { low: Number.POSITIVE_INFINITY, high: Number.NEGATIVE_INFINITY }
  if (T < criticalTemperature && saturationAtTemperature(saturation, 0, T) === Outcome.fine) {
    const p = saturation[Saturation.p] as number
    const slot = of === Point.s ? Saturation.sL : Saturation.hL
    const wetLow = saturation[slot] as number
    const wetHigh = saturation[slot + 1] as number
    branch(T, lowestPressure, p * (1 - 1e-9), value, of, answers, extremes)
    const x = (value - wetLow) / (wetHigh - wetLow)
    if (x >= 0 && x <= 1) answers.push(wetState(saturation, T, x))
    extremes.low = Math.min(extremes.low, wetLow)
    extremes.high = Math.max(extremes.high, wetHigh)
    branch(T, p * (1 + 1e-9), most, value, of, answers, extremes)
    // The branches end a little before saturation: what lies between counts as saturated.
    if (answers.length === 0 && x > -besideWet && x < 1 + besideWet) {
      answers.push(wetState(saturation, T, x < 0.5 ? 0 : 1))
    }
  } else branch(T, lowestPressure, most, value, of, answers, extremes)
  closeToEnd(T, most, value, of, answers)
  const [first] = answers
  if (first === undefined) {
    const low = !(value >= extremes.low)
    const limit = low ? extremes.low : extremes.high
    const codes =
      of === Point.s
        ? [Outcome.entropyLow, Outcome.entropyHigh]
        : [Outcome.enthalpyLow, Outcome.enthalpyHigh]
    return range(refuse((low ? codes[0] : codes[1]) as number, value, limit))
  }
  if (answers.length === 1) return first
  return several(answers, `temperature and ${of === Point.s ? 'entropy' : 'enthalpy'}`)
}

/** Answers on one branch of an isotherm between two pressures, looked for piece by piece. */
function branch(
  T: number,
  from: number,
  to: number,
  value: number,
  of: number,
  answers: SteamState[],
  extremes: { low: number; high: number },
): void {
  const at = (p: number): number => {
    if (pointAtPressureTemperature(point, p, T) !== Outcome.fine) saturatedPoint(p)
    return (point[of] as number) - value
  }
  const ratio = (to / from) ** (1 / ISOTHERM_POINTS)
  let p0 = from
  let f0 = at(p0)
  let p1 = p0 * ratio
  let f1 = at(p1)
  note(extremes, f0 + value)
  note(extremes, f1 + value)
  if (f0 === 0) push(T, p0, answers)
  if (f0 * f1 < 0) push(T, root(at, p0, p1, f0), answers)
  for (let i = 2; i <= ISOTHERM_POINTS; i++) {
    const p2 = i === ISOTHERM_POINTS ? to : p1 * ratio
    const f2 = at(p2)
    note(extremes, f2 + value)
    if (f1 === 0) push(T, p1, answers)
    else if (f1 * f2 < 0) push(T, root(at, p1, p2, f1), answers)
    // A turning point nearer to zero than its neighbours may cross zero twice between them.
    else if (f0 * f1 > 0 && Math.abs(f1) <= Math.min(Math.abs(f0), Math.abs(f2))) {
      const turn = turningPoint(at, p0, p2, Math.sign(f1))
      const ft = at(turn)
      note(extremes, ft + value)
      if (ft * f1 < 0) {
        push(T, root(at, p0, turn, f0), answers)
        push(T, root(at, turn, p2, ft), answers)
      }
    }
    p0 = p1
    f0 = f1
    p1 = p2
    f1 = f2
  }
}

/** The state at the isotherm's end where the value lies beyond it by no more than round-off. */
function closeToEnd(
  T: number,
  most: number,
  value: number,
  of: number,
  answers: SteamState[],
): void {
  for (const p of [lowestPressure, most]) {
    if (answers.some((answer) => Math.abs(answer.p / p - 1) < 1e-6)) continue
    if (pointAtPressureTemperature(point, p, T) !== Outcome.fine) continue
    const end = point[of] as number
    const scale = of === Point.s ? 1e3 : 1e6
    if (Math.abs(value - end) <= 1e-11 * Math.max(scale, Math.abs(end))) push(T, p, answers)
  }
}

/**
 * Within the band round saturation p and T say nothing: the nearer saturated state stands for them.
 */
function saturatedPoint(p: number): void {
  const side = p > (saturation[Saturation.p] as number) ? 0 : 1
  point[Point.h] = saturation[Saturation.hL + side] as number
  point[Point.s] = saturation[Saturation.sL + side] as number
}

function note(extremes: { low: number; high: number }, value: number): void {
  extremes.low = Math.min(extremes.low, value)
  extremes.high = Math.max(extremes.high, value)
}

function push(T: number, p: number, answers: SteamState[]): void {
  const found = stateAtPressureTemperature(p, T)
  if (found.outcome === 'state') answers.push(found)
}

/** A zero between two pressures, by bisection in ln p. */
function root(f: (p: number) => number, from: number, to: number, atFrom: number): number {
  let low = from
  let high = to
  for (let i = 0; i < 100 && high - low > 1e-15 * high; i++) {
    const middle = Math.sqrt(low * high)
    if (middle <= low || middle >= high) break
    if (f(middle) * atFrom > 0) low = middle
    else high = middle
  }
  return Math.abs(f(low)) < Math.abs(f(high)) ? low : high
}

/** The pressure between two where sign * f is least, by the golden section. */
function turningPoint(f: (p: number) => number, from: number, to: number, sign: number): number {
  const golden = 0.5 * (Math.sqrt(5) - 1)
  let low = from
  let high = to
  for (let i = 0; i < 60; i++) {
    const width = golden * (high - low)
    if (sign * f(high - width) < sign * f(low + width)) high = low + width
    else low = high - width
  }
  return 0.5 * (low + high)
}
