import type { Unit } from '../plant/document.ts'
import type { PortDescription, Shape, UnitKind } from '../units/kind.ts'

/** A stream at a port. */
export interface Connection {
  /** Numbered name of the port. */
  readonly name: string
  /** Its name in the kind's table. */
  readonly port: string
  readonly description: PortDescription
  readonly stream: string
  /** First variable of the stream: m; p and h follow. */
  readonly base: number
}

/** A unit with its kind, its shape and the streams at its ports. */
export interface PlacedUnit {
  readonly unit: Unit
  readonly kind: UnitKind
  readonly shape: Shape
  /** Stream ids by numbered port name. */
  readonly streams: ReadonlyMap<string, string>
  /** The same by port, with what the kind says of it, in the kind's order. */
  readonly connections: readonly Connection[]
  /** Port names that need a stream and have none. */
  readonly open: readonly string[]
}
