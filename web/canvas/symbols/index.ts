import { boiler } from './boiler.tsx'
import { branch } from './branch.tsx'
import { condenser } from './condenser.tsx'
import { desuperheater } from './desuperheater.tsx'
import { flashVessel } from './flashVessel.tsx'
import { heatExchanger } from './heatExchanger.tsx'
import { heatSource } from './heatSource.tsx'
import { heatUser } from './heatUser.tsx'
import { junction } from './junction.tsx'
import { leak } from './leak.tsx'
import { mixingHeater } from './mixingHeater.tsx'
import { offtake } from './offtake.tsx'
import { pipe } from './pipe.tsx'
import { pump } from './pump.tsx'
import { reheater } from './reheater.tsx'
import { separator } from './separator.tsx'
import { supply } from './supply.tsx'
import { surfaceHeater } from './surfaceHeater.tsx'
import type { SymbolDrawing } from './symbol.ts'
import { turbine } from './turbine.tsx'
import { unknown } from './unknown.tsx'
import { valve } from './valve.tsx'

/** One symbol for each kind of unit, by the kind's name. */
export const symbols = {
  boiler,
  branch,
  condenser,
  desuperheater,
  flashVessel,
  heatExchanger,
  heatSource,
  heatUser,
  junction,
  leak,
  mixingHeater,
  offtake,
  pipe,
  pump,
  reheater,
  separator,
  supply,
  surfaceHeater,
  turbine,
  valve,
} satisfies Readonly<Record<string, SymbolDrawing>>

const byName: Readonly<Record<string, SymbolDrawing>> = symbols

/** The symbol of a kind; a plain box for one that is not known, so that its unit can still be seen. */
export function symbolOf(kind: string): SymbolDrawing {
  return byName[kind] ?? unknown
}
