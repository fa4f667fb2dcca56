import { equal, massBalance, plus } from '../equations/expression/index.ts'
import { energy } from './common.ts'
import { defineUnitKind } from './kind.ts'
import { isAboveCritical, superheatOf } from './wetness.ts'

/** With less superheat the spray may reach the pipe's wall: common practice, 10 K. */
const leastSuperheat = 10

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
  cautions: ({ port }) => {
    const outlet = port('outlet')
    if (isAboveCritical(outlet)) {
      return [
        {
          code: 'above-critical',
          quantities: ['outlet.p', 'outlet.T'],
          message:
            'it sprays at {0}, above the critical pressure, where no saturation tells whether the spray is gone.',
          values: [[outlet?.p ?? Number.NaN, 'pressure']],
          advice: 'Hold the outlet temperature well above 374 °C.',
          severity: 'remark',
        },
      ]
    }
    const superheat = superheatOf(outlet)
    if (superheat === 0) {
      return [
        {
          code: 'sprayed-wet',
          quantities: ['outlet.T', 'spray.m'],
          message: 'it sprays the steam wet: what leaves is at saturation.',
          values: [],
          advice: 'Give a higher outlet temperature, or less spray.',
        },
      ]
    }
    return superheat < leastSuperheat
      ? [
          {
            code: 'spray-not-gone',
            quantities: ['outlet.T', 'spray.m'],
            message: 'it leaves {0} above saturation; below {1} the spray may not be gone.',
            values: [
              [superheat, 'temperatureDifference'],
              [leastSuperheat, 'temperatureDifference'],
            ],
            advice: 'Give a higher outlet temperature, or less spray.',
          },
        ]
      : []
  },
  secondLaw: 'adiabatic',
  paths: () => [
    { from: 'steam', to: 'outlet', course: 'line' },
    { from: 'spray', to: 'outlet', course: 'throttledLine' },
  ],
  passes: [['steam', 'outlet']],
  starts: { outlet: 'mixed' },
})
