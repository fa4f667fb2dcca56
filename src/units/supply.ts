import { defineUnitKind } from './kind.ts'

export const supply = defineUnitKind({
  name: 'supply',
  label: 'Supply',
  idStem: 'supply',
  group: 'Edges',
  help: 'What enters the plant from outside: make-up water, steam from a neighbour.',
  ports: {
    outlet: {
      direction: 'out',
      carries: 'any',
      pressure: 'own',
      designed: ['p', 'T'],
      label: 'Outlet',
    },
  },
  quantities: {},
  equations: () => ({}),
  secondLaw: 'edge',
  paths: () => [],
  starts: { outlet: 'cold' },
})
