import { create } from 'zustand'
import { useSettingsStore } from '../store/settings-store.ts'

interface WhereFromState {
  /** The quantities asked one after another; empty: nothing is asked. */
  readonly trail: readonly string[]
  /** Which of them is shown. */
  readonly at: number
  /** Asks a number, from wherever it is shown: a new trail begins. */
  ask(path: string): void
  /** Goes on from the number shown to one that went in. */
  follow(path: string): void
  /** Back along the trail, or to any of its places. */
  goTo(at: number): void
  close(): void
}

/** The trail of 'where from': no part of undo, kept in no file. */
export const useWhereFromStore = create<WhereFromState>()((set, get) => ({
  trail: [],
  at: 0,
  ask(path) {
    useSettingsStore.getState().change({ drawerFolded: false })
    set({ trail: [path], at: 0 })
  },
  follow(path) {
    const { trail, at } = get()
    if (trail[at] === path) return
    set({ trail: [...trail.slice(0, at + 1), path], at: at + 1 })
  },
  goTo(at) {
    if (at < 0) set({ trail: [], at: 0 })
    else set({ at: Math.min(at, get().trail.length - 1) })
  },
  close() {
    set({ trail: [], at: 0 })
  },
}))

/** The quantity whose number a click or key was on, if any. */
function pathAt(target: EventTarget | null): string | undefined {
  if (!(target instanceof Element)) return undefined
  return target.closest<HTMLElement>('[data-path]')?.dataset.path
}

/**
 * From now on any number tells where it comes from: by a click with Alt held, or by W while it has
 * the focus.
 */
export function listenForWhereFrom(): void {
  const ask = (path: string | undefined, event: Event): void => {
    if (path === undefined) return
    event.preventDefault()
    event.stopPropagation()
    useWhereFromStore.getState().ask(path)
  }
  window.addEventListener(
    'click',
    (event) => {
      if (event.altKey) ask(pathAt(event.target), event)
    },
    { capture: true },
  )
  window.addEventListener(
    'keydown',
    (event) => {
      const { target, key } = event
      if (event.ctrlKey || event.metaKey || event.altKey || key.toLowerCase() !== 'w') return
      if (target instanceof HTMLInputElement || target instanceof HTMLTextAreaElement) return
      ask(pathAt(target), event)
    },
    { capture: true },
  )
}
