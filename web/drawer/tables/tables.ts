import {
  derivedStreamQuantities,
  derivedUnitQuantities,
  findPort,
  kindOf,
  labelOf,
  phaseNames,
  plantQuantities,
  portsOf,
  type QuantityDescription,
  type QuantityTable,
  quantitiesOf,
  stageGroupQuantities,
  streamQuantities,
  type Unit,
} from '../../../src/document.ts'
import type { HeatProfile } from '../../../src/messages.ts'
import { energyAccount } from '../../chart/energy-bars.ts'
import { stateRows } from '../stream-rows.ts'
import { unitBalance, unitStreams } from '../unit-balances.ts'
import { readerOf, type Table, type TableColumn, type TableSource, unitColumn } from './table.ts'

type Cells = readonly (string | number | null)[]

const word = (id: string, label: string, help?: string): TableColumn => ({
  id,
  label,
  ...(help ? { help } : {}),
})

function number(
  id: string,
  {
    label,
    symbol,
    dimension,
    help,
  }: Pick<QuantityDescription, 'label' | 'dimension' | 'help'> & {
    readonly symbol?: string
  },
  more: Partial<TableColumn> = {},
): TableColumn {
  return { id, label, ...(symbol ? { symbol } : {}), dimension, help, ...more }
}

const volume = {
  label: 'Specific volume',
  symbol: 'v',
  dimension: 'specificVolume',
  help: 'Volume per mass.',
} as const

export const phaseWords: Readonly<Record<(typeof phaseNames)[number], string>> = {
  none: '–',
  liquid: 'liquid',
  wet: 'wet',
  vapour: 'steam',
  supercritical: 'supercritical',
}

const onDemand = new Set(['superheat', 'subcooling'])

const stateColumns: readonly TableColumn[] = [
  word('name', 'Stream'),
  word('id', 'Id'),
  ...Object.entries(streamQuantities as QuantityTable).map(([name, description]) =>
    number(name, description, { field: true, ...(onDemand.has(name) ? { hidden: true } : {}) }),
  ),
  number('v', volume),
  number('exergy', derivedStreamQuantities.exergy),
  number('exergyFlow', derivedStreamQuantities.exergyFlow, { hidden: true }),
  word('phase', 'Phase'),
]

/** Every stream with its flow and state. */
export function stateTable(source: TableSource): Table {
  const { layout, names, balance } = source
  const read = readerOf(source)
  const rows = stateRows(layout, []).flatMap((row) => {
    if (row.type === 'head') return []
    const { id, name } = row
    const at = names?.streams.indexOf(id) ?? -1
    const phase = phaseNames[balance?.phases[at] ?? 0] ?? 'none'
    const x = read(`${id}.x`)
    const saturated = phase === 'wet' && (x === 0 || x === 1)
    const words = saturated ? (x === 0 ? 'sat. liquid' : 'sat. steam') : phaseWords[phase]
    const cells: Cells = stateColumns.map((column) => {
      if (column.id === 'name') return name
      if (column.id === 'id') return id
      if (column.id === 'phase') return words
      return read(`${id}.${column.id}`)
    })
    return [{ key: id, owner: id, cells }]
  })
  return { name: 'states', title: 'State points', columns: stateColumns, rows }
}

const mass = (label: string, help: string) => ({ label, dimension: 'massFlow', help }) as const
const energy = (label: string, help: string) => ({ label, dimension: 'heatFlow', help }) as const

const unitColumns: readonly TableColumn[] = [
  word('name', 'Unit'),
  word('id', 'Id'),
  word('kind', 'Kind'),
  number('massIn', mass('Mass in', 'Flow of the streams that enter.')),
  number('massOut', mass('Mass out', 'Flow of the streams that leave.')),
  number('massImbalance', derivedUnitQuantities.massImbalance, { hidden: true }),
  number('energyIn', energy('Energy in', 'Flow times enthalpy of the streams that enter.')),
  number('energyOut', energy('Energy out', 'Flow times enthalpy of the streams that leave.')),
  number('heatReceived', derivedUnitQuantities.heatReceived),
  number('workDelivered', derivedUnitQuantities.workDelivered),
  number('energyImbalance', derivedUnitQuantities.energyImbalance),
  number('entropyGenerated', {
    label: 'Entropy generated',
    symbol: 'Sgen',
    dimension: 'entropyFlow',
    help: 'Entropy of what leaves less that of what enters, with the heat that crosses the boundary.',
  }),
  number('exergyDestroyed', {
    label: 'Exergy destroyed',
    symbol: 'Ed',
    dimension: 'power',
    help: 'Work that is lost for good, at the ambient temperature.',
  }),
  number('exergyShare', {
    label: 'Share of exergy entering',
    dimension: 'ratio',
    help: 'Exergy destroyed over all exergy that enters the plant.',
  }),
  number('exergeticEfficiency', derivedUnitQuantities.exergeticEfficiency),
]

/** Mass, energy, entropy and exergy of every unit, with what does not close. */
export function unitTable(source: TableSource): Table {
  const { layout } = source
  const read = readerOf(source)
  const entering = energyAccount(source)?.exergyEntering ?? Number.NaN
  const share = (id: string): number | null => {
    const destroyed = read(`${id}.exergyDestroyed`)
    return destroyed !== null && entering > 0 ? destroyed / entering : null
  }
  const rows = unitStreams(layout).map((its) => {
    const { id, label } = its.unit
    const { massIn, massOut, energyIn, energyOut } = unitBalance(its, read)
    const own: Readonly<Record<string, string | number | null>> = {
      name: label || id,
      id,
      kind: its.kindLabel,
      massIn: its.entering.length > 0 ? massIn : null,
      massOut: its.leaving.length > 0 ? massOut : null,
      energyIn: its.entering.length > 0 ? energyIn : null,
      energyOut: its.leaving.length > 0 ? energyOut : null,
      exergyShare: share(id),
    }
    const cells = unitColumns.map((column) =>
      column.id in own ? (own[column.id] ?? null) : read(`${id}.${column.id}`),
    )
    return { key: id, owner: id, cells }
  })
  const shafts = layout.shafts.map(({ id }) => ({
    key: id,
    owner: id,
    cells: unitColumns.map((column) => {
      if (column.id === 'name') return labelOf(layout, id)
      if (column.id === 'id') return id
      if (column.id === 'kind') return 'Shaft'
      if (column.id === 'exergyShare') return share(id)
      return column.id === 'exergyDestroyed' ? read(`${id}.exergyDestroyed`) : null
    }),
  }))
  return { name: 'units', title: 'Units', columns: unitColumns, rows: [...rows, ...shafts] }
}

/** Units of some kinds with all quantities that these declare, under one column where they are alike. */
function declaredColumns(
  source: TableSource,
  units: readonly Unit[],
  isShown: (description: QuantityDescription) => boolean,
): TableColumn[] {
  const columns = new Map<string, TableColumn>()
  // Where kinds word a quantity differently, the words of those with most units hold.
  const kindsByCount = [...units].sort(
    (a, b) =>
      countOf(units, b.kind) - countOf(units, a.kind) || units.indexOf(a) - units.indexOf(b),
  )
  for (const unit of kindsByCount) {
    for (const { name, description, number: numbered } of quantitiesOf(source.layout, unit)) {
      if (numbered !== undefined || columns.has(name)) continue
      columns.set(
        name,
        number(name, description, {
          field: true,
          ...(isShown(description) ? {} : { hidden: true }),
        }),
      )
    }
  }
  return [...columns.values()]
}

const countOf = (units: readonly Unit[], kind: string): number =>
  units.filter((unit) => unit.kind === kind).length

/** The streams at a port of a kind's table, all numbers of a repeated one. */
function streamsAt(source: TableSource, unit: Unit, port: string): string[] {
  return portsOf(source.layout, unit).flatMap(({ name, stream }) =>
    stream !== undefined && findPort(source.layout, `${unit.id}.${name}`)?.port === port
      ? [stream]
      : [],
  )
}

function unitsWith(source: TableSource, test: (unit: Unit) => boolean): readonly Unit[] {
  return source.layout.units.filter(test)
}

function hasQuantity(source: TableSource, unit: Unit, name: string): boolean {
  return quantitiesOf(source.layout, unit).some((entry) => entry.name === name)
}

const temperature = (label: string, help: string) =>
  ({ label, dimension: 'temperature', help }) as const

/** Saturation temperature of the shell as the profile has it, K. */
function saturationOf(profile: HeatProfile | undefined): number | null {
  const condensing = profile?.zones.find(({ name }) => name === 'condensing')
  if (!profile || !condensing) return null
  for (let i = 0; i < profile.hot.length; i += 2) {
    const at = profile.hot[i] as number
    if (at >= condensing.from && at <= condensing.to) return profile.hot[i + 1] as number
  }
  return null
}

const heatDimensions = new Set(['heatFlow', 'temperatureDifference', 'conductance', 'pressure'])

/** Everything that passes heat on: heaters, condensers, exchangers. */
export function heaterTable(source: TableSource): Table {
  const { balance } = source
  const read = readerOf(source)
  const units = unitsWith(source, ({ kind }) => kindOf(kind)?.heatPassage !== undefined)
  const rate = read('plant.steamRate')
  const net = read('plant.netPower')
  const mainSteam = rate !== null && net !== null ? rate * net : null
  const own: TableColumn[] = [
    word('name', 'Unit'),
    word('id', 'Id'),
    number(
      'steamFlow',
      mass('Heating flow', 'Flow of what gives the heat, drains that join apart.'),
    ),
    number('steamShare', {
      label: 'Share of main steam',
      dimension: 'ratio',
      help: 'Heating flow over the steam of all boilers.',
    }),
    number('steamT', temperature('Heating inlet', 'Temperature of what gives the heat.')),
    number('saturationT', temperature('Saturation', 'Saturation temperature of the shell.')),
    number('inletT', temperature('Inlet', 'Temperature of the heated side where it enters.')),
    number('outletT', temperature('Outlet', 'Temperature of the heated side where it leaves.')),
    number('drainT', temperature('Drain', 'Temperature of what gave the heat where it leaves.')),
    number('rise', {
      label: 'Rise',
      dimension: 'temperatureDifference',
      help: 'Outlet less inlet temperature of the heated side.',
    }),
    number('closest', {
      label: 'Closest approach',
      dimension: 'temperatureDifference',
      help: 'Least difference between the two sides anywhere along the surface.',
    }),
  ]
  const declared = declaredColumns(
    source,
    units,
    ({ dimension, usual, given }) => heatDimensions.has(dimension) && !(usual === 0 && given),
  )
  const columns = [...own.slice(0, 2), ...declared, ...own.slice(2)]
  const mean = (streams: readonly string[], name: string): number | null =>
    streams.length === 1 ? read(`${streams[0]}.${name}`) : null
  const rows = units.map((unit) => {
    const { id } = unit
    const passage = kindOf(unit.kind)?.heatPassage
    const profile = balance?.profiles.find((one) => one.unit === id)
    const hot = passage ? streamsAt(source, unit, passage.hot.from) : []
    const flows = hot.map((stream) => read(`${stream}.m`))
    const steamFlow = flows.includes(null)
      ? null
      : flows.reduce((sum: number, flow) => sum + (flow ?? 0), 0)
    const cold = passage?.cold
    const [inletT, outletT] =
      cold && 'from' in cold
        ? [
            mean(streamsAt(source, unit, cold.from), 'T'),
            mean(streamsAt(source, unit, cold.to), 'T'),
          ]
        : cold
          ? [
              read(`${id}.${cold.inletTemperature}`),
              sumOf(read(`${id}.${cold.inletTemperature}`), read(`${id}.${cold.rise}`)),
            ]
          : [null, null]
    const numbers: Readonly<Record<string, string | number | null>> = {
      name: unit.label || id,
      id,
      steamFlow,
      steamShare: steamFlow !== null && mainSteam ? steamFlow / mainSteam : null,
      steamT: mean(hot, 'T'),
      saturationT: saturationOf(profile),
      inletT,
      outletT,
      drainT: passage ? mean(streamsAt(source, unit, passage.hot.to), 'T') : null,
      rise: inletT !== null && outletT !== null ? outletT - inletT : null,
      closest: profile?.closest ? profile.closest.hot - profile.closest.cold : null,
    }
    const cells = columns.map((column) =>
      column.id in numbers
        ? (numbers[column.id] ?? null)
        : hasQuantity(source, unit, column.id)
          ? read(`${id}.${column.id}`)
          : null,
    )
    return { key: id, owner: id, cells }
  })
  return { name: 'heaters', title: 'Heaters and condensers', columns, rows }
}

const sumOf = (a: number | null, b: number | null): number | null =>
  a === null || b === null ? null : a + b

const groupColumns: readonly TableColumn[] = [
  word('name', 'Stage group'),
  word('id', 'Unit id'),
  ...Object.entries(stageGroupQuantities as QuantityTable).map(([name, description]) =>
    number(name, description),
  ),
]

/** The stage groups of all machines. */
export function groupTable(source: TableSource): Table {
  const read = readerOf(source)
  const paths = new Set(source.names?.derived.paths ?? [])
  const rows = source.layout.units.flatMap(({ id, label }) => {
    const its: Table['rows'][number][] = []
    for (let i = 1; paths.has(`${id}.group${i}.flow`); i += 1) {
      const cells = groupColumns.map((column) =>
        column.id === 'name'
          ? `${label || id}, group ${i}`
          : column.id === 'id'
            ? id
            : read(`${id}.group${i}.${column.id}`),
      )
      its.push({ key: `${id}/${i}`, owner: id, cells })
    }
    return its
  })
  return {
    name: 'groups',
    title: 'Stage groups',
    columns: groupColumns,
    rows,
    note: 'Efficiencies count from each group’s own inlet state. Wet: as the group works, with Baumann’s factor on the wet part; dry: before it. The power of the first group carries the admission loss, that of the last the exhaust loss.',
  }
}

const shortDimensions = new Set(['power', 'ratio', 'pressureDifference', 'volumeFlow', 'length'])

/** What a shaft or a motor drives. */
export function pumpTable(source: TableSource): Table {
  const read = readerOf(source)
  const units = unitsWith(source, ({ kind }) => kindOf(kind)?.shaft === 'driven')
  const own: TableColumn[] = [
    word('name', 'Pump'),
    word('id', 'Id'),
    number('m', mass('Flow', 'Mass flow.')),
    number('inletP', {
      label: 'Suction pressure',
      dimension: 'pressure',
      help: 'Where it enters.',
    }),
    number('outletP', {
      label: 'Discharge pressure',
      dimension: 'pressure',
      help: 'Where it leaves.',
    }),
    number('inletT', temperature('Suction temperature', 'Where it enters.')),
    number('outletT', temperature('Discharge temperature', 'Where it leaves.')),
  ]
  const declared = declaredColumns(source, units, ({ dimension }) => shortDimensions.has(dimension))
  const columns = [...own, ...declared]
  const ends = new Map(unitStreams(source.layout).map((its) => [its.unit.id, its]))
  const rows = units.map((unit) => {
    const { id } = unit
    const inlet = ends.get(id)?.entering[0]
    const outlet = ends.get(id)?.leaving[0]
    const numbers: Readonly<Record<string, string | number | null>> = {
      name: unit.label || id,
      id,
      m: read(`${inlet}.m`),
      inletP: read(`${inlet}.p`),
      outletP: read(`${outlet}.p`),
      inletT: read(`${inlet}.T`),
      outletT: read(`${outlet}.T`),
    }
    const cells = columns.map((column) =>
      column.id in numbers ? (numbers[column.id] ?? null) : read(`${id}.${column.id}`),
    )
    return { key: id, owner: id, cells }
  })
  return { name: 'pumps', title: 'Pumps', columns, rows }
}

/** Heat rates are read in both of these, whatever the units in force. */
const heatRateUnits = ['kJ/kWh', 'Btu/kWh'] as const

/** Totals of the plant, each with what it is counted by. */
export function totalsTable(source: TableSource): Table {
  const read = readerOf(source)
  const rows = Object.entries(plantQuantities as QuantityTable).flatMap(
    ([name, { label, symbol, dimension, help }]): Table['rows'][number][] => {
      const cells: Cells = [label, symbol ?? '', read(`plant.${name}`), null, help]
      const row = { key: name, owner: 'plant', cells, dimension }
      return dimension === 'heatRate'
        ? heatRateUnits.map((unit) => ({ ...row, key: `${name}/${unit}`, unit }))
        : [row]
    },
  )
  return {
    name: 'totals',
    title: 'Plant totals',
    columns: [
      word('name', 'Total'),
      word('symbol', 'Symbol'),
      word('value', 'Value'),
      word(unitColumn, 'Unit'),
      word('basis', 'Basis'),
    ],
    rows,
    note: 'Fuel heat, boiler efficiency and what follows from them count by the heating value (LHV or HHV) that the given boiler efficiency is stated on.',
  }
}

/** The plant's account of energy and exergy: what enters, leaves and is destroyed. */
export function accountTable(source: TableSource): Table {
  const account = energyAccount(source)
  const rows: Table['rows'][number][] = []
  if (account) {
    const side = (name: string, bars: typeof account.energy, isExergy: boolean) => {
      for (const { owner, item, label, value, share } of bars) {
        const cells: Cells = [label, name, isExergy ? null : value, isExergy ? value : null, share]
        rows.push({ key: `${name}/${isExergy}/${owner}/${item}`, owner, cells })
      }
    }
    side('enters', account.entering, false)
    side('leaves', account.energy, false)
    side('leaves', account.exergyLeaving, true)
    side('destroyed', account.destroyed, true)
  }
  return {
    name: 'account',
    title: 'Energy and exergy',
    columns: [
      word('name', 'What'),
      word('side', 'Side'),
      number('energy', energy('Energy', 'Energy flow, streams above the ambient state.')),
      number('exergy', { label: 'Exergy', dimension: 'power', help: 'Exergy flow.' }),
      number('share', { label: 'Share', dimension: 'ratio', help: 'Of all that enters.' }),
    ],
    rows,
    note: 'The exergy of the fuel is taken equal to its heat on the stated basis.',
  }
}

/** All tables, in the order of a report. */
export const tableBuilders = {
  totals: totalsTable,
  states: stateTable,
  units: unitTable,
  heaters: heaterTable,
  groups: groupTable,
  pumps: pumpTable,
  account: accountTable,
} as const
