/**
 * States from any two quantities, for results, charts and tests: one object, or what stands in the
 * way. Not for hot paths.
 */
import { highestPressure, lowestPressure, lowestTemperature } from './constants.ts'
import { enthalpyAtPressureDryness } from './enthalpy.ts'
import { enthalpyAtPressureEntropy } from './enthalpy-at-entropy.ts'
import { enthalpyAtPressureVolume } from './enthalpy-at-volume.ts'
import { pressureGuess } from './if97/backward.ts'
import { POINT_SIZE, Point, region1Point } from './if97/point.ts'
import { Outcome, refuse } from './outcome.ts'
import { RESULT_SIZE, SATURATION_SIZE } from './records.ts'
import { saturationAtTemperature } from './saturation.ts'
import { stateOnIsotherm } from './states-on-isotherm.ts'
import {
  range,
  type SteamRange,
  type SteamSeveral,
  type SteamState,
  several,
  stateAtPressureTemperature,
  stateOf,
  wetState,
} from './steam-state.ts'

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

const result = new Float64Array(RESULT_SIZE)
const saturation = new Float64Array(SATURATION_SIZE)
const point = new Float64Array(POINT_SIZE)

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
  return wetState(saturation, T, x)
}

/**
 * p with h(p, s) = h: h rises with p along an isentrope (dh/dp = v), so that p is unique; Newton's
 * steps from the backward equations, kept in a bracket.
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
  // No pressure has this entropy: the refusal at the end of the range that comes nearest says why.
  if (bestP === 0) {
    bestP = code === Outcome.entropyLow ? highestPressure : lowestPressure
    code = enthalpyAtPressureEntropy(result, 0, bestP, s)
    if (code !== Outcome.fine) return range(code)
    best = Number.POSITIVE_INFINITY
  }
  if (best > 1e-9 * Math.max(Math.abs(h), 1e5) && best > 0) {
    enthalpyAtPressureEntropy(result, 0, bestP, s)
    const limit = result[0] as number
    return range(refuse(h < limit ? Outcome.enthalpyLow : Outcome.enthalpyHigh, h, limit))
  }
  return stateOf(bestP, h)
}
