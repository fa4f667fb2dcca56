import { useCanvasStore } from './canvas-store.ts'
import { useConnectingStore } from './connecting-store.ts'
import { outward, type Point } from './geometry.ts'
import { arrowOf, pathOf } from './path.ts'
import { tidied } from './routing.ts'

/** The stream that is being drawn, and what letting go would do or why it cannot be. */
export function ConnectionPreview() {
  const connecting = useConnectingStore((state) => state.connecting)
  const choosing = useConnectingStore((state) => state.choosing)
  const notice = useConnectingStore((state) => state.notice)
  const zoom = useCanvasStore((state) => state.zoom)
  const over = connecting?.over
  const end = over?.point ?? connecting?.pointer ?? null
  const chosen = choosing?.ports[choosing.at]

  let text: string | null = null
  let at: Point | null = end
  let refused = false
  if (over) {
    if (!over.verdict.allowed) {
      text = over.verdict.why
      refused = true
    } else if (over.verdict.joins) {
      text = `${over.label}: ${over.verdict.joins === 'out' ? 'puts a branch in' : 'puts a junction in'}`
    }
  } else if (connecting?.stream) {
    text = connecting.from.direction === 'out' ? 'Puts a junction in' : 'Puts a branch in'
  } else if (chosen) {
    text = `${choosing?.follow ? 'Place after' : 'Connect from'}: ${chosen.label}${chosen.taken ? ' (puts a branch or junction in)' : ''}`
    at = chosen.point
  } else if (notice?.refused) {
    text = notice.text
    at = notice.at
    refused = true
  }

  return (
    <>
      {connecting && end && <Line from={connecting.from} end={end} over={over ?? null} />}
      {text && at && (
        <div
          className={refused ? 'canvas-note canvas-note-refused' : 'canvas-note'}
          style={{
            transform: `translate(${at[0]}px, ${at[1]}px) scale(${1 / zoom}) translate(14px, 14px)`,
          }}
        >
          {text}
        </div>
      )}
    </>
  )
}

function Line(props: {
  readonly from: { readonly point: Point; readonly side: keyof typeof outward }
  readonly end: Point
  readonly over: { readonly side: keyof typeof outward } | null
}) {
  const { from, end, over } = props
  const level = from.side === 'left' || from.side === 'right'
  const [ox, oy] = outward[from.side]
  const start: Point = [from.point[0] + 16 * ox, from.point[1] + 16 * oy]
  const arrives = over ? outward[over.side] : null
  const stop: Point = arrives ? [end[0] + 16 * arrives[0], end[1] + 16 * arrives[1]] : end
  const corner: Point = level ? [start[0], stop[1]] : [stop[0], start[1]]
  const route = tidied([from.point, start, corner, stop, end])
  return (
    <svg className="connection-line" aria-hidden="true">
      <path d={pathOf(route, [], 0)} />
      <path className="connection-arrow" d={arrowOf(route, 8, 4)} />
    </svg>
  )
}
