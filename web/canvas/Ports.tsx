import { useLayout } from '../store/plant-store.ts'
import {
  cancelConnecting,
  finishConnecting,
  moveConnecting,
  type SheetPort,
  sheetPorts,
  startConnecting,
  useConnectingStore,
} from './connecting-store.ts'
import { offerFollowing } from './following.ts'
import { outward, type Point } from './geometry.ts'
import type { PlacedUnit } from './standing.ts'
import { toSheet } from './view.ts'

const square = 6.5
const dot = 8

/** The ports of a unit: squares to drag from; while a connection is drawn, those that can take it. */
export function Ports({ unit }: { readonly unit: PlacedUnit }) {
  const layout = useLayout()
  const connecting = useConnectingStore((state) => state.connecting)
  const choosing = useConnectingStore((state) =>
    state.choosing?.unit === unit.id ? state.choosing : null,
  )
  const own = layout.units.find((one) => one.id === unit.id)
  if (!own) return null
  const ports = sheetPorts(unit, own)
  const chosen = choosing?.ports[choosing.at]?.reference
  return (
    <g>
      {ports.map((port) => {
        const target = connecting?.targets.find((one) => one.reference === port.reference)
        const isStart = connecting?.from.reference === port.reference
        if (connecting && !isStart && !target?.verdict.allowed) return null
        const over = connecting?.over?.reference === port.reference
        const state =
          isStart || over || chosen === port.reference ? 'lit' : target ? 'able' : 'shown'
        return (
          <Port
            key={port.name}
            port={port}
            origin={unit.at}
            away={unit.body.width <= dot ? dot / 2 : 0}
            state={state}
          />
        )
      })}
    </g>
  )
}

function Port(props: {
  readonly port: SheetPort
  readonly origin: Point
  /** Off the symbol, px: round a dot the squares would hide it. */
  readonly away: number
  readonly state: 'shown' | 'able' | 'lit'
}) {
  const { port, origin, away, state } = props
  const [ox, oy] = outward[port.side]
  const x = port.point[0] - origin[0] + away * ox
  const y = port.point[1] - origin[1] + away * oy
  const label = labelPlace(x, y, ox, oy)
  return (
    <g
      className={`port port-${state} nodrag nopan`}
      data-port={port.reference}
      data-taken={port.taken}
      onPointerDown={(event) => {
        if (event.button !== 0) return
        event.stopPropagation()
        event.preventDefault()
        drag(port, event.pointerId, [event.clientX, event.clientY])
      }}
    >
      <circle className="port-grip" cx={x + 3 * ox} cy={y + 3 * oy} r={9} />
      <rect
        className="port-square"
        x={x - square / 2}
        y={y - square / 2}
        width={square}
        height={square}
      />
      <text className="port-name" {...label}>
        {port.label}
      </text>
    </g>
  )
}

function labelPlace(x: number, y: number, ox: number, oy: number) {
  return {
    x: x + 10 * ox,
    y: y + (oy < 0 ? -9 : oy > 0 ? 18 : 4),
    textAnchor: ox > 0 ? ('start' as const) : ox < 0 ? ('end' as const) : ('middle' as const),
  }
}

function drag(port: SheetPort, pointer: number, start: Point): void {
  startConnecting(port, toSheet(start))
  const move = (event: PointerEvent) => {
    if (event.pointerId === pointer) moveConnecting([event.clientX, event.clientY])
  }
  const stop = () => {
    window.removeEventListener('pointermove', move)
    window.removeEventListener('pointerup', up)
    window.removeEventListener('pointercancel', cancel)
    window.removeEventListener('keydown', key, true)
  }
  const up = (event: PointerEvent) => {
    if (event.pointerId !== pointer) return
    stop()
    moveConnecting([event.clientX, event.clientY])
    finishConnecting(offerFollowing)
  }
  const cancel = () => {
    stop()
    cancelConnecting()
  }
  const key = (event: KeyboardEvent) => {
    if (event.key !== 'Escape') return
    event.stopPropagation()
    cancel()
  }
  window.addEventListener('pointermove', move)
  window.addEventListener('pointerup', up)
  window.addEventListener('pointercancel', cancel)
  window.addEventListener('keydown', key, true)
}
