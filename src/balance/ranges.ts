import type { Bounds } from '../equations/newton/index.ts'
import type { Dimension } from '../quantity/dimension.ts'
import type { SystemVariable } from './system.ts'

/**
 * By dimension, SI: the range in which an answer is looked for, and a size that makes changes of
 * different quantities comparable. Ranges are those of the steam formulation (IAPWS-IF97) where it
 * sets them, otherwise wide enough for any plant.
 */
const ranges: Readonly<Record<Dimension, readonly [lower: number, upper: number, scale: number]>> =
  {
    massFlow: [-1e6, 1e6, 100],
    pressure: [10, 100e6, 1e6],
    pressureDifference: [-100e6, 100e6, 1e6],
    temperature: [273.15, 2273.15, 300],
    temperatureDifference: [-2000, 2000, 30],
    specificEnthalpy: [-100, 7.4e6, 1e6],
    specificEntropy: [-10, 14e3, 1e3],
    specificVolume: [1e-4, 1e6, 1],
    specificHeat: [1, 1e6, 1e3],
    power: [-1e13, 1e13, 1e7],
    heatFlow: [-1e13, 1e13, 1e7],
    ratio: [-100, 100, 1],
    dryness: [-50, 50, 1],
    number: [-1e6, 1e6, 1],
    area: [0, 1e6, 10],
    velocity: [-1e5, 1e5, 100],
    volumeFlow: [-1e6, 1e6, 1],
    length: [-1e5, 1e5, 10],
    conductance: [0, 1e15, 1e6],
    heatRate: [-1e6, 1e6, 1],
    steamRate: [-1, 1, 1e-6],
    entropyFlow: [-1e10, 1e10, 1e4],
    flowConstant: [0, 1e9, 0.1],
    lossConstant: [0, 1e20, 1e4],
  }

/** A reversed flow this small, as a part of the scale, is round-off on the way to no flow. */
const flowSlack = 1e-8

export function boundsOf(variables: readonly SystemVariable[]): Bounds {
  const count = variables.length
  const lower = new Float64Array(count)
  const upper = new Float64Array(count)
  const sensibleLower = new Float64Array(count)
  const sensibleUpper = new Float64Array(count)
  const scale = new Float64Array(count)
  const carrier = new Int32Array(count).fill(-1)
  variables.forEach(({ description, isState, isPhantom }, k) => {
    const { dimension, possible } = description
    const range = ranges[dimension]
    lower[k] = range[0]
    upper[k] = range[1]
    scale[k] = range[2]
    // m, p and h of a stream follow each other.
    if (isState && dimension === 'specificEnthalpy') carrier[k] = k - 2
    const isFlow = dimension === 'massFlow' && (isState || isPhantom)
    sensibleLower[k] = isFlow
      ? -flowSlack * range[2]
      : Math.max(range[0], (possible?.least ?? possible?.above ?? range[0]) - 1e-9)
    sensibleUpper[k] = Math.min(range[1], (possible?.most ?? possible?.below ?? range[1]) + 1e-9)
  })
  return { lower, upper, sensibleLower, sensibleUpper, scale, carrier }
}

/** A value of ordinary size for a quantity of which nothing is known. */
export function ordinaryValue({ description }: SystemVariable): number {
  if (description.usual !== undefined) return description.usual
  if (description.range !== undefined) return (description.range[0] + description.range[1]) / 2
  // A part of something: a share, a loss.
  if (description.dimension === 'ratio') return 0.1
  const [lower, , scale] = ranges[description.dimension]
  return Math.max(lower, scale)
}
