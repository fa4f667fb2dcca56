import { type RefObject, useLayoutEffect, useState } from 'react'

/** Size of an element, px, kept up to date. */
export function useSize(element: RefObject<HTMLElement | null>): {
  width: number
  height: number
} {
  const [size, setSize] = useState({ width: 0, height: 0 })
  useLayoutEffect(() => {
    if (!element.current) return
    const measured = (width: number, height: number) =>
      setSize((before) =>
        before.width === width && before.height === height ? before : { width, height },
      )
    const { clientWidth, clientHeight } = element.current
    measured(clientWidth, clientHeight)
    const observer = new ResizeObserver(([entry]) => {
      if (entry) {
        measured(Math.floor(entry.contentRect.width), Math.floor(entry.contentRect.height))
      }
    })
    observer.observe(element.current)
    return () => observer.disconnect()
  }, [element])
  return size
}
