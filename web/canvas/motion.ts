const reduced = window.matchMedia('(prefers-reduced-motion: reduce)')

/** How long a change of view takes, ms: none where the user wants no motion. */
export function motion(): number {
  return reduced.matches ? 0 : 120
}
