import { create } from 'zustand'
import { phaseNames } from '../../src/document.ts'
import type { BalanceMessage, DomeMessage, NamesMessage } from '../../src/messages.ts'

export type Phase = (typeof phaseNames)[number]

/** A balance and the names of what its arrays hold. */
export interface Snapshot {
  readonly names: NamesMessage
  readonly balance: BalanceMessage
}

/** Index of each path and stream in the arrays of a structure. */
interface Index {
  readonly paths: ReadonlyMap<string, number>
  readonly streams: ReadonlyMap<string, number>
}

/** What a balance was asked for. */
export interface Asked {
  /** Plant, layout and case: only balances of one subject are compared. */
  readonly subject: string
  /** Counts the edits that change a balance. */
  readonly edit: number
  readonly editName: string
}

export interface BalanceState {
  readonly names: NamesMessage | null
  readonly balance: BalanceMessage | null
  readonly dome: DomeMessage | null
  readonly index: Index
  /** Paths that nothing fixes or bounds in the balance shown. */
  readonly open: ReadonlySet<string>
  /** The solved balance before the last edit, to show what the edit did; null where there is none. */
  readonly before: Snapshot | null
  /** Edits between `before` and the balance shown, and the name of the last. */
  readonly editsSince: number
  readonly lastEdit: string
  /** Lowest and highest temperature of the plant's streams, K: the scale of the temperature ramp. */
  readonly coldest: number
  readonly hottest: number
  /** Largest mass flow, kg/s: the scale of stream widths. */
  readonly largestFlow: number
  /** Why there is no balance, as a sentence: the layout cannot be read, or the solver gave up. */
  readonly trouble: string | null
  show(names: NamesMessage, balance: BalanceMessage, asked: Asked): void
  /** Takes the balance away: there is none of this plant. */
  clear(): void
  showDome(dome: DomeMessage): void
  showTrouble(message: string | null): void
}

const nothing: ReadonlySet<string> = new Set()
const noIndex: Index = { paths: new Map(), streams: new Map() }
const indexes = new WeakMap<NamesMessage, Index>()

function indexOf(names: NamesMessage): Index {
  let index = indexes.get(names)
  if (!index) {
    index = {
      paths: new Map(names.paths.map((path, i) => [path, i])),
      streams: new Map(names.streams.map((id, i) => [id, i])),
    }
    indexes.set(names, index)
  }
  return index
}

function valueIn(index: Index, balance: BalanceMessage | null, path: string): number | null {
  const at = index.paths.get(path)
  if (at === undefined || !balance) return null
  const value = balance.values[at]
  return value === undefined || !Number.isFinite(value) ? null : value
}

function scales(names: NamesMessage, index: Index, balance: BalanceMessage) {
  let coldest = Number.POSITIVE_INFINITY
  let hottest = Number.NEGATIVE_INFINITY
  let largestFlow = 0
  for (const id of names.streams) {
    const T = valueIn(index, balance, `${id}.T`)
    const m = valueIn(index, balance, `${id}.m`)
    if (T !== null && T < coldest) coldest = T
    if (T !== null && T > hottest) hottest = T
    if (m !== null && Math.abs(m) > largestFlow) largestFlow = Math.abs(m)
  }
  return hottest > coldest ? { coldest, hottest, largestFlow } : { largestFlow }
}

let shown: Asked = { subject: '', edit: 0, editName: '' }
let editBefore = 0

export const useBalanceStore = create<BalanceState>()((set, get) => ({
  names: null,
  balance: null,
  dome: null,
  index: noIndex,
  open: nothing,
  before: null,
  editsSince: 0,
  lastEdit: '',
  coldest: 300,
  hottest: 820,
  largestFlow: 0,
  trouble: null,

  show(names, balance, asked) {
    const state = get()
    let { before } = state
    if (asked.subject !== shown.subject) before = null
    else if (asked.edit !== shown.edit && state.names && state.balance?.status === 'solved') {
      before = { names: state.names, balance: state.balance }
      editBefore = shown.edit
    }
    shown = asked
    const index = indexOf(names)
    set({
      names,
      balance,
      index,
      open: new Set([...balance.undetermined, ...balance.unbounded]),
      before,
      editsSince: before ? asked.edit - editBefore : 0,
      lastEdit: asked.editName,
      trouble: null,
      ...scales(names, index, balance),
    })
  },
  clear() {
    set({ names: null, balance: null, index: noIndex, open: nothing, before: null, editsSince: 0 })
  },
  showDome(dome) {
    set({ dome })
  },
  showTrouble(message) {
    if (message !== get().trouble) set({ trouble: message })
  },
}))

/** A quantity in a balance and its names, SI, or null where it has no value there. */
export function valueInSnapshot({ names, balance }: Snapshot, path: string): number | null {
  return valueIn(indexOf(names), balance, path)
}

/** A solved quantity, SI, or null while nothing fixes it. Redraws only when this number changed. */
export function useValue(path: string): number | null {
  return useBalanceStore((state) => valueIn(state.index, state.balance, path))
}

/** As `useValue`, for use outside React. */
export function readValue(path: string): number | null {
  const { index, balance } = useBalanceStore.getState()
  return valueIn(index, balance, path)
}

/** A quantity in the solved balance before the last edit, for use outside React. */
export function readValueBefore(path: string): number | null {
  const { before } = useBalanceStore.getState()
  return before ? valueIn(indexOf(before.names), before.balance, path) : null
}

/** As `readValueBefore`, redrawing when it changes. */
export function useValueBefore(path: string): number | null {
  return useBalanceStore(({ before }) =>
    before ? valueIn(indexOf(before.names), before.balance, path) : null,
  )
}

function phaseIn(state: BalanceState, streamId: string): Phase {
  const at = state.index.streams.get(streamId)
  const phase = at === undefined ? 'none' : (phaseNames[state.balance?.phases[at] ?? 0] ?? 'none')
  if (phase !== 'wet') return phase
  const x = valueIn(state.index, state.balance, `${streamId}.x`)
  if (x === null) return phase
  return x <= saturated ? 'liquid' : x >= 1 - saturated ? 'vapour' : phase
}

/** Within this of 0 or 1 a dryness is that of saturated liquid or dry saturated steam. */
const saturated = 1e-9

/**
 * The phase as it is seen: saturated liquid (wet with dryness 0) counts as liquid, dry saturated steam
 * as vapour.
 */
export function usePhase(streamId: string): Phase {
  return useBalanceStore((state) => phaseIn(state, streamId))
}

export function readPhase(streamId: string): Phase {
  return phaseIn(useBalanceStore.getState(), streamId)
}

/**
 * What the balance has of a quantity: its value, SI; `none` where it has no value to have (the dryness
 * of superheated steam, say); null while something could still fix it.
 */
export function useOutcome(path: string): number | 'none' | null {
  return useBalanceStore((state) => {
    const value = valueIn(state.index, state.balance, path)
    if (value !== null || !state.index.paths.has(path) || state.open.has(path)) return value
    const owner = path.slice(0, path.indexOf('.'))
    const isSettled =
      state.balance?.status === 'solved' ||
      valueIn(state.index, state.balance, `${owner}.h`) !== null
    return isSettled ? 'none' : null
  })
}

/** True where the balance shown has a finding that a given too many stands in. */
export function useConflicting(path: string): boolean {
  return useBalanceStore(({ balance }) => {
    if (balance?.status !== 'overspecified') return false
    return balance.findings.some(
      (finding) => finding.excess !== undefined && finding.quantities.includes(path),
    )
  })
}
