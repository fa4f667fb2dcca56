import { lazy, Suspense } from 'react'
import { createPortal } from 'react-dom'
import { useBalanceStore } from '../store/balance-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { useNoticeStore } from '../strip/notice-store.ts'
import { sectionNames, sectionWords, useReportStore } from './report-store.ts'
import './report-tab.css'

// Report and drawings are made seldom: their code is loaded when they are.
const ReportSheet = lazy(() => import('./ReportSheet.tsx'))

async function drawing(kind: 'svg' | 'png'): Promise<void> {
  const { frame, legend } = useReportStore.getState()
  try {
    const { saveDrawing } = await import('../export/save-drawing.tsx')
    await saveDrawing(kind, { frame, legend })
  } catch {
    useNoticeStore.getState().say({
      id: 'drawing',
      severity: 'error',
      text: 'The drawing could not be made: its code could not be loaded. Reload the page once the network is back.',
    })
  }
}

async function workbook(): Promise<void> {
  const { saveWorkbook } = await import('../export/save-workbook.ts')
  await saveWorkbook()
}

function Box({
  checked,
  onChange,
  children,
}: {
  readonly checked: boolean
  readonly children: string
  onChange(checked: boolean): void
}) {
  return (
    <label>
      <input
        type="checkbox"
        checked={checked}
        onChange={(event) => onChange(event.target.checked)}
      />
      {children}
    </label>
  )
}

/** What can be handed over: the report, the drawing, the tables. */
export function ReportTab() {
  const { paper, left, frame, legend, open, change, show } = useReportStore()
  const hasUnits = useLayout().units.length > 0
  const status = useBalanceStore((state) => state.balance?.status)
  return (
    <div className="drawer-scroll report-tab">
      <section>
        <h3>Report</h3>
        <p className="muted">
          {status === 'solved'
            ? 'A report of the layout and case shown, in the units in force.'
            : 'The balance is not solved: a report would say so, and leave open what is open.'}
        </p>
        <div className="report-sections">
          {sectionNames.map((name) => (
            <Box
              key={name}
              checked={!left.includes(name)}
              onChange={(wanted) =>
                change({ left: wanted ? left.filter((one) => one !== name) : [...left, name] })
              }
            >
              {sectionWords[name]}
            </Box>
          ))}
        </div>
        <div className="report-line">
          <label htmlFor="report-paper">Paper</label>
          <select
            id="report-paper"
            value={paper}
            onChange={(event) =>
              change({ paper: event.target.value === 'letter' ? 'letter' : 'a4' })
            }
          >
            <option value="a4">A4</option>
            <option value="letter">Letter</option>
          </select>
          <button
            type="button"
            className="button button-main"
            disabled={!hasUnits}
            onClick={() => show(true)}
          >
            Open the report
          </button>
        </div>
      </section>
      <section>
        <h3>Flow diagram</h3>
        <p className="muted">As on the canvas at 100 %, on a light ground.</p>
        <div className="report-line">
          <Box checked={frame} onChange={(wanted) => change({ frame: wanted })}>
            Frame and title
          </Box>
          <Box checked={legend} onChange={(wanted) => change({ legend: wanted })}>
            Legend
          </Box>
        </div>
        <div className="report-line">
          <button
            type="button"
            className="button"
            disabled={!hasUnits}
            onClick={() => void drawing('svg')}
          >
            Save as SVG
          </button>
          <button
            type="button"
            className="button"
            disabled={!hasUnits}
            onClick={() => void drawing('png')}
          >
            Save as PNG
          </button>
        </div>
      </section>
      <section>
        <h3>All tables</h3>
        <p className="muted">A workbook with a sheet for each table, numbers as numbers.</p>
        <div className="report-line">
          <button
            type="button"
            className="button"
            disabled={!hasUnits}
            onClick={() => void workbook()}
          >
            Save as XLSX
          </button>
        </div>
      </section>
      {open &&
        createPortal(
          <Suspense fallback={<p className="report-wait">The report is being put together.</p>}>
            <ReportSheet />
          </Suspense>,
          document.body,
        )}
    </div>
  )
}
