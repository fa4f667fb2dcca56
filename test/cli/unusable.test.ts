import { describe, expect, test } from 'vitest'
import { applyOverrides, readPlant } from '../../src/document.ts'
import { layoutOf } from '../published/build-layout.ts'
import { simpleCycle } from '../published/cycles.ts'

/* Files and calls that cannot be used: what the command line would say, without starting it. */

const layout = layoutOf(
  simpleCycle({ main: { p: 6e6, T: 723.15, m: 40 }, condenser: 7e3, pump: 0.75 }),
)

/** A file whose first layout is changed by hand. */
function messageFor(change: (file: LooseFile, layout: LooseLayout) => void): string {
  const file = JSON.parse(
    JSON.stringify({
      format: 'bledsteam/plant',
      version: 1,
      title: 'Trial',
      layouts: [layout],
    }),
  ) as LooseFile
  change(file, file.layouts[0]!)
  const read = readPlant(JSON.stringify(file))
  if (read.outcome !== 'unusable') throw new Error('the file was read')
  return read.message
}

type Loose = Record<string, unknown>
interface LooseFile extends Loose {
  layouts: LooseLayout[]
}
interface LooseLayout extends Loose {
  units: (Loose & { given: Loose })[]
  streams: (Loose & { given: Loose })[]
  shafts: (Loose & { given: Loose })[]
}

test('the unchanged file is read', () => {
  expect(() => messageFor(() => {})).toThrow('the file was read')
})

describe('a file that cannot be used: one line that names the place', () => {
  const changes: readonly [string, Parameters<typeof messageFor>[0], RegExp][] = [
    ['unknown kind', (_, at) => (at.units[1]!.kind = 'turbin'), /units\[1\].*turbin.*turbine/],
    ['unknown key of the file', (file) => (file.author = 'x'), /author/],
    ['unknown key of a unit', (_, at) => (at.units[0]!.colour = 'red'), /units\[0\].*colour/],
    ['unknown key of a stream', (_, at) => (at.streams[2]!.size = 1), /streams\[2\].*size/],
    ['unknown option', (_, at) => (at.units[1]!.options = { fast: true }), /units\[1\].*fast/],
    [
      'a quantity that the unit does not have',
      (_, at) => (at.units[2]!.given.drainApproach = 5),
      /units\[2\].*drainApproach/,
    ],
    [
      'a quantity of another number of groups',
      (_, at) => (at.units[1]!.given.groupEfficiency2 = 0.9),
      /groupEfficiency2/,
    ],
    [
      'generator quantities without a generator',
      (_, at) => (at.shafts[0]!.generator = false),
      /generator/,
    ],
    [
      'a port used twice',
      (_, at) => at.streams.push({ id: 'z', from: 'b.steam', to: 'c.steam2', given: {} }),
      /streams\[4\].*b\.steam.*main/,
    ],
    [
      'numbers of a port with a gap',
      (_, at) => (at.streams[1]!.to = 'c.steam2'),
      /streams\[1\].*steam2.*steam1/,
    ],
    ['an unknown port', (_, at) => (at.streams[0]!.from = 'b.stem'), /streams\[0\].*stem.*steam/],
    ['an unknown unit', (_, at) => (at.streams[0]!.from = 'x.steam'), /streams\[0\].*x/],
    ['a stream from an inlet', (_, at) => (at.streams[0]!.from = 'b.feedwater'), /inlet/],
    ['the same id twice', (_, at) => (at.streams[0]!.id = 'feed'), /feed/],
    ['the id plant', (_, at) => (at.units[0]!.id = 'plant'), /units\[0\].*plant/],
    ['an ill-formed id', (_, at) => (at.streams[0]!.id = '1st'), /streams\[0\].*1st/],
    ['a given that is text', (_, at) => (at.streams[0]!.given.p = '60 bar'), /given\.p/],
    [
      'a curve against a missing path',
      (_, at) => {
        at.units[0]!.given.efficiency = {
          against: 'main.q',
          points: [
            [0, 1],
            [1, 1],
          ],
        }
      },
      /main\.q/,
    ],
    [
      'a curve whose points do not rise',
      (_, at) => {
        at.units[0]!.given.efficiency = {
          against: 'main.m',
          points: [
            [2, 0.9],
            [2, 0.8],
          ],
        }
      },
      /efficiency.*rise/,
    ],
    [
      'a curve of one point',
      (_, at) => {
        at.units[0]!.given.efficiency = { against: 'main.m', points: [[2, 0.9]] }
      },
      /efficiency.*two/,
    ],
    ['a shaft with an unknown unit', (_, at) => (at.shafts[0]!.turbines = ['tt']), /tt/],
    ['a shaft driven by a boiler', (_, at) => (at.shafts[0]!.turbines = ['b']), /turbines\[0\].*b/],
    ['a newer version', (file) => (file.version = 2), /version/],
    ['another format', (file) => (file.format = 'something'), /format/],
    ['no layouts', (file) => (file.layouts = []), /layout/],
    [
      'a case with an unknown path',
      (_, at) => (at.cases = [{ id: 'low', name: 'Low', given: { 'mian.m': 5 } }]),
      /mian/,
    ],
  ]

  test.each(changes)('%s', (_, change, says) => {
    const message = messageFor(change)
    expect(message).toMatch(says)
    expect(message).not.toContain('\n')
  })

  test.each([
    ['', /[Ll]ine 1, column 1/],
    ['{ "format": "bledsteam/plant", }', /[Ll]ine 1, column \d+/],
    ['{\n "format": NaN }', /[Ll]ine 2, column \d+/],
    ['[1, 2', /[Ll]ine 1, column \d+/],
    ['null', /./],
    ['[]', /./],
    ['3', /./],
  ])('text %j', (text, says) => {
    const read = readPlant(text)
    expect(read.outcome).toBe('unusable')
    if (read.outcome === 'unusable') expect(read.message).toMatch(says)
  })
})

describe('a call that cannot be used', () => {
  test.each([
    [{ free: ['main.q'], set: {} }, /main.*q/],
    [{ free: [], set: { 'mian.m': 4 } }, /mian.*main/],
    [{ free: [], set: { 'c.drainApproach': 4 } }, /drainApproach/],
    [{ free: [], set: { 'plant.power': 4 } }, /power/],
    [{ free: [], set: { main: 4 } }, /main/],
  ])('%j', (overrides, says) => {
    const applied = applyOverrides(layout, overrides)
    expect(applied.outcome).toBe('unusable')
    if (applied.outcome === 'unusable') {
      expect(applied.message).toMatch(says)
      expect(applied.message).not.toContain('\n')
    }
  })

  test('freeing what is not given is only remarked; frees come before sets', () => {
    const applied = applyOverrides(layout, {
      free: ['b.heat', 'main.m'],
      set: { 'main.m': 50 },
    })
    if (applied.outcome === 'unusable') throw new Error(applied.message)
    expect(applied.remarks.map(({ quantities }) => quantities)).toEqual([['b.heat']])
    const main = applied.layout.streams.find(({ id }) => id === 'main')!
    expect(main.given.m).toBe(50)
    expect(main.given.T).toBe(723.15)
  })
})
