import { memo, useMemo } from 'react'
import type { EdgeProps } from 'reactflow'
import { useBalanceStore, usePhase, useValue } from '../store/balance-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { rampColour } from '../styles/ramp.ts'
import { BendHandles } from './BendHandles.tsx'
import { useCanvasStore } from './canvas-store.ts'
import { arrowOf, pathOf } from './path.ts'
import { StreamName } from './spoken-names.tsx'
import { arrowSize, hollowWidth, patternOf, streamWidth, wall } from './stream-style.ts'

/** A stream: width by mass flow, pattern by phase, colour by temperature, arrow at the consumer. */
export const StreamEdge = memo(function StreamEdge({ id, source, target }: EdgeProps) {
  const stream = useCanvasStore((state) => state.sheet.streams.get(id))
  const m = useValue(`${id}.m`)
  const T = useValue(`${id}.T`)
  const phase = usePhase(id)
  const largest = useBalanceStore((state) => state.largestFlow)
  const coldest = useBalanceStore((state) => state.coldest)
  const hottest = useBalanceStore((state) => state.hottest)
  const selected = useSelectionStore((state) => state.selected.includes(id))
  const lit = useSelectionStore(
    (state) =>
      state.hovered === id ||
      state.selected.includes(id) ||
      state.selected.includes(source) ||
      state.selected.includes(target),
  )

  const pattern = patternOf(phase, m)
  const flows = pattern !== 'none'
  const bare = flows ? streamWidth(m, largest) : 1.25
  const width = pattern === 'steam' || pattern === 'wet' ? hollowWidth(bare) : bare
  const { length, half } = arrowSize(bare)
  // A flow against the arrow is drawn as it runs.
  const backwards = flows && m !== null && m < 0
  const drawn = useMemo(() => {
    if (!stream) return null
    const route = backwards ? [...stream.route].reverse() : stream.route
    return {
      path: pathOf(route, stream.bridges, length - 1),
      whole: pathOf(route, stream.bridges, 0),
      arrow: arrowOf(route, length, half),
    }
  }, [stream, backwards, length, half])
  if (!drawn || !stream) return null

  const colour = flows && T !== null ? rampColour(T, coldest, hottest) : 'var(--muted)'
  const bore = width - 2 * wall
  return (
    <g className={`stream stream-${pattern}`} data-stream={id}>
      <StreamName id={id} />
      {lit && <path className="stream-halo" d={drawn.whole} strokeWidth={width + 11} />}
      <path
        className="react-flow__edge-interaction"
        d={drawn.whole}
        strokeWidth={14}
        fill="none"
        strokeOpacity={0}
      />
      {flows ? (
        <path className="stream-line" d={drawn.path} stroke={colour} strokeWidth={width} />
      ) : (
        <path
          className="stream-line"
          d={drawn.path}
          stroke={colour}
          strokeWidth={1.25}
          strokeDasharray="5 3.5"
        />
      )}
      {(pattern === 'steam' || pattern === 'wet') && (
        <>
          <path className="stream-bore" d={drawn.path} strokeWidth={bore} />
          <path className="stream-tint" d={drawn.path} stroke={colour} strokeWidth={bore} />
        </>
      )}
      {pattern === 'wet' && (
        <path
          className="stream-beads"
          d={drawn.path}
          stroke={colour}
          strokeWidth={Math.max(1.1, Math.min(2.2, bore * 0.62))}
          strokeDasharray={`0 ${bore < 2.5 ? 4.5 : 5.5}`}
        />
      )}
      <path className="stream-arrow" d={drawn.arrow} style={{ fill: colour }} />
      {selected && <BendHandles stream={stream} />}
    </g>
  )
})
