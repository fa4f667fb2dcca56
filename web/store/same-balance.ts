import type { Layout, Plant } from '../../src/document.ts'

/** Keys that say only where a thing is drawn. */
const drawing: ReadonlySet<string> = new Set(['at', 'bends', 'mirrored'])

function sameBut(a: object, b: object, ignored: ReadonlySet<string>): boolean {
  if (a === b) return true
  const left = a as Record<string, unknown>
  const right = b as Record<string, unknown>
  for (const key in left) if (!ignored.has(key) && left[key] !== right[key]) return false
  for (const key in right) if (!ignored.has(key) && !(key in left)) return false
  return true
}

function sameItems(a: readonly object[], b: readonly object[]): boolean {
  return (
    a === b || (a.length === b.length && a.every((one, i) => sameBut(one, b[i] ?? {}, drawing)))
  )
}

const lists: ReadonlySet<string> = new Set(['units', 'streams', 'shafts', 'name', 'basis'])

function sameLayouts(a: Layout, b: Layout): boolean {
  return (
    a === b ||
    (sameBut(a, b, lists) &&
      sameItems(a.units, b.units) &&
      sameItems(a.streams, b.streams) &&
      sameItems(a.shafts, b.shafts))
  )
}

/** True when two plants differ at most in drawing and titles, so that one balance holds for both. */
export function sameBalance(a: Plant, b: Plant): boolean {
  return (
    a.layouts === b.layouts ||
    (a.layouts.length === b.layouts.length &&
      a.layouts.every((layout, i) => sameLayouts(layout, b.layouts[i] as Layout)))
  )
}
