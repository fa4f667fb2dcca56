import type { Shape } from '../../src/units/kind.ts'

interface Row {
  /** 'in steam1..n, equal' */
  readonly ports: readonly string[]
  /** Quantities without options and optional streams; those that come in numbers by their stem. */
  readonly plain: readonly string[]
  /** What options or optional streams add. */
  readonly further?: Readonly<
    Record<string, { readonly shape: Partial<Shape>; readonly quantities: readonly string[] }>
  >
}

const option = (name: string, ...quantities: string[]) => ({
  shape: { options: { [name]: true } },
  quantities,
})

const stream = (port: string, ...quantities: string[]) => ({
  shape: { streams: { [port]: 1 } },
  quantities,
})

/** Kinds, ports and quantities that files and scripts rely on: the table of the contract, section 3. */
export const contractTable: Readonly<Record<string, Row>> = {
  supply: { ports: ['out outlet'], plain: [] },
  offtake: { ports: ['in inlet'], plain: [] },
  boiler: {
    ports: ['in feedwater', 'in spray, optional, throttles', 'out steam', 'out blowdown, optional'],
    plain: ['pressureLossFraction', 'lossConstant', 'heat', 'efficiency', 'fuelHeat'],
    further: { blowdown: stream('blowdown', 'blowdownFraction', 'drumPressure') },
  },
  reheater: {
    ports: ['in inlet', 'in spray, optional, throttles', 'out outlet'],
    plain: ['pressureLossFraction', 'lossConstant', 'heat', 'efficiency', 'fuelHeat'],
  },
  heatSource: {
    ports: ['in inlet', 'out outlet'],
    plain: ['pressureLossFraction', 'lossConstant', 'heat'],
  },
  turbine: {
    ports: ['in inlet', 'out bleed1..n, optional', 'out exhaust'],
    plain: [
      'groupEfficiency',
      'flowConstant',
      'wetnessFactor',
      'exhaustLoss',
      'exhaustVolumeFlow',
      'exhaustArea',
      'exhaustVelocity',
      'power',
    ],
    further: {
      admission: option('admission', 'admissionLossFraction', 'admissionEfficiency'),
      // The last two are the group's end state and the bleed's steam, shown beside the contract's.
      moistureRemoval: option(
        'moistureRemoval',
        'moistureRemoval',
        'groupEndEnthalpy',
        'bleedSteam',
      ),
    },
  },
  pump: {
    ports: ['in suction', 'out discharge'],
    plain: [
      'efficiency',
      'pressureRise',
      'power',
      'volumeFlow',
      'driveEfficiency',
      'electricPower',
      'suctionHeight',
      'npshAvailable',
    ],
  },
  condenser: {
    ports: ['in steam1..n, equal', 'in drain1..n, optional, throttles', 'out condensate, equal'],
    plain: [
      'pressure',
      'subcooling',
      'heat',
      'coolingInletT',
      'coolingRise',
      'coolingFlow',
      'coolingHeatCapacity',
      'terminalDifference',
      'conductance',
    ],
    further: { exponents: option('exponents', 'conductanceExponent') },
  },
  mixingHeater: {
    ports: [
      'in steam1..n, equal',
      'in water1..n, equal',
      'in drain1..n, optional, throttles',
      'out outlet, equal',
      'out vent, optional, equal',
    ],
    plain: ['pressure', 'subcooling'],
    further: { vent: stream('vent', 'ventFraction') },
  },
  surfaceHeater: {
    ports: [
      'in steam1..n, equal',
      'in drain1..n, optional, throttles',
      'out drain, equal',
      'in water',
      'out outlet',
    ],
    plain: ['pressure', 'pressureLossFraction', 'terminalDifference', 'heat', 'conductance'],
    further: {
      'drain cooler': option('drainCooler', 'drainApproach', 'drainConductance'),
      'desuperheating zone': option('desuperheater', 'residualSuperheat', 'desuperheatConductance'),
      plugging: option('plugging', 'pluggedFraction'),
      exponents: option('exponents', 'conductanceExponent'),
      'exponents of all zones': {
        shape: { options: { exponents: true, drainCooler: true, desuperheater: true } },
        quantities: [
          'drainApproach',
          'drainConductance',
          'residualSuperheat',
          'desuperheatConductance',
          'conductanceExponent',
          'drainExponent',
          'desuperheatExponent',
        ],
      },
    },
  },
  heatExchanger: {
    ports: ['in hot', 'in cold', 'out hotOutlet', 'out coldOutlet'],
    plain: [
      'heat',
      'conductance',
      'hotEndDifference',
      'coldEndDifference',
      'hotLossFraction',
      'coldLossFraction',
    ],
  },
  valve: { ports: ['in inlet', 'out outlet'], plain: ['pressureDrop', 'pressureLossFraction'] },
  pipe: {
    ports: ['in inlet', 'out outlet'],
    plain: ['pressureDrop', 'pressureLossFraction', 'lossConstant', 'heatLoss'],
  },
  leak: { ports: ['in inlet', 'out outlet'], plain: ['flowConstant'] },
  branch: { ports: ['in inlet', 'out outlet1..n'], plain: ['share'] },
  junction: { ports: ['in inlet1..n', 'out outlet'], plain: [] },
  desuperheater: {
    ports: ['in steam, equal', 'in spray, throttles', 'out outlet, equal'],
    plain: [],
  },
  flashVessel: {
    ports: ['in inlet1..n, throttles', 'out steam, equal', 'out water, equal'],
    plain: ['pressure'],
  },
  separator: {
    ports: ['in inlet', 'out steam', 'out drain'],
    plain: ['effectiveness', 'pressureLossFraction'],
  },
  heatUser: { ports: ['in steam', 'out condensate'], plain: ['returnFraction', 'heat'] },
}
