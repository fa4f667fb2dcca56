import { create } from 'zustand'

/**
 * Whether the plant on screen is the one kept in this browser.
 * elsewhere: another window has the same plant open and keeps it. failed: the browser refuses.
 */
export type KeepingState = 'kept' | 'writing' | 'elsewhere' | 'failed'

export const useKeepingStore = create<{ readonly state: KeepingState }>()(() => ({ state: 'kept' }))

export function setKeeping(state: KeepingState): void {
  if (useKeepingStore.getState().state !== state) useKeepingStore.setState({ state })
}
