import { useMemo } from 'react'
import { kindOf, type Layout } from '../../src/document.ts'
import { useBalanceStore } from '../store/balance-store.ts'
import { useLayout } from '../store/plant-store.ts'
import { type NamedState, namedStates, type UnitRole } from './named-states.ts'
import { type StreamState, statesOf } from './stream-states.ts'

/** The states of the balance shown. */
export function useStates(): ReadonlyMap<string, StreamState> {
  const names = useBalanceStore((state) => state.names)
  const balance = useBalanceStore((state) => state.balance)
  return statesOf(names, balance)
}

function rolesIn(layout: Layout): (unit: string) => UnitRole | undefined {
  const roles = new Map<string, UnitRole>()
  for (const unit of layout.units) {
    const kind = kindOf(unit.kind)
    if (kind) {
      roles.set(unit.id, { secondLaw: kind.secondLaw, drives: kind.shaft === 'driving' })
    }
  }
  return (unit) => roles.get(unit)
}

/** The states with names in the trade, in order of importance. */
export function useNamedStates(): readonly NamedState[] {
  const names = useBalanceStore((state) => state.names)
  const states = useStates()
  const { units } = useLayout()
  const layout = useLayout()
  // biome-ignore lint/correctness/useExhaustiveDependencies: roles depend on the units alone
  const roleOf = useMemo(() => rolesIn(layout), [units])
  return useMemo(
    () => (names ? namedStates(names.processes, states, roleOf) : []),
    [names, states, roleOf],
  )
}

const noStates: readonly StreamState[] = []

/** Where the machines' expansions begin and end. */
export function useExpansionEnds(): readonly StreamState[] {
  const names = useBalanceStore((state) => state.names)
  const states = useStates()
  const { units } = useLayout()
  return useMemo(() => {
    if (!names) return noStates
    const machines = new Set(
      units.filter(({ kind }) => kindOf(kind)?.shaft === 'driving').map(({ id }) => id),
    )
    return names.processes
      .filter(({ unit }) => machines.has(unit))
      .flatMap(({ from, to }) => [states.get(from), states.get(to)])
      .filter((state) => state !== undefined)
  }, [names, states, units])
}
