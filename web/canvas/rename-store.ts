import { create } from 'zustand'

/** The unit or stream whose label is being edited in place. */
export const useRenameStore = create<{ readonly id: string | null }>()(() => ({ id: null }))

export function startRenaming(id: string): void {
  useRenameStore.setState({ id })
}
