import { isobarPoints, isobarPressures, PointList, processPoints } from './paths.ts'
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

/** Isobars reach at least this temperature, K. */
const lowestTop = 620

/** Every process of every unit as a path of true states, and the flow along it. */
export function curvesOf({ model, results }: Balance): Curves {
  const list = new PointList()
  const starts: number[] = [0]
  const flows: number[] = []
  const { states, placeOf } = results
  for (const { kind, shape, streams } of model.system.units) {
    let flowOfUnit = Number.NaN
    for (const { from, to, course } of kind.paths(shape)) {
      const first = streams.get(from)
      const last = streams.get(to)
      if (first === undefined || last === undefined) continue
      const a = placeOf.get(first)!
      const b = placeOf.get(last)!
      processPoints(
        course,
        states.get(a, 'p'),
        states.get(a, 'h'),
        states.get(b, 'p'),
        states.get(b, 'h'),
        list,
      )
      starts.push(list.count)
      // Along an expansion the flow shrinks at every bleed; elsewhere it is that of the entry.
      if (course === 'expansion') {
        const passed = Number.isNaN(flowOfUnit) ? states.get(a, 'm') : flowOfUnit
        flows.push(passed)
        flowOfUnit = passed - states.get(b, 'm')
      } else flows.push(states.get(a, 'm'))
    }
  }
  return {
    points: list.copy(),
    starts: Uint32Array.from(starts),
    flows: Float64Array.from(flows),
  }
}

/** Lines of constant pressure through the plant's states, up to its highest temperature. */
export function isobarsOf({ results }: Balance): Isobars {
  const { states } = results
  const count = states.phases.length
  const pressures = new Float64Array(count)
  const flows = new Float64Array(count)
  let highest = lowestTop
  for (let k = 0; k < count; k++) {
    pressures[k] = states.get(k, 'p')
    flows[k] = states.get(k, 'm')
    const T = states.get(k, 'T')
    if (T + 30 > highest) highest = T + 30
  }
  const chosen = isobarPressures(pressures, flows, (k) => states.phases[k] === Phase.liquid)
  const list = new PointList()
  const starts = new Uint32Array(chosen.length + 1)
  chosen.forEach((p, k) => {
    isobarPoints(p, list, highest)
    starts[k + 1] = list.count
  })
  return { pressures: chosen, points: list.copy(), starts }
}
