import { describe, expect, test } from 'vitest'
import type { Given } from '../../src/document.ts'
import { changed, type LayoutParts } from '../published/build-layout.ts'
import { simpleCycle } from '../published/cycles.ts'
import pchip from '../reference/pchip.json'
import { answerOf, solvedAnswerOf } from './contract-answer.ts'

const cycle = changed(
  simpleCycle({ main: { p: 6e6, T: 723.15, m: 40 }, condenser: 7e3, pump: 0.75 }),
  { set: { 'p.driveEfficiency': 0.95, 's.mechanicalEfficiency': 0.99 } },
)
const at = (flow: number, path: string, given: Given) =>
  solvedAnswerOf(changed(cycle, { set: { 'main.m': flow, [path]: given } }))

describe('a curve through points is a monotone piecewise cubic (../reference/pchip.py: SciPy)', () => {
  /** The height of a pump's tank, which may be anything, against the flow. */
  const lift = (flow: number, points: readonly (readonly [number, number])[]): LayoutParts => ({
    units: {
      tank: ['supply'],
      p: ['pump', { efficiency: 0.8, suctionHeight: { against: 'out.m', points } }],
      net: ['offtake'],
    },
    streams: {
      in: ['tank.outlet', 'p.suction', { p: 1e5, T: 300, m: flow }],
      out: ['p.discharge', 'net.inlet', { p: 5e5 }],
    },
  })

  test.each(pchip.sets)('$name', ({ points, values }) => {
    const pairs = points as unknown as readonly (readonly [number, number])[]
    const first = pairs[0]![0]
    const last = pairs.at(-1)![0]
    for (const [r, q] of values as unknown as readonly (readonly [number, number])[]) {
      const answer = solvedAnswerOf(lift(r, pairs))
      expect(answer.at('p.suctionHeight')).toBeCloseTo(q, 12)
      const cautions = answer.findings.filter(({ code }) => code === 'beyond-curve')
      expect(cautions.length).toBe(r < first || r > last ? 1 : 0)
      for (const { severity, quantities } of cautions) {
        expect(severity).toBe('caution')
        expect(quantities).toEqual(expect.arrayContaining(['p.suctionHeight', 'out.m']))
      }
    }
  })
})

describe('a power law', () => {
  const law = { against: 'main.m', power: { at: 50, value: 0.9, exponent: -0.1 } } as const

  test('q = q0 (r/r0)^n', () => {
    for (const flow of [20, 50, 80]) {
      const wanted = 0.9 * (flow / 50) ** -0.1
      expect(at(flow, 'b.efficiency', law).at('b.efficiency')).toBeCloseTo(wanted, 12)
    }
  })

  test('has no ends to be beyond', () => {
    const answer = at(20, 'b.efficiency', law)
    expect(answer.findings.map(({ code }) => code)).not.toContain('beyond-curve')
  })
})

describe('what a curve is given against may itself be solved', () => {
  /** Pressure rise against volume flow. */
  const characteristic = {
    against: 'p.volumeFlow',
    points: [
      [0.01, 8e6],
      [0.03, 7e6],
      [0.05, 5.5e6],
      [0.07, 3e6],
    ],
  } as const

  test('a pump’s characteristic gives the pressure of a flow', () => {
    const answer = solvedAnswerOf(
      changed(cycle, { free: ['main.p'], set: { 'p.pressureRise': characteristic } }),
    )
    const volumeFlow = 40 * answer.at('condensate.v')
    expect(answer.at('p.volumeFlow') / volumeFlow).toBeCloseTo(1, 12)
    expect(answer.at('main.p') / (7e3 + answer.at('p.pressureRise'))).toBeCloseTo(1, 12)
    expect(answer.at('main.p')).toBeGreaterThan(5.5e6)
    expect(answer.at('main.p')).toBeLessThan(7e6)
  })

  test('and the flow of a pressure', () => {
    const turned = solvedAnswerOf(
      changed(cycle, { free: ['main.m'], set: { 'p.pressureRise': characteristic } }),
    )
    const back = solvedAnswerOf(
      changed(cycle, {
        free: ['main.p'],
        set: { 'main.m': turned.at('main.m'), 'p.pressureRise': characteristic },
      }),
    )
    expect(back.at('main.p') / 6e6).toBeCloseTo(1, 9)
  })

  test('exhaust loss as a curve of the exhaust velocity', () => {
    const answer = solvedAnswerOf(
      changed(cycle, {
        set: {
          't.exhaustArea': 4,
          't.exhaustLoss': {
            against: 't.exhaustVelocity',
            points: [
              [100, 20e3],
              [200, 25e3],
              [300, 45e3],
            ],
          },
        },
      }),
    )
    const velocity = answer.at('t.exhaustVelocity')
    expect(velocity).toBeGreaterThan(100)
    expect(velocity).toBeLessThan(300)
    expect(answer.at('t.exhaustVolumeFlow') / (4 * velocity)).toBeCloseTo(1, 12)
    expect(answer.at('t.exhaustLoss')).toBeGreaterThan(20e3)
    expect(answer.at('t.exhaustLoss')).toBeLessThan(45e3)
  })

  test('boiler efficiency against the feedwater temperature, a quantity of a stream', () => {
    const curve = {
      against: 'feed.T',
      points: [
        [300, 0.9],
        [400, 0.88],
      ],
    } as const
    const answer = solvedAnswerOf(changed(cycle, { set: { 'b.efficiency': curve } }))
    const wanted = 0.9 - (0.02 * (answer.at('feed.T') - 300)) / 100
    expect(answer.at('b.efficiency')).toBeCloseTo(wanted, 12)
  })
})

test('a quantity given as a curve counts as given: giving what it depends on twice is too many', () => {
  const curve = {
    against: 'main.m',
    points: [
      [10, 5e6],
      [60, 7e6],
    ],
  } as const
  const sliding = changed(cycle, { set: { 'main.p': curve } })
  expect(solvedAnswerOf(sliding).at('main.p')).toBeCloseTo(5e6 + (2e6 * 30) / 50, 6)
  const answer = answerOf(changed(sliding, { set: { 'feed.p': 6e6 } }))
  expect(answer.status).toBe('overspecified')
  expect(answer.finding('overspecified').quantities).toEqual(
    expect.arrayContaining(['main.p', 'feed.p']),
  )
})
