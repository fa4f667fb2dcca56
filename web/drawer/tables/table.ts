import {
  type Dimension,
  formatQuantity,
  type Layout,
  toShown,
  type UnitChoice,
  type UnitOfMeasure,
  unitNamed,
  unitOf,
} from '../../../src/document.ts'
import type { BalanceMessage, NamesMessage } from '../../../src/messages.ts'
import type { Cell } from '../../export/table-text.ts'

/** What tables are made from. */
export interface TableSource {
  readonly layout: Layout
  readonly names: NamesMessage | null
  readonly balance: BalanceMessage | null
}

export interface TableColumn {
  readonly id: string
  readonly label: string
  /** The trade's symbol, for narrow headers. */
  readonly symbol?: string
  readonly help?: string
  /** Absent: a column of words. */
  readonly dimension?: Dimension
  /** Numbers of this column can be given: they are fields. */
  readonly field?: true
  /** Not shown until the user asks for it. */
  readonly hidden?: true
}

export interface TableRow {
  readonly key: string
  /** Unit, stream or shaft that the row is about. */
  readonly owner: string
  /** Numbers in SI; null where there is none. */
  readonly cells: readonly (string | number | null)[]
  /** Where the rows of a table have units of their own: that of this row's numbers. */
  readonly dimension?: Dimension
  /** And the unit, where it is not the user's to choose. */
  readonly unit?: string
}

/** A table as numbers: what the drawer shows, the clipboard, files and the report. */
export interface Table {
  readonly name: string
  readonly title: string
  readonly columns: readonly TableColumn[]
  readonly rows: readonly TableRow[]
  /** What a reader must know to use the numbers. */
  readonly note?: string
}

/** Reads quantities of the balance and what is derived from it, SI. */
export function readerOf({ names, balance }: TableSource): (path: string) => number | null {
  if (!names || !balance) return () => null
  const index = indexOf(names)
  return (path) => {
    const at = index.get(path)
    if (at === undefined) return null
    const value = at >= 0 ? balance.values[at] : balance.derived.values[-at - 1]
    return value !== undefined && Number.isFinite(value) ? value : null
  }
}

const indexes = new WeakMap<NamesMessage, ReadonlyMap<string, number>>()

/** Places of paths: those derived count downwards from -1. */
function indexOf(names: NamesMessage): ReadonlyMap<string, number> {
  let index = indexes.get(names)
  if (!index) {
    index = new Map([
      ...names.derived.paths.map((path, k) => [path, -k - 1] as const),
      ...names.paths.map((path, k) => [path, k] as const),
    ])
    indexes.set(names, index)
  }
  return index
}

/** The one unit in which a column's numbers are shown: that which suits its largest. */
export function unitOfColumn(
  table: Table,
  column: number,
  units: UnitChoice,
): UnitOfMeasure | null {
  const dimension = table.columns[column]?.dimension
  if (!dimension) return null
  let largest = 0
  for (const { cells } of table.rows) {
    const value = cells[column]
    if (typeof value === 'number' && Math.abs(value) > largest) largest = Math.abs(value)
  }
  return unitOf(dimension, units, largest || undefined)
}

function unitOfRow({ dimension, unit, cells }: TableRow, units: UnitChoice): UnitOfMeasure | null {
  if (!dimension) return null
  const value = cells.find((cell) => typeof cell === 'number')
  return unitNamed(dimension, unit) ?? unitOf(dimension, units, value as number | undefined)
}

/** A cell ready to read. */
export function shownCell(
  table: Table,
  row: TableRow,
  column: number,
  units: UnitChoice,
  unit: UnitOfMeasure | null,
): string {
  const cell = row.cells[column]
  const { dimension, id } = table.columns[column] as TableColumn
  if (id === unitColumn) return unitOfRow(row, units)?.name ?? ''
  if (cell === null || cell === undefined) return dimension || row.dimension ? '–' : ''
  if (typeof cell === 'string') return cell
  const its = dimension ? unit : unitOfRow(row, units)
  const kind = dimension ?? row.dimension ?? 'number'
  return formatQuantity(cell, kind, units, its ? { unit: its.name } : {}).text
}

/** Id of a column that names the unit of its row. */
export const unitColumn = 'unit'

/** 'Temperature [°C]' */
export function headerOf({ label }: TableColumn, unit: UnitOfMeasure | null): string {
  return unit && unit.name !== '' ? `${label} [${unit.name}]` : label
}

/**
 * A table to be passed on: names and units in the first row, numbers as numbers in the units in force.
 * `columns` are the places of those that are wanted.
 */
export function exported(
  table: Table,
  units: UnitChoice,
  columns: readonly number[] = table.columns.map((_, i) => i),
): Cell[][] {
  const own = columns.map((i) => unitOfColumn(table, i, units))
  const head = columns.map((i, k) => headerOf(table.columns[i] as TableColumn, own[k] ?? null))
  const body = table.rows.map((row) => {
    const rowUnit = unitOfRow(row, units)
    return columns.map((i, k): Cell => {
      const cell = row.cells[i]
      if (table.columns[i]?.id === unitColumn) return rowUnit?.name ?? ''
      if (typeof cell !== 'number') return cell ?? null
      const unit = own[k] ?? rowUnit
      return unit ? toShown(cell, unit) : cell
    })
  })
  return [head, ...body]
}

export interface Sorting {
  readonly column: string
  readonly falling: boolean
}

/** The rows in order of a column; those without a value last, equal ones as they were. */
export function sorted(table: Table, sorting: Sorting | null): readonly TableRow[] {
  const at = sorting ? table.columns.findIndex(({ id }) => id === sorting.column) : -1
  if (!sorting || at < 0) return table.rows
  const way = sorting.falling ? -1 : 1
  const compared = (a: TableRow, b: TableRow): number => {
    const [x, y] = [a.cells[at] ?? null, b.cells[at] ?? null]
    if (x === null || y === null) return x === y ? 0 : x === null ? 1 : -1
    if (typeof x === 'number' && typeof y === 'number') return way * (x - y)
    return way * String(x).localeCompare(String(y), 'en', { numeric: true })
  }
  return [...table.rows].sort(compared)
}
