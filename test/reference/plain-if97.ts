/**
 * IAPWS R7-97(2012) written as the release prints it: each sum term by term with Math.pow. The yardstick
 * that the unrolled code is held against, for its values and for its speed. SI units.
 */
import { boundary2bc } from '../../src/steam/if97/rows/boundaries.ts'
import { region1, region1TemperatureOfEnthalpy } from '../../src/steam/if97/rows/region1.ts'
import {
  region2aTemperatureOfEnthalpy,
  region2bTemperatureOfEnthalpy,
  region2cTemperatureOfEnthalpy,
  region2Ideal,
  region2MetastableIdeal,
  region2MetastableResidual,
  region2Residual,
} from '../../src/steam/if97/rows/region2.ts'
import {
  region3,
  region3aTemperatureOfEnthalpy,
  region3aVolumeOfEnthalpy,
  region3bTemperatureOfEnthalpy,
  region3bVolumeOfEnthalpy,
  region3LogDelta,
} from '../../src/steam/if97/rows/region3.ts'
import { region4 } from '../../src/steam/if97/rows/region4.ts'
import { region5Ideal, region5Residual } from '../../src/steam/if97/rows/region5.ts'
import type { Term } from '../../src/steam/if97/rows/term.ts'

const R = 461.526

/** A dimensionless potential with its first and second derivatives. */
export interface Potential {
  f: number
  fx: number
  fxx: number
  fy: number
  fxy: number
  fyy: number
}

/** sum of n x^I y^J with its derivatives, term by term. */
export function plainSum(rows: readonly Term[], x: number, y: number): Potential {
  const out = { f: 0, fx: 0, fxx: 0, fy: 0, fxy: 0, fyy: 0 }
  for (const { I, J, n } of rows) {
    out.f += n * Math.pow(x, I) * Math.pow(y, J)
    out.fx += n * I * Math.pow(x, I - 1) * Math.pow(y, J)
    out.fxx += n * I * (I - 1) * Math.pow(x, I - 2) * Math.pow(y, J)
    out.fy += n * Math.pow(x, I) * J * Math.pow(y, J - 1)
    out.fxy += n * I * Math.pow(x, I - 1) * J * Math.pow(y, J - 1)
    out.fyy += n * Math.pow(x, I) * J * (J - 1) * Math.pow(y, J - 2)
  }
  return out
}

function plainValue(rows: readonly Term[], x: number, y: number): number {
  let sum = 0
  for (const { I, J, n } of rows) sum += n * Math.pow(x, I) * Math.pow(y, J)
  return sum
}

/** Properties at p and T: what a point of the steam functions holds, and the speed of sound. */
export interface PlainPoint {
  h: number
  u: number
  s: number
  v: number
  cp: number
  w: number
  vT: number
  vp: number
}

function fromGibbs(g: Potential, p: number, T: number, Tstar: number, pstar: number): PlainPoint {
  const tau = Tstar / T
  const v = (R * T * g.fx) / pstar
  const bend = g.fx - tau * g.fxy
  return {
    h: R * Tstar * g.fy,
    u: R * Tstar * g.fy - p * v,
    s: R * (tau * g.fy - g.f),
    v,
    cp: -R * tau * tau * g.fyy,
    w: Math.sqrt((R * T * g.fx * g.fx) / ((bend * bend) / (tau * tau * g.fyy) - g.fxx)),
    vT: (R / pstar) * bend,
    vp: (R * T * g.fxx) / (pstar * pstar),
  }
}

/** Region 1, Eq. (7). */
export function plainRegion1(p: number, T: number): PlainPoint {
  const g = plainSum(region1, 7.1 - p / 16.53e6, 1386 / T - 1.222)
  g.fx = -g.fx
  g.fxy = -g.fxy
  return fromGibbs(g, p, T, 1386, 16.53e6)
}

function withIdeal(ideal: readonly Term[], residual: Potential, pi: number, tau: number): Potential {
  const o = plainSum(ideal, 1, tau)
  return {
    f: Math.log(pi) + o.f + residual.f,
    fx: 1 / pi + residual.fx,
    fxx: -1 / (pi * pi) + residual.fxx,
    fy: o.fy + residual.fy,
    fxy: residual.fxy,
    fyy: o.fyy + residual.fyy,
  }
}

/** Region 2, Eqs. (15) to (17). */
export function plainRegion2(p: number, T: number): PlainPoint {
  const pi = p / 1e6
  const tau = 540 / T
  const g = withIdeal(region2Ideal, plainSum(region2Residual, pi, tau - 0.5), pi, tau)
  return fromGibbs(g, p, T, 540, 1e6)
}

/** Metastable vapour, Eqs. (18) and (19). */
export function plainMetastable(p: number, T: number): PlainPoint {
  const pi = p / 1e6
  const tau = 540 / T
  const ideal = [...region2MetastableIdeal, ...region2Ideal.filter(({ J }) => J !== 0 && J !== 1)]
  const g = withIdeal(ideal, plainSum(region2MetastableResidual, pi, tau - 0.5), pi, tau)
  return fromGibbs(g, p, T, 540, 1e6)
}

/** Region 5, Eqs. (32) to (34). */
export function plainRegion5(p: number, T: number): PlainPoint {
  const pi = p / 1e6
  const tau = 1000 / T
  return fromGibbs(withIdeal(region5Ideal, plainSum(region5Residual, pi, tau), pi, tau), p, T, 1000, 1e6)
}

/** Region 3 at rho and T, Eq. (28). */
export interface PlainField {
  p: number
  h: number
  u: number
  s: number
  cv: number
  cp: number
  w: number
  pRho: number
  pT: number
  hRho: number
  hT: number
}

export function plainRegion3(rho: number, T: number): PlainField {
  const delta = rho / 322
  const tau = 647.096 / T
  const f = plainSum(region3, delta, tau)
  f.f += region3LogDelta * Math.log(delta)
  f.fx += region3LogDelta / delta
  f.fxx -= region3LogDelta / (delta * delta)
  const pRho = R * T * (2 * delta * f.fx + delta * delta * f.fxx)
  const pT = rho * R * delta * (f.fx - tau * f.fxy)
  const cv = -R * tau * tau * f.fyy
  return {
    p: rho * R * T * delta * f.fx,
    h: R * T * (tau * f.fy + delta * f.fx),
    u: R * T * tau * f.fy,
    s: R * (tau * f.fy - f.f),
    cv,
    cp: cv + (T * pT * pT) / (rho * rho * pRho),
    w: Math.sqrt(pRho + (T * pT * pT) / (rho * rho * cv)),
    pRho,
    pT,
    hRho: (pRho - (T * pT) / rho) / rho,
    hT: cv + pT / rho,
  }
}

/** Saturation temperature, Eq. (31). */
export function plainSaturationTemperature(p: number): number {
  const [n1, n2, n3, n4, n5, n6, n7, n8, n9, n10] = region4
  const beta = Math.pow(p / 1e6, 0.25)
  const e = Math.pow(beta, 2) + n3 * beta + n6
  const f = n1 * Math.pow(beta, 2) + n4 * beta + n7
  const g = n2 * Math.pow(beta, 2) + n5 * beta + n8
  const d = (2 * g) / (-f - Math.sqrt(Math.pow(f, 2) - 4 * e * g))
  return (n10 + d - Math.sqrt(Math.pow(n10 + d, 2) - 4 * (n9 + n10 * d))) / 2
}

/** T, s, v, x with their partials, as a state of the steam functions. */
export interface PlainState {
  T: number
  s: number
  v: number
  x: number
  Tp: number
  Th: number
  sp: number
  sh: number
  vp: number
  vh: number
  xp: number
  xh: number
}

interface PlainSaturation {
  T: number
  liquid: PlainPoint
  vapour: PlainPoint
  hL: number
  hV: number
  hLp: number
  hVp: number
  slope: number
}

function plainSaturation(p: number): PlainSaturation {
  const T = plainSaturationTemperature(p)
  const step = 1e-5 * p
  const slope =
    (plainSaturationTemperature(p + step) - plainSaturationTemperature(p - step)) / (2 * step)
  const liquid = plainRegion1(p, T)
  const vapour = plainRegion2(p, T)
  return {
    T,
    liquid,
    vapour,
    hL: liquid.h,
    hV: vapour.h,
    hLp: liquid.v - T * liquid.vT + liquid.cp * slope,
    hVp: vapour.v - T * vapour.vT + vapour.cp * slope,
    slope,
  }
}

/** Backward equations of region 2, Eqs. (22) to (24). */
function plainGuess2(p: number, h: number): number {
  const pi = p / 1e6
  const eta = h / 2e6
  if (pi <= 4) return plainValue(region2aTemperatureOfEnthalpy, pi, eta - 2.1)
  const [, , n3, n4, n5] = boundary2bc
  if (pi > 6.5467 && h < 1e3 * (n4 + Math.sqrt((pi - n5) / n3))) {
    return plainValue(region2cTemperatureOfEnthalpy, pi + 25, eta - 1.8)
  }
  return plainValue(region2bTemperatureOfEnthalpy, pi - 2, eta - 2.6)
}

/** A state below 16.529 MPa from p and h in regions 1, 2 and 4; Newton's steps to round-off. */
export function plainState(p: number, h: number): PlainState {
  const saturation = plainSaturation(p)
  const { hL, hV, hLp, hVp } = saturation
  const x = (h - hL) / (hV - hL)
  const xh = 1 / (hV - hL)
  const xp = -(hLp + x * (hVp - hLp)) / (hV - hL)
  if (x >= 0 && x <= 1) {
    const { liquid, vapour, slope, T } = saturation
    const along = (q: PlainPoint) => [(q.cp / T) * slope - q.vT, q.vp + q.vT * slope] as const
    const [sLp, vLp] = along(liquid)
    const [sVp, vVp] = along(vapour)
    const ds = vapour.s - liquid.s
    const dv = vapour.v - liquid.v
    return {
      T,
      s: liquid.s + x * ds,
      v: liquid.v + x * dv,
      x,
      Tp: slope,
      Th: 0,
      sp: sLp + x * (sVp - sLp) + xp * ds,
      sh: xh * ds,
      vp: vLp + x * (vVp - vLp) + xp * dv,
      vh: xh * dv,
      xp,
      xh,
    }
  }
  const forward = x < 0 ? plainRegion1 : plainRegion2
  let T =
    x < 0 ? plainValue(region1TemperatureOfEnthalpy, p / 1e6, h / 2.5e6 + 1) : plainGuess2(p, h)
  let q = forward(p, T)
  for (let i = 0; i < 20; i++) {
    const step = (q.h - h) / q.cp
    T -= step
    q = forward(p, T)
    if (Math.abs(step) < 1e-8 * T) break
  }
  const Tp = (T * q.vT - q.v) / q.cp
  return {
    T,
    s: q.s,
    v: q.v,
    x,
    Tp,
    Th: 1 / q.cp,
    sp: -q.v / T,
    sh: 1 / T,
    vp: q.vp + q.vT * Tp,
    vh: q.vT / q.cp,
    xp,
    xh,
  }
}

/** A state of region 3 above the critical pressure from p and h. */
export function plainDenseState(p: number, h: number): PlainState {
  const pi = p / 1e8
  const pm = p / 1e6
  const border = 1e3 * (2014.64004206875 + 3.74696550136983 * pm - 0.0219921901054187 * Math.pow(pm, 2) + 8.7513168600995e-5 * Math.pow(pm, 3))
  const onLiquid = h <= border
  let rho = onLiquid
    ? 1 / (0.0028 * plainValue(region3aVolumeOfEnthalpy, pi + 0.128, h / 2.1e6 - 0.727))
    : 1 / (0.0088 * plainValue(region3bVolumeOfEnthalpy, pi + 0.0661, h / 2.8e6 - 0.72))
  let T = onLiquid
    ? 760 * plainValue(region3aTemperatureOfEnthalpy, pi + 0.24, h / 2.3e6 - 0.615)
    : 860 * plainValue(region3bTemperatureOfEnthalpy, pi + 0.298, h / 2.8e6 - 0.72)
  let q = plainRegion3(rho, T)
  for (let i = 0; i < 20; i++) {
    const det = q.pRho * q.hT - q.pT * q.hRho
    const dRho = ((q.p - p) * q.hT - (q.h - h) * q.pT) / det
    const dT = ((q.h - h) * q.pRho - (q.p - p) * q.hRho) / det
    rho -= dRho
    T -= dT
    q = plainRegion3(rho, T)
    if (Math.abs(dRho) < 1e-8 * rho && Math.abs(dT) < 1e-8 * T) break
  }
  const det = q.pRho * q.hT - q.pT * q.hRho
  const v = 1 / rho
  return {
    T,
    s: q.s,
    v,
    x: 0,
    Tp: -q.hRho / det,
    Th: q.pRho / det,
    sp: -v / T,
    sh: 1 / T,
    vp: (-v * v * q.hT) / det,
    vh: (v * v * q.pT) / det,
    xp: 0,
    xh: 0,
  }
}
