import { boiler } from './boiler.ts'
import { branch } from './branch.ts'
import { condenser } from './condenser.ts'
import { desuperheater } from './desuperheater.ts'
import { flashVessel } from './flash-vessel.ts'
import { heatExchanger } from './heat-exchanger.ts'
import { heatSource } from './heat-source.ts'
import { heatUser } from './heat-user.ts'
import { junction } from './junction.ts'
import type { UnitKind } from './kind.ts'
import { leak } from './leak.ts'
import { mixingHeater } from './mixing-heater.ts'
import { offtake } from './offtake.ts'
import { pipe } from './pipe.ts'
import { pump } from './pump.ts'
import { reheater } from './reheater.ts'
import { separator } from './separator.ts'
import { supply } from './supply.ts'
import { surfaceHeater } from './surface-heater.ts'
import { turbine } from './turbine.ts'
import { valve } from './valve.ts'

/** Every kind of unit, in the order of the rail. */
const registry = [
  boiler,
  reheater,
  heatSource,
  turbine,
  pump,
  surfaceHeater,
  mixingHeater,
  condenser,
  heatExchanger,
  heatUser,
  flashVessel,
  separator,
  desuperheater,
  pipe,
  valve,
  leak,
  branch,
  junction,
  supply,
  offtake,
] as const

export type KindName = (typeof registry)[number]['name']

export const kinds: readonly (UnitKind & { readonly name: KindName })[] = registry

const byName = new Map<string, UnitKind>(registry.map((kind) => [kind.name, kind]))

export function kindNamed(name: string): UnitKind | undefined {
  return byName.get(name)
}

export { plantQuantities } from './plant-totals.ts'
export { quantitiesOfShaft } from './shaft.ts'
export { streamQuantities } from './stream-quantities.ts'
