import { formatQuantity } from '../../src/document.ts'
import { flowMarks } from '../canvas/flow-marks.ts'
import { useUnitChoice } from '../store/settings-store.ts'
import { lineWidth } from './Lines.tsx'
import { textWidth } from './measure-text.ts'

const sample = 18

/** What the widths of lines mean: round flows from thin to thick, in a row. */
export function WidthScale({
  x,
  y,
  largest,
}: {
  readonly x: number
  /** Baseline, px. */
  readonly y: number
  readonly largest: number
}) {
  const units = useUnitChoice()
  if (largest <= 0) return null
  const marks = flowMarks(largest)
  let at = x
  return (
    <g className="chart-widths">
      {marks.map((m, i) => {
        const { text, unit } = formatQuantity(m, 'massFlow', units)
        const plain = text.replace(/(\.\d*?)0+$/, '$1').replace(/\.$/, '')
        const words = i === marks.length - 1 ? `${plain}\u2009${unit}` : plain
        const left = at
        at += sample + 4 + textWidth(words, 11) + 10
        return (
          <g key={m}>
            <path d={`M${left} ${y - 4}h${sample}`} strokeWidth={lineWidth(m, largest)} />
            <text x={left + sample + 4} y={y}>
              {words}
            </text>
          </g>
        )
      })}
    </g>
  )
}
