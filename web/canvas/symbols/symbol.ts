import type { ComponentType } from 'react'
import type { Box, Point, Side, Size } from '../geometry.ts'

/** Where a stream meets a symbol: px from the symbol's top left corner, and the side it leaves by. */
export interface Anchor {
  readonly x: number
  readonly y: number
  readonly side: Side
}

/** What a symbol's drawing depends on; the same for unmirrored and mirrored units. */
export interface Form {
  readonly options: Readonly<Record<string, boolean | readonly number[]>>
  /** Streams at each repeated port, by its name without the number. */
  readonly counts: Readonly<Record<string, number>>
  /** The flow passes from top to bottom or back: symbols that turn stand upright. */
  readonly upright?: boolean
  /** Distances between the ports that a symbol spaces by what stands below them, px, steps of 8. */
  readonly pitches?: readonly number[]
}

/** Places for one port, the usual one first; the sheet takes another when that spares a crossing. */
export type Places = readonly [Anchor, ...Anchor[]]

export interface SymbolDrawing {
  /** The room the symbol takes on the grid. */
  readonly size: (form: Form) => Size
  /** What the strokes cover, where that is less than `size`: streams keep clear of it, the frame follows it. */
  readonly body?: (form: Form) => Box
  /**
   * By port name; a repeated port is written with a star and asked by number: `drain*`.
   * Perpendicular to its side every anchor lies on the grid.
   */
  readonly ports: Readonly<Record<string, (form: Form, number: number) => Places>>
  /** Drawn in a group of class `symbol`: stroke 1.5; class `detail` 1, `solid` ink, `tinted`, `open` no fill. */
  readonly Drawing: ComponentType<{ readonly form: Form }>
  /** Where the label goes, the sides in the order wished; none: the symbol has no label. */
  readonly label: readonly Side[]
  /** Where in the symbol a text of that size has room, px from the top left corner; else it goes beside. */
  readonly inside?: (form: Form, text: Size) => Point | null
  /** Turns upright where its streams run upright. */
  readonly turns?: true
  /**
   * Spaces a repeated port, and the single one behind it, so that their streams fall straight; what
   * it asks of the pitch, px.
   */
  readonly spaced?: {
    readonly port: string
    readonly last: string
    readonly least: number
    readonly usual: number
  }
  /** How far strokes reach beyond the body, px: labels keep clear of them. */
  readonly overhang?: number
  /** Height of the shaft's axis, px from the top. */
  readonly axis?: (form: Form) => number
}

/** One place and no other. */
export const at = (x: number, y: number, side: Side) => (): Places => [{ x, y, side }]

/** Given places in the order in which numbered ports take them; the last is shared by all beyond. */
export const inTurn =
  (...places: readonly [Anchor, ...Anchor[]]) =>
  (_: Form, number: number): Places => [places[Math.min(number, places.length) - 1] ?? places[0]]
