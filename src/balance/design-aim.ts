import type { DesignStart } from './design-start.ts'
import { boundsOf } from './ranges.ts'
import type { System } from './system.ts'

const mostIterations = 30
/** Misses, relative to what is wanted, at which the plant itself is solved from there. */
const near = 1e-4
const done = 1e-7
/** Size of a difference and the longest step, as parts of a quantity. */
const difference = 1e-5
const longest = 0.3
const shortest = 1e-3
/** Rows evaluated before giving up. */
const mostWork = 250_000
/** Most quantities that are moved. */
const mostMoved = 12

/**
 * Moves what a design fixes until its results are what the plant is given: Newton's method with
 * differences in these few quantities, every step a solution of the design. It passes from one
 * sensible plant to the next, and so finds answers that are sensible, too. Starts at the design's answer
 * of this choice; undefined where it has none, or nothing comes of it.
 */
export function aimAt(start: DesignStart, plant: System, choice: number): Float64Array | undefined {
  if (!start.standAt(choice)) return undefined
  const { program } = start
  const { fixed, released } = start.design
  const { values } = program.tape
  const count = plant.variables.length
  const n = fixed.length
  if (n > mostMoved) return undefined
  const bounds = boundsOf(plant.variables)
  const wanted = released.map((v) => plant.given[v]!)
  const sizes = fixed.map((v) => Math.max(Math.abs(values[v]!), 1e-2 * bounds.scale[v]!))
  const scale = released.map((v, k) =>
    Math.max(Math.abs(wanted[k]!), Math.abs(values[v]!), 1e-3 * bounds.scale[v]!),
  )
  const misses = (): number[] =>
    released.map((v, k) => (program.lost[v] ? Number.NaN : (values[v]! - wanted[k]!) / scale[k]!))
  const put = (x: readonly number[]): boolean => {
    fixed.forEach((v, k) => {
      program.set(v, x[k]!)
    })
    program.solve()
    return start.isSolved()
  }
  let x = fixed.map((v) => values[v]!)
  let held = values.slice(0, count)
  let missed = misses()
  let least = norm(missed)
  const allowed = program.work + mostWork
  for (let iteration = 0; iteration < mostIterations && least > done; iteration++) {
    if (program.work > allowed) break
    const columns = x.map((_, j) => {
      for (const size of [difference, -difference]) {
        const moved = x.slice()
        moved[j]! += size * sizes[j]!
        const isSolved = put(moved)
        const column = isSolved && misses().map((miss, k) => (miss - missed[k]!) / size)
        start.recall(held)
        if (column) return column
      }
      return new Array<number>(n).fill(0)
    })
    const step = leastSquaresStep(columns, missed)
    let share = 1
    for (const part of step) share = Math.min(share, longest / Math.max(1e-300, Math.abs(part)))
    let accepted = false
    for (; share > shortest && !accepted; share /= 2) {
      const next = x.map((value, j) => {
        const to = value + share * step[j]! * sizes[j]!
        const low = bounds.sensibleLower[fixed[j]!]!
        const high = bounds.sensibleUpper[fixed[j]!]!
        return to < low ? value + (low - value) / 2 : to > high ? value + (high - value) / 2 : to
      })
      if (put(next) && norm(misses()) < least * (1 - 1e-4 * share)) {
        accepted = true
        x = next
        missed = misses()
        least = norm(missed)
        held = values.slice(0, count)
      } else start.recall(held)
    }
    if (!accepted) break
  }
  return least < near ? held : undefined
}

function norm(parts: readonly number[]): number {
  return Math.sqrt(parts.reduce((sum, x) => sum + x * x, 0))
}

/** The step that meets the misses to first order, slightly damped (K. Levenberg, Q. Appl. Math. 2, 1944, 164-168). */
function leastSquaresStep(
  columns: readonly (readonly number[])[],
  missed: readonly number[],
): number[] {
  const n = columns.length
  const dot = (a: readonly number[], b: readonly number[]): number =>
    a.reduce((sum, x, k) => sum + x * b[k]!, 0)
  const a = columns.map((left) => [...columns.map((right) => dot(left, right)), -dot(left, missed)])
  let trace = 0
  for (let i = 0; i < n; i++) trace += a[i]![i]!
  for (let i = 0; i < n; i++) a[i]![i]! += 1e-12 * trace + 1e-300
  for (let k = 0; k < n; k++) {
    let pivot = k
    for (let i = k + 1; i < n; i++) if (Math.abs(a[i]![k]!) > Math.abs(a[pivot]![k]!)) pivot = i
    ;[a[k], a[pivot]] = [a[pivot]!, a[k]!]
    for (let i = k + 1; i < n; i++) {
      const factor = a[i]![k]! / a[k]![k]!
      for (let j = k; j <= n; j++) a[i]![j]! -= factor * a[k]![j]!
    }
  }
  const x = new Array<number>(n).fill(0)
  for (let k = n - 1; k >= 0; k--) {
    let sum = a[k]![n]!
    for (let j = k + 1; j < n; j++) sum -= a[k]![j]! * x[j]!
    x[k] = sum / a[k]![k]!
  }
  return x
}
