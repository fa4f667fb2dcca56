import {
  criticalPressure,
  criticalTemperature,
  Outcome,
  Saturation,
  STATE_SIZE,
  State,
  stateAtPressureEnthalpy,
} from '../steam/index.ts'
import type { Model } from './model.ts'

/** Indexes of `phaseNames` of units/phases.ts. */
export const Phase = { none: 0, liquid: 1, wet: 2, vapour: 3, supercritical: 4 } as const

/** A state this close to saturation, relative to its enthalpy, is wet. */
const saturationTolerance = 1e-9

/** What a stream shows, in this order: SI; NaN where it is not determined or has no meaning. */
export const streamResults = ['m', 'p', 'h', 'T', 's', 'x', 'superheat', 'subcooling', 'v'] as const
export type StreamResult = (typeof streamResults)[number]

/** The states of all streams of a solved (or partly solved) model. */
export class States {
  /** By stream, `streamResults.length` numbers each. */
  readonly values: Float64Array
  /** By stream: a `Phase`. */
  readonly phases: Uint8Array
  private readonly model: Model
  private readonly record = new Float64Array(STATE_SIZE)

  constructor(model: Model) {
    this.model = model
    const count = model.system.layout.streams.length
    this.values = new Float64Array(count * streamResults.length)
    this.phases = new Uint8Array(count)
    this.refresh()
  }

  get(stream: number, name: StreamResult): number {
    return this.values[stream * streamResults.length + streamResults.indexOf(name)]!
  }

  /** Reads the streams from the model's present values. */
  refresh(): void {
    const { system, program } = this.model
    const { lost } = program
    const known = this.model.values
    system.layout.streams.forEach((stream, k) => {
      const base = system.streamBase[k]!
      const at = k * streamResults.length
      this.values.fill(Number.NaN, at, at + streamResults.length)
      this.phases[k] = Phase.none
      for (let i = 0; i < 3; i++) if (!lost[base + i]) this.values[at + i] = known[base + i]!
      if (!lost[base + 1] && !lost[base + 2]) this.fillState(k, known[base + 1]!, known[base + 2]!)
      // What is given by itself shows even where the state is open.
      for (let i = 3; i < 8; i++) {
        if (!Number.isNaN(this.values[at + i]!) || !Number.isNaN(this.values[at + 2]!)) continue
        const index = system.indexOf.get(`${stream.id}.${streamResults[i]!}`)
        if (index !== undefined && !lost[index]) this.values[at + i] = known[index]!
      }
    })
  }

  private fillState(k: number, p: number, h: number): void {
    const { record } = this
    if (stateAtPressureEnthalpy(record, 0, p, h) !== Outcome.fine) return
    const at = k * streamResults.length
    const T = record[State.T]!
    this.values[at + 3] = T
    this.values[at + 4] = record[State.s]!
    this.values[at + 8] = record[State.v]!
    const phase = phaseOfRecord(record, h)
    this.phases[k] = phase
    if (record[State.subcritical] !== 1) return
    const saturated = record[State.saturation + Saturation.T]!
    if (phase === Phase.wet) {
      this.values[at + 5] = Math.min(1, Math.max(0, record[State.x]!))
      this.values[at + 6] = 0
      this.values[at + 7] = 0
      return
    }
    this.values[at + 6] = T - saturated
    this.values[at + 7] = saturated - T
  }
}

function phaseOfRecord(record: Float64Array, h: number): number {
  if (record[State.subcritical] !== 1) {
    const p = record[State.p]!
    if (p < criticalPressure) return Phase.vapour
    if (record[State.T]! >= criticalTemperature) return Phase.supercritical
    return Phase.liquid
  }
  const liquid = record[State.saturation + Saturation.hL]!
  const vapour = record[State.saturation + Saturation.hV]!
  const tolerance = saturationTolerance * Math.abs(h)
  if (h < liquid - tolerance) return Phase.liquid
  return h > vapour + tolerance ? Phase.vapour : Phase.wet
}
