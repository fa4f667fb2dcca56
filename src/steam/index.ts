/** The door of the steam properties (IAPWS-IF97, R7-97(2012)): everything other folders may use. */
export * from './constants.ts'
export {
  enthalpyAtPressureDryness,
  enthalpyAtPressureSubcooling,
  enthalpyAtPressureSuperheat,
  enthalpyAtPressureTemperature,
} from './enthalpy.ts'
export { enthalpyAtPressureEntropy } from './enthalpy-at-entropy.ts'
export { enthalpyAtPressureVolume } from './enthalpy-at-volume.ts'
export { Outcome, type RangeProblem, type RangeQuantity, rangeProblem } from './outcome.ts'
export { type Phase, phaseOf } from './phase.ts'
export { RESULT_SIZE, Result, SATURATION_SIZE, Saturation, STATE_SIZE, State } from './records.ts'
export {
  drySaturatedEnthalpyAtEntropy,
  saturatedLiquidEnthalpyAtEntropy,
  saturationAtPressure,
  saturationAtTemperature,
  saturationPressure,
  saturationTemperature,
} from './saturation.ts'
export { stateAtPressureEnthalpy, stateAtRequest, stateRequest } from './state.ts'
export { type StatePair, state } from './states.ts'
export type { SteamRange, SteamSeveral, SteamState } from './steam-state.ts'
