import {
  kindOf,
  type Layout,
  labelOf,
  type OptionDescription,
  ownerOf,
  portsOf,
  type QuantityEntry,
  quantitiesOfId,
  type Unit,
  withinSentence,
} from '../../src/document.ts'

/** A stream at one of a unit's ports, or a unit at one of a stream's ends. */
export interface Neighbour {
  readonly place: string
  readonly id: string | undefined
  readonly name: string
}

export interface CardOption {
  readonly name: string
  readonly description: OptionDescription
  readonly on: boolean
}

/** All that a card shows of whatever is selected, apart from the numbers themselves. */
export interface CardContent {
  readonly id: string
  readonly title: string
  /** The title is the user's to change. */
  readonly renamable: boolean
  /** What it is: 'turbine, id hp'. */
  readonly about: string
  readonly help: string
  /** The quantity whose origin stands at the card's foot until another is pointed at. */
  readonly chief: string | undefined
  readonly entries: readonly QuantityEntry[]
  readonly options: readonly CardOption[]
  readonly neighbours: readonly Neighbour[]
}

function optionsOf(unit: Unit): CardOption[] {
  return Object.entries(kindOf(unit.kind)?.options ?? {})
    .filter(([, description]) => description.list === undefined)
    .map(([name, description]) => ({ name, description, on: unit.options?.[name] === true }))
}

/** The card of a unit, stream, shaft or the plant; undefined where nothing bears the id. */
export function cardContent(layout: Layout, id: string): CardContent | undefined {
  const owner = ownerOf(layout, id)
  if (!owner) return undefined
  const common = {
    id,
    title: labelOf(layout, id),
    entries: quantitiesOfId(layout, id),
    renamable: true,
    help: '',
    chief: undefined as string | undefined,
    options: [],
    neighbours: [],
  }
  switch (owner.type) {
    case 'unit': {
      const kind = kindOf(owner.unit.kind)
      return {
        ...common,
        about: withinSentence(kind?.label ?? owner.unit.kind),
        help: kind?.help ?? '',
        chief: kind?.chief === undefined ? common.entries[0]?.path : `${id}.${kind.chief}`,
        options: optionsOf(owner.unit),
        neighbours: portsOf(layout, owner.unit)
          .filter(({ stream, description }) => stream !== undefined || !description.optional)
          .filter(
            ({ stream, number }) => stream !== undefined || number === undefined || number === 1,
          )
          .map(({ name, stream }) => ({
            place: name,
            id: stream,
            name: stream === undefined ? 'not connected' : labelOf(layout, stream),
          })),
      }
    }
    case 'stream': {
      const ends = [
        ['From', owner.stream.from],
        ['To', owner.stream.to],
      ] as const
      return {
        ...common,
        about: `stream ${id}`,
        chief: `${id}.h`,
        neighbours: ends.map(([place, end]) => {
          const [unit = end, port = ''] = end.split('.')
          return { place, id: unit, name: `${labelOf(layout, unit)}, ${port}` }
        }),
      }
    }
    case 'shaft': {
      const { turbines, pumps } = owner.shaft
      return {
        ...common,
        chief: owner.shaft.generator === false ? undefined : `${id}.generatorPower`,
        about: owner.shaft.generator === false ? 'shaft without generator' : 'shaft with generator',
        neighbours: [
          ...turbines.map((unit) => ({ place: 'Turbine', id: unit, name: labelOf(layout, unit) })),
          ...pumps.map((unit) => ({ place: 'Pump', id: unit, name: labelOf(layout, unit) })),
        ],
      }
    }
    case 'plant':
      return { ...common, renamable: false, about: 'the whole plant', chief: 'plant.netPower' }
  }
}
