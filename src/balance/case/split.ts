import type { Layout, Unit } from '../../plant/document.ts'
import { Model } from '../model.ts'
import type { PlacedUnit } from '../placed-unit.ts'
import { type Balance, solve } from '../solve.ts'
import type { GivenTable } from './freeze.ts'
import { PressureClasses } from './pressure-classes.ts'

/** The call cannot be carried out as it stands; the message says why. */
export class UnusableCase extends Error {}

/**
 * Flow constants and efficiencies of a turbine whose groups are parts of the hardware's: the
 * machine stays what it was. At the hardware's solution, without the new bleeds, an upper part
 * keeps the group's efficiency down to the new bleed's pressure, the last part gets the efficiency
 * that meets the group's end, and all have the flow constants of the group's flow.
 */
export function splitTurbine(
  placed: PlacedUnit,
  other: PlacedUnit,
  design: Balance,
  hardware: Balance,
  table: GivenTable,
): Map<string, number> {
  const { unit } = placed
  const count = groupCount(placed)
  const baseCount = groupCount(other)
  const from = unit.options?.splitFrom
  const special = new Map<string, number>()
  if (!Array.isArray(from)) {
    if (count === baseCount) return special
    throw new UnusableCase(
      `turbine ${unit.id} has ${count} groups and its hardware ${baseCount}: options.splitFrom must say which group of the hardware each one is part of`,
    )
  }
  if (!fits(from, count, baseCount)) {
    throw new UnusableCase(
      `turbine ${unit.id}: options.splitFrom [${from.join(', ')}] must name for each of its ${count} groups one of the hardware's 1 to ${baseCount}, rising, none left out`,
    )
  }
  for (let base = 1; base <= baseCount; base++) {
    const parts = from.flatMap((group, k) => (group === base ? [k + 1] : []))
    if (parts.length === 1) {
      const value = hardware.results.value(`${unit.id}.flowConstant${base}`)
      if (value !== null) special.set(`${unit.id}.flowConstant${parts[0]!}`, value)
      continue
    }
    splitGroup(placed, other, base, parts, design, hardware, table, special)
  }
  return special
}

function groupCount(placed: PlacedUnit): number {
  return placed.connections.filter(({ description }) => description.direction === 'out').length
}

function fits(from: readonly number[], count: number, baseCount: number): boolean {
  return (
    from.length === count &&
    from[0] === 1 &&
    from[count - 1] === baseCount &&
    from.every((group, k) => k === 0 || group === from[k - 1] || group === from[k - 1]! + 1)
  )
}

function outlets(placed: PlacedUnit): string[] {
  return placed.connections
    .filter(({ description }) => description.direction === 'out')
    .map(({ stream }) => stream)
}

function splitGroup(
  placed: PlacedUnit,
  other: PlacedUnit,
  base: number,
  parts: readonly number[],
  design: Balance,
  hardware: Balance,
  table: GivenTable,
  special: Map<string, number>,
): void {
  const { unit } = placed
  const known = (path: string): number => {
    const value = hardware.results.value(path)
    if (value === null) throw new UnusableCase(`${path} of the hardware is not known`)
    return value
  }
  const baseOutlets = outlets(other)
  const inlet = other.connections.find(({ description }) => description.direction === 'in')!
  const before = base === 1 ? inlet.stream : baseOutlets[base - 2]!
  const after = baseOutlets[base - 1]!
  const flow = baseOutlets.slice(base - 1).reduce((sum, id) => sum + known(`${id}.m`), 0)
  const isLast = base === baseOutlets.length
  const loss = isLast ? known(`${unit.id}.exhaustLoss`) : 0
  const end = { p: known(`${after}.p`), h: known(`${after}.h`) - loss }
  const wetnessFactor = known(`${unit.id}.wetnessFactor`)
  const efficiency = known(`${unit.id}.groupEfficiency${base}`)
  // The valves before the first group stay before its first part.
  const admission =
    base === 1 && other.unit.options?.admission === true
      ? {
          admissionLossFraction: known(`${unit.id}.admissionLossFraction`),
          admissionEfficiency: known(`${unit.id}.admissionEfficiency`),
        }
      : undefined
  let start = { p: known(`${before}.p`), h: known(`${before}.h`) }
  parts.forEach((group, k) => {
    const isLastPart = k === parts.length - 1
    const stage = isLastPart
      ? { p: end.p, h: end.h }
      : { p: newBleedPressure(placed, group, design, table), efficiency }
    if (!(stage.p < start.p) || stage.p < end.p) {
      throw new UnusableCase(
        `turbine ${unit.id}: the new bleed ${group} at ${stage.p} Pa lies outside group ${base} of its hardware, which runs from ${start.p} to ${end.p} Pa`,
      )
    }
    const result = expand(start, flow, stage, wetnessFactor, k === 0 ? admission : undefined)
    special.set(`${unit.id}.groupEfficiency${group}`, result.efficiency)
    special.set(`${unit.id}.flowConstant${group}`, result.flowConstant)
    start = { p: stage.p, h: result.h }
  })
}

/** Given on the bleed's stream or along its equal pressures, else that of the layout's own solution. */
function newBleedPressure(
  placed: PlacedUnit,
  bleed: number,
  design: Balance,
  table: GivenTable,
): number {
  const path = `${outlets(placed)[bleed - 1]!}.p`
  const classes = new PressureClasses(design.model.system)
  for (const one of classes.givensOf(new Set([classes.of(path)]))) {
    const given = table.get(one)
    if (typeof given === 'number') return given
  }
  const solved = design.results.value(path)
  if (solved === null) throw new UnusableCase(`${path} is neither given nor solved`)
  return solved
}

interface Stage {
  readonly p: number
  readonly h?: number
  readonly efficiency?: number
}

/** One group by itself: what its efficiency or end state, and its flow constant, come to. */
function expand(
  start: { readonly p: number; readonly h: number },
  m: number,
  stage: Stage,
  wetnessFactor: number,
  admission: Readonly<Record<string, number>> | undefined,
): { readonly efficiency: number; readonly h: number; readonly flowConstant: number } {
  const turbine: Unit = {
    id: 'turbine',
    kind: 'turbine',
    label: '',
    at: [0, 0],
    ...(admission && { options: { admission: true } }),
    given: {
      wetnessFactor,
      exhaustLoss: 0,
      ...(stage.efficiency !== undefined && { groupEfficiency1: stage.efficiency }),
      ...admission,
    },
  }
  const edge = (id: string, kind: string): Unit => ({ id, kind, label: '', at: [0, 0], given: {} })
  const layout: Layout = {
    id: 'group',
    name: '',
    ambient: { T: 298.15, p: 101325 },
    units: [edge('from', 'supply'), turbine, edge('to', 'offtake')],
    streams: [
      { id: 'in', from: 'from.outlet', to: 'turbine.inlet', given: { ...start, m } },
      {
        id: 'out',
        from: 'turbine.exhaust',
        to: 'to.inlet',
        given: { p: stage.p, ...(stage.h !== undefined && { h: stage.h }) },
      },
    ],
    shafts: [
      {
        id: 'shaft',
        turbines: ['turbine'],
        pumps: [],
        given: {
          mechanicalEfficiency: 1,
          mechanicalLoss: 0,
          generatorEfficiency: 1,
          generatorLoss: 0,
        },
      },
    ],
    plant: { given: { otherAuxiliary: 0 } },
    cases: [],
    stated: [],
  }
  const { results } = solve(new Model(layout))
  const efficiency = results.value('turbine.groupEfficiency1')
  const flowConstant = results.value('turbine.flowConstant1')
  const h = results.value('out.h')
  if (efficiency === null || flowConstant === null || h === null) {
    throw new UnusableCase(`an expansion from ${start.p} to ${stage.p} Pa cannot be computed`)
  }
  return { efficiency, h, flowConstant }
}
