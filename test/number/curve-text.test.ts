import { expect, test } from 'vitest'
import { curveText, readCurve } from '../../web/number/curve-text.ts'

const columns = [
  { dimension: 'massFlow', unit: 'kg/s' },
  { dimension: 'pressure', unit: 'bar' },
] as const

const points = (text: string) => {
  const read = readCurve(text, columns, 'metric')
  return read.outcome === 'points' ? read.points : read.message
}

test.each([
  ['60\t2\n90\t3', 'tabs, as a sheet copies'],
  ['60 2\n90 3', 'blanks'],
  ['60; 2\n90; 3\n', 'semicolons'],
  ['60, 2\n90, 3', 'commas and blanks'],
  ['Flow | Pressure\n60 | 2\n90 | 3', 'a head of words'],
  ['90\t3\r\n\r\n60\t2', 'out of order, with empty lines'],
  ['216 t/h\t200 kPa\n90\t3', 'with units'],
])('%j is read: %s', (text) => {
  expect(points(text)).toEqual([
    [60, 2e5],
    [90, 3e5],
  ])
})

test.each([
  ['60\t2', 'two points at least'],
  ['60\t2\t1\n90\t3', 'Line 1: 3 values'],
  ['60\t2\n90\tbar', 'Line 2: bar'],
  ['60\t2\n60\t3', '60.00 kg/s stands there twice'],
])('%j is refused: %s', (text, why) => {
  expect(points(text)).toContain(why)
})

test('a table that is edited again reads back as the same curve', () => {
  const curve = [
    [60.125, 200123.4],
    [90 / 7, 3e5],
    [131.00000001, 4e5],
  ]
    .sort((a, b) => (a[0] as number) - (b[0] as number))
    .map(([r = 0, q = 0]) => [r, q] as const)
  const again = points(curveText(curve, columns, 'metric')) as readonly (readonly number[])[]
  again.forEach(([r = 0, q = 0], i) => {
    expect(r).toBeCloseTo(curve[i]?.[0] ?? 0, 12)
    expect(q / (curve[i]?.[1] ?? 1)).toBeCloseTo(1, 14)
  })
})
