/**
 * Saturated liquid and dry saturated steam up to 16.529 MPa, from the saturation line with the
 * forward equations of regions 1 and 2 (IAPWS R7-97(2012), Eqs. (7), (15) and (31)). Along the line
 * T and each property is a smooth function of beta = (p / 1 MPa)^(1/4), the variable of Eq. (31), so a
 * short polynomial per step of beta gives it to the round-off of the equations themselves. A
 * polynomial runs through the equations' values at Chebyshev's nodes and is made when its step is
 * first met.
 */
import { POINT_SIZE, Point, region1Point, region2Point } from './point.ts'
import { saturationTemperatureOf } from './saturation-line.ts'

const { h: ptH, s: ptS, v: ptV } = Point

/**
 * Steps for each 1 of beta, which runs from 0.157 to 2.017: short ones where Eq. (31) nears its
 * singularity at beta = 0, longer ones, whose slopes keep more digits, from `change` on.
 */
const FINE = 64
const COARSE = 32
const change = 0.5
/** What makes the steps' numbers go on where the step changes. */
const FOLLOWING = (FINE - COARSE) * change
const STEPS = Math.ceil(FOLLOWING + COARSE * 2.1)
/** Coefficients of one polynomial: degree 8 leaves less than round-off. */
const TERMS = 9
/** h', h'', s', s'', v', p v'' and T. */
const CURVES = 7
const STEP_SIZE = TERMS * CURVES

// The coefficients of a step: those of u^0 of all curves, of u^1, and so on; u from -1 to 1.
const curves = new Float64Array(STEPS * STEP_SIZE)

// Chebyshev's polynomials of degree 0 to 8: their coefficients, lowest power first, and their values
// at the nodes, the zeros of the next one.
const chebyshev = new Float64Array(TERMS * TERMS)
const cosines = new Float64Array(TERMS * TERMS)
for (let degree = 0; degree < TERMS; degree++) {
  const at = degree * TERMS
  for (let i = 0; i < TERMS; i++) {
    cosines[at + i] = Math.cos((Math.PI * degree * (i + 0.5)) / TERMS)
    if (degree < 2) chebyshev[at + i] = i === degree ? 1 : 0
    else {
      const before = i === 0 ? 0 : (chebyshev[at - TERMS + i - 1] as number)
      chebyshev[at + i] = 2 * before - (chebyshev[at - 2 * TERMS + i] as number)
    }
  }
}

// The properties at the nodes of a step.
const values = new Float64Array(TERMS * CURVES)
const liquid = new Float64Array(POINT_SIZE)
const vapour = new Float64Array(POINT_SIZE)

/**
 * Fills the saturation record whose p (Pa), 611.213 Pa to 16.529 MPa, is in its first slot. The
 * slots are those of `Saturation` in records.ts.
 */
export function saturatedStates(record: Float64Array, at: number): void {
  const p = record[at] as number
  const beta = Math.sqrt(Math.sqrt(p * 1e-6))
  const fine = beta < change
  const density = fine ? FINE : COARSE
  const place = fine ? beta * FINE : beta * COARSE + FOLLOWING
  const step = place | 0
  let c = step * STEP_SIZE
  // h'' is never zero
  if (curves[c + 1] === 0) makeCurves(step)
  const u = 2 * (place - step) - 1
  // Horner's rule for the values and the derivatives of the curves side by side
  c += (TERMS - 1) * CURVES
  let hL = curves[c] as number
  let hV = curves[c + 1] as number
  let sL = curves[c + 2] as number
  let sV = curves[c + 3] as number
  let vL = curves[c + 4] as number
  let pvV = curves[c + 5] as number
  let T = curves[c + 6] as number
  let hLu = 0
  let hVu = 0
  let vLu = 0
  let pvVu = 0
  let Tu = 0
  for (let i = 1; i < TERMS; i++) {
    c -= CURVES
    hLu = hLu * u + hL
    hVu = hVu * u + hV
    vLu = vLu * u + vL
    pvVu = pvVu * u + pvV
    Tu = Tu * u + T
    hL = hL * u + (curves[c] as number)
    hV = hV * u + (curves[c + 1] as number)
    sL = sL * u + (curves[c + 2] as number)
    sV = sV * u + (curves[c + 3] as number)
    vL = vL * u + (curves[c + 4] as number)
    pvV = pvV * u + (curves[c + 5] as number)
    T = T * u + (curves[c + 6] as number)
  }
  const perPressure = 1 / p
  // du/dp
  const toPressure = 0.5 * density * beta * perPressure
  const vV = pvV * perPressure
  const hLp = hLu * toPressure
  const hVp = hVu * toPressure
  const perT = 1 / T
  record[at + 1] = T
  record[at + 2] = hL
  record[at + 3] = hV
  record[at + 4] = sL
  record[at + 5] = sV
  record[at + 6] = vL
  record[at + 7] = vV
  record[at + 8] = Tu * toPressure
  record[at + 9] = hLp
  record[at + 10] = hVp
  // dh = T ds + v dp along any path within a region
  record[at + 11] = (hLp - vL) * perT
  record[at + 12] = (hVp - vV) * perT
  record[at + 13] = vLu * toPressure
  record[at + 14] = (pvVu * toPressure - vV) * perPressure
  record[at + 15] = 1 / (hV - hL)
}

/** The polynomials of one step, from the equations at Chebyshev's nodes. */
function makeCurves(step: number): void {
  for (let node = 0; node < TERMS; node++) {
    const place = step + 0.5 + 0.5 * (cosines[TERMS + node] as number)
    const beta = step < FINE * change ? place / FINE : (place - FOLLOWING) / COARSE
    const p = 1e6 * beta * beta * beta * beta
    const T = saturationTemperatureOf(p)
    region1Point(liquid, p, T)
    region2Point(vapour, p, T)
    const at = node * CURVES
    values[at] = liquid[ptH] as number
    values[at + 1] = vapour[ptH] as number
    values[at + 2] = liquid[ptS] as number
    values[at + 3] = vapour[ptS] as number
    values[at + 4] = liquid[ptV] as number
    values[at + 5] = (vapour[ptV] as number) * p
    values[at + 6] = T
  }
  for (let degree = 0; degree < TERMS; degree++) {
    for (let curve = 0; curve < CURVES; curve++) {
      let sum = 0
      for (let node = 0; node < TERMS; node++) {
        sum +=
          (values[node * CURVES + curve] as number) * (cosines[degree * TERMS + node] as number)
      }
      const weight = ((degree === 0 ? 1 : 2) * sum) / TERMS
      for (let power = degree & 1; power <= degree; power += 2) {
        const at = step * STEP_SIZE + power * CURVES + curve
        curves[at] = (curves[at] as number) + weight * (chebyshev[degree * TERMS + power] as number)
      }
    }
  }
}
