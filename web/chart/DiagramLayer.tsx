import { useId, useLayoutEffect, useMemo } from 'react'
import { usePlotArea, useXAxisScale, useYAxisScale } from 'recharts'
import { useBalanceStore } from '../store/balance-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { rampAt } from '../styles/ramp.ts'
import { Dome, IsobarMarks, Isobars } from './Backdrop.tsx'
import { useChartStore } from './chart-store.ts'
import type { Geometry } from './geometry.ts'
import { isobarLabels } from './isobar-labels.ts'
import { Halo, Lines, linesOf } from './Lines.tsx'
import { Marks, marksOf, Rings } from './Marks.tsx'
import { textWidth } from './measure-text.ts'
import { Names } from './Names.tsx'
import { useStates } from './use-named-states.ts'
import type { View } from './view.ts'

/** Stops of the gradient that lays the temperature ramp over the plot. */
const rampStops = Array.from({ length: 17 }, (_, i) => i / 16)

/** Reads where recharts has set the axes. */
function useGeometry(view: View): Geometry | null {
  const xScale = useXAxisScale()
  const yScale = useYAxisScale()
  const area = usePlotArea()
  const [left, right] = [xScale?.(view.s[0]), xScale?.(view.s[1])]
  const [bottom, top] = [yScale?.(view.T[0]), yScale?.(view.T[1])]
  const { x, y, width, height } = area ?? { x: 0, y: 0, width: 0, height: 0 }
  return useMemo(() => {
    if (left === undefined || right === undefined || bottom === undefined || top === undefined) {
      return null
    }
    const kx = (right - left) / (view.s[1] - view.s[0])
    const ky = (top - bottom) / (view.T[1] - view.T[0])
    if (!Number.isFinite(kx) || !Number.isFinite(ky) || width <= 0 || height <= 0) return null
    return {
      plot: { x, y, width, height },
      x0: left - kx * view.s[0],
      kx,
      y0: bottom - ky * view.T[0],
      ky,
    }
  }, [left, right, bottom, top, x, y, width, height, view])
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
  isobarsShown,
  width,
}: {
  readonly view: View
  readonly isobarsShown: boolean
  /** Of the whole chart, px. */
  readonly width: number
}) {
  const geometry = useGeometry(view)
  const store = useChartStore()
  useLayoutEffect(() => store.setState({ geometry }), [store, geometry])
  return geometry && <Diagram geometry={geometry} isobarsShown={isobarsShown} width={width} />
}

function Diagram({
  geometry,
  isobarsShown,
  width,
}: {
  readonly geometry: Geometry
  readonly isobarsShown: boolean
  readonly width: number
}) {
  const id = useId()
  const names = useBalanceStore((state) => state.names)
  const balance = useBalanceStore((state) => state.balance)
  const coldest = useBalanceStore((state) => state.coldest)
  const hottest = useBalanceStore((state) => state.hottest)
  const largestFlow = useBalanceStore((state) => state.largestFlow)
  const states = useStates()
  const active = useActive()
  const units = useUnitChoice()

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

  return (
    <g>
      <defs>
        <clipPath id={`${id}-plot`}>
          <rect x={plot.x} y={plot.y} width={plot.width} height={plot.height} />
        </clipPath>
        {/* Temperature is the upright axis, so one gradient over the plot colours every process. */}
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
      </defs>
      <g clipPath={clip}>
        <Dome geometry={geometry} />
        {balance && isobarsShown && <Isobars isobars={balance.isobars} geometry={geometry} />}
      </g>
      <IsobarMarks labels={labels} />
      {names && <Halo lines={lines} names={names} active={active} clip={clip} />}
      <Lines lines={lines} stroke={`url(#${id}-ramp)`} clip={clip} />
      <Rings marks={marks} active={active} />
      <Marks marks={marks} />
      <Names geometry={geometry} marks={marks} active={active} taken={labels} width={width} />
    </g>
  )
}
