import { useBalanceStore, usePhase, useValue } from '../store/balance-store.ts'
import { rampColour } from '../styles/ramp.ts'

const length = 26
const middle = 6

/** A short piece of a stream as the canvas draws it: width is flow, colour temperature, pattern phase. */
export function Swatch({ id }: { id: string }) {
  const m = useValue(`${id}.m`)
  const T = useValue(`${id}.T`)
  const phase = usePhase(id)
  const coldest = useBalanceStore((state) => state.coldest)
  const hottest = useBalanceStore((state) => state.hottest)
  const largestFlow = useBalanceStore((state) => state.largestFlow)
  const flows = m !== null && Math.abs(m) > 0 && largestFlow > 0
  const width = flows ? 1.25 + 4.5 * Math.sqrt(Math.abs(m) / largestFlow) : 1.25
  const colour = T === null || !flows ? 'var(--muted)' : rampColour(T, coldest, hottest)
  const line = `M1 ${middle}H${length - 1}`
  const hollow = flows && (phase === 'vapour' || phase === 'supercritical' || phase === 'wet')
  const outer = hollow ? Math.max(width, 3.2) : width
  return (
    <svg className="swatch" width={length} height={2 * middle} aria-hidden="true">
      <path
        d={line}
        stroke={colour}
        strokeWidth={outer}
        strokeDasharray={flows ? undefined : '3 3'}
      />
      {hollow && <path d={line} stroke="var(--paper)" strokeWidth={outer - 2} />}
      {hollow && <path d={line} stroke={colour} strokeOpacity="0.15" strokeWidth={outer - 2} />}
      {hollow && phase === 'wet' && (
        <path d={line} stroke={colour} strokeWidth={1.2} strokeDasharray="1.5 3" />
      )}
    </svg>
  )
}
