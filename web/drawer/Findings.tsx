import { labelOf } from '../../src/document.ts'
import type { Finding } from '../../src/messages.ts'
import { Mark } from '../number/Mark.tsx'
import { useBalanceStore } from '../store/balance-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { Remedies } from './Remedies.tsx'

const words = { error: 'Error', caution: 'Caution', remark: 'Remark' }
const order = ['error', 'caution', 'remark'] as const

const none: readonly Finding[] = []

/** How many given numbers a finding rests on: the fewer, the nearer it is to what is wrong. */
function givensBehind({ remedies }: Finding): number {
  return remedies?.length || Number.MAX_SAFE_INTEGER
}

/** None while there is trouble: those that are still there belong to the plant before. */
export function useFindings(): readonly Finding[] {
  return useBalanceStore((state) => (state.trouble ? none : (state.balance?.findings ?? none)))
}

function FindingLine({ finding }: { finding: Finding }) {
  const layout = useLayout()
  const select = useSelectionStore((state) => state.select)
  const hover = useSelectionStore((state) => state.hover)
  const { severity, where, message, advice } = finding
  const names = where.slice(0, 3).map((id) => labelOf(layout, id))
  const title = names.join(', ') + (where.length > 3 ? ` and ${where.length - 3} more` : '')
  return (
    <li className="finding" data-severity={severity}>
      <Mark name={severity} />
      <div>
        <strong className="finding-word">{words[severity]}</strong>
        {title && (
          <button
            type="button"
            className="finding-where"
            onClick={() => select(where)}
            onPointerEnter={() => hover(where[0] ?? null)}
            onPointerLeave={() => hover(null)}
          >
            {title}
          </button>
        )}
        <span>{message}</span>
        {advice && <p className="muted">{advice}</p>}
        <Remedies finding={finding} />
      </div>
    </li>
  )
}

/**
 * What the tool has to say about the plant: errors first, then cautions, then remarks; of each those
 * first that few given numbers stand behind, what merely follows from them after.
 */
export function Findings() {
  const findings = useFindings()
  const trouble = useBalanceStore((state) => state.trouble)
  if (findings.length === 0 && !trouble) {
    return <p className="drawer-empty">Nothing to find fault with.</p>
  }
  return (
    <ul className="drawer-scroll findings">
      {trouble && (
        <li className="finding" data-severity="error">
          <Mark name="error" />
          <div>
            <strong className="finding-word">Error</strong>
            <span>{trouble}</span>
          </div>
        </li>
      )}
      {order.flatMap((severity) =>
        findings
          .filter((finding) => finding.severity === severity)
          .sort((a, b) => givensBehind(a) - givensBehind(b))
          .map((finding, i) => (
            <FindingLine
              // biome-ignore lint/suspicious/noArrayIndexKey: two findings may be alike but for their text.
              key={`${severity}/${finding.code}/${finding.where.join()}/${i}`}
              finding={finding}
            />
          )),
      )}
    </ul>
  )
}
