import type { QuantityTable } from './kind.ts'

/** What every stream has; all of these can be given. */
export const streamQuantities = {
  m: { label: 'Flow', symbol: 'm', dimension: 'massFlow', help: 'Mass flow.', step: 1 },
  p: {
    label: 'Pressure',
    symbol: 'p',
    dimension: 'pressure',
    help: 'Absolute pressure.',
    possible: { above: 0 },
    step: 1e5,
  },
  T: {
    label: 'Temperature',
    symbol: 'T',
    dimension: 'temperature',
    help: 'Temperature.',
    possible: { above: 0 },
    step: 1,
  },
  h: {
    label: 'Enthalpy',
    symbol: 'h',
    dimension: 'specificEnthalpy',
    help: 'Specific enthalpy.',
    step: 1e3,
  },
  s: {
    label: 'Entropy',
    symbol: 's',
    dimension: 'specificEntropy',
    help: 'Specific entropy.',
    step: 10,
  },
  x: {
    label: 'Dryness',
    symbol: 'x',
    dimension: 'dryness',
    help: 'Dryness fraction; 0 is saturated liquid, 1 dry saturated steam.',
    step: 0.01,
  },
  superheat: {
    label: 'Superheat',
    symbol: 'ΔTsh',
    dimension: 'temperatureDifference',
    help: 'Temperature above saturation; 0 is dry saturated steam.',
    step: 1,
  },
  subcooling: {
    label: 'Subcooling',
    symbol: 'ΔTsub',
    dimension: 'temperatureDifference',
    help: 'Temperature below saturation; 0 is saturated liquid.',
    step: 1,
  },
} as const satisfies QuantityTable
