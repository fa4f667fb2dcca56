import {
  type Dimension,
  kindOf,
  type Layout,
  labelOf,
  type QuantityEntry,
  quantitiesOf,
  quantitiesOfPlant,
} from '../../src/document.ts'

export interface ValueRow {
  readonly path: string
  readonly label: string
  readonly dimension: Dimension
  readonly first: number | null
  readonly second: number | null
}

export interface ValueGroup {
  readonly name: string
  readonly rows: readonly ValueRow[]
}

/** Values that differ by less than this part of the larger are the same. */
const same = 1e-7

/** What is asked first of two plants; the other totals after. */
const chief = ['netPower', 'unitHeatRate', 'netTurbineHeatRate', 'unitEfficiency', 'fuelHeat'].map(
  (name) => `plant.${name}`,
)

function ofPlant(): readonly QuantityEntry[] {
  const all = quantitiesOfPlant()
  return [
    ...chief.flatMap((path) => all.find((entry) => entry.path === path) ?? []),
    ...all.filter(({ path }) => !chief.includes(path)),
  ]
}

type Read = (path: string) => number | null

/**
 * The quantities that differ between two balances: of the plant, of each heater and of each machine
 * that drives a shaft. A unit that only one of them has stands there with one value.
 */
export function compareValues(
  layouts: readonly [Layout, Layout],
  reads: readonly [Read, Read],
): ValueGroup[] {
  const rowsOf = (entries: readonly QuantityEntry[]): ValueRow[] =>
    entries
      .map(({ path, label, description }) => ({
        path,
        label,
        dimension: description.dimension,
        first: reads[0](path),
        second: reads[1](path),
      }))
      .filter(({ first, second }) => differ(first, second))
  const groups: ValueGroup[] = [{ name: 'Plant', rows: rowsOf(ofPlant()) }]
  const seen = new Set<string>()
  for (const layout of layouts) {
    for (const unit of layout.units) {
      const kind = kindOf(unit.kind)
      if (seen.has(unit.id) || (kind?.group !== 'Heaters' && kind?.shaft !== 'driving')) continue
      seen.add(unit.id)
      const other = layouts[1].units.find(({ id }) => id === unit.id)
      const entries = new Map(
        [...quantitiesOf(layout, unit), ...(other ? quantitiesOf(layouts[1], other) : [])].map(
          (entry) => [entry.path, entry],
        ),
      )
      groups.push({ name: labelOf(layout, unit.id), rows: rowsOf([...entries.values()]) })
    }
  }
  return groups.filter(({ rows }) => rows.length > 0)
}

function differ(first: number | null, second: number | null): boolean {
  if (first === null || second === null) return first !== second
  return Math.abs(first - second) > same * Math.max(Math.abs(first), Math.abs(second))
}
