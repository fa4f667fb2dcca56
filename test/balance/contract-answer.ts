import { expect } from 'vitest'
import type { Layout } from '../../src/document.ts'
import { type AskedBalance, balanceOf } from '../../src/engine.ts'
import type { Finding } from '../../src/messages.ts'
import { type LayoutParts, type Look, layoutOf, lookIn } from '../published/build-layout.ts'

/** A balance with ways to look at it. */
export interface Answer extends AskedBalance {
  /** A number by its path; NaN where it is null. */
  readonly at: Look
  readonly errors: readonly Finding[]
  /** The finding of that code, which must be there. */
  readonly finding: (code: string) => Finding
}

/** The balance of a layout, after a look at what holds of every balance (contract, section 5). */
export function answerOf(parts: LayoutParts): Answer {
  const layout = layoutOf(parts)
  const balance = balanceOf(layout)
  expect(formFaults(layout, balance)).toEqual([])
  return {
    ...balance,
    at: lookIn(balance),
    errors: balance.findings.filter(({ severity }) => severity === 'error'),
    finding: (code) => {
      const found = balance.findings.find((one) => one.code === code)
      if (found === undefined) throw new Error(`no ${code} among ${summary(balance)}`)
      return found
    },
  }
}

/** A balance that must be solved. */
export function solvedAnswerOf(parts: LayoutParts): Answer {
  const answer = answerOf(parts)
  if (answer.status !== 'solved') throw new Error(`${answer.status}: ${summary(answer)}`)
  return answer
}

const summary = ({ findings }: AskedBalance): string =>
  findings.map(({ severity, code, message }) => `${severity} ${code}: ${message}`).join(' | ')

function formFaults(layout: Layout, balance: AskedBalance): string[] {
  const faults: string[] = []
  const { streams, units, shafts, plant } = balance
  const owners: Readonly<Record<string, AskedBalance['plant']>> = {
    ...streams,
    ...units,
    ...shafts,
    plant,
  }
  for (const [owner, numbers] of Object.entries(owners)) {
    for (const [name, value] of Object.entries(numbers)) {
      if (typeof value === 'number' && !Number.isFinite(value)) faults.push(`${owner}.${name}`)
    }
  }
  const ids = new Set(Object.keys(owners))
  for (const { id } of [...layout.units, ...layout.streams, ...layout.shafts]) {
    if (!ids.has(id)) faults.push(`${id} is missing`)
  }
  const isPath = (path: string): boolean => {
    const [owner, name] = path.split('.') as [string, string]
    return name in (owners[owner] ?? {})
  }
  for (const { severity, code, where, quantities, message } of balance.findings) {
    if (!['error', 'caution', 'remark'].includes(severity)) faults.push(`severity of ${code}`)
    if (!/^[a-z0-9]+(-[a-z0-9]+)*$/.test(code)) faults.push(`code ${code}`)
    if (!/\S/.test(message) || /NaN|undefined|Infinity|\n/.test(message)) faults.push(message)
    for (const id of where) if (!ids.has(id)) faults.push(`${code} is at ${id}`)
    for (const path of quantities) if (!isPath(path)) faults.push(`${code} names ${path}`)
  }
  for (const path of [...balance.undetermined, ...balance.unbounded]) {
    const [owner, name] = path.split('.') as [string, string]
    if (owners[owner]?.[name] !== null) faults.push(`${path} is undetermined, and not null`)
  }
  const errors = balance.findings.filter(({ severity }) => severity === 'error')
  if ((balance.status === 'solved') !== (errors.length === 0)) {
    faults.push(`${balance.status} with ${errors.length} errors`)
  }
  if (balance.status === 'solved') {
    const { mass = 1, energy = 1 } = balance.closure ?? {}
    if (!(mass <= 1e-9 && energy <= 1e-9)) faults.push(`closure ${mass} ${energy}`)
    for (const [id, { m, p, h }] of Object.entries(streams)) {
      if (m === null || p === null || h === null) faults.push(`${id} is open`)
    }
  }
  return faults
}
