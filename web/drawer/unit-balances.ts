import { findPort, kindOf, type Layout, portsOf, type Unit } from '../../src/document.ts'

/** The streams of a unit, by the way they run. */
export interface UnitStreams {
  readonly unit: Unit
  readonly kindLabel: string
  readonly entering: readonly string[]
  readonly leaving: readonly string[]
}

export function unitStreams(layout: Layout): readonly UnitStreams[] {
  return layout.units.map((unit) => {
    const ports = portsOf(layout, unit).filter(({ stream }) => stream !== undefined)
    const byDirection = (direction: 'in' | 'out') =>
      ports
        .filter(
          ({ name }) => findPort(layout, `${unit.id}.${name}`)?.description.direction === direction,
        )
        .map(({ stream }) => stream as string)
    return {
      unit,
      kindLabel: kindOf(unit.kind)?.label ?? unit.kind,
      entering: byDirection('in'),
      leaving: byDirection('out'),
    }
  })
}

export interface UnitBalance {
  /** kg/s; null while a flow is open. */
  readonly massIn: number | null
  readonly massOut: number | null
  /** W, on the streams' enthalpies. */
  readonly energyIn: number | null
  readonly energyOut: number | null
}

type Read = (path: string) => number | null

function sum(ids: readonly string[], term: (id: string) => number | null): number | null {
  let total = 0
  for (const id of ids) {
    const value = term(id)
    if (value === null) return null
    total += value
  }
  return total
}

/** Mass and energy that the streams bring to a unit and take from it. */
export function unitBalance({ entering, leaving }: UnitStreams, read: Read): UnitBalance {
  const mass = (id: string) => read(`${id}.m`)
  const energy = (id: string) => {
    const m = read(`${id}.m`)
    const h = read(`${id}.h`)
    return m === null || h === null ? null : m * h
  }
  return {
    massIn: sum(entering, mass),
    massOut: sum(leaving, mass),
    energyIn: sum(entering, energy),
    energyOut: sum(leaving, energy),
  }
}
