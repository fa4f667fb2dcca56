import { readdirSync, readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { type Layout, readPlant } from '../../src/document.ts'
import { overlap } from '../../web/canvas/geometry.ts'
import { passesThrough } from '../../web/canvas/routing.ts'
import { drawSheet } from '../../web/canvas/sheet.ts'
import { Differences } from '../../web/canvas/tidy/differences.ts'
import { readLines } from '../../web/canvas/tidy/lines.ts'
import { tidy } from '../../web/canvas/tidy/tidy.ts'

const folder = new URL('../reference/cases/', import.meta.url)

function layoutsOf(file: string): readonly Layout[] {
  const read = readPlant(readFileSync(new URL(file, folder), 'utf8'))
  if (read.outcome !== 'plant') throw new Error(read.message)
  return read.plant.layouts
}

function tidied(layout: Layout, pinned: ReadonlySet<string> = new Set()): Layout {
  const places = tidy(layout, pinned)
  return {
    ...layout,
    units: layout.units.map((unit) => ({ ...unit, ...places.get(unit.id) })),
    streams: layout.streams.map(({ bends: _, ...stream }) => stream),
  }
}

const seven = layoutsOf('o5-seven.json')[0] as Layout
const plants = readdirSync(folder)
  .filter((file) => /^o\d+-[a-z]+\.json$/.test(file))
  .flatMap((file) => layoutsOf(file).map((layout, i) => ({ name: `${file} ${i}`, layout })))

test.each(plants)('$name: nothing stands on or runs through anything', ({ layout }) => {
  const { units, streams } = drawSheet(tidied(layout))
  const all = [...units.values()]
  expect(all).toHaveLength(layout.units.length)
  for (const [i, a] of all.entries()) {
    for (const b of all.slice(i + 1)) {
      expect(overlap(a.body, b.body), `${a.id} on ${b.id}`).toBe(false)
    }
    expect([a.at[0] % 8, a.at[1] % 8], a.id).toEqual([0, 0])
  }
  for (const { id, route } of streams.values()) {
    const ends = layout.streams.find((stream) => stream.id === id)
    const others = all.filter(
      (unit) => !ends?.from.startsWith(`${unit.id}.`) && !ends?.to.startsWith(`${unit.id}.`),
    )
    expect(
      passesThrough(
        route,
        others.map(({ body }) => body),
        0,
      ),
      id,
    ).toBe(false)
  }
})

describe('a plant with seven heaters', () => {
  const sheet = drawSheet(tidied(seven))
  const unit = (id: string) => {
    const one = sheet.units.get(id)
    if (!one) throw new Error(id)
    return one
  }

  test('its lines are read as the trade reads them', () => {
    const reading = readLines(seven)
    expect(reading?.steam.map(({ id }) => id)).toEqual([
      'bo',
      'hp',
      'crs',
      'rh',
      'ip',
      'xs',
      'lp',
      'cd',
    ])
    expect(reading?.water.map(({ id }) => id)).toEqual([
      'cp',
      'h1',
      'h2',
      'h3',
      'da',
      'fp',
      'h5',
      'h6',
      'h7',
    ])
    expect(reading?.rest).toEqual([])
  })

  test('machines stand on one line, from left to right as the steam goes', () => {
    const axes = ['hp', 'ip', 'lp'].map((id) => {
      const { at, symbol, form } = unit(id)
      return at[1] + (symbol.axis?.(form) ?? 0)
    })
    expect(new Set(axes).size).toBe(1)
    expect(sheet.shafts.get('sh')?.lines).toHaveLength(3)
    const lefts = ['bo', 'hp', 'ip', 'lp'].map((id) => unit(id).body.x)
    expect(lefts).toEqual([...lefts].sort((a, b) => a - b))
  })

  test('feedwater runs back below them, from right to left, the drains below it', () => {
    const row = ['h7', 'h6', 'h5', 'fp', 'h3', 'h2', 'h1', 'cp']
    const bodies = row.map((id) => unit(id).body)
    expect(new Set(bodies.map(({ y, height }) => y + height / 2)).size).toBe(1)
    expect(bodies.map(({ x }) => x)).toEqual(bodies.map(({ x }) => x).sort((a, b) => a - b))
    expect(Math.min(...bodies.map(({ y }) => y))).toBeGreaterThan(
      unit('lp').body.y + unit('lp').body.height,
    )
    for (const drain of ['d7', 'd6', 'd3', 'd2']) {
      const lowest = Math.max(...(sheet.streams.get(drain)?.route ?? []).map(([, y]) => y))
      expect(lowest, drain).toBeGreaterThan((bodies[0]?.y ?? 0) + 32)
    }
  })

  test('bleeds fall straight on their heaters', () => {
    for (const bleed of ['b7', 'b7x', 'b6', 'b6x', 'b5', 'b5x', 'b3', 'b3x', 'b2', 'b2x', 'b1']) {
      expect(sheet.streams.get(bleed)?.route, bleed).toHaveLength(2)
    }
  })
})

test('what is pinned stays where it is, and the rest comes to it', () => {
  const moved = {
    ...tidied(seven),
  }
  const shifted: Layout = {
    ...moved,
    units: moved.units.map((unit) =>
      unit.id === 'cd' ? { ...unit, at: [unit.at[0] + 160, unit.at[1] + 40] as const } : unit,
    ),
  }
  const after = tidied(shifted, new Set(['cd']))
  const at = (layout: Layout, id: string) => layout.units.find((unit) => unit.id === id)?.at
  expect(at(after, 'cd')).toEqual(at(shifted, 'cd'))
  expect(at(after, 'lp')).toEqual([
    (at(moved, 'lp')?.[0] ?? 0) + 160,
    (at(moved, 'lp')?.[1] ?? 0) + 40,
  ])
})

test('tidied twice is tidied once', () => {
  const once = tidied(seven)
  expect(tidied(once).units.map(({ at }) => at)).toEqual(once.units.map(({ at }) => at))
})

test('a network without a machine is laid out in layers, as its streams run', () => {
  const layout: Layout = {
    ...seven,
    shafts: [],
    units: ['supply', 'pump', 'valve', 'offtake'].map((kind) => ({
      id: kind,
      kind,
      label: kind,
      at: [0, 0],
      given: {},
    })),
    streams: [
      { id: 's1', from: 'supply.outlet', to: 'pump.suction', given: {} },
      { id: 's2', from: 'pump.discharge', to: 'valve.inlet', given: {} },
      { id: 's3', from: 'valve.outlet', to: 'offtake.inlet', given: {} },
    ],
  }
  const places = tidy(layout)
  const lefts = layout.units.map(({ id }) => places.get(id)?.at[0] ?? 0)
  for (let i = 1; i < lefts.length; i++) expect(lefts[i]).toBeGreaterThan((lefts[i - 1] ?? 0) + 24)
})

describe('places under constraints', () => {
  test('are the leftmost that keep them all', () => {
    const rules = new Differences()
    expect(rules.behind('a', 'b', 40)).toBe(true)
    expect(rules.exactly('b', 'c', -10)).toBe(true)
    expect(rules.behind('a', 'c', 50)).toBe(true)
    expect(['a', 'b', 'c'].map((name) => rules.get(name))).toEqual([0, 60, 50])
  })

  test('what contradicts is refused and changes nothing', () => {
    const rules = new Differences()
    rules.behind('a', 'b', 40)
    expect(rules.behind('b', 'a', 0)).toBe(false)
    expect(rules.exactly('a', 'b', 30)).toBe(false)
    expect(rules.get('b')).toBe(40)
  })
})
