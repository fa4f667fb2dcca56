import { create } from 'zustand'

export type DialogName = 'about' | 'keys' | 'kept' | 'examples'

interface DialogState {
  readonly open: DialogName | null
  show(name: DialogName): void
  close(): void
}

export const useDialogStore = create<DialogState>()((set) => ({
  open: null,
  show: (name) => set({ open: name }),
  close: () => set({ open: null }),
}))
