/** The earlier object where the later says the same. */
export function keep<T extends object>(earlier: T | undefined, later: T): T {
  return earlier && alike(earlier, later) ? earlier : later
}

export function alike(a: unknown, b: unknown): boolean {
  if (a === b) return true
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false
  // Symbols are compared by identity: they hold functions.
  const keys = Object.keys(a)
  if (keys.length !== Object.keys(b).length) return false
  for (const key of keys) {
    if (!alike((a as Record<string, unknown>)[key], (b as Record<string, unknown>)[key])) {
      return false
    }
  }
  return true
}
