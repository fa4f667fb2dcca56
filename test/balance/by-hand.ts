import { type StatePair, type SteamState, state } from '../../src/steam/index.ts'
import type { LayoutParts } from '../published/build-layout.ts'

/* What a balance written out by hand needs: states, saturated states, the logarithmic mean. */

export function steam(pair: StatePair): SteamState {
  const found = state(pair)
  if (found.outcome !== 'state') throw new Error(`no state of ${JSON.stringify(pair)}`)
  return found
}

/** Saturation temperature, K, and enthalpies of liquid and dry steam, J/kg, at a pressure, Pa. */
export function saturation(p: number): {
  readonly T: number
  readonly liquid: number
  readonly dry: number
} {
  const { T, h } = steam({ p, x: 0 })
  return { T, liquid: h, dry: steam({ p, x: 1 }).h }
}

/** Logarithmic mean of two temperature differences, K. */
export const lmtd = (a: number, b: number): number => (a === b ? a : (a - b) / Math.log(a / b))

type Givens = Readonly<Record<string, number>>

/** A unit `u` alone: what enters comes from supplies, what leaves goes to offtakes. */
export function alone(
  unit: LayoutParts['units'][string],
  inlets: Readonly<Record<string, Givens>>,
  outlets: Readonly<Record<string, Givens>>,
): LayoutParts {
  const units: Record<string, LayoutParts['units'][string]> = { u: unit }
  const streams: Record<string, LayoutParts['streams'][string]> = {}
  for (const [port, given] of Object.entries(inlets)) {
    units[`${port}From`] = ['supply']
    streams[port] = [`${port}From.outlet`, `u.${port}`, given]
  }
  for (const [port, given] of Object.entries(outlets)) {
    units[`${port}To`] = ['offtake']
    streams[port] = [`u.${port}`, `${port}To.inlet`, given]
  }
  return { units, streams }
}
