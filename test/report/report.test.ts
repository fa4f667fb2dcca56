import { createHash } from 'node:crypto'
import { expect, test } from 'vitest'
import { writePlant } from '../../src/document.ts'
import { checksumOf } from '../../web/report/checksum.ts'
import { givenLines } from '../../web/report/givens.ts'
import { cautions, methodNotes } from '../../web/report/method.ts'
import { solvedExample } from '../drawer/solved-example.ts'

const { plant, source } = solvedExample('public/examples/tarn-vale-2.json')
const { layout } = source

test('the checksum is SHA-256 of the plant file', async () => {
  const text = writePlant(plant)
  expect(await checksumOf(text)).toBe(createHash('sha256').update(text, 'utf8').digest('hex'))
  // FIPS 180-4, example of the one-block message 'abc'.
  expect(await checksumOf('abc')).toBe(
    'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad',
  )
})

test('every number that was given stands in the report, once', () => {
  const lines = givenLines(layout, null, 'metric')
  const count = [...layout.units, ...layout.streams, ...layout.shafts, layout.plant].reduce(
    (sum, { given }) => sum + Object.keys(given).length,
    0,
  )
  expect(lines).toHaveLength(count)
  expect(new Set(lines.map(({ path }) => path)).size).toBe(count)
  const main = lines.find(({ path }) => path === 'main.p')
  expect(main).toMatchObject({ quantity: 'Pressure', value: '130.0', unit: 'bar' })
  expect(lines.some(({ basis }) => basis.startsWith('usual'))).toBe(true)
})

test('a case’s givens take the place of the layout’s', () => {
  const one = { id: 'low', name: 'Low', given: { 'main.m': 60 }, free: ['main.T'] }
  const lines = givenLines({ ...layout, cases: [one] }, 'low', 'metric')
  expect(lines.filter(({ path }) => path === 'main.m')).toMatchObject([
    { value: '60.00', byCase: true },
  ])
  expect(lines.some(({ path }) => path === 'main.T')).toBe(false)
})

test('method and cautions name the sources and who is to be asked', () => {
  const text = JSON.stringify([methodNotes, cautions])
  for (const word of [
    'R7-97(2012)',
    'Stodola',
    'Baumann',
    'codes',
    'makers',
    'licensed engineer',
  ]) {
    expect(text).toContain(word)
  }
})
