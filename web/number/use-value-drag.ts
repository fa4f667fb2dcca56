import { type PointerEvent, useRef } from 'react'
import type { QuantityDescription } from '../../src/document.ts'
import { readGiven, usePlantStore } from '../store/plant-store.ts'
import { readUnitChoice } from '../store/settings-store.ts'
import { give } from './give.ts'
import { fieldUnit, roundedStep, stepOf } from './typed-number.ts'

/** Way of the pointer before a press becomes a drag, px. */
const slack = 4
/** Way for one practical step, px; with Shift a tenth of a step. */
const way = 8

interface Drag {
  readonly pointer: number
  readonly x: number
  readonly from: number
  readonly merge: string
  steps: number
  moved: boolean
  frame: number
}

let drags = 0

/**
 * Drags a given number sideways to change it by practical steps, solved at every frame: one undo step,
 * taken back by Escape.
 */
export function useValueDrag(path: string, description: QuantityDescription) {
  const drag = useRef<Drag | null>(null)
  /** The click that ends a drag opens nothing. */
  const swallow = useRef(false)

  const stop = (element: HTMLElement) => {
    const { current } = drag
    if (!current) return
    cancelAnimationFrame(current.frame)
    if (element.hasPointerCapture(current.pointer)) element.releasePointerCapture(current.pointer)
    element.removeAttribute('data-dragged')
    drag.current = null
  }

  return {
    onPointerDown(event: PointerEvent<HTMLElement>) {
      swallow.current = false
      const given = readGiven(path)
      if (event.button !== 0 || typeof given !== 'number' || event.altKey) return
      drags += 1
      drag.current = {
        pointer: event.pointerId,
        x: event.clientX,
        from: given,
        merge: `drag/${path}/${drags}`,
        steps: 0,
        moved: false,
        frame: 0,
      }
    },
    onPointerMove(event: PointerEvent<HTMLElement>) {
      const { current } = drag
      if (!current || event.pointerId !== current.pointer) return
      const dx = event.clientX - current.x
      if (!current.moved) {
        if (Math.abs(dx) < slack) return
        current.moved = true
        event.currentTarget.setPointerCapture(current.pointer)
        event.currentTarget.setAttribute('data-dragged', '')
      }
      const fineness = event.shiftKey ? 10 : 1
      const steps = Math.round(dx / way) / fineness
      if (steps === current.steps) return
      current.steps = steps
      cancelAnimationFrame(current.frame)
      // One edit a frame is as many as can be seen.
      current.frame = requestAnimationFrame(() => {
        const units = readUnitChoice()
        const unit = fieldUnit(current.from, description, units)
        const to = current.from + steps * stepOf(description, current.from)
        const value = roundedStep(to, path, description, units, unit)
        if (value !== null) give(path, value, { merge: current.merge, before: current.from })
      })
    },
    onPointerUp(event: PointerEvent<HTMLElement>) {
      swallow.current = drag.current?.moved === true
      stop(event.currentTarget)
    },
    onPointerCancel(event: PointerEvent<HTMLElement>) {
      stop(event.currentTarget)
    },
    /** Escape takes a drag back; returns whether there was one. */
    cancel(element: HTMLElement): boolean {
      const { current } = drag
      if (!current?.moved) return false
      const { past, undo } = usePlantStore.getState()
      stop(element)
      swallow.current = true
      if (past.at(-1)?.merge === current.merge) undo()
      return true
    },
    /** Whether the click that comes now only ends a drag. */
    endsDrag(): boolean {
      const ends = swallow.current
      swallow.current = false
      return ends
    },
  }
}
