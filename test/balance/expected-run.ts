import type { AskedBalance } from '../../src/engine.ts'

/*
 * A plant file's expected answers, computed by another implementation: how they are written and how
 * an answer is held against them. Nothing here knows the engine but the form of its answer.
 */

export interface ExpectedFile {
  /** By layout: the quantities of every unit, stream, shaft and of `plant` that must be keys. */
  readonly keys: Readonly<Record<string, Readonly<Record<string, readonly string[]>>>>
  readonly runs: readonly ExpectedRun[]
}

interface ExpectedValue {
  readonly value: number | string | null
  readonly rel?: number
  readonly abs?: number
}

export interface ExpectedRun {
  readonly layout: string | null
  readonly case: string | null
  readonly set: Readonly<Record<string, number>>
  readonly free: readonly string[]
  readonly note?: string
  readonly status: AskedBalance['status'] | 'unusable'
  readonly statusAlso?: readonly string[]
  readonly values?: Readonly<Record<string, ExpectedValue>>
  readonly closureLimit?: Readonly<Record<'mass' | 'energy', number>>
  readonly findingMustName?: readonly string[]
  readonly findingMustNameOneOf?: readonly string[]
  readonly missing?: number
  readonly excess?: number
  /** The only quantities that the set of the finding with `missing` or `excess` may hold. */
  readonly quantitiesOnlyFrom?: readonly string[]
  readonly mustSay?: readonly { readonly severity: string; readonly names: readonly string[] }[]
  readonly undeterminedMustInclude?: readonly string[]
  readonly unboundedMustInclude?: readonly string[]
}

/** `#2 case=low main.m=60 -plant.netPower`. */
export function nameOf(run: ExpectedRun, index: number): string {
  const words = [`#${index}`]
  if (run.layout !== null) words.push(`layout=${run.layout}`)
  if (run.case !== null) words.push(`case=${run.case}`)
  for (const [path, value] of Object.entries(run.set)) words.push(`${path}=${value}`)
  for (const path of run.free) words.push(`-${path}`)
  return `${words.join(' ')}: ${run.status}`
}

/** The value at a path of the printed object; undefined where there is no such key. */
function valueAt(answer: AskedBalance, path: string): number | string | null | undefined {
  const dot = path.indexOf('.')
  const owner = path.slice(0, dot)
  const name = path.slice(dot + 1)
  const groups =
    owner === 'plant'
      ? [answer.plant]
      : [answer.streams[owner], answer.units[owner], answer.shafts[owner]]
  return groups.find((group) => group !== undefined && name in group)?.[name]
}

/** How far a number may be off: |got - value| <= max(rel |value|, abs). */
function wrongValue(path: string, got: unknown, expected: ExpectedValue): string | undefined {
  const { value, rel = 1e-6, abs = 0 } = expected
  if (typeof value !== 'number') return got === value ? undefined : `${path} = ${got}, not ${value}`
  if (typeof got === 'number' && Math.abs(got - value) <= Math.max(rel * Math.abs(value), abs)) {
    return undefined
  }
  return `${path} = ${got}, not ${value}`
}

/** What is wrong with an answer to a run, in words; empty when nothing is. */
export function faultsOf(answer: AskedBalance, file: ExpectedFile, run: ExpectedRun): string[] {
  const faults: string[] = []
  const { status, findings } = answer
  if (status !== run.status && !run.statusAlso?.includes(status)) {
    faults.push(`status ${status}, not ${run.status}`)
  }
  const keys = file.keys[run.layout ?? Object.keys(file.keys)[0]!] ?? {}
  for (const [owner, names] of Object.entries(keys)) {
    for (const name of names) {
      const path = `${owner}.${name}`
      if (valueAt(answer, path) === undefined) faults.push(`no key ${path}`)
    }
  }
  if (status === 'solved') {
    for (const [path, expected] of Object.entries(run.values ?? {})) {
      const fault = wrongValue(path, valueAt(answer, path), expected)
      if (fault !== undefined) faults.push(fault)
    }
    for (const [name, limit] of Object.entries(run.closureLimit ?? {})) {
      const got = answer.closure?.[name as 'mass' | 'energy']
      if (!(got !== undefined && Math.abs(got) <= limit)) faults.push(`closure of ${name} ${got}`)
    }
  }
  if (run.status !== 'solved') faults.push(...wrongErrors(answer, run))
  for (const { severity, names } of run.mustSay ?? []) {
    const says = findings.some(
      (finding) =>
        finding.severity === severity &&
        names.every((name) => [...finding.where, ...finding.quantities].includes(name)),
    )
    if (!says) faults.push(`no ${severity} names ${names.join(' ')}`)
  }
  for (const list of ['undetermined', 'unbounded'] as const) {
    for (const path of run[`${list}MustInclude`] ?? []) {
      if (!answer[list].includes(path)) faults.push(`${list} lacks ${path}`)
    }
  }
  return faults
}

function wrongErrors({ findings, status }: AskedBalance, run: ExpectedRun): string[] {
  const faults: string[] = []
  const errors = findings.filter(({ severity }) => severity === 'error')
  const text = JSON.stringify(errors)
  for (const name of run.findingMustName ?? []) {
    if (!text.includes(name)) faults.push(`no error names ${name}`)
  }
  const oneOf = run.findingMustNameOneOf ?? []
  if (oneOf.length > 0 && !oneOf.some((name) => text.includes(name))) {
    faults.push(`no error names one of ${oneOf.join(' ')}`)
  }
  for (const count of ['missing', 'excess'] as const) {
    const expected = run[count]
    if (expected === undefined || status !== run.status) continue
    const finding = errors.find((error) => error[count] !== undefined)
    if (finding?.[count] !== expected) faults.push(`${count} ${finding?.[count]}, not ${expected}`)
    const set = finding?.quantities ?? []
    if (set.length === 0) faults.push('the set is empty')
    for (const path of set) {
      if (!run.quantitiesOnlyFrom?.includes(path)) faults.push(`no remedy in the set: ${path}`)
    }
  }
  return faults
}
