import { useMemo, useRef } from 'react'
import { formatQuantity, labelOf } from '../../src/document.ts'
import type { BalanceMessage, NamesMessage } from '../../src/messages.ts'
import { useBalanceStore } from '../store/balance-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { useChart } from './chart-store.ts'
import type { Geometry } from './geometry.ts'
import { lineWidth } from './Lines.tsx'
import type { Mark } from './Marks.tsx'
import { textWidth } from './measure-text.ts'
import {
  InkGrid,
  type LabelRequest,
  type PlacedLabel,
  placeLabels,
  type Rectangle,
} from './place-labels.ts'
import { useNamedStates, useStates } from './use-named-states.ts'

const textSize = 12
/** Height of a name's box, and of its baseline from the box's top, px. */
const boxHeight = 14
const baseline = 11

interface Name extends LabelRequest {
  readonly text: string
  /** Muted, after the name. */
  readonly detail: string
  readonly active: boolean
}

function named(
  id: string,
  { x, y }: { readonly x: number; readonly y: number },
  text: string,
  detail = '',
  active = false,
): Name {
  const width =
    textWidth(text, textSize, active ? 600 : 400) +
    (detail ? textWidth(`\u00a0${detail}`, textSize) : 0)
  return { id, x, y, width: width + 2, height: boxHeight, text, detail, active }
}

/**
 * The end of a unit's longest line on the side of lower entropy, px, where there is room for its name;
 * undefined where that is out of sight.
 */
function coldEndOf(
  unit: string,
  names: NamesMessage,
  { points, starts }: BalanceMessage['curves'],
  geometry: Geometry,
): { readonly x: number; readonly y: number } | undefined {
  const { plot, x0, kx, y0, ky } = geometry
  const column = geometry.upright === 'h' ? 2 : 1
  let longest = 0
  let place: { readonly x: number; readonly y: number } | undefined
  for (const [i, process] of names.processes.entries()) {
    if (process.unit !== unit) continue
    let length = 0
    let leftmost: { readonly x: number; readonly y: number } | undefined
    const end = starts[i + 1] as number
    for (let k = starts[i] as number; k < end; k += 1) {
      const s = points[3 * k] as number
      const upright = points[3 * k + column] as number
      if (k + 1 < end) {
        length += Math.hypot(
          kx * ((points[3 * k + 3] as number) - s),
          ky * ((points[3 * k + 3 + column] as number) - upright),
        )
      }
      const x = x0 + kx * s
      const y = y0 + ky * upright
      const inside =
        x >= plot.x && x <= plot.x + plot.width && y >= plot.y && y <= plot.y + plot.height
      if (inside && (!leftmost || x < leftmost.x)) leftmost = { x, y }
    }
    if (!leftmost || length < longest) continue
    longest = length
    place = leftmost
  }
  return place
}

/** What names should not cover: the processes' lines and the states' marks. */
function inkOf(
  curves: BalanceMessage['curves'],
  largestFlow: number,
  marks: readonly Mark[],
  geometry: Geometry,
  bounds: Rectangle,
): InkGrid {
  const { x0, kx, y0, ky } = geometry
  const column = geometry.upright === 'h' ? 2 : 1
  const grid = new InkGrid(bounds)
  const { points, starts, flows } = curves
  for (let i = 0; i + 1 < starts.length; i += 1) {
    const weight = 2 + lineWidth(flows[i] ?? 0, largestFlow)
    const end = starts[i + 1] as number
    for (let k = starts[i] as number; k + 1 < end; k += 1) {
      grid.addLine(
        x0 + kx * (points[3 * k] as number),
        y0 + ky * (points[3 * k + column] as number),
        x0 + kx * (points[3 * k + 3] as number),
        y0 + ky * (points[3 * k + 3 + column] as number),
        weight,
      )
    }
  }
  for (const { x, y } of marks) grid.addLine(x, y, x, y, 8)
  return grid
}

/** The few names on the chart: the trade's states, and what is selected or pointed at. */
export function Names({
  geometry,
  marks,
  active,
  taken,
  width,
}: {
  readonly geometry: Geometry
  readonly marks: readonly Mark[]
  readonly active: ReadonlySet<string>
  /** Boxes of other text. */
  readonly taken: readonly Rectangle[]
  /** Of the whole chart, px. */
  readonly width: number
}) {
  const names = useBalanceStore((state) => state.names)
  const balance = useBalanceStore((state) => state.balance)
  const largestFlow = useBalanceStore((state) => state.largestFlow)
  const states = useStates()
  const chosen = useNamedStates()
  const layout = useLayout()
  const units = useUnitChoice()
  // The read-out names what it stands beside.
  const readOut = useChart(({ pointed }) =>
    pointed?.kind === 'state'
      ? pointed.stream
      : pointed
        ? names?.processes[pointed.process]?.unit
        : undefined,
  )
  const before = useRef<readonly PlacedLabel[]>([])

  const bounds = useMemo(() => {
    const { plot } = geometry
    return { x: plot.x + 2, y: 2, width: width - plot.x - 4, height: plot.y + plot.height - 4 }
  }, [geometry, width])
  const grid = useMemo(
    () => balance && inkOf(balance.curves, largestFlow, marks, geometry, bounds),
    [balance, largestFlow, marks, geometry, bounds],
  )

  if (!names || !balance || !grid) return null
  const at = new Map(marks.map((mark) => [mark.id, mark]))
  const requests: Name[] = []
  for (const id of active) {
    if (id === readOut) continue
    const mark = at.get(id)
    const place = mark ?? coldEndOf(id, names, balance.curves, geometry)
    if (!place) continue
    const text = chosen.find((one) => one.id === id)?.name ?? labelOf(layout, id)
    requests.push(named(id, place, text, '', true))
  }
  for (const { id, name } of chosen) {
    const mark = at.get(id)
    if (!mark || active.has(id)) continue
    const state = states.get(id)
    const detail =
      state?.phase === 'wet' ? `x\u2009${formatQuantity(state.x, 'dryness', units).text}` : ''
    requests.push(named(id, mark, name, detail))
  }
  const placed = placeLabels(requests, bounds, { taken, ink: grid.inkIn, before: before.current })
  before.current = placed

  return (
    <g className="chart-names">
      {placed.map(({ id, x, y, width: wide, height, leader }) => {
        const name = requests.find((request) => request.id === id) as Name
        return (
          <g key={id} className={name.active ? 'active' : undefined}>
            {leader && (
              <line
                x1={name.x}
                y1={name.y}
                x2={Math.min(x + wide, Math.max(x, name.x))}
                y2={Math.min(y + height, Math.max(y, name.y))}
              />
            )}
            <text x={x + 1} y={y + baseline}>
              {name.text}
              {name.detail && <tspan className="detail">{`\u00a0${name.detail}`}</tspan>}
            </text>
          </g>
        )
      })}
    </g>
  )
}
