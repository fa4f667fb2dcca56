/**
 * Writing states: what a state record holds, from the forward equations of its region. Everything
 * comes and goes in arrays: numbers passed on to a longer function would be allocated.
 */
import { gasConstant } from './constants.ts'
import { border, enthalpyAlong, entropyAlong, highSide, lowSide, volumeAlong } from './gap.ts'
import { POINT_SIZE, Point, scales1, scales2 } from './if97/point.ts'
import { FIELD_SIZE, Field } from './if97/region3.ts'
import { ASKED_SIZE, Asked, gibbs } from './if97/temperature-at-enthalpy.ts'
import { Saturation, State } from './records.ts'

// Slots and arrays as constants of this module: an imported binding is looked up at each use.
const {
  p: atP,
  h: atH,
  region: atRegion,
  saturation: atSaturation,
  T: atT,
  Tp: atTp,
  Th: atTh,
  s: atS,
  v: atV,
  sp: atSp,
  sh: atSh,
  vp: atVp,
  vh: atVh,
  subcritical: atSubcritical,
  x: atX,
  xp: atXp,
  xh: atXh,
  Thh: atThh,
} = State
const {
  hL: satHL,
  T: satT,
  hLp: satHLp,
  hVp: satHVp,
  vL: satVL,
  vV: satVV,
  sL: satSL,
  sV: satSV,
  sLp: satSLp,
  vLp: satVLp,
  Tp: satTp,
  sVp: satSVp,
  vVp: satVVp,
  perHeat: satPerHeat,
} = Saturation
const { h: ptH, v: ptV, T: ptT, cp: ptCp, vT: ptVT, hp: ptHp, s: ptS, vp: ptVp } = Point
const { p: askP, h: askH, T: askT, tau: askTau, step: askStep } = Asked
const R = gasConstant
const liquidScales = scales1
const steamScales = scales2
const g = gibbs

/** What is asked for: p (Pa) and h (J/kg), and what the search of its temperature goes by. */
export const asked: Float64Array = new Float64Array(ASKED_SIZE)
/** A point to fill a state from. */
export const point: Float64Array = new Float64Array(POINT_SIZE)
/** The field of region 3 to fill a state from. */
export const field: Float64Array = new Float64Array(FIELD_SIZE)

/**
 * Writes a state of region 1 or 2, whose T is in `asked`, from the derivatives of gamma beside it:
 * the step of tau is so short that Taylor's terms lead on to round-off.
 */
export function fillBeside(
  record: Float64Array,
  at: number,
  region: number,
  subcritical: number,
): void {
  const scales = region === 1 ? liquidScales : steamScales
  const h = asked[askH] as number
  const T = asked[askT] as number
  const step = asked[askStep] as number
  const tau = (asked[askTau] as number) + step
  const half = 0.5 * step
  const gamma = (g[0] as number) + step * ((g[3] as number) + half * (g[5] as number))
  const gPi = (g[1] as number) + step * ((g[4] as number) + half * (g[10] as number))
  const gPiPi = (g[2] as number) + step * (g[11] as number)
  const gPiTau = (g[4] as number) + step * (g[10] as number)
  const bend = g[9] as number
  const gTauTau = (g[5] as number) + step * bend
  const perVolume = scales[1] as number
  const volumeT = perVolume * T
  const v = volumeT * gPi
  const sh = 1 / T
  const tau2 = tau * tau
  const Th = -1 / (R * tau2 * gTauTau)
  const vT = perVolume * (gPi - tau * gPiTau)
  const Tp = -perVolume * (scales[3] as number) * gPiTau * Th
  record[at + atP] = asked[askP] as number
  record[at + atH] = h
  record[at + atT] = T
  record[at + atS] = h * sh - R * gamma
  record[at + atV] = v
  record[at + atTp] = Tp
  record[at + atTh] = Th
  record[at + atSp] = -v * sh
  record[at + atSh] = sh
  record[at + atVp] = volumeT * (scales[2] as number) * gPiPi + vT * Tp
  record[at + atVh] = vT * Th
  record[at + atRegion] = region
  // -(dcp/dT) / cp^3
  record[at + atThh] = -R * tau2 * sh * (2 * gTauTau + tau * bend) * Th * Th * Th
  dryness(record, at, subcritical)
}

/** Writes a single-phase state from the forward equations in `point`. */
export function fillPoint(
  record: Float64Array,
  at: number,
  region: number,
  subcritical: number,
): void {
  const v = point[ptV] as number
  const T = point[ptT] as number
  const Th = 1 / (point[ptCp] as number)
  const vT = point[ptVT] as number
  const Tp = -(point[ptHp] as number) * Th
  const sh = 1 / T
  record[at + atP] = asked[askP] as number
  record[at + atH] = asked[askH] as number
  record[at + atT] = T
  record[at + atS] = point[ptS] as number
  record[at + atV] = v
  record[at + atTp] = Tp
  record[at + atTh] = Th
  record[at + atSp] = -v * sh
  record[at + atSh] = sh
  record[at + atVp] = (point[ptVp] as number) + vT * Tp
  record[at + atVh] = vT * Th
  record[at + atRegion] = region
  record[at + atThh] = 0
  dryness(record, at, subcritical)
}

/** Writes a state of region 3 from `field`. */
export function fillField(record: Float64Array, at: number, subcritical: number): void {
  const v = 1 / (field[Field.rho] as number)
  const T = field[Field.T] as number
  const pRho = field[Field.pRho] as number
  const pT = field[Field.pT] as number
  const hRho = field[Field.hRho] as number
  const hT = field[Field.hT] as number
  const share = 1 / (pRho * hT - pT * hRho)
  const sh = 1 / T
  record[at + atP] = asked[askP] as number
  record[at + atH] = asked[askH] as number
  record[at + atT] = T
  record[at + atS] = field[Field.s] as number
  record[at + atV] = v
  record[at + atTp] = -hRho * share
  record[at + atTh] = pRho * share
  record[at + atSp] = -v * sh
  record[at + atSh] = sh
  record[at + atVp] = -v * v * hT * share
  record[at + atVh] = v * v * pT * share
  record[at + atRegion] = 3
  dryness(record, at, subcritical)
}

/** Writes a wet state from the saturation record. */
export function fillWet(record: Float64Array, at: number): void {
  const saturation = at + atSaturation
  dryness(record, at, 1)
  const x = record[at + atX] as number
  const xp = record[at + atXp] as number
  const xh = record[at + atXh] as number
  const s = record[saturation + satSL] as number
  const ds = (record[saturation + satSV] as number) - s
  const sp = record[saturation + satSLp] as number
  const v = record[saturation + satVL] as number
  const dv = (record[saturation + satVV] as number) - v
  const vp = record[saturation + satVLp] as number
  record[at + atP] = asked[askP] as number
  record[at + atH] = asked[askH] as number
  record[at + atT] = record[saturation + satT] as number
  record[at + atS] = s + x * ds
  record[at + atV] = v + x * dv
  record[at + atTp] = record[saturation + satTp] as number
  record[at + atTh] = 0
  record[at + atSp] = sp + x * ((record[saturation + satSVp] as number) - sp) + xp * ds
  record[at + atSh] = xh * ds
  record[at + atVp] = vp + x * ((record[saturation + satVVp] as number) - vp) + xp * dv
  record[at + atVh] = xh * dv
  record[at + atRegion] = 4
}

/**
 * Writes a state within a gap between two regions, from both sides of the border as gap.ts has
 * them.
 */
export function fillGap(
  record: Float64Array,
  at: number,
  region: number,
  subcritical: number,
): void {
  const p = asked[askP] as number
  const h = asked[askH] as number
  const T = border[0] as number
  const slope = border[1] as number
  const low = lowSide[ptH] as number
  const width = (highSide[ptH] as number) - low
  const part = (h - low) / width
  const lowP = enthalpyAlong(lowSide, slope)
  const partP = -(lowP + part * (enthalpyAlong(highSide, slope) - lowP)) / width
  const s = lowSide[ptS] as number
  const ds = (highSide[ptS] as number) - s
  const v = lowSide[ptV] as number
  const dv = (highSide[ptV] as number) - v
  const sp = entropyAlong(lowSide, T, slope)
  const vp = volumeAlong(lowSide, slope)
  record[at + atP] = p
  record[at + atH] = h
  record[at + atT] = T
  record[at + atS] = s + part * ds
  record[at + atV] = v + part * dv
  record[at + atTp] = slope
  record[at + atTh] = 0
  record[at + atSp] = sp + part * (entropyAlong(highSide, T, slope) - sp) + partP * ds
  record[at + atSh] = ds / width
  record[at + atVp] = vp + part * (volumeAlong(highSide, slope) - vp) + partP * dv
  record[at + atVh] = dv / width
  record[at + atRegion] = region
  record[at + atThh] = 0
  dryness(record, at, subcritical)
}

/** x with its partials from the saturation record, or zeros where it is not defined. */
function dryness(record: Float64Array, at: number, subcritical: number): void {
  record[at + atSubcritical] = subcritical
  if (subcritical === 0) {
    record[at + atX] = 0
    record[at + atXp] = 0
    record[at + atXh] = 0
    return
  }
  const saturation = at + atSaturation
  const hL = record[saturation + satHL] as number
  const hLp = record[saturation + satHLp] as number
  const xh = record[saturation + satPerHeat] as number
  const x = ((asked[askH] as number) - hL) * xh
  record[at + atX] = x
  record[at + atXh] = xh
  record[at + atXp] = -(hLp + x * ((record[saturation + satHVp] as number) - hLp)) * xh
}
