import { hollowWidth, patternOf, streamWidth, wall } from '../canvas/stream-style.ts'
import { useBalanceStore, usePhase, useValue } from '../store/balance-store.ts'
import { rampColour } from '../styles/ramp.ts'

const length = 26
const height = 12
const line = `M0 ${height / 2}H${length}`

/** A short piece of a stream as the canvas draws it: width is flow, colour temperature, pattern phase. */
export function Swatch({ id }: { id: string }) {
  const m = useValue(`${id}.m`)
  const T = useValue(`${id}.T`)
  const phase = usePhase(id)
  const coldest = useBalanceStore((state) => state.coldest)
  const hottest = useBalanceStore((state) => state.hottest)
  const largestFlow = useBalanceStore((state) => state.largestFlow)
  const pattern = patternOf(phase, m)
  const plain = streamWidth(m, largestFlow)
  const hollow = pattern === 'steam' || pattern === 'wet'
  const width = hollow ? hollowWidth(plain) : plain
  const bore = width - 2 * wall
  const colour = pattern === 'none' || T === null ? 'var(--muted)' : rampColour(T, coldest, hottest)
  return (
    <svg className="swatch" width={length} height={height} aria-hidden="true">
      <path
        d={line}
        stroke={colour}
        strokeWidth={width}
        strokeDasharray={pattern === 'none' ? '3 3' : undefined}
      />
      {hollow && <path className="stream-bore" d={line} strokeWidth={bore} />}
      {hollow && <path className="stream-tint" d={line} stroke={colour} strokeWidth={bore} />}
      {pattern === 'wet' && (
        <path
          className="stream-beads"
          d={line}
          stroke={colour}
          strokeWidth={Math.min(1.6, bore)}
          strokeDasharray="0 4"
        />
      )}
    </svg>
  )
}
