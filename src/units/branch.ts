import {
  divide,
  type Equation,
  equal,
  isConstant,
  massBalance,
  plus,
  times,
} from '../equations/expression/index.ts'
import { defineUnitKind } from './kind.ts'

export const branch = defineUnitKind({
  name: 'branch',
  label: 'Branch',
  idStem: 'branch',
  group: 'Lines',
  help: 'Splits a stream; pressure and enthalpy are the same at every port.',
  ports: {
    inlet: { direction: 'in', carries: 'any', pressure: 'own', label: 'Inlet' },
    outlet: { direction: 'out', repeated: true, carries: 'any', pressure: 'own', label: 'Outlet' },
  },
  quantities: {
    share: {
      label: 'Share',
      symbol: 'm/m',
      dimension: 'ratio',
      help: 'Flow of this outlet as a part of what comes in.',
      possible: { least: 0, most: 1 },
      step: 0.01,
      each: { port: 'outlet', extra: 0 },
    },
  },
  equations: ({ ports: { inlet, outlet }, quantities: q }) => {
    const equations: Record<string, Equation> = {
      massBalance: massBalance(inlet.m, plus(...outlet.map((stream) => stream.m))),
    }
    outlet.forEach((stream, k) => {
      equations[`pressure${k + 1}`] = equal(stream.p, inlet.p)
      equations[`enthalpy${k + 1}`] = equal(stream.h, inlet.h)
      // Of no flow at all a share says nothing, unless it is given: then this outlet has none.
      equations[`share${k + 1}`] = isConstant(inlet.m, 0)
        ? equal(q.share[k]!, divide(stream.m, inlet.m))
        : equal(stream.m, times(q.share[k]!, inlet.m))
    })
    return equations
  },
  secondLaw: 'adiabatic',
  paths: () => [],
  passes: [['inlet', 'outlet']],
  starts: { outlet: { as: 'inlet' } },
})
