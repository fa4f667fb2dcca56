import { useEffect, useMemo, useRef, useState } from 'react'
import { labelOf, writePlant } from '../../src/document.ts'
import { EnergyPicture, useEnergyAccount } from '../chart/EnergyChart.tsx'
import { HeatPicture, useProfiles } from '../chart/HeatChart.tsx'
import { StatePicture } from '../chart/StateChart.tsx'
import { tableBuilders } from '../drawer/tables/tables.ts'
import { downloadText, fileStem } from '../export/download.ts'
import { readDrawingSource } from '../export/drawing-source.ts'
import { type DrawingSource, PlantDrawing } from '../export/PlantDrawing.tsx'
import { subject, titleLines } from '../export/title-lines.ts'
import { useBalanceStore } from '../store/balance-store.ts'
import { useLayout, usePlantStore } from '../store/plant-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { Icon } from '../strip/Icon.tsx'
import { checksumOf } from './checksum.ts'
import { givenLines } from './givens.ts'
import { cautions, methodNotes } from './method.ts'
import { ReportTable } from './ReportTable.tsx'
import { reportFile } from './report-file.ts'
import { type SectionName, sectionWords, useReportStore } from './report-store.ts'
import './report.css'

/** Width of the paper within its margins, CSS px (96 to the inch). */
const room = { a4: 688, letter: 710 }

const statusWords = {
  solved: 'Solved',
  underspecified: 'Not solved: numbers are missing',
  overspecified: 'Not solved: numbers contradict each other',
  infeasible: 'Not solved: the given numbers have no possible answer',
  notConverged: 'Not solved: no solution was found',
}

const severityWords = { error: 'Error', caution: 'Caution', remark: 'Remark' }
const severities = ['error', 'caution', 'remark'] as const

const tablesInOrder = ['states', 'units', 'heaters', 'groups', 'pumps', 'account'] as const

function useChecksum(): string | null | undefined {
  const plant = usePlantStore((state) => state.plant)
  const [sum, setSum] = useState<string | null | undefined>(undefined)
  useEffect(() => {
    let isCurrent = true
    checksumOf(writePlant(plant)).then(
      (text) => isCurrent && setSum(text),
      () => isCurrent && setSum(null),
    )
    return () => {
      isCurrent = false
    }
  }, [plant])
  return sum
}

/** The report of the layout and case shown, over the window: to be read, printed or saved as one file. */
export default function ReportSheet() {
  const { paper, left, frame, legend, show } = useReportStore()
  const layer = useRef<HTMLDivElement>(null)
  const page = useRef<HTMLElement>(null)
  const { plant, caseId } = usePlantStore()
  const layout = useLayout()
  const names = useBalanceStore((state) => state.names)
  const balance = useBalanceStore((state) => state.balance)
  const units = useUnitChoice()
  const checksum = useChecksum()
  const account = useEnergyAccount()
  const profiles = useProfiles()
  const [now] = useState(() => new Date())
  const { title, lines } = titleLines(now)
  const width = room[paper]
  const shows = (name: SectionName) => !left.includes(name)
  const source = useMemo(() => ({ layout, names, balance }), [layout, names, balance])
  const [drawing, setDrawing] = useState<DrawingSource | null>(null)
  // Reading the drawing sets the canvas to 100 % and back: not while anything is being rendered.
  // biome-ignore lint/correctness/useExhaustiveDependencies: the drawing is read from the stores
  useEffect(() => setDrawing(readDrawingSource()), [layout, balance, units])
  const givens = useMemo(() => givenLines(layout, caseId, units), [layout, caseId, units])

  useEffect(() => {
    const before = document.activeElement as HTMLElement | null
    const main = document.getElementById('window')
    main?.setAttribute('inert', '')
    layer.current?.focus()
    return () => {
      main?.removeAttribute('inert')
      before?.focus()
    }
  }, [])

  let number = 0
  const heading = (words: string) => {
    number += 1
    return `${number} ${words}`
  }
  const status = balance ? statusWords[balance.status] : 'Not solved'
  const { closure } = balance ?? { closure: null }

  return (
    <div
      ref={layer}
      className="report-layer"
      role="dialog"
      aria-modal="true"
      aria-label="Report"
      tabIndex={-1}
      onKeyDown={(event) => {
        if (event.key === 'Escape') show(false)
        event.stopPropagation()
      }}
    >
      <div className="report-bar">
        <strong>Report</strong>
        <span className="muted">
          {paper === 'a4' ? 'A4' : 'Letter'}, {subject()}
        </span>
        <button type="button" className="button button-main" onClick={() => window.print()}>
          Print
        </button>
        <button
          type="button"
          className="button"
          onClick={() => {
            if (!page.current) return
            const name = fileStem(plant.title, layout.name, 'report')
            downloadText(`${name}.html`, reportFile(page.current, title), 'text/html')
          }}
        >
          Save as one file
        </button>
        <button
          type="button"
          className="icon-button"
          aria-label="Close the report"
          onClick={() => show(false)}
        >
          <Icon name="close" size={12} />
        </button>
      </div>
      <article ref={page} className="report light-sheet" data-paper={paper}>
        <header className="report-title">
          <h1>{title}</h1>
          <p className="report-subject">{subject()}</p>
          <dl>
            <div>
              <dt>Balance</dt>
              <dd>
                {status}
                {balance?.status === 'solved' && closure
                  ? `; mass closes to ${closure.mass.toExponential(0)}, energy to ${closure.energy.toExponential(0)}`
                  : ''}
              </dd>
            </div>
            <div>
              <dt>Unknowns, equations</dt>
              <dd>{balance ? `${balance.ledger.unknowns}, ${balance.ledger.equations}` : '–'}</dd>
            </div>
            <div>
              <dt>Date</dt>
              <dd>{now.toISOString().slice(0, 16).replace('T', ' ')} UTC</dd>
            </div>
            <div>
              <dt>Units</dt>
              <dd>{lines[1]?.replace(/^.*units: /, '')}</dd>
            </div>
            <div>
              <dt>Plant file, SHA-256</dt>
              <dd className="report-sum">
                {checksum === undefined
                  ? '…'
                  : (checksum ?? 'not to be had here: the page was not served securely')}
              </dd>
            </div>
          </dl>
          <p className="report-caution">
            <strong>Caution.</strong> {cautions[0]} {cautions[1]}
          </p>
        </header>

        {shows('totals') && (
          <section>
            <h2>{heading(sectionWords.totals)}</h2>
            <ReportTable table={tableBuilders.totals(source)} units={units} room={width} />
          </section>
        )}
        {shows('diagram') && (
          <section className="report-wide">
            <h2>{heading(sectionWords.diagram)}</h2>
            <div className="report-drawing">
              {drawing && (
                <PlantDrawing
                  source={drawing}
                  options={{ legend, ...(frame ? { frame: { title, lines } } : {}) }}
                />
              )}
            </div>
          </section>
        )}
        {shows('charts') && (
          <section className="report-charts">
            <h2>{heading(sectionWords.charts)}</h2>
            <figure className="report-figure">
              <div className="report-chart">
                <StatePicture name="ts" width={width} height={440} />
              </div>
              <figcaption>
                Temperature against entropy: true states along every process; line width by flow.
              </figcaption>
            </figure>
            <figure className="report-figure">
              <div className="report-chart">
                <StatePicture name="hs" width={width} height={400} />
              </div>
              <figcaption>Enthalpy against entropy: the expansion lines.</figcaption>
            </figure>
            {account && (
              <figure className="report-figure">
                <div className="chart-picture chart-picture-tall">
                  <EnergyPicture account={account} width={width} units={units} most={12} />
                </div>
                <figcaption>Where the energy goes, and where exergy is destroyed.</figcaption>
              </figure>
            )}
            {profiles.length > 0 && (
              <div className="report-profiles">
                {profiles.map((profile) => (
                  <figure key={profile.unit} className="report-figure">
                    <div className="report-profile chart-picture-tall chart-picture">
                      <HeatPicture
                        profile={profile}
                        layout={layout}
                        units={units}
                        width={Math.floor((width - 20) / 2)}
                        height={240}
                      />
                    </div>
                    <figcaption>
                      {labelOf(layout, profile.unit)}: temperature against heat.
                    </figcaption>
                  </figure>
                ))}
              </div>
            )}
          </section>
        )}
        {tablesInOrder.filter(shows).map((name) => {
          const table = tableBuilders[name](source)
          if (table.rows.length === 0) return null
          return (
            <section key={name}>
              <h2>{heading(sectionWords[name])}</h2>
              <ReportTable table={table} units={units} room={width} />
            </section>
          )
        })}
        {shows('givens') && (
          <section>
            <h2>{heading(sectionWords.givens)}</h2>
            <p>
              Every number that went in; all others follow from these by the equations. Ambient
              state {layout.ambient.T} K, {layout.ambient.p} Pa.
            </p>
            <table className="report-table" data-table="givens">
              <thead>
                <tr>
                  <th scope="col">Of</th>
                  <th scope="col">Quantity</th>
                  <th scope="col" className="number">
                    Given
                  </th>
                  <th scope="col">Unit</th>
                  <th scope="col">Basis</th>
                </tr>
              </thead>
              <tbody>
                {givens.map(({ path, owner, quantity, value, unit, basis, byCase }) => (
                  <tr key={path}>
                    <th scope="row">{owner}</th>
                    <td>{quantity}</td>
                    <td className="number">{value}</td>
                    <td>{unit}</td>
                    <td className="basis">
                      {byCase ? `by the case${basis ? '; ' : ''}` : ''}
                      {basis}
                    </td>
                  </tr>
                ))}
              </tbody>
            </table>
          </section>
        )}
        {shows('findings') && (
          <section>
            <h2>{heading(sectionWords.findings)}</h2>
            {balance && balance.findings.length > 0 ? (
              <ul className="report-findings">
                {severities.flatMap((severity) =>
                  balance.findings
                    .filter((finding) => finding.severity === severity)
                    .map((finding) => (
                      <li key={`${finding.code}/${finding.where.join()}/${finding.message}`}>
                        <strong data-severity={severity}>{severityWords[severity]}</strong>{' '}
                        {finding.where.map((id) => labelOf(layout, id)).join(', ')}:{' '}
                        {finding.message} {finding.advice}
                      </li>
                    )),
                )}
              </ul>
            ) : (
              <p>Nothing to find fault with.</p>
            )}
          </section>
        )}
        <section>
          <h2>{heading('Method, sources and limits')}</h2>
          {methodNotes.map(({ title: words, text, sources }) => (
            <div key={words} className="report-method">
              <h3>{words}</h3>
              <p>{text}</p>
              {sources.length > 0 && (
                <ul>
                  {sources.map((one) => (
                    <li key={one}>{one}</li>
                  ))}
                </ul>
              )}
            </div>
          ))}
        </section>
        <section className="report-last">
          <h2>{heading('Cautions')}</h2>
          <ul>
            {cautions.map((one) => (
              <li key={one}>{one}</li>
            ))}
          </ul>
          <p className="report-sum">Plant file, SHA-256: {checksum ?? 'not to be had here'}</p>
        </section>
      </article>
    </div>
  )
}
