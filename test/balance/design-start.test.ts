import { describe, expect, it } from 'vitest'
import { DesignStart } from '../../src/balance/design-start.ts'
import { Model } from '../../src/balance/model.ts'
import { solve } from '../../src/balance/solve.ts'
import type { Layout } from '../../src/plant/document.ts'
import { withGivens } from '../fuzz/draft.ts'
import { layoutOf } from '../published/build-layout.ts'
import { reheatHeaterCycle } from '../published/cycles.ts'

/*
 * A plant asked in an unusual way is led from the plant that a designer would ask for. What it is to
 * lead to is known here: the numbers are read off the same plant solved as designed.
 */

const designed = layoutOf(
  reheatHeaterCycle({
    main: { p: 13e6, T: 811, m: 100 },
    cold: { p: 3e6 },
    hot: { T: 811 },
    hp: 0.86,
    lp: [0.88, 0.9],
    bleed: { p: 6e5 },
    condenser: 6e3,
    pump: 0.78,
  }),
)
const known = solve(new Model(designed)).results

/** The plant with results given instead of what a designer gives. */
function turnedRound(swaps: Readonly<Record<string, string>>): Layout {
  const give = Object.values(swaps).map((path) => [path, known.value(path)!] as const)
  return withGivens(designed, Object.keys(swaps), new Map(give))
}

function startOf(layout: Layout): {
  readonly model: Model
  readonly start: DesignStart | undefined
} {
  const model = new Model(layout)
  return { model, start: DesignStart.of(model.system, model.structure.open) }
}

const swaps = { 'main.m': 'plant.netPower', 'main.T': 'plant.unitHeatRate' }

describe('the design of a plant', () => {
  it('is the plant itself where a designer would ask for it', () => {
    expect(startOf(designed).start).toBeUndefined()
  })

  it('gives back what a designer gives and releases the results', () => {
    const { model, start } = startOf(turnedRound(swaps))
    const paths = (indices: readonly number[]): string[] =>
      indices.map((v) => model.system.variables[v]!.path).sort()
    expect(paths(start!.design.released)).toEqual(Object.values(swaps).sort())
    // The temperature of steam that is not given is no unknown of its own: its enthalpy stands for it.
    expect(paths(start!.design.fixed)).toEqual(['main.h', 'main.m'])
  })

  it('is a plant of its own, with numbers that a choice changes', () => {
    const { model, start } = startOf(turnedRound({ 'hp.groupEfficiency1': 'cold.T' }))
    const efficiency = model.system.indexOf.get('hp.groupEfficiency1')!
    const first = start!.solve(0)!
    expect(start!.solve(2)![efficiency]).not.toBe(first[efficiency])
    const again = start!.solve(0)!
    first.forEach((value, v) => {
      if (Math.abs(value) > 1e-6) expect(again[v]! / value).toBeCloseTo(1, 9)
    })
  })

  for (const way of ['solveFromDesign', 'solveByAiming'] as const) {
    it(`leads to what is given: ${way}`, () => {
      const { model } = startOf(turnedRound(swaps))
      expect(model[way](0)).toBe(true)
      for (const { path } of model.system.variables) {
        const expected = known.value(path)
        if (expected === null || path.startsWith('condenser.')) continue
        const size = Math.max(1e-6, Math.abs(expected))
        expect(Math.abs(model.value(path)! - expected) / size, path).toBeLessThan(1e-9)
      }
    })
  }
})
