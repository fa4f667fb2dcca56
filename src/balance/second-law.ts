import type { Expression } from '../equations/expression/index.ts'
import type { SecondLawRole, TotalName } from '../units/kind.ts'
import type { Model } from './model.ts'
import type { PlacedUnit } from './placed-unit.ts'
import { type States, streamResults } from './states.ts'

/** Second law and closure of one unit, SI; NaN where it is not determined or has no meaning. */
export interface UnitAudit {
  readonly entropyGenerated?: number
  readonly exergyDestroyed?: number
  readonly exergySupplied?: number
  readonly exergyDelivered?: number
  /** Size of the entropy flows, W/K, against which round-off is judged. */
  readonly entropyScale: number
  /** In less out plus heat and work, W. */
  readonly energyImbalance: number
  /** In less out, kg/s. */
  readonly massImbalance: number
}

/** Names of the second-law results that a role has. */
export function auditNames(role: SecondLawRole): readonly string[] {
  switch (role) {
    case 'adiabatic':
    case 'losesHeat':
    case 'fired':
      return ['entropyGenerated', 'exergyDestroyed']
    case 'heated':
      return ['exergySupplied']
    case 'delivers':
      return ['exergyDelivered']
    case 'edge':
      return []
  }
}

/** Signs with which a unit's totals enter its energy balance. */
const energySigns: readonly (readonly [TotalName, 1 | -1])[] = [
  ['heatInput', 1],
  ['recoveredHeat', 1],
  ['pumpPower', 1],
  ['turbinePower', -1],
  ['heatRejected', -1],
  ['processHeat', -1],
  ['lineHeatLoss', -1],
]

/** Recomputes a unit's balances from its streams alone, and its second law (contract, section 3). */
export function auditUnit(
  model: Model,
  states: States,
  placed: PlacedUnit,
  placeOf: ReadonlyMap<string, number>,
): UnitAudit {
  const { kind } = placed
  const T0 = model.system.layout.ambient.T
  const delivered = kind.secondLaw === 'delivers' ? entering(placed, states, placeOf) : undefined
  let mass = 0
  let energy = 0
  let entropy = 0
  let entropyScale = 0
  for (const { description, stream: id } of placed.connections) {
    const sign = description.direction === 'in' ? 1 : -1
    const at = placeOf.get(id)! * streamResults.length
    // A heat user's missing condensate leaves the plant at the state of the condensate.
    const m = delivered && sign < 0 ? delivered : states.values[at]!
    mass += sign * m
    energy += sign * m * states.values[at + 2]!
    entropy += sign * m * states.values[at + 4]!
    entropyScale += Math.abs(m * states.values[at + 4]!)
  }
  if (placed.open.length > 0) {
    mass = energy = entropy = Number.NaN
  }
  const exergyLoss = energy - T0 * entropy
  const totals = model.system.totalsOf.get(placed.unit.id)
  let exchanged = 0
  for (const [name, sign] of energySigns) {
    const total = totals?.[name]
    if (total !== undefined) exchanged += sign * numberOf(model, total)
  }
  const common = {
    entropyScale,
    massImbalance: mass,
    energyImbalance: energy + exchanged,
  }
  switch (kind.secondLaw) {
    case 'adiabatic':
      return { ...common, entropyGenerated: -entropy, exergyDestroyed: -T0 * entropy }
    case 'losesHeat':
      return { ...common, entropyGenerated: exergyLoss / T0, exergyDestroyed: exergyLoss }
    case 'fired': {
      const fuel = totals?.fuelHeat
      return {
        ...common,
        entropyGenerated: Number.NaN,
        exergyDestroyed: (fuel ? numberOf(model, fuel) : 0) + exergyLoss,
      }
    }
    case 'heated':
      return { ...common, exergySupplied: -exergyLoss }
    case 'delivers':
      return { ...common, exergyDelivered: exergyLoss }
    case 'edge':
      return { ...common, massImbalance: 0, energyImbalance: 0 }
  }
}

/** Flow into a unit, kg/s. */
function entering(
  placed: PlacedUnit,
  states: States,
  placeOf: ReadonlyMap<string, number>,
): number {
  let m = 0
  for (const { description, stream } of placed.connections) {
    if (description.direction === 'in') m += states.get(placeOf.get(stream)!, 'm')
  }
  return m
}

function numberOf(model: Model, expression: Expression): number {
  if (expression.kind === 'constant') return expression.value
  if (expression.kind !== 'variable') return Number.NaN
  return model.program.lost[expression.index] ? Number.NaN : model.values[expression.index]!
}
