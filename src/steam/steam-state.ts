/** One state as an object, and what is said when there is none or more than one. */
import { pointAtPressureTemperature } from './enthalpy.ts'
import { POINT_SIZE, Point, region1Point, region2Point, region5Point } from './if97/point.ts'
import { FIELD_SIZE, Field, region3Field } from './if97/region3.ts'
import { Outcome, type RangeQuantity, rangeProblem } from './outcome.ts'
import { type Phase, phaseOfRecord } from './phase.ts'
import { Saturation, STATE_SIZE, State } from './records.ts'
import { stateAtPressureEnthalpy } from './state.ts'

/**
 * A state in SI units. `x` is null outside the wet region; `cp` (J/(kg K)) and the speed of sound
 * `w` (m/s) are null within it.
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
const point = new Float64Array(POINT_SIZE)
const field = new Float64Array(FIELD_SIZE)

/** The state at p (Pa) and h (J/kg). */
export function stateOf(p: number, h: number): SteamState | SteamRange {
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
export function stateAtPressureTemperature(p: number, T: number): SteamState | SteamRange {
  let code = pointAtPressureTemperature(point, p, T)
  if (code !== Outcome.fine) return range(code)
  const h = point[Point.h] as number
  const s = point[Point.s] as number
  const v = point[Point.v] as number
  code = stateAtPressureEnthalpy(record, 0, p, h)
  if (code !== Outcome.fine) return range(code)
  return { ...stateOfRecord(), T, s, v }
}

/** The wet state of a saturation record at T and x. */
export function wetState(saturation: Float64Array, T: number, x: number): SteamState {
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

/** More than one answer to what was given. */
export function several(answers: readonly SteamState[], given: string): SteamSeveral {
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

/** The last refusal as an object. */
export function range(code: number): SteamRange {
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
