/** The name most like a mistyped one, or nothing where none is like it. */
export function nearestName(wrong: string, names: Iterable<string>): string | undefined {
  let nearest: string | undefined
  let least = Math.max(1, Math.floor(wrong.length / 3)) + 1
  for (const name of names) {
    const distance =
      name.toLowerCase() === wrong.toLowerCase() ? 0 : editDistance(wrong, name, least)
    if (distance < least) {
      least = distance
      nearest = name
    }
  }
  return nearest
}

/**
 * Letters to add, drop, change or swap with their neighbour to get from one word to the other
 * (Damerau 1964, in the restricted form), up to `limit`.
 */
function editDistance(a: string, b: string, limit: number): number {
  if (Math.abs(a.length - b.length) >= limit) return limit
  let before: number[] = []
  let row = Array.from({ length: b.length + 1 }, (_, j) => j)
  for (let i = 1; i <= a.length; i++) {
    const next = [i]
    for (let j = 1; j <= b.length; j++) {
      const change = (row[j - 1] ?? 0) + (a[i - 1] === b[j - 1] ? 0 : 1)
      let least = Math.min(change, (row[j] ?? 0) + 1, (next[j - 1] ?? 0) + 1)
      const swapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]
      if (swapped) least = Math.min(least, (before[j - 2] ?? 0) + 1)
      next.push(least)
    }
    before = row
    row = next
  }
  return row[b.length] ?? limit
}

/** ' Did you mean hp?', or nothing. */
export function suggestion(wrong: string, names: Iterable<string>): string {
  const nearest = nearestName(wrong, names)
  return nearest === undefined ? '' : ` Did you mean ${nearest}?`
}
