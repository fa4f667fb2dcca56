import { expect, test } from 'vitest'
import type { BalanceMessage, Finding } from '../../src/messages.ts'
import { ledgerLines } from '../../web/drawer/ledger.ts'

function message(
  status: BalanceMessage['status'],
  ledger: Partial<BalanceMessage['ledger']>,
  findings: readonly Finding[] = [],
): BalanceMessage {
  return {
    status,
    findings,
    ledger: {
      unknowns: 178,
      equations: 178,
      blocks: 97,
      iterations: 5,
      missing: 0,
      excess: 0,
      ...ledger,
    },
  } as BalanceMessage
}

const finding = (part: Partial<Finding>): Finding => ({
  severity: 'error',
  code: 'count',
  where: [],
  quantities: [],
  message: 'The message.',
  ...part,
})

test('a solved plant is square', () => {
  expect(ledgerLines(message('solved', {}))).toEqual([
    {
      mark: 'square',
      word: 'Square',
      text: '178 unknowns, 178 equations. Everything is fixed, nothing twice.',
    },
  ])
})

test('numbers missing and numbers too many each get a line that leads to their remedies', () => {
  const missing = finding({ missing: 1, remedies: [{ action: 'give', path: 'main.m' }] })
  const excess = finding({
    excess: 2,
    remedies: [
      { action: 'free', path: 'main.p' },
      { action: 'free', path: 'main.T' },
    ],
  })
  const lines = ledgerLines(
    message('overspecified', { unknowns: 179, missing: 1, excess: 2 }, [missing, excess]),
  )
  expect(lines.map(({ mark, word }) => [mark, word])).toEqual([
    ['open', '1 short'],
    ['error', '2 too many'],
  ])
  expect(lines[0]?.text).toBe('179 unknowns, 178 equations. Give one of these:')
  expect(lines[1]?.text).toBe('179 unknowns, 178 equations. Free 2 of these:')
  expect(lines.map((line) => line.finding)).toEqual([missing, excess])
})

test('a square plant without a possible state is not said to be in order', () => {
  const [line] = ledgerLines(message('infeasible', {}))
  expect(line?.mark).toBe('error')
  expect(line?.text).toContain('no possible state')
})
