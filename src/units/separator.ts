import { equal, massBalance, plus, times } from '../equations/expression/index.ts'
import { liquidEnthalpy, moisture } from '../steam/operations.ts'
import { commonPractice, energy, pressureLoss, pressureLossFraction } from './common.ts'
import { defineUnitKind } from './kind.ts'
import { moistureOf } from './wetness.ts'

export const separator = defineUnitKind({
  name: 'separator',
  label: 'Separator',
  idStem: 'separator',
  group: 'Vessels',
  help: 'Takes moisture out of wet steam between two turbine sections.',
  ports: {
    inlet: { direction: 'in', carries: 'steam', pressure: 'own', label: 'Inlet' },
    steam: { direction: 'out', carries: 'steam', pressure: 'own', label: 'Steam' },
    drain: { direction: 'out', carries: 'water', pressure: 'own', label: 'Drain' },
  },
  quantities: {
    effectiveness: {
      label: 'Effectiveness',
      symbol: 'ε',
      dimension: 'ratio',
      help: 'Part of the entering moisture that leaves with the drain.',
      usual: 0.98,
      given: true,
      range: [0.9, 1],
      basis: commonPractice,
      possible: { least: 0, most: 1 },
      step: 0.01,
    },
    pressureLossFraction: pressureLossFraction(0.02, [0.01, 0.05]),
  },
  equations: ({ ports: { inlet, steam, drain }, quantities: q }) => ({
    massBalance: massBalance(plus(steam.m, drain.m), inlet.m),
    energyBalance: equal(energy(inlet), plus(energy(steam), energy(drain))),
    steamPressure: pressureLoss(inlet, steam, q.pressureLossFraction),
    drainPressure: equal(drain.p, steam.p),
    // Moisture as it is at the outlet pressure, before anything is parted.
    moistureFlow: equal(
      drain.m,
      times(times(q.effectiveness, moisture(steam.p, inlet.h)), inlet.m),
    ),
    drainState: equal(drain.h, liquidEnthalpy(drain.p)),
  }),
  cautions: ({ port }) =>
    moistureOf(port('inlet')) === 0
      ? [
          {
            code: 'nothing-to-separate',
            quantities: ['inlet.x', 'inlet.T'],
            message: 'the steam arrives dry, so that there is nothing to separate.',
            values: [],
            advice: 'Leave it out, or check the state before it.',
          },
        ]
      : [],
  secondLaw: 'adiabatic',
  paths: () => [
    { from: 'inlet', to: 'steam', course: 'line' },
    { from: 'inlet', to: 'drain', course: 'line' },
  ],
  passes: [['inlet', 'steam']],
  starts: { steam: 'dry', drain: 'liquid' },
})
