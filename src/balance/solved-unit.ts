import type { UnitNumbers } from '../units/kind.ts'
import type { PlacedUnit } from './placed-unit.ts'
import type { Results } from './results.ts'

/** A unit as solved, for what its kind declares of solved units. */
export function solvedUnit({ unit, shape, streams }: PlacedUnit, results: Results): UnitNumbers {
  const { states } = results
  return {
    shape,
    port(name) {
      const id = streams.get(name)
      const k = id === undefined ? undefined : results.placeOf.get(id)
      return k === undefined
        ? undefined
        : { m: states.get(k, 'm'), p: states.get(k, 'p'), h: states.get(k, 'h') }
    },
    quantity: (name) => results.value(`${unit.id}.${name}`) ?? Number.NaN,
  }
}
