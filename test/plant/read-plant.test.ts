import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { checkPlant } from '../../src/plant/check-plant.ts'
import type { Layout, Plant, Stream, Unit } from '../../src/plant/document.ts'
import { readPlant } from '../../src/plant/read-plant.ts'
import { writePlant } from '../../src/plant/write-plant.ts'
import { invented } from './invented-catalogue.ts'

/** A kettle, a mill with two taps, a tub, a lifter: a closed circuit, with all that a file can hold. */
function sample() {
  return {
    format: 'bledsteam/plant',
    version: 1,
    title: 'Tarn Vale',
    layouts: [
      {
        id: 'base',
        name: 'As built',
        ambient: { T: 298.15, p: 101325 },
        units: [
          { id: 'k', kind: 'kettle', label: 'Kettle', at: [0, 0], given: { warmth: 0.9 } },
          {
            id: 'm',
            kind: 'mill',
            label: 'Mill',
            at: [160, 0],
            mirrored: true,
            options: { lifting: true, heldTaps: [2], origins: [1, 1, 2] },
            given: {
              skill1: {
                against: 'main.m',
                points: [
                  [1, 0.7],
                  [2, 0.8],
                  [3, 0.75],
                ],
              },
              skill2: { against: 'm.power', power: { at: 2e6, value: 0.8, exponent: -0.5 } },
              skill3: 0.8,
              lift1: 0.1,
            },
          },
          { id: 't', kind: 'tub', label: 'Tub', at: [320, 0], given: { pressure: 1e5 } },
          { id: 'l', kind: 'lifter', label: 'Lifter', at: [320, 160], given: { skill: 0.7 } },
        ],
        streams: [
          { id: 'main', from: 'k.steam', to: 'm.inlet', given: { p: 1e7, T: 800, m: 5 } },
          { id: 'tap', from: 'm.tap1', to: 't.steam1', given: {}, bends: [[200, 50]] },
          { id: 'tip', from: 'm.tap2', to: 't.steam2', given: {}, label: 'The second' },
          { id: 'exh', from: 'm.exhaust', to: 't.drain1', given: {} },
          { id: 'cond', from: 't.outlet', to: 'l.inlet', given: {} },
          { id: 'feed', from: 'l.outlet', to: 'k.water', given: {} },
        ],
        shafts: [
          { id: 'sh', turbines: ['m'], pumps: ['l'], given: { loss: 0, dynamoSkill: 0.98 } },
        ],
        plant: { given: { otherAuxiliary: 0 } },
        cases: [
          { id: 'design', name: 'Design' },
          {
            id: 'low',
            name: 'Low',
            frozen: true,
            hardwareFrom: { layout: 'base', case: 'design' },
            loadControl: 'sliding',
            given: { 'main.m': 3 },
            free: ['main.p'],
            outOfService: ['t'],
          },
        ],
        stated: [{ anything: [1, { goes: true }] }],
      },
    ],
  }
}

/** Paths in the first layout (or, with a stroke, in the plant) to what is put there; undefined: taken away. */
type Change = Readonly<Record<string, unknown>>

function changed(changes: Change) {
  const plant = sample()
  for (const [path, value] of Object.entries(changes)) {
    const keys = path.startsWith('/')
      ? path.slice(1).split('/')
      : ['layouts', '0', ...path.split('.')]
    const last = keys.pop() as string
    // Unknown: that is what a damaged file is.
    let part = plant as unknown as Record<string, unknown>
    for (const key of keys) part = part[key] as Record<string, unknown>
    if (value === undefined) delete part[last]
    else part[last] = value
  }
  return plant
}

describe('a file with all that it can hold', () => {
  test('is read as it is', () => {
    const read = readPlant(JSON.stringify(sample()), invented)
    expect(read).toEqual({ outcome: 'plant', plant: sample(), repairs: [] })
  })

  test('is written so that it is read again, with each thing on its line', () => {
    const read = readPlant(JSON.stringify(sample()), invented)
    const plant = (read as { plant: Plant }).plant
    const text = writePlant(plant, invented)
    expect(readPlant(text, invented)).toEqual(read)
    expect(text).toContain(
      '\n        { "id": "tap", "from": "m.tap1", "to": "t.steam1", "given": {}, "bends": [[200, 50]] },\n',
    )
    for (const line of text.split('\n')) expect(line.length).toBeLessThanOrEqual(100)
  })

  test('the order in which things were given does not show in the text', () => {
    const read = readPlant(JSON.stringify(sample()), invented)
    const plant = (read as { plant: Plant }).plant
    const turned = JSON.parse(JSON.stringify(plant), (_, value) =>
      typeof value === 'object' && value !== null && !Array.isArray(value)
        ? Object.fromEntries(Object.entries(value).reverse())
        : value,
    )
    expect(writePlant(turned, invented)).toBe(writePlant(plant, invented))
  })
})

/* Contract, section 2: what makes a file unusable. The message names the place and the id. */
describe('an unusable file is refused with its place', () => {
  const skill1 = 'units.1.given.skill1'
  const skill2 = 'units.1.given.skill2'
  test.each<[string, Change, ...string[]]>([
    // Unknown keys.
    ['units[0].colour', { 'units.0.colour': 1 }, 'unit k has no key colour'],
    ['/subtitle', { '/subtitle': '' }],
    ['unit', { unit: [] }, 'Did you mean units?'],
    ['ambient.h', { 'ambient.h': 1 }],
    ['streams[1].port', { 'streams.1.port': 1 }, 'stream tap'],
    ['shafts[0].speed', { 'shafts.0.speed': 50 }, 'shaft sh'],
    ['plant.cost', { 'plant.cost': 1 }],
    ['cases[1].notes', { 'cases.1.notes': '' }],
    ['cases[1].hardwareFrom.unit', { 'cases.1.hardwareFrom.unit': 'm' }],
    ['units[1].options.lift', { 'units.1.options.lift': true }, 'm (mill) has no option lift'],
    ['/["a\\nb"]', { '/a\nb': 1 }],
    // Kinds, ids.
    ['units[1].kind', { 'units.1.kind': 'mil' }, 'unit m', 'Did you mean mill?'],
    ['units[1].kind', { 'units.1.kind': 'toString' }, 'not known'],
    ['units[1].id', { 'units.1.id': 'k' }, 'taken already, by layouts[0].units[0]'],
    ['streams[0].id', { 'streams.0.id': 'k' }, 'taken already, by layouts[0].units[0]'],
    ['shafts[0].id', { 'shafts.0.id': 'feed' }, 'taken already'],
    ['units[1].id', { 'units.1.id': '5m' }, 'ill-formed'],
    ['units[1].id', { 'units.1.id': '' }, 'ill-formed'],
    ['units[1].id', { 'units.1.id': 'plant' }, 'kept for the totals'],
    ['/layouts[1].id', { '/layouts/1': sample().layouts[0] }, 'taken already'],
    ['cases[1].id', { 'cases.1.id': 'design' }, 'taken already'],
    // Ports and streams.
    [
      'streams[0].to',
      { 'streams.0.to': 'm.inlett' },
      'm (mill) has no port',
      'Did you mean inlet?',
    ],
    ['streams[0].to', { 'streams.0.to': 'x.inlet' }, 'stream main', 'no unit x'],
    ['streams[0].to', { 'streams.0.to': 'inlet' }, 'stream main needs a unit and its port'],
    ['streams[0].to', { 'streams.0.to': 'm.exhaust' }, 'm.exhaust is an outlet'],
    ['streams[0].from', { 'streams.0.from': 'm.inlet' }, 'm.inlet is an inlet'],
    ['streams[0].to', { 'streams.0.to': 'sh.inlet' }, 'no unit sh'],
    ['streams[0].to', { 'streams.0.to': 'm.constructor' }, 'no port constructor'],
    ['streams[1].to', { 'streams.1.to': 't.steam' }, 'numbered'],
    ['streams[1].to', { 'streams.1.to': 't.steam01' }, 'no port steam01'],
    ['streams[1].to', { 'streams.1.to': 't.steam3' }, 't.steam3 but no t.steam1'],
    ['streams[3].to', { 'streams.3.to': 't.drain2' }, 't.drain2 but no t.drain1'],
    ['streams[3].to', { 'streams.3.to': 't.drain' }, 't.drain is an outlet'],
    ['streams[2].to', { 'streams.2.to': 't.steam1' }, 't.steam1 takes one stream', 'tap'],
    // Quantities.
    ['units[0].given.warmpth', { 'units.0.given.warmpth': 1 }, 'Did you mean warmth?'],
    ['units[0].given.dripFraction', { 'units.0.given.dripFraction': 0 }, 'options and streams'],
    ['units[1].given.skill4', { 'units.1.given.skill4': 0.8 }, 'm (mill) has no skill4'],
    ['units[1].given.skill', { 'units.1.given.skill': 0.8 }, 'm has no quantity skill'],
    ['units[1].given.constructor', { 'units.1.given.constructor': 1 }, 'no quantity constructor'],
    ['streams[0].given.v', { 'streams.0.given.v': 1 }, 'main has no quantity v'],
    ['shafts[0].given.dynamoSkill', { 'shafts.0.generator': false }, 'sh has no generator'],
    ['plant.given.profit', { 'plant.given.profit': 1 }, 'plant has no quantity profit'],
    // Types and numbers.
    ['/layouts', { '/layouts': {} }, 'a list should stand here'],
    ['/layouts', { '/layouts': [] }, 'at least one layout'],
    ['/layouts[0]', { '/layouts/0': null }, 'an object should stand here'],
    ['/title', { '/title': 5 }, 'a text should stand here'],
    ['units', { units: undefined }, 'a list should stand here; nothing does'],
    ['ambient', { ambient: undefined }],
    ['ambient.T', { 'ambient.T': 0 }, 'above zero'],
    ['units[0].at', { 'units.0.at': [1] }, 'two numbers'],
    ['units[0].at[1]', { 'units.0.at': [1, '2'] }, 'a number should stand here'],
    ['units[0].mirrored', { 'units.0.mirrored': 'yes' }, 'true or false'],
    ['units[1].options.lifting', { 'units.1.options.lifting': [1] }, 'true or false'],
    ['units[1].options.heldTaps', { 'units.1.options.heldTaps': true }, 'a list'],
    ['units[1].options.heldTaps[0]', { 'units.1.options.heldTaps': [1.5] }, 'whole number'],
    ['units[0].given.warmth', { 'units.0.given.warmth': '0.9' }, 'a number or a curve'],
    ['units[0].given.warmth', { 'units.0.given.warmth': null }, 'a number or a curve'],
    ['units[0].given', { 'units.0.given': [] }, 'an object'],
    ['streams[1].bends[0]', { 'streams.1.bends': [1] }, 'a list'],
    ['cases[1].free', { 'cases.1.free': 'main.p' }, 'a list'],
    ['cases[1].loadControl', { 'cases.1.loadControl': 'fast' }, 'sliding, throttled, wideOpen'],
    // Curves.
    ['units[1].given.skill1.against', { [`${skill1}.against`]: 'main.q' }, 'no quantity main.q'],
    ['units[1].given.skill1.against', { [`${skill1}.against`]: 'mian.m' }, 'Did you mean main?'],
    ['units[1].given.skill1.against', { [`${skill1}.against`]: 'm.skill1' }, 'itself'],
    [
      'units[1].given.skill1.points[1]',
      { [`${skill1}.points.1.0`]: 1 },
      'do not rise: 1 follows 1',
    ],
    ['units[1].given.skill1.points', { [`${skill1}.points`]: [[1, 2]] }, 'at least two points'],
    ['units[1].given.skill1', { [`${skill1}.points`]: undefined }, 'either points or power'],
    ['units[1].given.skill1', { [`${skill1}.power`]: {} }, 'either points or power'],
    ['units[1].given.skill1.slope', { [`${skill1}.slope`]: 0 }],
    ['units[1].given.skill2.power.exponent', { [`${skill2}.power.exponent`]: undefined }],
    ['units[1].given.skill2.power.at', { [`${skill2}.power.at`]: 0 }, 'other than zero'],
    // Shafts and cases.
    ['shafts[0].turbines[0]', { 'shafts.0.turbines': ['x'] }, 'sh names x'],
    ['shafts[0].turbines[0]', { 'shafts.0.turbines': ['l'] }, 'l is a lifter'],
    ['shafts[0].pumps[0]', { 'shafts.0.pumps': ['k'] }, 'k is a kettle'],
    ['shafts[0].turbines[1]', { 'shafts.0.turbines': ['m', 'm'] }, 'm twice'],
    ['cases[1].given["main.q"]', { 'cases.1.given': { 'main.q': 1 } }, 'main has no quantity q'],
    ['cases[1].given.main', { 'cases.1.given': { main: 1 } }, 'dot'],
    ['cases[1].free[0]', { 'cases.1.free': ['mian.p'] }, 'Did you mean main?'],
    ['cases[1].outOfService[0]', { 'cases.1.outOfService': ['h7'] }, 'no unit h7'],
    ['cases[1].hardwareFrom.layout', { 'cases.1.hardwareFrom.layout': 'old' }, 'no layout old'],
    ['cases[1].hardwareFrom.case', { 'cases.1.hardwareFrom.case': 'full' }, 'no case full'],
    // Format and version.
    ['/format', { '/format': 'other/plant' }, 'other/plant'],
    ['/format', { '/format': undefined }, 'there is none'],
    ['/version', { '/version': 2 }, 'version 2', 'newer program'],
    ['/version', { '/version': '1' }],
  ])('%s after %j', (place, changes, ...says) => {
    const read = readPlant(JSON.stringify(changed(changes)), invented)
    if (read.outcome === 'plant') throw new Error('The file was read.')
    const start = place.startsWith('/') ? place.slice(1) : `layouts[0].${place}`
    expect(read.message.slice(0, start.length + 2)).toBe(`${start}: `)
    expect(read.message).not.toMatch(/[\n\r\u2028]/)
    for (const word of says) expect(read.message).toContain(word)
  })

  test('numbers that are none, wherever they stand', () => {
    const text = JSON.stringify(sample())
    for (const [from, to, place] of [
      ['"T":800', '"T":1e999', 'layouts[0].streams[0].given.T'],
      ['[2,0.8]', '[2,-1e999]', 'layouts[0].units[1].given.skill1.points[1][1]'],
      ['[160,0]', '[1e999,0]', 'layouts[0].units[1].at[0]'],
      ['"anything":[1', '"anything":[1e999', 'layouts[0].stated[0].anything[0]'],
      ['"main.m":3', '"main.m":1e999', 'layouts[0].cases[1].given["main.m"]'],
    ] as const) {
      expect(text).toContain(from)
      const read = readPlant(text.replace(from, to), invented)
      expect(read).toEqual({ outcome: 'unusable', message: `${place}: this number is not finite.` })
    }
    const notANumber = changed({ 'streams.0.given.T': Number.NaN })
    expect(checkPlant(notANumber, invented)).toMatchObject({ outcome: 'unusable' })
  })

  test('broken JSON: line and column', () => {
    const read = readPlant('{\n  "format": "bledsteam/plant",\n  "version": 1,,\n}', invented)
    expect(read).toEqual({
      outcome: 'unusable',
      message: 'Line 3, column 16: there is a comma too many.',
    })
  })
})

/* Contract, section 2: a required port without a stream, a turbine on no shaft or on two are findings. */
describe('what a plant merely lacks passes', () => {
  const passes = (changes: Change) => {
    const read = readPlant(JSON.stringify(changed(changes)), invented)
    if (read.outcome === 'unusable') throw new Error(read.message)
    return read
  }
  const shaft = sample().layouts[0]?.shafts[0]

  test.each<[string, Change]>([
    ['a required port without a stream', { 'streams.length': 5 }],
    ['a turbine on no shaft', { shafts: [] }],
    ['a turbine on two shafts', { 'shafts.1': { ...shaft, id: 'sh2', pumps: [] } }],
    ['no streams at all', { streams: [], 'units.1.given': {}, cases: [] }],
    ['a stream from steam to water', { 'streams.3.to': 'l.inlet', 'streams.4.to': 't.drain1' }],
    ['options that are none', { 'units.0.options': {} }],
    ['a list option beyond what is there', { 'units.1.options.heldTaps': [7] }],
  ])('%s', (_, changes) => {
    expect(passes(changes).repairs).toEqual([])
  })

  test('absent lists and options mean none', () => {
    const { plant } = passes({
      shafts: undefined,
      cases: undefined,
      stated: undefined,
      plant: undefined,
      'units.0.given': undefined,
      'streams.1.given': undefined,
    })
    const layout = plant.layouts[0] as Layout
    expect(layout.shafts).toEqual([])
    expect(layout.cases).toEqual([])
    expect(layout.plant).toEqual({ given: {} })
    expect((layout.units[0] as Unit).given).toEqual({})
    expect((layout.streams[1] as Stream).given).toEqual({})
  })

  test('names and places that are missing are put there, and told of', () => {
    const { plant, repairs } = passes({
      '/title': undefined,
      name: undefined,
      'units.0.label': undefined,
      'units.2.at': undefined,
    })
    expect(plant.title).toBe('Untitled plant')
    const layout = plant.layouts[0] as Layout
    expect(layout.name).toBe('base')
    expect(layout.units[0]?.label).toBe('Kettle')
    expect(layout.units[2]?.at.every(Number.isFinite)).toBe(true)
    expect(repairs.map(({ where }) => where)).toEqual([[], ['k'], ['t'], []])
    for (const { severity, message } of repairs) {
      expect(severity).toBe('remark')
      expect(message).toContain('was missing')
    }
  })
})

describe('whatever the text', () => {
  test('damaged files never throw, and are refused in one line or read', {
    timeout: 60_000,
  }, () => {
    const text = JSON.stringify(sample())
    const cut = fc.tuple(fc.nat(text.length), fc.nat(12), fc.string({ maxLength: 4 }))
    fc.assert(
      fc.property(fc.array(cut, { maxLength: 3 }), (cuts) => {
        let damaged = text
        for (const [start, length, patch] of cuts) {
          damaged = damaged.slice(0, start) + patch + damaged.slice(start + length)
        }
        const read = readPlant(damaged, invented)
        if (read.outcome === 'unusable') {
          expect(read.message).toMatch(/^[^\n\r\u2028\u2029]{10,700}$/)
        } else expect(readPlant(writePlant(read.plant, invented), invented).outcome).toBe('plant')
      }),
      { numRuns: 500 },
    )
  })

  test('any value in any place never throws', { timeout: 60_000 }, () => {
    const places: (string | number)[][] = []
    const walk = (value: unknown, path: (string | number)[]) => {
      places.push(path)
      if (typeof value !== 'object' || value === null) return
      for (const [key, one] of Object.entries(value)) walk(one, [...path, key])
    }
    walk(sample(), [])
    fc.assert(
      fc.property(fc.constantFrom(...places), fc.anything(), (path, value) => {
        const plant = { whole: sample() as unknown }
        const keys: (string | number)[] = ['whole', ...path]
        const last = keys.pop() as string
        let part = plant as Record<string, unknown>
        for (const key of keys) part = part[key] as Record<string, unknown>
        part[last] = value
        const read = checkPlant(plant.whole, invented)
        expect(['plant', 'unusable']).toContain(read.outcome)
      }),
      { numRuns: 1000 },
    )
  })
})
