import {
  criticalTemperature,
  Outcome,
  SATURATION_SIZE,
  Saturation,
  saturationAtTemperature,
} from '../steam/index.ts'
import type { Model } from './model.ts'
import { PointList } from './path-points.ts'
import { PathStore } from './path-store.ts'
import { type Course, isobarPoints, isobarPressures, processPoints } from './paths.ts'
import type { Balance } from './solve.ts'
import { Phase } from './states.ts'

/** Process paths as true states: triples s, T, h; path i has points starts[i] to starts[i + 1]. */
export interface Curves {
  readonly points: Float64Array
  readonly starts: Uint32Array
  /** Flow along each path, kg/s. */
  readonly flows: Float64Array
}

/** Lines of constant pressure of the plant, as triples s, T, h. */
export interface Isobars {
  /** Pa. */
  readonly pressures: Float64Array
  readonly points: Float64Array
  readonly starts: Uint32Array
}

/** Temperature of the triple point, K. */
const triplePoint = 273.16

/** Isobars reach at least this temperature, K, */
const lowestTop = 620
/** and beyond that move in steps, so that an edit of the hottest state does not draw all of them anew. */
const topStep = 25

/** A process of a unit between two streams, by their places. */
interface Process {
  readonly course: Course
  readonly first: number
  readonly last: number
  /** The first process of its unit. */
  readonly begins: boolean
}

/** What is kept from balance to balance of one model: a path whose ends stay where they were is copied. */
interface Kept {
  readonly processes: readonly Process[]
  readonly paths: PathStore
  readonly isobars: PathStore
}

const keptOf = new WeakMap<Model, Kept>()

function keptFor(model: Model, placeOf: ReadonlyMap<string, number>): Kept {
  let kept = keptOf.get(model)
  if (kept === undefined) {
    const processes: Process[] = []
    for (const { kind, shape, streams } of model.system.units) {
      let begins = true
      for (const { from, to, course } of kind.paths(shape)) {
        const first = streams.get(from)
        const last = streams.get(to)
        if (first === undefined || last === undefined) continue
        processes.push({ course, first: placeOf.get(first)!, last: placeOf.get(last)!, begins })
        begins = false
      }
    }
    kept = { processes, paths: new PathStore(), isobars: new PathStore() }
    keptOf.set(model, kept)
  }
  return kept
}

/** Every process of every unit as a path of true states, and the flow along it. */
export function curvesOf({ model, results }: Balance): Curves {
  const { states, placeOf } = results
  const { processes, paths } = keptFor(model, placeOf)
  const starts = new Uint32Array(processes.length + 1)
  const flows = new Float64Array(processes.length)
  paths.begin()
  let flowOfUnit = Number.NaN
  processes.forEach(({ course, first, last, begins }, k) => {
    const p1 = states.get(first, 'p')
    const h1 = states.get(first, 'h')
    const p2 = states.get(last, 'p')
    const h2 = states.get(last, 'h')
    if (!paths.copy(p1, h1, p2, h2)) processPoints(course, p1, h1, p2, h2, paths.list)
    starts[k + 1] = paths.end()
    if (begins) flowOfUnit = Number.NaN
    // Along an expansion the flow shrinks at every bleed; elsewhere it is that of the entry.
    if (course === 'expansion') {
      const passed = Number.isNaN(flowOfUnit) ? states.get(first, 'm') : flowOfUnit
      flows[k] = passed
      flowOfUnit = passed - states.get(last, 'm')
    } else flows[k] = states.get(first, 'm')
  })
  return { points: paths.list.copy(), starts, flows }
}

/** Lines of constant pressure through the plant's states, up to its highest temperature. */
export function isobarsOf({ model, results }: Balance): Isobars {
  const { states, placeOf } = results
  const { isobars } = keptFor(model, placeOf)
  const count = states.phases.length
  const pressures = new Float64Array(count)
  const flows = new Float64Array(count)
  let highest = lowestTop
  for (let k = 0; k < count; k++) {
    pressures[k] = states.get(k, 'p')
    flows[k] = states.get(k, 'm')
    const T = states.get(k, 'T')
    if (T + 30 > highest) highest = topStep * Math.ceil((T + 30) / topStep)
  }
  const chosen = isobarPressures(pressures, flows, (k) => states.phases[k] === Phase.liquid)
  const starts = new Uint32Array(chosen.length + 1)
  isobars.begin()
  chosen.forEach((p, k) => {
    if (!isobars.copy(p, highest, p, 0)) isobarPoints(p, isobars.list, highest)
    starts[k + 1] = isobars.end()
  })
  return { pressures: chosen, points: isobars.list.copy(), starts }
}

/** Lines of constant dryness, as triples s, T, h from 273.16 K up to the critical point. */
export interface DrynessLines {
  /** Dryness fractions, 0.1 to 0.9. */
  readonly x: Float64Array
  readonly points: Float64Array
  readonly starts: Uint32Array
}

const drynessSteps = 60

export function drynessLines(): DrynessLines {
  const x = Float64Array.from({ length: 9 }, (_, i) => (i + 1) / 10)
  const list = new PointList()
  const starts = new Uint32Array(x.length + 1)
  const record = new Float64Array(SATURATION_SIZE)
  x.forEach((dryness, k) => {
    for (let i = 0; i <= drynessSteps; i++) {
      // Crowded at the top, where the lines bend.
      const share = 1 - (1 - i / drynessSteps) ** 3
      const T = Math.min(
        triplePoint + (criticalTemperature - triplePoint) * share,
        criticalTemperature * (1 - 1e-9),
      )
      if (saturationAtTemperature(record, 0, T) !== Outcome.fine) continue
      const between = (liquid: number, dry: number): number =>
        record[liquid]! + dryness * (record[dry]! - record[liquid]!)
      list.add(between(Saturation.sL, Saturation.sV), T, between(Saturation.hL, Saturation.hV))
    }
    starts[k + 1] = list.count
  })
  return { x, points: list.copy(), starts }
}
