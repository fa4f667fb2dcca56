import { create } from 'zustand'

interface SelectionState {
  /** Ids of units, streams and shafts, in the order in which they were chosen. */
  readonly selected: readonly string[]
  /** What the pointer or the keyboard's focus is on, in any of canvas, chart and tables. */
  readonly hovered: string | null
  select(ids: readonly string[], mode?: 'replace' | 'toggle'): void
  hover(id: string | null): void
}

const nothing: readonly string[] = []

function same(a: readonly string[], b: readonly string[]): boolean {
  return a.length === b.length && a.every((id, i) => id === b[i])
}

/** What is selected and pointed at. No part of undo, and kept in no file. */
export const useSelectionStore = create<SelectionState>()((set, get) => ({
  selected: nothing,
  hovered: null,
  select(ids, mode = 'replace') {
    const { selected } = get()
    const next =
      mode === 'replace'
        ? ids
        : [
            ...selected.filter((id) => !ids.includes(id)),
            ...ids.filter((id) => !selected.includes(id)),
          ]
    if (!same(next, selected)) set({ selected: next.length === 0 ? nothing : [...next] })
  },
  hover(id) {
    if (id !== get().hovered) set({ hovered: id })
  },
}))

export function useSelected(id: string): boolean {
  return useSelectionStore((state) => state.selected.includes(id))
}

export function useHovered(id: string): boolean {
  return useSelectionStore((state) => state.hovered === id)
}
