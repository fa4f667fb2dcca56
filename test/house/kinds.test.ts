import { describe, expect, test } from 'vitest'
import { kinds } from '../../src/units/index.ts'
import { kindFaults } from './kind-faults.ts'
import { readTree } from './read-tree.ts'

test('nothing but its own files asks for a unit kind by name', () => {
  const names = kinds.map((kind) => kind.name)
  expect(names.length).toBeGreaterThan(0)
  expect(kindFaults(readTree('src', 'web'), names)).toEqual([])
})

describe('a planted question is found', () => {
  const faults = (text: string, file = 'src/balance/a.ts'): string[] =>
    kindFaults(new Map([[file, text]]), ['turbine', 'pump'])

  test.each([
    "if (unit.kind === 'turbine') go()",
    "if ('turbine' !== kind.name) go()",
    'if (kind == `turbine`) go()',
    "switch (unit.kind) { case 'turbine': go() }",
    "if (['pump', 'turbine'].slice().length > 0 || ['turbine'].includes(unit.kind)) go()",
  ])('%s', (text) => {
    expect(faults(text)).toEqual(["src/balance/a.ts: asks for 'turbine'"])
    expect(faults(text, 'src/units/turbine.ts')).toEqual([])
    expect(faults(text, 'web/canvas/symbols/turbine.tsx')).toEqual([])
  })

  test('other names and other uses are no question', () => {
    expect(faults("if (term.kind === 'constant') go()")).toEqual([])
    expect(faults("addUnit(plant, 'turbine')")).toEqual([])
  })
})
