import { readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import type { AskedBalance } from '../../src/engine.ts'
import { type ExpectedFile, faultsOf } from '../balance/expected-run.ts'
import { type Ended, runBalance, Scratch } from './run-balance.ts'

/* The command line as a user calls it: exit code, standard output, standard error (contract, section 5). */

const cases = fileURLToPath(new URL('../reference/cases/', import.meta.url))
const scratch = new Scratch()
const plainText = readFileSync(`${cases}o1-simple.json`, 'utf8')

// Each call starts Node, so they run side by side and are looked at one by one.
const calls: Readonly<Record<string, readonly string[]>> = {
  solved: [`${cases}o1-simple.json`],
  set: [
    `${cases}o2-reheat.json`,
    ...['--layout', 'base', '--case', 'design'],
    ...['--free', 'plant.netPower', '--set', 'live.m=100', '--free', 'blr.heat'],
  ],
  missing: [`${cases}o8-illposed.json`, '--free', 'main.m'],
  broken: [scratch.file('broken.json', plainText.replace('"kind"', 'kind'))],
  path: [`${cases}o1-simple.json`, '--set', 'b1.efficency=0.9'],
  nowhere: [`${cases}no-such-plant.json`],
}
const ended: Record<string, Ended> = {}

beforeAll(async () => {
  const names = Object.keys(calls)
  const results = await Promise.all(names.map((name) => runBalance(...calls[name]!)))
  names.forEach((name, k) => {
    ended[name] = results[k]!
  })
}, 120_000)

afterAll(() => scratch.remove())

const answerIn = ({ stdout }: Ended): AskedBalance => JSON.parse(stdout) as AskedBalance

function expected(name: string): ExpectedFile {
  return JSON.parse(readFileSync(`${cases}${name}.expected.json`, 'utf8')) as ExpectedFile
}

describe('solved: exit code 0, one JSON object and nothing else', () => {
  test('a plant as its file stands', () => {
    const { code, stderr } = ended.solved!
    expect([code, stderr]).toEqual([0, ''])
    const file = expected('o1-simple')
    expect(faultsOf(answerIn(ended.solved!), file, file.runs[0]!)).toEqual([])
  })

  test('layout and case by name, with a quantity freed and another set', () => {
    const { code, stderr } = ended.set!
    expect([code, stderr]).toEqual([0, ''])
    const file = expected('o2-reheat')
    const run = file.runs.find(({ free }) => free.includes('plant.netPower'))!
    expect(run.set).toEqual({ 'live.m': 100 })
    expect(faultsOf(answerIn(ended.set!), file, run)).toEqual([])
  })

  test('freeing what is not given is remarked', () => {
    const { findings } = answerIn(ended.set!)
    const remarks = findings.filter(({ severity }) => severity === 'remark')
    expect(remarks.map(({ quantities }) => quantities)).toContainEqual(['blr.heat'])
  })
})

test('not solved: exit code 1, and the object says why', () => {
  const { code, stderr } = ended.missing!
  expect([code, stderr]).toEqual([1, ''])
  const file = expected('o8-illposed')
  const run = file.runs.find(({ free }) => free.includes('main.m'))!
  expect(faultsOf(answerIn(ended.missing!), file, run)).toEqual([])
})

describe('unusable: exit code 2, one line on standard error, nothing on standard output', () => {
  test.each([
    ['broken', 'a file that is no JSON, with line and column', /[Ll]ine \d+, column \d+/],
    ['path', 'an unknown path in --set, with the nearest', /b1.*efficency.*efficiency/],
    ['nowhere', 'a file that is not there', /no-such-plant\.json/],
  ])('%s: %s', (name, _, says) => {
    const { code, stdout, stderr } = ended[name]!
    expect([code, stdout]).toEqual([2, ''])
    expect(stderr.trimEnd().split('\n')).toHaveLength(1)
    expect(stderr).toMatch(says)
  })
})
