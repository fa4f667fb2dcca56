import { divide, equal, massBalance, minus } from '../equations/expression/index.ts'
import {
  commonPractice,
  lossConstant,
  lossLaw,
  pressureLoss,
  pressureLossFraction,
} from './common.ts'
import { defineUnitKind } from './kind.ts'

export const pipe = defineUnitKind({
  name: 'pipe',
  label: 'Pipe',
  idStem: 'pipe',
  group: 'Lines',
  help: 'A line with a pressure loss and, if you give it, a heat loss.',
  ports: {
    inlet: { direction: 'in', carries: 'any', pressure: 'own', label: 'Inlet' },
    outlet: { direction: 'out', carries: 'any', pressure: 'own', label: 'Outlet' },
  },
  quantities: {
    pressureDrop: {
      label: 'Pressure drop',
      symbol: 'Δp',
      dimension: 'pressureDifference',
      help: 'Pressure at the inlet less pressure at the outlet.',
      step: 1e4,
    },
    pressureLossFraction: pressureLossFraction(0.05, [0.02, 0.08]),
    lossConstant,
    heatLoss: {
      label: 'Heat loss',
      symbol: 'Q',
      dimension: 'heatFlow',
      help: 'Heat that the line gives off to its surroundings.',
      usual: 0,
      given: true,
      range: [0, 1e6],
      basis: commonPractice,
      possible: { least: 0 },
      step: 1e4,
    },
  },
  equations: ({ ports: { inlet, outlet }, quantities: q }) => ({
    massBalance: massBalance(outlet.m, inlet.m),
    pressureLoss: pressureLoss(inlet, outlet, q.pressureLossFraction),
    pressureDrop: equal(outlet.p, minus(inlet.p, q.pressureDrop)),
    lossLaw: lossLaw(inlet, outlet, q.lossConstant),
    // Without a heat loss the enthalpy passes on whatever the flow, none included.
    energyBalance: equal(outlet.h, minus(inlet.h, divide(q.heatLoss, inlet.m))),
  }),
  totals: ({ quantities: q }) => ({ lineHeatLoss: q.heatLoss }),
  freezing: () => [{ quantity: 'lossConstant', frees: ['pressureLossFraction', 'pressureDrop'] }],
  secondLaw: 'losesHeat',
  paths: () => [{ from: 'inlet', to: 'outlet', course: 'line' }],
  passes: [['inlet', 'outlet']],
  starts: { outlet: { as: 'inlet' } },
})
