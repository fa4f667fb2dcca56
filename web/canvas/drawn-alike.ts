import type { Layout } from '../../src/document.ts'
import { alike } from './keep.ts'

/**
 * Whether two states of a layout are drawn alike, numbers apart. What is given for a stream counts in
 * so far as it decides which streams have tags.
 */
export function drawnAlike(a: Layout, b: Layout): boolean {
  if (a === b) return true
  return (
    same(a.units, b.units, (one, other) => {
      const { given: _, ...drawn } = one
      const { given: __, ...drawnToo } = other
      return alike(drawn, drawnToo)
    }) &&
    same(
      a.streams,
      b.streams,
      (one, other) =>
        one.from === other.from &&
        one.to === other.to &&
        one.id === other.id &&
        alike(one.bends, other.bends) &&
        Object.keys(one.given).length === Object.keys(other.given).length,
    ) &&
    same(a.shafts, b.shafts, (one, other) => {
      const { given: _, ...drawn } = one
      const { given: __, ...drawnToo } = other
      return alike(drawn, drawnToo)
    })
  )
}

/** Most edits leave all but one thing as it was. */
function same<T>(a: readonly T[], b: readonly T[], isSame: (one: T, other: T) => boolean): boolean {
  if (a === b) return true
  return a.length === b.length && a.every((one, i) => one === b[i] || isSame(one, b[i] as T))
}
