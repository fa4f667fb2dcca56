import { equal, massBalance, plus } from '../equations/expression/index.ts'
import { energy } from './common.ts'
import { defineUnitKind } from './kind.ts'

export const desuperheater = defineUnitKind({
  name: 'desuperheater',
  label: 'Desuperheater',
  idStem: 'desuper',
  group: 'Vessels',
  help: 'Cools steam by spraying water into it; give the outlet temperature and the spray flow follows.',
  ports: {
    steam: { direction: 'in', carries: 'steam', pressure: 'equal', label: 'Steam' },
    spray: { direction: 'in', carries: 'water', pressure: 'throttles', label: 'Spray' },
    outlet: { direction: 'out', carries: 'steam', pressure: 'equal', label: 'Outlet' },
  },
  quantities: {},
  equations: ({ ports: { steam, spray, outlet } }) => ({
    massBalance: massBalance(outlet.m, plus(steam.m, spray.m)),
    energyBalance: equal(energy(outlet), plus(energy(steam), energy(spray))),
    pressure: equal(outlet.p, steam.p),
  }),
  secondLaw: 'adiabatic',
  paths: () => [
    { from: 'steam', to: 'outlet', course: 'line' },
    { from: 'spray', to: 'outlet', course: 'throttledLine' },
  ],
  passes: [['steam', 'outlet']],
  starts: { outlet: 'mixed' },
})
