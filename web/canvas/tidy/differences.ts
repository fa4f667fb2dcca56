/**
 * Places along one axis under constraints of the form b - a >= least: the leftmost places that keep
 * them all (longest paths). A constraint that contradicts those before it is refused.
 */
export class Differences {
  private readonly index = new Map<string, number>()
  private readonly rules: { readonly a: number; readonly b: number; readonly least: number }[] = []
  private places: number[] = []

  private at(name: string): number {
    const known = this.index.get(name)
    if (known !== undefined) return known
    const fresh = this.places.length
    this.index.set(name, fresh)
    this.places.push(0)
    return fresh
  }

  /** b stands at least so far behind a. False where that cannot be. */
  behind(a: string, b: string, least: number): boolean {
    return this.add([[a, b, least]])
  }

  /** b stands exactly so far behind a. */
  exactly(a: string, b: string, by: number): boolean {
    return this.add([
      [a, b, by],
      [b, a, -by],
    ])
  }

  /** Adds rules together or not at all. */
  add(rules: readonly (readonly [a: string, b: string, least: number])[]): boolean {
    const before = this.rules.length
    const places = [...this.places]
    for (const [a, b, least] of rules) {
      this.rules.push({ a: this.at(a), b: this.at(b), least })
    }
    if (this.settle()) return true
    this.rules.length = before
    for (let i = 0; i < places.length; i++) this.places[i] = places[i] as number
    for (let i = places.length; i < this.places.length; i++) this.places[i] = 0
    return false
  }

  private settle(): boolean {
    for (let round = 0; round <= this.places.length; round++) {
      let moved = false
      for (const { a, b, least } of this.rules) {
        const wanted = (this.places[a] as number) + least
        if (wanted > (this.places[b] as number)) {
          this.places[b] = wanted
          moved = true
        }
      }
      if (!moved) return true
    }
    return false
  }

  get(name: string): number | undefined {
    const at = this.index.get(name)
    return at === undefined ? undefined : this.places[at]
  }
}
