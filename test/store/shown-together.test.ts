import { afterEach, beforeEach, expect, test, vi } from 'vitest'
import { createStore } from 'zustand'
import {
  editWithBalance,
  expectBalance,
  showNow,
  shownTogether,
  whenShown,
} from '../../web/store/shown-together.ts'

beforeEach(() => {
  vi.useFakeTimers()
})

afterEach(() => {
  showNow()
  vi.useRealTimers()
})

/** A store of one number, and what is drawn of it, as a list of all that was shown. */
function drawn() {
  const store = shownTogether(createStore<{ readonly n: number }>()(() => ({ n: 0 })))
  const shown: number[] = []
  const draw = () => whenShown(() => shown.push(store.getState().n))
  return { store, shown, draw }
}

test('an edit without a balance to come is shown at once', () => {
  const { store, shown, draw } = drawn()
  editWithBalance(() => {
    store.setState({ n: 1 })
    draw()
    expect(shown).toEqual([])
  })
  expect(shown).toEqual([1])
})

test('an edit is read at once, and shown with its balance', () => {
  const { store, shown, draw } = drawn()
  editWithBalance(() => {
    store.setState({ n: 1 })
    expectBalance()
  })
  draw()
  expect(store.getState().n).toBe(1)
  expect(shown).toEqual([])
  showNow()
  expect(shown).toEqual([1])
})

test('a balance that does not come soon is not waited for', () => {
  const { store, shown, draw } = drawn()
  editWithBalance(() => {
    store.setState({ n: 1 })
    expectBalance()
  })
  draw()
  vi.advanceTimersByTime(100)
  expect(shown).toEqual([1])
})

test('an edit that is refused leaves nothing waiting', () => {
  const { shown, draw } = drawn()
  expect(() =>
    editWithBalance(() => {
      throw new Error('refused')
    }),
  ).toThrow('refused')
  draw()
  expect(shown).toEqual([0])
})
