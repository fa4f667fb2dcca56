import { equal, massBalance, minus, plus, times } from '../equations/expression/index.ts'
import {
  efficiencyOfFiring,
  energy,
  fuelHeat,
  heat,
  lossConstant,
  lossLaw,
  pressureLoss,
  pressureLossFraction,
} from './common.ts'
import { defineUnitKind } from './kind.ts'
import { moistureOf } from './wetness.ts'

export const reheater = defineUnitKind({
  name: 'reheater',
  label: 'Reheater',
  idStem: 'reheater',
  group: 'Heat',
  help: 'Heats steam between two turbine sections by burning fuel.',
  ports: {
    inlet: { direction: 'in', carries: 'steam', pressure: 'own', label: 'Inlet' },
    spray: {
      direction: 'in',
      optional: true,
      carries: 'water',
      pressure: 'throttles',
      label: 'Spray',
    },
    outlet: {
      direction: 'out',
      carries: 'steam',
      pressure: 'own',
      designed: ['p', 'T'],
      label: 'Outlet',
    },
  },
  quantities: {
    pressureLossFraction: pressureLossFraction(0.08, [0.07, 0.1]),
    lossConstant,
    heat: heat('Heat to the steam', 'Heat that the reheated steam takes up.'),
    efficiency: efficiencyOfFiring,
    fuelHeat,
  },
  chief: 'heat',
  equations: ({ ports: { inlet, spray, outlet }, quantities: q }) => ({
    massBalance: massBalance(outlet.m, spray ? plus(inlet.m, spray.m) : inlet.m),
    pressureLoss: pressureLoss(inlet, outlet, q.pressureLossFraction),
    lossLaw: lossLaw(inlet, outlet, q.lossConstant),
    energyBalance: equal(
      q.heat,
      minus(energy(outlet), spray ? plus(energy(inlet), energy(spray)) : energy(inlet)),
    ),
    fuel: equal(times(q.fuelHeat, q.efficiency), q.heat),
  }),
  totals: ({ quantities: q }) => ({ heatInput: q.heat, fuelHeat: q.fuelHeat }),
  freezing: () => [{ quantity: 'lossConstant', frees: ['pressureLossFraction'] }],
  cautions: ({ port }) => {
    const moisture = moistureOf(port('outlet'))
    return moisture > 0
      ? [
          {
            code: 'wet-steam',
            quantities: ['outlet.x', 'outlet.T'],
            message: 'the steam leaves with {0} of moisture, where it should be superheated.',
            values: [[moisture, 'ratio']],
            advice: 'Give a higher outlet temperature, or spray less.',
          },
        ]
      : []
  },
  secondLaw: 'fired',
  paths: (shape) => [
    { from: 'inlet', to: 'outlet', course: 'line' },
    ...((shape.streams.spray ?? 0) > 0
      ? [{ from: 'spray', to: 'outlet', course: 'throttledLine' as const }]
      : []),
  ],
  passes: [['inlet', 'outlet']],
  starts: { outlet: 'superheated' },
})
