import {
  enthalpyAtPressureEntropy,
  enthalpyAtPressureTemperature,
  Outcome,
  RESULT_SIZE,
  STATE_SIZE,
  State,
  stateAtPressureEnthalpy,
} from '../steam/index.ts'
import {
  derivedStreamQuantities,
  derivedUnitQuantities,
  stageGroupQuantities,
} from '../units/derived-quantities.ts'
import type { TotalName } from '../units/kind.ts'
import type { PlacedUnit } from './placed-unit.ts'
import type { Results } from './results.ts'
import type { Balance } from './solve.ts'
import { solvedUnit } from './solved-unit.ts'
import { streamResults } from './states.ts'

/** What enters or leaves the plant as a whole, or is lost within. */
export type AccountItem =
  | 'fuel'
  /** Heat to the steam, where nothing says how much fuel it takes. */
  | 'heatInput'
  | 'recovered'
  | 'supply'
  | 'netPower'
  | 'otherAuxiliary'
  | 'firingLoss'
  | 'rejected'
  | 'lineLoss'
  | 'process'
  | 'unreturned'
  | 'shaftLoss'
  | 'driveLoss'
  | 'offtake'
  | 'destroyed'

/** A line of the plant's account of energy and exergy. */
export interface AccountName {
  /** Unit, shaft or `plant`. */
  readonly owner: string
  readonly item: AccountItem
  /** `destroyed` counts exergy alone. */
  readonly side: 'enters' | 'leaves' | 'destroyed'
}

/** What tables and charts need beyond the quantities of the balance, in a fixed order. */
export interface DerivedNames {
  readonly paths: readonly string[]
  readonly account: readonly AccountName[]
}

export interface Derived {
  /** In the order of `paths`, SI; NaN where something is open. */
  readonly values: Float64Array
  /** In the order of `account`: energy, exergy, W. Streams' energy counts from the ambient state. */
  readonly account: Float64Array
}

const streamNames = Object.keys(derivedStreamQuantities)
const unitNames = Object.keys(derivedUnitQuantities) as (keyof typeof derivedUnitQuantities)[]
const groupNames = Object.keys(stageGroupQuantities) as (keyof typeof stageGroupQuantities)[]

/** Names and order of what `derivedOf` gives; the same as long as the structure is. */
export function derivedNames({ model, results }: Balance): DerivedNames {
  const { layout, units } = model.system
  const paths: string[] = []
  for (const { id } of layout.streams) for (const name of streamNames) paths.push(`${id}.${name}`)
  for (const { unit } of units) for (const name of unitNames) paths.push(`${unit.id}.${name}`)
  for (const placed of units) {
    const count = groupCount(placed)
    for (let i = 1; i <= count; i++) {
      for (const name of groupNames) paths.push(`${placed.unit.id}.group${i}.${name}`)
    }
  }
  return { paths, account: accountNames(units, layout.shafts, results) }
}

/** A machine has as many groups as its efficiencies have numbers. */
function groupCount({ kind, shape }: PlacedUnit): number {
  if (!kind.stageGroups) return 0
  const each = Object.values(kind.quantities).find((one) => (one.each?.extra ?? 0) > 0)?.each
  return each ? (shape.streams[each.port] ?? 0) + each.extra : 1
}

function accountNames(
  units: readonly PlacedUnit[],
  shafts: readonly { readonly id: string }[],
  results: Results,
): AccountName[] {
  const names: AccountName[] = []
  for (const { unit, kind, connections } of units) {
    const owner = unit.id
    const add = (item: AccountItem, side: AccountName['side']) => names.push({ owner, item, side })
    switch (kind.secondLaw) {
      case 'fired':
        if (results.value(`${owner}.fuelHeat`) === null) {
          add('heatInput', 'enters')
          continue
        }
        add('fuel', 'enters')
        add('firingLoss', 'leaves')
        break
      case 'heated':
        add('recovered', 'enters')
        break
      case 'losesHeat':
        add(kind.heatPassage ? 'rejected' : 'lineLoss', 'leaves')
        break
      case 'delivers':
        add('process', 'leaves')
        add('unreturned', 'leaves')
        break
      case 'edge':
        for (const { description } of connections) {
          if (description.direction === 'out') add('supply', 'enters')
          else add('offtake', 'leaves')
        }
        break
    }
    if (kind.shaft === 'driven') add('driveLoss', 'leaves')
    if (kind.secondLaw === 'fired' || kind.secondLaw === 'losesHeat') add('destroyed', 'destroyed')
    else if (kind.secondLaw === 'adiabatic') add('destroyed', 'destroyed')
  }
  for (const { id } of shafts) names.push({ owner: id, item: 'shaftLoss', side: 'leaves' })
  names.push({ owner: 'plant', item: 'netPower', side: 'leaves' })
  names.push({ owner: 'plant', item: 'otherAuxiliary', side: 'leaves' })
  return names
}

const record = new Float64Array(STATE_SIZE)
const scalar = new Float64Array(RESULT_SIZE)

interface Ambient {
  readonly T0: number
  readonly h0: number
  readonly s0: number
}

function ambientState(T: number, p: number): Ambient {
  if (enthalpyAtPressureTemperature(scalar, 0, p, T) !== Outcome.fine) {
    return { T0: T, h0: Number.NaN, s0: Number.NaN }
  }
  const h0 = scalar[0] as number
  const fine = stateAtPressureEnthalpy(record, 0, p, h0) === Outcome.fine
  return { T0: T, h0, s0: fine ? (record[State.s] as number) : Number.NaN }
}

const width = streamResults.length
const [atM, atH, atS] = (['m', 'h', 's'] as const).map((name) => streamResults.indexOf(name)) as [
  number,
  number,
  number,
]

/** Exergy of streams, units and stage groups, and the plant's account; SI. */
export function derivedOf(balance: Balance, names: DerivedNames): Derived {
  const { model, results } = balance
  const { units, layout } = model.system
  const ambient = ambientState(layout.ambient.T, layout.ambient.p)
  const values = new Float64Array(names.paths.length)
  const stream = new Streams(results, ambient)
  let at = 0
  for (let k = 0; k < layout.streams.length; k++) {
    values[at++] = stream.exergy(k)
    values[at++] = stream.exergyFlow(k)
  }
  const onShaft = new Set(layout.shafts.flatMap(({ pumps }) => pumps))
  const account = new Map<string, [number, number]>()
  for (const placed of units) {
    const its = unitNumbers(balance, placed, stream)
    for (const name of unitNames) values[at++] = its[name]
    unitAccount(account, placed, its, onShaft.has(placed.unit.id))
  }
  for (const placed of units) at = groupValues(placed, results, values, at)
  for (const { id } of layout.shafts) {
    const lost = results.value(`${id}.exergyDestroyed`) ?? Number.NaN
    account.set(`${id}/shaftLoss`, [lost, lost])
  }
  for (const name of ['netPower', 'otherAuxiliary'] as const) {
    const power = results.value(`plant.${name}`) ?? Number.NaN
    account.set(`plant/${name}`, [power, power])
  }
  const lines = new Float64Array(2 * names.account.length)
  names.account.forEach(({ owner, item }, k) => {
    const [energy, exergy] = account.get(`${owner}/${item}`) ?? [Number.NaN, Number.NaN]
    lines[2 * k] = energy
    lines[2 * k + 1] = exergy
  })
  return { values, account: lines }
}

/** Energy and exergy of streams above the ambient state. */
class Streams {
  private readonly values: Float64Array
  private readonly ambient: Ambient
  readonly placeOf: ReadonlyMap<string, number>

  constructor(results: Results, ambient: Ambient) {
    this.values = results.states.values
    this.placeOf = results.placeOf
    this.ambient = ambient
  }

  get(k: number, column: number): number {
    return this.values[k * width + column] as number
  }

  /** J/kg */
  exergy(k: number): number {
    const { T0, h0, s0 } = this.ambient
    return this.get(k, atH) - h0 - T0 * (this.get(k, atS) - s0)
  }

  /** W; 0 where nothing flows. */
  exergyFlow(k: number): number {
    const m = this.get(k, atM)
    return m === 0 ? 0 : m * this.exergy(k)
  }

  /** W, above the ambient state. */
  energyFlow(k: number): number {
    const m = this.get(k, atM)
    return m === 0 ? 0 : m * (this.get(k, atH) - this.ambient.h0)
  }
}

interface Numbers extends Record<keyof typeof derivedUnitQuantities, number> {
  readonly entering: number
  readonly leaving: number
  readonly energyEntering: number
  readonly energyLeaving: number
  readonly destroyed: number
  readonly delivered: number
  readonly supplied: number
  /** Of a heat user: at the state of its condensate, W. */
  readonly unreturnedEnergy: number
  readonly unreturnedExergy: number
  readonly totals: Partial<Record<TotalName, number>>
}

/** Signs with which totals count as heat that a unit receives, and as power that it delivers. */
const heatSigns = {
  heatInput: 1,
  recoveredHeat: 1,
  heatRejected: -1,
  processHeat: -1,
  lineHeatLoss: -1,
} as const
const workSigns = { turbinePower: 1, pumpPower: -1 } as const

function unitNumbers(balance: Balance, placed: PlacedUnit, stream: Streams): Numbers {
  const { model, results } = balance
  const { kind, unit, connections } = placed
  const audit = results.audits.get(unit.id)
  const totals: Partial<Record<TotalName, number>> = {}
  for (const [name, expression] of Object.entries(model.system.totalsOf.get(unit.id) ?? {})) {
    const value =
      expression.kind === 'constant'
        ? expression.value
        : expression.kind === 'variable' && !model.program.lost[expression.index]
          ? (model.values[expression.index] as number)
          : Number.NaN
    totals[name as TotalName] = value
  }
  const sum = (signs: Readonly<Partial<Record<TotalName, number>>>): number => {
    let total = 0
    for (const [name, sign] of Object.entries(signs)) {
      const value = totals[name as TotalName]
      if (value !== undefined) total += sign * value
    }
    return total
  }
  let entering = 0
  let leaving = 0
  let energyEntering = 0
  let energyLeaving = 0
  let massEntering = 0
  let massLeaving = 0
  let leavingExergy = Number.NaN
  let leavingEnergy = Number.NaN
  let gain = 0
  const passage = kind.heatPassage
  const cold = passage && 'from' in passage.cold ? passage.cold : undefined
  let coldFlow = 0
  let coldOut = Number.NaN
  for (const { port, description, stream: id } of connections) {
    const k = stream.placeOf.get(id) as number
    const exergy = stream.exergyFlow(k)
    const m = stream.get(k, atM)
    if (description.direction === 'in') {
      entering += exergy
      energyEntering += stream.energyFlow(k)
      massEntering += m
    } else {
      leaving += exergy
      energyLeaving += stream.energyFlow(k)
      massLeaving += m
      leavingExergy = stream.exergy(k)
      leavingEnergy = m === 0 ? Number.NaN : stream.energyFlow(k) / m
    }
    if (port === cold?.from) {
      gain -= exergy
      coldFlow += m
    } else if (port === cold?.to) coldOut = stream.exergy(k)
  }
  // Where the heated stream mixes with what heats it, its own part of what leaves counts.
  gain += coldFlow === 0 ? 0 : coldFlow * coldOut
  const destroyed = audit?.exergyDestroyed ?? Number.NaN
  const rest = massEntering - massLeaving
  const delivers = kind.secondLaw === 'delivers' && rest !== 0
  const workDelivered = sum(workSigns)
  const numbers = {
    massImbalance: audit?.massImbalance ?? Number.NaN,
    energyImbalance: audit?.energyImbalance ?? Number.NaN,
    heatReceived: sum(heatSigns),
    workDelivered,
    entering,
    leaving,
    energyEntering,
    energyLeaving,
    destroyed,
    delivered: audit?.exergyDelivered ?? Number.NaN,
    supplied: audit?.exergySupplied ?? Number.NaN,
    unreturnedEnergy: delivers ? rest * leavingEnergy : 0,
    unreturnedExergy: delivers ? rest * leavingExergy : 0,
    totals,
  }
  return { ...numbers, exergeticEfficiency: efficiencyOf(placed, numbers, cold ? gain : undefined) }
}

function efficiencyOf(
  { kind }: PlacedUnit,
  { entering, leaving, destroyed, totals }: Omit<Numbers, 'exergeticEfficiency'>,
  coldGain: number | undefined,
): number {
  const share = (part: number, whole: number): number => (whole > 0 ? part / whole : Number.NaN)
  if (totals.turbinePower !== undefined) return share(totals.turbinePower, entering - leaving)
  if (totals.pumpPower !== undefined) return share(leaving - entering, totals.pumpPower)
  if (kind.secondLaw === 'fired') return share(leaving - entering, totals.fuelHeat ?? Number.NaN)
  if (coldGain !== undefined) return share(coldGain, coldGain + destroyed)
  if (kind.heatPassage) return Number.NaN
  if (kind.secondLaw !== 'adiabatic' && kind.secondLaw !== 'losesHeat') return Number.NaN
  return share(leaving, entering)
}

function unitAccount(
  account: Map<string, [number, number]>,
  { unit, kind }: PlacedUnit,
  its: Numbers,
  onShaft: boolean,
): void {
  const { totals } = its
  const set = (item: AccountItem, energy: number, exergy: number) =>
    account.set(`${unit.id}/${item}`, [energy, exergy])
  const fuel = totals.fuelHeat ?? Number.NaN
  switch (kind.secondLaw) {
    case 'fired':
      set('fuel', fuel, fuel)
      set('heatInput', totals.heatInput ?? Number.NaN, its.leaving - its.entering)
      // What the flue carries off is worth nothing: it is destroyed with the rest.
      set('firingLoss', fuel - (totals.heatInput ?? Number.NaN), 0)
      break
    case 'heated':
      set('recovered', totals.recoveredHeat ?? Number.NaN, its.supplied)
      break
    case 'losesHeat':
      set(kind.heatPassage ? 'rejected' : 'lineLoss', -its.heatReceived, 0)
      break
    case 'delivers':
      set('process', totals.processHeat ?? Number.NaN, its.delivered)
      set('unreturned', its.unreturnedEnergy, its.unreturnedExergy)
      break
    case 'edge':
      set('supply', its.energyLeaving, its.leaving)
      set('offtake', its.energyEntering, its.entering)
      break
  }
  if (kind.shaft === 'driven') {
    const lost = onShaft ? 0 : (totals.electricPower ?? Number.NaN) - (totals.pumpPower ?? 0)
    set('driveLoss', lost, lost)
  }
  set('destroyed', 0, its.destroyed)
}

function groupValues(
  placed: PlacedUnit,
  results: Results,
  values: Float64Array,
  start: number,
): number {
  const { kind } = placed
  const count = groupCount(placed)
  if (!kind.stageGroups || count === 0) return start
  const end = start + count * groupNames.length
  values.fill(Number.NaN, start, end)
  let at = start
  const numbers = solvedUnit(placed, results)
  for (const group of kind.stageGroups(numbers).slice(0, count)) {
    const { inletPressure: p1, inletEnthalpy: h1, outletPressure: p2, outletEnthalpy: h2 } = group
    let T1 = Number.NaN
    let T2 = Number.NaN
    let efficiencyWet = Number.NaN
    let moisture = Number.NaN
    if (stateAtPressureEnthalpy(record, 0, p1, h1) === Outcome.fine) {
      T1 = record[State.T] as number
      const s1 = record[State.s] as number
      if (enthalpyAtPressureEntropy(scalar, 0, p2, s1) === Outcome.fine) {
        const drop = h1 - (scalar[0] as number)
        if (drop !== 0) efficiencyWet = (h1 - h2) / drop
      }
    }
    if (stateAtPressureEnthalpy(record, 0, p2, h2) === Outcome.fine) {
      T2 = record[State.T] as number
      const isSubcritical = record[State.subcritical] === 1
      moisture = isSubcritical ? Math.min(1, Math.max(0, 1 - (record[State.x] as number))) : 0
    }
    const row: Record<(typeof groupNames)[number], number> = {
      flow: group.flow,
      inletPressure: p1,
      outletPressure: p2,
      pressureRatio: p1 / p2,
      inletTemperature: T1,
      outletTemperature: T2,
      efficiencyDry: numbers.quantity(group.quantities.efficiency),
      efficiencyWet,
      moisture,
      power: group.power,
      flowConstant: numbers.quantity(group.quantities.flowConstant),
    }
    for (const name of groupNames) values[at++] = row[name]
  }
  return end
}
