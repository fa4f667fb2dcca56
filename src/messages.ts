/** What the window and the worker say to each other. Types only. */
import type { Given, Plant } from './plant/document.ts'

export type Status = 'solved' | 'underspecified' | 'overspecified' | 'infeasible' | 'notConverged'

/** An edit that mends a finding: give the quantity (at `value` when one suggests itself) or free it. */
export interface Remedy {
  readonly action: 'give' | 'free'
  readonly path: string
  /** SI; the last value solved or the usual one, when there is one. */
  readonly value?: Given
}

export interface Finding {
  readonly severity: 'error' | 'caution' | 'remark'
  readonly code: string
  /** Ids of units, streams and shafts to highlight. */
  readonly where: readonly string[]
  /** Paths, those that a user would know first leading. */
  readonly quantities: readonly string[]
  /** What is so; figures in SI appear as `{path}` never: text is ready to read. */
  readonly message: string
  /** What to do about it. */
  readonly advice?: string
  readonly missing?: number
  readonly excess?: number
  readonly remedies?: readonly Remedy[]
}

/** A piece of a printed equation: text, a quantity that can be asked in turn, or a number. */
export type Token = string | { readonly path: string } | { readonly constant: number }

/** Where a number comes from. */
export interface Origin {
  readonly path: string
  /**
   * `given`; fixed by one equation `alone`, or `together` with the others of its block; a
   * `property` read off solved quantities; `open` while nothing fixes it.
   */
  readonly how: 'given' | 'alone' | 'together' | 'property' | 'open'
  /** Whose equation it is, and which. */
  readonly owner?: string
  readonly key?: string
  readonly statement: readonly Token[]
  /** Quantities solved at once with it. */
  readonly with: readonly string[]
  /** Quantities that went into the equation. */
  readonly inputs: readonly string[]
}

/** One process of a unit on a chart. */
export interface ProcessName {
  readonly unit: string
  /** Stream ids at its ends. */
  readonly from: string
  readonly to: string
}

/** Window to worker. */
export type Request = {
  readonly type: 'solve'
  readonly sequence: number
  readonly plant: Plant
  readonly layout: string
  readonly case: string | null
}

/** Sent before the first balance of a structure: what the arrays of a balance hold, in order. */
export interface NamesMessage {
  readonly type: 'names'
  readonly structure: number
  /** Quantity paths: `main.p`, `hp.power`, `plant.netPower`; every quantity of the layout. */
  readonly paths: readonly string[]
  readonly streams: readonly string[]
  readonly processes: readonly ProcessName[]
}

/** Phase codes of `BalanceMessage.phases`. */
export const phaseNames = ['none', 'liquid', 'wet', 'vapour', 'supercritical'] as const

export interface BalanceMessage {
  readonly type: 'balance'
  readonly sequence: number
  readonly structure: number
  readonly status: Status
  /** In the order of `paths`, SI; NaN stands for null and is never shown. */
  readonly values: Float64Array
  /** In the order of `streams`; indexes of `phaseNames`. */
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
  /** Process paths as true states: triples s, T, h; process i has points starts[i] to starts[i + 1]. */
  readonly curves: {
    readonly points: Float64Array
    readonly starts: Uint32Array
    readonly flows: Float64Array
  }
  /** Lines of constant pressure of the plant, as triples s, T, h. */
  readonly isobars: {
    readonly pressures: Float64Array
    readonly points: Float64Array
    readonly starts: Uint32Array
  }
  /** Time the worker took, ms. */
  readonly milliseconds: number
}

/** Sent once: the saturation dome, liquid side up and vapour side down, as triples s, T, h. */
export interface DomeMessage {
  readonly type: 'dome'
  readonly points: Float64Array
}

/** The layout could not be read at all (a unit of unknown kind, say). */
export interface UnusableMessage {
  readonly type: 'unusable'
  readonly sequence: number
  readonly message: string
}

/** Worker to window. */
export type Answer = NamesMessage | BalanceMessage | DomeMessage | UnusableMessage
