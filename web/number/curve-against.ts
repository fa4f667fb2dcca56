import {
  describeQuantity,
  type Layout,
  ownerOf,
  plantQuantities,
  portsOf,
  quantitiesOfId,
  splitPath,
} from '../../src/document.ts'

/** What a curve most often depends on: quantities of the thing itself, flows and states at its ports, loads. */
export function likelyAgainst(layout: Layout, path: string): readonly string[] {
  const [id = ''] = splitPath(path) ?? []
  const owner = ownerOf(layout, id)
  const own = quantitiesOfId(layout, id).map((entry) => entry.path)
  const streams =
    owner?.type === 'unit'
      ? portsOf(layout, owner.unit).flatMap(({ stream }) => (stream === undefined ? [] : [stream]))
      : []
  const states = streams.flatMap((stream) => ['m', 'p', 'T'].map((name) => `${stream}.${name}`))
  const totals = Object.keys(plantQuantities).map((name) => `plant.${name}`)
  return [...new Set([...own, ...states, ...totals])].filter(
    (one) => one !== path && describeQuantity(layout, one) !== undefined,
  )
}
