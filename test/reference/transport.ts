/**
 * Formulations beside the steam tables, kept for the check values only: viscosity (IAPWS R12-08), thermal
 * conductivity (R15-11), surface tension (R1-76(2014)), melting and sublimation (R14-08(2011)). SI units.
 */
import { type ScientificState, scientificState } from './iapws95.ts'

const Tc = 647.096
const pc = 22.064e6
const rhoC = 322

// R12-08, Table 1 and Table 2: powers of 1/T - 1, of rho - 1, coefficient.
const dilute = [1.67752, 2.20462, 0.6366564, -0.241605]
const dense = [
  [0, 0, 0.520094],
  [1, 0, 0.0850895],
  [2, 0, -1.08374],
  [3, 0, -0.289555],
  [0, 1, 0.222531],
  [1, 1, 0.999115],
  [2, 1, 1.88797],
  [3, 1, 1.26613],
  [5, 1, 0.120573],
  [0, 2, -0.281378],
  [1, 2, -0.906851],
  [2, 2, -0.772479],
  [3, 2, -0.489837],
  [4, 2, -0.25704],
  [0, 3, 0.161913],
  [1, 3, 0.257399],
  [0, 4, -0.0325372],
  [3, 4, 0.0698452],
  [4, 5, 0.00872102],
  [3, 6, -0.00435673],
  [5, 6, -0.000593264],
] as const

/** The correlation length (nm), R12-08 Eqs. (20) and (21): from d rho / d p here and at 1.5 Tc. */
function correlationLength(rho: number, T: number, rhoP: number, rhoPReference: number): number {
  const delta = rho / rhoC
  const chi = delta * (pc / rhoC) * (rhoP - (rhoPReference * 1.5 * Tc) / T)
  return 0.13 * (Math.max(0, chi) / 0.06) ** (0.63 / 1.239)
}

/** R12-08 Eqs. (14) to (19). */
function viscosityEnhancement(xi: number): number {
  const q = xi / 1.9
  const d = xi / 1.1
  if (xi <= 0.3817016416) {
    return Math.exp(0.068 * 0.2 * q * d ** 5 * (1 - q + q ** 2 - (765 / 504) * d ** 2))
  }
  const psi = Math.acos(1 / Math.sqrt(1 + d ** 2))
  const w = Math.sqrt(Math.abs((q - 1) / (q + 1))) * Math.tan(psi / 2)
  const L = q > 1 ? Math.log((1 + w) / (1 - w)) : 2 * Math.atan(Math.abs(w))
  const y =
    Math.sin(3 * psi) / 12 -
    Math.sin(2 * psi) / (4 * q) +
    ((1 - 1.25 * q ** 2) * Math.sin(psi)) / q ** 2 -
    ((1 - 1.5 * q ** 2) * psi - Math.abs(q ** 2 - 1) ** 1.5 * L) / q ** 3
  return Math.exp(0.068 * y)
}

/** Viscosity, Pa s, at rho (kg/m3) and T (K), with the critical enhancement or without. */
export function viscosity(rho: number, T: number, enhanced: boolean): number {
  const t = T / Tc
  const delta = rho / rhoC
  const first = (100 * Math.sqrt(t)) / dilute.reduce((sum, H, i) => sum + H / t ** i, 0)
  let sum = 0
  for (const [i, j, H] of dense) sum += H * (1 / t - 1) ** i * (delta - 1) ** j
  let mu = first * Math.exp(delta * sum) * 1e-6
  if (enhanced) {
    const { rhoP } = scientificState(rho, T)
    const reference = scientificState(rho, 1.5 * Tc).rhoP
    mu *= viscosityEnhancement(correlationLength(rho, T, rhoP, reference))
  }
  return mu
}

// R15-11, Table 1 and Table 2: powers of 1/T - 1 down, of rho - 1 across.
const diluteConductivity = [2.443221e-3, 1.323095e-2, 6.770357e-3, -3.454586e-3, 4.096266e-4]
const denseConductivity = [
  [1.60397357, -0.646013523, 0.111443906, 0.102997357, -0.0504123634, 0.00609859258],
  [2.33771842, -2.78843778, 1.53616167, -0.463045512, 0.0832827019, -0.00719201245],
  [2.19650529, -4.54580785, 3.55777244, -1.40944978, 0.275418278, -0.0205938816],
  [-1.21051378, 1.60812989, -0.621178141, 0.0716373224],
  [-2.720337, 4.57586331, -3.18369245, 1.1168348, -0.19268305, 0.012913842],
]

// R15-11, Table 6: the reference compressibility of the industrial form, by upper limit of rho / rho_c.
const industrial = [
  [
    0.310559006, 6.53786807199516, -5.61149954923348, 3.39624167361325, -2.27492629730878,
    10.2631854662709, 1.97815050331519,
  ],
  [
    0.776397516, 6.52717759281799, -6.30816983387575, 8.08379285492595, -9.82240510197603,
    12.1358413791395, -5.54349664571295,
  ],
  [
    1.242236025, 5.35500529896124, -3.96415689925446, 8.91990208918795, -12.033872950579,
    9.19494865194302, -2.16866274479712,
  ],
  [
    1.863354037, 1.55225959906681, 0.464621290821181, 8.93237374861479, -11.0321960061126,
    6.1677809993336, -0.965458722086812,
  ],
  [
    Number.POSITIVE_INFINITY, 1.11999926419994, 0.595748562571649, 9.8895256507892,
    -10.325505114704, 4.66861294457414, -0.503243546373828,
  ],
]

/** What the critical enhancement of the conductivity needs of a state. */
export type Responses = Pick<ScientificState, 'cp' | 'cv' | 'rhoP'>

/** R15-11 Eqs. (18) to (22) for given responses and viscosity (Pa s). */
function conductivityEnhancement(
  rho: number,
  T: number,
  { cp, cv, rhoP }: Responses,
  reference: number,
  mu: number,
): number {
  const delta = rho / rhoC
  const y = correlationLength(rho, T, rhoP, reference) / 0.4
  if (y < 1.2e-7) return 0
  const ratio = cv / cp
  const Z =
    (2 / (Math.PI * y)) *
    ((1 - ratio) * Math.atan(y) + ratio * y - (1 - Math.exp(-1 / (1 / y + y ** 2 / (3 * delta ** 2)))))
  return (177.8514 * delta * (cp / 461.51805) * (T / Tc) * Z) / (mu * 1e6)
}

/** Without enhancement, W/(m K), R15-11 Eqs. (16) and (17). */
export function conductivityBackground(rho: number, T: number): number {
  const t = T / Tc
  const delta = rho / rhoC
  const first = Math.sqrt(t) / diluteConductivity.reduce((sum, L, i) => sum + L / t ** i, 0)
  let sum = 0
  denseConductivity.forEach((row, i) => {
    row.forEach((L, j) => {
      sum += L * (1 / t - 1) ** i * (delta - 1) ** j
    })
  })
  return first * Math.exp(delta * sum) * 1e-3
}

/** Thermal conductivity, W/(m K), of the scientific formulation. */
export function conductivity(rho: number, T: number): number {
  const state = scientificState(rho, T)
  const reference = scientificState(rho, 1.5 * Tc).rhoP
  const mu = viscosity(rho, T, true)
  return conductivityBackground(rho, T) + conductivityEnhancement(rho, T, state, reference, mu) * 1e-3
}

/** Thermal conductivity, W/(m K), of the industrial formulation from responses by IF97. */
export function industrialConductivity(rho: number, T: number, responses: Responses): number {
  const delta = rho / rhoC
  const row = industrial.find(([limit]) => delta <= (limit as number)) ?? []
  const sum = row.slice(1).reduce((total, a, i) => total + a * delta ** i, 0)
  const reference = ((1 / sum) * rhoC) / pc
  const mu = viscosity(rho, T, false)
  return (
    conductivityBackground(rho, T) + conductivityEnhancement(rho, T, responses, reference, mu) * 1e-3
  )
}

/** Surface tension, N/m, at T (K), R1-76(2014) Eq. (1). */
export function surfaceTension(T: number): number {
  const tau = 1 - T / Tc
  return 0.2358 * tau ** 1.256 * (1 - 0.625 * tau)
}

/** Pressure (Pa) on the sublimation or a melting curve at T (K), R14-08 Eqs. (1) to (6). */
export function phaseChangePressure(curve: string, T: number): number {
  const part = (reference: number): number => T / reference
  if (curve === 'sublimation') {
    const t = part(273.16)
    const sum =
      -21.2144006 * t ** 0.00333333333 + 27.3203819 * t ** 1.20666667 - 6.1059813 * t ** 1.70333333
    return 611.657 * Math.exp(sum / t)
  }
  if (curve === 'ice_Ih') {
    const t = part(273.16)
    return (
      611.657 *
      (1 + 1195393.37 * (1 - t ** 3) + 80818.3159 * (1 - t ** 25.75) + 3338.2686 * (1 - t ** 103.75))
    )
  }
  if (curve === 'ice_III') return 208.566e6 * (1 - 0.299948 * (1 - part(251.165) ** 60))
  if (curve === 'ice_V') return 350.1e6 * (1 - 1.18721 * (1 - part(256.164) ** 8))
  if (curve === 'ice_VI') return 632.4e6 * (1 - 1.07476 * (1 - part(273.31) ** 4.6))
  const t = part(355)
  return (
    2216e6 *
    Math.exp(1.73683 * (1 - 1 / t) - 0.0544606 * (1 - t ** 5) + 8.06106e-8 * (1 - t ** 22))
  )
}
