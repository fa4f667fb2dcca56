import type { Case } from '../../plant/document.ts'
import type { PlacedUnit } from '../placed-unit.ts'
import type { Balance } from '../solve.ts'
import type { GivenTable } from './freeze.ts'

/** Quantities freed so that the load can change; empty where nothing fits. */
export function freedByLoadControl(
  control: NonNullable<Case['loadControl']>,
  design: Balance,
  table: GivenTable,
): string[] {
  switch (control) {
    case 'sliding':
      return slidingPressure(design, table)
    case 'throttled':
      return throttles(design, table)
    case 'wideOpen':
      return loads(design, table)
  }
}

/** Units that make the plant's steam: those with a steam flow in the totals. */
function boilers(design: Balance): PlacedUnit[] {
  const { units, totalsOf } = design.model.system
  return units.filter(({ unit }) => totalsOf.get(unit.id)?.boilerSteam !== undefined)
}

/** Streams from a unit's outlets on to the next machines, in order. */
function streamsTowardsTurbines(start: PlacedUnit, design: Balance): string[] {
  const { system } = design.model
  const found: string[] = []
  const queue: PlacedUnit[] = [start]
  const seen = new Set<string>([start.unit.id])
  for (let placed = queue.shift(); placed !== undefined; placed = queue.shift()) {
    for (const { stream, description } of placed.connections) {
      if (description.direction !== 'out' || description.carries === 'water') continue
      found.push(stream)
      const consumer = system.units.find((other) =>
        other.connections.some(
          (connection) => connection.stream === stream && connection.description.direction === 'in',
        ),
      )
      if (consumer === undefined || seen.has(consumer.unit.id)) continue
      seen.add(consumer.unit.id)
      if (consumer.kind.shaft !== 'driving' && consumer.kind.passes) queue.push(consumer)
    }
  }
  return found
}

/** The pressure given on the steam leaving the boiler, or on its feedwater, or the first on the way. */
function slidingPressure(design: Balance, table: GivenTable): string[] {
  for (const boiler of boilers(design)) {
    const towards = streamsTowardsTurbines(boiler, design)
    const feedwater = boiler.connections
      .filter(({ description }) => description.direction === 'in' && !description.optional)
      .map(({ stream }) => stream)
    const candidates = [...towards.slice(0, 1), ...feedwater, ...towards.slice(1)]
    const path = candidates.map((id) => `${id}.p`).find((one) => table.has(one))
    if (path !== undefined) return [path]
  }
  return []
}

/** The admission losses of the turbines that a boiler feeds. */
function throttles(design: Balance, table: GivenTable): string[] {
  const { system } = design.model
  const found = new Set<string>()
  for (const boiler of boilers(design)) {
    for (const stream of streamsTowardsTurbines(boiler, design)) {
      for (const { unit, kind, connections } of system.units) {
        if (kind.shaft !== 'driving') continue
        const enters = connections.some(
          (one) => one.stream === stream && one.description.direction === 'in',
        )
        const path = `${unit.id}.admissionLossFraction`
        if (enters && table.has(path)) found.add(path)
      }
    }
  }
  return [...found]
}

/** What sets the load: the steam flow, or the plant power given. */
function loads(design: Balance, table: GivenTable): string[] {
  for (const boiler of boilers(design)) {
    const own = boiler.connections.map(({ stream }) => stream)
    const streams = new Set([...streamsTowardsTurbines(boiler, design), ...own])
    for (const stream of streams) if (table.has(`${stream}.m`)) return [`${stream}.m`]
  }
  const powers = ['netPower', 'grossPower', 'cyclePower', 'turbinePower']
  const path = powers.map((name) => `plant.${name}`).find((one) => table.has(one))
  if (path !== undefined) return [path]
  const shaftPower = [...table.keys()].find((one) => one.endsWith('.generatorPower'))
  return shaftPower === undefined ? [] : [shaftPower]
}
