import { create } from 'zustand'
import type { EqualBasis } from '../../src/messages.ts'
import { createSolverClient, type SolverClient } from '../worker/client.ts'
import { type Snapshot, useBalanceStore, valueInSnapshot } from './balance-store.ts'
import { useGhostStore } from './ghost-store.ts'
import { readShownCase, usePlantStore } from './plant-store.ts'
import { sameBalance } from './same-balance.ts'
import { startWorker } from './start-worker.ts'

/** Another layout or case that the one shown is compared with. */
export interface Compared {
  readonly layoutId: string
  /** Null: the layout's own givens. */
  readonly caseId: string | null
  /** At which total of the balance shown the other is solved; as it stands where absent. */
  readonly basis?: EqualBasis['basis'] | undefined
}

interface ReferenceState {
  /** While a case is shown, the balance of the layout's own givens. */
  readonly design: Snapshot | null
  readonly compared: Compared | null
  /** The balance of what is compared; null while it is not solved. */
  readonly other: Snapshot | null
  /** Why there is no such balance, as a sentence. */
  readonly trouble: string | null
  /** Chooses what the balance shown is compared with, or nothing with null. */
  compare(compared: Compared | null): void
}

/** Balances beside the one shown: the design of a case, and what it is compared with. */
export const useReferenceStore = create<ReferenceState>()((set) => ({
  design: null,
  compared: null,
  other: null,
  trouble: null,
  compare(compared) {
    set({ compared, other: null, trouble: null })
  },
}))

/** The value at design of a quantity, SI; null while the design is what is shown, or where it has none. */
export function useDesignValue(path: string): number | null {
  return useReferenceStore(({ design }) => (design ? valueInSnapshot(design, path) : null))
}

type Slot = 'design' | 'other'

/**
 * Keeps the balances beside the one shown up to date, in a worker of their own, so that they never
 * hold up the balance of an edit. The worker starts when first needed.
 */
export function startReferences(): void {
  const clients: Partial<Record<Slot, SolverClient<number>>> = {}
  const newest: Record<Slot, number> = { design: 0, other: 0 }
  const { setState, getState } = useReferenceStore
  const client = (slot: Slot): SolverClient<number> => {
    clients[slot] ??= createSolverClient<number>(startWorker, {
      balance(names, balance, mark) {
        if (mark !== newest[slot]) return
        const snapshot = { names, balance }
        if (slot === 'design') setState({ design: snapshot })
        else {
          setState({ other: snapshot, trouble: null })
          remember(snapshot)
        }
      },
      dome() {},
      unusable(message) {
        if (slot === 'other') setState({ other: null, trouble: message })
        else setState({ design: null })
      },
      gaveUp(message) {
        if (slot === 'other') setState({ other: null, trouble: message })
        else setState({ design: null })
      },
      busy() {},
    })
    return clients[slot]
  }

  const askDesign = () => {
    newest.design += 1
    if (!readShownCase()) {
      if (getState().design) setState({ design: null })
      return
    }
    const { plant, layoutId } = usePlantStore.getState()
    client('design').solve({ plant, layout: layoutId, case: null }, newest.design)
  }

  /** The total at which the other was asked last: small movements of it are followed, none is repeated. */
  const askOther = () => {
    newest.other += 1
    const { compared } = getState()
    if (!compared) return
    const { plant } = usePlantStore.getState()
    const { layoutId, caseId, basis } = compared
    if (
      !plant.layouts.some(
        ({ id, cases }) =>
          id === layoutId && (caseId === null || cases.some((one) => one.id === caseId)),
      )
    ) {
      getState().compare(null)
      return
    }
    const value = basis && totalOf(basis)
    if (basis && value === null) return
    const equal = basis && typeof value === 'number' ? { equal: { basis, value } } : {}
    client('other').solve({ plant, layout: layoutId, case: caseId, ...equal }, newest.other)
  }

  usePlantStore.subscribe((now, then) => {
    const changed = now.plant !== then.plant && !sameBalance(now.plant, then.plant)
    if (changed || now.layoutId !== then.layoutId || now.caseId !== then.caseId) askDesign()
    if (changed && !getState().compared?.basis) askOther()
    if (now.opened !== then.opened) getState().compare(null)
  })
  useBalanceStore.subscribe((now, then) => {
    if (now.balance !== then.balance && getState().compared?.basis) askOther()
  })
  useReferenceStore.subscribe((now, then) => {
    if (now.compared === then.compared) return
    if (now.compared) askOther()
    else if (then.compared) useGhostStore.getState().forget()
  })
  askDesign()
}

/** The total of the balance shown at which the other is to be solved. */
function totalOf(basis: EqualBasis['basis']): number | null {
  const { names, balance } = useBalanceStore.getState()
  if (!names || balance?.status !== 'solved') return null
  const path = { power: 'plant.netPower', fuel: 'plant.fuelHeat', steam: names.mainSteam }[basis]
  return path === null ? null : valueInSnapshot({ names, balance }, path)
}

/** What is compared lies as a ghost under canvas and charts. */
function remember(snapshot: Snapshot): void {
  const { compared } = useReferenceStore.getState()
  if (!compared) return
  if (snapshot.balance.status !== 'solved') useGhostStore.getState().forget()
  else useGhostStore.getState().remember({ ...snapshot, label: comparedName(compared) })
}

/** 'Heater 8 added, 75 %'. */
export function comparedName({ layoutId, caseId }: Compared): string {
  const layout = usePlantStore.getState().plant.layouts.find(({ id }) => id === layoutId)
  const one = layout?.cases.find(({ id }) => id === caseId)
  return one ? `${layout?.name}, ${one.name}` : (layout?.name ?? '')
}
