import { formatQuantity } from '../../src/document.ts'
import { useBalanceStore } from '../store/balance-store.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { rampAt } from '../styles/ramp.ts'
import { flowMarks } from './flow-marks.ts'
import { hollowWidth, streamWidth, wall } from './stream-style.ts'

/** What colour, pattern and width of a stream mean. */
export function Legend() {
  const units = useUnitChoice()
  const coldest = useBalanceStore((state) => state.coldest)
  const hottest = useBalanceStore((state) => state.hottest)
  const largest = useBalanceStore((state) => state.largestFlow)
  if (largest <= 0) return null
  const whole = (T: number) => {
    const { text, unit } = formatQuantity(T, 'temperature', units)
    const number = Number(text.replace('−', '-'))
    return { text: Number.isFinite(number) ? String(Math.round(number)) : text, unit }
  }
  const hot = whole(hottest)
  const flows = flowMarks(largest)
  return (
    <section className="legend" aria-label="Legend">
      <div className="legend-ramp">
        <div className="legend-ramp-bar" />
        <div className="legend-ramp-ends">
          <span>{whole(coldest).text}</span>
          <span>{whole((coldest + hottest) / 2).text}</span>
          <span>
            {hot.text} {hot.unit}
          </span>
        </div>
      </div>
      <div className="legend-group">
        <Sample name="liquid" />
        <Sample name="wet" />
        <Sample name="steam" />
        <Sample name="no flow" />
      </div>
      <div className="legend-group legend-widths">
        {flows.map((m, i) => {
          const { text, unit } = formatQuantity(m, 'massFlow', units)
          const plain = text.replace(/(\.\d*?)0+$/, '$1').replace(/\.$/, '')
          return (
            <div key={m} className="legend-sample">
              <svg width={36} height={8} aria-hidden="true">
                <path d="M0 4H36" stroke="var(--ink)" strokeWidth={streamWidth(m, largest)} />
              </svg>
              <span>{i === flows.length - 1 ? `${plain} ${unit}` : plain}</span>
            </div>
          )
        })}
      </div>
    </section>
  )
}

function Sample({ name }: { readonly name: 'liquid' | 'wet' | 'steam' | 'no flow' }) {
  const colour = rampAt(0.42)
  const width = hollowWidth(3)
  const bore = width - 2 * wall
  return (
    <div className="legend-sample">
      <svg width={34} height={8} aria-hidden="true">
        {name === 'liquid' && <path d="M0 4H34" stroke={colour} strokeWidth={3.2} />}
        {name === 'no flow' && (
          <path d="M0 4H34" stroke="var(--muted)" strokeWidth={1.25} strokeDasharray="5 3.5" />
        )}
        {(name === 'wet' || name === 'steam') && (
          <>
            <path d="M0 4H34" stroke={colour} strokeWidth={width} />
            <path className="stream-bore" d="M0 4H34" strokeWidth={bore} />
            <path className="stream-tint" d="M0 4H34" stroke={colour} strokeWidth={bore} />
          </>
        )}
        {name === 'wet' && (
          <path
            className="stream-beads"
            d="M2 4H34"
            stroke={colour}
            strokeWidth={1.6}
            strokeDasharray="0 4.5"
          />
        )}
      </svg>
      <span>{name}</span>
    </div>
  )
}
