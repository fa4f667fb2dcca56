import { portNamed } from '../../units/kind.ts'
import type { PlacedUnit } from '../placed-unit.ts'
import type { System } from '../system.ts'
import { PressureClasses } from './pressure-classes.ts'

/**
 * Given pressures that a frozen steam path finds for itself: between a bleed or exhaust and the
 * next turbine, on bleed lines and in the heaters that these feed (contract, section 4). An
 * exhaust that leads to no further turbine keeps its pressure, unless it goes to a condenser that
 * is frozen (`findsPressure`).
 */
export function freedPressures(
  system: System,
  findsPressure: (unit: string) => boolean,
  isGiven: (path: string) => boolean,
): string[] {
  const classes = new PressureClasses(system)
  const walk = new Walk(system, classes, isGiven)
  const freed = new Set<number>()
  for (const placed of system.units) {
    if (placed.kind.shaft !== 'driving') continue
    const controlled = placed.kind.controlled?.(placed.shape) ?? []
    for (const { port, name, stream, description } of placed.connections) {
      if (description.direction !== 'out') continue
      const number = portNamed(placed.kind.ports, name)?.number
      const reached = walk.from(stream)
      if (number !== undefined && controlled.includes(number)) continue
      const isExhaust = !placed.kind.ports[port]!.repeated
      const goesOn = reached.turbines > 0 || [...reached.shells].some((unit) => findsPressure(unit))
      if (isExhaust && !goesOn) continue
      for (const member of reached.pressures) freed.add(member)
    }
  }
  for (const placed of system.units) {
    const controlled = placed.kind.controlled?.(placed.shape) ?? []
    for (const { name, stream } of placed.connections) {
      const number = portNamed(placed.kind.ports, name)?.number
      if (placed.kind.shaft !== 'driving' || number === undefined) continue
      // A controlled bleed's pressure stays, whatever else reaches it.
      if (controlled.includes(number)) freed.delete(classes.of(`${stream}.p`))
    }
  }
  return classes.givensOf(freed)
}

interface Reached {
  readonly pressures: ReadonlySet<number>
  readonly turbines: number
  /** Units whose shell or vessel the steam enters. */
  readonly shells: ReadonlySet<string>
}

/** Follows steam downstream through whatever only passes it on. */
class Walk {
  private readonly system: System
  private readonly classes: PressureClasses
  private readonly isGiven: (path: string) => boolean
  private readonly consumers = new Map<string, { placed: PlacedUnit; port: string }>()

  constructor(system: System, classes: PressureClasses, isGiven: (path: string) => boolean) {
    this.system = system
    this.classes = classes
    this.isGiven = isGiven
    for (const placed of system.units) {
      for (const { port, stream, description } of placed.connections) {
        if (description.direction === 'in') this.consumers.set(stream, { placed, port })
      }
    }
  }

  from(start: string): Reached {
    const pressures = new Set<number>()
    const shells = new Set<string>()
    let turbines = 0
    const seen = new Set<string>([start])
    const queue = [start]
    for (let stream = queue.shift(); stream !== undefined; stream = queue.shift()) {
      pressures.add(this.classes.of(`${stream}.p`))
      const consumer = this.consumers.get(stream)
      if (consumer === undefined) continue
      const { placed, port } = consumer
      const { kind, unit } = placed
      if (kind.shaft === 'driving') {
        turbines++
        continue
      }
      const onward = (kind.passes ?? []).filter(([from]) => from === port).map(([, to]) => to)
      if (onward.length > 0 && !kind.raisesPressure) {
        const holds = kind.holdsPressure?.((name) => this.isGiven(`${unit.id}.${name}`)) ?? false
        if (holds) continue
        for (const next of placed.connections) {
          if (!onward.includes(next.port) || seen.has(next.stream)) continue
          seen.add(next.stream)
          queue.push(next.stream)
        }
        continue
      }
      if (
        kind.ports[port]!.pressure === 'equal' &&
        this.system.indexOf.has(`${unit.id}.pressure`)
      ) {
        shells.add(unit.id)
        pressures.add(this.classes.of(`${unit.id}.pressure`))
      }
    }
    pressures.delete(-1)
    return { pressures, turbines, shells }
  }
}
