/** The generated sums: the committed files, their values and the shorter sums of low pressures. */
import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { unrolledFiles } from '../../src/steam/if97/generate.ts'
import { region1 } from '../../src/steam/if97/rows/region1.ts'
import { region2Ideal, region2Residual } from '../../src/steam/if97/rows/region2.ts'
import { region3, region3LogDelta } from '../../src/steam/if97/rows/region3.ts'
import { region5Ideal, region5Residual } from '../../src/steam/if97/rows/region5.ts'
import type { Term } from '../../src/steam/if97/rows/term.ts'
import { saturationTemperatureOf } from '../../src/steam/if97/saturation-line.ts'
import { region1Potential, region1Slopes } from '../../src/steam/if97/unrolled-region1.ts'
import {
  lowPressure2,
  region2LowPotential,
  region2LowSlopes,
  region2Potential,
  region2Slopes,
} from '../../src/steam/if97/unrolled-region2.ts'
import { region3Potential } from '../../src/steam/if97/unrolled-region3.ts'
import { region5Potential } from '../../src/steam/if97/unrolled-region5.ts'
import { type Potential, plainSum } from '../reference/plain-if97.ts'

const g = new Float64Array(12)

function run(sum: (g: Float64Array) => void, ...inputs: number[]): number[] {
  inputs.forEach((value, i) => {
    g[6 + i] = value
  })
  sum(g)
  return [...g.subarray(0, 6)]
}

function inOrder({ f, fx, fxx, fy, fxy, fyy }: Potential): number[] {
  return [f, fx, fxx, fy, fxy, fyy]
}

/** Sums of the terms' sizes: round-off is a part of these, not of what is left after they cancel. */
function sizes(rows: readonly Term[], x: number, y: number): number[] {
  const sums = [0, 0, 0, 0, 0, 0]
  for (const row of rows) {
    inOrder(plainSum([row], x, y)).forEach((value, i) => {
      sums[i] = (sums[i] as number) + Math.abs(value)
    })
  }
  return sums
}

function expectClose(value: number[], expected: number[], scale: number[], limit = 3e-14): void {
  value.forEach((one, i) => {
    const size = Math.max(scale[i] as number, Math.abs(expected[i] as number), 1e-300)
    expect(Math.abs(one - (expected[i] as number)) / size, `derivative ${i}`).toBeLessThan(limit)
  })
}

describe('generated files', () => {
  for (const [name, text] of unrolledFiles()) {
    it(`${name} is what generate.ts writes from the rows`, () => {
      const committed = readFileSync(
        new URL(`../../src/steam/if97/${name}`, import.meta.url),
        'utf8',
      )
      expect(committed === text, 'run node --import tsx test/steam/unroll.ts').toBe(true)
    })
  }
})

describe('sums against the published form with Math.pow', () => {
  it('region 1', () => {
    for (let p = 0.1; p <= 100; p *= 1.7) {
      for (let T = 274; T < 624; T += 23) {
        const x = 7.1 - p / 16.53
        const y = 1386 / T - 1.222
        const plain = inOrder(plainSum(region1, x, y))
        const scale = sizes(region1, x, y)
        const expected = [
          plain[0],
          -plain[1]!,
          plain[2],
          plain[3],
          -plain[4]!,
          plain[5],
        ] as number[]
        expectClose(run(region1Potential, x, y), expected, scale)
        const slopes = run(region1Slopes, x, y)
        expectClose(slopes.slice(0, 2), [expected[3]!, expected[5]!], [scale[3]!, scale[5]!])
        expectThird(
          (at) => run(region1Potential, x, at),
          y,
          // x falls as the pressure rises, so that all is taken at one x
          () => [...g.subarray(9)],
        )
      }
    }
  })

  it('region 2', () => {
    for (let p = 1e-4; p <= 100; p *= 2.3) {
      for (let T = 300; T < 1073; T += 31) {
        if (p > 0.003 && p < 22 && T < saturationTemperatureOf(p * 1e6)) continue
        if (p >= 22 && T < 850) continue
        const tau = 540 / T
        const { f, fx, fxx, fy, fxy, fyy } = plainSum(region2Residual, p, tau - 0.5)
        const o = plainSum(region2Ideal, 1, tau)
        const expected = [
          Math.log(p) + o.f + f,
          1 / p + fx,
          -1 / p ** 2 + fxx,
          o.fy + fy,
          fxy,
          o.fyy + fyy,
        ]
        const scale = sizes(region2Residual, p, tau - 0.5)
        expectClose(run(region2Potential, p, tau, Math.log(p)), expected, scale)
        const slopes = run(region2Slopes, p, tau)
        expectClose(slopes.slice(0, 2), [expected[3]!, expected[5]!], [scale[3]!, scale[5]!])
        expectThird(
          (at) => run(region2Potential, p, at, Math.log(p)),
          tau,
          () => [...g.subarray(9)],
        )
      }
    }
  })

  it('region 3', () => {
    for (let rho = 80; rho < 750; rho += 37) {
      for (let T = 624; T < 860; T += 29) {
        const delta = rho / 322
        const tau = 647.096 / T
        const plain = plainSum(region3, delta, tau)
        plain.f += region3LogDelta * Math.log(delta)
        plain.fx += region3LogDelta / delta
        plain.fxx -= region3LogDelta / delta ** 2
        const scale = sizes(region3, delta, tau)
        expectClose(run(region3Potential, delta, tau, Math.log(delta)), inOrder(plain), scale)
      }
    }
  })

  it('region 5', () => {
    for (let p = 1e-3; p <= 50; p *= 3) {
      for (let T = 1080; T < 2270; T += 110) {
        const tau = 1000 / T
        const { f, fx, fxx, fy, fxy, fyy } = plainSum(region5Residual, p, tau)
        const o = plainSum(region5Ideal, 1, tau)
        const expected = [
          Math.log(p) + o.f + f,
          1 / p + fx,
          -1 / p ** 2 + fxx,
          o.fy + fy,
          fxy,
          o.fyy + fyy,
        ]
        expectClose(run(region5Potential, p, tau, Math.log(p)), expected, expected.map(Math.abs))
      }
    }
  })

  /** The derivatives to tau of d2/dtau2, d2/dpidtau and d2/dpi2, against central differences. */
  function expectThird(potential: (y: number) => number[], y: number, third: () => number[]): void {
    const step = 3e-5 * y
    const [after, before] = [potential(y + step), potential(y - step)]
    potential(y)
    const got = third()
    for (const [i, second] of [5, 4, 2].entries()) {
      const difference = (after[second]! - before[second]!) / (2 * step)
      const scale = Math.abs(difference) + 1e-4 * Math.abs(after[second]!)
      expect(Math.abs(difference - got[i]!), `third derivative ${i}`).toBeLessThan(1e-5 * scale)
    }
  }
})

describe('shorter sums of region 2 below 0.3 MPa', () => {
  it('are the full ones to round-off', () => {
    for (let p = 612e-6; p <= lowPressure2; p *= 1.13) {
      const saturated = saturationTemperatureOf(p * 1e6)
      for (let T = saturated; T < 1073; T += 17) {
        const tau = 540 / T
        const full = run(region2Potential, p, tau, Math.log(p))
        const short = run(region2LowPotential, p, tau, Math.log(p))
        const scale = [1, 1 / p, 1 / p ** 2, 4, 1 / p, 4]
        expectClose(short, full, scale, 4e-15)
        const slopes = run(region2Slopes, p, tau)
        expectClose(run(region2LowSlopes, p, tau).slice(0, 2), slopes.slice(0, 2), [4, 4], 4e-15)
      }
    }
  })
})
