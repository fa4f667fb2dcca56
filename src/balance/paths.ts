/**
 * States along processes, for charts: every point is a state of IAPWS-IF97, none is drawn between.
 *
 * Points are triples s in J/(kg K), T in K, h in J/kg. They are set where a straight line between
 * neighbours would miss the true path by more than `flatness`, so a plateau costs two and a
 * supercritical isobar some thirty. Where a path crosses the saturation line the saturated state
 * itself is a point. A state outside the formulation is left out.
 */

import {
  criticalPressure,
  criticalTemperature,
  enthalpyAtPressureEntropy,
  enthalpyAtPressureTemperature,
  lowestTemperature,
  Outcome,
  SATURATION_SIZE,
  Saturation,
  STATE_SIZE,
  State,
  saturationAtPressure,
  saturationAtTemperature,
  stateAtPressureEnthalpy,
} from '../steam/index.ts'
import type { ProcessPath } from '../units/kind.ts'
import { addNode, clearNodes, nodes, PointList, reached, refine, write } from './path-points.ts'

export { PointList } from './path-points.ts'

export type Course = ProcessPath['course']

/** Places at which a course that is not isobaric is searched for crossings of the saturation line. */
const SEARCH_STEPS = 8

/** Nodes are apart by at least this share of the course, so that a saturated end is not doubled. */
const LEAST_STEP = 1e-9

const state = new Float64Array(STATE_SIZE)
const saturation = new Float64Array(SATURATION_SIZE)
const scalar = new Float64Array(4)

/** A process as a function of t, from 0 at its first state to 1 at its last. */
class ProcessCourse {
  private p1 = 0
  private h1 = 0
  private p2 = 0
  private h2 = 0
  private logRatio = 0
  /** Entropy of the first state; expansion and compression only. */
  private s1 = 0
  /** Enthalpy change over isentropic change. */
  private efficiency = 0
  private course: Course = 'line'

  set(course: Course, p1: number, h1: number, p2: number, h2: number): void {
    this.p1 = p1
    this.h1 = h1
    this.p2 = p2
    this.h2 = h2
    this.course = p1 === p2 ? 'line' : course
    this.logRatio = Math.log(p2 / p1)
    if (this.course !== 'expansion' && this.course !== 'compression') return
    // Without an isentropic reference there is no efficiency to hold: p and h then change together.
    this.course = 'line'
    if (stateAtPressureEnthalpy(state, 0, p1, h1) !== Outcome.fine) return
    this.s1 = state[State.s] as number
    if (enthalpyAtPressureEntropy(scalar, 0, p2, this.s1) !== Outcome.fine) return
    const isentropic = (scalar[0] as number) - h1
    if (isentropic === 0) return
    this.efficiency = (h2 - h1) / isentropic
    this.course = course
  }

  get isobaric(): boolean {
    return this.p1 === this.p2
  }

  pressure(t: number): number {
    if (t === 0 || this.isobaric) return this.p1
    if (t === 1) return this.p2
    return this.course === 'line'
      ? this.p1 + t * (this.p2 - this.p1)
      : this.p1 * Math.exp(t * this.logRatio)
  }

  /** J/kg, or undefined where the formulation has no such state. */
  enthalpy(t: number): number | undefined {
    if (t === 0) return this.h1
    if (t === 1) return this.h2
    if (this.course === 'line' || this.course === 'isenthalp') {
      return this.h1 + t * (this.h2 - this.h1)
    }
    const outcome = enthalpyAtPressureEntropy(scalar, 0, this.pressure(t), this.s1)
    if (outcome !== Outcome.fine) return undefined
    return this.h1 + this.efficiency * ((scalar[0] as number) - this.h1)
  }
}

const course = new ProcessCourse()

/** Leaves the state at t in `reached`; false where the formulation has none. */
function stateAlong(t: number): boolean {
  const h = course.enthalpy(t)
  if (h === undefined) return false
  if (stateAtPressureEnthalpy(state, 0, course.pressure(t), h) !== Outcome.fine) return false
  reached.s = state[State.s] as number
  reached.T = state[State.T] as number
  reached.h = h
  return true
}

/** Adds the state at t as a node, where there is one. */
function addStateAlong(t: number, after: number): number {
  return stateAlong(t) ? addNode(t, reached.s, reached.T, reached.h, after) : after
}

/** Just below the critical point, where saturated liquid and dry steam still have a record each. */
const ALMOST_CRITICAL_PRESSURE = criticalPressure * (1 - 1e-9)
const ALMOST_CRITICAL_TEMPERATURE = criticalTemperature * (1 - 1e-9)

/** Puts the saturation record of the pressure at t in `saturation`, above the critical one that of its end. */
function saturationAlong(t: number): boolean {
  const p = Math.min(course.pressure(t), ALMOST_CRITICAL_PRESSURE)
  return saturationAtPressure(saturation, 0, p) === Outcome.fine
}

/** Enthalpy at t less that of saturated liquid (or dry steam); 0 is the saturation line. */
function overSaturation(t: number, slot: number): number | undefined {
  const h = course.enthalpy(t)
  if (h === undefined || !saturationAlong(t)) return undefined
  return h - (saturation[slot] as number)
}

/** Where between a and b the path crosses the saturation line (regula falsi, Illinois); ends differ in sign. */
function crossing(slot: number, a: number, fa: number, b: number, fb: number): number {
  let side = 0
  for (let step = 0; step < 100 && b - a > 1e-15; step += 1) {
    const t = (a * fb - b * fa) / (fb - fa)
    const f = t > a && t < b ? overSaturation(t, slot) : undefined
    if (f === undefined) break
    if (f === 0) return t
    if (f > 0 === fa > 0) {
      a = t
      fa = f
      if (side === 1) fb /= 2
      side = 1
    } else {
      b = t
      fb = f
      if (side === -1) fa /= 2
      side = -1
    }
  }
  return Math.abs(fa) < Math.abs(fb) ? a : b
}

/** Adds the saturated state at t, exactly on the saturation line. */
function addSaturated(t: number, slot: number, after: number, last: number): number {
  if (Number.isNaN(t)) return after
  const p = course.pressure(t)
  // Above the critical pressure there is no line to cross.
  if (
    p > ALMOST_CRITICAL_PRESSURE ||
    t - (nodes.t[after] as number) < LEAST_STEP ||
    last - t < LEAST_STEP
  ) {
    return after
  }
  if (saturationAtPressure(saturation, 0, p) !== Outcome.fine) return after
  const s = saturation[slot === Saturation.hL ? Saturation.sL : Saturation.sV] as number
  return addNode(t, s, saturation[Saturation.T] as number, saturation[slot] as number, after)
}

/** Enthalpy over saturated liquid and over dry steam at the ends of a step; NaN where undefined. */
const over = { liquidA: 0, dryA: 0, liquidB: 0, dryB: 0 }

function measureEnd(t: number): void {
  over.liquidA = over.liquidB
  over.dryA = over.dryB
  over.liquidB = overSaturation(t, Saturation.hL) ?? Number.NaN
  over.dryB = overSaturation(t, Saturation.hV) ?? Number.NaN
}

/** Adds the saturated states between a and b, whose ends are measured, in order. */
function addCrossings(a: number, b: number, after: number, last: number): number {
  const { liquidA, liquidB, dryA, dryB } = over
  const liquid =
    liquidA * liquidB < 0 ? crossing(Saturation.hL, a, liquidA, b, liquidB) : Number.NaN
  const dry = dryA * dryB < 0 ? crossing(Saturation.hV, a, dryA, b, dryB) : Number.NaN
  let node = after
  if (liquid < dry || Number.isNaN(dry)) {
    node = addSaturated(liquid, Saturation.hL, node, last)
    return addSaturated(dry, Saturation.hV, node, last)
  }
  node = addSaturated(dry, Saturation.hV, node, last)
  return addSaturated(liquid, Saturation.hL, node, last)
}

/**
 * Writes the states of a process after those already in `out` and returns how many they are: none
 * where no state lies within the formulation, else two to forty-eight (`throttledLine`: twice that).
 *
 * `line`: p and h change in proportion. `isenthalp`: at constant h, p spaced evenly in its
 * logarithm. `expansion`, `compression`: (h - h1) / (h(p, s1) - h1) stays what it is over the whole
 * process, p spaced in its logarithm. `throttledLine`: an isenthalp down to p2, then a line at that
 * pressure. Pressures in Pa, enthalpies in J/kg.
 */
export function processPoints(
  process: Course,
  p1: number,
  h1: number,
  p2: number,
  h2: number,
  out: PointList,
): number {
  if (!(p1 > 0 && p2 > 0 && Number.isFinite(p1 + p2) && Number.isFinite(h1 + h2))) return 0
  if (process === 'throttledLine') {
    if (!(p1 > p2)) return processPoints('line', p1, h1, p2, h2, out)
    const throttled = processPoints('isenthalp', p1, h1, p2, h1, out)
    if (h1 === h2) return throttled
    // The state behind the throttle ends one part and begins the other.
    if (throttled > 0) out.count -= 1
    return Math.max(0, throttled - 1) + processPoints('line', p2, h1, p2, h2, out)
  }
  course.set(process, p1, h1, p2, h2)
  clearNodes()
  // An end outside the formulation moves inward to the first state that is within.
  const ends = SEARCH_STEPS
  let from = 0
  while (from <= ends && !stateAlong(from / ends)) from += 1
  if (from > ends) return 0
  let to = ends
  while (to > from && !stateAlong(to / ends)) to -= 1
  const first = addStateAlong(from / ends, -1)
  let node = first
  // At constant pressure the enthalpy is linear in t: one step finds every crossing.
  const steps = course.isobaric ? 1 : to - from
  measureEnd(from / ends)
  for (let step = 0; step < steps; step += 1) {
    const a = (from + ((to - from) * step) / steps) / ends
    const b = (from + ((to - from) * (step + 1)) / steps) / ends
    measureEnd(b)
    node = addCrossings(a, b, node, to / ends)
  }
  if (to > from) addStateAlong(to / ends, node)
  refine(first, stateAlong)
  return write(first, out)
}

/** Temperature on the dome, K; u from -1 (liquid) over 0 (critical) to 1 (steam), crowded at the top. */
function domeTemperature(u: number): number {
  const T = criticalTemperature - (criticalTemperature - lowestTemperature) * Math.abs(u) ** 3
  return Math.min(T, ALMOST_CRITICAL_TEMPERATURE)
}

function stateOnDome(u: number): boolean {
  const T = domeTemperature(u)
  if (saturationAtTemperature(saturation, 0, T) !== Outcome.fine) return false
  const liquid = u <= 0
  reached.T = T
  reached.s = saturation[liquid ? Saturation.sL : Saturation.sV] as number
  reached.h = saturation[liquid ? Saturation.hL : Saturation.hV] as number
  return true
}

/** The saturation line from saturated liquid at 273.15 K over the critical point to dry steam at 273.15 K. */
export function domePoints(): Float64Array {
  clearNodes()
  let node = -1
  // An even number of steps, so that the critical point is one of them.
  const steps = 16
  let first = -1
  for (let step = 0; step <= steps; step += 1) {
    const u = (2 * step) / steps - 1
    if (!stateOnDome(u)) continue
    node = addNode(u, reached.s, reached.T, reached.h, node)
    if (first < 0) first = node
  }
  if (first < 0) return new Float64Array(0)
  // Sent once and seen at every magnification, the dome may cost more than a path.
  refine(first, stateOnDome, 1 / 100_000, 160)
  const out = new PointList()
  write(first, out)
  return out.copy()
}

/** Highest temperature of an isobar where the plant has none higher, K. */
const HIGHEST_ISOBAR_TEMPERATURE = 900

/**
 * Writes the line of constant pressure p (Pa) from 273.15 K to `highest` (K; at least 900 K is usual)
 * after the points already in `out`; returns how many points it took.
 */
export function isobarPoints(
  p: number,
  out: PointList,
  highest = HIGHEST_ISOBAR_TEMPERATURE,
): number {
  if (!(p > 0) || !Number.isFinite(p)) return 0
  if (enthalpyAtPressureTemperature(scalar, 0, p, lowestTemperature) !== Outcome.fine) return 0
  const cold = scalar[0] as number
  if (enthalpyAtPressureTemperature(scalar, 0, p, highest) !== Outcome.fine) return 0
  return processPoints('line', p, cold, p, scalar[0] as number, out)
}

/** Pressures nearer to each other than this factor share an isobar. */
const LEAST_RATIO = 1.15

/**
 * The pressures that isobars are drawn at: those of the streams that are not liquid, rising; where several
 * lie within 15 % of each other, that of the greatest flow, and of all the `most` with the greatest flows.
 * Pressures in Pa, flows in kg/s; streams with a value missing (NaN) or without flow are passed over.
 */
export function isobarPressures(
  pressures: Float64Array,
  flows: Float64Array,
  isLiquid: (stream: number) => boolean,
  most = 10,
): Float64Array {
  const byFlow = Array.from(pressures.keys())
    .filter((i) => !isLiquid(i) && (pressures[i] as number) > 0 && (flows[i] as number) > 0)
    .sort(
      (a, b) =>
        (flows[b] as number) - (flows[a] as number) ||
        (pressures[b] as number) - (pressures[a] as number),
    )
  const chosen: number[] = []
  for (const i of byFlow) {
    const p = pressures[i] as number
    const taken = chosen.some((other) => p < other * LEAST_RATIO && other < p * LEAST_RATIO)
    if (!taken && chosen.length < most) chosen.push(p)
  }
  return Float64Array.from(chosen).sort()
}
