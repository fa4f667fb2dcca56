import type { UnitChoice, UnitOfMeasure } from '../../src/document.ts'
import { textWidth } from '../chart/measure-text.ts'
import { shownCell, type Table, type TableColumn, unitOfColumn } from '../drawer/tables/table.ts'

/** Size of the text, px. */
const size = 9.5
const padding = 9
/** No column of words is wider, px: longer ones wrap. */
const widest = 190

interface ShownColumn {
  readonly column: TableColumn
  readonly unit: UnitOfMeasure | null
  readonly texts: readonly string[]
  readonly width: number
}

/** The columns in as few parts as the paper's width allows, none much narrower than the others. */
function partsOf(columns: readonly ShownColumn[], room: number): readonly ShownColumn[][] {
  const fewest = filled(columns, room)
  for (let less = 0.5; less < 1; less += 0.05) {
    const parts = filled(columns, less * room)
    if (parts.length === fewest.length) return parts
  }
  return fewest
}

/** Parts filled one after the other, each led by the first column. */
function filled(columns: readonly ShownColumn[], room: number): readonly ShownColumn[][] {
  const [first, ...rest] = columns
  if (!first) return []
  const parts: ShownColumn[][] = []
  let part: ShownColumn[] = [first]
  let used = first.width
  for (const column of rest) {
    if (used + column.width > room && part.length > 1) {
      parts.push(part)
      part = [first]
      used = first.width
    }
    part.push(column)
    used += column.width
  }
  parts.push(part)
  return parts
}

/** A table for paper: usual columns, in parts where it is too wide. */
export function ReportTable({
  table,
  units,
  room,
  without = [],
}: {
  readonly table: Table
  readonly units: UnitChoice
  /** Width of the paper within its margins, px. */
  readonly room: number
  readonly without?: readonly string[]
}) {
  const columns = table.columns.flatMap((column, i): ShownColumn[] => {
    if (column.hidden || without.includes(column.id)) return []
    const unit = unitOfColumn(table, i, units)
    const texts = table.rows.map((row) => shownCell(table, row, i, units, unit))
    // A column without a single number says nothing.
    if (column.dimension && texts.every((text) => text === '–')) return []
    const words = column.label.split(' ')
    const head = Math.max(...words.map((word) => textWidth(word, size, 600)))
    const body = Math.max(0, ...texts.map((text) => textWidth(text, size)))
    const width =
      padding + Math.min(widest, Math.max(head, body, textWidth(unit?.name ?? '', size)))
    return [{ column, unit, texts, width }]
  })
  return (
    <>
      {partsOf(columns, room).map((part) => (
        <table key={part[1]?.column.id ?? ''} className="report-table" data-table={table.name}>
          <thead>
            <tr>
              {part.map(({ column, unit }, i) => (
                <th
                  key={column.id}
                  scope="col"
                  className={column.dimension || column.id === 'value' ? 'number' : undefined}
                  {...(i === 0 ? { 'data-first': true } : {})}
                >
                  {column.label}
                  {unit && unit.name !== '' && <span className="unit">{unit.name}</span>}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {table.rows.map((row, r) => (
              <tr key={row.key}>
                {part.map(({ column, texts }, i) =>
                  i === 0 ? (
                    <th key={column.id} scope="row">
                      {texts[r]}
                    </th>
                  ) : (
                    <td
                      key={column.id}
                      className={column.dimension || column.id === 'value' ? 'number' : undefined}
                    >
                      {texts[r]}
                    </td>
                  ),
                )}
              </tr>
            ))}
          </tbody>
        </table>
      ))}
      {table.note && <p className="report-note">{table.note}</p>}
    </>
  )
}
