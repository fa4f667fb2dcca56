import {
  constant,
  divide,
  equal,
  massBalance,
  minus,
  plus,
  times,
} from '../equations/expression/index.ts'
import { enthalpyAtEntropy, saturationPressureAt } from '../steam/operations.ts'
import { commonPractice } from './common.ts'
import { defineUnitKind } from './kind.ts'
import { drynessOf } from './wetness.ts'

/** Net positive suction head that the least demanding condensate pumps need: common practice, m. */
const leastHead = 1

/** Standard acceleration of free fall, m/s2 (CGPM 1901). */
const g = 9.80665

export const pump = defineUnitKind({
  name: 'pump',
  label: 'Pump',
  idStem: 'pump',
  group: 'Machines',
  help: 'Raises the pressure of water; driven by a motor or by a turbine on its shaft.',
  ports: {
    suction: { direction: 'in', carries: 'water', pressure: 'own', label: 'Suction' },
    discharge: { direction: 'out', carries: 'water', pressure: 'own', label: 'Discharge' },
  },
  quantities: {
    efficiency: {
      label: 'Efficiency',
      symbol: 'η',
      dimension: 'ratio',
      help: 'Isentropic rise of enthalpy divided by the actual one.',
      usual: 0.8,
      given: true,
      range: [0.65, 0.88],
      basis: commonPractice,
      possible: { above: 0, most: 1 },
      step: 0.01,
    },
    pressureRise: {
      label: 'Pressure rise',
      symbol: 'Δp',
      dimension: 'pressureDifference',
      help: 'Discharge pressure less suction pressure.',
      step: 1e5,
    },
    power: {
      label: 'Power at its shaft',
      symbol: 'P',
      dimension: 'power',
      help: 'Power that the water takes up, at the pump shaft.',
      step: 1e4,
    },
    volumeFlow: {
      label: 'Volume flow',
      symbol: 'V',
      dimension: 'volumeFlow',
      help: 'Volume flow at the suction.',
      step: 0.001,
    },
    driveEfficiency: {
      label: 'Drive efficiency',
      symbol: 'ηd',
      dimension: 'ratio',
      help: 'Power at the pump shaft divided by the electric power of its motor, gear included.',
      usual: 0.95,
      given: true,
      range: [0.92, 0.975],
      basis: commonPractice,
      possible: { above: 0, most: 1 },
      step: 0.01,
    },
    electricPower: {
      label: 'Electric power',
      symbol: 'Pel',
      dimension: 'power',
      help: 'Power that the motor draws; none when a shaft drives the pump.',
      step: 1e4,
    },
    suctionHeight: {
      label: 'Suction height',
      symbol: 'z',
      dimension: 'length',
      help: 'Height of the free water surface above the pump.',
      range: [0, 35],
      basis: commonPractice,
      step: 1,
    },
    npshAvailable: {
      label: 'Suction head available',
      symbol: 'NPSHa',
      dimension: 'length',
      help: 'Net positive suction head: height plus the pressure above saturation, as a column of the water.',
      step: 1,
    },
  },
  chief: 'power',
  shaft: 'driven',
  equations: ({ ports: { suction, discharge }, quantities: q, onShaft }) => ({
    massBalance: massBalance(discharge.m, suction.m),
    pressureRise: equal(q.pressureRise, minus(discharge.p, suction.p)),
    compression: equal(
      discharge.h,
      plus(
        suction.h,
        divide(minus(enthalpyAtEntropy(discharge.p, suction.s), suction.h), q.efficiency),
      ),
    ),
    energyBalance: equal(q.power, times(suction.m, minus(discharge.h, suction.h))),
    volumeFlow: equal(q.volumeFlow, times(suction.m, suction.v)),
    drive: equal(q.electricPower, onShaft ? constant(0) : divide(q.power, q.driveEfficiency)),
    suctionHead: equal(
      q.npshAvailable,
      plus(
        q.suctionHeight,
        divide(times(minus(suction.p, saturationPressureAt(suction.T)), suction.v), constant(g)),
      ),
    ),
  }),
  totals: ({ quantities: q }) => ({ pumpPower: q.power, electricPower: q.electricPower }),
  cautions: ({ port, quantity }) => {
    const x = drynessOf(port('suction'))
    if (x > 1e-6) {
      return [
        {
          code: 'pump-takes-steam',
          quantities: ['suction.x', 'suction.T', 'suction.p'],
          message: 'it takes in water with steam in it, dryness {0}.',
          values: [[x, 'dryness']],
          advice: 'Condense or cool what it takes in, or raise its pressure.',
        },
      ]
    }
    const head = quantity('npshAvailable')
    return head < leastHead
      ? [
          {
            code: 'suction-head',
            quantities: ['npshAvailable', 'suctionHeight', 'suction.T'],
            message: 'only {0} of suction head is left above boiling; pumps need {1} at the least.',
            values: [
              [head, 'length'],
              [leastHead, 'length'],
            ],
            advice:
              "Raise the vessel before it, cool the water, or take the maker's figure for this pump.",
          },
        ]
      : []
  },
  secondLaw: 'adiabatic',
  paths: () => [{ from: 'suction', to: 'discharge', course: 'compression' }],
  raisesPressure: true,
  passes: [['suction', 'discharge']],
  starts: { discharge: 'compressed' },
})
