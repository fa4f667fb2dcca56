/**
 * States from any two quantities, for results, charts and tests: one object, or what stands in the way.
 * Not for hot paths.
 */
import {
  criticalTemperature,
  highestPressure,
  highestPressure5,
  highestTemperature,
  highestTemperature25,
  lowestPressure,
  lowestTemperature,
} from './constants.ts'
import { enthalpyAtPressureDryness, pointAtPressureTemperature } from './enthalpy.ts'
import { enthalpyAtPressureEntropy, enthalpyAtPressureVolume } from './enthalpy-isobar.ts'
import { pressureGuess } from './if97/backward.ts'
import { POINT_SIZE, Point, region1Point, region2Point, region5Point } from './if97/point.ts'
import { FIELD_SIZE, Field, region3Field } from './if97/region3.ts'
import { Outcome, type RangeQuantity, rangeProblem, refuse } from './outcome.ts'
import { type Phase, phaseOfRecord } from './phase.ts'
import { RESULT_SIZE, SATURATION_SIZE, Saturation, STATE_SIZE, State } from './records.ts'
import { saturationAtTemperature } from './saturation.ts'
import { stateAtPressureEnthalpy } from './state.ts'

/** Two quantities that fix a state, in SI units: Pa, K, J/kg, J/(kg K), m3/kg, dryness fraction. */
export type StatePair =
  | { readonly p: number; readonly T: number }
  | { readonly p: number; readonly h: number }
  | { readonly p: number; readonly s: number }
  | { readonly p: number; readonly v: number }
  | { readonly p: number; readonly x: number }
  | { readonly T: number; readonly x: number }
  | { readonly T: number; readonly s: number }
  | { readonly T: number; readonly h: number }
  | { readonly h: number; readonly s: number }

/**
 * A state in SI units. `x` is null outside the wet region; `cp` (J/(kg K)) and the speed of sound `w`
 * (m/s) are null within it.
 */
export interface SteamState {
  readonly outcome: 'state'
  readonly p: number
  readonly T: number
  readonly h: number
  readonly s: number
  readonly v: number
  readonly x: number | null
  readonly phase: Phase
  readonly cp: number | null
  readonly w: number | null
}

/** No state: which quantity lies beyond which limit, in SI units and in words. */
export interface SteamRange {
  readonly outcome: 'range'
  readonly quantity: RangeQuantity
  readonly value: number
  readonly limit: number
  readonly message: string
}

/** More than one state has the two quantities. */
export interface SteamSeveral {
  readonly outcome: 'several'
  readonly answers: readonly SteamState[]
  readonly message: string
}

const record = new Float64Array(STATE_SIZE)
const result = new Float64Array(RESULT_SIZE)
const saturation = new Float64Array(SATURATION_SIZE)
const point = new Float64Array(POINT_SIZE)
const field = new Float64Array(FIELD_SIZE)

/** The state of two quantities. */
export function state(pair: StatePair): SteamState | SteamRange | SteamSeveral {
  if ('p' in pair) {
    if ('h' in pair) return stateOf(pair.p, pair.h)
    if ('T' in pair) return stateAtPressureTemperature(pair.p, pair.T)
    let code: number
    if ('s' in pair) code = enthalpyAtPressureEntropy(result, 0, pair.p, pair.s)
    else if ('v' in pair) return stateAtPressureVolume(pair.p, pair.v)
    else code = drynessWithin(pair.x) || enthalpyAtPressureDryness(result, 0, pair.p, pair.x)
    return code === Outcome.fine ? stateOf(pair.p, result[0] as number) : range(code)
  }
  if ('T' in pair) {
    if ('x' in pair) return stateAtTemperatureDryness(pair.T, pair.x)
    if ('s' in pair) return stateOnIsotherm(pair.T, pair.s, Point.s)
    return stateOnIsotherm(pair.T, pair.h, Point.h)
  }
  return stateAtEnthalpyEntropy(pair.h, pair.s)
}

/** Dryness fractions of states lie between 0 and 1. */
function drynessWithin(x: number): number {
  if (x >= 0 && x <= 1) return Outcome.fine
  return x > 1 ? refuse(Outcome.drynessHigh, x, 1) : refuse(Outcome.drynessLow, x, 0)
}

function stateOf(p: number, h: number): SteamState | SteamRange {
  const code = stateAtPressureEnthalpy(record, 0, p, h)
  return code === Outcome.fine ? stateOfRecord() : range(code)
}

function stateOfRecord(): SteamState {
  const region = record[State.region] as number
  const p = record[State.p] as number
  const T = record[State.T] as number
  const v = record[State.v] as number
  let cp: number | null = null
  let w: number | null = null
  if (region === 3) {
    region3Field(field, 1 / v, T)
    cp = heatCapacityOfField(v, T)
    w = speedOfSoundOfField(v, T)
  } else if (region !== 4) {
    if (region === 1) region1Point(point, p, T)
    else if (region === 2) region2Point(point, p, T)
    else region5Point(point, p, T)
    cp = point[Point.cp] as number
    w = speedOfSoundOfPoint(T)
  }
  return {
    outcome: 'state',
    p,
    T,
    h: record[State.h] as number,
    s: record[State.s] as number,
    v,
    x: region === 4 ? Math.min(1, Math.max(0, record[State.x] as number)) : null,
    phase: phaseOfRecord(record, 0),
    cp,
    w,
  }
}

/** cp from a field: cv + T pT^2 v^2 / pRho, unbounded at the critical point and then null. */
function heatCapacityOfField(v: number, T: number): number | null {
  const pT = field[Field.pT] as number
  const pRho = field[Field.pRho] as number
  const cp = (field[Field.cv] as number) + (T * pT * pT * v * v) / pRho
  return pRho > 0 && Number.isFinite(cp) ? cp : null
}

function speedOfSoundOfField(v: number, T: number): number {
  const pT = field[Field.pT] as number
  const square = (field[Field.pRho] as number) + (T * pT * pT * v * v) / (field[Field.cv] as number)
  return Math.sqrt(square)
}

/** w = v / sqrt(-(dv/dp at constant s)). */
function speedOfSoundOfPoint(T: number): number {
  const vT = point[Point.vT] as number
  const isentropic = (point[Point.vp] as number) + (T * vT * vT) / (point[Point.cp] as number)
  return (point[Point.v] as number) / Math.sqrt(-isentropic)
}

/** A state of given p and T: T as given, also where two regions overlap in h. */
function stateAtPressureTemperature(p: number, T: number): SteamState | SteamRange {
  let code = pointAtPressureTemperature(point, p, T)
  if (code !== Outcome.fine) return range(code)
  const h = point[Point.h] as number
  const s = point[Point.s] as number
  const v = point[Point.v] as number
  code = stateAtPressureEnthalpy(record, 0, p, h)
  if (code !== Outcome.fine) return range(code)
  return { ...stateOfRecord(), T, s, v }
}

function stateAtPressureVolume(p: number, v: number): SteamState | SteamRange | SteamSeveral {
  const code = enthalpyAtPressureVolume(result, 0, p, v)
  if (code !== Outcome.fine) return range(code)
  const warm = stateOf(p, result[0] as number)
  if (warm.outcome !== 'state' || warm.T > 300 || warm.phase === 'vapour') return warm
  // Cold water: the branch below the density maximum.
  region1Point(point, p, lowestTemperature)
  if ((point[Point.vT] as number) >= 0 || v > (point[Point.v] as number)) return warm
  let low = lowestTemperature
  let high = warm.T
  for (let i = 0; i < 60; i++) {
    const T = 0.5 * (low + high)
    region1Point(point, p, T)
    if ((point[Point.v] as number) > v && (point[Point.vT] as number) < 0) low = T
    else high = T
  }
  region1Point(point, p, low)
  const cold = stateOf(p, point[Point.h] as number)
  if (cold.outcome !== 'state' || warm.T - cold.T < 1e-3) return warm
  return several([cold, warm], 'pressure and volume')
}

function stateAtTemperatureDryness(T: number, x: number): SteamState | SteamRange {
  const code = drynessWithin(x) || saturationAtTemperature(saturation, 0, T)
  if (code !== Outcome.fine) return range(code)
  return wetState(T, x)
}

/** The wet state of the saturation record at T and x. */
function wetState(T: number, x: number): SteamState {
  const between = (liquid: number): number => {
    const first = saturation[liquid] as number
    return first + x * ((saturation[liquid + 1] as number) - first)
  }
  return {
    outcome: 'state',
    p: saturation[Saturation.p] as number,
    T,
    h: between(Saturation.hL),
    s: between(Saturation.sL),
    v: between(Saturation.vL),
    x,
    phase: 'wet',
    cp: null,
    w: null,
  }
}

/**
 * p with h(p, s) = h: h rises with p along an isentrope (dh/dp = v), so that p is unique; Newton's steps
 * from the backward equations, kept in a bracket.
 */
function stateAtEnthalpyEntropy(h: number, s: number): SteamState | SteamRange {
  if (!Number.isFinite(h))
    return range(refuse(h > 0 ? Outcome.enthalpyHigh : Outcome.enthalpyLow, h, 0))
  if (!Number.isFinite(s))
    return range(refuse(s > 0 ? Outcome.entropyHigh : Outcome.entropyLow, s, 0))
  let low = lowestPressure
  let high = highestPressure
  let p = pressureGuess(h, s)
  if (!(p > low && p < high)) p = Math.sqrt(low * high)
  let code = 0
  let bestP = 0
  let best = Number.POSITIVE_INFINITY
  for (let i = 0; i < 200; i++) {
    code = enthalpyAtPressureEntropy(result, 0, p, s)
    let next = 0
    // s too low for this p: water below 273.15 K, found at a higher pressure; too high: at a lower one.
    if (code === Outcome.entropyLow) low = p
    else if (code === Outcome.entropyHigh) high = p
    else if (code !== Outcome.fine) return range(code)
    else {
      const off = (result[0] as number) - h
      if (Math.abs(off) < best) {
        best = Math.abs(off)
        bestP = p
      }
      if (off < 0) low = p
      else high = p
      next = p - off / (result[1] as number)
      if (Math.abs(next - p) <= 1e-15 * p) break
    }
    if (!(next > low && next < high)) {
      if (high - low <= 1e-14 * high) break
      next = high > 2 * low ? Math.sqrt(low * high) : 0.5 * (low + high)
    }
    p = next
  }
  // Bracketing through the refused part ends where no state is: h lies beyond the isentrope's ends.
  if (bestP === 0) return range(refuse(code === 0 ? Outcome.entropyHigh : code, s, s))
  if (best > 1e-9 * Math.max(Math.abs(h), 1e5) && best > 0) {
    enthalpyAtPressureEntropy(result, 0, bestP, s)
    const limit = result[0] as number
    return range(refuse(h < limit ? Outcome.enthalpyLow : Outcome.enthalpyHigh, h, limit))
  }
  return stateOf(bestP, h)
}

/** How far beyond 0 and 1 a dryness fraction still counts as saturated. */
const besideWet = 1e-8

/** Points of an isotherm that are looked at between its ends, to tell one answer from several. */
const ISOTHERM_POINTS = 160

/**
 * States of an isotherm with a given s or h (the slot of a point): the steam's branch up to saturation,
 * the wet region, the liquid's branch.
 */
function stateOnIsotherm(
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
    if (x >= 0 && x <= 1) answers.push(wetState(T, x))
    extremes.low = Math.min(extremes.low, wetLow)
    extremes.high = Math.max(extremes.high, wetHigh)
    branch(T, p * (1 + 1e-9), most, value, of, answers, extremes)
    // The branches end a little before saturation: what lies between counts as saturated.
    if (answers.length === 0 && x > -besideWet && x < 1 + besideWet) {
      answers.push(wetState(T, x < 0.5 ? 0 : 1))
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

/** Within the band round saturation p and T say nothing: the nearer saturated state stands for them. */
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

function several(answers: readonly SteamState[], given: string): SteamSeveral {
  const list = answers.map(({ p, T }) => `${p.toPrecision(6)} Pa, ${T.toPrecision(7)} K`).join('; ')
  return {
    outcome: 'several',
    answers,
    message: `This ${given} belong to ${answers.length} states: ${list}. Give another pair.`,
  }
}

const units: Record<RangeQuantity, string> = {
  pressure: 'Pa',
  temperature: 'K',
  enthalpy: 'J/kg',
  entropy: 'J/(kg K)',
  volume: 'm3/kg',
  difference: 'K',
  dryness: '',
}

function range(code: number): SteamRange {
  const { quantity, value, limit } = rangeProblem()
  const unit = units[quantity] === '' ? '' : ` ${units[quantity]}`
  const name = quantity === 'dryness' ? 'dryness fraction' : quantity
  let message: string
  if (code === Outcome.onSaturation) {
    message = `The temperature ${value.toPrecision(9)} K is the saturation temperature: give the dryness fraction or the enthalpy.`
  } else if (!Number.isFinite(value)) message = `The ${name} is not a number.`
  else {
    const side = value < limit ? 'below' : 'above'
    message = `The ${name} ${value.toPrecision(7)}${unit} lies ${side} the limit ${limit.toPrecision(7)}${unit} of IAPWS-IF97 here.`
  }
  return { outcome: 'range', quantity, value, limit, message }
}
