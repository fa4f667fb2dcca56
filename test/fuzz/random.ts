/** Numbers that look random and are the same for the same seed (sfc32). */
export class Random {
  private a: number
  private b: number
  private c: number
  private counter = 1

  /** Streams of different `seed` and `place` have nothing in common. */
  constructor(seed: number, place = 0) {
    this.a = seed | 0
    this.b = place | 0
    this.c = 0x9e3779b9
    for (let k = 0; k < 15; k++) this.next()
  }

  /** From 0 to below 1. */
  next(): number {
    const t = (((this.a + this.b) | 0) + this.counter) | 0
    this.counter = (this.counter + 1) | 0
    this.a = this.b ^ (this.b >>> 9)
    this.b = (this.c + (this.c << 3)) | 0
    this.c = ((this.c << 21) | (this.c >>> 11)) + t
    return (t >>> 0) / 4294967296
  }

  between(low: number, high: number): number {
    return low + (high - low) * this.next()
  }

  /** Evenly by logarithm. */
  spread(low: number, high: number): number {
    return low * (high / low) ** this.next()
  }

  /** A whole number, both ends included. */
  whole(low: number, high: number): number {
    return low + Math.floor((high - low + 1) * this.next())
  }

  chance(share: number): boolean {
    return this.next() < share
  }

  choose<T>(list: readonly T[]): T {
    return list[Math.floor(list.length * this.next())]!
  }
}

/** As a person would write it down. */
export function rounded(value: number, digits = 3): number {
  return Number(value.toPrecision(digits))
}
