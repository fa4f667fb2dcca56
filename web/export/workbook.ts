import writeExcelFile, { type Sheet } from 'write-excel-file/universal'
import type { UnitChoice } from '../../src/document.ts'
import { exported, shownCell, type Table, unitOfColumn } from '../drawer/tables/table.ts'
import { type Cell, defused } from './table-text.ts'

/** Digits after the point with which a column reads best: those of its most exact number. */
function formatOf(table: Table, column: number, units: UnitChoice): string | undefined {
  const unit = unitOfColumn(table, column, units)
  let decimals = -1
  for (const row of table.rows) {
    const text = shownCell(table, row, column, units, unit)
    if (typeof row.cells[column] !== 'number' || text.includes('×')) continue
    decimals = Math.max(decimals, (text.split('.')[1] ?? '').length)
  }
  if (decimals < 0) return undefined
  return decimals === 0 ? '0' : `0.${'0'.repeat(decimals)}`
}

/** Decimals of one cell, where every row has its own unit. */
function formatOfCell(table: Table, row: number, column: number, units: UnitChoice): string {
  const its = table.rows[row]
  const text = its ? shownCell(table, its, column, units, null) : ''
  const decimals = (text.split('.')[1] ?? '').length
  return decimals === 0 ? '0' : `0.${'0'.repeat(decimals)}`
}

const widest = 60

/** Names of sheets may hold none of these and no more than 31 characters. */
const sheetName = (title: string): string => title.replace(/[\\/?*[\]:]/g, ' ').slice(0, 31)

function sheetOf(table: Table, units: UnitChoice): Sheet<Blob> {
  const cells = exported(table, units)
  const formats = table.columns.map((_, i) => formatOf(table, i, units))
  const data = cells.map((line, r) =>
    line.map((cell: Cell, c) => {
      if (r === 0)
        return { value: String(cell), type: String, fontWeight: 'bold' as const, wrap: true }
      if (cell === null || cell === '') return null
      if (typeof cell === 'string') return { value: defused(cell), type: String }
      const format = table.columns[c]?.dimension ? formats[c] : formatOfCell(table, r - 1, c, units)
      return { value: cell, type: Number, ...(format ? { format } : {}) }
    }),
  )
  if (table.note) data.push([], [{ value: table.note, type: String }] as never)
  const columns = table.columns.map((_, c) => {
    const longest = Math.max(
      ...cells.map((line, r) => {
        const cell = line[c]
        return r === 0
          ? Math.min(14, String(cell).length)
          : typeof cell === 'string'
            ? cell.length
            : 9
      }),
    )
    return { width: Math.min(widest, longest + 2) }
  })
  return {
    sheet: sheetName(table.title),
    data,
    columns,
    stickyRowsCount: 1,
    stickyColumnsCount: 1,
  }
}

/** Tables as a workbook, one a sheet: units in the header, numbers as numbers, nothing that runs. */
export function workbookOf(tables: readonly Table[], units: UnitChoice): Promise<Blob> {
  return writeExcelFile(tables.map((table) => sheetOf(table, units))).toBlob()
}
