import { kindOf, type Layout, splitPath } from '../../src/document.ts'

/** What sets the load of a layout and its value at design, SI. */
export interface Load {
  /** A steam flow, or a power of the plant. */
  readonly path: string
  readonly full: number
}

const powers = ['netPower', 'grossPower', 'cyclePower', 'turbinePower']

/** The steam flow given next to what is fired, or else the plant power given; null where there is neither. */
export function loadOf(layout: Layout): Load | null {
  const groupAt = (reference: string): string | undefined => {
    const unit = layout.units.find(({ id }) => id === splitPath(reference)?.[0])
    return unit && kindOf(unit.kind)?.group
  }
  const fromHeat = layout.streams.filter(({ from }) => groupAt(from) === 'Heat')
  const toHeat = layout.streams.filter(({ to }) => groupAt(to) === 'Heat')
  for (const { id, given } of [...fromHeat, ...toHeat]) {
    if (typeof given.m === 'number') return { path: `${id}.m`, full: given.m }
  }
  for (const name of powers) {
    const full = layout.plant.given[name]
    if (typeof full === 'number') return { path: `plant.${name}`, full }
  }
  return null
}

/** Some turbine's valves have a pressure loss given, which throttling frees. */
export function canThrottle(layout: Layout): boolean {
  return layout.units.some(({ given }) => given.admissionLossFraction !== undefined)
}
