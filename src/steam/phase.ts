/** The phase of a state. */
import { criticalPressure, criticalTemperature } from './constants.ts'
import { Outcome } from './outcome.ts'
import { STATE_SIZE, State } from './records.ts'
import { stateAtPressureEnthalpy } from './state.ts'

/**
 * `wet` from saturated liquid to dry saturated steam, both included (within 1e-9 of either);
 * beyond, `liquid` and `vapour`, and `supercritical` where p and T are at or above the critical
 * ones.
 */
export type Phase = 'wet' | 'liquid' | 'vapour' | 'supercritical'

const record = new Float64Array(STATE_SIZE)

/** Phase of a pressure (Pa) and an enthalpy (J/kg); beyond the limits that of the nearest state. */
export function phaseOf(p: number, h: number): Phase {
  const code = stateAtPressureEnthalpy(record, 0, p, h)
  if (code === Outcome.enthalpyHigh) return p >= criticalPressure ? 'supercritical' : 'vapour'
  if (code !== Outcome.fine) return h < 2e6 ? 'liquid' : 'vapour'
  return phaseOfRecord(record, 0)
}

/** Phase of a state record. */
export function phaseOfRecord(of: Float64Array, at: number): Phase {
  if (of[at + State.region] === 4) return 'wet'
  if ((of[at + State.p] as number) >= criticalPressure) {
    return (of[at + State.T] as number) >= criticalTemperature ? 'supercritical' : 'liquid'
  }
  return of[at + State.subcritical] === 1 && (of[at + State.x] as number) < 0 ? 'liquid' : 'vapour'
}
