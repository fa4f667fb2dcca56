import type { Given } from '../../src/document.ts'
import type { LayoutParts } from './build-layout.ts'

/*
 * The three arrangements that most handbook examples share, without losses in lines, shaft and
 * generator unless `over` gives them. Ids: boiler b, turbines t (hp and lp with reheat), reheater r,
 * condenser c, pumps p, p1, p2 in the order of the water, mixing heater d; streams main, cold (to the
 * reheater), hot (from it), bleed, exhaust, condensate, feed.
 */

interface Common {
  /** State of the steam that leaves the boiler: its quantities as given. */
  readonly main: Readonly<Record<string, Given>>
  /** Condenser pressure, Pa. */
  readonly condenser: number
  /** Isentropic efficiency of every pump; 1 where not named. */
  readonly pump?: number
  /** Further givens of the condenser: its cooling side. */
  readonly cooling?: Readonly<Record<string, Given>>
  readonly plant?: Readonly<Record<string, Given>>
  readonly ambient?: number
}

const fired = { pressureLossFraction: 0, efficiency: 1 } as const
const dry = { wetnessFactor: 0, exhaustLoss: 0 } as const

function frame({ condenser, pump = 1, cooling = {} }: Common) {
  return {
    b: ['boiler', fired],
    c: ['condenser', { pressure: condenser, subcooling: 0, ...cooling }],
    pump: ['pump', { efficiency: pump, driveEfficiency: 1 }],
  } as const
}

const totals = ({ plant, ambient }: Common) => ({
  plant: { otherAuxiliary: 0, ...plant },
  ...(ambient !== undefined && { ambient }),
})

/** Boiler, turbine, condenser, pump. */
export function simpleCycle(of: Common & { readonly turbine?: number }): LayoutParts {
  const { b, c, pump } = frame(of)
  return {
    units: { b, t: ['turbine', { groupEfficiency1: of.turbine ?? 1, ...dry }], c, p: pump },
    streams: {
      main: ['b.steam', 't.inlet', of.main],
      exhaust: ['t.exhaust', 'c.steam1'],
      condensate: ['c.condensate', 'p.suction'],
      feed: ['p.discharge', 'b.feedwater'],
    },
    shafts: { s: { turbines: ['t'] } },
    ...totals(of),
  }
}

interface Reheat extends Common {
  readonly cold: Readonly<Record<string, Given>>
  readonly hot: Readonly<Record<string, Given>>
  /** Group efficiencies of the two turbines; 1 where not named. */
  readonly hp?: number
  readonly lp?: number
}

/** Boiler, turbine, reheater, turbine, condenser, pump. */
export function reheatCycle(
  of: Reheat & { readonly exhaust?: Readonly<Record<string, Given>> },
): LayoutParts {
  const { b, c, pump } = frame(of)
  return {
    units: {
      b,
      hp: ['turbine', { groupEfficiency1: of.hp ?? 1, ...dry }],
      r: ['reheater', fired],
      lp: ['turbine', { groupEfficiency1: of.lp ?? 1, ...dry }],
      c,
      p: pump,
    },
    streams: {
      main: ['b.steam', 'hp.inlet', of.main],
      cold: ['hp.exhaust', 'r.inlet', of.cold],
      hot: ['r.outlet', 'lp.inlet', of.hot],
      exhaust: ['lp.exhaust', 'c.steam1', of.exhaust ?? {}],
      condensate: ['c.condensate', 'p.suction'],
      feed: ['p.discharge', 'b.feedwater'],
    },
    shafts: { s: { turbines: ['hp', 'lp'] } },
    ...totals(of),
  }
}

/** The water's way through one mixing heater, fed from stream `bleed`. */
const oneHeater = {
  condensate: ['c.condensate', 'p1.suction'],
  warm: ['p1.discharge', 'd.water1'],
  hotWater: ['d.outlet', 'p2.suction'],
  feed: ['p2.discharge', 'b.feedwater'],
} as const

/** One bleed into one mixing heater, a pump before and behind it. */
export function oneHeaterCycle(
  of: Common & {
    readonly bleed: Readonly<Record<string, Given>>
    /** Group efficiencies before and behind the bleed; 1 where not named. */
    readonly turbine?: readonly [number, number]
  },
): LayoutParts {
  const { b, c, pump } = frame(of)
  const [before, behind] = of.turbine ?? [1, 1]
  return {
    units: {
      b,
      t: ['turbine', { groupEfficiency1: before, groupEfficiency2: behind, ...dry }],
      c,
      p1: pump,
      d: ['mixingHeater', { subcooling: 0 }],
      p2: pump,
    },
    streams: {
      main: ['b.steam', 't.inlet', of.main],
      bleed: ['t.bleed1', 'd.steam1', of.bleed],
      exhaust: ['t.exhaust', 'c.steam1'],
      ...oneHeater,
    },
    shafts: { s: { turbines: ['t'] } },
    ...totals(of),
  }
}

/** Reheat, and one bleed of the turbine behind it into one mixing heater. */
export function reheatHeaterCycle(
  of: Omit<Reheat, 'lp'> & {
    readonly bleed: Readonly<Record<string, Given>>
    /** Group efficiencies of the second turbine before and behind the bleed; null: to be solved. */
    readonly lp: readonly [number, number | null]
    readonly exhaust?: Readonly<Record<string, Given>>
    /** Givens of the water that leaves the heater. */
    readonly hotWater?: Readonly<Record<string, Given>>
    /** Kelvins below saturation of that water; null leaves it to be solved. */
    readonly subcooling?: number | null
  },
): LayoutParts {
  const { b, c, pump } = frame(of)
  const { subcooling = 0 } = of
  const [before, behind] = of.lp
  return {
    units: {
      b,
      hp: ['turbine', { groupEfficiency1: of.hp ?? 1, ...dry }],
      r: ['reheater', fired],
      lp: [
        'turbine',
        { groupEfficiency1: before, ...(behind !== null && { groupEfficiency2: behind }), ...dry },
      ],
      c,
      p1: pump,
      d: ['mixingHeater', subcooling === null ? {} : { subcooling }],
      p2: pump,
    },
    streams: {
      main: ['b.steam', 'hp.inlet', of.main],
      cold: ['hp.exhaust', 'r.inlet', of.cold],
      hot: ['r.outlet', 'lp.inlet', of.hot],
      bleed: ['lp.bleed1', 'd.steam1', of.bleed],
      exhaust: ['lp.exhaust', 'c.steam1', of.exhaust ?? {}],
      ...oneHeater,
      hotWater: ['d.outlet', 'p2.suction', of.hotWater ?? {}],
    },
    shafts: { s: { turbines: ['hp', 'lp'] } },
    ...totals(of),
  }
}
