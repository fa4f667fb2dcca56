import type { Catalogue } from './catalogue.ts'
import type { Layout } from './document.ts'
import { suggestion } from './nearest-name.ts'
import { splitPath } from './paths.ts'
import {
  ownerOf,
  quantitiesOf,
  quantitiesOfPlant,
  quantitiesOfShaft,
  quantitiesOfStream,
} from './quantities.ts'

/** The paths of a layout, to check others against. */
export interface KnownPaths {
  readonly has: (path: string) => boolean
  /** Why there is no such path, as sentences, with the nearest that there is. */
  readonly why: (path: string) => string
}

/** The paths of all quantities that a layout's units, streams, shafts and plant have. */
export function knownPaths(layout: Layout, catalogue: Catalogue): KnownPaths {
  const entries = [
    ...layout.units.map((unit) => [unit.id, quantitiesOf(layout, unit, catalogue)] as const),
    ...layout.streams.map((stream) => [stream.id, quantitiesOfStream(stream, catalogue)] as const),
    ...layout.shafts.map((shaft) => [shaft.id, quantitiesOfShaft(shaft, catalogue)] as const),
    ['plant', quantitiesOfPlant(catalogue)] as const,
  ]
  const names = new Map(entries.map(([id, list]) => [id, list.map(({ name }) => name)]))
  const known = new Set(entries.flatMap(([, list]) => list.map(({ path }) => path)))
  return {
    has: (path) => known.has(path),
    why: (path) => {
      const parts = splitPath(path)
      if (!parts) return `${path} is no path: it lacks the dot between id and quantity.`
      const [id, name] = parts
      const among = names.get(id)
      if (!among) {
        const nearest = suggestion(id, names.keys())
        return `layout ${layout.id} has no unit, stream or shaft ${id}.${nearest}`
      }
      const why = whyLacking(layout, id, name, catalogue)
      return why ?? `${id} has no quantity ${name}.${suggestion(name, among)}`
    },
  }
}

/** Why a quantity is missing that its owner would have in another form; nothing where it never has it. */
function whyLacking(
  layout: Layout,
  id: string,
  name: string,
  catalogue: Catalogue,
): string | undefined {
  const owner = ownerOf(layout, id)
  if (owner?.type === 'shaft' && Object.hasOwn(catalogue.shaftQuantities(true), name)) {
    return `shaft ${id} has no generator, and so no ${name}.`
  }
  if (owner?.type !== 'unit') return undefined
  const table = catalogue.kindNamed(owner.unit.kind)?.quantities ?? {}
  const bare = name.replace(/\d+$/, '')
  const declared = Object.hasOwn(table, name)
    ? !table[name]?.each
    : Object.hasOwn(table, bare) && table[bare]?.each && bare !== name
  return declared
    ? `${id} (${owner.unit.kind}) has no ${name} with the options and streams that it has.`
    : undefined
}
