/** What a balance says besides its numbers. Types only. */
import type { Given } from '../plant/document.ts'

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
