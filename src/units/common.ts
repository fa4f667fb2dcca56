import {
  constant,
  type Expression,
  equal,
  minus,
  signedSquare,
  times,
} from '../equations/expression/index.ts'
import type { PortExpressions, QuantityDescription } from './kind.ts'

/*
 * What several kinds declare alike: ports and quantities in the same words, and the relations that
 * they share. Usual values without a source are common practice of the trade.
 */

export const commonPractice = 'common practice'

export const one = constant(1)

export const pressureLossFraction = (usual: number, range: readonly [number, number]) =>
  ({
    label: 'Pressure loss',
    symbol: 'Δp/p',
    dimension: 'ratio',
    help: 'Part of the entering pressure that is lost on the way through.',
    usual,
    given: true,
    range,
    basis: commonPractice,
    possible: { most: 1 },
    step: 0.01,
  }) as const satisfies QuantityDescription

export const lossConstant = {
  label: 'Loss constant',
  symbol: 'k',
  dimension: 'lossConstant',
  help: 'Pressure lost, divided by flow squared and the entering volume: what stays when the load changes.',
} as const satisfies QuantityDescription

export const heat = (label: string, help: string) =>
  ({
    label,
    symbol: 'Q',
    dimension: 'heatFlow',
    help,
    step: 1e6,
  }) as const satisfies QuantityDescription

export const efficiencyOfFiring = {
  label: 'Efficiency',
  symbol: 'η',
  dimension: 'ratio',
  help: 'Heat to the steam divided by the heat of the fuel, on the basis (LHV or HHV) that you state.',
  usual: 0.9,
  given: true,
  range: [0.82, 0.95],
  basis: commonPractice,
  possible: { above: 0, most: 1 },
  step: 0.01,
} as const satisfies QuantityDescription

export const fuelHeat = {
  label: 'Fuel heat',
  symbol: 'Qf',
  dimension: 'heatFlow',
  help: 'Heat of the fuel burnt for this unit.',
  step: 1e6,
} as const satisfies QuantityDescription

/** p_out = p_in (1 - fraction). */
export function pressureLoss(
  inlet: PortExpressions,
  outlet: PortExpressions,
  fraction: Expression,
) {
  return equal(outlet.p, times(inlet.p, minus(one, fraction)))
}

/** p_in - p_out = lossConstant m^2 v_in. */
export function lossLaw(
  inlet: PortExpressions,
  outlet: PortExpressions,
  constantOfLoss: Expression,
) {
  return equal(
    minus(inlet.p, outlet.p),
    times(constantOfLoss, times(signedSquare(inlet.m), inlet.v)),
  )
}

/** m h of a stream, W. */
export function energy(stream: PortExpressions): Expression {
  return times(stream.m, stream.h)
}
