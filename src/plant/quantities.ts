import type { QuantityDescription, QuantityTable, Shape } from '../units/kind.ts'
import { type Catalogue, standardCatalogue } from './catalogue.ts'
import type { Given, Layout, Shaft, Stream, Unit } from './document.ts'
import { splitPath } from './paths.ts'
import { shapeOf } from './ports.ts'

/** A quantity of a unit, stream, shaft or of the plant. */
export interface QuantityEntry {
  /** `hp.groupEfficiency2`. */
  readonly path: string
  /** `groupEfficiency2`. */
  readonly name: string
  /** The description's label, with the number where there are several. */
  readonly label: string
  /** Absent where the quantity is not numbered. */
  readonly number?: number
  readonly description: QuantityDescription
}

/** The quantities of a table that exist in a shape, numbered ones expanded. */
export function entriesOf(owner: string, table: QuantityTable, shape: Shape): QuantityEntry[] {
  const entries: QuantityEntry[] = []
  for (const [name, description] of Object.entries(table)) {
    if (description.when && !description.when(shape)) continue
    const { each, label } = description
    if (!each) {
      entries.push({ path: `${owner}.${name}`, name, label, description })
      continue
    }
    const count = (shape.streams[each.port] ?? 0) + each.extra
    for (let number = 1; number <= count; number++) {
      entries.push({
        path: `${owner}.${name}${number}`,
        name: `${name}${number}`,
        label: count === 1 ? label : `${label} ${number}`,
        number,
        description,
      })
    }
  }
  return entries
}

const noShape: Shape = { options: {}, streams: {} }

/** The quantities that a unit has with its options and streams. */
export function quantitiesOf(
  layout: Layout,
  unit: Unit,
  catalogue: Catalogue = standardCatalogue,
): QuantityEntry[] {
  const kind = catalogue.kindNamed(unit.kind)
  return kind ? entriesOf(unit.id, kind.quantities, shapeOf(layout, unit, kind)) : []
}

export function quantitiesOfStream(
  stream: Pick<Stream, 'id'>,
  catalogue: Catalogue = standardCatalogue,
): QuantityEntry[] {
  return entriesOf(stream.id, catalogue.streamQuantities, noShape)
}

export function quantitiesOfShaft(
  shaft: Shaft,
  catalogue: Catalogue = standardCatalogue,
): QuantityEntry[] {
  return entriesOf(shaft.id, catalogue.shaftQuantities(shaft.generator !== false), noShape)
}

export function quantitiesOfPlant(catalogue: Catalogue = standardCatalogue): QuantityEntry[] {
  return entriesOf('plant', catalogue.plantQuantities, noShape)
}

/** What a path's first part names. */
export type Owner =
  | { readonly type: 'unit'; readonly unit: Unit }
  | { readonly type: 'stream'; readonly stream: Stream }
  | { readonly type: 'shaft'; readonly shaft: Shaft }
  | { readonly type: 'plant' }

const ownersOf = new WeakMap<Layout, ReadonlyMap<string, Owner>>()

/** Whatever bears the id; looked up once for a layout, for there are thousands of paths to look up. */
export function ownerOf(layout: Layout, id: string): Owner | undefined {
  let owners = ownersOf.get(layout)
  if (!owners) {
    const found = new Map<string, Owner>([['plant', { type: 'plant' }]])
    const add = (key: string, owner: Owner) => {
      if (!found.has(key)) found.set(key, owner)
    }
    for (const unit of layout.units) add(unit.id, { type: 'unit', unit })
    for (const stream of layout.streams) add(stream.id, { type: 'stream', stream })
    for (const shaft of layout.shafts) add(shaft.id, { type: 'shaft', shaft })
    owners = found
    ownersOf.set(layout, owners)
  }
  return owners.get(id)
}

/** The quantities of whatever bears the id; none where nothing does. */
export function quantitiesOfId(
  layout: Layout,
  id: string,
  catalogue: Catalogue = standardCatalogue,
): QuantityEntry[] {
  const owner = ownerOf(layout, id)
  switch (owner?.type) {
    case 'unit':
      return quantitiesOf(layout, owner.unit, catalogue)
    case 'stream':
      return quantitiesOfStream(owner.stream, catalogue)
    case 'shaft':
      return quantitiesOfShaft(owner.shaft, catalogue)
    case 'plant':
      return quantitiesOfPlant(catalogue)
    default:
      return []
  }
}

export interface QuantityOfOwner extends QuantityEntry {
  readonly owner: string
  readonly ownerType: Owner['type']
  /** Ready to read: 'Heater 5', 'Feed pump to heater 5', 'Plant'. */
  readonly ownerLabel: string
  readonly symbol?: string
  readonly dimension: QuantityDescription['dimension']
}

/** A quantity by its path, or nothing where the layout has no such quantity. */
export function describeQuantity(
  layout: Layout,
  path: string,
  catalogue: Catalogue = standardCatalogue,
): QuantityOfOwner | undefined {
  const [id, name] = splitPath(path) ?? []
  const owner = id === undefined ? undefined : ownerOf(layout, id)
  if (id === undefined || !owner) return undefined
  const entry = quantitiesOfId(layout, id, catalogue).find((one) => one.name === name)
  if (!entry) return undefined
  const { symbol, dimension } = entry.description
  return {
    ...entry,
    owner: id,
    ownerType: owner.type,
    ownerLabel: labelOf(layout, id),
    ...(symbol === undefined ? {} : { symbol }),
    dimension,
  }
}

/** What the file gives for a path, in the layout itself (cases apart). */
export function givenOf(layout: Layout, path: string): Given | undefined {
  const [id, name] = splitPath(path) ?? []
  if (id === undefined || name === undefined) return undefined
  const owner = ownerOf(layout, id)
  if (!owner) return undefined
  const { given } =
    owner.type === 'unit'
      ? owner.unit
      : owner.type === 'stream'
        ? owner.stream
        : owner.type === 'shaft'
          ? owner.shaft
          : layout.plant
  return Object.hasOwn(given, name) ? given[name] : undefined
}

/** 'Heater 5' within a sentence: heater 5. 'LP' and 'hp2' stay as they are. */
export function withinSentence(label: string): string {
  return /^\p{Lu}\p{Ll}/u.test(label) ? label.charAt(0).toLowerCase() + label.slice(1) : label
}

/** A name to read for whatever bears the id: a unit's label, a stream's ends, 'Plant'; else the id itself. */
export function labelOf(layout: Layout, id: string): string {
  const owner = ownerOf(layout, id)
  switch (owner?.type) {
    case 'unit':
      return owner.unit.label.trim() || id
    case 'stream': {
      const { label, from, to } = owner.stream
      if (label?.trim()) return label.trim()
      const [source, target] = [from, to].map((end) => labelOf(layout, splitPath(end)?.[0] ?? end))
      return `${source} to ${withinSentence(target ?? to)}`
    }
    case 'shaft':
      if (owner.shaft.label?.trim()) return owner.shaft.label.trim()
      return layout.shafts.length === 1
        ? 'Shaft'
        : `Shaft ${layout.shafts.indexOf(owner.shaft) + 1}`
    case 'plant':
      return 'Plant'
    default:
      return id
  }
}
