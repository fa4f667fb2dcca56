import { expect, test } from 'vitest'
import type { BalanceMessage, NamesMessage, Status } from '../../src/messages.ts'
import { type Asked, readPhase, readValue, useBalanceStore } from '../../web/store/balance-store.ts'

const names: NamesMessage = {
  type: 'names',
  structure: 1,
  paths: ['main.m', 'main.T', 'well.m', 'well.T', 'plant.netPower'],
  streams: ['main', 'well'],
  processes: [],
  layout: 'base',
  case: null,
  given: [],
  mainSteam: null,
  derived: { paths: [], account: [] },
}

function balance(values: readonly number[], status: Status = 'solved'): BalanceMessage {
  return {
    type: 'balance',
    structure: 1,
    status,
    values: Float64Array.from(values),
    phases: Uint8Array.from([3, 1]),
    findings: [],
    undetermined: [],
    unbounded: [],
  } as unknown as BalanceMessage
}

const asked = (edit: number, subject = 'plant 1', editName = `Edit ${edit}`): Asked => ({
  subject,
  edit,
  editName,
})

const store = () => useBalanceStore.getState()

test('values and phases are read by name; what is not a number is null', () => {
  store().show(names, balance([80, 800, Number.NaN, 310, 6e7]), asked(1, 'read'))
  expect(readValue('main.m')).toBe(80)
  expect(readValue('well.m')).toBeNull()
  expect(readValue('nothing.m')).toBeNull()
  expect(readPhase('main')).toBe('vapour')
  expect(readPhase('well')).toBe('liquid')
  expect(readPhase('nothing')).toBe('none')
})

test('the scales of colour and width span what is solved', () => {
  store().show(names, balance([80, 800, Number.NaN, 310, 6e7]), asked(1, 'scales'))
  expect([store().coldest, store().hottest, store().largestFlow]).toEqual([310, 800, 80])
})

test('an edit is compared with the solved balance before it, merged edits with the one before all', () => {
  const first = balance([80, 800, 60, 310, 60e6])
  store().show(names, first, asked(1, 'compare'))
  expect(store().before).toBeNull()
  store().show(names, balance([81, 800, 60, 310, 61e6]), asked(2, 'compare'))
  store().show(names, balance([82, 800, 60, 310, 62e6]), asked(2, 'compare'))
  expect(store().before?.balance).toBe(first)
  expect([store().lastEdit, store().editsSince]).toEqual(['Edit 2', 1])
})

test('a balance that was not solved is nothing to compare with: the last solved one is', () => {
  const solved = balance([80, 800, 60, 310, 60e6])
  store().show(names, solved, asked(1, 'unsolved'))
  store().show(
    names,
    balance([80, 800, 60, 310, Number.NaN], 'underspecified'),
    asked(2, 'unsolved'),
  )
  store().show(names, balance([82, 800, 60, 310, 62e6]), asked(3, 'unsolved'))
  expect(store().before?.balance).toBe(solved)
  expect(store().editsSince).toBe(2)
})

test('balances of another plant, layout or case are not compared', () => {
  store().show(names, balance([80, 800, 60, 310, 60e6]), asked(1, 'one'))
  store().show(names, balance([82, 800, 60, 310, 62e6]), asked(2, 'two'))
  expect(store().before).toBeNull()
})
