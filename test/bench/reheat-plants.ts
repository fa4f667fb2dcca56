import type { Layout } from '../../src/plant/document.ts'
import { Draft } from '../fuzz/draft.ts'

/*
 * Plants to measure with: a reheat plant with seven mixing heaters, as many of them side by side as
 * wanted, and one plant with a single turbine and as many heaters in a row as wanted.
 */

const pumpGivens = { efficiency: 0.8, driveEfficiency: 0.95 }
const pipeGivens = { pressureLossFraction: 0.04, heatLoss: 0 }

function turbineGivens(groups: number): Record<string, number> {
  const given: Record<string, number> = { wetnessFactor: 1, exhaustLoss: 0 }
  for (let k = 1; k <= groups; k++) given[`groupEfficiency${k}`] = 0.87
  return given
}

/** Bleed pressures of the casings, Pa, falling; the heaters stand in the opposite order. */
const bleeds = [[6.2e6], [1.9e6, 9.5e5], [3.6e5, 1.4e5, 5.4e4, 2.1e4]] as const

/** One plant of 30 units and 40 streams: 16.5 MPa, 811 K and back to 811 K, 120 kg/s. */
function addReheatPlant(draft: Draft): void {
  const boiler = draft.add('boiler', 'boiler', { pressureLossFraction: 0.08, efficiency: 0.9 })
  const reheater = draft.add('reheater', 'reheater', {
    pressureLossFraction: 0.08,
    efficiency: 0.9,
  })
  const casings = bleeds.map((list) =>
    draft.add('turbine', 'turbine', turbineGivens(list.length + 1)),
  ) as [string, string, string]
  const condenser = draft.add('condenser', 'condenser', {
    pressure: 5000,
    subcooling: 0,
    coolingInletT: 288.15,
    coolingRise: 10,
    coolingHeatCapacity: 4180,
  })
  draft.join(`${boiler}.steam`, `${casings[0]}.inlet`, { p: 16.5e6, T: 811.15, m: 120 })
  draft.join(`${casings[0]}.exhaust`, `${reheater}.inlet`, { p: 3.9e6 })
  draft.join(`${reheater}.outlet`, `${casings[1]}.inlet`, { T: 811.15 })
  draft.join(`${casings[1]}.exhaust`, `${casings[2]}.inlet`, { p: 6e5 })
  draft.join(`${casings[2]}.exhaust`, `${condenser}.steam1`)
  let water = `${condenser}.condensate`
  const rising = bleeds
    .flatMap((list, casing) =>
      list.map((p, k) => ({ p, port: `${casings[casing]}.bleed${k + 1}` })),
    )
    .reverse()
  for (const { p, port } of rising) {
    const pump = draft.add('pump', 'pump', pumpGivens)
    const heater = draft.add('mixingHeater', 'heater', { subcooling: 0 })
    const pipe = draft.add('pipe', 'pipe', pipeGivens)
    draft.join(port, `${pipe}.inlet`, { p })
    draft.join(`${pipe}.outlet`, `${heater}.steam1`)
    draft.join(water, `${pump}.suction`)
    draft.join(`${pump}.discharge`, `${heater}.water1`)
    water = `${heater}.outlet`
  }
  const feed = draft.add('pump', 'pump', pumpGivens)
  draft.join(water, `${feed}.suction`)
  draft.join(`${feed}.discharge`, `${boiler}.feedwater`)
  draft.addShaft(casings, [], true, {
    mechanicalEfficiency: 0.995,
    mechanicalLoss: 0,
    generatorEfficiency: 0.985,
    generatorLoss: 0,
  })
}

/** So many plants in one layout. The first plant's live steam is `s1`. */
export function reheatPlants(count: number): Layout {
  const draft = new Draft()
  for (let k = 0; k < count; k++) addReheatPlant(draft)
  return draft.layout()
}

/** One turbine with so many bleeds to mixing heaters with their pumps: three streams each. */
export function heaterRow(count: number): Layout {
  const draft = new Draft()
  const boiler = draft.add('boiler', 'boiler', { pressureLossFraction: 0.05, efficiency: 0.9 })
  const turbine = draft.add('turbine', 'turbine', turbineGivens(count + 1))
  const condenser = draft.add('condenser', 'condenser', {
    pressure: 5000,
    subcooling: 0,
    coolingHeatCapacity: 4180,
  })
  draft.join(`${boiler}.steam`, `${turbine}.inlet`, { p: 16e6, T: 830, m: 120 })
  const heaters = Array.from({ length: count }, () =>
    draft.add('mixingHeater', 'heater', { subcooling: 0 }),
  )
  for (let k = 0; k < count; k++) {
    const p = 5e6 * (15e3 / 5e6) ** ((k + 0.5) / count)
    draft.join(`${turbine}.bleed${k + 1}`, `${heaters[count - 1 - k]}.steam1`, { p })
  }
  draft.join(`${turbine}.exhaust`, `${condenser}.steam1`)
  let water = `${condenser}.condensate`
  for (const port of [...heaters.map((heater) => `${heater}.water1`), `${boiler}.feedwater`]) {
    const pump = draft.add('pump', 'pump', pumpGivens)
    draft.join(water, `${pump}.suction`)
    draft.join(`${pump}.discharge`, port)
    water = port.replace('.water1', '.outlet')
  }
  draft.addShaft([turbine], [], true, {
    mechanicalEfficiency: 0.995,
    mechanicalLoss: 0,
    generatorEfficiency: 0.985,
    generatorLoss: 0,
  })
  return draft.layout()
}
