import {
  findPort,
  type Layout,
  labelOf,
  type Stream,
  splitPath,
  withinSentence,
} from '../../src/document.ts'

export interface StreamRow {
  readonly type: 'stream'
  readonly id: string
  readonly name: string
  /** Belongs to what is selected. */
  readonly chosen: boolean
}

export interface HeadRow {
  readonly type: 'head'
  readonly id: string
  readonly name: string
}

export type StateRow = StreamRow | HeadRow

const groups = { steam: 'Steam', water: 'Water', any: 'Other lines' } as const

/** What a stream carries, as the ports at its ends declare it. */
function carries(layout: Layout, stream: Stream): keyof typeof groups {
  for (const end of [stream.from, stream.to]) {
    const declared = findPort(layout, end)?.description.carries
    if (declared && declared !== 'any') return declared
  }
  return 'any'
}

/** Names that stand for one stream only: where two have the same ends, the port they leave by is added. */
function names(layout: Layout): Map<string, string> {
  const plain = layout.streams.map(({ id }) => [id, labelOf(layout, id)] as const)
  const counts = new Map<string, number>()
  for (const [, name] of plain) counts.set(name, (counts.get(name) ?? 0) + 1)
  return new Map(
    plain.map(([id, name], i) => {
      const port = splitPath(layout.streams[i]?.from ?? '')?.[1]
      return [id, (counts.get(name) ?? 0) > 1 && port ? `${name} (${port})` : name]
    }),
  )
}

/** The rows of the table of state points: what belongs to the selection first, the rest by what it carries. */
export function stateRows(layout: Layout, selected: readonly string[]): readonly StateRow[] {
  const nameOf = names(layout)
  const row = ({ id }: Stream): StreamRow => ({
    type: 'stream',
    id,
    name: nameOf.get(id) ?? id,
    chosen: chosen.some((one) => one.id === id),
  })
  const touches = ({ id, from, to }: Stream) =>
    selected.includes(id) ||
    selected.some((one) => [from, to].some((end) => end.startsWith(`${one}.`)))
  const chosen = selected.length > 0 ? layout.streams.filter(touches) : []
  const rows: StateRow[] = []
  if (chosen.length > 0) {
    const [first] = selected
    const name =
      selected.length === 1 && first !== undefined && layout.units.some(({ id }) => id === first)
        ? `At ${withinSentence(labelOf(layout, first))}`
        : 'Selected'
    rows.push({ type: 'head', id: 'head/selected', name }, ...chosen.map(row))
  }
  const rest = layout.streams.filter((stream) => !chosen.includes(stream))
  for (const group of ['steam', 'water', 'any'] as const) {
    const its = rest.filter((stream) => carries(layout, stream) === group)
    if (its.length > 0)
      rows.push({ type: 'head', id: `head/${group}`, name: groups[group] }, ...its.map(row))
  }
  return rows
}
