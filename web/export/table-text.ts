/* Tables as text for spreadsheets: tab separated for the clipboard, comma separated for files. */

/** A cell of a table to be passed on: a number stays a number. */
export type Cell = string | number | null

/**
 * A number as every spreadsheet reads it: a point, no groups, and no more digits than it has meaning
 * (12 significant).
 */
export function plainNumber(value: number): string {
  if (!Number.isFinite(value)) return ''
  const text = String(Number(value.toPrecision(12)))
  return text === '-0' ? '0' : text
}

/** What a spreadsheet would take for a formula, a command or a link to another program. */
const runs = /^[=+\-@\t\r\n|]/

/** A text that no spreadsheet runs: with an apostrophe before what would begin a formula. */
export function defused(text: string): string {
  const plain = text.replace(/\0/g, '')
  return runs.test(plain) || runs.test(plain.trimStart()) ? `'${plain}` : plain
}

const written = (cell: Cell): string =>
  cell === null ? '' : typeof cell === 'number' ? plainNumber(cell) : defused(cell)

const isNumber = /^-?\d+(\.\d+)?(e[+-]?\d+)?$/i

/** Tab separated lines, ready to paste; texts that are plain numbers stay numbers. */
export function textOfTable(rows: readonly (readonly Cell[])[]): string {
  return rows
    .map((row) =>
      row
        .map((cell) => {
          const text = typeof cell === 'string' && isNumber.test(cell) ? cell : written(cell)
          return text.replace(/[\t\r\n]+/g, ' ')
        })
        .join('\t'),
    )
    .join('\r\n')
}

/** RFC 4180: comma separated, texts quoted where they need it, lines ended by CR LF; with a byte order mark, which tells spreadsheets that it is UTF-8. */
export function csvOfTable(rows: readonly (readonly Cell[])[]): string {
  const lines = rows.map((row) =>
    row
      .map((cell) => {
        const text = written(cell)
        return /[",\r\n]/.test(text) || /^\s|\s$/.test(text)
          ? `"${text.replaceAll('"', '""')}"`
          : text
      })
      .join(','),
  )
  return `\ufeff${lines.join('\r\n')}\r\n`
}
