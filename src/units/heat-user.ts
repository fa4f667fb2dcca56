import { equal, isConstant, massBalance, minus, times } from '../equations/expression/index.ts'
import { commonPractice, heat } from './common.ts'
import { defineUnitKind } from './kind.ts'
import { drynessOf } from './wetness.ts'

export const heatUser = defineUnitKind({
  name: 'heatUser',
  label: 'Heat user',
  idStem: 'user',
  group: 'Heaters',
  help: 'Process steam: takes steam, gives part of it back as condensate.',
  ports: {
    steam: { direction: 'in', carries: 'steam', pressure: 'own', label: 'Steam' },
    condensate: { direction: 'out', carries: 'water', pressure: 'own', label: 'Condensate' },
  },
  quantities: {
    returnFraction: {
      label: 'Condensate returned',
      symbol: 'r',
      dimension: 'ratio',
      help: 'Condensate flow as a part of the steam flow; the rest leaves the plant as condensate.',
      usual: 0.8,
      given: true,
      range: [0, 1],
      basis: commonPractice,
      possible: { least: 0, most: 1 },
      step: 0.01,
    },
    heat: heat('Heat delivered', 'Heat that the steam gives to the process.'),
  },
  chief: 'heat',
  equations: ({ ports: { steam, condensate }, quantities: q }) => {
    const returned = times(q.returnFraction, steam.m)
    return {
      // With all of it returned the circuit stays closed.
      condensateFlow: isConstant(q.returnFraction, 1)
        ? massBalance(condensate.m, returned)
        : equal(condensate.m, returned),
      energyBalance: equal(q.heat, times(steam.m, minus(steam.h, condensate.h))),
    }
  },
  totals: ({ quantities: q }) => ({ processHeat: q.heat }),
  cautions: ({ port }) => {
    const x = drynessOf(port('condensate'))
    return x > 0
      ? [
          {
            code: 'steam-returned',
            quantities: ['condensate.T', 'condensate.x'],
            message: 'what returns as condensate is still steam, dryness {0}.',
            values: [[x, 'dryness']],
            advice: 'Give a lower condensate temperature, or more heat delivered.',
          },
        ]
      : []
  },
  secondLaw: 'delivers',
  paths: () => [{ from: 'steam', to: 'condensate', course: 'line' }],
  starts: { condensate: 'liquid' },
})
