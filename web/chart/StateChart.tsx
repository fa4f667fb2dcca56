import { type KeyboardEvent, type ReactNode, useCallback, useMemo, useRef, useState } from 'react'
import { CartesianGrid, ComposedChart, XAxis, YAxis } from 'recharts'
import { useBalanceStore } from '../store/balance-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { useChartSettings } from './chart-settings.ts'
import { ChartContext, createChartStore } from './chart-store.ts'
import { DiagramLayer } from './DiagramLayer.tsx'
import { type Diagram, diagrams } from './diagram.ts'
import { axisTicks } from './isobar-labels.ts'
import { ReadOut } from './ReadOut.tsx'
import { StateList } from './StateList.tsx'
import { statesOf } from './stream-states.ts'
import { summary, whyEmpty } from './summary.ts'
import './chart.css'
import { useExpansionEnds, useNamedStates, useStates } from './use-named-states.ts'
import { usePointer } from './use-pointer.ts'
import { useSize } from './use-size.ts'
import { fittedExpansions, fittedView, roundTicks, tickDigits, type View } from './view.ts'

/** Room for the axes' numbers and the isobars' marks, px. */
const margin = { top: 34, right: 38, bottom: 20, left: 6 }
const yAxisWidth = { ts: 40, hs: 48 }
const xAxisHeight = 22
/** Least room between ticks, px: on the entropy axis for one digit, and for several. */
const tickRoom = { digit: 30, digits: 46, T: 60 }

type Balance = ReturnType<typeof useBalanceStore.getState>

/** Top of the fitted view, K: a round number that few edits change, as is its right edge, J/(kg K). */
const fittedTop = ({ names, balance }: Balance): number => {
  let hottest = 0
  for (const { T } of statesOf(names, balance).values()) hottest = Math.max(hottest, T)
  return fittedView(hottest, 0).y[1]
}
const fittedRight = ({ names, balance }: Balance): number => {
  let largest = 0
  for (const { s } of statesOf(names, balance).values()) largest = Math.max(largest, s)
  return fittedView(0, largest).s[1]
}

/** The view that the user has zoomed to, or the whole diagram. */
function useView({ name }: Diagram) {
  const top = useBalanceStore(fittedTop)
  const right = useBalanceStore(fittedRight)
  const ends = useExpansionEnds()
  const expansions = JSON.stringify(fittedExpansions(ends))
  const fitted = useMemo<View>(
    () =>
      name === 'hs'
        ? (JSON.parse(expansions) as View)
        : { s: [0, right], y: [fittedView(0, 0).y[0], top] },
    [name, top, right, expansions],
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
  diagram,
}: {
  readonly view: View
  readonly width: number
  readonly height: number
  readonly diagram: Diagram
}) {
  const units = useUnitChoice()
  const axisWidth = yAxisWidth[diagram.name]
  const plotWidth = width - margin.left - margin.right - axisWidth
  const plotHeight = height - margin.top - margin.bottom - xAxisHeight
  const axes = useMemo(() => {
    const entropy = axisTicks(view.s, 'specificEntropy', units, (low, high) => {
      const dense = roundTicks(low, high, Math.max(2, plotWidth / tickRoom.digit))
      return tickDigits(dense) === 0 && high < 100
        ? dense
        : roundTicks(low, high, Math.max(2, plotWidth / tickRoom.digits))
    })
    const upright = axisTicks(view.y, diagram.dimension, units, (low, high) =>
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
      upright,
      entropyText: written(entropy),
      uprightText: written(upright),
    }
  }, [view, units, plotWidth, plotHeight, diagram])

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
        dataKey="y"
        domain={[...view.y]}
        allowDataOverflow
        ticks={axes.upright.si}
        interval={0}
        tickFormatter={axes.uprightText}
        tickSize={4}
        width={axisWidth}
      />
      <text x={margin.left + axisWidth - 8} y={margin.top - 14} textAnchor="end">
        {axes.upright.unit}
      </text>
      <text
        x={width - margin.right}
        y={height - 6}
        textAnchor="end"
      >{`s, ${axes.entropy.unit}`}</text>
      <DiagramLayer view={view} diagram={diagram} width={width} height={height} />
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
function useSummary({ title }: Diagram): string {
  const states = useStates()
  const named = useNamedStates()
  const units = useUnitChoice()
  return useMemo(() => summary(title, states, named, units), [title, states, named, units])
}

/**
 * States of the plant in a plane: the saturation dome, the plant's isobars and every process of the
 * balance shown as a path of true states. Fills its box.
 */
export default function StateChart() {
  const chart = useChartSettings((settings) => settings.chart)
  // Views, pointers and names of one plane mean nothing in the other.
  return <Sheet key={chart} diagram={chart === 'hs' ? diagrams.hs : diagrams.ts} />
}

function Sheet({ diagram }: { readonly diagram: Diagram }) {
  const [store] = useState(createChartStore)
  const sheet = useRef<HTMLDivElement>(null)
  const { width, height } = useSize(sheet)
  const { view, zoomed: isZoomed, change, fit } = useView(diagram)
  const { dragged, handlers, zoom, move } = usePointer(store, sheet, change, diagram.limits)

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
      {/* biome-ignore lint/a11y/noStaticElementInteractions: the list within offers all of it to the keyboard */}
      <div
        ref={sheet}
        className="chart-sheet"
        data-dragged={dragged || undefined}
        onDoubleClick={fit}
        {...handlers}
      >
        <PictureFrame diagram={diagram}>
          {width > 120 && height > 120 && (
            <Picture view={view} width={width} height={height} diagram={diagram} />
          )}
        </PictureFrame>
        <Sentence />
        <StateList onKeyDown={keyDown} />
        <ReadOut width={width} height={height} />
        {isZoomed && (
          <button
            type="button"
            className="chart-fit"
            onClick={fit}
            title="Show the whole diagram (double click, or 0)"
          >
            Fit
          </button>
        )}
      </div>
    </ChartContext>
  )
}

function PictureFrame({
  diagram,
  children,
}: {
  readonly diagram: Diagram
  readonly children: ReactNode
}) {
  const words = useSummary(diagram)
  return (
    <div className="chart-picture" role="img" aria-label={words}>
      {children}
    </div>
  )
}

/** The same picture at a size of its own, for the report. */
export function StatePicture({
  name,
  width,
  height,
}: {
  readonly name: 'ts' | 'hs'
  readonly width: number
  readonly height: number
}) {
  const [store] = useState(createChartStore)
  const diagram = diagrams[name]
  const { view } = useView(diagram)
  return (
    <ChartContext value={store}>
      <PictureFrame diagram={diagram}>
        <Picture view={view} width={width} height={height} diagram={diagram} />
      </PictureFrame>
    </ChartContext>
  )
}
