import { describe, expect, it } from 'vitest'
import { addUnit, emptyPlant, kinds, portsOf } from '../../src/document.ts'
import { grid, isHorizontal } from '../../web/canvas/geometry.ts'
import { placesOf } from '../../web/canvas/ports.ts'
import { symbolOf, symbols } from '../../web/canvas/symbols/index.ts'
import type { Form } from '../../web/canvas/symbols/symbol.ts'

const forms: readonly Form[] = [0, 1, 2, 3, 5].flatMap((count) =>
  [false, true].map((upright) => ({
    options: { drainCooler: count > 1, desuperheater: count > 2 },
    counts: { bleed: count, steam: count, drain: count, water: count, inlet: count, outlet: count },
    upright,
  })),
)

describe('symbols', () => {
  it('are there for every kind, with a place for every port', () => {
    for (const kind of kinds) {
      expect(Object.keys(symbols), kind.name).toContain(kind.name)
      const lie = {
        symbol: symbolOf(kind.name),
        form: { options: {}, counts: {} },
        mirrored: false,
        upended: false,
        at: [0, 0] as const,
      }
      const empty = emptyPlant()
      const { plant } = addUnit(empty, empty.layouts[0]?.id ?? '', kind.name, [0, 0])
      const layout = plant.layouts[0]
      const unit = layout?.units[0]
      if (!layout || !unit) throw new Error(`No ${kind.name} was added.`)
      const ports = portsOf(layout, unit)
      expect(ports.length).toBeGreaterThan(0)
      for (const port of ports) {
        expect(placesOf(lie, port.name), `${kind.name}.${port.name}`).not.toBeNull()
      }
    }
  })

  for (const [name, symbol] of Object.entries(symbols)) {
    it(`${name} takes whole steps of the grid`, () => {
      for (const form of forms) {
        const { width, height } = symbol.size(form)
        expect(width % grid, `width ${width}`).toBe(0)
        expect(height % grid, `height ${height}`).toBe(0)
      }
    })

    it(`${name} has its ports on the grid across their sides, on the edge of its box or within`, () => {
      for (const form of forms) {
        const { width, height } = symbol.size(form)
        for (const [port, places] of Object.entries(symbol.ports)) {
          for (let number = 1; number <= 6; number++) {
            for (const place of places(form, number)) {
              const across = isHorizontal(place.side) ? place.y : place.x
              expect(across % grid, `${port}${number} at ${place.x},${place.y}`).toBe(0)
              expect(place.x).toBeGreaterThanOrEqual(0)
              expect(place.x).toBeLessThanOrEqual(width)
              expect(place.y).toBeGreaterThanOrEqual(0)
              expect(place.y).toBeLessThanOrEqual(height)
            }
          }
        }
      }
    })
  }

  it('keep connected ports where they are when another stream comes', () => {
    for (const [name, symbol] of Object.entries(symbols)) {
      for (const [port, places] of Object.entries(symbol.ports)) {
        // A turbine grows with its bleeds: its ports keep their distance from the inlet instead.
        if (!port.endsWith('*') || symbol.spaced) continue
        const base = port.slice(0, -1)
        const before = places({ options: {}, counts: { [base]: 1 } }, 1)[0]
        const after = places({ options: {}, counts: { [base]: 2 } }, 1)[0]
        expect(after, `${name}.${port}`).toEqual(before)
      }
    }
  })
})

describe('the turbine', () => {
  it('is 16 + 40 a group wide and 32 high, growing 24 + 12 a bleed', () => {
    for (const bleed of [0, 1, 2, 4]) {
      const form: Form = { options: {}, counts: { bleed } }
      expect(symbols.turbine.size(form).width).toBe(16 + 40 * (bleed + 1))
      expect(symbols.turbine.body?.(form).height).toBe(32 + 24 + 12 * bleed)
    }
  })

  it('holds a text where the casing is high enough, or none', () => {
    const form: Form = { options: {}, counts: { bleed: 1 } }
    const { inside, size } = symbols.turbine
    const { width } = size(form)
    const text = { width: 56, height: 30 }
    const at = inside?.(form, text)
    expect(at && at[0] >= 0 && at[0] + text.width <= width).toBe(true)
    expect(inside?.(form, { width: 200, height: 30 })).toBeNull()
    expect(inside?.(form, { width: 40, height: 90 })).toBeNull()
  })

  it('stretches so that ports stand at the pitches asked for', () => {
    const form: Form = { options: {}, counts: { bleed: 2 }, pitches: [32, 72, 40] }
    const at = (port: string, number: number) => {
      const places = symbols.turbine.ports[port as keyof typeof symbols.turbine.ports]
      return places?.(form, number)[0].x
    }
    expect(at('bleed*', 1)).toBe(40)
    expect(at('bleed*', 2)).toBe(112)
    expect(at('exhaust', 1)).toBe(152)
    expect(symbols.turbine.size(form).width).toBe(160)
  })
})
