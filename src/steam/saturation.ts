/** Saturation properties with their derivatives along the saturation line. */
import {
  borderPressure13,
  criticalDensity,
  criticalPressure,
  criticalTemperature,
  lowestSaturationPressure,
  lowestTemperature,
} from './constants.ts'
import { FIELD_SIZE, Field, region3Field, region3SaturatedDensity } from './if97/region3.ts'
import { saturatedStates } from './if97/saturation-curves.ts'
import {
  saturationLine,
  saturationPressureOf,
  saturationSlope,
  saturationTemperatureOf,
} from './if97/saturation-line.ts'
import { Outcome, refuse } from './outcome.ts'
import { Result, SATURATION_SIZE, Saturation } from './records.ts'

// Slots and limits as constants of this module: an imported binding is looked up at each use.
const {
  T: satT,
  Tp: satTp,
  hL: satHL,
  hV: satHV,
  sL: satSL,
  vL: satVL,
  hLp: satHLp,
  sLp: satSLp,
  vLp: satVLp,
  sV: satSV,
  perHeat: satPerHeat,
} = Saturation
const pressure13 = borderPressure13

const saturationSize = SATURATION_SIZE

/** The last pressure below the critical one at which saturated states are told apart, Pa. */
const lastPressure = criticalPressure * (1 - 1e-12)

const field = new Float64Array(FIELD_SIZE)

/**
 * Pa below the critical pressure from which saturated densities are carried on, see `denseSide`.
 */
const lastGap = 100

// Many streams of a plant share a pressure: saturation records already computed, found by a hash of p.
const CACHE_RECORDS = 512
const cache = new Float64Array(CACHE_RECORDS * SATURATION_SIZE)

/**
 * Whether a pressure has a saturation state (611.213 Pa to below the critical pressure), else why
 * not.
 */
export function checkSaturationPressure(p: number): number {
  if (p >= lowestSaturationPressure && p < criticalPressure) return Outcome.fine
  if (!(p >= lowestSaturationPressure))
    return refuse(Outcome.pressureLow, p, lowestSaturationPressure)
  return refuse(Outcome.pressureHigh, p, criticalPressure)
}

/**
 * The saturation record of a pressure between 611.213 Pa and the critical pressure, left in
 * `saturationCache`: answers with its offset there. It stays until the next call.
 */
export function cachedSaturation(p: number): number {
  const slot = (Math.imul((p * 64) | 0, 0x9e3779b1) >>> 23) * saturationSize
  if (cache[slot] !== p) {
    cache[slot] = p
    renewSaturation(slot)
  }
  return slot
}

function renewSaturation(slot: number): void {
  if ((cache[slot] as number) <= pressure13) {
    saturatedStates(cache, slot)
    return
  }
  saturationLine(cache, slot, slot + satT, slot + satTp)
  denseSide(cache, slot, 0)
  denseSide(cache, slot, 1)
  cache[slot + satPerHeat] = 1 / ((cache[slot + satHV] as number) - (cache[slot + satHL] as number))
}

/** Where `cachedSaturation` leaves its records. */
export const saturationCache: Float64Array = cache

/**
 * One side of the record in region 3: T from the saturation line, the density from the basic
 * equation. In the last 100 Pa below the critical pressure the two no longer meet to the digits of
 * a double; there the densities close in on the critical one with the square root of the gap, as
 * they do before.
 */
function denseSide(record: Float64Array, at: number, shift: number): void {
  const p = record[at] as number
  const T = record[at + satT] as number
  const slope = record[at + satTp] as number
  const gap = criticalPressure - p
  const sign = shift === 0 ? 1 : -1
  let rho: number
  let rhoP: number
  if (gap > lastGap) {
    rho = region3SaturatedDensity(field, p, T, gap, sign)
    rhoP = (1 - (field[Field.pT] as number) * slope) / (field[Field.pRho] as number)
  } else {
    const edge = criticalPressure - lastGap
    const edgeRho = region3SaturatedDensity(
      field,
      edge,
      saturationTemperatureOf(edge),
      lastGap,
      sign,
    )
    const off = (edgeRho - criticalDensity) * Math.sqrt(gap / lastGap)
    rho = criticalDensity + off
    rhoP = -off / (2 * gap)
    region3Field(field, rho, T)
  }
  const v = 1 / rho
  const base = at + shift
  const pT = field[Field.pT] as number
  record[base + satHL] = field[Field.h] as number
  record[base + satSL] = field[Field.s] as number
  record[base + satVL] = v
  record[base + satHLp] = (field[Field.hRho] as number) * rhoP + (field[Field.hT] as number) * slope
  record[base + satSLp] = -pT * v * v * rhoP + ((field[Field.cv] as number) / T) * slope
  record[base + satVLp] = -v * v * rhoP
}

/** Fills the saturation record whose p (Pa), known to have a saturation state, is in its first slot. */
export function fillSaturation(record: Float64Array, at: number): void {
  const p = record[at] as number
  if (p <= pressure13) {
    saturatedStates(record, at)
    return
  }
  // region 3 takes its time: many streams share a pressure
  const slot = cachedSaturation(p)
  for (let i = 0; i < saturationSize; i++) record[at + i] = cache[slot + i] as number
}

/**
 * Fills a saturation record from a pressure (Pa). Returns at once when the record already holds it.
 * Refused outside 611.213 Pa <= p < 22.064 MPa.
 */
export function saturationAtPressure(record: Float64Array, at: number, p: number): number {
  if (record[at] === p) return Outcome.fine
  const code = checkSaturationPressure(p)
  if (code !== Outcome.fine) return code
  record[at] = p
  fillSaturation(record, at)
  return Outcome.fine
}

/**
 * Fills a saturation record from a temperature (K): p is the saturation pressure and T the
 * temperature asked for. Refused outside 273.15 K <= T < 647.096 K.
 */
export function saturationAtTemperature(record: Float64Array, at: number, T: number): number {
  const code = checkSaturationTemperature(T)
  if (code !== Outcome.fine) return code
  const p = Math.max(lowestSaturationPressure, saturationPressureOf(T))
  if (p >= criticalPressure) return refuse(Outcome.temperatureHigh, T, criticalTemperature)
  saturationAtPressure(record, at, p)
  record[at + satT] = T
  return Outcome.fine
}

function checkSaturationTemperature(T: number): number {
  if (T >= lowestTemperature && T < criticalTemperature) return Outcome.fine
  if (!(T >= lowestTemperature)) return refuse(Outcome.temperatureLow, T, lowestTemperature)
  return refuse(Outcome.temperatureHigh, T, criticalTemperature)
}

/** Saturation temperature (K) of a pressure (Pa): [T, dT/dp, 0]. */
export function saturationTemperature(out: Float64Array, at: number, p: number): number {
  const code = checkSaturationPressure(p)
  if (code !== Outcome.fine) return code
  const T = saturationTemperatureOf(p)
  out[at + Result.value] = T
  out[at + Result.first] = saturationSlope(p, T)
  out[at + Result.second] = 0
  return Outcome.fine
}

/** Saturation pressure (Pa) of a temperature (K): [p, dp/dT, 0]. */
export function saturationPressure(out: Float64Array, at: number, T: number): number {
  const code = checkSaturationTemperature(T)
  if (code !== Outcome.fine) return code
  const p = saturationPressureOf(T)
  out[at + Result.value] = p
  out[at + Result.first] = 1 / saturationSlope(p, T)
  out[at + Result.second] = 0
  return Outcome.fine
}

// Nodes of s' and s'' against T, closer together towards the critical point where both run steep.
const NODES = 64
const nodes = new Float64Array(2 * NODES)
const nodePressures = new Float64Array(NODES)

function fillNodes(): void {
  const span = criticalTemperature - lowestTemperature
  for (let i = 0; i < NODES; i++) {
    const part = 1 - i / (NODES - 1)
    const T = i === 0 ? lowestTemperature : criticalTemperature - span * part * part * part
    const p = i === 0 ? lowestSaturationPressure : Math.min(saturationPressureOf(T), lastPressure)
    const slot = cachedSaturation(p)
    nodePressures[i] = p
    nodes[i] = cache[slot + satSL] as number
    nodes[NODES + i] = cache[slot + satSV] as number
  }
}

/**
 * h'' (J/kg) of the dry saturated steam that has entropy s (J/(kg K)): [h'', dh''/ds, its pressure
 * (Pa)]. Refused outside s'' at the critical point < s <= s'' at 273.15 K.
 */
export function drySaturatedEnthalpyAtEntropy(out: Float64Array, at: number, s: number): number {
  return saturatedEnthalpyAtEntropy(out, at, s, 1)
}

/**
 * h' (J/kg) of the saturated liquid that has entropy s (J/(kg K)): [h', dh'/ds, its pressure (Pa)].
 * Refused outside s' at 273.15 K <= s < s' at the critical point.
 */
export function saturatedLiquidEnthalpyAtEntropy(out: Float64Array, at: number, s: number): number {
  return saturatedEnthalpyAtEntropy(out, at, s, 0)
}

function saturatedEnthalpyAtEntropy(
  out: Float64Array,
  at: number,
  s: number,
  side: number,
): number {
  if (nodePressures[0] === 0) fillNodes()
  const first = side * NODES
  const cold = nodes[first] as number
  const critical = nodes[first + NODES - 1] as number
  const low = Math.min(cold, critical)
  const high = Math.max(cold, critical)
  if (!(s >= low - 1e-9 * high)) return refuse(Outcome.entropyLow, s, low)
  if (!(s <= high + 1e-9 * high)) return refuse(Outcome.entropyHigh, s, high)
  // the node interval, then Newton in p within it
  let i = 0
  let j = NODES - 1
  const rises = critical > cold
  while (j - i > 1) {
    const middle = (i + j) >> 1
    if ((nodes[first + middle] as number) < s === rises) i = middle
    else j = middle
  }
  let below = nodePressures[i] as number
  let above = nodePressures[j] as number
  const part =
    (s - (nodes[first + i] as number)) /
    ((nodes[first + j] as number) - (nodes[first + i] as number))
  let p = Math.min(above, Math.max(below, below * (above / below) ** part))
  let slot = cachedSaturation(p)
  for (let k = 0; k < 60; k++) {
    const off = (cache[slot + satSL + side] as number) - s
    if (off === 0) break
    if (off < 0 === rises) below = p
    else above = p
    let next = p - off / (cache[slot + satSLp + side] as number)
    if (!(next > below && next < above)) {
      if (above - below <= 1e-14 * above) break
      next = 0.5 * (below + above)
    }
    const step = Math.abs(next - p)
    p = next
    slot = cachedSaturation(p)
    if (step <= 1e-13 * p) break
  }
  const slope = (cache[slot + satHLp + side] as number) / (cache[slot + satSLp + side] as number)
  const off = s - (cache[slot + satSL + side] as number)
  out[at + Result.value] = (cache[slot + satHL + side] as number) + off * slope
  out[at + Result.first] = slope
  out[at + Result.second] = p
  return Outcome.fine
}
