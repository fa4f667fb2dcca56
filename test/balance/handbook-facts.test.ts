import { describe, expect, test } from 'vitest'
import { SATURATION_SIZE, Saturation, saturationAtPressure } from '../../src/steam/index.ts'
import { type LayoutParts, type Look, layoutOf, solved } from '../published/build-layout.ts'
import { saturation, steam } from './by-hand.ts'

/*
 * What handbooks say of regenerative cycles, each fact with the condition under which it holds and
 * where it comes from. Figures marked 'recomputed' were computed from IAPWS-IF97 with another
 * implementation (CoolProp 8.0), not printed in a book.
 */

const solutionOf = (parts: LayoutParts): Look => solved(layoutOf(parts)).at

type Units = Record<string, LayoutParts['units'][string]>
type Streams = Record<string, LayoutParts['streams'][string]>

const record = new Float64Array(SATURATION_SIZE)

/** Pressure at which saturated liquid has an enthalpy, Pa. */
function pressureOf(enthalpy: number): number {
  let [low, high] = [Math.log(700), Math.log(20e6)]
  for (let k = 0; k < 40; k++) {
    const middle = (low + high) / 2
    saturationAtPressure(record, 0, Math.exp(middle))
    if (record[Saturation.hL]! < enthalpy) low = middle
    else high = middle
  }
  return Math.exp((low + high) / 2)
}

const main = { p: 15e6, T: 813.15, m: 100 } as const
const boiling = saturation(main.p).liquid

/** Pressures of mixing heaters, the highest first, that heat the water to these parts of the rise. */
function pressuresAt(parts: readonly number[], condenser = 5e3): number[] {
  const cold = saturation(condenser).liquid
  return parts.map((part) => pressureOf(cold + part * (boiling - cold)))
}

/** n heaters: the rise from condensate to boiling water in n + 1 equal parts. */
const equalParts = (heaters: number): number[] =>
  Array.from({ length: heaters }, (_, k) => (heaters - k) / (heaters + 1))

/**
 * The ideal cycle of the facts: 15 MPa, 540 °C, isentropic expansion, mixing heaters without losses,
 * no pump work. Water therefore goes on from heater to heater at the enthalpy with which it left the
 * last one; a curve hands its flow on.
 */
function idealEfficiency(pressures: readonly number[], condenser = 5e3): number {
  const liquid = [...pressures, condenser].map((p) => saturation(p).liquid)
  const groups = [...liquid.keys()].map((k) => [`groupEfficiency${k + 1}`, 1] as const)
  const units: Units = {
    water: ['supply'],
    b: ['boiler', { pressureLossFraction: 0, efficiency: 1 }],
    t: ['turbine', { ...Object.fromEntries(groups), wetnessFactor: 0, exhaustLoss: 0 }],
    c: ['condenser', { pressure: condenser, subcooling: 0 }],
    end: ['offtake'],
  }
  const streams: Streams = {
    feed: ['water.outlet', 'b.feedwater', { h: liquid[0]! }],
    main: ['b.steam', 't.inlet', main],
    exhaust: ['t.exhaust', 'c.steam1'],
    condensate: ['c.condensate', 'end.inlet'],
  }
  let before = 'feed'
  pressures.forEach((p, k) => {
    const id = k + 1
    units[`h${id}`] = ['mixingHeater', { subcooling: 0 }]
    units[`from${id}`] = ['supply']
    units[`to${id}`] = ['offtake']
    const flow = { against: `${before}.m`, power: { at: 1, value: 1, exponent: 1 } }
    streams[`bleed${id}`] = [`t.bleed${id}`, `h${id}.steam1`, { p }]
    streams[`hot${id}`] = [`h${id}.outlet`, `to${id}.inlet`, { m: flow }]
    streams[`cold${id}`] = [`from${id}.outlet`, `h${id}.water1`, { h: liquid[id]! }]
    before = `cold${id}`
  })
  const at = solutionOf({ units, streams, shafts: { s: { turbines: ['t'] } } })
  // What the turbine sends to the condenser is what the heaters take from there.
  expect(at('condensate.m') / at(`${before}.m`)).toBeCloseTo(1, 9)
  return at('plant.turbinePower') / at('plant.heatInput')
}

describe('ideal cycle, 15 MPa, 540 °C, 5 kPa, mixing heaters at equal enthalpy rise, no pump work', () => {
  const efficiencies = Array.from({ length: 9 }, (_, n) =>
    idealEfficiency(pressuresAt(equalParts(n))),
  )
  const gain = (n: number): number => 100 * (efficiencies[n]! / efficiencies[0]! - 1)

  test('without heaters: 43.99 % (recomputed)', () => {
    expect(100 * efficiencies[0]!).toBeCloseTo(43.99, 2)
  })

  test.each([
    [1, 7.9],
    [2, 11.3],
    [3, 13.2],
    [4, 14.5],
    [5, 15.3],
    // Recomputed as 16.0; from the same source's 51.00 % of this cycle it is 15.9.
    [6, 15.9],
    [7, 16.4],
    [8, 16.8],
  ])('%d heaters gain %d per cent (recomputed)', (heaters, percent) => {
    expect(Math.abs(gain(heaters) - percent)).toBeLessThanOrEqual(0.051)
  })

  test('each further heater gains less than the one before; the eighth less than 0.5 % (recomputed)', () => {
    const steps = Array.from({ length: 8 }, (_, k) => gain(k + 1) - gain(k))
    for (let k = 1; k < steps.length; k++) expect(steps[k]).toBeLessThan(steps[k - 1]!)
    expect(steps.at(-1)).toBeGreaterThan(0)
    expect(steps.at(-1)).toBeLessThan(0.5)
  })

  test.each([
    [3e3, 52.3],
    [4e3, 51.58],
    [5e3, 51.0],
    [7e3, 50.1],
    [10e3, 49.1],
  ])('six heaters and a condenser at %d Pa: %d per cent (recomputed)', (condenser, percent) => {
    const efficiency = idealEfficiency(pressuresAt(equalParts(6), condenser), condenser)
    expect(100 * efficiency).toBeCloseTo(percent, 2)
  })
})

/*
 * R. W. Haywood, Proc. IMechE 161 (1949) 157, and J. K. Salisbury, Trans. ASME 64 (1942) 231: bleeds
 * that part the rise of the feedwater's enthalpy equally are nearly the best. Condition: the same
 * ideal cycle, without reheat.
 */
describe('equal enthalpy rise is near the optimum', () => {
  test('one heater: 47.47 % at equal rise, 47.49 % at best (recomputed)', () => {
    const equal = idealEfficiency(pressuresAt([0.5]))
    expect(100 * equal).toBeCloseTo(47.47, 2)
    const tried = Array.from({ length: 9 }, (_, k) => 0.38 + 0.02 * k)
    const efficiencies = tried.map((part) => idealEfficiency(pressuresAt([part])))
    const best = Math.max(...efficiencies)
    expect(100 * best).toBeCloseTo(47.49, 2)
    const at = tried[efficiencies.indexOf(best)]!
    expect(Math.abs(at - 0.5)).toBeLessThan(0.06)
  })

  test('three heaters: the best that a search finds is better by less than 0.1 % of it', () => {
    const efficiencyOf = (parts: readonly number[]): number => idealEfficiency(pressuresAt(parts))
    const equal = efficiencyOf(equalParts(3))
    let [parts, best] = [equalParts(3), equal]
    // One heater after the other is moved while that helps, by ever smaller steps.
    for (const step of [0.04, 0.015]) {
      for (let k = 0; k < 3; k++) {
        for (const move of [-step, step]) {
          const moved = parts.map((part, i) => (i === k ? part + move : part))
          const efficiency = efficiencyOf(moved)
          if (efficiency > best) [parts, best] = [moved, efficiency]
        }
      }
    }
    expect(best).toBeGreaterThan(equal)
    expect(best / equal - 1).toBeLessThan(1e-3)
    // Bleeds crowded to either end lose far more than equal parts miss.
    for (const crowded of [0.4, 2]) {
      const away = equalParts(3).map((part) => part ** crowded)
      expect(1 - efficiencyOf(away) / equal).toBeGreaterThan(5 * (best / equal - 1))
    }
  })
})

/** Two surface heaters of one terminal difference before a deaerator, without drain coolers. */
function drains(forward: boolean, terminalDifference: number): Look {
  const pump = ['pump', { efficiency: 0.8, driveEfficiency: 1 }] as const
  const closed = ['surfaceHeater', { pressureLossFraction: 0, terminalDifference }] as const
  const efficiencies = Object.fromEntries([1, 2, 3, 4].map((k) => [`groupEfficiency${k}`, 0.87]))
  const units: Units = {
    b: ['boiler', { pressureLossFraction: 0, efficiency: 1 }],
    t: ['turbine', { ...efficiencies, wetnessFactor: 1, exhaustLoss: 0 }],
    c: ['condenser', { pressure: 5e3, subcooling: 0 }],
    condensatePump: pump,
    low: closed,
    high: closed,
    d: ['mixingHeater', { subcooling: 0 }],
    feedPump: pump,
  }
  const streams: Streams = {
    main: ['b.steam', 't.inlet', { p: 12e6, T: 813.15, m: 100 }],
    toDeaerator: ['t.bleed1', 'd.steam1', { p: 7e5 }],
    toHigh: ['t.bleed2', 'high.steam1', { p: 2e5 }],
    toLow: ['t.bleed3', 'low.steam1', { p: 5e4 }],
    exhaust: ['t.exhaust', 'c.steam1'],
    condensate: ['c.condensate', 'condensatePump.suction'],
    lifted: ['condensatePump.discharge', 'low.water'],
    cascaded: ['high.drain', 'low.drain1'],
    heated: ['high.outlet', 'd.water1'],
    hot: ['d.outlet', 'feedPump.suction'],
    feed: ['feedPump.discharge', 'b.feedwater'],
  }
  if (forward) {
    units.drainPump = pump
    units.mix = ['junction']
    Object.assign(streams, {
      drain: ['low.drain', 'drainPump.suction'],
      pumped: ['drainPump.discharge', 'mix.inlet2'],
      warm: ['low.outlet', 'mix.inlet1'],
      mixed: ['mix.outlet', 'high.water'],
    } satisfies Streams)
  } else {
    Object.assign(streams, {
      drain: ['low.drain', 'c.drain1'],
      warm: ['low.outlet', 'high.water'],
    } satisfies Streams)
  }
  return solutionOf({ units, streams, shafts: { s: { turbines: ['t'] } } })
}

/*
 * Common practice. Condition: the same terminal differences, no drain coolers, lossless lines: the
 * drain pumped forward keeps its heat in the feedwater, the cascaded one gives it to the condenser.
 */
test.each([1, 3, 5])(
  'with terminal differences of %d K a drain pumped forward beats one cascaded to the condenser',
  (terminalDifference) => {
    const forward = drains(true, terminalDifference)
    const cascaded = drains(false, terminalDifference)
    // The same steam, heated from the same feedwater: only the power differs.
    expect(forward('plant.heatInput') / cascaded('plant.heatInput')).toBeCloseTo(1, 9)
    const gain = 1 - forward('plant.netTurbineHeatRate') / cascaded('plant.netTurbineHeatRate')
    // Of the heat rate, some 0.1 to 0.2 % is common practice for the last heater.
    expect(gain).toBeGreaterThan(0.0005)
    expect(gain).toBeLessThan(0.004)
    expect(forward('c.heat')).toBeLessThan(cascaded('c.heat'))
  },
)

/*
 * Common practice. Condition: water saturated at its free surface, no loss in the suction line: the
 * pressure of the vessel cancels, and the suction head available is the height alone.
 */
test.each([1.2e5, 7e5, 12e5])(
  'a pump below a deaerator at %d Pa has the height as suction head, whatever the pressure',
  (p) => {
    const parts = (subcooling: number): LayoutParts => ({
      units: {
        from: ['supply'],
        p: ['pump', { efficiency: 0.8, driveEfficiency: 0.95, suctionHeight: 20 }],
        to: ['offtake'],
      },
      streams: {
        suction: ['from.outlet', 'p.suction', { p, subcooling, m: 100 }],
        discharge: ['p.discharge', 'to.inlet', { p: 15e6 }],
      },
    })
    expect(solutionOf(parts(0))('p.npshAvailable')).toBeCloseTo(20, 8)
    // A kelvin of subcooling adds its share: the pressure above saturation, as a column of water.
    const { T } = saturation(p)
    const { v } = steam({ p, T: T - 1 })
    const head = ((p - steam({ T: T - 1, x: 0 }).p) * v) / 9.80665
    expect(solutionOf(parts(1))('p.npshAvailable')).toBeCloseTo(20 + head, 6)
    expect(head).toBeGreaterThan(0.3)
  },
)
