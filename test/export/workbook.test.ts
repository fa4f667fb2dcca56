import { strFromU8, unzipSync } from 'fflate'
import { describe, expect, test } from 'vitest'
import { exported } from '../../web/drawer/tables/table.ts'
import { tableBuilders } from '../../web/drawer/tables/tables.ts'
import { workbookOf } from '../../web/export/workbook.ts'
import { solvedExample } from '../drawer/solved-example.ts'

type Read = string | number

const entities: Readonly<Record<string, string>> = {
  amp: '&',
  lt: '<',
  gt: '>',
  quot: '"',
  apos: "'",
}
const plain = (text: string): string =>
  text
    .replace(/&#(x?)([0-9a-f]+);/gi, (_, hex, digits) =>
      String.fromCodePoint(Number.parseInt(digits, hex ? 16 : 10)),
    )
    .replace(/&(\w+);/g, (_, name) => entities[name] ?? '')

/** The cells of every sheet by address, read from the parts of the file (ECMA-376). */
async function readWorkbook(file: Blob): Promise<Map<string, Map<string, Read>>> {
  const parts = unzipSync(new Uint8Array(await file.arrayBuffer()))
  const part = (name: string) => strFromU8(parts[name] as Uint8Array)
  const shared = [...part('xl/sharedStrings.xml').matchAll(/<si>(.*?)<\/si>/gs)].map(([, si]) =>
    plain([...(si as string).matchAll(/<t[^>]*>(.*?)<\/t>/gs)].map(([, t]) => t).join('')),
  )
  const names = [...part('xl/workbook.xml').matchAll(/<sheet [^>]*name="([^"]*)"/g)].map(
    ([, name]) => plain(name as string),
  )
  const sheets = new Map<string, Map<string, Read>>()
  names.forEach((name, i) => {
    const cells = new Map<string, Read>()
    const text = part(`xl/worksheets/sheet${i + 1}.xml`)
    expect(text).not.toContain('<f>')
    for (const [, attributes, body] of text.matchAll(/<c ([^>]*?)>(.*?)<\/c>/gs)) {
      const address = /r="([A-Z]+\d+)"/.exec(attributes as string)?.[1] as string
      const type = /t="(\w+)"/.exec(attributes as string)?.[1] ?? 'n'
      const value = /<v>(.*?)<\/v>/s.exec(body as string)?.[1]
      if (value === undefined) continue
      cells.set(address, type === 's' ? (shared[Number(value)] as string) : Number(value))
    }
    sheets.set(name, cells)
  })
  return sheets
}

const letter = (column: number): string =>
  column < 26 ? String.fromCharCode(65 + column) : `A${String.fromCharCode(65 + column - 26)}`

describe.each(['metric', 'us'] as const)('the workbook in %s units', async (units) => {
  const { source } = solvedExample('public/examples/tarn-vale-2.json')
  const tables = Object.values(tableBuilders).map((build) => build(source))
  const sheets = await readWorkbook(await workbookOf(tables, units))

  test('has a sheet for each table', () => {
    expect([...sheets.keys()]).toEqual(tables.map(({ title }) => title))
  })

  test.each(tables.map((table) => [table.title, table] as const))(
    '%s: names and units in the first row, numbers as numbers with all their digits',
    (title, table) => {
      const cells = sheets.get(title) as Map<string, Read>
      let numbers = 0
      exported(table, units).forEach((row, r) => {
        row.forEach((wanted, c) => {
          const found = cells.get(`${letter(c)}${r + 1}`)
          if (wanted === null || wanted === '') expect(found).toBeUndefined()
          else if (typeof wanted === 'number') {
            numbers += 1
            expect(typeof found).toBe('number')
            expect(Math.abs((found as number) - wanted)).toBeLessThanOrEqual(
              1e-12 * Math.abs(wanted),
            )
          } else expect(found).toBe(wanted)
        })
      })
      expect(numbers).toBeGreaterThan(3)
    },
  )
})

test('a name that would run as a formula stays a text', async () => {
  const { source } = solvedExample('public/examples/tarn-vale-2.json')
  const [first, ...others] = source.layout.units
  const layout = { ...source.layout, units: [{ ...first, label: '=1+1' } as never, ...others] }
  const table = tableBuilders.units({ ...source, layout })
  const cells = (await readWorkbook(await workbookOf([table], 'si'))).get('Units')
  expect(cells?.get('A2')).toBe("'=1+1")
})
