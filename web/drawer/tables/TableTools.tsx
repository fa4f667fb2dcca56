import { useEffect, useRef, useState } from 'react'
import { downloadText, fileStem } from '../../export/download.ts'
import { csvOfTable, textOfTable } from '../../export/table-text.ts'
import { readLayout, usePlantStore } from '../../store/plant-store.ts'
import { readUnitChoice } from '../../store/settings-store.ts'
import { useNoticeStore } from '../../strip/notice-store.ts'
import { exported, sorted, type Table } from './table.ts'
import { readShownColumns, useShownColumns, useTableStore } from './table-store.ts'

const say = (severity: 'error' | 'remark', text: string) =>
  useNoticeStore.getState().say({ id: 'table', severity, text })

/** The table as it is shown: its columns, its order. */
function cellsOf(table: Table) {
  const sorting = useTableStore.getState().choices[table.name]?.sorting ?? null
  const rows = sorted(table, sorting)
  return exported({ ...table, rows }, readUnitChoice(), readShownColumns(table))
}

function copy(table: Table): void {
  navigator.clipboard.writeText(textOfTable(cellsOf(table))).then(
    () => say('remark', `${table.title}: on the clipboard, ready for a spreadsheet.`),
    () => say('error', 'The browser does not let the window copy. Save the table as CSV instead.'),
  )
}

/** Columns to choose, the table to copy or to save. */
export function TableTools({ table }: { readonly table: Table }) {
  const [open, setOpen] = useState(false)
  const place = useRef<HTMLDivElement>(null)
  const shown = useShownColumns(table)
  const showColumn = useTableStore((state) => state.showColumn)
  useEffect(() => {
    if (!open) return
    const leave = (event: PointerEvent) => {
      if (!place.current?.contains(event.target as Node)) setOpen(false)
    }
    window.addEventListener('pointerdown', leave, true)
    return () => window.removeEventListener('pointerdown', leave, true)
  }, [open])
  const stem = () => fileStem(usePlantStore.getState().plant.title, readLayout().name, table.title)
  return (
    <div className="table-tools" ref={place}>
      <button
        type="button"
        aria-expanded={open}
        onClick={() => setOpen(!open)}
        title="Choose the columns of this table"
      >
        Columns
      </button>
      <button
        type="button"
        onClick={() => copy(table)}
        title="Copy this table, ready to paste into a spreadsheet"
      >
        Copy
      </button>
      <button
        type="button"
        onClick={() => downloadText(`${stem()}.csv`, csvOfTable(cellsOf(table)), 'text/csv')}
        title="Save this table as comma separated values"
      >
        CSV
      </button>
      <button
        type="button"
        title="Save all tables as a workbook"
        onClick={() => {
          import('../../export/save-workbook.ts').then(
            ({ saveWorkbook }) => saveWorkbook(),
            () => say('error', 'The workbook could not be made: its code could not be loaded.'),
          )
        }}
      >
        XLSX
      </button>
      {open && (
        // biome-ignore lint/a11y/noStaticElementInteractions: Escape bubbles up here from the boxes.
        <div
          className="table-columns"
          style={{
            maxHeight: Math.max(120, (place.current?.parentElement?.clientHeight ?? 0) - 40),
          }}
          onKeyDown={(event) => {
            if (event.key !== 'Escape') return
            event.stopPropagation()
            setOpen(false)
          }}
        >
          {table.columns.map((column, i) =>
            i === 0 ? null : (
              <label key={column.id}>
                <input
                  type="checkbox"
                  checked={shown.includes(i)}
                  onChange={(event) => showColumn(table.name, column.id, event.target.checked)}
                />
                {column.label}
              </label>
            ),
          )}
        </div>
      )}
    </div>
  )
}
