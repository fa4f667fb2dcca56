import type { Catalogue, Kind } from '../../src/plant/catalogue.ts'
import type { PortDescription, QuantityDescription, QuantityTable } from '../../src/units/kind.ts'

/*
 * A few kinds that no plant has, with every feature that a kind can declare: the checks and edits are
 * tested against these, and so do not depend on what the registry holds.
 */

type Carries = PortDescription['carries']

const port = (
  direction: 'in' | 'out',
  carries: Carries,
  more: Partial<PortDescription> = {},
): PortDescription => ({ direction, carries, pressure: 'own', label: 'Port', ...more })

const quantity = (more: Partial<QuantityDescription> = {}): QuantityDescription => ({
  label: 'Quantity',
  dimension: 'ratio',
  help: 'A quantity.',
  ...more,
})

const common = {
  group: 'Vessels',
  help: 'An invented kind.',
  secondLaw: 'adiabatic',
  paths: () => [],
} as const

/** Water in, steam out; an optional outlet brings quantities with it. */
const kettle: Kind = {
  ...common,
  name: 'kettle',
  label: 'Kettle',
  idStem: 'kettle',
  ports: {
    water: port('in', 'water', { label: 'Water' }),
    steam: port('out', 'steam', { label: 'Steam' }),
    drip: port('out', 'water', { optional: true, label: 'Drip' }),
  },
  quantities: {
    warmth: quantity({ usual: 0.9, given: true }),
    duty: quantity({ dimension: 'heatFlow' }),
    dripFraction: quantity({ usual: 0.01, given: true, when: ({ streams }) => streams.drip === 1 }),
    dripPressure: quantity({
      dimension: 'pressure',
      when: ({ streams }) => streams.drip === 1,
    }),
  },
}

/** Drives a shaft; taps part it into stretches. */
const mill: Kind = {
  ...common,
  name: 'mill',
  label: 'Mill',
  idStem: 'mill',
  shaft: 'driving',
  ports: {
    inlet: port('in', 'steam', { label: 'Inlet' }),
    tap: port('out', 'steam', { repeated: true, optional: true, label: 'Tap' }),
    exhaust: port('out', 'steam', { label: 'Exhaust' }),
  },
  quantities: {
    skill: quantity({ label: 'Skill', usual: 0.8, given: true, each: { port: 'tap', extra: 1 } }),
    throat: quantity({ label: 'Throat', dimension: 'area', each: { port: 'tap', extra: 1 } }),
    lift: quantity({
      label: 'Lift',
      usual: 0.1,
      given: true,
      each: { port: 'tap', extra: 0 },
      when: ({ options }) => options.lifting === true,
    }),
    power: quantity({ label: 'Power', dimension: 'power' }),
  },
  options: {
    lifting: { label: 'Lifting', help: 'Lifts.' },
    heldTaps: { label: 'Held taps', help: 'Numbers of taps.', list: { numbersOf: 'tap' } },
    origins: {
      label: 'Origins',
      help: 'One for each stretch.',
      list: { each: { port: 'tap', extra: 1 } },
    },
  },
}

/** Driven by a shaft, or by itself. */
const lifter: Kind = {
  ...common,
  name: 'lifter',
  label: 'Lifter',
  idStem: 'lifter',
  shaft: 'driven',
  ports: { inlet: port('in', 'water'), outlet: port('out', 'water') },
  quantities: {
    power: quantity({ dimension: 'power' }),
    skill: quantity({ usual: 0.7, given: true }),
  },
}

/** Repeated inlets that must have a stream each, condensing to water. */
const tub: Kind = {
  ...common,
  name: 'tub',
  label: 'Tub',
  idStem: 'tub',
  ports: {
    steam: port('in', 'steam', { repeated: true, label: 'Steam' }),
    drainInlet: port('in', 'any', {
      repeated: true,
      stem: 'drain',
      optional: true,
      label: 'Drain inlet',
    }),
    drain: port('out', 'water', { optional: true, label: 'Drain' }),
    outlet: port('out', 'water', { label: 'Outlet' }),
  },
  quantities: {
    pressure: quantity({ dimension: 'pressure', usual: 1e5, given: true }),
    part: quantity({ label: 'Part', each: { port: 'drainInlet', extra: 0 } }),
  },
}

const fork: Kind = {
  ...common,
  name: 'fork',
  label: 'Fork',
  idStem: 'fork',
  ports: { inlet: port('in', 'any'), outlet: port('out', 'any', { repeated: true }) },
  quantities: { share: quantity({ label: 'Share', each: { port: 'outlet', extra: 0 } }) },
  passes: [['inlet', 'outlet']],
}

/** Two lines run through it. */
const twin: Kind = {
  ...common,
  name: 'twin',
  label: 'Twin',
  idStem: 'twin',
  ports: {
    hot: port('in', 'any'),
    cold: port('in', 'any'),
    hotOutlet: port('out', 'any'),
    coldOutlet: port('out', 'any'),
  },
  quantities: { duty: quantity({ dimension: 'heatFlow' }) },
  passes: [
    ['hot', 'hotOutlet'],
    ['cold', 'coldOutlet'],
  ],
}

const streamQuantities: QuantityTable = {
  m: quantity({ label: 'Flow', dimension: 'massFlow' }),
  p: quantity({ label: 'Pressure', dimension: 'pressure' }),
  T: quantity({ label: 'Temperature', dimension: 'temperature' }),
}

const bearing: QuantityTable = { loss: quantity({ dimension: 'power', usual: 0, given: true }) }
const dynamo: QuantityTable = {
  dynamoSkill: quantity({ usual: 0.98, given: true }),
  dynamoPower: quantity({ dimension: 'power' }),
}

const kinds = [kettle, mill, lifter, tub, fork, twin]

export const invented: Catalogue = {
  kinds,
  kindNamed: (name) => kinds.find((kind) => kind.name === name),
  streamQuantities,
  shaftQuantities: (generator) => (generator ? { ...bearing, ...dynamo } : bearing),
  plantQuantities: {
    netPower: quantity({ dimension: 'power' }),
    otherAuxiliary: quantity({ dimension: 'power', usual: 0, given: true }),
  },
}
