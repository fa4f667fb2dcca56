import type { KeyboardEvent } from 'react'
import { moveUnits } from '../../src/document.ts'
import { editLayout, readLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import {
  cancelConnecting,
  enterByKeys,
  startByKeys,
  stepByKeys,
  useConnectingStore,
} from './connecting-store.ts'
import { focusItem } from './focus-item.ts'
import { offerFollowing } from './following.ts'
import { centre, grid, type Point } from './geometry.ts'
import { pin } from './pin-store.ts'

/** Keys on the canvas: everything that the pointer does. */

const ways: Readonly<Record<string, Point>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
}

/** The unit or stream that has the focus. */
function focused(target: EventTarget): { id: string; type: 'unit' | 'stream' } | null {
  if (!(target instanceof Element)) return null
  const item = target.closest('.react-flow__node, .react-flow__edge')
  const id = item?.getAttribute('data-id')
  if (!item || !id) return null
  return { id, type: item.classList.contains('react-flow__node') ? 'unit' : 'stream' }
}

export function onCanvasKey(event: KeyboardEvent): void {
  if (event.target instanceof HTMLInputElement) return
  const { connecting, choosing } = useConnectingStore.getState()
  if ((choosing || (connecting && !connecting.pointer)) && connectingKey(event)) {
    event.preventDefault()
    event.stopPropagation()
    return
  }
  const item = focused(event.target)
  const { selected, select } = useSelectionStore.getState()
  const way = ways[event.key]
  if (way && !event.ctrlKey && !event.metaKey) {
    // Selected units are nudged; else, and with Alt, the focus walks from one thing to the next.
    const units = selected.filter((id) => useCanvasStore.getState().sheet.units.has(id))
    if (units.length > 0 && !event.altKey) nudge(units, way, event.shiftKey ? 4 : 1)
    else if (item) walk(item, way)
    else return
  } else if ((event.key === 'Enter' || event.key === ' ') && item) {
    select([item.id], event.shiftKey || event.key === ' ' ? 'toggle' : 'replace')
  } else if (event.key === 'Escape') {
    if (selected.length === 0) return
    select([])
  } else return
  event.preventDefault()
}

function connectingKey(event: KeyboardEvent): boolean {
  switch (event.key) {
    case 'ArrowRight':
    case 'ArrowDown':
      stepByKeys(1)
      return true
    case 'ArrowLeft':
    case 'ArrowUp':
      stepByKeys(-1)
      return true
    case 'Tab':
      stepByKeys(event.shiftKey ? -1 : 1)
      return true
    case 'Enter':
    case ' ':
      enterByKeys(offerFollowing)
      return true
    case 'Escape':
      cancelConnecting()
      return true
    default:
      return false
  }
}

/** Starts a connection from the unit that has the focus or is selected; `follow`: to a new unit. */
export function connectFromHere(follow = false): void {
  const item = document.activeElement && focused(document.activeElement)
  const { selected } = useSelectionStore.getState()
  const { units } = useCanvasStore.getState().sheet
  const unit = item?.type === 'unit' ? item.id : selected.find((id) => units.has(id))
  if (unit === undefined) return
  // The keys that follow must reach the canvas.
  if (!item) focusItem(unit)
  startByKeys(unit, follow)
}

export function nudge(ids: readonly string[], [dx, dy]: Point, steps = 1): void {
  editLayout(
    ids.length === 1 ? 'Move unit' : `Move ${ids.length} units`,
    (plant, layoutId) => moveUnits(plant, layoutId, ids, [dx * grid * steps, dy * grid * steps]),
    { merge: `nudge ${ids.join()}` },
  )
  pin(ids)
}

/** From a stream to the unit at that end of it; from a unit along a stream that leaves it that way. */
function walk(item: { id: string; type: 'unit' | 'stream' }, way: Point): void {
  const { units, streams } = useCanvasStore.getState().sheet
  const layout = readLayout()
  if (item.type === 'stream') {
    const stream = layout.streams.find((one) => one.id === item.id)
    const placed = streams.get(item.id)
    if (!stream || !placed) return
    const ends = [
      { id: stream.from, point: placed.from.point },
      { id: stream.to, point: placed.to.point },
    ]
    const along = (point: Point) => point[0] * way[0] + point[1] * way[1]
    ends.sort((a, b) => along(b.point) - along(a.point))
    const end = ends[0]?.id
    if (end) focusItem(end.slice(0, end.indexOf('.')))
    return
  }
  const unit = units.get(item.id)
  if (!unit) return
  const from = centre(unit.body)
  let best: string | null = null
  let least = Number.POSITIVE_INFINITY
  for (const stream of layout.streams) {
    const source = stream.from.slice(0, stream.from.indexOf('.'))
    const target = stream.to.slice(0, stream.to.indexOf('.'))
    if (source !== item.id && target !== item.id) continue
    const other = units.get(source === item.id ? target : source)
    if (!other) continue
    const to = centre(other.body)
    const ahead = (to[0] - from[0]) * way[0] + (to[1] - from[1]) * way[1]
    const aside = Math.abs((to[0] - from[0]) * way[1]) + Math.abs((to[1] - from[1]) * way[0])
    if (ahead > 0 && ahead + 2 * aside < least) {
      least = ahead + 2 * aside
      best = stream.id
    }
  }
  if (best) focusItem(best)
}
