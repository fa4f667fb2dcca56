import { type RefObject, useCallback, useEffect, useLayoutEffect, useRef, useState } from 'react'
import { useCanvasStore } from '../canvas/canvas-store.ts'
import type { Sheet } from '../canvas/sheet.ts'
import { canvasObstacles } from './obstacles.ts'
import { placeCard } from './place-card.ts'

interface Place {
  readonly left: number
  readonly top: number
}

/** For so long after it opens a card may still move, as its numbers come in, ms. */
const settling = 600

/** Where the user has put the card: it stays there for all that is selected next. */
let moved: Place | null = null

function within(place: Place, card: HTMLElement, area: HTMLElement): Place {
  return {
    left: Math.max(0, Math.min(place.left, area.clientWidth - card.offsetWidth)),
    top: Math.max(0, Math.min(place.top, area.clientHeight - card.offsetHeight)),
  }
}

/** Whether all that is drawn stands where it stood. */
function standsStill(now: Sheet, then: Sheet): boolean {
  const still = (here: ReadonlyMap<string, unknown>, there: ReadonlyMap<string, unknown>) =>
    here.size === there.size && [...here].every(([id, one]) => there.get(id) === one)
  return (
    still(now.units, then.units) &&
    still(now.streams, then.streams) &&
    still(now.shafts, then.shafts)
  )
}

/** Keeps a card where it covers nothing, or where the user has dragged it. */
export function usePlace(
  card: RefObject<HTMLElement | null>,
  id: string,
): { readonly place: Place | null; startMove(event: React.PointerEvent): void } {
  const [place, setPlace] = useState<Place | null>(null)
  const present = useRef<Place | null>(null)

  const settle = useCallback(() => {
    const element = card.current
    const area = element?.parentElement
    if (!element || !area) return
    const next = moved
      ? within(moved, element, area)
      : freePlace(element, area, id, present.current)
    present.current = next
    setPlace((old) => (old?.left === next.left && old.top === next.top ? old : next))
  }, [card, id])

  useLayoutEffect(() => {
    settle()
    const element = card.current
    const area = element?.parentElement
    if (!element || !area) return
    const opened = performance.now()
    const observer = new ResizeObserver(() => {
      const { current } = present
      const isFresh = performance.now() - opened < settling
      // Under the hand a card stays where it is, whatever it comes to say.
      if (!current || (isFresh && !element.matches(':hover, :focus-within'))) settle()
      else {
        const kept = within(current, element, area)
        present.current = kept
        setPlace((old) => (old?.left === kept.left && old.top === kept.top ? old : kept))
      }
    })
    observer.observe(area)
    observer.observe(element)
    return () => observer.disconnect()
  }, [card, settle])

  // What is drawn moves and grows while the card is open: it then makes way.
  useEffect(() => {
    let settled = useCanvasStore.getState().sheet
    let frame = 0
    const end = useCanvasStore.subscribe(({ sheet, moved: onTheWay }) => {
      if (sheet === settled || onTheWay) return
      if (!standsStill(sheet, settled)) {
        cancelAnimationFrame(frame)
        frame = requestAnimationFrame(settle)
      }
      settled = sheet
    })
    return () => {
      end()
      cancelAnimationFrame(frame)
    }
  }, [settle])

  const startMove = (event: React.PointerEvent) => {
    const element = card.current
    const area = element?.parentElement
    if (!element || !area || event.button !== 0) return
    if ((event.target as Element).closest('button, input')) return
    event.preventDefault()
    const from = { x: event.clientX, y: event.clientY }
    const start = present.current ?? { left: element.offsetLeft, top: element.offsetTop }
    const move = (pointer: PointerEvent) => {
      moved = within(
        { left: start.left + pointer.clientX - from.x, top: start.top + pointer.clientY - from.y },
        element,
        area,
      )
      present.current = moved
      setPlace(moved)
    }
    const end = () => {
      window.removeEventListener('pointermove', move)
      window.removeEventListener('pointerup', end)
      window.removeEventListener('pointercancel', end)
    }
    window.addEventListener('pointermove', move)
    window.addEventListener('pointerup', end)
    window.addEventListener('pointercancel', end)
  }

  return { place, startMove }
}

function freePlace(
  element: HTMLElement,
  area: HTMLElement,
  id: string,
  present: Place | null,
): Place {
  const { obstacles, anchor } = canvasObstacles(area, id)
  return placeCard(
    { width: element.offsetWidth, height: element.offsetHeight },
    { width: area.clientWidth, height: area.clientHeight },
    obstacles,
    anchor,
    present,
  )
}
