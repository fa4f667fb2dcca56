import {
  type KeyboardEvent,
  type ReactNode,
  type RefObject,
  useCallback,
  useLayoutEffect,
  useMemo,
  useRef,
  useState,
} from 'react'
import { CartesianGrid, ComposedChart, XAxis, YAxis } from 'recharts'
import { useBalanceStore } from '../store/balance-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { ChartContext, createChartStore } from './chart-store.ts'
import { DiagramLayer } from './DiagramLayer.tsx'
import { axisTicks } from './isobar-labels.ts'
import { ReadOut } from './ReadOut.tsx'
import { StateList } from './StateList.tsx'
import { statesOf } from './stream-states.ts'
import { summary, whyEmpty } from './summary.ts'
import './temperature-entropy-chart.css'
import { useNamedStates, useStates } from './use-named-states.ts'
import { usePointer } from './use-pointer.ts'
import { fittedView, roundTicks, tickDigits, type View } from './view.ts'

/** Room for the axes' numbers and the isobars' marks, px. */
const margin = { top: 34, right: 38, bottom: 20, left: 6 }
const yAxisWidth = 40
const xAxisHeight = 22
/** Least room between ticks, px: on the entropy axis for one digit, and for several. */
const tickRoom = { digit: 30, digits: 46, T: 60 }

/** Size of an element, px, kept up to date. */
function useSize(element: RefObject<HTMLElement | null>): { width: number; height: number } {
  const [size, setSize] = useState({ width: 0, height: 0 })
  useLayoutEffect(() => {
    if (!element.current) return
    const measured = (width: number, height: number) =>
      setSize((before) =>
        before.width === width && before.height === height ? before : { width, height },
      )
    const { width, height } = element.current.getBoundingClientRect()
    measured(Math.floor(width), Math.floor(height))
    const observer = new ResizeObserver(([entry]) => {
      if (entry) {
        measured(Math.floor(entry.contentRect.width), Math.floor(entry.contentRect.height))
      }
    })
    observer.observe(element.current)
    return () => observer.disconnect()
  }, [element])
  return size
}

type Balance = ReturnType<typeof useBalanceStore.getState>

/** Top of the fitted view, K: a round number that few edits change, as is its right edge, J/(kg K). */
const fittedTop = ({ names, balance }: Balance): number => {
  let hottest = 0
  for (const { T } of statesOf(names, balance).values()) hottest = Math.max(hottest, T)
  return fittedView(hottest, 0).T[1]
}
const fittedRight = ({ names, balance }: Balance): number => {
  let largest = 0
  for (const { s } of statesOf(names, balance).values()) largest = Math.max(largest, s)
  return fittedView(0, largest).s[1]
}

/** The view that the user has zoomed to, or the whole diagram. */
function useView() {
  const top = useBalanceStore(fittedTop)
  const right = useBalanceStore(fittedRight)
  const fitted = useMemo<View>(
    () => ({ s: [0, right], T: [fittedView(0, 0).T[0], top] }),
    [top, right],
  )
  const [chosen, setChosen] = useState<View | null>(null)
  const change = useCallback(
    (next: (view: View) => View) => setChosen((before) => next(before ?? fitted)),
    [fitted],
  )
  const fit = useCallback(() => setChosen(null), [])
  return { view: chosen ?? fitted, zoomed: chosen !== null, change, fit }
}

/** Axes by recharts, the diagram within them by its own layer. */
function Picture({
  view,
  width,
  height,
  isobarsShown,
}: {
  readonly view: View
  readonly width: number
  readonly height: number
  readonly isobarsShown: boolean
}) {
  const units = useUnitChoice()
  const plotWidth = width - margin.left - margin.right - yAxisWidth
  const plotHeight = height - margin.top - margin.bottom - xAxisHeight
  const axes = useMemo(() => {
    const entropy = axisTicks(view.s, 'specificEntropy', units, (low, high) => {
      const dense = roundTicks(low, high, Math.max(2, plotWidth / tickRoom.digit))
      return tickDigits(dense) === 0 && high < 100
        ? dense
        : roundTicks(low, high, Math.max(2, plotWidth / tickRoom.digits))
    })
    const temperature = axisTicks(view.T, 'temperature', units, (low, high) =>
      roundTicks(low, high, Math.max(2, plotHeight / tickRoom.T)),
    )
    const written = ({ si, shown }: typeof entropy) => {
      const digits = tickDigits(shown)
      const texts = new Map(
        si.map((value, i) => [value, (shown[i] as number).toFixed(digits).replace('-', '\u2212')]),
      )
      return (value: number) => texts.get(value) ?? ''
    }
    return {
      entropy,
      temperature,
      entropyText: written(entropy),
      temperatureText: written(temperature),
    }
  }, [view, units, plotWidth, plotHeight])

  return (
    <ComposedChart
      width={width}
      height={height}
      margin={margin}
      accessibilityLayer={false}
      tabIndex={-1}
    >
      <CartesianGrid vertical={false} />
      <XAxis
        type="number"
        dataKey="s"
        domain={[...view.s]}
        allowDataOverflow
        ticks={axes.entropy.si}
        interval={0}
        tickFormatter={axes.entropyText}
        tickSize={4}
        height={xAxisHeight}
      />
      <YAxis
        type="number"
        dataKey="T"
        domain={[...view.T]}
        allowDataOverflow
        ticks={axes.temperature.si}
        interval={0}
        tickFormatter={axes.temperatureText}
        tickSize={4}
        width={yAxisWidth}
      />
      <text x={margin.left + yAxisWidth - 8} y={margin.top - 14} textAnchor="end">
        {axes.temperature.unit}
      </text>
      <text
        x={width - margin.right}
        y={height - 6}
        textAnchor="end"
      >{`s, ${axes.entropy.unit}`}</text>
      <DiagramLayer view={view} isobarsShown={isobarsShown} width={width} />
    </ComposedChart>
  )
}

function Sentence() {
  const { units } = useLayout()
  const status = useBalanceStore((state) => state.balance?.status ?? null)
  const trouble = useBalanceStore((state) => state.trouble)
  const states = useStates()
  if (states.size > 0) return null
  return <p className="chart-empty">{whyEmpty(units.length, status, trouble)}</p>
}

/** What the picture shows, for those who do not see it. */
function useSummary(): string {
  const states = useStates()
  const named = useNamedStates()
  const units = useUnitChoice()
  return useMemo(() => summary(states, named, units), [states, named, units])
}

/**
 * Temperature against entropy: the saturation dome, the plant's isobars and every process of the balance
 * shown as a path of true states. Fills its box.
 */
export default function TemperatureEntropyChart() {
  const [store] = useState(createChartStore)
  const sheet = useRef<HTMLDivElement>(null)
  const { width, height } = useSize(sheet)
  const { view, zoomed: isZoomed, change, fit } = useView()
  const { dragged, handlers, zoom, move } = usePointer(store, sheet, change)
  const [isobarsShown, setIsobarsShown] = useState(true)

  const keyDown = (event: KeyboardEvent<HTMLElement>) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return
    const step = 40
    const middle = { x: width / 2, y: height / 2 }
    let action: (() => void) | undefined
    switch (event.shiftKey ? `shift ${event.key}` : event.key) {
      case '+':
      case 'shift +':
      case '=':
        action = () => zoom(1 / 1.25, middle.x, middle.y)
        break
      case '-':
        action = () => zoom(1.25, middle.x, middle.y)
        break
      case '0':
        action = fit
        break
      case 'shift ArrowLeft':
        action = () => move(step, 0)
        break
      case 'shift ArrowRight':
        action = () => move(-step, 0)
        break
      case 'shift ArrowUp':
        action = () => move(0, step)
        break
      case 'shift ArrowDown':
        action = () => move(0, -step)
        break
    }
    if (!action) return
    event.preventDefault()
    event.stopPropagation()
    action()
  }

  return (
    <ChartContext value={store}>
      <section className="chart" aria-label="Chart">
        <div className="chart-head">
          <h2>T–s</h2>
          {isZoomed && (
            <button type="button" onClick={fit} title="Show the whole diagram (double click, or 0)">
              Fit
            </button>
          )}
          <button
            type="button"
            aria-pressed={isobarsShown}
            onClick={() => setIsobarsShown(!isobarsShown)}
            title="Lines of constant pressure"
          >
            Isobars
          </button>
        </div>
        {/* biome-ignore lint/a11y/noStaticElementInteractions: the list within offers all of it to the keyboard */}
        <div
          ref={sheet}
          className="chart-sheet"
          data-dragged={dragged || undefined}
          onDoubleClick={fit}
          {...handlers}
        >
          <PictureFrame>
            {width > 120 && height > 120 && (
              <Picture view={view} width={width} height={height} isobarsShown={isobarsShown} />
            )}
          </PictureFrame>
          <Sentence />
          <StateList onKeyDown={keyDown} />
          <ReadOut width={width} height={height} />
        </div>
      </section>
    </ChartContext>
  )
}

function PictureFrame({ children }: { readonly children: ReactNode }) {
  const words = useSummary()
  return (
    <div className="chart-picture" role="img" aria-label={words}>
      {children}
    </div>
  )
}
