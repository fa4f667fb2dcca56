import {
  constant,
  divide,
  type Equation,
  equal,
  massBalance,
  minus,
  plus,
  times,
} from '../equations/expression/index.ts'
import {
  enthalpyAtSuperheat,
  liquidEnthalpy,
  saturationTemperature,
  temperature,
} from '../steam/operations.ts'
import { commonPractice, energy, heat, one, pressureLoss, pressureLossFraction } from './common.ts'
import { mixedEnthalpy, transfer } from './heat-transfer.ts'
import {
  type Caution,
  defineUnitKind,
  type FreezeRule,
  type QuantityDescription,
  type Shape,
} from './kind.ts'
import { drynessOf, moistureOf } from './wetness.ts'

/** Pressure that a cascaded drain has left for valve and height: common practice, Pa. */
const leastHead = 2e4
/** Part of a drain that may flash in the shell: common practice. */
const mostFlashing = 0.2

const has =
  (option: string) =>
  (shape: Shape): boolean =>
    shape.options[option] === true

const exponent = (label: string, usual: number, when: (shape: Shape) => boolean) =>
  ({
    label,
    symbol: 'n',
    dimension: 'number',
    help: 'Power of the flow with which the conductance changes when the hardware is frozen.',
    usual,
    given: true,
    range: [0, 1],
    basis: commonPractice,
    step: 0.1,
    when,
  }) as const satisfies QuantityDescription

const conductance = (label: string, help: string) =>
  ({
    label,
    symbol: 'UA',
    dimension: 'conductance',
    help,
    possible: { least: 0 },
    step: 1e4,
  }) as const satisfies QuantityDescription

const withDrainCooler = has('drainCooler')
const withDesuperheater = has('desuperheater')
const withPlugging = has('plugging')
const withExponents = has('exponents')

export const surfaceHeater = defineUnitKind({
  name: 'surfaceHeater',
  label: 'Surface heater',
  idStem: 'heater',
  group: 'Heaters',
  help: 'Heats water in tubes with steam on the shell; with drain cooler and desuperheating zone on demand.',
  ports: {
    steam: { direction: 'in', repeated: true, carries: 'steam', pressure: 'equal', label: 'Steam' },
    drainInlet: {
      direction: 'in',
      repeated: true,
      stem: 'drain',
      optional: true,
      carries: 'any',
      pressure: 'throttles',
      label: 'Drain of another heater',
    },
    drain: { direction: 'out', carries: 'water', pressure: 'equal', label: 'Drain' },
    water: { direction: 'in', carries: 'any', pressure: 'own', label: 'Water' },
    outlet: { direction: 'out', carries: 'any', pressure: 'own', label: 'Outlet' },
  },
  quantities: {
    pressure: {
      label: 'Shell pressure',
      symbol: 'p',
      dimension: 'pressure',
      help: 'Pressure on the steam side, after the bleed line.',
      possible: { above: 0 },
      step: 1e5,
    },
    pressureLossFraction: {
      ...pressureLossFraction(0.02, [0.005, 0.05]),
      label: 'Tube pressure loss',
    },
    terminalDifference: {
      label: 'Terminal difference',
      symbol: 'TTD',
      dimension: 'temperatureDifference',
      help: 'Saturation temperature of the shell less water outlet temperature.',
      usual: 2.8,
      given: true,
      range: [-3, 5],
      basis: `${commonPractice}: 2 to 3 K at low pressure, 1.5 to 3 K at high pressure, -1.5 to 1 K with a desuperheating zone`,
      step: 1,
    },
    heat: heat('Duty', 'Heat that the water takes up.'),
    conductance: conductance(
      'Conductance',
      'Of the condensing zone: heat over the logarithmic mean difference, the shell at saturation.',
    ),
    drainApproach: {
      label: 'Drain approach',
      symbol: 'DCA',
      dimension: 'temperatureDifference',
      help: 'Drain outlet temperature less water inlet temperature.',
      usual: 5.6,
      given: true,
      range: [5, 10],
      basis: 'HEI closed feedwater heaters: 5.6 K (10 °F) as the economical least',
      possible: { least: 0 },
      step: 1,
      when: withDrainCooler,
    },
    drainConductance: {
      ...conductance('Drain cooler conductance', 'Of the drain cooling zone, counterflow.'),
      when: withDrainCooler,
    },
    residualSuperheat: {
      label: 'Residual superheat',
      symbol: 'ΔTres',
      dimension: 'temperatureDifference',
      help: 'Superheat with which the steam leaves the desuperheating zone.',
      usual: 20,
      given: true,
      range: [15, 30],
      basis: commonPractice,
      possible: { least: 0 },
      step: 1,
      when: withDesuperheater,
    },
    desuperheatConductance: {
      ...conductance('Desuperheating conductance', 'Of the desuperheating zone, counterflow.'),
      when: withDesuperheater,
    },
    pluggedFraction: {
      label: 'Tubes plugged',
      symbol: 'f',
      dimension: 'ratio',
      help: 'Part of the surface that is out of use, in every zone alike.',
      usual: 0,
      given: true,
      range: [0, 0.1],
      basis: commonPractice,
      possible: { least: 0, below: 1 },
      step: 0.01,
      when: withPlugging,
    },
    conductanceExponent: exponent('Condensing exponent', 0.5, withExponents),
    drainExponent: exponent(
      'Drain cooling exponent',
      0.6,
      (shape) => withExponents(shape) && withDrainCooler(shape),
    ),
    desuperheatExponent: exponent(
      'Desuperheating exponent',
      0.6,
      (shape) => withExponents(shape) && withDesuperheater(shape),
    ),
  },
  options: {
    drainCooler: {
      label: 'Drain cooler',
      help: 'A zone in which the drain heats the entering water.',
    },
    desuperheater: {
      label: 'Desuperheating zone',
      help: 'A zone in which superheated steam heats the leaving water.',
    },
    plugging: { label: 'Plugged tubes', help: 'Part of the surface is out of use.' },
    exponents: {
      label: 'Flow exponents',
      help: 'The conductances change with a power of the flow when the hardware is frozen.',
    },
  },
  chief: 'heat',
  equations: ({ ports, quantities: q, shape }) => {
    const { steam, drainInlet, drain, water, outlet } = ports
    const shellTemperature = saturationTemperature(q.pressure)
    const steamFlow = plus(...steam.map((stream) => stream.m))
    const steamEnergy = plus(...steam.map((stream) => energy(stream)))
    const drainsIn = plus(...drainInlet.map((stream) => energy(stream)))
    const inUse = withPlugging(shape) ? minus(one, q.pluggedFraction) : one
    const equations: Record<string, Equation> = {
      shellMassBalance: massBalance(
        drain.m,
        plus(steamFlow, ...drainInlet.map((stream) => stream.m)),
      ),
      tubeMassBalance: massBalance(outlet.m, water.m),
      drainPressure: equal(drain.p, q.pressure),
      pressureLoss: pressureLoss(water, outlet, q.pressureLossFraction),
      terminalDifference: equal(q.terminalDifference, minus(shellTemperature, outlet.T)),
      duty: equal(q.heat, times(water.m, minus(outlet.h, water.h))),
      energyBalance: equal(plus(steamEnergy, drainsIn), plus(energy(drain), q.heat)),
    }
    steam.forEach((stream, k) => {
      equations[`steamPressure${k + 1}`] = equal(stream.p, q.pressure)
    })

    // Between zones the water is at the outlet's pressure; without a zone its own end state holds.
    let coldEnd = water.T
    let condensingHeat = q.heat
    if (withDrainCooler(shape)) {
      const zoneHeat = times(drain.m, minus(liquidEnthalpy(q.pressure), drain.h))
      coldEnd = temperature(outlet.p, plus(water.h, divide(zoneHeat, water.m)))
      condensingHeat = minus(condensingHeat, zoneHeat)
      equations.drainState = equal(drain.T, plus(water.T, q.drainApproach))
      equations.drainTransfer = transfer(
        'the drain cooler',
        times(q.drainConductance, inUse),
        zoneHeat,
        minus(shellTemperature, coldEnd),
        q.drainApproach,
        'hot',
      )
    } else equations.drainState = equal(drain.h, liquidEnthalpy(q.pressure))

    let hotEnd = outlet.T
    if (withDesuperheater(shape)) {
      const entering = divide(steamEnergy, steamFlow)
      const leaving = enthalpyAtSuperheat(q.pressure, q.residualSuperheat)
      const zoneHeat = times(steamFlow, minus(entering, leaving))
      hotEnd = temperature(outlet.p, minus(outlet.h, divide(zoneHeat, water.m)))
      condensingHeat = minus(condensingHeat, zoneHeat)
      equations.desuperheatTransfer = transfer(
        'the desuperheating zone',
        times(q.desuperheatConductance, inUse),
        zoneHeat,
        minus(temperature(q.pressure, entering), outlet.T),
        minus(plus(shellTemperature, q.residualSuperheat), hotEnd),
        'hot',
      )
    }
    equations.heatTransfer = transfer(
      'the condensing zone',
      times(q.conductance, inUse),
      condensingHeat,
      minus(shellTemperature, hotEnd),
      minus(shellTemperature, coldEnd),
      'cold',
    )
    return equations
  },
  freezing: ({ shape }) => {
    const rule = (
      quantity: string,
      approach: string,
      exponentName: string,
      port: string,
    ): FreezeRule => ({
      quantity,
      frees: [approach],
      ...(withExponents(shape) && {
        law: { against: { port, quantity: 'm' }, exponent: exponentName },
      }),
    })
    return [
      rule('conductance', 'terminalDifference', 'conductanceExponent', 'water'),
      ...(withDrainCooler(shape)
        ? [rule('drainConductance', 'drainApproach', 'drainExponent', 'drain')]
        : []),
      ...(withDesuperheater(shape)
        ? [rule('desuperheatConductance', 'residualSuperheat', 'desuperheatExponent', 'steam1')]
        : []),
    ]
  },
  outOfService: {
    equations: ({ ports: { steam, drainInlet, drain, water, outlet }, quantities: q }) => {
      const drainsIn = plus(...drainInlet.map((stream) => stream.m))
      const equations: Record<string, Equation> = {
        shellMassBalance: massBalance(
          drain.m,
          plus(...steam.map((stream) => stream.m), ...drainInlet.map((stream) => stream.m)),
        ),
        tubeMassBalance: massBalance(outlet.m, water.m),
        drainPressure: equal(drain.p, q.pressure),
        pressureLoss: pressureLoss(water, outlet, q.pressureLossFraction),
        waterState: equal(outlet.h, water.h),
        drainState: equal(
          drain.h,
          mixedEnthalpy(
            plus(...drainInlet.map((stream) => energy(stream))),
            drainsIn,
            liquidEnthalpy(q.pressure),
          ),
        ),
      }
      steam.forEach((stream, k) => {
        equations[`steamPressure${k + 1}`] = equal(stream.p, q.pressure)
        equations[`noSteam${k + 1}`] = equal(stream.m, constant(0))
      })
      return equations
    },
    meaningless: [
      'terminalDifference',
      'heat',
      'conductance',
      'drainApproach',
      'drainConductance',
      'residualSuperheat',
      'desuperheatConductance',
    ],
    frees: [],
    idlePorts: ['steam'],
  },
  cautions: ({ shape, port }) => {
    const found: Caution[] = []
    const drain = port('drain')
    const shell = drain?.p ?? Number.NaN
    for (let k = 1; k <= (shape.streams.drainInlet ?? 0); k++) {
      const entering = port(`drain${k}`)
      if (!entering || !(entering.m > 0)) continue
      if (entering.p - shell < leastHead) {
        found.push({
          code: 'drain-head',
          quantities: [`drain${k}.p`, 'pressure'],
          message: `drain ${k} arrives only {0} above the shell; below {1} it may not flow at part load.`,
          values: [
            [entering.p - shell, 'pressureDifference'],
            [leastHead, 'pressureDifference'],
          ],
          advice: 'Lead it to a heater of lower pressure, or pump it forward.',
        })
      }
      const flashing = drynessOf({ p: shell, h: entering.h })
      if (flashing > mostFlashing) {
        found.push({
          code: 'drain-flashing',
          quantities: [`drain${k}.T`, `drain${k}.p`, 'pressure'],
          message: `{0} of drain ${k} flashes to steam in the shell; above {1} it needs a flash vessel of its own.`,
          values: [
            [flashing, 'ratio'],
            [mostFlashing, 'ratio'],
          ],
          advice: 'Cool the drain before it leaves its heater, or lead it through a flash vessel.',
        })
      }
    }
    if (withDesuperheater(shape)) {
      const wet = moistureOf(port('steam1'))
      if (wet > 0) {
        found.push({
          code: 'wet-steam',
          quantities: ['steam1.x', 'steam1.T'],
          message: 'wet steam, {0} of moisture, comes to its desuperheating zone.',
          values: [[wet, 'ratio']],
          advice: 'Take the zone away, or bleed from where the steam is superheated.',
        })
      }
    }
    return found
  },
  secondLaw: 'adiabatic',
  paths: (shape) => [
    ...Array.from({ length: shape.streams.steam ?? 0 }, (_, k) => ({
      from: `steam${k + 1}`,
      to: 'drain',
      course: 'line' as const,
    })),
    ...Array.from({ length: shape.streams.drainInlet ?? 0 }, (_, k) => ({
      from: `drain${k + 1}`,
      to: 'drain',
      course: 'throttledLine' as const,
    })),
    { from: 'water', to: 'outlet', course: 'line' },
  ],
  heatPassage: {
    cold: { from: 'water', to: 'outlet' },
    hot: { from: 'steam', to: 'drain' },
    shell: 'saturated',
    residualSuperheat: 'residualSuperheat',
    differences: [
      { quantity: 'terminalDifference', end: 'hot', fromSaturation: true },
      { quantity: 'drainApproach', end: 'cold' },
    ],
  },
  passes: [['water', 'outlet']],
  starts: { drain: { as: 'water', warmerBy: 'drainApproach' }, outlet: 'heated' },
})
