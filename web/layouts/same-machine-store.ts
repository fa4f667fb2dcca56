import { create } from 'zustand'

interface SameMachineState {
  /** The turbine that is to get a bleed; null while nothing is asked. */
  readonly turbine: string | null
  ask(turbine: string): void
  close(): void
}

/** Whether the question for a new bleed in the same machine is open, and of which turbine. */
export const useSameMachineStore = create<SameMachineState>()((set) => ({
  turbine: null,
  ask: (turbine) => set({ turbine }),
  close: () => set({ turbine: null }),
}))
