/**
 * IAPWS R6-95(2018), the scientific formulation: the yardstick that IF97 was fitted to. phi(delta, tau) is
 * summed as the release prints it (Eqs. (5) and (6), Tables 1 and 2). SI units.
 */

const R = 461.51805
const Tc = 647.096
const rhoC = 322

// Table 1, the terms of the ideal part with an exponential: n, gamma.
const ideal = [
  [0.012436, 1.28728967],
  [0.97315, 3.53734222],
  [1.2795, 7.74073708],
  [0.96956, 9.24437796],
  [0.24873, 27.5075105],
] as const

// Table 2, terms 1 to 51: c, d, t, n.
const terms = [
  [0, 1, -0.5, 0.012533547935523],
  [0, 1, 0.875, 7.8957634722828],
  [0, 1, 1, -8.7803203303561],
  [0, 2, 0.5, 0.31802509345418],
  [0, 2, 0.75, -0.26145533859358],
  [0, 3, 0.375, -0.0078199751687981],
  [0, 4, 1, 0.0088089493102134],
  [1, 1, 4, -0.66856572307965],
  [1, 1, 6, 0.20433810950965],
  [1, 1, 12, -6.6212605039687e-05],
  [1, 2, 1, -0.19232721156002],
  [1, 2, 5, -0.25709043003438],
  [1, 3, 4, 0.16074868486251],
  [1, 4, 2, -0.04009282892587],
  [1, 4, 13, 3.9343422603254e-07],
  [1, 5, 9, -7.5941377088144e-06],
  [1, 7, 3, 0.00056250979351888],
  [1, 9, 4, -1.5608652257135e-05],
  [1, 10, 11, 1.1537996422951e-09],
  [1, 11, 4, 3.6582165144204e-07],
  [1, 13, 13, -1.3251180074668e-12],
  [1, 15, 1, -6.2639586912454e-10],
  [2, 1, 7, -0.10793600908932],
  [2, 2, 1, 0.017611491008752],
  [2, 2, 9, 0.22132295167546],
  [2, 2, 10, -0.40247669763528],
  [2, 3, 10, 0.58083399985759],
  [2, 4, 3, 0.0049969146990806],
  [2, 4, 7, -0.031358700712549],
  [2, 4, 10, -0.74315929710341],
  [2, 5, 10, 0.4780732991548],
  [2, 6, 6, 0.020527940895948],
  [2, 6, 10, -0.13636435110343],
  [2, 7, 10, 0.014180634400617],
  [2, 9, 1, 0.0083326504880713],
  [2, 9, 2, -0.029052336009585],
  [2, 9, 3, 0.038615085574206],
  [2, 9, 4, -0.020393486513704],
  [2, 9, 8, -0.0016554050063734],
  [2, 10, 6, 0.0019955571979541],
  [2, 10, 9, 0.00015870308324157],
  [2, 12, 8, -1.638856834253e-05],
  [3, 3, 16, 0.043613615723811],
  [3, 4, 22, 0.034994005463765],
  [3, 4, 23, -0.076788197844621],
  [3, 5, 23, 0.022446277332006],
  [4, 14, 10, -6.2689710414685e-05],
  [6, 3, 50, -5.5711118565645e-10],
  [6, 6, 44, -0.19905718354408],
  [6, 6, 46, 0.31777497330738],
  [6, 6, 50, -0.11841182425981],
] as const

// Table 2, terms 52 to 54: t, n, beta, gamma; d = 3, alpha = 20, epsilon = 1.
const bells = [
  [0, -31.306260323435, 150, 1.21],
  [1, 31.546140237781, 150, 1.21],
  [4, -2521.3154341695, 250, 1.25],
] as const

// Table 2, terms 55 and 56: n, b, C, D; a = 3.5, B = 0.2, A = 0.32, beta = 0.3.
const crests = [
  [-0.14874640856724, 0.85, 28, 700],
  [0.31806110878444, 0.95, 32, 800],
] as const

/** phi with its derivatives to delta (d) and tau (t). */
export interface Phi {
  f: number
  d: number
  dd: number
  t: number
  tt: number
  dt: number
}

/** The ideal part, Eq. (5). */
export function phiIdeal(delta: number, tau: number): Phi {
  const out = {
    f: Math.log(delta) - 8.3204464837497 + 6.6832105275932 * tau + 3.00632 * Math.log(tau),
    d: 1 / delta,
    dd: -1 / delta ** 2,
    t: 6.6832105275932 + 3.00632 / tau,
    tt: -3.00632 / tau ** 2,
    dt: 0,
  }
  for (const [n, gamma] of ideal) {
    const e = Math.exp(-gamma * tau)
    out.f += n * Math.log(1 - e)
    out.t += n * gamma * (1 / (1 - e) - 1)
    out.tt -= n * gamma ** 2 * e * (1 - e) ** -2
  }
  return out
}

/** The residual part, Eq. (6). */
export function phiResidual(delta: number, tau: number): Phi {
  const out = { f: 0, d: 0, dd: 0, t: 0, tt: 0, dt: 0 }
  for (const [c, d, t, n] of terms) {
    const dc = c === 0 ? 0 : delta ** c
    const value = n * delta ** d * tau ** t * Math.exp(-dc)
    const inDelta = d - c * dc
    out.f += value
    out.d += (value * inDelta) / delta
    out.dd += (value * (inDelta * (inDelta - 1) - c * c * dc)) / delta ** 2
    out.t += (value * t) / tau
    out.tt += (value * t * (t - 1)) / tau ** 2
    out.dt += (value * inDelta * t) / (delta * tau)
  }
  for (const [t, n, beta, gamma] of bells) {
    const value =
      n * delta ** 3 * tau ** t * Math.exp(-20 * (delta - 1) ** 2 - beta * (tau - gamma) ** 2)
    const inDelta = 3 / delta - 40 * (delta - 1)
    const inTau = t / tau - 2 * beta * (tau - gamma)
    out.f += value
    out.d += value * inDelta
    out.dd += value * (inDelta ** 2 - 3 / delta ** 2 - 40)
    out.t += value * inTau
    out.tt += value * (inTau ** 2 - t / tau ** 2 - 2 * beta)
    out.dt += value * inDelta * inTau
  }
  for (const [n, b, C, D] of crests) {
    // at the critical density itself the limit
    const off = delta === 1 ? 1e-15 : delta - 1
    const square = off ** 2
    const theta = 1 - tau + 0.32 * square ** (1 / 0.6)
    const big = theta ** 2 + 0.2 * square ** 3.5
    const psi = Math.exp(-C * square - D * (tau - 1) ** 2)
    const power = big ** b
    const bigD = off * ((0.32 * theta * 2 * square ** (1 / 0.6 - 1)) / 0.3 + 1.4 * square ** 2.5)
    const bigDD =
      bigD / off +
      square *
        (4 * 0.2 * 3.5 * 2.5 * square ** 1.5 +
          2 * 0.32 ** 2 * (1 / 0.3) ** 2 * (square ** (1 / 0.6 - 1)) ** 2 +
          0.32 * theta * (4 / 0.3) * (1 / 0.6 - 1) * square ** (1 / 0.6 - 2))
    const powerD = b * big ** (b - 1) * bigD
    const powerDD = b * (big ** (b - 1) * bigDD + (b - 1) * big ** (b - 2) * bigD ** 2)
    const powerT = -2 * theta * b * big ** (b - 1)
    const powerTT = 2 * b * big ** (b - 1) + 4 * theta ** 2 * b * (b - 1) * big ** (b - 2)
    const powerDT =
      (-0.32 * b * 2 * big ** (b - 1) * off * square ** (1 / 0.6 - 1)) / 0.3 -
      2 * theta * b * (b - 1) * big ** (b - 2) * bigD
    const psiD = -2 * C * off * psi
    const psiDD = (2 * C * square - 1) * 2 * C * psi
    const psiT = -2 * D * (tau - 1) * psi
    const psiTT = (2 * D * (tau - 1) ** 2 - 1) * 2 * D * psi
    const psiDT = 4 * C * D * off * (tau - 1) * psi
    out.f += n * power * delta * psi
    out.d += n * (power * (psi + delta * psiD) + powerD * delta * psi)
    out.dd +=
      n *
      (power * (2 * psiD + delta * psiDD) + 2 * powerD * (psi + delta * psiD) + powerDD * delta * psi)
    out.t += n * delta * (powerT * psi + power * psiT)
    out.tt += n * delta * (powerTT * psi + 2 * powerT * psiT + power * psiTT)
    out.dt +=
      n *
      (power * (psiT + delta * psiDT) +
        delta * powerD * psiT +
        powerT * (psi + delta * psiD) +
        powerDT * delta * psi)
  }
  return out
}

/** Properties at density (kg/m3) and temperature (K), Table 3. */
export interface ScientificState {
  p: number
  h: number
  s: number
  cv: number
  cp: number
  w: number
  /** d rho / d p at constant T. */
  rhoP: number
}

export function scientificState(rho: number, T: number): ScientificState {
  const delta = rho / rhoC
  const tau = Tc / T
  const o = phiIdeal(delta, tau)
  const r = phiResidual(delta, tau)
  const first = 1 + delta * r.d
  const bend = 1 + delta * r.d - delta * tau * r.dt
  const second = 1 + 2 * delta * r.d + delta ** 2 * r.dd
  const cv = -R * tau ** 2 * (o.tt + r.tt)
  return {
    p: rho * R * T * first,
    h: R * T * (tau * (o.t + r.t) + first),
    s: R * (tau * (o.t + r.t) - o.f - r.f),
    cv,
    cp: cv + (R * bend ** 2) / second,
    w: Math.sqrt(R * T * (second - bend ** 2 / (tau ** 2 * (o.tt + r.tt)))),
    rhoP: 1 / (R * T * second),
  }
}

/** Saturation at a temperature (K): p and both densities, from equal p and equal Gibbs energy. */
export function scientificSaturation(
  T: number,
  liquidGuess: number,
  steamGuess: number,
): { p: number; liquid: number; steam: number } {
  const delta = [liquidGuess / rhoC, steamGuess / rhoC] as [number, number]
  const tau = Tc / T
  for (let i = 0; i < 50; i++) {
    const a = phiResidual(delta[0], tau)
    const b = phiResidual(delta[1], tau)
    const J = ([x]: [number], r: Phi): number => x * (1 + x * r.d)
    const K = ([x]: [number], r: Phi): number => x * r.d + r.f + Math.log(x)
    const Jd = (x: number, r: Phi): number => 1 + 2 * x * r.d + x * x * r.dd
    const Kd = (x: number, r: Phi): number => 2 * r.d + x * r.dd + 1 / x
    const e1 = J([delta[1]], b) - J([delta[0]], a)
    const e2 = K([delta[1]], b) - K([delta[0]], a)
    const [ja, jb] = [Jd(delta[0], a), Jd(delta[1], b)]
    const [ka, kb] = [Kd(delta[0], a), Kd(delta[1], b)]
    const det = jb * ka - ja * kb
    const da = (e2 * jb - e1 * kb) / det
    const db = (e2 * ja - e1 * ka) / det
    delta[0] += da
    delta[1] += db
    if (Math.abs(da) < 1e-13 && Math.abs(db) < 1e-14) break
  }
  // p from the steam: the liquid's is a small difference of large numbers
  const steam = delta[1] * rhoC
  return { p: scientificState(steam, T).p, liquid: delta[0] * rhoC, steam }
}
