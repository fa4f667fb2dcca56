/** The door of the steam properties (IAPWS-IF97, R7-97(2012)): everything other folders may use. */
export * from './constants.ts'
export {
  enthalpyAtPressureDryness,
  enthalpyAtPressureEntropy,
  enthalpyAtPressureSubcooling,
  enthalpyAtPressureSuperheat,
  enthalpyAtPressureTemperature,
  enthalpyAtPressureVolume,
} from './enthalpy.ts'
export { Outcome, type RangeProblem, type RangeQuantity, rangeProblem } from './outcome.ts'
export { RESULT_SIZE, Result, SATURATION_SIZE, Saturation, STATE_SIZE, State } from './records.ts'
export {
  drySaturatedEnthalpyAtEntropy,
  saturatedLiquidEnthalpyAtEntropy,
  saturationAtPressure,
  saturationAtTemperature,
  saturationPressure,
  saturationTemperature,
} from './saturation.ts'
export { stateAtPressureEnthalpy } from './state.ts'
