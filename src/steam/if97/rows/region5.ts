/** Region 5 of IAPWS R7-97(2012): steam, 1073.15 K <= T <= 2273.15 K, p <= 50 MPa. */
import type { Term } from './term.ts'

/**
 * IAPWS R7-97(2012), Table 37, Eq. (33): gamma0 = ln pi + sum of n tau^J, pi = p / 1 MPa, tau =
 * 1000 K / T (I is not used).
 */
export const region5Ideal: readonly Term[] = [
  { I: 0, J: 0, n: -0.13179983674201e2 },
  { I: 0, J: 1, n: 0.68540841634434e1 },
  { I: 0, J: -3, n: -0.24805148933466e-1 },
  { I: 0, J: -2, n: 0.36901534980333 },
  { I: 0, J: -1, n: -0.31161318213925e1 },
  { I: 0, J: 2, n: -0.32961626538917 },
]

/** IAPWS R7-97(2012), Table 38, Eq. (34): gammar = sum of n pi^I tau^J. */
export const region5Residual: readonly Term[] = [
  { I: 1, J: 1, n: 0.15736404855259e-2 },
  { I: 1, J: 2, n: 0.90153761673944e-3 },
  { I: 1, J: 3, n: -0.50270077677648e-2 },
  { I: 2, J: 3, n: 0.22440037409485e-5 },
  { I: 2, J: 9, n: -0.41163275453471e-5 },
  { I: 3, J: 7, n: 0.37919454822955e-7 },
]
