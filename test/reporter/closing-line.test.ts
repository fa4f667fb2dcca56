import { expect, test } from 'vitest'
import { closingLine, countRun, type RunFile } from './closing-line.ts'

const file = (states: readonly string[], errors: readonly string[] = []): RunFile => ({
  errors: () => errors,
  children: {
    allTests: () => states.map((state) => ({ result: () => ({ state }) })),
    allSuites: () => [],
  },
})

test('each test counts once', () => {
  const counts = countRun([file(['passed', 'failed']), file(['passed', 'skipped'])], [])
  expect(counts).toEqual({ passed: 2, failed: 1, skipped: 1 })
})

test('a test without its turn, a file that does not load, a broken hook, a stray error fail', () => {
  expect(countRun([file(['pending'])], []).failed).toBe(1)
  expect(countRun([file([], ['does not load'])], []).failed).toBe(1)
  expect(countRun([file(['passed'])], ['nobody caught it']).failed).toBe(1)
  const broken = file(['passed'])
  const suite = { errors: () => ['hook'] }
  const children = { ...broken.children, allSuites: () => [suite] }
  expect(countRun([{ ...broken, children }], []).failed).toBe(1)
})

test('the line names skipped tests only where there are any', () => {
  expect(closingLine({ passed: 3, failed: 0, skipped: 0 })).toBe('3 passed, 0 failed')
  expect(closingLine({ passed: 3, failed: 1, skipped: 2 })).toBe('3 passed, 1 failed, 2 skipped')
})
