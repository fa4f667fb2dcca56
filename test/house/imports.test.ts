import { describe, expect, test } from 'vitest'
import { importFaults } from './import-faults.ts'
import { readImports } from './read-imports.ts'
import { readTree } from './read-tree.ts'

const faultsOf = (files: Record<string, string>): string[] =>
  importFaults(new Map(Object.entries(files)))

test('the imports of this tree keep the rules', () => {
  const files = readTree('src', 'web', 'test')
  expect([...files.keys()]).toContain('test/house/imports.test.ts')
  expect(importFaults(files)).toEqual([])
})

describe('reading imports', () => {
  const targets = (text: string): string[] =>
    readImports('x.tsx', text).imports.map(({ target, typeOnly, apart }) =>
      [target, ...(typeOnly ? ['type'] : []), ...(apart ? ['apart'] : [])].join(' '),
    )

  test.each([
    ["import './a.ts'", './a.ts'],
    ["import a from './a.ts'", './a.ts'],
    ["import * as a from './a.ts'", './a.ts'],
    ["import {\n  a,\n  type B,\n} from\n  './a.ts'", './a.ts'],
    ["import type { B } from './a.ts'", './a.ts type'],
    ["import { type B, type C } from './a.ts'", './a.ts type'],
    ["export { a } from './a.ts'", './a.ts'],
    ["export * from './a.ts'", './a.ts'],
    ["export type { B } from './a.ts'", './a.ts type'],
    ["export type * from './a.ts'", './a.ts type'],
    ["const a = () => import('./a.ts')", './a.ts'],
    ['const a = () => import(`./a.ts`)', './a.ts'],
    ["let a: import('./a.ts').B", './a.ts type'],
    ["type A = typeof import('./a.ts')", './a.ts type'],
    ["import a = require('./a.ts')", './a.ts'],
    ["const a = require('./a.ts')", './a.ts'],
    ["new Worker(new URL('./a.ts', import.meta.url))", './a.ts apart'],
    ["import A from './a.ts?worker'", './a.ts apart'],
  ])('%s', (text, target) => {
    expect(targets(text)).toEqual([target])
  })

  test('comments, strings and text in elements are no imports', () => {
    const text = `
      // import './a.ts'
      /* import './b.ts' */
      const c = "import './c.ts'", d = /['"]/
      const e = <p>don't import './e.ts'</p>`
    expect(targets(text)).toEqual([])
  })

  test('an import that cannot be judged is a fault', () => {
    expect(readImports('x.ts', 'import(name)').faults).toHaveLength(1)
    expect(readImports('x.ts', "import.meta.glob('./*.ts')").faults).toHaveLength(1)
    expect(readImports('x.ts', '/// <reference lib="dom" />\n').faults).toHaveLength(1)
    expect(() => readImports('x.ts', 'import {')).toThrow()
  })
})

describe('a planted fault is found', () => {
  test.each([
    ['web/card/Card.tsx', '../../src/engine.ts'],
    ['web/card/Card.tsx', '../../src/plant/edit.ts'],
    ['web/card/Card.tsx', '/src/engine.ts'],
    ['web/card/Card.tsx', '../../test/house/read-tree.ts'],
    ['web/card/Card.tsx', 'node:fs'],
    ['web/worker/worker.ts', '../../src/balance/solve.ts'],
    ['web/main.tsx', './App'],
    ['src/equations/a.ts', '../steam/b.ts'],
    ['src/steam/a.ts', '../units/pump.ts'],
    ['src/units/pump.ts', '../plant/document.ts'],
    ['src/plant/a.ts', '../balance/b.ts'],
    ['src/balance/a.ts', '../study/b.ts'],
    ['src/balance/a.ts', '../review/b.ts'],
    ['src/study/a.ts', '../review/b.ts'],
    ['src/review/a.ts', '../engine.ts'],
    ['src/balance/a.ts', '../cli/balance.ts'],
    ['src/balance/a.ts', '../odds/ends.ts'],
    ['src/balance/a.ts', '../../web/store/plant-store.ts'],
    ['src/balance/a.ts', 'react'],
    ['src/balance/a.ts', 'reactflow'],
    ['src/balance/a.ts', 'node:fs'],
    ['src/quantity/a.ts', '../equations/b.ts'],
    ['src/quantity/a.ts', 'zod'],
    ['src/document.ts', './balance/solve.ts'],
    ['src/document.ts', './engine.ts'],
    ['src/cli/balance.ts', '../balance/solve.ts'],
    ['src/cli/balance.ts', 'react'],
  ])('%s -> %s', (file, target) => {
    for (const text of [`import { a } from '${target}'`, `import type { A } from '${target}'`]) {
      expect(faultsOf({ [file]: text }).length, text).toBeGreaterThan(0)
    }
  })

  test('a value in the messages', () => {
    const file = 'src/messages.ts'
    expect(faultsOf({ [file]: "import { a } from './plant/a.ts'" })).toHaveLength(1)
    expect(faultsOf({ [file]: "import type { A } from './plant/a.ts'" })).toEqual([])
  })

  test('the solver reached by a detour', () => {
    const faults = faultsOf({
      'web/App.tsx': "import { solve } from './worker/worker.ts'",
      'web/worker/worker.ts': "import { solve } from '../../src/engine.ts'",
    })
    expect(faults).toEqual([expect.stringContaining('web/App.tsx -> web/worker/worker.ts')])
    const below = faultsOf({
      'src/document.ts': "import { a } from './plant/a.ts'",
      'src/plant/a.ts': "import { solve } from '../equations/newton/step.ts'",
    })
    expect(below).toEqual([expect.stringContaining('worker alone')])
  })

  test('files that import each other, if only their types', () => {
    const faults = faultsOf({
      'src/units/a.ts': "import { b } from './b.ts'",
      'src/units/b.ts': "import type { C } from './c.ts'",
      'src/units/c.ts': "export * from './a.ts'",
    })
    expect(faults).toEqual([expect.stringContaining('a.ts -> src/units/b.ts -> src/units/c.ts')])
  })

  test('a file that belongs nowhere, or is not TypeScript', () => {
    expect(faultsOf({ 'src/odds.ts': '' })).toHaveLength(1)
    expect(faultsOf({ 'src/units/pump.js': '' })).toHaveLength(1)
  })
})

test('a sound tree has no fault', () => {
  const faults = faultsOf({
    'web/main.tsx': "import { App } from './App.tsx'\nimport 'react'",
    'web/App.tsx': `import { readPlant } from '../src/document.ts'
      import type { Message } from '../src/messages.ts'
      import './styles/theme.css'
      new Worker(new URL('./worker/worker.ts', import.meta.url), { type: 'module' })`,
    'web/worker/worker.ts': `import { solve } from '../../src/engine.ts'
      import type { Message } from '../../src/messages.ts'`,
    'src/document.ts': "export * from './plant/a.ts'\nexport * from './quantity/a.ts'",
    'src/engine.ts': `export * from './study/a.ts'
      export * from './balance/a.ts'
      import type { Message } from './messages.ts'`,
    'src/study/a.ts': "import '../balance/a.ts'\nimport '../equations/a.ts'",
    'src/balance/a.ts': "import './b.ts'\nimport '../plant/a.ts'",
    'src/plant/a.ts': "import { z } from 'zod'\nimport '../units/index.ts'",
    'src/units/index.ts': "import '../steam/a.ts'\nimport '../quantity/a.ts'",
    'src/steam/a.ts': "import '../equations/a.ts'",
    'src/cli/balance.ts': "import 'node:fs'\nimport '../engine.ts'\nimport './text.ts'",
    'test/balance/a.test.ts': "import '../../src/balance/a.ts'\nimport 'node:fs'",
  })
  expect(faults).toEqual([])
})
