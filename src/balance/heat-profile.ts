import {
  enthalpyAtPressureSuperheat,
  Outcome,
  RESULT_SIZE,
  SATURATION_SIZE,
  Saturation,
  saturationAtPressure,
} from '../steam/index.ts'
import type { HeatPassage } from '../units/kind.ts'
import { PointList, processPoints } from './paths.ts'
import type { PlacedUnit } from './placed-unit.ts'
import type { Results } from './results.ts'
import type { Balance } from './solve.ts'

/** Parts of a heating surface in the order in which the heated side meets them. */
export type ZoneName = 'drainCooling' | 'condensing' | 'desuperheating' | 'whole'

/** A difference of temperature on the profile, K above each other at a heat. */
export interface ProfileMark {
  /** Path of the quantity; null for the closest approach. */
  readonly quantity: string | null
  /** W from the cold end. */
  readonly at: number
  /** K */
  readonly hot: number
  readonly cold: number
}

/**
 * Temperature against heat of one unit: pairs of heat (W, from the end where the heated side enters)
 * and temperature (K). Straight lines between neighbours miss the true states by less than a ten
 * thousandth of a chart.
 */
export interface HeatProfile {
  readonly unit: string
  /** W */
  readonly heat: number
  readonly hot: Float64Array
  /** Empty where the heated side is open. */
  readonly cold: Float64Array
  /** Steam that enters superheated where the surface counts it at saturation; else empty. */
  readonly superheat: Float64Array
  readonly zones: readonly { readonly name: ZoneName; readonly from: number; readonly to: number }[]
  readonly marks: readonly ProfileMark[]
  readonly closest: ProfileMark | null
}

interface Side {
  readonly m: number
  readonly p: number
  readonly h: number
  readonly T: number
}

interface KeptProfile {
  readonly key: readonly number[]
  readonly profile: HeatProfile | null
}

/** By the results of a model: profiles whose streams have not moved are given again. */
const kept = new WeakMap<Results, Map<string, KeptProfile>>()

/** The profiles of all units that pass heat on and whose heating side is solved. */
export function heatProfilesOf({ model, results }: Balance): HeatProfile[] {
  let its = kept.get(results)
  if (!its) {
    its = new Map()
    kept.set(results, its)
  }
  const profiles: HeatProfile[] = []
  for (const placed of model.system.units) {
    const passage = placed.kind.heatPassage
    if (!passage) continue
    const key = keyOf(placed, results)
    const earlier = its.get(placed.unit.id)
    const same =
      earlier?.key.length === key.length && earlier.key.every((v, i) => alike(v, key[i]!))
    const profile = same ? earlier.profile : profileOf(placed, passage, results)
    if (!same) its.set(placed.unit.id, { key, profile })
    if (profile) profiles.push(profile)
  }
  return profiles
}

function alike(a: number, b: number): boolean {
  return a === b || Math.abs(a - b) <= 1e-11 * Math.abs(a) || (Number.isNaN(a) && Number.isNaN(b))
}

/** All numbers that the profile depends on. */
function keyOf({ connections, unit, kind }: PlacedUnit, results: Results): number[] {
  const key: number[] = []
  for (const { stream } of connections) {
    const k = results.placeOf.get(stream)!
    key.push(results.states.get(k, 'm'), results.states.get(k, 'p'), results.states.get(k, 'h'))
  }
  for (const name in kind.quantities) key.push(results.value(`${unit.id}.${name}`) ?? Number.NaN)
  return key
}

const list = new PointList()
const record = new Float64Array(SATURATION_SIZE)
const scalar = new Float64Array(RESULT_SIZE)

/** Pairs of heat and temperature along a line of states: heat counts from `from` as `flow` x change of h. */
function along(
  pairs: number[],
  p1: number,
  h1: number,
  p2: number,
  h2: number,
  from: number,
  flow: number,
): void {
  list.clear()
  processPoints('line', p1, h1, p2, h2, list)
  for (let i = 0; i < list.count; i++) {
    pairs.push(from + flow * (list.values[3 * i + 2]! - h1), list.values[3 * i + 1]!)
  }
}

function profileOf(placed: PlacedUnit, passage: HeatPassage, results: Results): HeatProfile | null {
  const { unit, connections } = placed
  const { states, placeOf } = results
  /** The streams at a port of the table, mixed; undefined where there are none or something is open. */
  const at = (port: string): Side | undefined => {
    let m = 0
    let energy = 0
    let one: Side | undefined
    for (const connection of connections) {
      if (connection.port !== port) continue
      const k = placeOf.get(connection.stream)!
      const side = {
        m: states.get(k, 'm'),
        p: states.get(k, 'p'),
        h: states.get(k, 'h'),
        T: states.get(k, 'T'),
      }
      one ??= side
      m += side.m
      energy += side.m * side.h
    }
    if (!one) return undefined
    const mixed = m === one.m ? one : { ...one, m, h: energy / m, T: Number.NaN }
    return Number.isFinite(mixed.p + mixed.h + mixed.m) && mixed.m > 0 ? mixed : undefined
  }
  const quantity = (name: string): number => results.value(`${unit.id}.${name}`) ?? Number.NaN

  const hotIn = at(passage.hot.from)
  const hotOut = at(passage.hot.to)
  if (!hotIn || !hotOut) return null
  const cold: number[] = []
  let heat: number
  if ('from' in passage.cold) {
    const coldIn = at(passage.cold.from)
    const coldOut = at(passage.cold.to)
    if (!coldIn || !coldOut) return null
    heat = coldIn.m * (coldOut.h - coldIn.h)
    along(cold, coldOut.p, coldIn.h, coldOut.p, coldOut.h, 0, coldIn.m)
    // Between the ends the water is counted at the outlet's pressure; it enters with its own.
    if (cold.length > 0 && Number.isFinite(coldIn.T)) cold[1] = coldIn.T
  } else {
    heat = quantity('heat')
    const inlet = quantity(passage.cold.inletTemperature)
    const rise = quantity(passage.cold.rise)
    if (Number.isFinite(inlet + rise)) cold.push(0, inlet, heat, inlet + rise)
  }
  if (!(heat > 0)) return null

  const hot: number[] = []
  const superheat: number[] = []
  const zones: HeatProfile['zones'][number][] = []
  let saturated = Number.NaN
  if (passage.shell === 'counterflow') {
    // From the cold end backwards: the hot side runs against the heated one.
    along(hot, hotOut.p, hotOut.h, hotIn.p, hotIn.h, 0, hotIn.m)
    zones.push({ name: 'whole', from: 0, to: heat })
  } else {
    if (saturationAtPressure(record, 0, hotOut.p) !== Outcome.fine) return null
    saturated = record[Saturation.T]!
    const hL = record[Saturation.hL]!
    const hV = record[Saturation.hV]!
    const hotPressure = hotOut.p
    const drained = Math.max(0, hotOut.m * (hL - hotOut.h))
    // Round-off at saturated liquid is no zone.
    const drainZone = drained > 1e-9 * heat && passage.hot.to !== coldPort(passage) ? drained : 0
    if (drainZone > 0) {
      along(hot, hotPressure, hotOut.h, hotPressure, hL, 0, hotOut.m)
      zones.push({ name: 'drainCooling', from: 0, to: drainZone })
    } else hot.push(0, saturated)
    let condensed = heat
    const residual = passage.residualSuperheat ? quantity(passage.residualSuperheat) : Number.NaN
    if (Number.isFinite(residual)) {
      const fine =
        residual > 0
          ? enthalpyAtPressureSuperheat(scalar, 0, hotPressure, residual) === Outcome.fine
          : true
      const left = residual > 0 ? scalar[0]! : hV
      const zone = fine ? hotIn.m * (hotIn.h - left) : 0
      if (zone > 0) {
        condensed = Math.max(drainZone, heat - zone)
        hot.push(condensed, saturated)
        zones.push({ name: 'condensing', from: drainZone, to: condensed })
        along(hot, hotPressure, left, hotPressure, hotIn.h, condensed, hotIn.m)
        zones.push({ name: 'desuperheating', from: condensed, to: heat })
      }
    }
    if (condensed === heat) {
      hot.push(heat, saturated)
      zones.push({ name: 'condensing', from: drainZone, to: heat })
      if (hotIn.h > hV) {
        const from = heat - hotIn.m * (hotIn.h - hV)
        if (from > drainZone) along(superheat, hotPressure, hV, hotPressure, hotIn.h, from, hotIn.m)
      }
    }
  }
  if (hot.length < 4) return null

  const hotPairs = Float64Array.from(hot)
  const coldPairs = Float64Array.from(cold)
  const marks: ProfileMark[] = []
  if (coldPairs.length > 0) {
    for (const { quantity: name, end, fromSaturation } of passage.differences) {
      if (!Number.isFinite(quantity(name))) continue
      const place = end === 'hot' ? heat : 0
      const high =
        fromSaturation === true ? saturated : temperatureAt(hotPairs, place, end === 'hot')
      const low = temperatureAt(coldPairs, place, end === 'hot')
      marks.push({ quantity: `${unit.id}.${name}`, at: place, hot: high, cold: low })
    }
  }
  return {
    unit: unit.id,
    heat,
    hot: hotPairs,
    cold: coldPairs,
    superheat: Float64Array.from(superheat),
    zones,
    marks,
    // What mixes has no surface that an approach could be asked of.
    closest: passage.hot.to === coldPort(passage) ? null : closestOf(hotPairs, coldPairs),
  }
}

function coldPort({ cold }: HeatPassage): string | undefined {
  return 'to' in cold ? cold.to : undefined
}

/** On a line of pairs; at a step (two pairs at one heat) its later or earlier side. */
function temperatureAt(pairs: Float64Array, at: number, last: boolean): number {
  const count = pairs.length / 2
  if (last && at >= pairs[2 * (count - 1)]!) return pairs[2 * count - 1]!
  for (let i = 1; i < count; i++) {
    const x1 = pairs[2 * i - 2]!
    const x2 = pairs[2 * i]!
    if (at > x2 || at < x1) continue
    const share = x2 > x1 ? (at - x1) / (x2 - x1) : 0
    return pairs[2 * i - 1]! + share * (pairs[2 * i + 1]! - pairs[2 * i - 1]!)
  }
  return at <= pairs[0]! ? pairs[1]! : pairs[2 * count - 1]!
}

/** Where the two sides come nearest: both are straight between their points, so at one of these. */
function closestOf(hot: Float64Array, cold: Float64Array): ProfileMark | null {
  if (cold.length === 0) return null
  let closest: ProfileMark | null = null
  for (const pairs of [hot, cold]) {
    for (let i = 0; i < pairs.length; i += 2) {
      const at = pairs[i]!
      for (const last of [false, true]) {
        const high = temperatureAt(hot, at, last)
        const low = temperatureAt(cold, at, last)
        if (!closest || high - low < closest.hot - closest.cold) {
          closest = { quantity: null, at, hot: high, cold: low }
        }
      }
    }
  }
  return closest
}
