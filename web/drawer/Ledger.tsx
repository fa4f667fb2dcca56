import type { Finding } from '../../src/messages.ts'
import { Mark } from '../number/Mark.tsx'
import { useBalanceStore } from '../store/balance-store.ts'
import { useSelectionStore } from '../store/selection-store.ts'
import { Equations } from './Equations.tsx'
import { ledgerLines } from './ledger.ts'
import { Remedies } from './Remedies.tsx'
import { TakeBack } from './TakeBack.tsx'

/** Selects everything that a set of numbers lies on, so that the canvas and the chart show it. */
function Where({ finding }: { finding: Finding }) {
  const select = useSelectionStore((state) => state.select)
  const { where } = finding
  if (where.length === 0) return null
  return (
    <button type="button" className="ledger-where" onClick={() => select(where)}>
      Show on the canvas where it lies:{' '}
      {where.length === 1 ? 'one place' : `${where.length} places`}
    </button>
  )
}

/** Unknowns against equations, and what to give or to free where they do not match. */
export function Ledger() {
  const balance = useBalanceStore((state) => state.balance)
  const trouble = useBalanceStore((state) => state.trouble)
  if (trouble) {
    return (
      <div className="drawer-scroll ledger">
        <div className="ledger-line" data-mark="error">
          <Mark name="error" />
          <strong>No balance</strong>
          <span>{trouble}</span>
          <TakeBack />
        </div>
      </div>
    )
  }
  if (!balance) return <p className="drawer-empty">No balance yet.</p>
  const { blocks, iterations } = balance.ledger
  const isStuck = balance.status === 'infeasible' || balance.status === 'notConverged'
  return (
    <div className="drawer-scroll ledger">
      {ledgerLines(balance).map((line, i) => (
        <div
          // biome-ignore lint/suspicious/noArrayIndexKey: the lines have no name of their own.
          key={i}
          className="ledger-line"
          data-mark={line.mark}
        >
          <div>
            <Mark name={line.mark} />
            <strong>{line.word}</strong>
            <span className="muted">{line.text}</span>
          </div>
          {line.finding && <Remedies finding={line.finding} />}
          {line.finding && <Where finding={line.finding} />}
          {isStuck && <TakeBack />}
        </div>
      ))}
      {balance.status === 'solved' && (
        <p className="muted ledger-note">
          Solved in {blocks} blocks, {iterations} {iterations === 1 ? 'iteration' : 'iterations'},{' '}
          {balance.milliseconds < 10
            ? balance.milliseconds.toFixed(1)
            : balance.milliseconds.toFixed(0)}{' '}
          ms.
          {balance.undetermined.length > 0 &&
            ` ${balance.undetermined.length} quantities that nothing else needs are left open.`}
        </p>
      )}
      <Equations />
    </div>
  )
}
