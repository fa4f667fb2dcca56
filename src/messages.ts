/** What the window and the worker say to each other. Types only. */
import type { Finding, ProcessName, Status } from './balance/answer.ts'
import type { Curves, DrynessLines, Isobars } from './balance/chart-data.ts'
import type { Derived, DerivedNames } from './balance/derived.ts'
import type { HeatProfile } from './balance/heat-profile.ts'
import type { Question, QuestionAnswer } from './balance/question.ts'
import type { Plant } from './plant/document.ts'
import type { EqualBasis } from './review/equal.ts'

export type {
  Figure,
  Finding,
  Origin,
  OwnEquation,
  Piece,
  ProcessName,
  Remedy,
  Status,
  Worked,
} from './balance/answer.ts'
export type { AccountItem } from './balance/derived.ts'
export type { HeatProfile, ProfileMark, ZoneName } from './balance/heat-profile.ts'
export type { Question, QuestionAnswer } from './balance/question.ts'
export type { Worth } from './balance/worth.ts'
export type { EqualBasis } from './review/equal.ts'

/** Window to worker. */
export type Request = SolveRequest | QuestionRequest

export interface SolveRequest {
  readonly type: 'solve'
  readonly sequence: number
  readonly plant: Plant
  readonly layout: string
  readonly case: string | null
  /** Solved at a total of another balance, for a comparison: what sets the load gives way. */
  readonly equal?: EqualBasis
}

export type QuestionRequest = Question & { readonly sequence: number }

/** Sent before the first balance of a structure: what the arrays of a balance hold, in order. */
export interface NamesMessage {
  readonly type: 'names'
  readonly structure: number
  /** Quantity paths: `main.p`, `hp.power`, `plant.netPower`; every quantity of the layout. */
  readonly paths: readonly string[]
  readonly streams: readonly string[]
  readonly processes: readonly ProcessName[]
  /** What is worked out from the balance for tables and charts, and cannot be given. */
  readonly derived: DerivedNames
  readonly layout: string
  readonly case: string | null
  /** Paths that are given in what was solved: in a frozen case those that the freeze gives too. */
  readonly given: readonly string[]
  /** Path of the flow of main steam; null where not exactly one boiler makes it. */
  readonly mainSteam: string | null
}

export interface BalanceMessage {
  readonly type: 'balance'
  readonly sequence: number
  readonly structure: number
  readonly status: Status
  /** In the order of `paths`, SI; NaN stands for null and is never shown. */
  readonly values: Float64Array
  /** In the order of `streams`; indexes of `phaseNames` (document.ts). */
  readonly phases: Uint8Array
  readonly findings: readonly Finding[]
  readonly ledger: {
    readonly unknowns: number
    readonly equations: number
    readonly blocks: number
    readonly iterations: number
    readonly missing: number
    readonly excess: number
  }
  readonly closure: {
    readonly mass: number
    readonly energy: number
    readonly worstUnit: string
  } | null
  readonly undetermined: readonly string[]
  readonly unbounded: readonly string[]
  readonly curves: Curves
  readonly isobars: Isobars
  /** Exergy, stage groups, the plant's account: in the order of `derived` of the names. */
  readonly derived: Derived
  /** Temperature against heat of the heaters, exchangers and condensers. */
  readonly profiles: readonly HeatProfile[]
  /** Time the worker took, ms. */
  readonly milliseconds: number
}

/** Sent once: the saturation dome, liquid side up and vapour side down, as triples s, T, h. */
export interface DomeMessage {
  readonly type: 'dome'
  readonly points: Float64Array
  readonly dryness: DrynessLines
}

/** The layout could not be read at all (a unit of unknown kind, say). */
export interface UnusableMessage {
  readonly type: 'unusable'
  readonly sequence: number
  readonly message: string
}

export interface QuestionMessage {
  readonly type: 'answer'
  readonly sequence: number
  readonly answer: QuestionAnswer
}

/** Worker to window. */
export type Answer = NamesMessage | BalanceMessage | DomeMessage | UnusableMessage | QuestionMessage
