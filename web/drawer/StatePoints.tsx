import { type KeyboardEvent, memo, useMemo, useRef } from 'react'
import {
  type QuantityDescription,
  type QuantityTable,
  streamQuantities,
  unitOf,
} from '../../src/document.ts'
import { Quantity } from '../number/Quantity.tsx'
import { QuantityField } from '../number/QuantityField.tsx'
import { usePhase, useValue } from '../store/balance-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { useHovered, useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { Swatch } from './Swatch.tsx'
import { type StreamRow, stateRows } from './stream-rows.ts'
import { useVisibleRows } from './use-visible-rows.ts'

const rowHeight = 22

interface Column {
  readonly name: string
  readonly symbol: string
  readonly description: QuantityDescription
  /** The quantity can be given. */
  readonly field: boolean
  readonly unit?: string
}

const volume: QuantityDescription = {
  label: 'Specific volume',
  dimension: 'specificVolume',
  help: 'Volume per mass.',
}

const table: QuantityTable = streamQuantities

const columns: readonly Column[] = [
  ...['m', 'p', 'T', 'h', 's', 'x'].flatMap((name) => {
    const description = table[name]
    return description ? [{ name, symbol: name, description, field: true }] : []
  }),
  { name: 'v', symbol: 'v', description: table.v ?? volume, field: false },
]

const phaseWords = {
  none: '–',
  liquid: 'liquid',
  wet: 'wet',
  vapour: 'steam',
  supercritical: 'supercritical',
}

function Phase({ id }: { id: string }) {
  const phase = usePhase(id)
  // Outside the wet region there is no dryness.
  const saturated = useValue(`${id}.x`) !== null && phase !== 'wet'
  return (
    <td className="cell-word">
      {saturated ? 'sat. ' : ''}
      {phaseWords[phase]}
    </td>
  )
}

const Row = memo(function Row({ row, index }: { row: StreamRow; index: number }) {
  const { id, name, chosen } = row
  const hovered = useHovered(id)
  const { select, hover } = useSelectionStore.getState()
  return (
    <tr
      data-selected={chosen}
      data-hovered={hovered}
      aria-rowindex={index + 2}
      onPointerEnter={() => hover(id)}
      onPointerLeave={() => hover(null)}
    >
      <th scope="row" className="cell-name">
        <button
          type="button"
          title={name}
          onClick={(event) => select([id], event.ctrlKey || event.metaKey ? 'toggle' : 'replace')}
        >
          <Swatch id={id} />
          <span>{name}</span>
        </button>
      </th>
      <td className="cell-id">{id}</td>
      {columns.map((column) => (
        <td key={column.name} className="cell-number">
          {column.field ? (
            <QuantityField
              path={`${id}.${column.name}`}
              label={`${name}, ${column.description.label}`}
              description={column.description}
              showUnit={false}
            />
          ) : (
            <Quantity
              path={`${id}.${column.name}`}
              dimension={column.description.dimension}
              showUnit={false}
            />
          )}
        </td>
      ))}
      <Phase id={id} />
    </tr>
  )
})

/** The arrow keys move between the table's fields. */
function moveFocus(event: KeyboardEvent<HTMLElement>): void {
  const cell = (event.target as Element).closest('td, th')
  const line = cell?.parentElement
  if (!cell || !line || (event.target as Element).matches('input')) return
  const column = Array.from(line.children).indexOf(cell)
  const focusIn = (row: Element | null | undefined, at: number) => {
    const button = row?.children[at]?.querySelector<HTMLElement>('button')
    button?.focus()
    return button !== undefined && button !== null
  }
  const rowBeside = (step: 1 | -1): Element | null => {
    let row: Element | null = line
    do row = step > 0 ? row.nextElementSibling : row.previousElementSibling
    while (row && row.children.length <= 1)
    return row
  }
  let moved = false
  if (event.key === 'ArrowDown') moved = focusIn(rowBeside(1), column)
  else if (event.key === 'ArrowUp') moved = focusIn(rowBeside(-1), column)
  else if (event.key === 'ArrowRight' || event.key === 'ArrowLeft') {
    const step = event.key === 'ArrowRight' ? 1 : -1
    for (let at = column + step; at >= 0 && at < line.children.length && !moved; at += step) {
      moved = focusIn(line, at)
    }
  }
  if (moved) {
    event.preventDefault()
    event.stopPropagation()
  }
}

/** The table of state points: every stream with its flow and state. */
export function StatePoints() {
  const layout = useLayout()
  const selected = useSelectionStore((state) => state.selected)
  const units = useUnitChoice()
  const rows = useMemo(() => stateRows(layout, selected), [layout, selected])
  const box = useRef<HTMLDivElement>(null)
  const [first, end] = useVisibleRows(box, rows.length, rowHeight)

  if (rows.length === 0) {
    return (
      <p className="drawer-empty">No streams yet. Connect two ports, and its state appears here.</p>
    )
  }
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the arrow keys bubble up from the table's fields.
    <div ref={box} className="drawer-scroll" onKeyDown={moveFocus}>
      <table className="table states" aria-rowcount={rows.length + 1}>
        <thead>
          <tr>
            <th scope="col" className="cell-name">
              Stream
            </th>
            <th scope="col" className="cell-id">
              Id
            </th>
            {columns.map(({ name, symbol, description }) => (
              <th key={name} scope="col" className="cell-number" title={description.label}>
                {symbol}{' '}
                <small>{name === 'x' ? 'dry' : unitOf(description.dimension, units).name}</small>
              </th>
            ))}
            <th scope="col" className="cell-word">
              Phase
            </th>
          </tr>
        </thead>
        <tbody>
          {first > 0 && (
            <tr style={{ height: first * rowHeight }}>
              <td colSpan={columns.length + 3} />
            </tr>
          )}
          {rows.slice(first, end).map((row, i) =>
            row.type === 'head' ? (
              <tr key={row.id} className="table-head-row" aria-rowindex={first + i + 2}>
                <th colSpan={columns.length + 3} scope="rowgroup">
                  {row.name}
                </th>
              </tr>
            ) : (
              <Row key={row.id} row={row} index={first + i} />
            ),
          )}
          {end < rows.length && (
            <tr style={{ height: (rows.length - end) * rowHeight }}>
              <td colSpan={columns.length + 3} />
            </tr>
          )}
        </tbody>
      </table>
    </div>
  )
}
