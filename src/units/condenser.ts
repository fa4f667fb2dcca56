import {
  divide,
  type Equation,
  equal,
  exponential,
  massBalance,
  minus,
  negate,
  plus,
  times,
} from '../equations/expression/index.ts'
import { saturationTemperature, subcooling } from '../steam/operations.ts'
import { commonPractice, energy } from './common.ts'
import { defineUnitKind, type Shape } from './kind.ts'

const withExponents = (shape: Shape): boolean => shape.options.exponents === true

export const condenser = defineUnitKind({
  name: 'condenser',
  label: 'Condenser',
  idStem: 'condenser',
  group: 'Heaters',
  help: 'Condenses exhaust steam with cooling water.',
  ports: {
    steam: { direction: 'in', repeated: true, carries: 'steam', pressure: 'equal', label: 'Steam' },
    drain: {
      direction: 'in',
      repeated: true,
      optional: true,
      carries: 'any',
      pressure: 'throttles',
      label: 'Drain',
    },
    condensate: { direction: 'out', carries: 'water', pressure: 'equal', label: 'Condensate' },
  },
  quantities: {
    pressure: {
      label: 'Pressure',
      symbol: 'p',
      dimension: 'pressure',
      help: 'Pressure on the steam side.',
      usual: 5000,
      given: true,
      range: [3000, 10_000],
      basis: commonPractice,
      possible: { above: 0 },
      step: 1000,
    },
    subcooling: {
      label: 'Condensate subcooling',
      symbol: 'ΔTsub',
      dimension: 'temperatureDifference',
      help: 'Saturation temperature less condensate temperature.',
      usual: 0,
      given: true,
      range: [0, 3],
      basis: commonPractice,
      possible: { least: 0 },
      step: 1,
    },
    heat: {
      label: 'Heat rejected',
      symbol: 'Q',
      dimension: 'heatFlow',
      help: 'Heat that the cooling water carries away.',
      step: 1e6,
    },
    coolingInletT: {
      label: 'Cooling water inlet',
      symbol: 'Tcw',
      dimension: 'temperature',
      help: 'Temperature of the cooling water at the inlet.',
      step: 1,
    },
    coolingRise: {
      label: 'Cooling water rise',
      symbol: 'ΔTcw',
      dimension: 'temperatureDifference',
      help: 'Rise of the cooling water temperature.',
      range: [6, 14],
      basis: commonPractice,
      step: 1,
    },
    coolingFlow: {
      label: 'Cooling water flow',
      symbol: 'mcw',
      dimension: 'massFlow',
      help: 'Mass flow of the cooling water.',
      possible: { least: 0 },
      step: 100,
    },
    coolingHeatCapacity: {
      label: 'Cooling water heat capacity',
      symbol: 'cp',
      dimension: 'specificHeat',
      help: 'Specific heat capacity of the cooling water.',
      usual: 4180,
      given: true,
      range: [3900, 4200],
      basis: 'fresh to sea water at ambient temperature, common practice',
      possible: { above: 0 },
      step: 10,
    },
    terminalDifference: {
      label: 'Terminal difference',
      symbol: 'TTD',
      dimension: 'temperatureDifference',
      help: 'Saturation temperature less cooling water outlet temperature.',
      range: [2, 6],
      basis: commonPractice,
      possible: { least: 0 },
      step: 1,
    },
    conductance: {
      label: 'Conductance',
      symbol: 'UA',
      dimension: 'conductance',
      help: 'Heat divided by the logarithmic mean temperature difference; the shell at saturation.',
      possible: { least: 0 },
      step: 1e5,
    },
    conductanceExponent: {
      label: 'Conductance exponent',
      symbol: 'n',
      dimension: 'number',
      help: 'Power of the cooling water flow with which the conductance changes when the hardware is frozen.',
      usual: 0.5,
      given: true,
      range: [0, 1],
      basis: commonPractice,
      step: 0.1,
      when: withExponents,
    },
  },
  chief: 'heat',
  equations: ({ ports: { steam, drain, condensate }, quantities: q }) => {
    const entering = [...steam, ...drain]
    const initial = minus(saturationTemperature(q.pressure), q.coolingInletT)
    const capacity = times(q.coolingFlow, q.coolingHeatCapacity)
    const equations: Record<string, Equation> = {
      massBalance: massBalance(condensate.m, plus(...entering.map((stream) => stream.m))),
      energyBalance: equal(
        q.heat,
        minus(plus(...entering.map((stream) => energy(stream))), energy(condensate)),
      ),
      condensatePressure: equal(condensate.p, q.pressure),
      condensateState: equal(subcooling(condensate.p, condensate.h), q.subcooling),
      coolingBalance: equal(q.heat, times(capacity, q.coolingRise)),
      terminalDifference: equal(q.terminalDifference, minus(initial, q.coolingRise)),
      // Heat = conductance x LMTD in effectiveness form, which has an answer for every flow.
      heatTransfer: equal(
        q.terminalDifference,
        times(initial, exponential(negate(divide(q.conductance, capacity)))),
      ),
    }
    steam.forEach((stream, k) => {
      equations[`steamPressure${k + 1}`] = equal(stream.p, q.pressure)
    })
    return equations
  },
  totals: ({ quantities: q }) => ({ heatRejected: q.heat }),
  options: {
    exponents: {
      label: 'Flow exponent',
      help: 'The conductance changes with a power of the cooling water flow when the hardware is frozen.',
    },
  },
  freezing: ({ shape }) => [
    {
      quantity: 'conductance',
      frees: ['pressure', 'terminalDifference', 'coolingRise'],
      ...(withExponents(shape) && {
        law: { against: 'coolingFlow', exponent: 'conductanceExponent' },
      }),
    },
    { quantity: 'coolingFlow', frees: [], needs: 'conductance' },
    { quantity: 'coolingInletT', frees: [], needs: 'conductance' },
  ],
  secondLaw: 'losesHeat',
  paths: (shape) => [
    ...Array.from({ length: shape.streams.steam ?? 0 }, (_, k) => ({
      from: `steam${k + 1}`,
      to: 'condensate',
      course: 'line' as const,
    })),
    ...Array.from({ length: shape.streams.drain ?? 0 }, (_, k) => ({
      from: `drain${k + 1}`,
      to: 'condensate',
      course: 'throttledLine' as const,
    })),
  ],
  heatPassage: {
    cold: { inletTemperature: 'coolingInletT', rise: 'coolingRise' },
    hot: { from: 'steam', to: 'condensate' },
    shell: 'saturated',
    differences: [{ quantity: 'terminalDifference', end: 'hot', fromSaturation: true }],
  },
  starts: { condensate: 'liquid' },
})
