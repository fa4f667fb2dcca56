import { write } from './enthalpy.ts'
import { border, enthalpyAlong, entropyAlong, highSide, lowSide, volumeAlong } from './gap.ts'
import { Point } from './if97/point.ts'
import { Saturation } from './records.ts'
import { saturationCache } from './saturation.ts'

// Slots and limits as constants of this module: an imported binding is looked up at each use.
const { hL: satHL, hV: satHV, hLp: satHLp, hVp: satHVp } = Saturation
const { h: ptH, s: ptS } = Point
const cache = saturationCache

/** h between saturated liquid and steam by s or v, whose slot of the liquid's side is given. */
export function wetForm(
  out: Float64Array,
  at: number,
  asked: Float64Array,
  slot: number,
  of: number,
): number {
  const value = asked[1] as number
  const first = cache[slot + of] as number
  const firstP = cache[slot + of + DERIVATIVES] as number
  const width = (cache[slot + of + 1] as number) - first
  const widthP = (cache[slot + of + DERIVATIVES + 1] as number) - firstP
  const hL = cache[slot + satHL] as number
  const dh = (cache[slot + satHV] as number) - hL
  const hLp = cache[slot + satHLp] as number
  const dhp = (cache[slot + satHVp] as number) - hLp
  const x = (value - first) / width
  const xp = -(firstP + x * widthP) / width
  return write(out, at, hL + x * dh, hLp + x * dhp + xp * dh, dh / width)
}

/** From a saturated property's slot to that of its derivative. */
const DERIVATIVES = satHLp - satHL

/** h between both sides of a border by s or v, whose slot of a point is given. */
export function gapForm(out: Float64Array, at: number, asked: Float64Array, of: number): number {
  const value = asked[1] as number
  const T = border[0] as number
  const slope = border[1] as number
  const first = lowSide[of] as number
  const width = (highSide[of] as number) - first
  const firstP = alongBorder(lowSide, T, slope, of)
  const widthP = alongBorder(highSide, T, slope, of) - firstP
  const h = lowSide[ptH] as number
  const dh = (highSide[ptH] as number) - h
  const hp = enthalpyAlong(lowSide, slope)
  const dhp = enthalpyAlong(highSide, slope) - hp
  const part = (value - first) / width
  const partP = -(firstP + part * widthP) / width
  return write(out, at, h + part * dh, hp + part * dhp + partP * dh, dh / width)
}

function alongBorder(q: Float64Array, T: number, slope: number, of: number): number {
  return of === ptS ? entropyAlong(q, T, slope) : volumeAlong(q, slope)
}
