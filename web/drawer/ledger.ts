import type { BalanceMessage, Finding } from '../../src/messages.ts'

export interface LedgerLine {
  readonly mark: 'square' | 'open' | 'error'
  /** 'Square', '1 short', '2 too many'. */
  readonly word: string
  readonly text: string
  /** The finding whose remedies stand below. */
  readonly finding?: Finding
}

function counts({ unknowns, equations }: BalanceMessage['ledger']): string {
  return `${unknowns} unknowns, ${equations} equations.`
}

/** 'Give one of these:', 'Give 2 of these, the first 2 do:'. */
function invitation(verb: 'Give' | 'Free', count: number, finding: Finding): string {
  if ((finding.remedies ?? []).length === 0) return finding.advice ?? finding.message
  if (count === 1) return `${verb} one of these:`
  return verb === 'Give'
    ? `Give ${count} of these; the first ${count} do together:`
    : `Free ${count} of these:`
}

/** The ledger in a line or more: square, or for each set how many numbers are missing or too many. */
export function ledgerLines(balance: BalanceMessage): readonly LedgerLine[] {
  const lines: LedgerLine[] = []
  for (const finding of balance.findings) {
    const { excess, missing } = finding
    if (excess !== undefined && excess > 0) {
      lines.push({
        mark: 'error',
        word: `${excess} too many`,
        text: `${counts(balance.ledger)} ${invitation('Free', excess, finding)}`,
        finding,
      })
    } else if (missing !== undefined && missing > 0) {
      lines.push({
        mark: 'open',
        word: `${missing} short`,
        text: `${counts(balance.ledger)} ${invitation('Give', missing, finding)}`,
        finding,
      })
    }
  }
  if (lines.length > 0) return lines
  const { missing, excess } = balance.ledger
  if (excess > 0) {
    return [{ mark: 'error', word: `${excess} too many`, text: counts(balance.ledger) }]
  }
  if (missing > 0) return [{ mark: 'open', word: `${missing} short`, text: counts(balance.ledger) }]
  const text =
    balance.status === 'solved'
      ? `${counts(balance.ledger)} Everything is fixed, nothing twice.`
      : balance.status === 'infeasible'
        ? `${counts(balance.ledger)} Nothing is missing or given twice, but no possible state fulfils them: see the findings.`
        : `${counts(balance.ledger)} Nothing is missing or given twice, but no solution was found: see the findings.`
  return [{ mark: balance.status === 'solved' ? 'square' : 'error', word: 'Square', text }]
}
