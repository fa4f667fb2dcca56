/** The polynomials of saturated states against the forward equations that they stand for. */
import { expect, test } from 'vitest'
import { borderPressure13, lowestSaturationPressure } from '../../src/steam/constants.ts'
import { POINT_SIZE, Point, region1Point, region2Point } from '../../src/steam/if97/point.ts'
import { saturationSlope, saturationTemperatureOf } from '../../src/steam/if97/saturation-line.ts'
import { SATURATION_SIZE, Saturation, saturationAtPressure } from '../../src/steam/index.ts'

const record = new Float64Array(SATURATION_SIZE)
const liquid = new Float64Array(POINT_SIZE)
const vapour = new Float64Array(POINT_SIZE)

/** Pressures over the whole line, both ends included, and either side of each step's border. */
function pressures(): number[] {
  const all: number[] = []
  const most = borderPressure13 / lowestSaturationPressure
  for (let i = 0; i <= 2000; i++) all.push(lowestSaturationPressure * most ** (i / 2000))
  for (let step = 11; step <= 129; step++) {
    const p = 1e6 * (step / 64) ** 4
    all.push(p * (1 - 1e-13), p, p * (1 + 1e-13))
  }
  return all.map((p) => Math.min(p, borderPressure13))
}

// The sums of regions 1 and 2 keep 1e-15 at low pressures and 1e-13 near 16 MPa, where large terms
// cancel. A slope of a polynomial through such values keeps two or three digits less.
test('saturated states are those of the forward equations to their round-off', () => {
  let refused = 0
  let worst = 0
  let worstT = 0
  let worstSlope = 0
  for (const p of pressures()) {
    refused += saturationAtPressure(record, 0, p)
    const T = saturationTemperatureOf(p)
    const slope = saturationSlope(p, T)
    worstT = Math.max(worstT, Math.abs((record[Saturation.T] as number) / T - 1))
    worstSlope = Math.max(worstSlope, Math.abs((record[Saturation.Tp] as number) / slope - 1))
    region1Point(liquid, p, T)
    region2Point(vapour, p, T)
    for (const [side, point] of [liquid, vapour].entries()) {
      const [h, s, v] = [Point.h, Point.s, Point.v].map((slot) => point[slot] as number)
      // h' and s' pass through zero at the triple point
      const scales = [Math.max(Math.abs(h as number), 1e5), Math.max(Math.abs(s as number), 1e3), v]
      const along = [
        (point[Point.hp] as number) + (point[Point.cp] as number) * slope,
        ((point[Point.cp] as number) / T) * slope - (point[Point.vT] as number),
        (point[Point.vp] as number) + (point[Point.vT] as number) * slope,
      ]
      for (const [k, value] of [h, s, v].entries()) {
        const got = record[Saturation.hL + 2 * k + side] as number
        const gotSlope = record[Saturation.hLp + 2 * k + side] as number
        const scale = scales[k] as number
        worst = Math.max(worst, Math.abs(got - (value as number)) / scale)
        worstSlope = Math.max(worstSlope, (Math.abs(gotSlope - (along[k] as number)) * p) / scale)
      }
    }
  }
  expect(refused).toBe(0)
  expect(worstT).toBeLessThan(2e-14)
  expect(worst).toBeLessThan(3e-13)
  expect(worstSlope).toBeLessThan(1e-10)
})
