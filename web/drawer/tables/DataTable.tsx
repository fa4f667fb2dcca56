import { type KeyboardEvent, memo, type ReactNode, useMemo } from 'react'
import { describeQuantity, type UnitOfMeasure } from '../../../src/document.ts'
import { QuantityField } from '../../number/QuantityField.tsx'
import { useBalanceStore } from '../../store/balance-store.ts'
import { useLayout } from '../../store/plant-store.ts'
import { useHovered, useSelectionStore } from '../../store/selection-store.ts'
import { useUnitChoice } from '../../store/settings-store.ts'
import { Swatch } from '../Swatch.tsx'
import { useVisibleRows } from '../use-visible-rows.ts'
import { moveFocus } from './move-focus.ts'
import { TableTools } from './TableTools.tsx'
import {
  shownCell,
  sorted,
  type Table,
  type TableColumn,
  type TableRow,
  type TableSource,
  unitColumn,
  unitOfColumn,
} from './table.ts'
import { useShownColumns, useSorting, useTableStore } from './table-store.ts'
import './tables.css'

const rowHeight = 22

/** A line that heads some of the rows. */
export interface TableGroup {
  readonly title: string
  readonly keys: readonly string[]
}

interface Props {
  readonly build: (source: TableSource) => Table
  /** Said where there are no rows. */
  readonly empty: string
  /** Rows under heads of their own, while no column sorts them. */
  readonly groups?: readonly TableGroup[] | undefined
  /** Rows are streams: their line is drawn before the name. */
  readonly streams?: true
}

type Line =
  | { readonly type: 'head'; readonly title: string }
  | { readonly type: 'row'; readonly row: TableRow }

function Arrow({ falling }: { readonly falling: boolean }) {
  return (
    <svg className="sort-arrow" viewBox="0 0 8 8" width={7} height={7} aria-hidden="true">
      <path d={falling ? 'M4 7 0.5 1H7.5Z' : 'M4 1 7.5 7H0.5Z'} />
    </svg>
  )
}

const isNumeric = ({ dimension, id }: TableColumn): boolean =>
  dimension !== undefined || id === 'value'

const classOf = (column: TableColumn, i: number): string =>
  i === 0
    ? 'cell-name'
    : isNumeric(column)
      ? 'cell-number'
      : column.id === 'id' || column.id === unitColumn
        ? 'cell-id'
        : 'cell-word'

interface RowProps {
  readonly row: TableRow
  readonly columns: readonly TableColumn[]
  /** One a column, as it reads; joined, so that an unchanged row is not drawn again. */
  readonly texts: string
  readonly place: number
  readonly swatch: boolean
  readonly chosen: boolean
}

function sameRow(a: RowProps, b: RowProps): boolean {
  return (
    a.row.key === b.row.key &&
    a.texts === b.texts &&
    a.place === b.place &&
    a.chosen === b.chosen &&
    a.columns.length === b.columns.length &&
    a.columns.every(({ id }, i) => id === b.columns[i]?.id)
  )
}

const Row = memo(function Row({ row, columns, texts, place, swatch, chosen }: RowProps) {
  const { owner } = row
  const layout = useLayout()
  const hovered = useHovered(owner)
  const known = useBalanceStore((state) => state.index.paths)
  const { select, hover } = useSelectionStore.getState()
  const shown = texts.split('\t')
  return (
    <tr
      data-selected={chosen}
      data-hovered={hovered}
      data-row={row.key}
      aria-rowindex={place + 2}
      onPointerEnter={() => hover(owner)}
      onPointerLeave={() => hover(null)}
    >
      {columns.map((column, i) => {
        const text = shown[i] ?? ''
        if (i === 0) {
          return (
            <th key={column.id} scope="row" className="cell-name">
              <button
                type="button"
                title={text}
                onClick={(event) =>
                  select([owner], event.ctrlKey || event.metaKey ? 'toggle' : 'replace')
                }
              >
                {swatch && <Swatch id={owner} />}
                <span>{text}</span>
              </button>
            </th>
          )
        }
        const path = `${owner}.${column.id}`
        const described = column.field ? describeQuantity(layout, path) : undefined
        return (
          <td
            key={column.id}
            className={classOf(column, i)}
            title={column.id === 'basis' ? text : undefined}
            data-path={known.has(path) ? path : undefined}
          >
            {described ? (
              <QuantityField
                path={path}
                label={`${shown[0]}, ${column.label}`}
                description={described.description}
                showUnit={false}
              />
            ) : (
              text
            )}
          </td>
        )
      })}
    </tr>
  )
}, sameRow)

function Head({
  table,
  column,
  unit,
  first,
}: {
  readonly table: Table
  readonly column: TableColumn
  readonly unit: UnitOfMeasure | null
  readonly first: boolean
}) {
  const sorting = useSorting(table.name)
  const sort = useTableStore((state) => state.sort)
  const its = sorting?.column === column.id ? sorting : null
  const { label, symbol, help } = column
  return (
    <th
      scope="col"
      className={classOf(column, first ? 0 : 1)}
      aria-sort={its ? (its.falling ? 'descending' : 'ascending') : undefined}
      title={help ? `${label}: ${help}` : label}
    >
      <button type="button" className="sort" onClick={() => sort(table.name, column.id)}>
        {its && <Arrow falling={its.falling} />}
        {table.name === 'states' && symbol ? (
          <>
            <span aria-hidden="true">{symbol}</span>
            <span className="visually-hidden">{label}</span>
          </>
        ) : (
          label
        )}
        {unit && unit.name !== '' && <small>{unit.name}</small>}
        {table.name === 'states' && column.id === 'x' && <small>dry</small>}
      </button>
    </th>
  )
}

/** A table of the balance: sorted by any column, with the columns that the user wants, in his units. */
export function DataTable({ build, empty, groups, streams }: Props) {
  const layout = useLayout()
  const names = useBalanceStore((state) => state.names)
  const balance = useBalanceStore((state) => state.balance)
  const units = useUnitChoice()
  const selected = useSelectionStore((state) => state.selected)
  const table = useMemo(() => build({ layout, names, balance }), [build, layout, names, balance])
  const places = useShownColumns(table)
  const sorting = useSorting(table.name)

  const lines = useMemo<readonly Line[]>(() => {
    if (sorting || !groups) return sorted(table, sorting).map((row) => ({ type: 'row', row }))
    const byKey = new Map(table.rows.map((row) => [row.key, row]))
    return groups.flatMap(({ title, keys }) => [
      { type: 'head' as const, title },
      ...keys.flatMap((key) => {
        const row = byKey.get(key)
        return row ? [{ type: 'row' as const, row }] : []
      }),
    ])
  }, [table, sorting, groups])
  const [box, first, end] = useVisibleRows(lines.length, rowHeight)

  if (table.rows.length === 0) return <p className="drawer-empty">{empty}</p>
  const columns = places.map((i) => table.columns[i] as TableColumn)
  const unitsOf = places.map((i) => unitOfColumn(table, i, units))
  const spacer = (height: number): ReactNode =>
    height > 0 && (
      <tr style={{ height }}>
        <td colSpan={columns.length} />
      </tr>
    )
  return (
    <div className="table-place">
      <TableTools table={table} />
      {/* biome-ignore lint/a11y/noStaticElementInteractions: the arrow keys bubble up from the table's fields. */}
      <div
        ref={box}
        className="drawer-scroll"
        onKeyDown={(event: KeyboardEvent<HTMLElement>) => moveFocus(event)}
      >
        <table className="table" data-table={table.name} aria-rowcount={lines.length + 1}>
          <thead>
            <tr>
              {columns.map((column, i) => (
                <Head
                  key={column.id}
                  table={table}
                  column={column}
                  unit={unitsOf[i] ?? null}
                  first={i === 0}
                />
              ))}
            </tr>
          </thead>
          <tbody>
            {spacer(first * rowHeight)}
            {lines.slice(first, end).map((line, i) =>
              line.type === 'head' ? (
                <tr
                  key={`head/${line.title}`}
                  className="table-head-row"
                  aria-rowindex={first + i + 2}
                >
                  <th colSpan={columns.length} scope="rowgroup">
                    {line.title}
                  </th>
                </tr>
              ) : (
                <Row
                  key={line.row.key}
                  row={line.row}
                  columns={columns}
                  texts={places
                    .map((at, k) => shownCell(table, line.row, at, units, unitsOf[k] ?? null))
                    .join('\t')}
                  place={first + i}
                  swatch={streams === true}
                  chosen={selected.includes(line.row.owner)}
                />
              ),
            )}
            {spacer((lines.length - end) * rowHeight)}
          </tbody>
        </table>
        {table.note && <p className="table-note">{table.note}</p>}
      </div>
    </div>
  )
}
