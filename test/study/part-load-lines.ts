import type { Case, Given, Layout, Plant } from '../../src/document.ts'
import { balanceOfCase } from '../../src/engine.ts'

export type Control = 'sliding' | 'throttled' | 'wideOpen'

/** One layout under one load control, frozen on its own design. */
export interface PartLoad {
  readonly layout: string
  readonly control: Control
  /** What the load is set by, and its value at design: a flow, a power, or with wide open valves the pressure. */
  readonly path: string
  readonly full: number
}

export interface Line {
  readonly share: number
  readonly status: string
  /** Turbine heat rate, net, J/J: it does not depend on boiler and auxiliaries. */
  readonly heatRate: number | null
  readonly netPower: number | null
  readonly finding: string
}

/** The load controls that the layouts of a plant allow. */
export function partLoads(plant: Plant): PartLoad[] {
  return plant.layouts.flatMap((layout) => {
    const flow = firstGiven(layout, 'm')
    const power = layout.plant.given.netPower
    const load = flow ?? (typeof power === 'number' ? (['plant.netPower', power] as const) : null)
    const pressure = firstGiven(layout, 'p')
    const loads: PartLoad[] = []
    if (load) loads.push({ layout: layout.id, control: 'sliding', path: load[0], full: load[1] })
    if (load && layout.units.some(({ given }) => given.admissionLossFraction !== undefined)) {
      loads.push({ layout: layout.id, control: 'throttled', path: load[0], full: load[1] })
    }
    if (load && pressure) {
      loads.push({ layout: layout.id, control: 'wideOpen', path: pressure[0], full: pressure[1] })
    }
    return loads
  })
}

/** The first number given on the steam that leaves the boiler. */
function firstGiven(layout: Layout, name: string): readonly [string, number] | undefined {
  for (const { id, from, given } of layout.streams) {
    const value: Given | undefined = given[name]
    const source = layout.units.find((unit) => from === `${unit.id}.steam`)
    if (source?.kind === 'boiler' && typeof value === 'number') return [`${id}.${name}`, value]
  }
  return undefined
}

/** Solves a part load from the design, cold. */
export function runPartLoad(plant: Plant, load: PartLoad, share: number): Line {
  const answer = balanceOfCase(withCase(plant, load, share), load.layout, 'partload')
  if (answer.outcome === 'unusable') {
    return { share, status: 'unusable', heatRate: null, netPower: null, finding: answer.message }
  }
  const { status, findings, plant: totals } = answer.balance
  const worst = findings.find(({ severity }) => severity === 'error')
  return {
    share,
    status,
    heatRate: numberOf(totals.netTurbineHeatRate),
    netPower: numberOf(totals.netPower),
    finding: worst ? `${worst.code} ${worst.where.join(',')}` : '',
  }
}

/** The plant with a case `partload` at a share of the load. */
export function withCase(
  plant: Plant,
  { layout, control, path, full }: PartLoad,
  share: number,
): Plant {
  return {
    ...plant,
    layouts: plant.layouts.map((one) =>
      one.id === layout
        ? {
            ...one,
            cases: [
              {
                id: 'partload',
                name: 'Part load',
                frozen: true,
                ...frozenAs(one),
                loadControl: control,
                given: { [path]: full * share },
              },
            ],
          }
        : { ...one, cases: [] },
    ),
  }
}

/** What the layout's own frozen cases say beside the load: whose hardware, and what they free. */
function frozenAs({ cases }: Layout): Pick<Case, 'hardwareFrom' | 'free'> {
  const { hardwareFrom, free } = cases.find(({ frozen }) => frozen) ?? {}
  return { ...(hardwareFrom && { hardwareFrom }), ...(free && { free }) }
}

function numberOf(value: number | string | null | undefined): number | null {
  return typeof value === 'number' ? value : null
}
