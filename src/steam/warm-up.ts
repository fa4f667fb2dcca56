/**
 * Gets the hot functions compiled. The unrolled sums are long, and slow while the engine still
 * interprets them: some tens of microseconds a sum instead of a tenth of one.
 */
import { enthalpyAtPressureTemperature } from './enthalpy.ts'
import { enthalpyAtPressureEntropy } from './enthalpy-at-entropy.ts'
import { RESULT_SIZE, STATE_SIZE, State } from './records.ts'
import { stateAtPressureEnthalpy } from './state.ts'

// p (Pa) and h (J/kg) of water, wet steam and steam at pressures of a plant, and of region 3
const states: readonly (readonly [number, number])[] = [
  [5e3, 130e3],
  [2e5, 400e3],
  [15e6, 1100e3],
  [30e6, 900e3],
  [5e3, 2300e3],
  [1e6, 2000e3],
  [15e6, 1900e3],
  [4e3, 2600e3],
  [1e5, 2900e3],
  [2e6, 3300e3],
  [16e6, 3400e3],
  [28e6, 2100e3],
]

/**
 * Runs through states of every hot region until their functions are compiled, or for the time given
 * (ms). Called once before the first plant is solved; it changes no result. Answers with the passes
 * made.
 */
export function warmUp(milliseconds = 250): number {
  const record = new Float64Array(STATE_SIZE * states.length)
  const result = new Float64Array(RESULT_SIZE)
  const end = Date.now() + milliseconds
  let passes = 0
  // After some hundred passes the compiler has had its say.
  while (passes < 400 && Date.now() < end) {
    passes += 1
    const factor = 1 + passes * 1e-6
    states.forEach(([p, h], i) => {
      const at = i * STATE_SIZE
      // cold, then warm
      record[at + State.region] = 0
      stateAtPressureEnthalpy(record, at, p * factor, h)
      stateAtPressureEnthalpy(record, at, p * factor, h * factor)
      enthalpyAtPressureEntropy(result, 0, p * factor, record[at + State.s] as number)
      enthalpyAtPressureTemperature(result, 0, p * factor, record[at + State.T] as number)
    })
  }
  return passes
}
