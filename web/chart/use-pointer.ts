import { type PointerEvent, type RefObject, useEffect, useRef, useState } from 'react'
import { useBalanceStore } from '../store/balance-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import type { ChartStore, Pointed } from './chart-store.ts'
import { heightOf, nearestOnPaths } from './geometry.ts'
import { statesOf } from './stream-states.ts'
import { type Limits, panned, type View, zoomed } from './view.ts'

/** How near the pointer must be to a state, and to a process, px. */
const stateReach = 9
const processReach = 7
/** A press that moves less is a click, px. */
const clickSlack = 4
/** One notch of a wheel (100 px of scroll) zooms by this factor. */
const notch = 1.2

/** What lies under (x, y): the nearest state, or else the nearest process. */
function under(store: ChartStore, x: number, y: number): Pointed | null {
  const { geometry } = store.getState()
  const { names, balance } = useBalanceStore.getState()
  if (!geometry || !names || !balance) return null
  const { plot, x0, kx } = geometry
  const margin = stateReach
  const outside =
    x < plot.x - margin ||
    x > plot.x + plot.width + margin ||
    y < plot.y - margin ||
    y > plot.y + plot.height + margin
  if (outside) return null
  let nearest: string | undefined
  let least = stateReach
  for (const state of statesOf(names, balance).values()) {
    const distance = Math.hypot(x0 + kx * state.s - x, heightOf(geometry, state) - y)
    if (distance < least) {
      least = distance
      nearest = state.id
    }
  }
  if (nearest !== undefined) return { kind: 'state', stream: nearest }
  const { points, starts } = balance.curves
  const hit = nearestOnPaths(points, starts, geometry, x, y, processReach)
  return hit ? { kind: 'process', process: hit.path, s: hit.s, T: hit.T, h: hit.h } : null
}

/** The id that canvas and tables know a thing under the pointer by. */
function idOf(pointed: Pointed | null): string | null {
  if (!pointed) return null
  if (pointed.kind === 'state') return pointed.stream
  return useBalanceStore.getState().names?.processes[pointed.process]?.unit ?? null
}

type Setter = (change: (view: View) => View) => void

/**
 * Pointing, clicking, dragging and the wheel, over the element `sheet`: what is pointed at lights up
 * everywhere, a click selects it, a drag moves the view, the wheel and two fingers zoom about the pointer.
 */
export function usePointer(
  store: ChartStore,
  sheet: RefObject<HTMLElement | null>,
  change: Setter,
  limits: Limits,
) {
  const [dragged, setDragged] = useState(false)
  const fingers = useRef(new Map<number, { x: number; y: number }>())
  /** Where the pointer is while no button is held; null outside the sheet. */
  const resting = useRef<{ x: number; y: number } | null>(null)
  const pressed = useRef<{ x: number; y: number } | null>(null)

  const place = (event: { clientX: number; clientY: number }) => {
    const box = sheet.current?.getBoundingClientRect()
    return { x: event.clientX - (box?.left ?? 0), y: event.clientY - (box?.top ?? 0) }
  }
  const point = (pointed: Pointed | null) => {
    if (!pointed && !store.getState().pointed) return
    store.setState({ pointed })
    useSelectionStore.getState().hover(idOf(pointed))
  }
  const move = (dx: number, dy: number) => {
    const { geometry } = store.getState()
    if (geometry) {
      change((view) => panned(view, -dx / geometry.kx, -dy / geometry.ky, limits))
    }
  }
  const zoom = (factor: number, x: number, y: number) => {
    const { geometry } = store.getState()
    if (!geometry) return
    const s = (x - geometry.x0) / geometry.kx
    const upright = (y - geometry.y0) / geometry.ky
    change((view) => zoomed(view, factor, s, upright, limits))
  }

  // Under a pointer that rests, the diagram moves with the numbers and the view.
  useEffect(() => {
    const look = () => {
      const at = resting.current
      if (!at || fingers.current.size > 0) return
      const pointed = under(store, at.x, at.y)
      if (!pointed && !store.getState().pointed) return
      store.setState({ pointed })
      useSelectionStore.getState().hover(idOf(pointed))
    }
    const unsubscribeView = store.subscribe((now, before) => {
      if (now.geometry !== before.geometry) look()
    })
    const unsubscribeBalance = useBalanceStore.subscribe((now, before) => {
      if (now.balance !== before.balance) look()
    })
    return () => {
      unsubscribeView()
      unsubscribeBalance()
    }
  }, [store])

  const latest = useRef(zoom)
  latest.current = zoom
  // React's wheel handlers are passive and could not keep the page from scrolling.
  useEffect(() => {
    const element = sheet.current
    if (!element) return
    const wheel = (event: WheelEvent) => {
      event.preventDefault()
      const lines = event.deltaMode === WheelEvent.DOM_DELTA_PIXEL ? 1 : 33
      const { left, top } = element.getBoundingClientRect()
      const turned = Math.min(300, Math.max(-300, event.deltaY * lines))
      latest.current(notch ** (turned / 100), event.clientX - left, event.clientY - top)
    }
    element.addEventListener('wheel', wheel, { passive: false })
    return () => element.removeEventListener('wheel', wheel)
  }, [sheet])

  const handlers = {
    onPointerDown(event: PointerEvent<HTMLElement>) {
      if (event.button !== 0) return
      const at = place(event)
      fingers.current.set(event.pointerId, at)
      pressed.current = fingers.current.size === 1 ? at : null
    },
    onPointerMove(event: PointerEvent<HTMLElement>) {
      const at = place(event)
      const before = fingers.current.get(event.pointerId)
      resting.current = at
      if (!before) {
        point(under(store, at.x, at.y))
        return
      }
      if (fingers.current.size === 2) {
        const other = [...fingers.current].find(([id]) => id !== event.pointerId)?.[1]
        fingers.current.set(event.pointerId, at)
        if (!other) return
        const apart = Math.hypot(before.x - other.x, before.y - other.y)
        const now = Math.hypot(at.x - other.x, at.y - other.y)
        if (apart > 0 && now > 0) zoom(apart / now, (at.x + other.x) / 2, (at.y + other.y) / 2)
        return
      }
      const start = pressed.current
      if (!dragged && start && Math.hypot(at.x - start.x, at.y - start.y) < clickSlack) return
      if (!dragged) {
        event.currentTarget.setPointerCapture(event.pointerId)
        setDragged(true)
        point(null)
      }
      fingers.current.set(event.pointerId, at)
      move(at.x - before.x, at.y - before.y)
    },
    onPointerUp(event: PointerEvent<HTMLElement>) {
      const was = fingers.current.delete(event.pointerId)
      if (was && pressed.current && !dragged) {
        const at = place(event)
        const id = idOf(under(store, at.x, at.y))
        const mode = event.ctrlKey || event.metaKey || event.shiftKey ? 'toggle' : 'replace'
        if (id !== null || mode === 'replace') {
          useSelectionStore.getState().select(id === null ? [] : [id], mode)
        }
      }
      if (fingers.current.size === 0) {
        pressed.current = null
        setDragged(false)
      }
    },
    onPointerCancel(event: PointerEvent<HTMLElement>) {
      fingers.current.delete(event.pointerId)
      pressed.current = null
      setDragged(false)
    },
    onPointerLeave(event: PointerEvent<HTMLElement>) {
      resting.current = null
      if (!fingers.current.has(event.pointerId)) point(null)
    },
  }
  return { dragged, handlers, zoom, move }
}
