import { type Layout, type QuantityDescription, quantitiesOfId } from '../../src/document.ts'

/** A quantity that several of the selected things have. */
export interface CommonQuantity {
  readonly name: string
  readonly label: string
  readonly description: QuantityDescription
  readonly paths: readonly string[]
}

/** The quantities that at least two of these have, by name and what they measure; those of most first. */
export function commonQuantities(
  layout: Layout,
  ids: readonly string[],
): readonly CommonQuantity[] {
  const found = new Map<string, CommonQuantity>()
  for (const id of ids) {
    for (const { path, name, label, description } of quantitiesOfId(layout, id)) {
      const key = `${name}/${description.dimension}`
      const before = found.get(key)
      found.set(key, {
        name,
        label: before?.label ?? label,
        description: before?.description ?? description,
        paths: [...(before?.paths ?? []), path],
      })
    }
  }
  return [...found.values()]
    .filter(({ paths }) => paths.length > 1)
    .sort((a, b) => b.paths.length - a.paths.length)
}
