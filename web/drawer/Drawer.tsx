import { useId } from 'react'
import { Comparison } from '../layouts/Comparison.tsx'
import { Mark } from '../number/Mark.tsx'
import { ReportTab } from '../report/ReportTab.tsx'
import { useBalanceStore } from '../store/balance-store.ts'
import { type DrawerTab, drawerTabs, useSettingsStore } from '../store/settings-store.ts'
import { useSolvingStore } from '../store/solving-store.ts'
import { Icon } from '../strip/Icon.tsx'
import { Findings, useFindings } from './Findings.tsx'
import { Givens } from './Givens.tsx'
import { Ledger } from './Ledger.tsx'
import {
  GroupTable,
  HeaterTable,
  PumpTable,
  StateTable,
  TotalsTable,
  UnitTable,
} from './tables/ResultTables.tsx'
import { WhereFrom } from './WhereFrom.tsx'
import { useWhereFromStore } from './where-from-store.ts'
import './drawer.css'

const tabs: readonly DrawerTab[] = drawerTabs
const bodies = {
  states: StateTable,
  units: UnitTable,
  heaters: HeaterTable,
  groups: GroupTable,
  pumps: PumpTable,
  totals: TotalsTable,
  givens: Givens,
  ledger: Ledger,
  findings: Findings,
  compare: Comparison,
  report: ReportTab,
}

function LedgerTab() {
  const ledger = useBalanceStore(({ trouble, balance }) => (trouble ? undefined : balance?.ledger))
  if (!ledger) return <>Ledger</>
  const { unknowns, equations, missing, excess } = ledger
  return (
    <>
      Ledger
      <span className="tab-detail">
        {excess > 0 ? (
          <>
            <Mark name="error" /> {excess} too many
          </>
        ) : missing > 0 ? (
          <>
            <Mark name="open" /> {missing} short
          </>
        ) : (
          <span className="tab-counts">{`${unknowns} = ${equations}`}</span>
        )}
      </span>
    </>
  )
}

function FindingsTab() {
  const findings = useFindings()
  const trouble = useBalanceStore((state) => state.trouble)
  const worst = (['error', 'caution', 'remark'] as const).find(
    (severity) =>
      (severity === 'error' && trouble) || findings.some((one) => one.severity === severity),
  )
  return (
    <>
      Findings
      <span className="tab-detail">
        {worst && worst !== 'remark' && <Mark name={worst} spoken />}{' '}
        {findings.length + (trouble ? 1 : 0)}
      </span>
    </>
  )
}

const names = {
  states: () => <>State points</>,
  units: () => <>Units</>,
  heaters: () => <>Heaters</>,
  groups: () => <>Stages</>,
  pumps: () => <>Pumps</>,
  totals: () => <>Totals</>,
  givens: () => <>Givens</>,
  ledger: LedgerTab,
  findings: FindingsTab,
  compare: () => <>Compare</>,
  report: () => <>Report</>,
}

/** Why there is no solution: in short, and what is added where there is room. */
const statusWords = {
  solved: ['', ''],
  underspecified: ['Not solved', ': numbers are missing'],
  overspecified: ['Not solved', ': numbers contradict'],
  infeasible: ['Not possible', ''],
  notConverged: ['No solution found', ''],
} as const

/** '2 × 10⁻¹⁶', as a print would set it. */
function Power({ value }: { value: number }) {
  if (value === 0) return <>0</>
  const exponent = Math.floor(Math.log10(Math.abs(value)))
  return (
    <>
      {(value / 10 ** exponent).toFixed(0)} × 10<sup>{String(exponent).replace('-', '−')}</sup>
    </>
  )
}

function Closure() {
  const closure = useBalanceStore((state) => state.balance?.closure ?? null)
  const status = useBalanceStore((state) => state.balance?.status)
  const trouble = useBalanceStore((state) => state.trouble)
  const slow = useSolvingStore((state) => state.slow)
  // What is shown belongs to the plant before the edit.
  if (slow) return <span className="drawer-state">Solving …</span>
  if (trouble) return <span className="drawer-state">No balance</span>
  if (!status) return null
  if (status !== 'solved') {
    const [short, more] = statusWords[status]
    return (
      <span className="drawer-state" title={short + more}>
        {short}
        <span className="state-more">{more}</span>
      </span>
    )
  }
  if (!closure) return null
  return (
    <span
      className="drawer-state"
      data-closed=""
      title="Mass and energy close to this: the worst unit's imbalance, worked out anew from the streams alone."
    >
      <span className="state-more">Mass and energy close to </span>
      <Power value={Math.max(closure.mass, closure.energy)} />
    </span>
  )
}

/** The drawer of tables below the canvas. */
export function Drawer() {
  const tab = useSettingsStore((state) => state.drawerTab)
  const folded = useSettingsStore((state) => state.drawerFolded)
  const change = useSettingsStore((state) => state.change)
  const isAsked = useWhereFromStore(({ trail }) => trail.length > 0)
  const closeWhereFrom = useWhereFromStore((state) => state.close)
  const base = useId()
  const Body = bodies[tab]
  return (
    <section className="drawer" aria-label="Tables">
      <div className="drawer-head">
        <div
          className="drawer-tabs"
          role="tablist"
          aria-label="Tables"
          onKeyDown={(event) => {
            const step = { ArrowRight: 1, ArrowLeft: -1 }[event.key]
            if (!step) return
            const next = tabs[(tabs.indexOf(tab) + step + tabs.length) % tabs.length] as DrawerTab
            closeWhereFrom()
            change({ drawerTab: next })
            document.getElementById(`${base}-${next}`)?.focus()
            event.preventDefault()
          }}
        >
          {tabs.map((one) => {
            const Name = names[one]
            return (
              <button
                key={one}
                id={`${base}-${one}`}
                type="button"
                role="tab"
                aria-selected={one === tab && !folded && !isAsked}
                aria-controls={`${base}-body`}
                tabIndex={one === tab ? 0 : -1}
                onClick={() => {
                  closeWhereFrom()
                  change({ drawerTab: one, drawerFolded: false })
                }}
              >
                <Name />
              </button>
            )
          })}
        </div>
        <Closure />
        <button
          type="button"
          className="icon-button"
          aria-expanded={!folded}
          aria-label={folded ? 'Open the drawer' : 'Fold the drawer'}
          onClick={() => change({ drawerFolded: !folded })}
        >
          <Icon name={folded ? 'up' : 'down'} />
        </button>
      </div>
      {!folded && (
        <div
          id={`${base}-body`}
          className="drawer-body"
          role="tabpanel"
          aria-labelledby={`${base}-${tab}`}
        >
          {isAsked ? <WhereFrom /> : <Body />}
        </div>
      )}
    </section>
  )
}
