import { phaseNames } from '../../src/document.ts'
import type { BalanceMessage, NamesMessage } from '../../src/messages.ts'

/** The state of a stream, SI; `m` and `x` are NaN where nothing fixes them. */
export interface StreamState {
  readonly id: string
  /** J/(kg K) */
  readonly s: number
  /** K */
  readonly T: number
  /** J/kg */
  readonly h: number
  /** Pa */
  readonly p: number
  /** kg/s */
  readonly m: number
  /** Dryness. */
  readonly x: number
  readonly phase: (typeof phaseNames)[number]
}

const columns = ['s', 'T', 'h', 'p', 'm', 'x'] as const

const placesByNames = new WeakMap<NamesMessage, Int32Array>()

/** For each stream where its s, T, h, p, m and x stand among the values; -1 where they do not. */
function placesOf(names: NamesMessage): Int32Array {
  let places = placesByNames.get(names)
  if (!places) {
    const index = new Map(names.paths.map((path, i) => [path, i]))
    places = Int32Array.from(
      names.streams.flatMap((id) => columns.map((column) => index.get(`${id}.${column}`) ?? -1)),
    )
    placesByNames.set(names, places)
  }
  return places
}

/** The states that the balance knows: those of streams whose entropy and temperature are solved. */
export function streamStates(names: NamesMessage, balance: BalanceMessage): StreamState[] {
  const places = placesOf(names)
  const value = (stream: number, column: number): number =>
    balance.values[places[stream * columns.length + column] as number] ?? Number.NaN
  const states: StreamState[] = []
  for (const [i, id] of names.streams.entries()) {
    const s = value(i, 0)
    const T = value(i, 1)
    if (!Number.isFinite(s) || !Number.isFinite(T)) continue
    states.push({
      id,
      s,
      T,
      h: value(i, 2),
      p: value(i, 3),
      m: value(i, 4),
      x: value(i, 5),
      phase: phaseNames[balance.phases[i] ?? 0] ?? 'none',
    })
  }
  return states
}

const statesByBalance = new WeakMap<BalanceMessage, ReadonlyMap<string, StreamState>>()
const none: ReadonlyMap<string, StreamState> = new Map()

/** The states of a balance by stream, in the order of its streams; the same map every time. */
export function statesOf(
  names: NamesMessage | null,
  balance: BalanceMessage | null,
): ReadonlyMap<string, StreamState> {
  if (!names || !balance) return none
  let states = statesByBalance.get(balance)
  if (!states) {
    states = new Map(streamStates(names, balance).map((state) => [state.id, state]))
    statesByBalance.set(balance, states)
  }
  return states
}
