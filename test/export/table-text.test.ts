import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import {
  type Cell,
  csvOfTable,
  defused,
  plainNumber,
  textOfTable,
} from '../../web/export/table-text.ts'

/** A reader by RFC 4180, written for the test. */
function readCsv(text: string): string[][] {
  expect(text.startsWith('\ufeff')).toBe(true)
  const rows: string[][] = [[]]
  let field = ''
  let isQuoted = false
  const body = text.slice(1)
  for (let i = 0; i < body.length; i += 1) {
    const sign = body[i] as string
    if (isQuoted) {
      if (sign === '"' && body[i + 1] === '"') {
        field += '"'
        i += 1
      } else if (sign === '"') isQuoted = false
      else field += sign
    } else if (sign === '"') isQuoted = true
    else if (sign === ',') {
      rows.at(-1)?.push(field)
      field = ''
    } else if (sign === '\r' && body[i + 1] === '\n') {
      rows.at(-1)?.push(field)
      field = ''
      rows.push([])
      i += 1
    } else field += sign
  }
  rows.pop()
  return rows
}

describe('texts that a spreadsheet would run', () => {
  test.each(['=1+1', '+cmd', '-2+3', '@SUM(A1)', '\t=1', '  =HYPERLINK("x")', '|calc', '\r=1'])(
    '%j is defused',
    (text) => {
      expect(defused(text).startsWith("'")).toBe(true)
      const [row] = readCsv(csvOfTable([[text]]))
      expect(row?.[0]).not.toMatch(/^\s*[=+\-@|]/)
    },
  )

  test('ordinary names and negative numbers stay as they are', () => {
    expect(defused('Heater 5')).toBe('Heater 5')
    expect(csvOfTable([[-1.5]])).toBe('\ufeff-1.5\r\n')
    expect(textOfTable([['-1.5', -2]])).toBe('-1.5\t-2')
  })
})

test('numbers keep twelve digits and a point, without groups', () => {
  expect(plainNumber(1234567.891)).toBe('1234567.891')
  expect(plainNumber(0.1 + 0.2)).toBe('0.3')
  expect(plainNumber(1.25e-9)).toBe('1.25e-9')
  expect(plainNumber(Number.NaN)).toBe('')
  expect(plainNumber(-0)).toBe('0')
})

test('any table is read back from CSV: numbers as they were, names but for what was defused', () => {
  const cells = fc.oneof(
    fc.string(),
    fc.constantFrom('a,b', 'say "so"', 'two\nlines', ' blank ', 'é°²'),
    fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e12, max: 1e12 }),
    fc.constant(null),
  )
  fc.assert(
    fc.property(
      fc.array(fc.array(cells, { minLength: 1, maxLength: 5 }), { minLength: 1 }),
      (rows) => {
        const back = readCsv(csvOfTable(rows as Cell[][]))
        expect(back).toHaveLength(rows.length)
        rows.forEach((row, r) => {
          row.forEach((cell, c) => {
            const text = back[r]?.[c] as string
            if (cell === null) expect(text).toBe('')
            else if (typeof cell === 'number') {
              expect(Math.abs(Number(text) - cell)).toBeLessThanOrEqual(1e-11 * Math.abs(cell))
            } else expect([defused(cell), cell.replace(/\0/g, '')]).toContain(text)
          })
        })
      },
    ),
  )
})

test('a line break or tab within a name does not break the rows to paste', () => {
  expect(
    textOfTable([
      ['two\nlines', 'a\tb'],
      ['x', 1],
    ]),
  ).toBe('two lines\ta b\r\nx\t1')
})
