import { givensOf } from '../balance/case/freeze.ts'
import { freedByLoadControl } from '../balance/case/load-control.ts'
import { type CaseOutcome, solveCase } from '../balance/case/solve-case.ts'
import type { Balance } from '../balance/solve.ts'
import type { Plant } from '../plant/document.ts'
import type { EqualBasis } from './equal.ts'

/**
 * Solves a layout or a case of it at a value of another: what sets its load is freed (the steam flow or
 * the plant power that is given) and net power, fuel heat or main steam flow given instead. SI.
 */
export function solveAtEqual(
  plant: Plant,
  layoutId: string,
  caseId: string | null,
  { basis, value }: EqualBasis,
): CaseOutcome {
  const own = solveCase(plant, layoutId, caseId)
  if (own.outcome === 'unusable' || own.balance.status !== 'solved') return own
  const free = freedByLoadControl(
    'wideOpen',
    own.balance,
    givensOf(own.balance.model.system.layout),
  )
  const path = { power: 'plant.netPower', fuel: 'plant.fuelHeat', steam: mainSteam(own.balance) }[
    basis
  ]
  if (path === undefined) {
    return {
      outcome: 'unusable',
      message: `layout ${layoutId} has no single flow of main steam to compare at: no boiler, or several`,
    }
  }
  if (free.length === 0) {
    return {
      outcome: 'unusable',
      message: `nothing sets the load of layout ${layoutId}: neither a steam flow nor a plant power is given`,
    }
  }
  return solveCase(plant, layoutId, caseId, {
    free: free.filter((one) => one !== path),
    set: { [path]: value },
  })
}

/** Path of the flow of main steam; undefined where not exactly one boiler makes it. */
export function mainSteam({ model }: Balance): string | undefined {
  const { units, totalsOf } = model.system
  const boilers = units.filter(({ unit }) => totalsOf.get(unit.id)?.boilerSteam !== undefined)
  const [boiler] = boilers
  if (boilers.length !== 1 || !boiler) return undefined
  const steam = boiler.connections.find(
    ({ description }) => description.direction === 'out' && !description.optional,
  )
  return steam && `${steam.stream}.m`
}
