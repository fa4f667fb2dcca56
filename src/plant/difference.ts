import type { Plant } from './document.ts'

/** Keys and indexes that lead to a part of a plant. */
export type PartPath = readonly (string | number)[]

/** One change of a difference. `before` or `after` lacking: there is nothing at that place. */
export type Change =
  | { readonly at: PartPath; readonly before?: unknown; readonly after?: unknown }
  /** In the list at `at`, from `index` on, `removed` gives way to `added`. */
  | {
      readonly at: PartPath
      readonly index: number
      readonly removed: readonly unknown[]
      readonly added: readonly unknown[]
    }

/**
 * What leads from one plant to another, and back: plain data that can be kept, sent and inverted, as
 * small as the change. The changes hold in their order.
 */
export interface Difference {
  readonly changes: readonly Change[]
}

/** A difference was applied to a plant that it does not start from: a programming mistake. */
export class DifferenceMismatch extends Error {
  readonly at: PartPath

  constructor(at: PartPath) {
    super(`The plant is not the one that the difference starts from: ${at.join('.')}.`)
    this.at = at
  }
}

/** The difference between two plants. Parts that both share are not looked into. */
export function difference(before: Plant, after: Plant): Difference {
  const changes: Change[] = []
  compare(before, after, [], changes)
  return { changes }
}

function compare(before: unknown, after: unknown, at: PartPath, changes: Change[]): void {
  if (same(before, after)) return
  if (Array.isArray(before) && Array.isArray(after)) compareLists(before, after, at, changes)
  else if (isRecord(before) && isRecord(after)) compareRecords(before, after, at, changes)
  else changes.push({ at, before, after })
}

function compareRecords(
  before: Readonly<Record<string, unknown>>,
  after: Readonly<Record<string, unknown>>,
  at: PartPath,
  changes: Change[],
): void {
  for (const key of Object.keys(before)) {
    if (before[key] === undefined) continue
    if (!has(after, key)) changes.push({ at: [...at, key], before: before[key] })
    else compare(before[key], after[key], [...at, key], changes)
  }
  for (const key of Object.keys(after)) {
    if (after[key] !== undefined && !has(before, key)) {
      changes.push({ at: [...at, key], after: after[key] })
    }
  }
}

/** Lists are compared from both ends; what lies between is replaced, or changed in place. */
function compareLists(
  before: readonly unknown[],
  after: readonly unknown[],
  at: PartPath,
  changes: Change[],
): void {
  const shorter = Math.min(before.length, after.length)
  let start = 0
  while (start < shorter && equalParts(before[start], after[start])) start++
  let end = 0
  while (
    end < shorter - start &&
    equalParts(before[before.length - 1 - end], after[after.length - 1 - end])
  ) {
    end++
  }
  const removed = before.slice(start, before.length - end)
  const added = after.slice(start, after.length - end)
  if (removed.length === added.length && removed.every((one, i) => alike(one, added[i]))) {
    removed.forEach((one, i) => {
      compare(one, added[i], [...at, start + i], changes)
    })
    return
  }
  if (removed.length > 0 || added.length > 0) changes.push({ at, index: start, removed, added })
}

/** Two states of one thing: of the same id, or both without one. */
function alike(a: unknown, b: unknown): boolean {
  return isRecord(a) && isRecord(b) && a.id === b.id
}

function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}

function has(record: Readonly<Record<string, unknown>>, key: string): boolean {
  return Object.hasOwn(record, key) && record[key] !== undefined
}

function same(a: unknown, b: unknown): boolean {
  return a === b || (Number.isNaN(a) && Number.isNaN(b))
}

/** Equal in every part; keys without a value count as absent. */
export function equalParts(a: unknown, b: unknown): boolean {
  if (same(a, b)) return true
  if (Array.isArray(a) && Array.isArray(b)) {
    return a.length === b.length && a.every((one, i) => equalParts(one, b[i]))
  }
  if (!isRecord(a) || !isRecord(b)) return false
  const keys = Object.keys(a).filter((key) => has(a, key))
  return (
    keys.length === Object.keys(b).filter((key) => has(b, key)).length &&
    keys.every((key) => has(b, key) && equalParts(a[key], b[key]))
  )
}

/** The plant after the difference. Parts that it does not touch are shared with the plant before. */
export function applyDifference(plant: Plant, { changes }: Difference): Plant {
  return changes.reduce<unknown>((part, change) => changed(part, change, 0), plant) as Plant
}

function changed(part: unknown, change: Change, depth: number): unknown {
  const { at } = change
  if ('index' in change && depth === at.length) return spliced(part, change)
  const key = at[depth]
  if (key === undefined) return 'after' in change ? change.after : undefined
  if (Array.isArray(part) && typeof key === 'number' && key < part.length) {
    const list = [...part]
    list[key] = changed(part[key], change, depth + 1)
    return list
  }
  if (!isRecord(part) || typeof key !== 'string') throw new DifferenceMismatch(at)
  const isLast = depth === at.length - 1
  if (isLast && !('index' in change)) {
    if (!('after' in change)) {
      if (!has(part, key)) throw new DifferenceMismatch(at)
      const { [key]: _, ...rest } = part
      return rest
    }
    return { ...part, [key]: change.after }
  }
  if (!has(part, key)) throw new DifferenceMismatch(at)
  return { ...part, [key]: changed(part[key], change, depth + 1) }
}

function spliced(part: unknown, change: Extract<Change, { index: number }>): unknown {
  const { at, index, removed, added } = change
  if (!Array.isArray(part) || index + removed.length > part.length) throw new DifferenceMismatch(at)
  return [...part.slice(0, index), ...added, ...part.slice(index + removed.length)]
}

/** The way back. */
export function invertDifference({ changes }: Difference): Difference {
  return {
    changes: changes
      .map((change): Change => {
        if ('index' in change) {
          const { at, index, removed, added } = change
          return { at, index, removed: added, added: removed }
        }
        const { at } = change
        return {
          at,
          ...('after' in change && { before: change.after }),
          ...('before' in change && { after: change.before }),
        }
      })
      .reverse(),
  }
}
