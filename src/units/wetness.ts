import {
  criticalPressure,
  Outcome,
  SATURATION_SIZE,
  Saturation,
  saturationAtPressure,
  state,
} from '../steam/index.ts'

/* Numbers of solved states that several kinds look at for their cautions. */

const record = new Float64Array(SATURATION_SIZE)

/** A stream as solved, SI. */
interface Solved {
  readonly p: number
  readonly h: number
}

/**
 * (h - h')/(h'' - h'), below 0 for subcooled water and above 1 for superheated steam; NaN where the
 * pressure has no saturation or the state is open.
 */
export function drynessOf(stream: Solved | undefined): number {
  if (!stream || saturationAtPressure(record, 0, stream.p) !== Outcome.fine) return Number.NaN
  const liquid = record[Saturation.hL] as number
  return (stream.h - liquid) / ((record[Saturation.hV] as number) - liquid)
}

/** Temperature above saturation, K; 0 for wet steam, NaN where there is no saturation or no state. */
export function superheatOf(stream: Solved | undefined): number {
  if (!stream || saturationAtPressure(record, 0, stream.p) !== Outcome.fine) return Number.NaN
  const own = state({ p: stream.p, h: stream.h })
  return own.outcome === 'state'
    ? Math.max(0, own.T - (record[Saturation.T] as number))
    : Number.NaN
}

/** Moisture 1 - x of wet steam; 0 for dry steam, NaN where `drynessOf` is. */
export function moistureOf(stream: Solved | undefined): number {
  const x = drynessOf(stream)
  return x < 1 ? 1 - x : x >= 1 ? 0 : x
}

/** Steam that counts as dry may carry this much, from a drum or a separator: common practice, 0.25 to 0.5 %. */
export const carriedMoisture = 0.005

/** Whether the pressure has no saturation because it is critical or above. */
export function isAboveCritical(stream: Solved | undefined): boolean {
  return stream !== undefined && stream.p >= criticalPressure
}

/** Whether wet steam lies at or between the two ends of a change of state: dryness not all on one side. */
export function changesPhase(from: Solved | undefined, to: Solved | undefined): boolean {
  const a = drynessOf(from)
  const b = drynessOf(to)
  const off = 1e-6
  const side = (x: number) => (x <= off ? -1 : x >= 1 - off ? 1 : 0)
  if (!(Number.isFinite(a) && Number.isFinite(b))) return false
  return side(a) === 0 || side(b) === 0 || side(a) !== side(b)
}
