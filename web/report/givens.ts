import {
  type Case,
  describeQuantity,
  formatQuantity,
  type Given,
  type Givens,
  type Layout,
  type QuantityDescription,
  type UnitChoice,
} from '../../src/document.ts'

export interface GivenLine {
  readonly path: string
  readonly owner: string
  readonly quantity: string
  readonly value: string
  readonly unit: string
  /** The usual range, its source, and whether the number lies within. */
  readonly basis: string
  /** Given by the case, not by the layout. */
  readonly byCase: boolean
}

function allGivens(layout: Layout, one: Case | undefined): [string, Given, boolean][] {
  const lines: [string, Given, boolean][] = []
  const free = new Set(one?.free ?? [])
  const add = (owner: string, given: Givens) => {
    for (const [name, value] of Object.entries(given)) {
      const path = `${owner}.${name}`
      if (free.has(path) || (one?.given && Object.hasOwn(one.given, path))) continue
      lines.push([path, value, false])
    }
  }
  for (const { id, given } of layout.units) add(id, given)
  for (const { id, given } of layout.streams) add(id, given)
  for (const { id, given } of layout.shafts) add(id, given)
  add('plant', layout.plant.given)
  for (const [path, value] of Object.entries(one?.given ?? {})) lines.push([path, value, true])
  return lines
}

function basisOf(description: QuantityDescription, value: Given, units: UnitChoice): string {
  const { range, basis, dimension } = description
  if (!range) return basis ?? ''
  const [low, high] = range.map((end) => formatQuantity(end, dimension, units))
  if (!low || !high) return basis ?? ''
  const usual = `usual ${low.text} to ${high.text}${high.unit ? `\u2009${high.unit}` : ''}`
  const outside = typeof value === 'number' && (value < range[0] || value > range[1])
  return `${outside ? 'outside the ' : ''}${usual}${basis ? ` (${basis})` : ''}`
}

/** Every number that was given, with what is known of where it comes from. */
export function givenLines(
  layout: Layout,
  caseId: string | null,
  units: UnitChoice,
): readonly GivenLine[] {
  const one = layout.cases.find(({ id }) => id === caseId)
  return allGivens(layout, one).flatMap(([path, value, byCase]): GivenLine[] => {
    const found = describeQuantity(layout, path)
    if (!found) return []
    const { ownerLabel, label, description, dimension } = found
    const common = { path, owner: ownerLabel, quantity: label, byCase }
    if (typeof value === 'number') {
      const { text, unit } = formatQuantity(value, dimension, units, { digits: 'given' })
      return [{ ...common, value: text, unit, basis: basisOf(description, value, units) }]
    }
    const against = describeQuantity(layout, value.against)
    const of = against ? `${against.ownerLabel}, ${against.label.toLowerCase()}` : value.against
    const words =
      'points' in value
        ? `curve of ${value.points.length} points against ${of}`
        : `power ${value.power.exponent} of ${of}`
    return [{ ...common, value: words, unit: '', basis: basisOf(description, value, units) }]
  })
}
