import { type Equation, equal, massBalance, plus } from '../equations/expression/index.ts'
import { liquidEnthalpy, vapourEnthalpy } from '../steam/operations.ts'
import { energy } from './common.ts'
import { defineUnitKind } from './kind.ts'

export const flashVessel = defineUnitKind({
  name: 'flashVessel',
  label: 'Flash vessel',
  idStem: 'flash',
  group: 'Vessels',
  help: 'Lets hot water flash and parts it into dry saturated steam and saturated liquid.',
  ports: {
    inlet: {
      direction: 'in',
      repeated: true,
      carries: 'any',
      pressure: 'throttles',
      label: 'Inlet',
    },
    steam: { direction: 'out', carries: 'steam', pressure: 'equal', label: 'Steam' },
    water: { direction: 'out', carries: 'water', pressure: 'equal', label: 'Water' },
  },
  quantities: {
    pressure: {
      label: 'Pressure',
      symbol: 'p',
      dimension: 'pressure',
      help: 'Pressure in the vessel.',
      possible: { above: 0 },
      step: 1e5,
    },
  },
  chief: 'pressure',
  equations: ({ ports: { inlet, steam, water }, quantities: q }) => {
    const equations: Record<string, Equation> = {
      massBalance: massBalance(plus(steam.m, water.m), plus(...inlet.map((stream) => stream.m))),
      energyBalance: equal(
        plus(...inlet.map((stream) => energy(stream))),
        plus(energy(steam), energy(water)),
      ),
      steamPressure: equal(steam.p, q.pressure),
      waterPressure: equal(water.p, q.pressure),
      steamState: equal(steam.h, vapourEnthalpy(q.pressure)),
      waterState: equal(water.h, liquidEnthalpy(q.pressure)),
    }
    return equations
  },
  secondLaw: 'adiabatic',
  paths: (shape) =>
    Array.from({ length: shape.streams.inlet ?? 0 }, (_, k) => k + 1).flatMap((k) => [
      { from: `inlet${k}`, to: 'steam', course: 'throttledLine' as const },
      { from: `inlet${k}`, to: 'water', course: 'throttledLine' as const },
    ]),
  starts: { steam: 'dry', water: 'liquid' },
})
