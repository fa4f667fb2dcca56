import { plantOf } from './draft.ts'
import { faultOf, solveFile } from './judge.ts'
import { Random } from './random.ts'
import { drawSolvable, minimise } from './solvable.ts'
import { drawSpoilt, spoiltFault } from './unsolvable.ts'

export type Family = 'solvable' | 'unsolvable'

/** How one random plant fared. */
export interface Outcome {
  readonly place: number
  /** Units of the plant. */
  readonly units: number
  /** Absent: as it should be. */
  readonly fault?: string
  /** No feasible state to start from, or nothing to spoil: not counted. */
  readonly unused?: string
  readonly milliseconds: number
  readonly largestBlock: number
  readonly hasReheatAndHeaters: boolean
  readonly hasPowerGiven: boolean
  readonly swaps: number
  readonly spoiling?: string
}

const nothing = {
  milliseconds: 0,
  largestBlock: 0,
  hasReheatAndHeaters: false,
  hasPowerGiven: false,
  swaps: 0,
}

/** Draws one plant and judges how it is answered. */
export function tryPlant(family: Family, seed: number, place: number): Outcome {
  return family === 'solvable' ? trySolvable(seed, place) : trySpoilt(seed, place)
}

function trySolvable(seed: number, place: number): Outcome {
  const plant = drawSolvable(seed, place)
  const units = plant.layout.units.length
  if ('unusable' in plant) return { ...nothing, place, units, unused: plant.unusable }
  const { balance, milliseconds, largestBlock } = solveFile(plant.layout, `${seed}:${place}`)
  const fault = faultOf(balance)
  return {
    place,
    units,
    ...(fault !== undefined && { fault }),
    milliseconds,
    largestBlock,
    hasReheatAndHeaters: plant.reheats > 0 && plant.heaters >= 3,
    hasPowerGiven: plant.hasPowerGiven,
    swaps: plant.swaps.length,
  }
}

function trySpoilt(seed: number, place: number): Outcome {
  const spoilt = drawSpoilt(seed, place)
  if (spoilt === undefined) return { ...nothing, place, units: 0, unused: 'nothing to spoil' }
  const start = performance.now()
  const fault = spoiltFault(spoilt, new Random(seed + 2, place))
  return {
    ...nothing,
    place,
    units: spoilt.layout.units.length,
    ...(fault !== undefined && { fault }),
    milliseconds: performance.now() - start,
    spoiling: spoilt.spoiling,
  }
}

/** The plant of an outcome as a file; what fails without hanging with as few swaps as still fail. */
export function fileOf(family: Family, seed: number, { place, fault }: Outcome): string {
  let drawn = family === 'solvable' ? drawSolvable(seed, place) : drawSpoilt(seed, place)
  if (drawn === undefined) throw new Error(`${seed}:${place} has no plant`)
  if ('swaps' in drawn && fault !== undefined && fault !== 'hangs') drawn = minimise(drawn, fault)
  return `${JSON.stringify(plantOf(drawn.layout, `Random plant ${seed}:${place}`), null, 1)}\n`
}

/** Counts of many outcomes. */
export class Tally {
  used = 0
  good = 0
  hung = 0
  slowest = 0
  private totalTime = 0
  private readonly faults = new Map<string, number[]>()
  private readonly unused = new Map<string, number>()
  private readonly spoilings = new Map<string, { used: number; good: number }>()
  /** Largest blocks by powers of two: 1, 2, 3-4, 5-8 ... */
  private readonly blocks: number[] = []
  private readonly units: number[] = []
  private large = 0
  private typical = 0
  private powered = 0

  take(outcome: Outcome): void {
    const { fault, unused, place } = outcome
    if (unused !== undefined) {
      this.unused.set(unused, (this.unused.get(unused) ?? 0) + 1)
      return
    }
    this.used++
    this.units.push(outcome.units)
    if (outcome.spoiling !== undefined) {
      const counts = this.spoilings.get(outcome.spoiling) ?? { used: 0, good: 0 }
      counts.used++
      if (fault === undefined) counts.good++
      this.spoilings.set(outcome.spoiling, counts)
    }
    if (fault === undefined) this.good++
    else {
      const name = outcome.spoiling === undefined ? fault : `${outcome.spoiling}: ${fault}`
      this.faults.set(name, [...(this.faults.get(name) ?? []), place])
      if (fault === 'hangs') this.hung++
    }
    this.totalTime += outcome.milliseconds
    this.slowest = Math.max(this.slowest, outcome.milliseconds)
    const bin = Math.ceil(Math.log2(Math.max(1, outcome.largestBlock)))
    this.blocks[bin] = (this.blocks[bin] ?? 0) + 1
    if (outcome.largestBlock > 20) this.large++
    if (outcome.hasReheatAndHeaters) this.typical++
    if (outcome.hasPowerGiven) this.powered++
  }

  /** Lines to print. */
  lines(family: Family): string[] {
    const share = (part: number): string =>
      `${((100 * part) / Math.max(1, this.used)).toFixed(2)} %`
    const sizes = this.units.toSorted((a, b) => a - b)
    const at = (part: number): number => sizes[Math.floor(part * (sizes.length - 1))] ?? 0
    const lines = [
      `${family}: ${this.good} of ${this.used} as they should be (${share(this.good)}), ${this.hung} hung`,
      `  units: least ${at(0)}, median ${at(0.5)}, most ${at(1)}; time each: mean ${(this.totalTime / Math.max(1, this.used)).toFixed(1)} ms, slowest ${this.slowest.toFixed(0)} ms`,
    ]
    for (const [reason, count] of this.unused) lines.push(`  not used, ${reason}: ${count}`)
    if (family === 'solvable') {
      lines.push(
        `  with reheat and three heaters ${share(this.typical)}, power given ${share(this.powered)}, block over 20 ${share(this.large)}`,
        `  largest block: ${Array.from(this.blocks, (count, bin) => `${bin < 2 ? bin + 1 : `${2 ** (bin - 1) + 1}-${2 ** bin}`}: ${count ?? 0}`).join(', ')}`,
      )
    }
    for (const [name, { used, good }] of this.spoilings) lines.push(`  ${name}: ${good} of ${used}`)
    for (const [fault, places] of [...this.faults].sort((a, b) => b[1].length - a[1].length)) {
      const shown = places.slice(0, 8).join(' ')
      lines.push(
        `  FAULT ${fault}: ${places.length} (places ${shown}${places.length > 8 ? ' ..' : ''})`,
      )
    }
    return lines
  }
}
