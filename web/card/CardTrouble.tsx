import { ledgerLines } from '../drawer/ledger.ts'
import { Remedies } from '../drawer/Remedies.tsx'
import { TakeBack } from '../drawer/TakeBack.tsx'
import { Mark } from '../number/Mark.tsx'
import { useBalanceStore } from '../store/balance-store.ts'

/** Why the plant is not solved, and what to click, where the hand is: one number too many or too few. */
export function CardTrouble() {
  const balance = useBalanceStore((state) => state.balance)
  const trouble = useBalanceStore((state) => state.trouble)
  if (trouble) {
    // The balance that is still there belongs to the plant before: what it asks for is no remedy.
    return (
      <div className="card-trouble" role="status">
        <div className="card-trouble-line" data-mark="error">
          <Mark name="error" />
          <strong>No balance</strong>
          <span>{trouble}</span>
          <TakeBack />
        </div>
      </div>
    )
  }
  if (!balance || balance.status === 'solved') return null
  if (balance.status === 'underspecified' || balance.status === 'overspecified') {
    return (
      <div className="card-trouble" role="status">
        {ledgerLines(balance).map((line, i) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: the lines have no name of their own.
          <div key={i} className="card-trouble-line" data-mark={line.mark}>
            <Mark name={line.mark} />
            <strong>{line.word}</strong>
            <span>{line.text.replace(/^\d+ unknowns, \d+ equations\. /, '')}</span>
            {line.finding && <Remedies finding={line.finding} />}
          </div>
        ))}
      </div>
    )
  }
  const error = balance.findings.find(({ severity }) => severity === 'error')
  return (
    <div className="card-trouble" role="status">
      <div className="card-trouble-line" data-mark="error">
        <Mark name="error" />
        <strong>{balance.status === 'infeasible' ? 'Not possible' : 'No solution found'}</strong>
        <span>{error?.message}</span> <span className="muted">{error?.advice}</span>
        {error && <Remedies finding={error} />}
        <TakeBack />
      </div>
    </div>
  )
}
