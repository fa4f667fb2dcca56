/**
 * The plant file as it stands in memory: coherent SI, pressures absolute. Documents are never changed
 * in place. Beside physics the file keeps what the drawing needs: `at` and `mirrored` of a unit,
 * `bends` of a stream, `label` of a stream or shaft. In a file `given`, `shafts`, `pumps`, `plant`,
 * `cases` and `stated` may be absent and then hold nothing; `basis` says by path
 * what given numbers rest on (source, note, uncertainty); it changes no balance. Every other key
 * without a question mark is required, names, labels and places excepted, which are repaired.
 */

/** A given that depends on another quantity: points with rising r, or a power law through one point. */
export type Curve =
  | { readonly against: string; readonly points: readonly (readonly [number, number])[] }
  | {
      readonly against: string
      readonly power: { readonly at: number; readonly value: number; readonly exponent: number }
    }

export type Given = number | Curve
export type Givens = Readonly<Record<string, Given>>
export type Options = Readonly<Record<string, boolean | readonly number[]>>

/** Where a given number comes from. */
export type Source = 'assumed' | 'maker' | 'measured'

/** What a given number rests on. At least one of the keys is there. */
export interface Basis {
  readonly source?: Source
  /** 'Data sheet 12, revision B' */
  readonly note?: string
  /**
   * Half the width of the interval in which the true value lies with about 95 %, in the SI unit of the
   * quantity: the expanded uncertainty with coverage factor 2 of JCGM 100:2008.
   */
  readonly uncertainty?: number
}

export interface Unit {
  readonly id: string
  readonly kind: string
  readonly label: string
  /** Top left corner on the canvas, px at 100 %. */
  readonly at: readonly [number, number]
  readonly options?: Options
  readonly given: Givens
  /** Drawn fed from the right. */
  readonly mirrored?: boolean
}

/** A port of a unit, `unit.port`. */
export type PortReference = string

export interface Stream {
  readonly id: string
  /** The user's own name for it; absent, it is named after the units at its ends. */
  readonly label?: string
  readonly from: PortReference
  readonly to: PortReference
  readonly given: Givens
  /** Corner points that the user has moved, px at 100 %. */
  readonly bends?: readonly (readonly [number, number])[]
}

export interface Shaft {
  readonly id: string
  readonly label?: string
  readonly turbines: readonly string[]
  readonly pumps: readonly string[]
  /** Absent means true. */
  readonly generator?: boolean
  readonly given: Givens
}

export interface Case {
  readonly id: string
  readonly name: string
  readonly frozen?: boolean
  readonly hardwareFrom?: { readonly layout: string; readonly case?: string }
  readonly loadControl?: 'sliding' | 'throttled' | 'wideOpen'
  readonly given?: Givens
  readonly free?: readonly string[]
  readonly outOfService?: readonly string[]
}

export interface Layout {
  readonly id: string
  readonly name: string
  readonly ambient: { readonly T: number; readonly p: number }
  readonly units: readonly Unit[]
  readonly streams: readonly Stream[]
  readonly shafts: readonly Shaft[]
  readonly plant: { readonly given: Givens }
  readonly cases: readonly Case[]
  readonly stated: readonly unknown[]
  /** By path of a given quantity: `h5.terminalDifference`. */
  readonly basis?: Readonly<Record<string, Basis>>
}

export interface Plant {
  readonly format: 'bledsteam/plant'
  readonly version: 1
  readonly title: string
  readonly layouts: readonly Layout[]
}
