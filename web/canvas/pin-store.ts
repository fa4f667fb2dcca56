import { create } from 'zustand'
import { usePlantStore } from '../store/plant-store.ts'

interface PinState {
  /** Units that stay where they are when the sheet is tidied: moved by hand, or pinned by command. */
  readonly pinned: ReadonlySet<string>
}

/** What the user has set in its place; for the plant and layout shown, as long as they are open. */
export const usePinStore = create<PinState>()(() => ({ pinned: new Set() }))

export function pin(ids: readonly string[]): void {
  usePinStore.setState(({ pinned }) => ({ pinned: new Set([...pinned, ...ids]) }))
}

export function unpin(ids: readonly string[]): void {
  usePinStore.setState(({ pinned }) => ({
    pinned: new Set([...pinned].filter((id) => !ids.includes(id))),
  }))
}

usePlantStore.subscribe((now, then) => {
  if (now.opened !== then.opened || now.layoutId !== then.layoutId) {
    usePinStore.setState({ pinned: new Set() })
  }
})
