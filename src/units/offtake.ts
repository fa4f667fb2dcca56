import { defineUnitKind } from './kind.ts'

export const offtake = defineUnitKind({
  name: 'offtake',
  label: 'Offtake',
  idStem: 'offtake',
  group: 'Edges',
  help: 'What leaves the plant for good: blowdown to waste, steam sold.',
  ports: {
    inlet: { direction: 'in', carries: 'any', pressure: 'own', label: 'Inlet' },
  },
  quantities: {},
  equations: () => ({}),
  secondLaw: 'edge',
  paths: () => [],
  starts: {},
})
