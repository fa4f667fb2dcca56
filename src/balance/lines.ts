import type { Layout } from '../plant/document.ts'
import { portNamed } from '../units/kind.ts'
import type { PlacedUnit } from './placed-unit.ts'

/** Units reached from a line's end in one direction, through whatever only passes the flow on. */
function ends(
  start: PlacedUnit,
  direction: 'up' | 'down',
  unitOf: ReadonlyMap<string, PlacedUnit>,
  layout: Layout,
): PlacedUnit[] {
  const found: PlacedUnit[] = []
  const seen = new Set<string>([start.unit.id])
  const queue = [start]
  for (let at = queue.shift(); at !== undefined; at = queue.shift()) {
    for (const stream of layout.streams) {
      const near = direction === 'up' ? stream.to : stream.from
      const far = direction === 'up' ? stream.from : stream.to
      if (!near.startsWith(`${at.unit.id}.`)) continue
      const other = unitOf.get(far.slice(0, far.indexOf('.')))
      if (other === undefined || seen.has(other.unit.id)) continue
      seen.add(other.unit.id)
      const port = portNamed(other.kind.ports, far.slice(far.indexOf('.') + 1))?.port
      const goesOn =
        other.kind.secondLaw !== 'fired' &&
        other.kind.passes?.some(([from, to]) => (direction === 'up' ? to : from) === port)
      if (goesOn) queue.push(other)
      else found.push(other)
    }
  }
  return found
}

/**
 * Whether a line lies between a fired unit and a turbine, on the hot or on the cold side: then its
 * heat loss is charged to the turbine cycle.
 */
export function joinsFiredUnitAndTurbine(
  line: PlacedUnit,
  unitOf: ReadonlyMap<string, PlacedUnit>,
  layout: Layout,
): boolean {
  const isFired = (placed: PlacedUnit): boolean => placed.kind.secondLaw === 'fired'
  const isTurbine = (placed: PlacedUnit): boolean => placed.kind.shaft === 'driving'
  const before = ends(line, 'up', unitOf, layout)
  const after = ends(line, 'down', unitOf, layout)
  return (
    (before.some(isFired) && after.some(isTurbine)) ||
    (before.some(isTurbine) && after.some(isFired))
  )
}
