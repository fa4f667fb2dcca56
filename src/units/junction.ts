import { type Equation, equal, massBalance, plus } from '../equations/expression/index.ts'
import { energy } from './common.ts'
import { defineUnitKind } from './kind.ts'

export const junction = defineUnitKind({
  name: 'junction',
  label: 'Junction',
  idStem: 'junction',
  group: 'Lines',
  help: 'Mixes streams of equal pressure.',
  ports: {
    inlet: { direction: 'in', repeated: true, carries: 'any', pressure: 'own', label: 'Inlet' },
    outlet: { direction: 'out', carries: 'any', pressure: 'own', label: 'Outlet' },
  },
  quantities: {},
  equations: ({ ports: { inlet, outlet } }) => {
    const equations: Record<string, Equation> = {
      massBalance: massBalance(outlet.m, plus(...inlet.map((stream) => stream.m))),
      energyBalance: equal(energy(outlet), plus(...inlet.map((stream) => energy(stream)))),
    }
    inlet.forEach((stream, k) => {
      equations[`pressure${k + 1}`] = equal(stream.p, outlet.p)
    })
    return equations
  },
  secondLaw: 'adiabatic',
  paths: (shape) =>
    Array.from({ length: shape.streams.inlet ?? 0 }, (_, k) => ({
      from: `inlet${k + 1}`,
      to: 'outlet',
      course: 'line' as const,
    })),
  passes: [['inlet', 'outlet']],
  starts: { outlet: 'mixed' },
})
