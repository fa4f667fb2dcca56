import { create } from 'zustand'

/** Whether the dialog of units is open. */
export const useUnitsStore = create<{ readonly open: boolean }>()(() => ({ open: false }))

export function openUnits(): void {
  useUnitsStore.setState({ open: true })
}

export function closeUnits(): void {
  useUnitsStore.setState({ open: false })
}
