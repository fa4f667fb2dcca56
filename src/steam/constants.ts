/** Constants and limits of IAPWS-IF97 (R7-97(2012)), SI units. */

/** Specific gas constant of water, J/(kg K), Eq. (1). */
export const gasConstant = 461.526

/** Critical temperature, K, Eq. (2). */
export const criticalTemperature = 647.096

/** Critical pressure, Pa, Eq. (3). */
export const criticalPressure = 22.064e6

/** Critical density, kg/m3, Eq. (4). */
export const criticalDensity = 322

/** Lowest temperature of the formulation, K. */
export const lowestTemperature = 273.15

/** Highest temperature of regions 1 to 3, K; above it region 5 holds to 50 MPa. */
export const highestTemperature25 = 1073.15

/** Highest temperature of the formulation, K. */
export const highestTemperature = 2273.15

/** Highest pressure up to 1073.15 K, Pa. */
export const highestPressure = 100e6

/** Highest pressure above 1073.15 K (region 5), Pa. */
export const highestPressure5 = 50e6

/** Border temperature of regions 1 and 3, K. */
export const borderTemperature13 = 623.15

/** Saturation pressure at 273.15 K by Eq. (30), Pa: below it there is steam only. */
export const lowestSaturationPressure = 611.2126774443449

/** Saturation pressure at 623.15 K by Eq. (30), Pa: above it saturated states are region 3's. */
export const borderPressure13 = 16529164.25260448

/**
 * Lowest pressure accepted, Pa. The formulation has no lower limit; a condenser never gets there.
 */
export const lowestPressure = 1
