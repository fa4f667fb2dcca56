import {
  constant,
  type Equation,
  type Expression,
  equal,
  massBalance,
  plus,
  times,
} from '../equations/expression/index.ts'
import { subcooling, vapourEnthalpy } from '../steam/operations.ts'
import { commonPractice, energy } from './common.ts'
import { type Caution, defineUnitKind, type PortExpressions, type Shape } from './kind.ts'
import { drynessOf } from './wetness.ts'

const withVent = (shape: Shape): boolean => (shape.streams.vent ?? 0) > 0

interface MixingUnit {
  readonly ports: {
    readonly steam: readonly PortExpressions[]
    readonly water: readonly PortExpressions[]
    readonly drain: readonly PortExpressions[]
    readonly outlet: PortExpressions
    readonly vent?: PortExpressions | undefined
  }
  readonly quantities: Readonly<Record<'pressure' | 'subcooling' | 'ventFraction', Expression>>
}

function mixing({
  ports: { steam, water, drain, outlet, vent },
  quantities: q,
}: MixingUnit): Record<string, Equation> {
  const entering = [...steam, ...water, ...drain]
  const leaving = vent ? [outlet, vent] : [outlet]
  const equations: Record<string, Equation> = {
    massBalance: massBalance(
      plus(...leaving.map((stream) => stream.m)),
      plus(...entering.map((stream) => stream.m)),
    ),
    energyBalance: equal(
      plus(...entering.map((stream) => energy(stream))),
      plus(...leaving.map((stream) => energy(stream))),
    ),
    outletPressure: equal(outlet.p, q.pressure),
    outletState: equal(subcooling(outlet.p, outlet.h), q.subcooling),
  }
  steam.forEach((stream, k) => {
    equations[`steamPressure${k + 1}`] = equal(stream.p, q.pressure)
  })
  water.forEach((stream, k) => {
    equations[`waterPressure${k + 1}`] = equal(stream.p, q.pressure)
  })
  if (vent) {
    equations.ventPressure = equal(vent.p, q.pressure)
    equations.ventFlow = equal(vent.m, times(q.ventFraction, outlet.m))
    equations.ventState = equal(vent.h, vapourEnthalpy(q.pressure))
  }
  return equations
}

export const mixingHeater = defineUnitKind({
  name: 'mixingHeater',
  label: 'Mixing heater',
  idStem: 'mixing',
  group: 'Heaters',
  help: 'Heats water by mixing steam into it; the deaerator too.',
  ports: {
    steam: { direction: 'in', repeated: true, carries: 'steam', pressure: 'equal', label: 'Steam' },
    water: { direction: 'in', repeated: true, carries: 'water', pressure: 'equal', label: 'Water' },
    drain: {
      direction: 'in',
      repeated: true,
      optional: true,
      carries: 'any',
      pressure: 'throttles',
      label: 'Drain',
    },
    outlet: { direction: 'out', carries: 'water', pressure: 'equal', label: 'Outlet' },
    vent: {
      direction: 'out',
      optional: true,
      carries: 'steam',
      pressure: 'equal',
      label: 'Vent',
    },
  },
  quantities: {
    pressure: {
      label: 'Pressure',
      symbol: 'p',
      dimension: 'pressure',
      help: 'Pressure in the vessel.',
      range: [1.2e5, 12e5],
      basis: `${commonPractice}, as a deaerator`,
      possible: { above: 0 },
      step: 1e5,
    },
    subcooling: {
      label: 'Outlet subcooling',
      symbol: 'ΔTsub',
      dimension: 'temperatureDifference',
      help: 'Saturation temperature less outlet temperature; 0 is saturated liquid.',
      usual: 0,
      given: true,
      range: [0, 2],
      basis: commonPractice,
      possible: { least: 0 },
      step: 1,
    },
    ventFraction: {
      label: 'Vent',
      symbol: 'fv',
      dimension: 'ratio',
      help: 'Vent flow as a part of the outlet flow.',
      usual: 0.001,
      given: true,
      range: [0.0005, 0.001],
      basis: commonPractice,
      possible: { least: 0 },
      step: 0.001,
      when: withVent,
    },
  },
  chief: 'pressure',
  equations: (unit) => mixing(unit),
  outOfService: {
    // Takes no steam; the water leaves as it mixes, so its subcooling follows.
    equations: (unit) => ({
      ...mixing(unit),
      ...Object.fromEntries(
        unit.ports.steam.map((stream, k) => [`noSteam${k + 1}`, equal(stream.m, constant(0))]),
      ),
    }),
    meaningless: [],
    frees: ['subcooling'],
    idlePorts: ['steam'],
  },
  cautions: ({ shape, port }) => {
    const found: Caution[] = []
    for (let k = 1; k <= (shape.streams.water ?? 0); k++) {
      const x = drynessOf(port(`water${k}`))
      if (x > 1e-6) {
        found.push({
          code: 'water-flashes',
          quantities: [`water${k}.T`, 'pressure'],
          message: `water ${k} arrives hotter than its saturation and flashes, dryness {0}.`,
          values: [[x, 'dryness']],
          advice: 'Raise its pressure, or heat the water less before it.',
        })
      }
    }
    return found
  },
  secondLaw: 'adiabatic',
  paths: (shape) => [
    ...Array.from({ length: shape.streams.steam ?? 0 }, (_, k) => ({
      from: `steam${k + 1}`,
      to: 'outlet',
      course: 'line' as const,
    })),
    ...Array.from({ length: shape.streams.water ?? 0 }, (_, k) => ({
      from: `water${k + 1}`,
      to: 'outlet',
      course: 'line' as const,
    })),
    ...Array.from({ length: shape.streams.drain ?? 0 }, (_, k) => ({
      from: `drain${k + 1}`,
      to: 'outlet',
      course: 'throttledLine' as const,
    })),
  ],
  heatPassage: {
    cold: { from: 'water', to: 'outlet' },
    hot: { from: 'steam', to: 'outlet' },
    shell: 'saturated',
    differences: [],
  },
  starts: { outlet: 'liquid', vent: 'dry' },
})
