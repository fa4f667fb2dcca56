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
  /** The equation in figures, where it was asked for and has them. */
  readonly worked?: Worked
}

/** A number as it is printed in a worked line. */
export interface Figure {
  readonly figure: string
  /** Empty where there is none, or where it stands behind a bracket. */
  readonly unit: string
  /** The quantity whose number it is. */
  readonly path?: string
  /** The step whose result it is, counted from 0. */
  readonly step?: number
}

/** A piece of a worked line: text, a quantity or a step by its symbol, or a figure. */
export type Piece = string | { readonly path: string } | { readonly step: number } | Figure

/** A value read off on the way: a property of steam, a mean difference, a curve. */
export interface WorkedStep {
  readonly symbols: readonly Piece[]
  readonly figures: readonly Piece[]
  readonly result: Figure
}

/**
 * An equation worked out: every line gives its result again when it is reckoned from its own printed
 * figures, in the units printed, without conversions (per cent aside).
 */
export interface Worked {
  /** The whole equation: 'Q = m × (h2 − h1)'. */
  readonly symbols: readonly Piece[]
  /** In the order in which they are needed. */
  readonly steps: readonly WorkedStep[]
  /** What equals the result; both sides with '=' between them where the equation has no explicit form. */
  readonly figures: readonly Piece[]
  readonly result: Figure
}

/** An equation of a unit, shaft or of the plant, and what it fixed. */
export interface OwnEquation {
  /** 'energyBalance' */
  readonly key: string
  /** The quantity that it fixed, or null while it fixes none. */
  readonly path: string | null
  readonly symbols: readonly Piece[]
  readonly worked?: Worked
}

/** One process of a unit on a chart. */
export interface ProcessName {
  readonly unit: string
  /** Stream ids at its ends. */
  readonly from: string
  readonly to: string
}
