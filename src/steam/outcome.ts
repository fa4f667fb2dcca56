/**
 * Outcomes of the steam functions. The hot functions answer with one of these small integers; 0 is
 * fine, anything else left the outputs as they were and set `rangeProblem`. An input that is not a
 * number counts as too low.
 */
export const Outcome = {
  fine: 0,
  pressureLow: 1,
  pressureHigh: 2,
  temperatureLow: 3,
  temperatureHigh: 4,
  enthalpyLow: 5,
  enthalpyHigh: 6,
  entropyLow: 7,
  entropyHigh: 8,
  volumeLow: 9,
  volumeHigh: 10,
  /** p and T lie on the saturation line: T says nothing about h there. */
  onSaturation: 11,
  /** A superheat or a subcooling below zero: the state lies on the other side of saturation. */
  differenceLow: 12,
  drynessLow: 13,
  drynessHigh: 14,
} as const

/** What the range problem is about. */
export type RangeQuantity =
  | 'pressure'
  | 'temperature'
  | 'enthalpy'
  | 'entropy'
  | 'volume'
  | 'difference'
  | 'dryness'

/** A refusal: the quantity, its value and the nearest limit, in SI units. */
export interface RangeProblem {
  readonly quantity: RangeQuantity
  readonly value: number
  readonly limit: number
}

const quantities: readonly RangeQuantity[] = [
  'pressure',
  'pressure',
  'pressure',
  'temperature',
  'temperature',
  'enthalpy',
  'enthalpy',
  'entropy',
  'entropy',
  'volume',
  'volume',
  'temperature',
  'difference',
  'dryness',
  'dryness',
]

// code, value, limit of the last refusal
const last = new Float64Array(3)

/** Notes a refusal and answers with its code. */
export function refuse(code: number, value: number, limit: number): number {
  last[0] = code
  last[1] = value
  last[2] = limit
  return code
}

/** The last refusal of a steam function. Only meaningful right after a code that was not 0. */
export function rangeProblem(): RangeProblem {
  const quantity = quantities[last[0] as number] ?? 'pressure'
  return { quantity, value: last[1] as number, limit: last[2] as number }
}
