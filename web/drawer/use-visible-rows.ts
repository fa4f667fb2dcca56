import { type RefCallback, useCallback, useState } from 'react'

/** Rows drawn beyond the visible ones on either side, so that scrolling finds them there. */
const beyond = 8

/**
 * Which of many rows of equal height are in sight of the box that scrolls: a ref for the box, the first
 * row and the one behind the last. Only those are drawn, so that a new balance redraws no more than can
 * be seen. The box may come and go: an empty table has none.
 */
export function useVisibleRows(
  count: number,
  rowHeight: number,
): readonly [box: RefCallback<HTMLElement>, first: number, end: number] {
  const [range, setRange] = useState<readonly [number, number]>([0, 40])
  const box = useCallback(
    (element: HTMLElement | null) => {
      if (!element) return
      const look = () => {
        const first = Math.max(0, Math.floor(element.scrollTop / rowHeight) - beyond)
        const end = Math.ceil((element.scrollTop + element.clientHeight) / rowHeight) + beyond
        setRange((old) => (old[0] === first && old[1] === end ? old : [first, end]))
      }
      look()
      element.addEventListener('scroll', look, { passive: true })
      const observer = new ResizeObserver(look)
      observer.observe(element)
      return () => {
        element.removeEventListener('scroll', look)
        observer.disconnect()
      }
    },
    [rowHeight],
  )
  return [box, Math.min(range[0], count), Math.min(range[1], count)]
}
