import { type KeyboardEvent, lazy, Suspense, useId, useRef } from 'react'
import { useBalanceStore } from '../store/balance-store.ts'
import { useGhostStore } from '../store/ghost-store.ts'
import { readLayout } from '../store/plant-store.ts'
import { Icon } from '../strip/Icon.tsx'
import { ChartMenu } from './ChartMenu.tsx'
import { type ChartName, chartNames, useChartSettings } from './chart-settings.ts'
import './chart.css'

// The planes of states bring a large library along; the others are small, and none is wanted before it is shown.
const StateChart = lazy(() => import('./StateChart.tsx'))
const HeatChart = lazy(() => import('./HeatChart.tsx'))
const EnergyChart = lazy(() => import('./EnergyChart.tsx'))

const bodies = { ts: StateChart, hs: StateChart, tq: HeatChart, energy: EnergyChart }

const words: Readonly<Record<ChartName, { readonly short: string; readonly long: string }>> = {
  ts: { short: 'T–s', long: 'Temperature against entropy' },
  hs: { short: 'h–s', long: 'Enthalpy against entropy' },
  tq: { short: 'T–Q', long: 'Temperature against heat of a heater or condenser' },
  energy: { short: 'Energy', long: 'Where the energy goes' },
}

/** The ghost that the user switches on where none is remembered yet: the balance as it stands. */
function rememberPresent(): void {
  const { names, balance } = useBalanceStore.getState()
  if (!names || balance?.status !== 'solved') return
  useGhostStore.getState().remember({ names, balance, label: `${readLayout().name}, as it was` })
}

function Toggle({
  pressed,
  name,
  title,
  onPress,
  disabled = false,
}: {
  readonly pressed: boolean
  readonly name: string
  readonly title: string
  readonly disabled?: boolean
  onPress(): void
}) {
  return (
    <button
      type="button"
      aria-pressed={pressed}
      title={title}
      disabled={disabled}
      onClick={onPress}
    >
      {name}
    </button>
  )
}

/** The charts of the balance shown, one at a time, and what lies on them. */
export default function ChartPanel() {
  const settings = useChartSettings()
  const { chart, change } = settings
  const ghost = useGhostStore((state) => state.ghost)
  const solved = useBalanceStore((state) => state.balance?.status === 'solved')
  const base = useId()
  const body = useRef<HTMLDivElement>(null)
  const Body = bodies[chart]
  const ghostShown = settings.ghost && ghost !== null

  const keyDown = (event: KeyboardEvent<HTMLElement>) => {
    const step = { ArrowRight: 1, ArrowLeft: -1 }[event.key]
    if (!step) return
    const at = chartNames.indexOf(chart) + step + chartNames.length
    const next = chartNames[at % chartNames.length] as ChartName
    change({ chart: next })
    document.getElementById(`${base}-${next}`)?.focus()
    event.preventDefault()
  }

  return (
    <section className="chart" aria-label="Chart">
      <div className="chart-head">
        <div className="chart-tabs" role="tablist" aria-label="Charts" onKeyDown={keyDown}>
          {chartNames.map((name) => (
            <button
              key={name}
              id={`${base}-${name}`}
              type="button"
              role="tab"
              aria-selected={name === chart}
              aria-controls={`${base}-body`}
              tabIndex={name === chart ? 0 : -1}
              title={words[name].long}
              onClick={() => change({ chart: name })}
            >
              {words[name].short}
            </button>
          ))}
        </div>
        {(chart === 'ts' || chart === 'hs') && (
          <Toggle
            pressed={settings.isobars}
            name="Isobars"
            title="Lines of constant pressure"
            onPress={() => change({ isobars: !settings.isobars })}
          />
        )}
        {chart === 'ts' && (
          <Toggle
            pressed={settings.areas}
            name="Areas"
            title="Heat added and rejected, as areas under their processes"
            onPress={() => change({ areas: !settings.areas })}
          />
        )}
        <Toggle
          pressed={ghostShown}
          name="Ghost"
          disabled={!ghost && !solved}
          title={
            ghost
              ? `${ghost.label}, drawn underneath`
              : 'Remember this balance and draw it underneath what follows'
          }
          onPress={() => {
            if (!ghost) {
              rememberPresent()
              change({ ghost: true })
            } else change({ ghost: !settings.ghost })
          }}
        />
        <ChartMenu
          chart={chart}
          title={words[chart].long}
          body={body}
          icon={<Icon name="more" />}
        />
      </div>
      <div
        ref={body}
        id={`${base}-body`}
        className="chart-body"
        role="tabpanel"
        aria-labelledby={`${base}-${chart}`}
        data-chart={chart}
      >
        <Suspense fallback={<p className="muted chart-wait">The chart is being loaded.</p>}>
          <Body />
        </Suspense>
      </div>
      {ghostShown && ghost && (
        <p className="chart-ghost-note" title={ghost.label}>
          <svg width={22} height={8} aria-hidden="true">
            <path d="M0 4H22" />
          </svg>
          {ghost.label}
        </p>
      )}
    </section>
  )
}
