import type { kinds } from '../../src/document.ts'
import type { ProcessName } from '../../src/messages.ts'
import type { StreamState } from './stream-states.ts'

/** What the choice of states needs to know of a unit's kind. */
export interface UnitRole {
  readonly secondLaw: (typeof kinds)[number]['secondLaw']
  /** The unit drives a shaft. */
  readonly drives: boolean
}

/** A state with its name in the trade's words. */
export interface NamedState {
  readonly id: string
  readonly name: string
}

/**
 * The few states that the trade calls by name: main steam, cold and hot reheat, exhaust, feedwater.
 * They follow from the processes: what turns water into steam makes main steam from feedwater, what heats
 * steam that a turbine has let go is a reheat, and the last state of the expansion is the exhaust.
 */
export function namedStates(
  processes: readonly ProcessName[],
  states: ReadonlyMap<string, StreamState>,
  roleOf: (unit: string) => UnitRole | undefined,
): NamedState[] {
  const named: NamedState[] = []
  const add = (id: string | undefined, name: string) => {
    if (id !== undefined && !named.some((one) => one.id === id)) named.push({ id, name })
  }

  const heated = processes.filter((process) => {
    const role = roleOf(process.unit)?.secondLaw
    return (
      (role === 'fired' || role === 'heated') && states.has(process.from) && states.has(process.to)
    )
  })
  const state = (id: string) => states.get(id) as StreamState
  const evaporating = heated
    .filter(({ from, to }) => state(from).phase === 'liquid' && state(to).phase !== 'liquid')
    .map((process) => {
      // A superheater of its own, straight after: its outlet is the main steam.
      const chain = [process]
      for (;;) {
        const end = (chain.at(-1) as ProcessName).to
        const next = heated.find(({ from, to }) => from === end && state(to).T > state(end).T)
        if (!next || chain.includes(next)) return chain
        chain.push(next)
      }
    })
  const outlet = (chain: readonly ProcessName[]) => (chain.at(-1) as ProcessName).to
  const main = evaporating.reduce<readonly ProcessName[] | undefined>(
    (best, chain) => (!best || state(outlet(chain)).T > state(outlet(best)).T ? chain : best),
    undefined,
  )
  if (main) add(outlet(main), 'Main steam')

  const inChains = new Set(evaporating.flat())
  const reheats = heated
    .filter((process) => !inChains.has(process) && state(process.from).phase !== 'liquid')
    .filter(({ from, to }) => state(to).T > state(from).T)
    .sort((a, b) => state(b.from).p - state(a.from).p)
  for (const [i, reheat] of reheats.entries()) {
    const which = reheats.length > 1 ? ` ${i + 1}` : ''
    add(reheat.to, `Hot reheat${which}`)
    add(reheat.from, `Cold reheat${which}`)
  }

  const ends = processes
    .filter(({ unit, to }) => roleOf(unit)?.drives && states.has(to))
    .map(({ to }) => state(to))
  const exhaust = ends.reduce<StreamState | undefined>(
    (last, end) =>
      !last || end.p < last.p || (end.p === last.p && Math.abs(end.m) > Math.abs(last.m))
        ? end
        : last,
    undefined,
  )
  add(exhaust?.id, 'Exhaust')
  if (main) add((main[0] as ProcessName).from, 'Feedwater')
  return named
}
