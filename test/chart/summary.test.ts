import { describe, expect, it } from 'vitest'
import type { BalanceMessage, NamesMessage } from '../../src/messages.ts'
import { statesOf } from '../../web/chart/stream-states.ts'
import { stateInWords, summary, whyEmpty } from '../../web/chart/summary.ts'

const names: NamesMessage = {
  type: 'names',
  structure: 1,
  paths: [
    ...['main.m', 'main.p', 'main.T', 'main.h', 'main.s', 'main.x'],
    ...['open.m', 'open.p', 'open.T', 'open.h', 'open.s', 'open.x'],
    ...['last.T', 'last.s', 'last.p', 'last.h', 'last.x', 'last.m', 'hp.power'],
  ],
  streams: ['main', 'open', 'last'],
  processes: [],
  layout: 'base',
  case: null,
  given: [],
  mainSteam: null,
  derived: { paths: [], account: [] },
}
const none = Number.NaN
const balance: BalanceMessage = {
  type: 'balance',
  sequence: 1,
  structure: 1,
  status: 'underspecified',
  values: Float64Array.of(
    ...[120, 130e5, 813.15, 3445053, 6576.5, none],
    ...[none, 1e5, none, none, none, none],
    ...[306.73, 7864.7, 5200, 2404e3, 0.9347, none, 4.6e7],
  ),
  phases: Uint8Array.of(3, 0, 2),
  findings: [],
  ledger: { unknowns: 0, equations: 0, blocks: 0, iterations: 0, missing: 0, excess: 0 },
  closure: null,
  undetermined: [],
  unbounded: [],
  curves: { points: new Float64Array(0), starts: Uint32Array.of(0), flows: new Float64Array(0) },
  isobars: {
    pressures: new Float64Array(0),
    points: new Float64Array(0),
    starts: Uint32Array.of(0),
  },
  derived: { values: new Float64Array(0), account: new Float64Array(0) },
  profiles: [],
  milliseconds: 1,
}

describe('the states of a balance', () => {
  const states = statesOf(names, balance)

  it('are those whose temperature and entropy are solved, read by name', () => {
    expect([...states.keys()]).toEqual(['main', 'last'])
    expect(states.get('main')).toMatchObject({ T: 813.15, s: 6576.5, phase: 'vapour', m: 120 })
    expect(states.get('last')).toMatchObject({ T: 306.73, p: 5200, x: 0.9347, phase: 'wet' })
  })

  it('are the same map for the same balance', () => {
    expect(statesOf(names, balance)).toBe(states)
    expect(statesOf(null, null).size).toBe(0)
  })

  it('are told in words, without a number that is open', () => {
    const last = states.get('last')
    expect(last && stateInWords(last, 'metric')).toBe(
      '33.6 °C, 0.0520 bar, enthalpy 2404.0 kJ/kg, entropy 7.8647 kJ/(kg K), dryness 0.9347',
    )
  })

  it('are summed up with the names of the few', () => {
    const text = summary(
      'Temperature-entropy diagram',
      states,
      [
        { id: 'main', name: 'Main steam' },
        { id: 'last', name: 'Exhaust' },
      ],
      'metric',
    )
    expect(text).toContain('2 states, 33.6 °C to 540.0 °C.')
    expect(text).toContain('Main steam 130.0 bar, 540.0 °C.')
    expect(text).toContain('Exhaust 0.0520 bar, dryness 0.9347.')
    expect(summary('Temperature-entropy diagram', new Map(), [], 'metric')).toContain(
      'No states are solved.',
    )
  })
})

describe('an empty chart', () => {
  it('says why, and where to go on', () => {
    expect(whyEmpty(0, null, null)).toContain('Place units')
    expect(whyEmpty(3, null, null)).toContain('being solved')
    expect(whyEmpty(3, 'underspecified', null)).toContain('ledger')
    expect(whyEmpty(3, 'overspecified', null)).toContain('free')
    expect(whyEmpty(3, 'infeasible', null)).toContain('findings')
    expect(whyEmpty(3, null, 'The layout cannot be read.')).toContain('The layout cannot be read.')
  })
})
