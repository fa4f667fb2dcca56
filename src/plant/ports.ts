import { numberedPort, type PortDescription, portNamed, type Shape } from '../units/kind.ts'
import { type Catalogue, type Kind, standardCatalogue } from './catalogue.ts'
import type { Layout, PortReference, Unit } from './document.ts'
import { splitPath } from './paths.ts'

/** A port of a unit, found. */
export interface PortAddress {
  readonly unit: Unit
  readonly kind: Kind
  /** Name in the kind's table, without number. */
  readonly port: string
  readonly description: PortDescription
  /** Of a repeated port; absent where only its bare name was given, and for single ports. */
  readonly number?: number
}

/**
 * Finds `hp.bleed2` in a layout, or a repeated port by its bare name (`h1.drain`). Where an outlet and
 * numbered inlets share that name, `direction` tells which is meant; without it the single port is.
 */
export function findPort(
  layout: Layout,
  reference: PortReference,
  catalogue: Catalogue = standardCatalogue,
  direction?: PortDescription['direction'],
): PortAddress | undefined {
  const [id, name] = splitPath(reference) ?? []
  const unit = id === undefined ? undefined : layout.units.find((one) => one.id === id)
  const kind = unit && catalogue.kindNamed(unit.kind)
  if (!unit || !kind || name === undefined) return undefined
  const exact = portNamed(kind.ports, name)
  const description = exact && kind.ports[exact.port]
  const fits = direction === undefined || description?.direction === direction
  if (exact && description && fits) return { unit, kind, ...exact, description }
  for (const [port, one] of Object.entries(kind.ports)) {
    const isMeant = one.repeated && (port === name || one.stem === name)
    if (isMeant && (direction === undefined || one.direction === direction)) {
      return { unit, kind, port, description: one }
    }
  }
  return exact && description ? { unit, kind, ...exact, description } : undefined
}

/** A reference to a port, numbered where it is repeated. */
export function portReference(address: PortAddress, number?: number): PortReference {
  const { unit, kind, port } = address
  return number === undefined
    ? `${unit.id}.${port}`
    : `${unit.id}.${numberedPort(kind.ports, port, number)}`
}

const noOptions = {}

/** What decides which quantities a unit has: its options and how many streams meet each port. */
export function shapeOf(layout: Layout, unit: Unit, kind: Kind): Shape {
  const streams: Record<string, number> = {}
  for (const port of Object.keys(kind.ports)) streams[port] = 0
  const start = `${unit.id}.`
  for (const stream of layout.streams) {
    for (const end of [stream.from, stream.to]) {
      if (!end.startsWith(start)) continue
      const found = portNamed(kind.ports, end.slice(start.length))
      if (found) streams[found.port] = (streams[found.port] ?? 0) + 1
    }
  }
  return { options: unit.options ?? noOptions, streams }
}

export interface PortOfUnit {
  /** `drain2`; with the unit's id before it, a reference. */
  readonly name: string
  /** Name in the kind's table: `drain`. */
  readonly port: string
  readonly number?: number
  readonly description: PortDescription
  /** The stream connected; absent: the port is open. */
  readonly stream?: string
}

/** The ports of a unit in the kind's order; of each repeated port the numbers in use and the next free one. */
export function portsOf(
  layout: Layout,
  unit: Unit,
  catalogue: Catalogue = standardCatalogue,
): PortOfUnit[] {
  const kind = catalogue.kindNamed(unit.kind)
  if (!kind) return []
  const streams = new Map<string, string>()
  for (const { id, from, to } of layout.streams) {
    streams.set(from, id)
    streams.set(to, id)
  }
  const ports: PortOfUnit[] = []
  for (const [port, description] of Object.entries(kind.ports)) {
    for (let number = 1; ; number++) {
      const name = description.repeated ? numberedPort(kind.ports, port, number) : port
      const stream = streams.get(`${unit.id}.${name}`)
      ports.push({
        name,
        port,
        ...(description.repeated ? { number } : {}),
        description,
        ...(stream === undefined ? {} : { stream }),
      })
      if (!description.repeated || stream === undefined) break
    }
  }
  return ports
}

/** Whether two ports lie on separate lines through a unit, the hot and the cold side of an exchanger. */
export function separateLines(kind: Kind, one: string, other: string): boolean {
  const lines: Set<string>[] = []
  for (const [a, b] of kind.passes ?? []) {
    const touched = lines.filter((line) => line.has(a) || line.has(b))
    const joined = new Set([a, b, ...touched.flatMap((line) => [...line])])
    lines.splice(0, lines.length, ...lines.filter((line) => !touched.includes(line)), joined)
  }
  const [first, second] = [one, other].map((port) => lines.find((line) => line.has(port)))
  return first !== undefined && second !== undefined && first !== second
}
