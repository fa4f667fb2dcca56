import { equal, massBalance, minus } from '../equations/expression/index.ts'
import {
  energy,
  heat,
  lossConstant,
  lossLaw,
  pressureLoss,
  pressureLossFraction,
} from './common.ts'
import { defineUnitKind } from './kind.ts'

export const heatSource = defineUnitKind({
  name: 'heatSource',
  label: 'Heat source',
  idStem: 'source',
  group: 'Heat',
  help: 'Heat from outside the cycle that costs no fuel: a flue gas cooler, an oil cooler, the sun.',
  ports: {
    inlet: { direction: 'in', carries: 'any', pressure: 'own', label: 'Inlet' },
    outlet: { direction: 'out', carries: 'any', pressure: 'own', label: 'Outlet' },
  },
  quantities: {
    pressureLossFraction: pressureLossFraction(0.02, [0.005, 0.05]),
    lossConstant,
    heat: { ...heat('Heat recovered', 'Heat that the stream takes up.'), designed: true },
  },
  chief: 'heat',
  equations: ({ ports: { inlet, outlet }, quantities: q }) => ({
    massBalance: massBalance(outlet.m, inlet.m),
    pressureLoss: pressureLoss(inlet, outlet, q.pressureLossFraction),
    lossLaw: lossLaw(inlet, outlet, q.lossConstant),
    energyBalance: equal(q.heat, minus(energy(outlet), energy(inlet))),
  }),
  totals: ({ quantities: q }) => ({ recoveredHeat: q.heat }),
  freezing: () => [{ quantity: 'lossConstant', frees: ['pressureLossFraction'] }],
  secondLaw: 'heated',
  paths: () => [{ from: 'inlet', to: 'outlet', course: 'line' }],
  passes: [['inlet', 'outlet']],
  starts: { outlet: { as: 'inlet' } },
})
