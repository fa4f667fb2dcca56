import { setBends } from '../../src/document.ts'
import { editLayout } from '../store/plant-store.ts'
import { useCanvasStore } from './canvas-store.ts'
import { onGrid, type Point } from './geometry.ts'
import type { PlacedStream } from './sheet.ts'
import { toSheet } from './view.ts'

let drags = 0

/** On a selected stream: handles that shift its straights; a double click finds the route anew. */
export function BendHandles({ stream }: { readonly stream: PlacedStream }) {
  const { route } = stream
  const zoom = useCanvasStore((state) => state.zoom)
  const size = 7 / zoom
  const handles = []
  for (let i = 2; i < route.length - 1; i++) {
    const a = route[i - 1] as Point
    const b = route[i] as Point
    const level = a[1] === b[1]
    handles.push(
      // biome-ignore lint/a11y/noStaticElementInteractions: a refinement for the pointer; routes are found by themselves
      <rect
        key={i}
        className="bend-handle nodrag nopan"
        data-level={level}
        x={(a[0] + b[0]) / 2 - size / 2}
        y={(a[1] + b[1]) / 2 - size / 2}
        width={size}
        height={size}
        onPointerDown={(event) => {
          event.stopPropagation()
          shift(stream, i, level)
        }}
        onDoubleClick={(event) => {
          event.stopPropagation()
          editLayout('Straighten stream', (plant, layoutId) =>
            setBends(plant, layoutId, stream.id, []),
          )
        }}
      />,
    )
  }
  return <g>{handles}</g>
}

function shift(stream: PlacedStream, segment: number, level: boolean): void {
  const merge = `bend ${stream.id} ${++drags}`
  const start = stream.route
  const move = (event: PointerEvent) => {
    const at = toSheet([event.clientX, event.clientY])
    const bends = start.slice(1, -1).map((point, i): Point => {
      // Corner i of the bends is point i + 1 of the route.
      if (i + 1 !== segment - 1 && i + 1 !== segment) return point
      return level ? [point[0], onGrid(at[1])] : [onGrid(at[0]), point[1]]
    })
    editLayout('Move stream', (plant, layoutId) => setBends(plant, layoutId, stream.id, bends), {
      merge,
    })
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
