import { equal, massBalance, minus, times } from '../equations/expression/index.ts'
import { heat, pressureLoss, pressureLossFraction } from './common.ts'
import { transfer } from './heat-transfer.ts'
import { defineUnitKind } from './kind.ts'
import { changesPhase } from './wetness.ts'

export const heatExchanger = defineUnitKind({
  name: 'heatExchanger',
  label: 'Heat exchanger',
  idStem: 'exchanger',
  group: 'Heaters',
  help: 'Two streams in counterflow that do not change phase: a drain cooler, a gland cooler.',
  ports: {
    hot: { direction: 'in', carries: 'any', pressure: 'own', label: 'Hot inlet' },
    cold: { direction: 'in', carries: 'any', pressure: 'own', label: 'Cold inlet' },
    hotOutlet: { direction: 'out', carries: 'any', pressure: 'own', label: 'Hot outlet' },
    coldOutlet: { direction: 'out', carries: 'any', pressure: 'own', label: 'Cold outlet' },
  },
  quantities: {
    heat: heat('Duty', 'Heat that passes from the hot to the cold stream.'),
    conductance: {
      label: 'Conductance',
      symbol: 'UA',
      dimension: 'conductance',
      help: 'Heat divided by the logarithmic mean temperature difference.',
      possible: { least: 0 },
      step: 1e4,
    },
    hotEndDifference: {
      label: 'Hot end difference',
      symbol: 'ΔTh',
      dimension: 'temperatureDifference',
      help: 'Hot inlet temperature less cold outlet temperature.',
      possible: { least: 0 },
      step: 1,
    },
    coldEndDifference: {
      label: 'Cold end difference',
      symbol: 'ΔTc',
      dimension: 'temperatureDifference',
      help: 'Hot outlet temperature less cold inlet temperature.',
      possible: { least: 0 },
      step: 1,
    },
    hotLossFraction: {
      ...pressureLossFraction(0.02, [0.005, 0.05]),
      label: 'Hot side pressure loss',
    },
    coldLossFraction: {
      ...pressureLossFraction(0.02, [0.005, 0.05]),
      label: 'Cold side pressure loss',
    },
  },
  chief: 'heat',
  equations: ({ ports: { hot, cold, hotOutlet, coldOutlet }, quantities: q }) => ({
    hotMassBalance: massBalance(hotOutlet.m, hot.m),
    coldMassBalance: massBalance(coldOutlet.m, cold.m),
    hotPressureLoss: pressureLoss(hot, hotOutlet, q.hotLossFraction),
    coldPressureLoss: pressureLoss(cold, coldOutlet, q.coldLossFraction),
    hotEnergyBalance: equal(q.heat, times(hot.m, minus(hot.h, hotOutlet.h))),
    coldEnergyBalance: equal(q.heat, times(cold.m, minus(coldOutlet.h, cold.h))),
    hotEndDifference: equal(q.hotEndDifference, minus(hot.T, coldOutlet.T)),
    coldEndDifference: equal(q.coldEndDifference, minus(hotOutlet.T, cold.T)),
    heatTransfer: transfer(
      'the exchanger',
      q.conductance,
      q.heat,
      q.hotEndDifference,
      q.coldEndDifference,
      'hot',
    ),
  }),
  freezing: () => [
    { quantity: 'conductance', frees: ['heat', 'hotEndDifference', 'coldEndDifference'] },
  ],
  cautions: ({ port }) =>
    (['hot', 'cold'] as const)
      .filter((side) => changesPhase(port(side), port(`${side}Outlet`)))
      .map((side) => ({
        code: 'change-of-phase',
        quantities: [`${side}Outlet.T`, `${side}Outlet.x`, `${side}.x`],
        message: `its ${side} side boils or condenses inside, where one logarithmic mean does not hold.`,
        values: [],
        advice:
          'Use a surface heater, whose zones are told apart, or keep that side off saturation.',
      })),
  secondLaw: 'adiabatic',
  paths: () => [
    { from: 'hot', to: 'hotOutlet', course: 'line' },
    { from: 'cold', to: 'coldOutlet', course: 'line' },
  ],
  heatPassage: {
    cold: { from: 'cold', to: 'coldOutlet' },
    hot: { from: 'hot', to: 'hotOutlet' },
    shell: 'counterflow',
    differences: [
      { quantity: 'hotEndDifference', end: 'hot' },
      { quantity: 'coldEndDifference', end: 'cold' },
    ],
  },
  passes: [
    ['hot', 'hotOutlet'],
    ['cold', 'coldOutlet'],
  ],
  starts: { hotOutlet: { as: 'hot' }, coldOutlet: { as: 'cold' } },
})
