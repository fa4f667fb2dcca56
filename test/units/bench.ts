import type { Given } from '../../src/document.ts'
import { numberedPort, type UnitKind } from '../../src/units/kind.ts'
import type { LayoutParts, ShaftParts } from '../published/build-layout.ts'

/*
 * Each kind of unit alone, between supplies of known state and offtakes: with every combination of
 * its options, one and two streams at repeated ports (none, one and two where they are optional),
 * with and without optional ports. States and flows are invented, of ordinary size.
 */

type Numbers = Readonly<Record<string, number>>

/** What must be known of the streams at a unit, and of the unit beside what arrives given. */
interface Setting {
  /** By numbered port. */
  readonly streams: (counts: Counts) => Readonly<Record<string, Numbers>>
  /** What a designer gives, beside the quantities that arrive given. */
  readonly given?: (counts: Counts) => Numbers
}

type Counts = Readonly<Record<string, number>>

/** Numbers 1 to n. */
const upTo = (n = 0): readonly number[] => Array.from({ length: n }, (_, k) => k + 1)

const settings: Readonly<Record<string, Setting>> = {
  boiler: {
    streams: () => ({
      feedwater: { p: 13e6, T: 500 },
      steam: { T: 813, m: 100 },
      spray: { p: 15e6, T: 450, m: 3 },
    }),
    given: ({ blowdown = 0 }): Numbers => (blowdown > 0 ? { drumPressure: 12.5e6 } : {}),
  },
  reheater: {
    streams: () => ({
      inlet: { p: 3e6, T: 600, m: 80 },
      spray: { p: 8e6, T: 430, m: 1 },
      outlet: { T: 813 },
    }),
  },
  heatSource: {
    streams: () => ({ inlet: { p: 5e6, T: 400, m: 50 } }),
    given: () => ({ heat: 5e6 }),
  },
  turbine: {
    // The last group always ends wet; of two bleeds the first is dry and the second wet.
    streams: ({ bleed = 0 }) => ({
      inlet: { p: 6e6, T: 773, m: 100 },
      ...(bleed === 1 && { bleed1: { p: 1e5, m: 6 } }),
      ...(bleed === 2 && { bleed1: { p: 1e6, m: 8 }, bleed2: { p: 1e5, m: 6 } }),
      exhaust: { p: 1e4 },
    }),
    given: () => ({ exhaustArea: 5 }),
  },
  pump: {
    streams: () => ({ suction: { p: 7e5, T: 430, m: 100 }, discharge: { p: 15e6 } }),
    given: () => ({ suctionHeight: 12 }),
  },
  surfaceHeater: {
    streams: () => ({
      steam1: { p: 1e6, T: 600 },
      steam2: { T: 520, m: 1 },
      drain1: { p: 2e6, T: 480, m: 3 },
      drain2: { p: 3e6, x: 0, m: 1 },
      water: { p: 8e6, T: 420, m: 100 },
    }),
  },
  mixingHeater: {
    streams: () => ({
      steam1: { p: 7e5, T: 500 },
      steam2: { T: 480, m: 1 },
      water1: { T: 400, m: 100 },
      water2: { T: 380, m: 5 },
      drain1: { p: 1.5e6, x: 0, m: 3 },
      drain2: { p: 2e6, T: 470, m: 2 },
    }),
  },
  condenser: {
    streams: () => ({
      steam1: { x: 0.9, m: 100 },
      steam2: { x: 0.96, m: 5 },
      drain1: { p: 1e5, T: 330, m: 3 },
      drain2: { p: 2e5, x: 0, m: 1 },
    }),
    given: () => ({ coolingInletT: 288, coolingRise: 9 }),
  },
  heatExchanger: {
    streams: () => ({ hot: { p: 1e6, T: 440, m: 20 }, cold: { p: 2e6, T: 320, m: 40 } }),
    given: () => ({ coldEndDifference: 10 }),
  },
  heatUser: {
    streams: () => ({ steam: { p: 5e5, T: 450, m: 10 }, condensate: { p: 3e5, T: 350 } }),
  },
  flashVessel: {
    streams: () => ({ inlet1: { p: 1e6, x: 0, m: 10 }, inlet2: { p: 8e5, T: 440, m: 5 } }),
    given: () => ({ pressure: 2e5 }),
  },
  separator: { streams: () => ({ inlet: { p: 5e5, x: 0.88, m: 100 } }) },
  desuperheater: {
    streams: () => ({
      steam: { p: 2e6, T: 650, m: 50 },
      spray: { p: 5e6, T: 400 },
      outlet: { T: 500 },
    }),
  },
  pipe: { streams: () => ({ inlet: { p: 6e6, T: 700, m: 80 } }) },
  valve: {
    streams: () => ({ inlet: { p: 6e6, T: 700, m: 80 } }),
    given: () => ({ pressureDrop: 2e5 }),
  },
  leak: { streams: () => ({ inlet: { p: 3e6, T: 700, m: 0.5 }, outlet: { p: 1e5 } }) },
  branch: {
    streams: () => ({ inlet: { p: 8e5, T: 520, m: 10 } }),
    // One outlet takes what the others leave.
    given: ({ outlet = 0 }) =>
      Object.fromEntries(upTo(outlet - 1).map((k) => [`share${k}`, 0.1 + 0.1 * k])),
  },
  junction: {
    streams: () => ({ inlet1: { p: 8e5, T: 520, m: 10 }, inlet2: { T: 440, m: 3 } }),
  },
  supply: { streams: () => ({ outlet: { p: 1e5, T: 288, m: 2 } }) },
  offtake: { streams: () => ({ inlet: { p: 1e5, T: 288, m: 2 } }) },
}

const shaftLosses = {
  mechanicalEfficiency: 0.99,
  mechanicalLoss: 0,
  generatorEfficiency: 0.985,
  generatorLoss: 0,
} as const

/** A unit alone: `u`; its streams bear the names of their ports. */
export interface Bench {
  /** 'surfaceHeater drainCooler, steam 2, drain 1' */
  readonly name: string
  readonly kind: UnitKind
  readonly parts: LayoutParts
  /** Numbered names of the ports that have a stream. */
  readonly ports: readonly string[]
}

/** The unit's id on every bench. */
export const unitId = 'u'

/** Every choice of one entry from each list. */
function product<T>(lists: readonly (readonly T[])[]): readonly (readonly T[])[] {
  return lists.reduce<readonly (readonly T[])[]>(
    (found, list) => found.flatMap((chosen) => list.map((one) => [...chosen, one])),
    [[]],
  )
}

/** The benches of a kind: options, numbers of streams, and drive. */
export function benchesOf(kind: UnitKind): readonly Bench[] {
  const setting = settings[kind.name]
  if (!setting) throw new Error(`there is no bench for ${kind.name}`)
  const switches = Object.entries(kind.options ?? {}).filter(([, { list }]) => !list)
  const ports = Object.entries(kind.ports)
  const drives = kind.shaft === 'driven' ? [false, true] : [false]
  const choices = product<boolean>(switches.map(() => [false, true]))
  const numbers = product<number>(
    ports.map(([, { repeated, optional }]) => {
      if (repeated) return optional ? [0, 1, 2] : [1, 2]
      return optional ? [0, 1] : [1]
    }),
  )
  const most = [numbers.at(-1)!]
  // With no option and with all of them every number of streams, else as many as there are.
  const numbersFor = (chosen: readonly boolean[]) =>
    chosen.every((one) => one === chosen[0]) ? numbers : most
  return choices.flatMap((chosen) =>
    numbersFor(chosen).flatMap((counts) =>
      drives.map((isDriven) => {
        const options = Object.fromEntries(
          switches.flatMap(([name], k) => (chosen[k] ? [[name, true] as const] : [])),
        )
        const byPort = Object.fromEntries(ports.map(([port], k) => [port, counts[k]!]))
        return benchOf(kind, setting, options, byPort, isDriven)
      }),
    ),
  )
}

function benchOf(
  kind: UnitKind,
  setting: Setting,
  options: Readonly<Record<string, boolean>>,
  counts: Counts,
  isDriven: boolean,
): Bench {
  const known = setting.streams(counts)
  const units: Record<string, LayoutParts['units'][string]> = {}
  const streams: Record<string, LayoutParts['streams'][string]> = {}
  const names: string[] = []
  for (const [port, { direction, repeated }] of Object.entries(kind.ports)) {
    for (const number of upTo(counts[port])) {
      const name = repeated ? numberedPort(kind.ports, port, number) : port
      names.push(name)
      units[`${name}End`] = [direction === 'in' ? 'supply' : 'offtake']
      const here = `${unitId}.${name}`
      streams[name] =
        direction === 'in'
          ? [`${name}End.outlet`, here, known[name] ?? {}]
          : [here, `${name}End.inlet`, known[name] ?? {}]
    }
  }
  units[unitId] = [
    kind.name,
    { ...usualGivens(kind, options, counts), ...setting.given?.(counts) },
    options,
  ]
  const shafts: Record<string, ShaftParts> = {}
  if (kind.shaft === 'driving') shafts.sh = { turbines: [unitId], given: shaftLosses }
  if (isDriven) {
    // A small turbine turns it; how much steam that takes follows.
    units.drive = ['turbine', { groupEfficiency1: 0.8, wetnessFactor: 1, exhaustLoss: 0 }]
    units.driveSteam = ['supply']
    units.driveExhaust = ['offtake']
    streams.toDrive = ['driveSteam.outlet', 'drive.inlet', { p: 1e6, T: 650 }]
    streams.fromDrive = ['drive.exhaust', 'driveExhaust.inlet', { p: 1e4 }]
    const { mechanicalEfficiency, mechanicalLoss } = shaftLosses
    const given = { mechanicalEfficiency, mechanicalLoss }
    shafts.sh = { turbines: ['drive'], pumps: [unitId], generator: false, given }
  }
  const told = [
    ...Object.keys(options),
    ...Object.entries(kind.ports).flatMap(([port, { repeated, optional }]) =>
      repeated || optional ? [`${counts[port]} ${port}`] : [],
    ),
    ...(isDriven ? ['on a shaft'] : []),
  ]
  return {
    name: [kind.name, ...told].join(', '),
    kind,
    parts: { units, streams, shafts },
    ports: names,
  }
}

/** What a unit of this shape arrives with. */
function usualGivens(
  kind: UnitKind,
  options: Readonly<Record<string, boolean>>,
  streams: Counts,
): Readonly<Record<string, Given>> {
  const shape = { options, streams }
  const given: Record<string, Given> = {}
  for (const [name, { usual, each, when, ...description }] of Object.entries(kind.quantities)) {
    if (description.given === undefined || usual === undefined) continue
    if (when && !when(shape)) continue
    if (!each) given[name] = usual
    else {
      for (const k of upTo((streams[each.port] ?? 0) + each.extra)) given[`${name}${k}`] = usual
    }
  }
  return given
}
