import { describe, expect, it } from 'vitest'
import type { Layout, Stream, Unit } from '../../src/document.ts'
import { passesThrough, type Route } from '../../web/canvas/routing.ts'
import { drawSheet } from '../../web/canvas/sheet.ts'
import { placeUnits } from '../../web/canvas/standing.ts'

const unit = (id: string, kind: string, at: readonly [number, number], more = {}): Unit => ({
  id,
  kind,
  label: id,
  at,
  given: {},
  ...more,
})

const stream = (id: string, from: string, to: string): Stream => ({ id, from, to, given: {} })

const layout = (units: readonly Unit[], streams: readonly Stream[]): Layout => ({
  id: 'base',
  name: 'Base',
  ambient: { T: 298.15, p: 101325 },
  units,
  streams,
  shafts: [
    {
      id: 'sh',
      turbines: units.filter((one) => one.kind === 'turbine').map((one) => one.id),
      pumps: [],
      given: {},
    },
  ],
  plant: { given: {} },
  cases: [],
  stated: [],
})

/** Harrow Fen: boiler, two turbines, reheater, condenser, heater, pumps; invented. */
const harrowFen = layout(
  [
    unit('b', 'boiler', [16, 72]),
    unit('hp', 'turbine', [128, 40]),
    unit('rh', 'reheater', [256, 112]),
    unit('lp', 'turbine', [368, 40]),
    unit('cd', 'condenser', [520, 224]),
    unit('cp', 'pump', [536, 352], { mirrored: true }),
    unit('da', 'mixingHeater', [392, 304]),
    unit('fp', 'pump', [240, 352], { mirrored: true }),
    unit('v', 'pipe', [408, 200]),
  ],
  [
    stream('s1', 'b.steam', 'hp.inlet'),
    stream('s2', 'hp.exhaust', 'rh.inlet'),
    stream('s3', 'rh.outlet', 'lp.inlet'),
    stream('s4', 'lp.bleed1', 'v.inlet'),
    stream('s5', 'v.outlet', 'da.steam1'),
    stream('s6', 'lp.exhaust', 'cd.steam1'),
    stream('s7', 'cd.condensate', 'cp.suction'),
    stream('s8', 'cp.discharge', 'da.water1'),
    stream('s9', 'da.outlet', 'fp.suction'),
    stream('s10', 'fp.discharge', 'b.feedwater'),
  ],
)

const straight = (route: Route | undefined) => route?.length === 2

describe('drawSheet', () => {
  const sheet = drawSheet(harrowFen)

  it('draws every unit and every stream', () => {
    expect(sheet.units.size).toBe(9)
    expect(sheet.streams.size).toBe(10)
  })

  it('runs no stream through a unit that it does not belong to', () => {
    for (const { id, from, to } of harrowFen.streams) {
      const route = sheet.streams.get(id)?.route ?? []
      const others = [...sheet.units.values()]
        .filter((one) => !from.startsWith(`${one.id}.`) && !to.startsWith(`${one.id}.`))
        .map((one) => one.body)
      expect(passesThrough(route, others), id).toBe(false)
    }
  })

  it('turns a pipe upright between what stands above and below, and bleeds fall straight', () => {
    expect(sheet.units.get('v')?.form.upright).toBe(true)
    expect(straight(sheet.streams.get('s4')?.route)).toBe(true)
    expect(straight(sheet.streams.get('s5')?.route)).toBe(true)
  })

  it('takes the inlet of a turbine from below where its steam comes from below', () => {
    expect(sheet.units.get('lp')?.anchors.inlet?.side).toBe('bottom')
    expect(sheet.units.get('hp')?.anchors.inlet?.side).toBe('top')
  })

  it('keeps what did not change, so that only what changed is drawn again', () => {
    const moved = drawSheet(harrowFen, new Map([['fp', [240, 368]]]), sheet)
    expect(moved.units.get('fp')).not.toBe(sheet.units.get('fp'))
    expect(moved.units.get('lp')).toBe(sheet.units.get('lp'))
    expect(moved.streams.get('s1')).toBe(sheet.streams.get('s1'))
    expect(moved.streams.get('s10')).not.toBe(sheet.streams.get('s10'))
  })

  it('makes way for a unit that is moved onto a stream', () => {
    const moved = drawSheet(harrowFen, new Map([['rh', [440, 240]]]), sheet)
    const body = moved.units.get('rh')?.body
    expect(body).toBeDefined()
    for (const id of ['s4', 's5', 's6', 's8']) {
      expect(passesThrough(moved.streams.get(id)?.route ?? [], body ? [body] : []), id).toBe(false)
    }
  })

  it('sets the generator at the free end of the shaft', () => {
    const shaft = sheet.shafts.get('sh')
    const lp = sheet.units.get('lp')
    expect(lp && shaft?.generator && shaft.generator[0] > lp.body.x + lp.body.width).toBe(true)
  })

  it('draws a unit of unknown kind and a stream to a port that is not there', () => {
    const strange = drawSheet(
      layout(
        [unit('a', 'nothingKnown', [0, 0]), unit('p', 'pump', [200, 0])],
        [stream('s', 'a.somewhere', 'p.suction')],
      ),
    )
    expect(strange.units.size).toBe(2)
    expect(strange.streams.get('s')?.route.length).toBeGreaterThan(1)
  })
})

describe('placeUnits', () => {
  it('parts the streams of a branch over its sides', () => {
    const placed = placeUnits(
      layout(
        [
          unit('hp', 'turbine', [0, 0]),
          unit('br', 'branch', [40, 96]),
          unit('rh', 'reheater', [120, 80]),
          unit('h', 'mixingHeater', [24, 240]),
        ],
        [
          stream('s1', 'hp.exhaust', 'br.inlet'),
          stream('s2', 'br.outlet1', 'h.steam1'),
          stream('s3', 'br.outlet2', 'rh.inlet'),
        ],
      ),
    )
    const anchors = placed.get('br')?.anchors
    expect(anchors?.inlet?.side).toBe('top')
    expect(anchors?.outlet1?.side).toBe('bottom')
    expect(anchors?.outlet2?.side).toBe('right')
  })
})
