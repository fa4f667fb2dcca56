import { describe, expect, it } from 'vitest'
import type { ProcessName } from '../../src/messages.ts'
import { namedStates, type UnitRole } from '../../web/chart/named-states.ts'
import type { StreamState } from '../../web/chart/stream-states.ts'

const roles: Readonly<Record<string, UnitRole>> = {
  boiler: { secondLaw: 'fired', drives: false },
  superheater: { secondLaw: 'fired', drives: false },
  reheater: { secondLaw: 'fired', drives: false },
  reheater2: { secondLaw: 'fired', drives: false },
  hp: { secondLaw: 'adiabatic', drives: true },
  lp: { secondLaw: 'adiabatic', drives: true },
  pump: { secondLaw: 'adiabatic', drives: false },
}

function states(
  ...all: readonly (readonly [string, StreamState['phase'], number, number])[]
): ReadonlyMap<string, StreamState> {
  return new Map(
    all.map(([id, phase, p, T]) => [id, { id, phase, p, T, s: 6000, h: 3e6, m: 100, x: 0.9 }]),
  )
}

const process = (unit: string, from: string, to: string): ProcessName => ({ unit, from, to })

const named = (processes: readonly ProcessName[], at: ReadonlyMap<string, StreamState>) =>
  Object.fromEntries(
    namedStates(processes, at, (unit) => roles[unit]).map(({ id, name }) => [name, id]),
  )

const reheatPlant = [
  process('pump', 'c0', 'fw'),
  process('boiler', 'fw', 'main'),
  process('hp', 'main', 'bleed'),
  process('hp', 'bleed', 'cold'),
  process('reheater', 'cold', 'hot'),
  process('lp', 'hot', 'exhaust'),
]
const reheatStates = states(
  ['c0', 'liquid', 5e3, 306],
  ['fw', 'liquid', 138e5, 520],
  ['main', 'vapour', 130e5, 813],
  ['bleed', 'vapour', 39e5, 640],
  ['cold', 'vapour', 27e5, 594],
  ['hot', 'vapour', 25e5, 813],
  ['exhaust', 'wet', 5e3, 306],
)

describe('the states with names', () => {
  it('of a reheat plant are main steam, both ends of the reheat, exhaust and feedwater', () => {
    expect(named(reheatPlant, reheatStates)).toEqual({
      'Main steam': 'main',
      'Hot reheat': 'hot',
      'Cold reheat': 'cold',
      Exhaust: 'exhaust',
      Feedwater: 'fw',
    })
  })

  it('of two reheats are numbered from the higher pressure', () => {
    const found = named(
      [
        ...reheatPlant.slice(0, -1),
        process('lp', 'hot', 'cold2'),
        process('reheater2', 'cold2', 'hot2'),
        process('lp', 'hot2', 'exhaust'),
      ],
      new Map([
        ...reheatStates,
        ...states(['cold2', 'vapour', 6e5, 560], ['hot2', 'vapour', 5e5, 813]),
      ]),
    )
    expect(found['Hot reheat 1']).toBe('hot')
    expect(found['Cold reheat 2']).toBe('cold2')
  })

  it('take the superheater outlet for main steam', () => {
    const found = named(
      [process('boiler', 'fw', 'dry'), process('superheater', 'dry', 'main')],
      new Map([...reheatStates, ...states(['dry', 'wet', 131e5, 604])]),
    )
    expect(found).toEqual({ 'Main steam': 'main', Feedwater: 'fw' })
  })

  it('take the hottest of several boilers', () => {
    const found = named(
      [process('boiler', 'fw', 'cool'), process('superheater', 'fw', 'main')],
      new Map([...reheatStates, ...states(['cool', 'vapour', 130e5, 700])]),
    )
    expect(found['Main steam']).toBe('main')
  })

  it('are those alone that the balance knows', () => {
    const some = new Map([...reheatStates].filter(([id]) => id !== 'main' && id !== 'hot'))
    expect(named(reheatPlant, some)).toEqual({ Exhaust: 'exhaust' })
    expect(named(reheatPlant, new Map())).toEqual({})
  })

  it('end in a plant whose heated streams run in a ring', () => {
    const ring = [process('boiler', 'fw', 'main'), process('superheater', 'main', 'fw')]
    expect(named(ring, reheatStates)).toEqual({ 'Main steam': 'main', Feedwater: 'fw' })
  })
})
