import { constant, equal, massBalance, minus, plus, times } from '../equations/expression/index.ts'
import { liquidEnthalpy } from '../steam/operations.ts'
import {
  commonPractice,
  efficiencyOfFiring,
  energy,
  fuelHeat,
  heat,
  lossConstant,
  lossLaw,
  pressureLoss,
  pressureLossFraction,
} from './common.ts'
import { type Caution, defineUnitKind, type Shape } from './kind.ts'
import { carriedMoisture, drynessOf, isAboveCritical, moistureOf } from './wetness.ts'

const withBlowdown = (shape: Shape): boolean => (shape.streams.blowdown ?? 0) > 0

export const boiler = defineUnitKind({
  name: 'boiler',
  label: 'Boiler',
  idStem: 'boiler',
  group: 'Heat',
  help: 'Turns feedwater into steam by burning fuel.',
  ports: {
    feedwater: { direction: 'in', carries: 'water', pressure: 'own', label: 'Feedwater' },
    spray: {
      direction: 'in',
      optional: true,
      carries: 'water',
      pressure: 'throttles',
      label: 'Spray',
    },
    steam: {
      direction: 'out',
      carries: 'steam',
      pressure: 'own',
      designed: ['m', 'p', 'T'],
      label: 'Steam',
    },
    blowdown: {
      direction: 'out',
      optional: true,
      carries: 'water',
      pressure: 'own',
      label: 'Blowdown',
    },
  },
  quantities: {
    pressureLossFraction: pressureLossFraction(0.06, [0.02, 0.15]),
    lossConstant,
    heat: heat('Heat to the steam', 'Heat that feedwater, spray and blowdown take up.'),
    efficiency: efficiencyOfFiring,
    fuelHeat,
    blowdownFraction: {
      label: 'Blowdown',
      symbol: 'bd',
      dimension: 'ratio',
      help: 'Blowdown flow as a part of the steam flow.',
      usual: 0.005,
      given: true,
      range: [0, 0.02],
      basis: commonPractice,
      possible: { least: 0 },
      step: 0.01,
      when: withBlowdown,
    },
    drumPressure: {
      label: 'Drum pressure',
      symbol: 'pd',
      dimension: 'pressure',
      help: 'Pressure at which the blowdown leaves as saturated liquid.',
      step: 1e5,
      when: withBlowdown,
    },
  },
  chief: 'heat',
  equations: ({ ports, quantities: q }) => {
    const { feedwater, spray, steam, blowdown } = ports
    const entering = spray ? plus(feedwater.m, spray.m) : feedwater.m
    const leaving = blowdown ? plus(steam.m, blowdown.m) : steam.m
    const energyIn = spray ? plus(energy(feedwater), energy(spray)) : energy(feedwater)
    const energyOut = blowdown ? plus(energy(steam), energy(blowdown)) : energy(steam)
    return {
      massBalance: massBalance(leaving, entering),
      pressureLoss: pressureLoss(feedwater, steam, q.pressureLossFraction),
      lossLaw: lossLaw(feedwater, steam, q.lossConstant),
      energyBalance: equal(q.heat, minus(energyOut, energyIn)),
      fuel: equal(times(q.fuelHeat, q.efficiency), q.heat),
      ...(blowdown && {
        blowdownFlow: equal(blowdown.m, times(q.blowdownFraction, steam.m)),
        blowdownPressure: equal(blowdown.p, q.drumPressure),
        blowdownState: equal(blowdown.h, liquidEnthalpy(q.drumPressure)),
      }),
    }
  },
  totals: ({ ports: { feedwater, steam, blowdown }, quantities: q }) => ({
    heatInput: q.heat,
    fuelHeat: q.fuelHeat,
    boilerSteam: steam.m,
    turbineHeatCredit: blowdown ? times(blowdown.m, minus(blowdown.h, feedwater.h)) : constant(0),
  }),
  freezing: ({ shape }) => [
    { quantity: 'lossConstant', frees: ['pressureLossFraction'] },
    ...(withBlowdown(shape)
      ? [
          {
            quantity: 'drumPressure',
            frees: [],
            law: { against: { port: 'steam', quantity: 'p' }, exponent: 1 },
          },
        ]
      : []),
  ],
  cautions: ({ port }) => {
    const found: Caution[] = []
    const moisture = moistureOf(port('steam'))
    if (moisture > carriedMoisture) {
      found.push({
        code: 'wet-steam',
        quantities: ['steam.x', 'steam.T'],
        message: 'its steam holds {0} of moisture, where it should be dry.',
        values: [[moisture, 'ratio']],
        advice: 'Give a higher steam temperature, or check its flow and heat.',
      })
    }
    const entering = drynessOf(port('feedwater'))
    if (entering >= 0) {
      found.push({
        code: 'boiling-feedwater',
        quantities: ['feedwater.T', 'feedwater.x', 'feedwater.p'],
        message: 'the feedwater arrives boiling, dryness {0}.',
        values: [[entering, 'dryness']],
        advice: 'Raise its pressure, or heat it less.',
      })
    }
    if (port('blowdown') && isAboveCritical(port('steam'))) {
      found.push({
        code: 'above-critical',
        quantities: ['steam.p', 'blowdown.m'],
        message: 'it has a blowdown although its steam is at {0}, where no drum can be.',
        values: [[port('steam')?.p ?? Number.NaN, 'pressure']],
        advice: 'Take the blowdown away.',
      })
    }
    return found
  },
  secondLaw: 'fired',
  paths: (shape) => [
    { from: 'feedwater', to: 'steam', course: 'line' },
    ...((shape.streams.spray ?? 0) > 0
      ? [{ from: 'spray', to: 'steam', course: 'throttledLine' as const }]
      : []),
  ],
  starts: { steam: 'superheated', blowdown: 'liquid' },
})
