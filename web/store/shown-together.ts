import { type StoreApi, useStore } from 'zustand'

/*
 * A number that is given and the balance that follows from it are shown in one frame: what is drawn
 * from a store waits for the balance, but not for long. Whoever reads or edits sees the edit at once.
 */

/** How long what is edited may wait for its balance, ms: a frame and a half. */
const patience = 24

let held = false
let expected = false
let timer: ReturnType<typeof setTimeout> | undefined
const waiting = new Set<() => void>()

/** Runs when what has been edited is shown: now, unless it waits for its balance. */
export function whenShown(run: () => void): void {
  if (held) waiting.add(run)
  else run()
}

/** Runs an edit, which is then shown together with its balance, if it has one. */
export function editWithBalance(edit: () => void): void {
  if (held) {
    edit()
    return
  }
  held = true
  expected = false
  try {
    edit()
  } finally {
    if (expected) timer = setTimeout(showNow, patience)
    else showNow()
  }
}

/** A balance of what is edited is on its way. */
export function expectBalance(): void {
  expected = true
}

/** The balance is there, or will not come: shows everything that waits. */
export function showNow(): void {
  held = false
  clearTimeout(timer)
  for (const run of waiting) run()
  waiting.clear()
}

type Shown<T> = StoreApi<T> & {
  (): T
  <U>(selector: (state: T) => U): U
}

/** A store as React draws it: its hook has what is shown, its other members what is edited. */
export function shownTogether<T>(store: StoreApi<T>): Shown<T> {
  let shown = store.getState()
  const listeners = new Set<(state: T, before: T) => void>()
  const show = () => {
    const before = shown
    shown = store.getState()
    for (const listener of listeners) listener(shown, before)
  }
  store.subscribe(() => whenShown(show))
  const drawn: StoreApi<T> = {
    ...store,
    getState: () => shown,
    subscribe(listener) {
      listeners.add(listener)
      return () => listeners.delete(listener)
    },
  }
  const hook = <U>(selector?: (state: T) => U) => useStore(drawn, selector as (state: T) => U)
  return Object.assign(hook, store) as Shown<T>
}
