import { describe, expect, test } from 'vitest'
import { state } from '../../src/steam/index.ts'
import { kindNamed } from '../../src/units/index.ts'
import type { Caution, Shape } from '../../src/units/kind.ts'

/* What each kind sees by itself, at states just on either side of where it begins to. */

type Port = { readonly m: number; readonly p: number; readonly h: number }

function enthalpy(pair: Parameters<typeof state>[0]): number {
  const found = state(pair)
  if (found.outcome !== 'state') throw new Error(`no state at ${JSON.stringify(pair)}`)
  return found.h
}

const wet = (p: number, x: number, m = 1): Port => ({ m, p, h: enthalpy({ p, x }) })
const at = (p: number, T: number, m = 1): Port => ({ m, p, h: enthalpy({ p, T }) })

function codes(
  kind: string,
  ports: Readonly<Record<string, Port>>,
  more: { shape?: Partial<Shape>; quantities?: Readonly<Record<string, number>> } = {},
): string[] {
  const found: readonly Caution[] =
    kindNamed(kind)?.cautions?.({
      shape: { options: {}, streams: {}, ...more.shape },
      port: (name) => ports[name],
      quantity: (name) => more.quantities?.[name] ?? Number.NaN,
    }) ?? []
  for (const { message, values, advice } of found) {
    for (const [k, [value]] of values.entries()) {
      expect(Number.isFinite(value)).toBe(true)
      if (k > 0 || message.includes('{')) expect(message).toContain(`{${k}}`)
    }
    expect(advice).toMatch(/\.$/)
  }
  return found.map(({ code }) => code)
}

describe('turbine', () => {
  const inlet = at(1e7, 773.15)
  test('moisture at an exhaust below 1 bar, above 12 %', () => {
    expect(codes('turbine', { inlet, exhaust: wet(5e3, 0.885) })).toEqual([])
    expect(codes('turbine', { inlet, exhaust: wet(5e3, 0.875) })).toEqual(['exhaust-moisture'])
    // Between wet sections the blades are short.
    expect(codes('turbine', { inlet, exhaust: wet(1e6, 0.875) })).toEqual([])
  })
  test('wet steam at the inlet, beyond what a separator lets through', () => {
    expect(codes('turbine', { inlet: wet(6e6, 0.9975) })).toEqual([])
    expect(codes('turbine', { inlet: wet(6e6, 0.99) })).toEqual(['wet-inlet'])
  })
  test('a supercritical inlet is not wet', () => {
    expect(codes('turbine', { inlet: at(2.5e7, 873.15) })).toEqual([])
  })
})

describe('boiler', () => {
  const feedwater = at(1.1e7, 500)
  test('wet steam', () => {
    expect(codes('boiler', { feedwater, steam: at(1e7, 773.15) })).toEqual([])
    expect(codes('boiler', { feedwater, steam: wet(1e7, 0.9) })).toEqual(['wet-steam'])
  })
  test('feedwater that boils', () => {
    const steam = at(1e7, 773.15)
    expect(codes('boiler', { feedwater: wet(1.1e7, 0.05), steam })).toEqual(['boiling-feedwater'])
  })
  test('a blowdown where there can be no drum', () => {
    const ports = { feedwater: at(2.6e7, 560), steam: at(2.5e7, 873.15) }
    expect(codes('boiler', ports)).toEqual([])
    expect(codes('boiler', { ...ports, blowdown: at(2.5e7, 640) })).toEqual(['above-critical'])
  })
})

test('reheater: steam that leaves wet', () => {
  expect(codes('reheater', { outlet: at(2e6, 813.15) })).toEqual([])
  expect(codes('reheater', { outlet: wet(2e6, 0.99) })).toEqual(['wet-steam'])
})

describe('desuperheater', () => {
  const saturation = state({ p: 1e6, x: 1 })
  if (saturation.outcome !== 'state') throw new Error('no saturation')
  test('less than 10 K of superheat after the spray', () => {
    expect(codes('desuperheater', { outlet: at(1e6, saturation.T + 11) })).toEqual([])
    expect(codes('desuperheater', { outlet: at(1e6, saturation.T + 9) })).toEqual([
      'spray-not-gone',
    ])
  })
  test('steam sprayed wet', () => {
    expect(codes('desuperheater', { outlet: wet(1e6, 0.98) })).toEqual(['sprayed-wet'])
  })
  test('a spray above the critical pressure', () => {
    expect(codes('desuperheater', { outlet: at(2.5e7, 800) })).toEqual(['above-critical'])
  })
})

describe('pump', () => {
  test('steam in the suction', () => {
    expect(codes('pump', { suction: wet(1e5, 0) })).toEqual([])
    expect(codes('pump', { suction: wet(1e5, 0.01) })).toEqual(['pump-takes-steam'])
  })
  test('suction head below 1 m, where it is known', () => {
    const ports = { suction: at(1e5, 300) }
    expect(codes('pump', ports)).toEqual([])
    expect(codes('pump', ports, { quantities: { npshAvailable: 1.2 } })).toEqual([])
    expect(codes('pump', ports, { quantities: { npshAvailable: 0.8 } })).toEqual(['suction-head'])
  })
})

describe('surface heater', () => {
  const one = { shape: { streams: { drainInlet: 1 } } }
  const drain = wet(1e6, 0)
  test('a drain with little pressure left', () => {
    expect(codes('surfaceHeater', { drain, drain1: at(1.3e6, 400) }, one)).toEqual([])
    expect(codes('surfaceHeater', { drain, drain1: at(1.01e6, 400) }, one)).toEqual(['drain-head'])
    // Without flow nothing has to be driven.
    expect(codes('surfaceHeater', { drain, drain1: at(1.01e6, 400, 0) }, one)).toEqual([])
  })
  test('a drain of which more than a fifth flashes', () => {
    expect(codes('surfaceHeater', { drain, drain1: wet(2e6, 0) }, one)).toEqual([])
    expect(codes('surfaceHeater', { drain, drain1: wet(8e6, 0) }, one)).toEqual(['drain-flashing'])
  })
  test('wet steam at a desuperheating zone, and at none', () => {
    const ports = { drain, steam1: wet(1e6, 0.98) }
    expect(codes('surfaceHeater', ports)).toEqual([])
    const shape = { options: { desuperheater: true } }
    expect(codes('surfaceHeater', ports, { shape })).toEqual(['wet-steam'])
  })
})

test('mixing heater: water that arrives boiling', () => {
  const more = { shape: { streams: { water: 1 } } }
  expect(codes('mixingHeater', { water1: wet(5e5, 0) }, more)).toEqual([])
  expect(codes('mixingHeater', { water1: wet(5e5, 0.02) }, more)).toEqual(['water-flashes'])
})

describe('heat exchanger', () => {
  const cold = { cold: at(1e6, 300), coldOutlet: at(1e6, 350) }
  test('no change of phase', () => {
    const hot = { hot: at(2e6, 400), hotOutlet: at(2e6, 360) }
    expect(codes('heatExchanger', { ...hot, ...cold })).toEqual([])
  })
  test('steam that condenses across the whole dome, or in part', () => {
    const hot = at(2e5, 450)
    for (const hotOutlet of [at(2e5, 360), wet(2e5, 0.5)]) {
      expect(codes('heatExchanger', { hot, hotOutlet, ...cold })).toEqual(['change-of-phase'])
    }
  })
  test('supercritical water has no phases to change', () => {
    const hot = { hot: at(2.4e7, 700), hotOutlet: at(2.4e7, 500) }
    expect(codes('heatExchanger', { ...hot, ...cold })).toEqual([])
  })
})

test('heat user: steam that returns', () => {
  expect(codes('heatUser', { condensate: at(3e5, 360) })).toEqual([])
  expect(codes('heatUser', { condensate: wet(3e5, 0.2) })).toEqual(['steam-returned'])
})

test('separator: nothing to separate', () => {
  expect(codes('separator', { inlet: wet(1e6, 0.88) })).toEqual([])
  expect(codes('separator', { inlet: at(1e6, 500) })).toEqual(['nothing-to-separate'])
})
