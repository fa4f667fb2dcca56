import { useLayoutEffect, useRef, useState } from 'react'
import { labelOf, setLabel } from '../../src/document.ts'
import { editLayout, readLayout } from '../store/plant-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { focusItem } from './focus-item.ts'
import type { Box, Point } from './geometry.ts'
import { useRenameStore } from './rename-store.ts'

/** The label of a unit or stream, edited where it stands. */
export function RenameField() {
  const id = useRenameStore((state) => state.id)
  return id === null ? null : <Field key={id} id={id} />
}

/** What the layout itself calls it, without the name that follows from a stream's ends. */
function ownLabel(id: string): string {
  const layout = readLayout()
  const item = [...layout.units, ...layout.streams, ...layout.shafts].find((one) => one.id === id)
  return item?.label ?? ''
}

function Field({ id }: { readonly id: string }) {
  const [text, setText] = useState(() => ownLabel(id))
  const scale = useCanvasStore((state) => state.textScale)
  const place = useCanvasStore((state): Box | null => {
    const label = state.labels.get(id)
    if (label) return label
    const unit = state.sheet.units.get(id)
    if (unit) return { ...unit.body, y: unit.body.y + unit.body.height + 4 }
    const route = state.sheet.streams.get(id)?.route
    return route ? halfway(route) : null
  })
  const input = useRef<HTMLInputElement>(null)
  const done = useRef(false)
  useLayoutEffect(() => {
    input.current?.focus({ preventScroll: true })
    input.current?.select()
  }, [])

  const end = (keep: boolean) => {
    if (done.current) return
    done.current = true
    const wanted = text.trim()
    if (keep && wanted !== ownLabel(id)) {
      editLayout(wanted === '' ? 'Take the label away' : `Rename to ${wanted}`, (plant, layoutId) =>
        setLabel(plant, layoutId, id, wanted),
      )
    }
    useRenameStore.setState({ id: null })
  }
  if (!place) return null
  const width = Math.max(96, text.length * 7.5 + 20) * scale
  return (
    <input
      ref={input}
      className="rename-field nodrag nopan"
      aria-label={`Label of ${labelOf(readLayout(), id)}`}
      value={text}
      spellCheck={false}
      style={{
        width,
        transform: `translate(${place.x + place.width / 2 - width / 2}px, ${place.y - 3 * scale}px)`,
      }}
      onChange={(event) => setText(event.target.value)}
      onBlur={() => end(true)}
      onKeyDown={(event) => {
        event.stopPropagation()
        if (event.key !== 'Enter' && event.key !== 'Escape') return
        event.preventDefault()
        end(event.key === 'Enter')
        focusItem(id)
      }}
    />
  )
}

let last: { readonly route: readonly Point[]; readonly box: Box } | null = null

/** The middle of the longest straight; the same box as long as the route is the same. */
function halfway(route: readonly Point[]): Box {
  if (last?.route === route) return last.box
  let best: Box = { x: 0, y: 0, width: 0, height: 0 }
  let most = -1
  for (let i = 1; i < route.length; i++) {
    const [x1, y1] = route[i - 1] as Point
    const [x2, y2] = route[i] as Point
    const length = Math.abs(x2 - x1) + Math.abs(y2 - y1)
    if (length <= most) continue
    most = length
    best = { x: (x1 + x2) / 2, y: (y1 + y2) / 2 + 6, width: 0, height: 0 }
  }
  last = { route, box: best }
  return best
}
