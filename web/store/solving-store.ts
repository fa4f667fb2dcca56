import { create } from 'zustand'

interface SolvingState {
  /** A newer plant is being solved; what is shown belongs to the one before. */
  readonly busy: boolean
  /** It has taken long enough to be said. */
  readonly slow: boolean
  setBusy(busy: boolean): void
}

/** After this a balance that is awaited is said to be, ms. */
const unnoticed = 300

let timer: ReturnType<typeof setTimeout> | undefined

/** Whether the solver is at work. Apart from the balance, so that it redraws none of its numbers. */
export const useSolvingStore = create<SolvingState>()((set, get) => ({
  busy: false,
  slow: false,
  setBusy(busy) {
    if (busy === get().busy) return
    clearTimeout(timer)
    if (busy) timer = setTimeout(() => set({ slow: true }), unnoticed)
    set({ busy, slow: false })
  },
}))
