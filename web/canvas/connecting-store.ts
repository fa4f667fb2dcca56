import { create } from 'zustand'
import { labelOf, portsOf, type Unit } from '../../src/document.ts'
import { readLayout, usePlantStore } from '../store/plant-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { outward, type Point, type Side } from './geometry.ts'
import { type ConnectionEnd, connectEnds, judge, layoutOf, type Verdict, wayOf } from './joins.ts'
import { placesOf } from './ports.ts'
import type { PlacedUnit } from './standing.ts'
import { withAxesKept, withEndsTurned } from './steady.ts'
import { toSheet } from './view.ts'

/** A port as it can be seen and taken hold of on the sheet. */
export interface SheetPort {
  /** `h5.drain2`. */
  readonly reference: string
  readonly name: string
  /** As it reads: 'Drain inlet 2'. */
  readonly label: string
  readonly point: Point
  readonly side: Side
  readonly direction: 'in' | 'out'
  readonly taken: boolean
}

export interface Target extends SheetPort {
  readonly verdict: Verdict
}

interface Connecting {
  readonly from: SheetPort
  readonly targets: readonly Target[]
  /** On the sheet; null while the keyboard leads. */
  readonly pointer: Point | null
  readonly over: Target | null
  /** A stream under the pointer, where no port is. */
  readonly stream: string | null
}

interface ConnectingState {
  readonly connecting: Connecting | null
  /** Choosing by keys where a connection starts. */
  readonly choosing: {
    readonly unit: string
    readonly ports: readonly SheetPort[]
    readonly at: number
    /** A new unit is to come at the port instead of one that is there. */
    readonly follow?: true
  } | null
  /** Said in place, and aloud: why a connection was refused, what was done. */
  readonly notice: { readonly text: string; readonly at: Point; readonly refused: boolean } | null
}

const nothing: ConnectingState = { connecting: null, choosing: null, notice: null }

export const useConnectingStore = create<ConnectingState>()(() => nothing)

/** Ports of a unit in place: those with a stream where it meets, open ones where they would be. */
export function sheetPorts(placed: PlacedUnit, unit: Unit): SheetPort[] {
  const sides = Object.values(placed.anchors).map((anchor) => anchor.side)
  return portsOf(readLayout(), unit).flatMap((port): SheetPort[] => {
    const places = placesOf(placed, port.name)
    const anchor =
      placed.anchors[port.name] ??
      places?.find((place) => places.length > 2 && !sides.includes(place.side)) ??
      places?.[0]
    if (!anchor) return []
    if (!placed.anchors[port.name]) sides.push(anchor.side)
    return [
      {
        reference: `${unit.id}.${port.name}`,
        name: port.name,
        label:
          port.number === undefined
            ? port.description.label
            : `${port.description.label} ${port.number}`,
        point: [anchor.x, anchor.y],
        side: anchor.side,
        direction: port.description.direction,
        taken: port.stream !== undefined,
      },
    ]
  })
}

export function portsOnSheet(unitId: string): SheetPort[] {
  const placed = useCanvasStore.getState().sheet.units.get(unitId)
  const unit = readLayout().units.find((one) => one.id === unitId)
  return placed && unit ? sheetPorts(placed, unit) : []
}

function targetsFor(from: SheetPort): Target[] {
  const layout = readLayout()
  const own = from.reference.slice(0, from.reference.indexOf('.'))
  return layout.units.flatMap((unit) =>
    unit.id === own
      ? []
      : portsOnSheet(unit.id).map((port) => ({
          ...port,
          verdict: judge(layout, from.reference, port.reference),
        })),
  )
}

export function startConnecting(from: SheetPort, pointer: Point | null): void {
  useConnectingStore.setState({
    choosing: null,
    notice: null,
    connecting: { from, targets: targetsFor(from), pointer, over: null, stream: null },
  })
}

/** How near the pointer must come to a port, px on the screen. */
const reach = 18
/** A stream shorter than this was not drawn: the press was a click, px on the screen. */
const leastDrawn = 24

/** The pointer moves on: what it would connect to lights up. */
export function moveConnecting(client: Point): void {
  const { connecting } = useConnectingStore.getState()
  if (!connecting) return
  const pointer = toSheet(client)
  const { zoom, sheet } = useCanvasStore.getState()
  let over: Target | null = null
  let least = (reach / zoom) ** 2
  for (const target of connecting.targets) {
    const [ox, oy] = outward[target.side]
    const dx = target.point[0] + 4 * ox - pointer[0]
    const dy = target.point[1] + 4 * oy - pointer[1]
    const distance = dx * dx + dy * dy
    // Where two lie close together the one that can take the stream is meant.
    if (distance < least && (target.verdict.allowed || !over?.verdict.allowed)) {
      least = distance
      over = target
    }
  }
  over ??= onUnit(connecting.targets, pointer, sheet.units.values())
  const stream = over ? null : streamUnder(pointer, 8 / zoom, sheet.streams.values())
  useConnectingStore.setState({ connecting: { ...connecting, pointer, over, stream } })
}

/** Over a unit away from its ports: the nearest port that can take the stream, or the nearest of all. */
function onUnit(
  targets: readonly Target[],
  [x, y]: Point,
  units: Iterable<PlacedUnit>,
): Target | null {
  for (const { id, body } of units) {
    if (x < body.x || x > body.x + body.width || y < body.y || y > body.y + body.height) continue
    const far = (one: Target) =>
      (one.verdict.allowed ? (one.taken ? 1e4 : 0) : 1e6) +
      Math.abs(one.point[0] - x) +
      Math.abs(one.point[1] - y)
    const own = targets.filter((one) => one.reference.startsWith(`${id}.`))
    return own.sort((a, b) => far(a) - far(b))[0] ?? null
  }
  return null
}

/** The stream within `near` of a point. */
export function streamUnder(
  [x, y]: Point,
  near: number,
  streams: Iterable<{ readonly id: string; readonly route: readonly Point[] }>,
): string | null {
  for (const { id, route } of streams) {
    for (let i = 1; i < route.length; i++) {
      const [x1, y1] = route[i - 1] as Point
      const [x2, y2] = route[i] as Point
      if (
        x >= Math.min(x1, x2) - near &&
        x <= Math.max(x1, x2) + near &&
        y >= Math.min(y1, y2) - near &&
        y <= Math.max(y1, y2) + near
      ) {
        return id
      }
    }
  }
  return null
}

export function cancelConnecting(): void {
  useConnectingStore.setState(nothing)
}

/**
 * The pointer lets go, or Enter is pressed: connects, or says why not. On bare paper what could come
 * there is offered.
 */
export function finishConnecting(offer?: (from: SheetPort, at: Point) => void): void {
  const { connecting } = useConnectingStore.getState()
  if (!connecting) return
  const { from, over, stream, pointer } = connecting
  useConnectingStore.setState({ connecting: null })
  if (over) {
    if (over.verdict.allowed) make({ port: from.reference }, { port: over.reference }, over.point)
    else refuse(over.verdict.why, over.point)
  } else if (stream && pointer) {
    make({ port: from.reference }, { stream, at: onStream(stream, pointer) }, pointer)
  } else if (offer && pointer) {
    const drawn = Math.abs(pointer[0] - from.point[0]) + Math.abs(pointer[1] - from.point[1])
    if (drawn * useCanvasStore.getState().zoom > leastDrawn) offer(from, pointer)
  }
}

/** The point of the stream nearest to a point. */
function onStream(id: string, [x, y]: Point): Point {
  const route = useCanvasStore.getState().sheet.streams.get(id)?.route ?? []
  let best: Point = [x, y]
  let least = Number.POSITIVE_INFINITY
  for (let i = 1; i < route.length; i++) {
    const [x1, y1] = route[i - 1] as Point
    const [x2, y2] = route[i] as Point
    const near: Point = [
      Math.min(Math.max(x, Math.min(x1, x2)), Math.max(x1, x2)),
      Math.min(Math.max(y, Math.min(y1, y2)), Math.max(y1, y2)),
    ]
    const distance = (near[0] - x) ** 2 + (near[1] - y) ** 2
    if (distance < least) {
      least = distance
      best = near
    }
  }
  return best
}

function make(from: ConnectionEnd, to: ConnectionEnd, at: Point): void {
  const { edit, layoutId } = usePlantStore.getState()
  const { sheet } = useCanvasStore.getState()
  try {
    let made = ''
    edit('Connect', (plant) => {
      const { plant: after, id } = connectEnds(
        plant,
        layoutId,
        from,
        to,
        (stream) => sheet.streams.get(stream)?.route,
      )
      made = id
      return withEndsTurned(withAxesKept(layoutOf(plant, layoutId), after), layoutId, id)
    })
    say(`Connected ${labelOf(readLayout(), made)}.`)
  } catch (error) {
    refuse(error instanceof Error ? error.message : 'These cannot be connected.', at)
  }
}

let forget: ReturnType<typeof setTimeout> | undefined

/** Says in place why something is refused; it goes by itself. */
export function refuse(why: string, at: Point): void {
  clearTimeout(forget)
  useConnectingStore.setState({ notice: { text: why, at, refused: true } })
  forget = setTimeout(() => useConnectingStore.setState({ notice: null }), 6000)
}

/** Says something to those who cannot see it. */
export function say(text: string): void {
  useConnectingStore.setState({ notice: { text, at: [0, 0], refused: false } })
}

/** By keys: first the port to start from, then the one to go to. */
export function startByKeys(unitId: string, follow = false): void {
  const ports = portsOnSheet(unitId)
  // Outlets that are free first: what is wanted most.
  const order = (port: SheetPort) => (port.taken ? 2 : 0) + (port.direction === 'in' ? 1 : 0)
  const sorted = [...ports].sort((a, b) => order(a) - order(b))
  if (sorted.length === 0) return
  useConnectingStore.setState({
    connecting: null,
    notice: null,
    choosing: { unit: unitId, ports: sorted, at: 0, ...(follow && { follow: true }) },
  })
}

/** One step among what can be chosen by keys. */
export function stepByKeys(by: 1 | -1): void {
  const { choosing, connecting } = useConnectingStore.getState()
  if (choosing) {
    const count = choosing.ports.length
    useConnectingStore.setState({
      choosing: { ...choosing, at: (choosing.at + by + count) % count },
    })
  } else if (connecting) {
    const able = targetsByKeys(connecting)
    if (able.length === 0) return
    const now = connecting.over
      ? able.findIndex((one) => one.reference === connecting.over?.reference)
      : -1
    const next = now < 0 ? (by > 0 ? 0 : able.length - 1) : (now + by + able.length) % able.length
    useConnectingStore.setState({
      connecting: { ...connecting, over: able[next] ?? null, pointer: null },
    })
  }
}

/** What the keys step through: free ports by their distance, then taken ones. */
function targetsByKeys({ from, targets }: Connecting): Target[] {
  const far = ({ point, taken }: Target) =>
    (taken ? 1e6 : 0) + Math.abs(point[0] - from.point[0]) + Math.abs(point[1] - from.point[1])
  return targets.filter((one) => one.verdict.allowed).sort((a, b) => far(a) - far(b))
}

export function enterByKeys(offer: (from: SheetPort, at: null) => void): void {
  const { choosing, connecting } = useConnectingStore.getState()
  if (choosing) {
    const from = choosing.ports[choosing.at]
    if (!from) return
    if (choosing.follow) {
      offer(from, null)
      return
    }
    startConnecting(from, null)
    stepByKeys(1)
    const { connecting: begun } = useConnectingStore.getState()
    if (begun && !begun.over) {
      cancelConnecting()
      const way = wayOf(readLayout(), from.reference)
      refuse(
        `No unit on the sheet has ${way === 'out' ? 'an inlet' : 'an outlet'} that suits. Place one first.`,
        from.point,
      )
    }
  } else if (connecting) finishConnecting()
}
