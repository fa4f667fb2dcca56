import type { Dimension } from '../../src/document.ts'
import type { Upright } from './geometry.ts'
import { enthalpyLimits, type Limits, temperatureLimits } from './view.ts'

/** A plane of states, entropy to the right: what stands upright and how it is called. */
export interface Diagram {
  readonly name: 'ts' | 'hs'
  /** 'Temperature-entropy diagram' */
  readonly title: string
  readonly upright: Upright
  readonly dimension: Dimension
  readonly limits: Limits
}

export const diagrams = {
  ts: {
    name: 'ts',
    title: 'Temperature-entropy diagram',
    upright: 'T',
    dimension: 'temperature',
    limits: temperatureLimits,
  },
  hs: {
    name: 'hs',
    title: 'Enthalpy-entropy diagram',
    upright: 'h',
    dimension: 'specificEnthalpy',
    limits: enthalpyLimits,
  },
} as const satisfies Record<'ts' | 'hs', Diagram>
