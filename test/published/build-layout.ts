import { checkPlant, type Given, type Layout } from '../../src/document.ts'
import { type AskedBalance, balanceOf } from '../../src/engine.ts'

type Givens = Readonly<Record<string, Given>>

/** A layout in few words; places on the sheet and labels are of no account here. */
export interface LayoutParts {
  /** `hp: ['turbine', { groupEfficiency1: 0.9 }, { admission: true }]` */
  readonly units: Readonly<
    Record<
      string,
      readonly [kind: string, given?: Givens, options?: Readonly<Record<string, boolean>>]
    >
  >
  /** `main: ['b.steam', 't.inlet', { m: 50 }]` */
  readonly streams: Readonly<Record<string, readonly [from: string, to: string, given?: Givens]>>
  readonly shafts?: Readonly<Record<string, ShaftParts>>
  readonly plant?: Givens
  /** Ambient temperature, K. */
  readonly ambient?: number
}

export interface ShaftParts {
  readonly turbines: readonly string[]
  readonly pumps?: readonly string[]
  readonly generator?: boolean
  /** Absent: without losses. */
  readonly given?: Givens
}

/** A shaft that loses nothing. */
export const lossless = {
  mechanicalEfficiency: 1,
  mechanicalLoss: 0,
  generatorEfficiency: 1,
  generatorLoss: 0,
} as const

/** The layout, read as a file's would be: throws where a file like it were unusable. */
export function layoutOf(parts: LayoutParts): Layout {
  const { ambient = 298.15, plant = { otherAuxiliary: 0 }, shafts = {} } = parts
  const layout = {
    id: 'base',
    name: 'As built',
    ambient: { T: ambient, p: 101_325 },
    units: Object.entries(parts.units).map(([id, [kind, given = {}, options]], k) => ({
      id,
      kind,
      label: id,
      at: [160 * k, 40],
      given,
      ...(options && { options }),
    })),
    streams: Object.entries(parts.streams).map(([id, [from, to, given = {}]]) => ({
      id,
      from,
      to,
      given,
    })),
    shafts: Object.entries(shafts).map(([id, shaft]) => ({
      id,
      turbines: shaft.turbines,
      pumps: shaft.pumps ?? [],
      generator: shaft.generator !== false,
      given: shaftGivens(shaft),
    })),
    plant: { given: plant },
    cases: [{ id: 'design', name: 'Design' }],
    stated: [],
  }
  const read = checkPlant({
    format: 'bledsteam/plant',
    version: 1,
    title: 'Trial',
    layouts: [layout],
  })
  if (read.outcome === 'unusable') throw new Error(read.message)
  return read.plant.layouts[0]!
}

const machineOnly = { mechanicalEfficiency: 1, mechanicalLoss: 0 } as const

const shaftGivens = ({ given, generator }: ShaftParts): Givens =>
  given ?? (generator === false ? machineOnly : lossless)

export interface Change {
  readonly set?: Readonly<Record<string, Given>>
  readonly free?: readonly string[]
}

/** The same layout with other givens: first all that is freed, then all that is set. */
export function changed(parts: LayoutParts, { set = {}, free = [] }: Change): LayoutParts {
  const given = (id: string, before: Givens): Givens => {
    const kept = Object.entries(before).filter(([name]) => !free.includes(`${id}.${name}`))
    const added = Object.entries(set)
      .filter(([path]) => path.startsWith(`${id}.`))
      .map(([path, value]) => [path.slice(id.length + 1), value] as const)
    return Object.fromEntries([...kept, ...added])
  }
  const each = <T>(list: Readonly<Record<string, T>>, change: (id: string, one: T) => T) =>
    Object.fromEntries(Object.entries(list).map(([id, one]) => [id, change(id, one)]))
  return {
    ...parts,
    units: each(parts.units, (id, [kind, before = {}, options]) =>
      options ? [kind, given(id, before), options] : [kind, given(id, before)],
    ),
    streams: each(parts.streams, (id, [from, to, before = {}]) => [from, to, given(id, before)]),
    shafts: each(parts.shafts ?? {}, (id, shaft) => ({
      ...shaft,
      given: given(id, shaftGivens(shaft)),
    })),
    plant: given('plant', parts.plant ?? { otherAuxiliary: 0 }),
  }
}

/** A number of a balance by its path; NaN where it is null, an error where there is no such key. */
export type Look = (path: string) => number

export function lookIn(balance: AskedBalance): Look {
  return (path) => {
    const [owner, name] = path.split('.') as [string, string]
    const group =
      owner === 'plant'
        ? balance.plant
        : (balance.streams[owner] ?? balance.units[owner] ?? balance.shafts[owner])
    if (group === undefined || !(name in group)) throw new Error(`there is no ${path}`)
    const value = group[name]
    return typeof value === 'number' ? value : Number.NaN
  }
}

/** Solves; throws with what the findings say where it does not. */
export function solved(layout: Layout): AskedBalance & { readonly at: Look } {
  const balance = balanceOf(layout)
  if (balance.status !== 'solved') {
    const errors = balance.findings.filter((finding) => finding.severity === 'error')
    throw new Error(
      `${balance.status}: ${errors.map(({ code, message }) => `${code}: ${message}`).join(' | ')}`,
    )
  }
  return { ...balance, at: lookIn(balance) }
}
