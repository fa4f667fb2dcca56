import { create } from 'zustand'
import { addUnit, insertOnStream, kindOf, portsOf } from '../../src/document.ts'
import { readLayout, usePlantStore } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { refuse, say } from './connecting-store.ts'
import { focusItem } from './focus-item.ts'
import { type Box, grown, onGrid, overlap, type Point, type Size } from './geometry.ts'
import { layoutOf } from './joins.ts'
import { boxesOf } from './labelling.ts'
import { symbolOf } from './symbols/index.ts'
import { middleOfCanvas, overCanvas, toSheet } from './view.ts'

/** New units: carried from the rail, or set down where there is room. */

interface PlacingState {
  /** The kind that is being carried, and where the pointer is in the window. */
  readonly carried: { readonly kind: string; readonly at: Point } | null
}

export const usePlacingStore = create<PlacingState>()(() => ({ carried: null }))

const plainForm = { options: {}, counts: {} }

/** Starts to carry a kind; a click without a way to go sets it down by itself. */
export function carry(kind: string, pointer: number, start: Point): void {
  let moved = false
  const move = (event: PointerEvent) => {
    if (event.pointerId !== pointer) return
    const at: Point = [event.clientX, event.clientY]
    moved ||= Math.abs(at[0] - start[0]) + Math.abs(at[1] - start[1]) > 4
    if (moved) usePlacingStore.setState({ carried: { kind, at } })
  }
  const stop = () => {
    usePlacingStore.setState({ carried: null })
    window.removeEventListener('pointermove', move)
    window.removeEventListener('pointerup', up)
    window.removeEventListener('pointercancel', stop)
    window.removeEventListener('keydown', key, true)
  }
  const up = (event: PointerEvent) => {
    if (event.pointerId !== pointer) return
    const at: Point = [event.clientX, event.clientY]
    stop()
    // A press that did not move is a click, which the rail answers.
    if (moved && overCanvas(at)) {
      const { width, height } = symbolOf(kind).size(plainForm)
      const [x, y] = toSheet(at)
      placeUnit(kind, [onGrid(x - width / 2), onGrid(y - height / 2)])
    }
  }
  const key = (event: KeyboardEvent) => {
    if (event.key !== 'Escape') return
    event.stopPropagation()
    stop()
  }
  window.addEventListener('pointermove', move)
  window.addEventListener('pointerup', up)
  window.addEventListener('pointercancel', stop)
  window.addEventListener('keydown', key, true)
}

/** Adds a unit with its top left corner at a point of the sheet; on a stream it is put into it. */
export function placeUnit(kind: string, at: Point): string | null {
  const { edit, layoutId } = usePlantStore.getState()
  const label = kindOf(kind)?.label ?? kind
  let id = ''
  const before = useCanvasStore.getState().sheet
  try {
    edit(`Place ${label.toLowerCase()}`, (plant) => {
      const added = addUnit(plant, layoutId, kind, at)
      id = added.id
      const { width, height } = symbolOf(kind).size(plainForm)
      const stream = streamUnderBox({ x: at[0], y: at[1], width, height }, before.streams.values())
      if (!stream || !takesThrough(kind)) return added.plant
      try {
        return insertOnStream(added.plant, layoutId, stream, added.id).plant
      } catch {
        return added.plant
      }
    })
  } catch (error) {
    refuse(error instanceof Error ? error.message : `No ${label.toLowerCase()} was placed.`, at)
    return null
  }
  useSelectionStore.getState().select([id])
  // The keys that follow are meant for the new unit, as soon as it is drawn.
  requestAnimationFrame(() => focusItem(id))
  say(`${label} placed.`)
  return id
}

/** Sets a kind down in the free spot nearest the middle of what is seen. */
export function placeFreely(kind: string): string | null {
  const size = symbolOf(kind).size(plainForm)
  return placeUnit(kind, freeSpot(size, middleOfCanvas()))
}

/** The spot nearest to a point where a box of that size keeps clear of units and streams. */
export function freeSpot({ width, height }: Size, middle: Point): Point {
  const { sheet } = useCanvasStore.getState()
  const taken: Box[] = [...sheet.units.values()].map((unit) => grown(unit.body, 32))
  for (const { route } of sheet.streams.values()) taken.push(...boxesOf(route, 8))
  const x0 = onGrid(middle[0] - width / 2)
  const y0 = onGrid(middle[1] - height / 2)
  for (let ring = 0; ring < 60; ring++) {
    const steps = Math.max(1, ring * 8)
    for (let step = 0; step < steps; step++) {
      const angle = (2 * Math.PI * step) / steps
      const x = onGrid(x0 + 16 * ring * Math.cos(angle))
      const y = onGrid(y0 + 16 * ring * Math.sin(angle))
      const box = { x, y, width, height }
      if (!taken.some((other) => overlap(box, other))) return [x, y]
    }
  }
  return [x0, y0]
}

/** True for kinds through which a stream can run: a free inlet and a free outlet. */
function takesThrough(kind: string): boolean {
  const ports = Object.values(kindOf(kind)?.ports ?? {})
  return (
    ports.some((port) => port.direction === 'in') && ports.some((port) => port.direction === 'out')
  )
}

/** The stream that runs through the middle of a box. */
function streamUnderBox(
  box: Box,
  streams: Iterable<{ readonly id: string; readonly route: readonly Point[] }>,
): string | null {
  const core: Box = {
    x: box.x + box.width / 4,
    y: box.y + box.height / 4,
    width: box.width / 2,
    height: box.height / 2,
  }
  for (const { id, route } of streams) {
    if (boxesOf(route, 2).some((one) => overlap(one, core))) return id
  }
  return null
}

/** After a move: a unit without streams that was dropped on one is put into it. */
export function insertWhereDropped(unitId: string): void {
  const layout = readLayout()
  const unit = layout.units.find((one) => one.id === unitId)
  const placed = useCanvasStore.getState().sheet.units.get(unitId)
  if (!unit || !placed || !takesThrough(unit.kind)) return
  if (portsOf(layout, unit).some((port) => port.stream !== undefined)) return
  const stream = streamUnderBox(placed.body, droppedOver)
  if (!stream) return
  const { edit, layoutId } = usePlantStore.getState()
  try {
    edit(`Insert ${unit.label || unitId}`, (plant) => {
      layoutOf(plant, layoutId)
      return insertOnStream(plant, layoutId, stream, unitId).plant
    })
    say(`${unit.label || unitId} inserted.`)
  } catch (error) {
    if (error instanceof Error) refuse(error.message, placed.at)
  }
}

/** Where streams ran before the unit came: they make way for it as soon as it lies on them. */
let droppedOver: readonly { readonly id: string; readonly route: readonly Point[] }[] = []

export function rememberStreams(): void {
  droppedOver = [...useCanvasStore.getState().sheet.streams.values()]
}
