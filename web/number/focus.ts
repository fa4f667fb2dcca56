import { create } from 'zustand'

/** A number that is to get the focus as soon as it is on screen. */
const useFocusStore = create<{ readonly path: string | null; readonly edit: boolean }>()(() => ({
  path: null,
  edit: false,
}))

/** Moves the focus to a number's field; with `edit` its field opens. */
export function focusNumber(path: string, edit = false): void {
  useFocusStore.setState({ path, edit })
}

/** Takes the wish away once it is granted, or when there is nothing to wait for. */
export function focusGranted(): void {
  useFocusStore.setState({ path: null, edit: false })
}

/** Whether the focus is wanted on one of these numbers. */
export function useFocusWantedAmong(paths: readonly string[]): boolean {
  return useFocusStore((state) => state.path !== null && paths.includes(state.path))
}

/** Whether the focus is wanted here: null no, else whether the field is to open. A null path never is. */
export function useFocusWanted(path: string | null): boolean | null {
  return useFocusStore((state) => (path !== null && state.path === path ? state.edit : null))
}
