import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { type HeatProfile, heatProfilesOf } from '../../src/balance/heat-profile.ts'
import { Model } from '../../src/balance/model.ts'
import { type Balance, solve } from '../../src/balance/solve.ts'
import { readPlant } from '../../src/document.ts'
import { state } from '../../src/steam/index.ts'

function solved(file: string): Balance {
  const text = readFileSync(new URL(`../reference/cases/${file}`, import.meta.url), 'utf8')
  const read = readPlant(text)
  if (read.outcome !== 'plant') throw new Error(read.message)
  const layout = read.plant.layouts[0]
  if (!layout) throw new Error('No layout.')
  return solve(new Model(layout))
}

const balance = solved('o5-seven.json')
const profiles = new Map(heatProfilesOf(balance).map((profile) => [profile.unit, profile]))
const value = (path: string): number => balance.results.value(path) as number
const profileOf = (unit: string): HeatProfile => profiles.get(unit) as HeatProfile
const surfaces = balance.model.system.units.filter(
  ({ kind, streams }) => kind.heatPassage !== undefined && streams.has('water'),
)
const approach = ({ hot, cold }: { hot: number; cold: number }): number => hot - cold

describe.each(surfaces.map(({ unit }) => unit.id))('surface heater %s', (id) => {
  const profile = profileOf(id)
  const streams = surfaces.find(({ unit }) => unit.id === id)?.streams
  const at = (port: string, name: string) => value(`${streams?.get(port)}.${name}`)

  test('its heat is the duty, its ends the states of the streams', () => {
    expect(profile.heat / value(`${id}.heat`)).toBeCloseTo(1, 10)
    expect(profile.cold[0]).toBe(0)
    expect((profile.cold.at(-2) as number) / profile.heat).toBeCloseTo(1, 10)
    expect((profile.hot.at(-2) as number) / profile.heat).toBeCloseTo(1, 9)
    expect(profile.cold[1]).toBeCloseTo(at('water', 'T'), 8)
    expect(profile.cold.at(-1)).toBeCloseTo(at('outlet', 'T'), 7)
    expect(profile.hot[1]).toBeCloseTo(at('drain', 'T'), 7)
  })

  test('differences marked are the quantities', () => {
    expect(profile.marks.length).toBeGreaterThan(0)
    for (const mark of profile.marks) {
      expect(approach(mark)).toBeCloseTo(value(mark.quantity as string), 6)
    }
  })

  test('zones follow each other from end to end, each with its heat', () => {
    let reached = 0
    for (const { from, to } of profile.zones) {
      expect(from).toBe(reached)
      expect(to).toBeGreaterThan(from)
      reached = to
    }
    expect(reached).toBe(profile.heat)
    const cooling = profile.zones.find(({ name }) => name === 'drainCooling')
    const hasCooler = balance.results.value(`${id}.drainApproach`) !== null
    expect(cooling !== undefined).toBe(hasCooler)
    if (!cooling) return
    // The conductance of the zone, recomputed from its heat and end differences.
    const Tsat = state({ p: value(`${id}.pressure`), x: 0 })
    if (Tsat.outcome !== 'state') throw new Error('No saturation.')
    const h = at('water', 'h') + cooling.to / at('water', 'm')
    const behind = state({ p: at('outlet', 'p'), h })
    if (behind.outcome !== 'state') throw new Error('No state.')
    const [a, b] = [Tsat.T - behind.T, value(`${id}.drainApproach`)]
    const conductance = (cooling.to * Math.log(a / b)) / (a - b)
    expect(conductance / value(`${id}.drainConductance`)).toBeCloseTo(1, 8)
  })

  test('heat flows from hot to cold everywhere, least at the closest approach', () => {
    const { closest } = profile
    expect(closest).not.toBeNull()
    const least = approach(closest as { hot: number; cold: number })
    for (const mark of profile.marks) {
      const hot = Math.max(mark.hot, profile.hot.at(-1) as number)
      if (mark.at === 0) expect(least).toBeLessThanOrEqual(approach(mark) + 1e-9)
      else expect(least).toBeLessThanOrEqual(hot - mark.cold + 1e-9)
    }
  })
})

test('the condenser: cooling water from inlet to inlet and rise, the shell at saturation', () => {
  const condenser = balance.model.system.units.find(({ kind }) => kind.totals && kind.heatPassage)
  const id = condenser?.unit.id as string
  const profile = profileOf(id)
  expect(profile.heat / value(`${id}.heat`)).toBeCloseTo(1, 10)
  const Tsat = state({ p: value(`${id}.pressure`), x: 0 })
  expect(profile.hot.at(-1)).toBeCloseTo(Tsat.outcome === 'state' ? Tsat.T : 0, 8)
  const inlet = balance.results.value(`${id}.coolingInletT`)
  if (inlet === null) expect(profile.cold.length).toBe(0)
  else {
    expect([...profile.cold]).toEqual([0, inlet, profile.heat, inlet + value(`${id}.coolingRise`)])
  }
})

test('profiles of a balance that did not change are the same objects', () => {
  const again = heatProfilesOf(balance)
  expect(again).toHaveLength(profiles.size)
  for (const profile of again) expect(profile).toBe(profiles.get(profile.unit))
})

test('a counterflow exchanger has its two end differences', () => {
  const other = solved('o7-cogen.json')
  const all = heatProfilesOf(other)
  for (const profile of all) {
    for (const mark of profile.marks) {
      const wanted = other.results.value(mark.quantity as string) as number
      expect(approach(mark)).toBeCloseTo(wanted, 6)
    }
  }
  expect(all.length).toBeGreaterThan(0)
})
