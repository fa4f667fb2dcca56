import { chmodSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { delimiter, join } from 'node:path'
import { afterAll, expect, test } from 'vitest'
import { findBrowser } from '../../.ci/browser.mjs'

const folder = mkdtempSync(join(tmpdir(), 'bledsteam-search-'))
afterAll(() => rmSync(folder, { recursive: true }))

const program = (path: string): string => {
  mkdirSync(join(folder, path, '..'), { recursive: true })
  writeFileSync(join(folder, path), '')
  chmodSync(join(folder, path), 0o755)
  return join(folder, path)
}

test('the browser asked for comes before those of the search path', () => {
  const asked = program('asked/browser')
  const found = program('bin/chromium')
  const path = [join(folder, 'empty'), join(folder, 'bin')].join(delimiter)
  expect(findBrowser({ PATH: path })).toBe(found)
  expect(findBrowser({ PATH: path, CHROMIUM: asked })).toBe(asked)
})

test('a browser asked for that is not there is an error', () => {
  const path = join(folder, 'bin')
  expect(() => findBrowser({ PATH: path, CHROMIUM: join(folder, 'none') })).toThrow('not exist')
  expect(() => findBrowser({ PATH: path, CHROMIUM: folder })).toThrow('not a program')
})
