import { equal, massBalance, minus } from '../equations/expression/index.ts'
import { pressureLoss } from './common.ts'
import { defineUnitKind } from './kind.ts'

export const valve = defineUnitKind({
  name: 'valve',
  label: 'Valve',
  idStem: 'valve',
  group: 'Lines',
  help: 'Throttles what flows through it at constant enthalpy.',
  ports: {
    inlet: { direction: 'in', carries: 'any', pressure: 'own', label: 'Inlet' },
    outlet: { direction: 'out', carries: 'any', pressure: 'own', label: 'Outlet' },
  },
  quantities: {
    pressureDrop: {
      label: 'Pressure drop',
      symbol: 'Δp',
      dimension: 'pressureDifference',
      help: 'Pressure before the valve less pressure after it.',
      step: 1e5,
    },
    pressureLossFraction: {
      label: 'Pressure loss',
      symbol: 'Δp/p',
      dimension: 'ratio',
      help: 'Part of the entering pressure that is lost in the valve.',
      possible: { most: 1 },
      step: 0.01,
    },
  },
  chief: 'pressureDrop',
  equations: ({ ports: { inlet, outlet }, quantities: q }) => ({
    massBalance: massBalance(outlet.m, inlet.m),
    pressureLoss: pressureLoss(inlet, outlet, q.pressureLossFraction),
    pressureDrop: equal(outlet.p, minus(inlet.p, q.pressureDrop)),
    energyBalance: equal(outlet.h, inlet.h),
  }),
  holdsPressure: (isGiven) => !isGiven('pressureDrop') && !isGiven('pressureLossFraction'),
  dropsPressure: (isGiven) => !isGiven('pressureDrop') && !isGiven('pressureLossFraction'),
  secondLaw: 'adiabatic',
  paths: () => [{ from: 'inlet', to: 'outlet', course: 'isenthalp' }],
  passes: [['inlet', 'outlet']],
  starts: { outlet: { as: 'inlet' } },
})
