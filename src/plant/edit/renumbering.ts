import { numberedPort, portNamed } from '../../units/kind.ts'
import type { Kind } from '../catalogue.ts'
import type { Layout, Options, Stream, Unit } from '../document.ts'
import { splitPath } from '../paths.ts'
import type { QuantityEntry } from '../quantities.ts'

/** How the numbers of a unit's repeated port change when a stream comes, goes or moves up. */
export interface Renumbering {
  readonly unit: string
  readonly port: string
  /** New number of an old one; undefined: the stream goes. */
  readonly to: (number: number) => number | undefined
  /** The number of the stream that comes. */
  readonly inserted?: number
  /** Streams change places: what lies between the ports (a turbine's groups) stays where it is. */
  readonly reorders?: true
}

/** The streams with these numbers go, the ones after them move up. */
export function withoutNumbers(
  unit: string,
  port: string,
  removed: ReadonlySet<number>,
): Renumbering {
  return {
    unit,
    port,
    to: (number) => {
      if (removed.has(number)) return undefined
      let before = 0
      for (const one of removed) if (one < number) before++
      return number - before
    },
  }
}

/** A stream comes at this number, the ones from there on move down. */
export function withNumber(unit: string, port: string, inserted: number): Renumbering {
  return { unit, port, inserted, to: (number) => (number < inserted ? number : number + 1) }
}

/** The stream at one number moves to another, those between close up. */
export function withMoved(unit: string, port: string, from: number, to: number): Renumbering {
  return {
    unit,
    port,
    reorders: true,
    to: (number) => {
      if (number === from) return to
      if (from < number && number <= to) return number - 1
      return to <= number && number < from ? number + 1 : number
    },
  }
}

/** The streams with their ends renumbered. Streams that go must be taken out before. */
export function renumberEnds(
  streams: readonly Stream[],
  layout: Layout,
  renumberings: readonly Renumbering[],
  kindOf: (unit: Unit) => Kind | undefined,
): readonly Stream[] {
  if (renumberings.length === 0) return streams
  const units = new Map(layout.units.map((unit) => [unit.id, unit]))
  const renumbered = (end: string): string => {
    const [id, name] = splitPath(end) ?? [end, '']
    const unit = units.get(id)
    const kind = unit && kindOf(unit)
    const found = kind && portNamed(kind.ports, name)
    const change = renumberings.find((one) => one.unit === id && one.port === found?.port)
    const number = found?.number === undefined ? undefined : change?.to(found.number)
    return number === undefined || !kind || !found
      ? end
      : `${id}.${numberedPort(kind.ports, found.port, number)}`
  }
  return streams.map((stream) => {
    const from = renumbered(stream.from)
    const to = renumbered(stream.to)
    return from === stream.from && to === stream.to ? stream : { ...stream, from, to }
  })
}

/**
 * Where the name of a numbered quantity goes; undefined: it ceases to be. With a number for each
 * stream (`share2`) it goes with the stream. With one more than there are streams it belongs to the
 * stretch before a port (`groupEfficiency2`): a stream that comes splits a stretch in two, one that
 * goes merges two. What every unit arrives with (an efficiency) still holds for the parts or the
 * whole; what was known of one stretch alone (a flow constant) does not.
 */
export function newName(entry: QuantityEntry, change: Renumbering): string | undefined {
  const { number, name, description } = entry
  if (number === undefined || description.each?.port !== change.port) return name
  const isStretch = description.each.extra > 0
  if (isStretch && change.reorders) return name
  const next = change.to(number)
  if (next === undefined) return undefined
  if (isStretch && !description.given) {
    const isSplit = number === change.inserted
    const isMerged = number > 1 && change.to(number - 1) === undefined
    if (isSplit || isMerged) return undefined
  }
  return `${name.slice(0, -String(number).length)}${next}`
}

/** For a numbered quantity that is new: the name of the stretch that was split, whose value still holds. */
export function splitFromName(entry: QuantityEntry, change: Renumbering): string | undefined {
  const { number, name, description } = entry
  if (number === undefined || number !== change.inserted) return undefined
  const { each } = description
  return each?.port === change.port && each.extra > 0 && description.given ? name : undefined
}

/** Options that are lists of numbers follow the streams; lists with an entry each grow and shrink. */
export function renumberOptions(
  options: Options | undefined,
  kind: Kind,
  change: Renumbering,
): Options | undefined {
  if (!options) return options
  let changed = options
  for (const [name, value] of Object.entries(options)) {
    const list = kind.options?.[name]?.list
    if (!list || typeof value === 'boolean') continue
    if ('numbersOf' in list && list.numbersOf === change.port) {
      const next = value.map((number) => change.to(number)).filter((number) => number !== undefined)
      changed = { ...changed, [name]: next }
    } else if ('each' in list && list.each.port === change.port) {
      changed = { ...changed, [name]: renumberedEntries(value, change, list.each.extra > 0) }
    }
  }
  return changed
}

/** A split stretch has its entry twice, a merged one loses the first of the two. */
function renumberedEntries(
  entries: readonly number[],
  change: Renumbering,
  isStretch: boolean,
): readonly number[] {
  if (isStretch && change.reorders) return entries
  const next: number[] = []
  entries.forEach((entry, i) => {
    const number = change.to(i + 1)
    if (number !== undefined) next[number - 1] = entry
  })
  const { inserted } = change
  const split = inserted === undefined ? undefined : entries[inserted - 1]
  if (isStretch && inserted !== undefined && split !== undefined) next[inserted - 1] = split
  // Lists shorter than the ports leave holes, which close.
  return next.filter((entry) => entry !== undefined)
}
