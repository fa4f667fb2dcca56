import { PointList } from './path-points.ts'

/** Numbers that a path is known by: its ends. */
const KEY_SIZE = 4

/** Ends this close, relative, are the same: a warm solution repeats itself but for round-off. */
const SAME = 1e-11

function near(a: number, b: number): boolean {
  return Math.abs(a - b) <= SAME * Math.abs(a)
}

/**
 * The points of paths in a fixed order, and those of the time before: a path whose ends have not moved
 * is copied instead of being worked out again. Call `begin`, then for each path `copy` (or write its
 * points to `list`) and `end`.
 */
export class PathStore {
  /** The points of this time. */
  list = new PointList()
  private earlier = new PointList()
  private keys = new Float64Array(KEY_SIZE * 64)
  private earlierKeys = new Float64Array(KEY_SIZE * 64)
  private ends = new Uint32Array(64)
  private earlierEnds = new Uint32Array(64)
  private count = 0
  private earlierCount = 0

  begin(): void {
    const { list, keys, ends, count } = this
    this.list = this.earlier
    this.keys = this.earlierKeys
    this.ends = this.earlierEnds
    this.earlier = list
    this.earlierKeys = keys
    this.earlierEnds = ends
    this.earlierCount = count
    this.count = 0
    this.list.clear()
  }

  /** Takes the path over from the time before; false where its ends were others. */
  copy(a: number, b: number, c: number, d: number): boolean {
    const { count } = this
    if (count === this.ends.length) this.grow()
    const at = KEY_SIZE * count
    this.keys[at] = a
    this.keys[at + 1] = b
    this.keys[at + 2] = c
    this.keys[at + 3] = d
    const { earlierKeys: keys } = this
    const same =
      count < this.earlierCount &&
      near(keys[at] as number, a) &&
      near(keys[at + 1] as number, b) &&
      near(keys[at + 2] as number, c) &&
      near(keys[at + 3] as number, d)
    if (!same) return false
    // What was worked out for other digits keeps their names, or small steps would add up unseen.
    for (let i = at; i < at + KEY_SIZE; i++) this.keys[i] = keys[i] as number
    const start = count === 0 ? 0 : (this.earlierEnds[count - 1] as number)
    this.list.append(this.earlier, start, this.earlierEnds[count] as number)
    return true
  }

  /** Ends the path and returns how many points there are so far. */
  end(): number {
    this.ends[this.count] = this.list.count
    this.count += 1
    return this.list.count
  }

  private grow(): void {
    const keys = new Float64Array(2 * this.keys.length)
    keys.set(this.keys)
    this.keys = keys
    const ends = new Uint32Array(2 * this.ends.length)
    ends.set(this.ends)
    this.ends = ends
  }
}
