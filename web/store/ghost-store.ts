import { create } from 'zustand'
import type { Snapshot } from './balance-store.ts'

/** A second balance that lies underneath the one shown. */
export interface Ghost extends Snapshot {
  /** What it is, as it reads in a legend: 'As built', 'Before heater 8'. */
  readonly label: string
}

interface GhostState {
  readonly ghost: Ghost | null
  /** Remembers a balance, of this layout or of another, of any case. */
  remember(ghost: Ghost): void
  forget(): void
}

/** The balance that charts draw as a ghost; layouts, cases and the charts themselves set it. */
export const useGhostStore = create<GhostState>()((set) => ({
  ghost: null,
  remember: (ghost) => set({ ghost }),
  forget: () => set({ ghost: null }),
}))
