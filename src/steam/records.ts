/**
 * Records of the hot functions: slots of a Float64Array, all in SI units. A record may lie anywhere
 * in a larger array; functions take the array and the offset of the record's first slot.
 */

/**
 * Slots of a saturation record: p (Pa), T (K), then h (J/kg), s (J/(kg K)), v (m3/kg) of saturated
 * liquid (L) and dry saturated steam (V), then the derivatives of the same to p, and
 * 1 / (h'' - h') (kg/J). p is 0 while the record is empty.
 */
export const Saturation = {
  p: 0,
  T: 1,
  hL: 2,
  hV: 3,
  sL: 4,
  sV: 5,
  vL: 6,
  vV: 7,
  Tp: 8,
  hLp: 9,
  hVp: 10,
  sLp: 11,
  sVp: 12,
  vLp: 13,
  vVp: 14,
  perHeat: 15,
} as const
export const SATURATION_SIZE = 16

/**
 * Slots of a state record: p (Pa), h (J/kg), T (K), s (J/(kg K)), v (m3/kg) and dryness fraction x
 * (not clamped), each with its partials to p at constant h and to h at constant p. `region` is 1,
 * 2, 3, 4 (wet, both saturated states included) or 5, and 0 while the record is empty.
 * `subcritical` is 1 where the dryness fraction is defined, from 611.213 Pa to below the critical
 * pressure; elsewhere it is 0 and x and its partials are 0. What foretells the next state follows:
 * the second derivative of T to h at constant p, and ln(p / 1 MPa), which only region 2 keeps. From
 * `saturation` on the record holds the saturation record of p, valid while `subcritical` is 1.
 */
export const State = {
  p: 0,
  h: 1,
  T: 2,
  s: 3,
  v: 4,
  x: 5,
  Tp: 6,
  Th: 7,
  sp: 8,
  sh: 9,
  vp: 10,
  vh: 11,
  xp: 12,
  xh: 13,
  region: 14,
  subcritical: 15,
  Thh: 16,
  log: 17,
  saturation: 18,
} as const
export const STATE_SIZE = State.saturation + SATURATION_SIZE

/** Slots of a result: the value and its partials to the first and the second argument. */
export const Result = { value: 0, first: 1, second: 2 } as const
export const RESULT_SIZE = 3
