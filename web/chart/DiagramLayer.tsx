import { useCallback, useId, useLayoutEffect, useMemo } from 'react'
import { usePlotArea, useXAxisScale, useYAxisScale } from 'recharts'
import { useBalanceStore } from '../store/balance-store.ts'
import { useGhostStore } from '../store/ghost-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { rampAt, rampColour } from '../styles/ramp.ts'
import { Areas } from './Areas.tsx'
import { Dome, DrynessLines, IsobarMarks, Isobars } from './Backdrop.tsx'
import { useChartSettings } from './chart-settings.ts'
import { useChartStore } from './chart-store.ts'
import type { Diagram } from './diagram.ts'
import type { Geometry } from './geometry.ts'
import { isobarLabels } from './isobar-labels.ts'
import { GhostLines, Halo, Lines, linesOf } from './Lines.tsx'
import { Marks, marksOf, Rings } from './Marks.tsx'
import { textWidth } from './measure-text.ts'
import { Names } from './Names.tsx'
import { useStates } from './use-named-states.ts'
import type { View } from './view.ts'
import { WidthScale } from './WidthScale.tsx'

/** Stops of the gradient that lays the temperature ramp over the plot. */
const rampStops = Array.from({ length: 17 }, (_, i) => i / 16)

/** Reads where recharts has set the axes. */
function useGeometry(view: View, { upright }: Diagram): Geometry | null {
  const xScale = useXAxisScale()
  const yScale = useYAxisScale()
  const area = usePlotArea()
  const [left, right] = [xScale?.(view.s[0]), xScale?.(view.s[1])]
  const [bottom, top] = [yScale?.(view.y[0]), yScale?.(view.y[1])]
  const { x, y, width, height } = area ?? { x: 0, y: 0, width: 0, height: 0 }
  return useMemo(() => {
    if (left === undefined || right === undefined || bottom === undefined || top === undefined) {
      return null
    }
    const kx = (right - left) / (view.s[1] - view.s[0])
    const ky = (top - bottom) / (view.y[1] - view.y[0])
    if (!Number.isFinite(kx) || !Number.isFinite(ky) || width <= 0 || height <= 0) return null
    return {
      upright,
      plot: { x, y, width, height },
      x0: left - kx * view.s[0],
      kx,
      y0: bottom - ky * view.y[0],
      ky,
    }
  }, [left, right, bottom, top, x, y, width, height, view, upright])
}

/** What is selected or pointed at, on the chart or elsewhere. */
function useActive(): ReadonlySet<string> {
  const selected = useSelectionStore((state) => state.selected)
  const hovered = useSelectionStore((state) => state.hovered)
  return useMemo(
    () => new Set(hovered === null ? selected : [hovered, ...selected]),
    [selected, hovered],
  )
}

const markWidth = (text: string): number => textWidth(text, 11)

/** All that the chart draws between its axes; a child of the recharts chart, whose scales it takes. */
export function DiagramLayer({
  view,
  diagram,
  width,
  height,
}: {
  readonly view: View
  readonly diagram: Diagram
  /** Of the whole chart, px. */
  readonly width: number
  readonly height: number
}) {
  const geometry = useGeometry(view, diagram)
  const store = useChartStore()
  useLayoutEffect(() => store.setState({ geometry }), [store, geometry])
  return geometry && <Plot geometry={geometry} width={width} height={height} />
}

function Plot({
  geometry,
  width,
  height,
}: {
  readonly geometry: Geometry
  readonly width: number
  readonly height: number
}) {
  const id = useId()
  const names = useBalanceStore((state) => state.names)
  const balance = useBalanceStore((state) => state.balance)
  const coldest = useBalanceStore((state) => state.coldest)
  const hottest = useBalanceStore((state) => state.hottest)
  const largestFlow = useBalanceStore((state) => state.largestFlow)
  const ghost = useGhostStore((state) => state.ghost)
  const shown = useChartSettings()
  const states = useStates()
  const active = useActive()
  const units = useUnitChoice()
  const isobarsShown = shown.isobars

  const { plot, y0, ky } = geometry
  const clip = `url(#${id}-plot)`
  const lines = useMemo(
    () => (balance ? linesOf(balance.curves, largestFlow, geometry) : []),
    [balance, largestFlow, geometry],
  )
  const marks = useMemo(() => marksOf(states, geometry), [states, geometry])
  const labels = useMemo(
    () =>
      balance && isobarsShown
        ? isobarLabels(balance.isobars, geometry, width, units, markWidth)
        : [],
    [balance, isobarsShown, geometry, width, units],
  )
  const colourOf = useCallback((T: number) => rampColour(T, coldest, hottest), [coldest, hottest])

  return (
    <g>
      <defs>
        <clipPath id={`${id}-plot`}>
          <rect x={plot.x} y={plot.y} width={plot.width} height={plot.height} />
        </clipPath>
        {/* Where temperature is the upright axis, one gradient over the plot colours every process. */}
        {geometry.upright !== 'h' && (
          <linearGradient
            id={`${id}-ramp`}
            gradientUnits="userSpaceOnUse"
            x1={0}
            x2={0}
            y1={y0 + ky * coldest}
            y2={y0 + ky * hottest}
          >
            {rampStops.map((share) => (
              <stop key={share} offset={share} stopColor={rampAt(share)} />
            ))}
          </linearGradient>
        )}
      </defs>
      <g clipPath={clip}>
        <Dome geometry={geometry} />
        {shown.areas && geometry.upright !== 'h' && <Areas geometry={geometry} />}
        {shown.dryness && <DrynessLines geometry={geometry} />}
        {balance && isobarsShown && <Isobars isobars={balance.isobars} geometry={geometry} />}
      </g>
      <IsobarMarks labels={labels} />
      {ghost && shown.ghost && (
        <GhostLines curves={ghost.balance.curves} geometry={geometry} clip={clip} />
      )}
      {names && <Halo lines={lines} names={names} active={active} clip={clip} />}
      <Lines lines={lines} stroke={`url(#${id}-ramp)`} clip={clip} colourOf={colourOf} id={id} />
      <Rings marks={marks} active={active} />
      <Marks marks={marks} />
      <Names geometry={geometry} marks={marks} active={active} taken={labels} width={width} />
      <WidthScale x={plot.x} y={height - 7} largest={largestFlow} />
    </g>
  )
}
