import type { Given, Layout } from '../plant/document.ts'
import { describeQuantity, labelOf } from '../plant/quantities.ts'
import type { Dimension } from '../quantity/dimension.ts'
import { formatQuantity } from '../quantity/format-quantity.ts'
import type { Finding, Remedy } from './answer.ts'
import type { Model } from './model.ts'

/** What a user would know first leads: flows, pressures, temperatures, approaches, powers. */
const rank: Partial<Record<Dimension, number>> = {
  massFlow: 0,
  pressure: 1,
  temperature: 2,
  temperatureDifference: 3,
  power: 4,
  heatFlow: 5,
  dryness: 6,
  ratio: 7,
  pressureDifference: 8,
  specificEnthalpy: 11,
}

/** Words for findings: names of units and quantities, values in the usual units. */
export class Wording {
  private readonly layout: Layout

  constructor(layout: Layout) {
    this.layout = layout
  }

  /** A unit's label, or a stream as where it runs from and to. */
  name(id: string): string {
    return labelOf(this.layout, id)
  }

  /** `Boiler: pressure loss`. */
  quantity(path: string): string {
    const found = describeQuantity(this.layout, path)
    if (found === undefined) return path
    const label = found.label.charAt(0).toLowerCase() + found.label.slice(1)
    return `${this.name(path.slice(0, path.indexOf('.')))}, ${label}`
  }

  value(value: number, dimension: Dimension): string {
    const { text, unit } = formatQuantity(value, dimension, 'metric')
    return unit === '' ? text : `${text} ${unit}`
  }
}

/**
 * Paths in the order in which a user would know them: flows, pressures, temperatures, approaches,
 * powers; of equals the earlier in the layout. What a unit usually has given comes first where
 * something must be given, and last where something must go.
 */
export function ranked(model: Model, paths: readonly string[], usualFirst: boolean): string[] {
  const order = new Map(paths.map((path, k) => [path, k]))
  const rankOf = (path: string): number => {
    const index = model.system.indexOf.get(path)
    if (index === undefined) return path.endsWith('.T') ? 2 : 12
    const { given, dimension } = model.system.variables[index]!.description
    if (given) return usualFirst ? -1 : 20
    return rank[dimension] ?? 10
  }
  return [...paths].sort((a, b) => rankOf(a) - rankOf(b) || order.get(a)! - order.get(b)!)
}

export function error(
  code: string,
  where: readonly string[],
  quantities: readonly string[],
  message: string,
  more: Partial<Finding> = {},
): Finding {
  return { severity: 'error', code, where, quantities, message, ...more }
}

export function remedies(
  action: Remedy['action'],
  paths: readonly string[],
  suggestion: (path: string) => Given | undefined,
): Remedy[] {
  return paths.map((path) => {
    const value = suggestion(path)
    return value === undefined ? { action, path } : { action, path, value }
  })
}

/** Ids that paths belong to, each once, in order. */
export function ownersOf(paths: readonly string[]): string[] {
  return [...new Set(paths.map((path) => path.slice(0, path.indexOf('.'))))]
}
