import { formatQuantity, type UnitChoice } from '../../src/document.ts'
import type { BalanceMessage } from '../../src/messages.ts'
import type { NamedState } from './named-states.ts'
import type { StreamState } from './stream-states.ts'

const written = ({ text, unit }: { text: string; unit: string }): string =>
  unit ? `${text} ${unit}` : text

/** A state in one line, for those who hear it. */
export function stateInWords(state: StreamState, units: UnitChoice): string {
  const parts = [
    written(formatQuantity(state.T, 'temperature', units)),
    written(formatQuantity(state.p, 'pressure', units)),
    `enthalpy ${written(formatQuantity(state.h, 'specificEnthalpy', units))}`,
    `entropy ${written(formatQuantity(state.s, 'specificEntropy', units))}`,
  ]
  if (state.phase === 'wet') parts.push(`dryness ${formatQuantity(state.x, 'dryness', units).text}`)
  if (Number.isFinite(state.m)) parts.push(written(formatQuantity(state.m, 'massFlow', units)))
  return parts.join(', ')
}

/** What the picture shows, in words. */
export function summary(
  diagram: string,
  states: ReadonlyMap<string, StreamState>,
  named: readonly NamedState[],
  units: UnitChoice,
): string {
  const title = `${diagram} with the saturation dome.`
  if (states.size === 0) return `${title} No states are solved.`
  const temperatures = Array.from(states.values(), (state) => state.T)
  const low = written(formatQuantity(Math.min(...temperatures), 'temperature', units))
  const high = written(formatQuantity(Math.max(...temperatures), 'temperature', units))
  const chosen = named.map(({ id, name }) => {
    const state = states.get(id) as StreamState
    const p = written(formatQuantity(state.p, 'pressure', units))
    const wet = state.phase === 'wet'
    const second = wet
      ? `dryness ${formatQuantity(state.x, 'dryness', units).text}`
      : written(formatQuantity(state.T, 'temperature', units))
    return `${name} ${p}, ${second}.`
  })
  return [
    title,
    `${states.size} ${states.size === 1 ? 'state' : 'states'}, ${low} to ${high}.`,
    ...chosen,
  ].join(' ')
}

/** Why the chart is empty and what to do, in a sentence or two. */
export function whyEmpty(
  unitCount: number,
  status: BalanceMessage['status'] | null,
  trouble: string | null,
): string {
  if (unitCount === 0) {
    return 'Nothing to draw yet. Place units on the canvas; their states appear here once they are solved.'
  }
  if (trouble) return `No states are solved. ${trouble}`
  switch (status) {
    case null:
      return 'The first balance is being solved.'
    case 'underspecified':
      return 'No states are solved yet: some numbers are still missing. The ledger names them.'
    case 'overspecified':
      return 'No states are solved: more is given than the equations can take. The ledger names what to free.'
    case 'infeasible':
      return 'No states are solved: the given numbers contradict physics. The findings say where.'
    case 'notConverged':
      return 'No states are solved: the balance did not close. The findings say where it stuck.'
    case 'solved':
      return 'No stream of this plant has a state to draw.'
  }
}
