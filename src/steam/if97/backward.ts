/**
 * Backward equations that are only needed off the hot path, summed row by row: pressure from
 * enthalpy and entropy (IAPWS SR2-01(2014), SR4-04(2014)), the borders of regions in h and s
 * (SR4-04(2014)) and saturation in region 3 (SR3-03(2014)). SI units; all are first guesses.
 */
import { borderPressure23 } from './borders.ts'
import {
  boundary2ab,
  boundary13,
  boundary23Temperature,
  liquidEnthalpy1,
  liquidEnthalpy3a,
  saturationPressureOfEnthalpy,
  saturationPressureOfEntropy,
  saturationTemperatureOfEnthalpyEntropy,
  vapourEnthalpy2ab,
  vapourEnthalpy2c3b,
} from './rows/boundaries.ts'
import { region1PressureOfEnthalpyEntropy } from './rows/region1.ts'
import {
  region2aPressureOfEnthalpyEntropy,
  region2bPressureOfEnthalpyEntropy,
  region2cPressureOfEnthalpyEntropy,
} from './rows/region2.ts'
import {
  region3aPressureOfEnthalpyEntropy,
  region3bPressureOfEnthalpyEntropy,
} from './rows/region3.ts'
import type { Term } from './rows/term.ts'

/** Entropy at the critical point, J/(kg K) (SR4-04(2014), section 4). */
export const criticalEntropy = 4412.02148223476

// Entropies that part the equations, J/(kg K): s' and s'' at 623.15 K, the boundary 2b/2c, and the
// region 2b of p(h, s).
const liquidEntropy13 = 3778.28134
const vapourEntropy23 = 5210.887825
const entropy2bc = 5850

/** sum of n x^I y^J. */
export function sumOfTerms(rows: readonly Term[], x: number, y: number): number {
  let sum = 0
  for (const { I, J, n } of rows) sum += n * x ** I * y ** J
  return sum
}

/** Region 1: p (Pa) of h (J/kg) and s (J/(kg K)), SR2-01 Eq. (1). */
export function region1Pressure(h: number, s: number): number {
  return 100e6 * sumOfTerms(region1PressureOfEnthalpyEntropy, h / 3.4e6 + 0.05, s / 7.6e3 + 0.05)
}

/** Boundary 2a/2b: h (J/kg) of s (J/(kg K)), SR2-01 Eq. (2). */
export function boundary2abEnthalpy(s: number): number {
  const sigma = s * 1e-3
  const [a, b, c, d] = boundary2ab
  return 1e3 * (a + sigma * (b + sigma * (c + sigma * d)))
}

/** Region 2: p (Pa) of h (J/kg) and s (J/(kg K)), SR2-01 Eqs. (3) to (5). */
export function region2Pressure(h: number, s: number): number {
  if (h <= boundary2abEnthalpy(s)) {
    return 4e6 * sumOfTerms(region2aPressureOfEnthalpyEntropy, h / 4.2e6 - 0.5, s / 12e3 - 1.2) ** 4
  }
  if (s >= entropy2bc) {
    return (
      100e6 * sumOfTerms(region2bPressureOfEnthalpyEntropy, h / 4.1e6 - 0.6, s / 7.9e3 - 1.01) ** 4
    )
  }
  return (
    100e6 * sumOfTerms(region2cPressureOfEnthalpyEntropy, h / 3.5e6 - 0.7, s / 5.9e3 - 1.1) ** 4
  )
}

/** Region 3: p (Pa) of h (J/kg) and s (J/(kg K)), SR4-04 Eqs. (1) and (2). */
export function region3Pressure(h: number, s: number): number {
  if (s <= criticalEntropy) {
    return 99e6 * sumOfTerms(region3aPressureOfEnthalpyEntropy, h / 2.3e6 - 1.01, s / 4.4e3 - 0.75)
  }
  return (
    16.6e6 / sumOfTerms(region3bPressureOfEnthalpyEntropy, h / 2.8e6 - 0.681, s / 5.3e3 - 0.792)
  )
}

/** h' (J/kg) of s (J/(kg K)), SR4-04 Eqs. (3) and (4). */
export function liquidEnthalpyOf(s: number): number {
  const sigma = s / 3.8e3
  const rows = s <= liquidEntropy13 ? liquidEnthalpy1 : liquidEnthalpy3a
  return 1.7e6 * sumOfTerms(rows, sigma - 1.09, sigma + 0.366e-4)
}

/** h'' (J/kg) of s (J/(kg K)), SR4-04 Eqs. (5) and (6). */
export function vapourEnthalpyOf(s: number): number {
  if (s >= entropy2bc) {
    return 2.8e6 * Math.exp(sumOfTerms(vapourEnthalpy2ab, 5.21e3 / s - 0.513, s / 9.2e3 - 0.524))
  }
  const sigma = s / 5.9e3
  return 2.8e6 * sumOfTerms(vapourEnthalpy2c3b, sigma - 1.02, sigma - 0.726) ** 4
}

/** Boundary 1/3: h (J/kg) of s (J/(kg K)), SR4-04 Eq. (7). */
export function boundary13Enthalpy(s: number): number {
  const sigma = s / 3.8e3
  return 1.7e6 * sumOfTerms(boundary13, sigma - 0.884, sigma - 0.864)
}

/** Boundary 2/3: T (K) of h (J/kg) and s (J/(kg K)), SR4-04 Eq. (8). */
export function boundary23TemperatureOf(h: number, s: number): number {
  return 900 * sumOfTerms(boundary23Temperature, h / 3e6 - 0.727, s / 5.3e3 - 0.864)
}

/**
 * Wet steam: T (K) of h (J/kg) and s (J/(kg K)) for s of at least s''(623.15 K), SR4-04 Eq. (9).
 */
export function saturationTemperatureOfBoth(h: number, s: number): number {
  return (
    550 * sumOfTerms(saturationTemperatureOfEnthalpyEntropy, h / 2.8e6 - 0.119, s / 9.2e3 - 1.07)
  )
}

/** Saturation in region 3: p (Pa) of h' or h'' (J/kg), SR3-03 Eq. (10). */
export function saturationPressure3OfEnthalpy(h: number): number {
  return 22e6 * sumOfTerms(saturationPressureOfEnthalpy, h / 2.6e6 - 1.02, h / 2.6e6 - 0.608)
}

/** Saturation in region 3: p (Pa) of s' or s'' (J/(kg K)), SR3-03 Eq. (11). */
export function saturationPressure3OfEntropy(s: number): number {
  return 22e6 * sumOfTerms(saturationPressureOfEntropy, s / 5.2e3 - 1.03, s / 5.2e3 - 0.699)
}

/**
 * A first guess of p (Pa) from h (J/kg) and s (J/(kg K)); 0 within the wet region below s''(623.15
 * K).
 */
export function pressureGuess(h: number, s: number): number {
  if (s <= criticalEntropy) {
    if (h < liquidEnthalpyOf(Math.max(s, -0.15))) return 0
    if (s < 3397.782955 || (s <= liquidEntropy13 && h <= boundary13Enthalpy(s))) {
      return region1Pressure(h, s)
    }
    return region3Pressure(h, s)
  }
  if (s < 9155.759395 && h < vapourEnthalpyOf(s)) return 0
  if (s < 5048.096828) return region3Pressure(h, s)
  if (s < 5260.578707) {
    if (h <= 2563.592004e3 && s < vapourEntropy23) return region3Pressure(h, s)
    const inside = h > 2563.592004e3 && h < 2812.942061e3
    if (inside && region3Pressure(h, s) > borderPressure23(boundary23TemperatureOf(h, s))) {
      return region3Pressure(h, s)
    }
  }
  return region2Pressure(h, s)
}
