/** Entries below this, relative to the largest, count as zero. */
const negligible = 1e-11

/**
 * A singular system by elimination with complete pivoting: a solution with the free unknowns at
 * zero, and whether the equations agree (the right side is reached). Dense; off the hot path.
 * Rows are scaled to a largest entry of 1.
 */
export function solveSingular(
  n: number,
  rowFirst: Int32Array,
  columnOf: Int32Array,
  entries: Float64Array,
  right: Float64Array,
): { readonly solution: Float64Array; readonly misfit: number } {
  const a: Float64Array[] = []
  for (let i = 0; i < n; i++) {
    const row = new Float64Array(n + 1)
    for (let e = rowFirst[i]!; e < rowFirst[i + 1]!; e++) row[columnOf[e]!]! += entries[e]!
    row[n] = right[i]!
    a.push(row)
  }
  const columns = Array.from({ length: n }, (_, j) => j)
  let rank = 0
  let largest = 0
  for (; rank < n; rank++) {
    let best = 0
    let bestRow = -1
    let bestColumn = -1
    for (let i = rank; i < n; i++) {
      for (let j = rank; j < n; j++) {
        const size = Math.abs(a[i]![columns[j]!]!)
        if (size > best) {
          best = size
          bestRow = i
          bestColumn = j
        }
      }
    }
    if (rank === 0) largest = best
    if (bestRow < 0 || best <= negligible * largest) break
    ;[a[rank], a[bestRow]] = [a[bestRow]!, a[rank]!]
    ;[columns[rank], columns[bestColumn]] = [columns[bestColumn]!, columns[rank]!]
    const pivot = a[rank]!
    const column = columns[rank]!
    for (let i = rank + 1; i < n; i++) {
      const multiplier = a[i]![column]! / pivot[column]!
      if (multiplier === 0) continue
      for (let j = rank; j < n; j++) a[i]![columns[j]!]! -= multiplier * pivot[columns[j]!]!
      a[i]![n]! -= multiplier * pivot[n]!
    }
  }
  let misfit = 0
  for (let i = rank; i < n; i++) misfit = Math.max(misfit, Math.abs(a[i]![n]!))
  const solution = new Float64Array(n)
  for (let k = rank - 1; k >= 0; k--) {
    let sum = a[k]![n]!
    for (let j = k + 1; j < rank; j++) sum -= a[k]![columns[j]!]! * solution[columns[j]!]!
    solution[columns[k]!] = sum / a[k]![columns[k]!]!
  }
  return { solution, misfit }
}
