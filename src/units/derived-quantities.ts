import type { QuantityTable } from './kind.ts'

/*
 * What is worked out from a solved balance for tables and charts. It cannot be given and holds no
 * equation up; its paths are those of the owner with one of these names.
 */

/** Of every stream. */
export const derivedStreamQuantities = {
  exergy: {
    label: 'Exergy',
    symbol: 'e',
    dimension: 'specificEnthalpy',
    help: 'h − h0 − T0 (s − s0), by the ambient state; kinetic, potential and chemical exergy left out.',
  },
  exergyFlow: {
    label: 'Exergy flow',
    symbol: 'E',
    dimension: 'power',
    help: 'Flow times specific exergy.',
  },
} as const satisfies QuantityTable

/** Of every unit. */
export const derivedUnitQuantities = {
  massImbalance: {
    label: 'Mass closure',
    symbol: 'Δm',
    dimension: 'massFlow',
    help: 'What enters less what leaves, worked out anew from the streams alone.',
  },
  energyImbalance: {
    label: 'Energy closure',
    symbol: 'ΔE',
    dimension: 'heatFlow',
    help: 'What enters less what leaves, with heat and work, worked out anew from the streams alone.',
  },
  heatReceived: {
    label: 'Heat received',
    symbol: 'Q',
    dimension: 'heatFlow',
    help: 'Heat that the unit receives from outside the streams; negative where it gives heat off.',
  },
  workDelivered: {
    label: 'Power delivered',
    symbol: 'P',
    dimension: 'power',
    help: 'Power at the unit\u2019s shaft; negative where it takes power up.',
  },
  exergeticEfficiency: {
    label: 'Exergetic efficiency',
    symbol: 'ηe',
    dimension: 'ratio',
    help: 'Turbine: power over exergy given up. Pump: exergy gained over power. Boiler, reheater: exergy gained over fuel heat. Heater: exergy gained by the water over that given up by the steam. Others: exergy leaving over exergy entering.',
  },
} as const satisfies QuantityTable

/** Of a stage group: `hp.group2.power`. */
export const stageGroupQuantities = {
  flow: { label: 'Flow', symbol: 'm', dimension: 'massFlow', help: 'Flow through the group.' },
  inletPressure: {
    label: 'Inlet pressure',
    symbol: 'p1',
    dimension: 'pressure',
    help: 'Pressure at which the group starts, behind the admission where there is one.',
  },
  outletPressure: {
    label: 'Outlet pressure',
    symbol: 'p2',
    dimension: 'pressure',
    help: 'Pressure at the end of the group.',
  },
  pressureRatio: {
    label: 'Pressure ratio',
    symbol: 'p1/p2',
    dimension: 'number',
    help: 'Inlet over outlet pressure.',
  },
  inletTemperature: {
    label: 'Inlet temperature',
    symbol: 'T1',
    dimension: 'temperature',
    help: 'Temperature at which the group starts.',
  },
  outletTemperature: {
    label: 'Outlet temperature',
    symbol: 'T2',
    dimension: 'temperature',
    help: 'Temperature at the end of the group.',
  },
  efficiencyDry: {
    label: 'Dry efficiency',
    symbol: 'ηdry',
    dimension: 'ratio',
    help: 'Isentropic efficiency of the group before wetness takes its part.',
  },
  efficiencyWet: {
    label: 'Wet efficiency',
    symbol: 'η',
    dimension: 'ratio',
    help: 'Isentropic efficiency of the group as it works, wetness included; before the exhaust loss.',
  },
  moisture: {
    label: 'Moisture at outlet',
    symbol: 'y',
    dimension: 'ratio',
    help: 'One less the dryness at the end of the group; 0 where it is dry.',
  },
  power: {
    label: 'Power',
    symbol: 'P',
    dimension: 'power',
    help: 'What the group gives to the shaft; what valves and exhaust lose is taken off.',
  },
  flowConstant: {
    label: 'Flow constant',
    symbol: 'K',
    dimension: 'flowConstant',
    help: "Stodola's ellipse: flow over the root of p/v and of 1 − (p2/p1)²; the group's swallowing capacity.",
  },
} as const satisfies QuantityTable
