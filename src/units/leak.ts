import {
  equal,
  massBalance,
  minus,
  signedSquare,
  square,
  times,
} from '../equations/expression/index.ts'
import { defineUnitKind } from './kind.ts'

export const leak = defineUnitKind({
  name: 'leak',
  label: 'Leak',
  idStem: 'leak',
  group: 'Lines',
  help: 'Steam past a gland or seal; it carries its enthalpy along.',
  ports: {
    inlet: { direction: 'in', carries: 'steam', pressure: 'own', label: 'Inlet' },
    outlet: { direction: 'out', carries: 'any', pressure: 'own', label: 'Outlet' },
  },
  quantities: {
    flowConstant: {
      label: 'Flow constant',
      symbol: 'K',
      dimension: 'flowConstant',
      help: 'Flow over the root of p/v and of 1 − (p_out/p_in)²: what the clearance lets through.',
      possible: { least: 0 },
    },
  },
  equations: ({ ports: { inlet, outlet }, quantities: q }) => ({
    massBalance: massBalance(outlet.m, inlet.m),
    energyBalance: equal(outlet.h, inlet.h),
    flowLaw: equal(
      times(signedSquare(inlet.m), times(inlet.p, inlet.v)),
      times(square(q.flowConstant), minus(square(inlet.p), square(outlet.p))),
    ),
  }),
  freezing: () => [{ quantity: 'flowConstant', frees: [], freesFlow: true }],
  dropsPressure: () => true,
  secondLaw: 'adiabatic',
  paths: () => [{ from: 'inlet', to: 'outlet', course: 'isenthalp' }],
  passes: [['inlet', 'outlet']],
  starts: { outlet: { as: 'inlet' } },
})
