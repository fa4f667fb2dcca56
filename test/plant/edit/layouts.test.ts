import { describe, expect, test } from 'vitest'
import type { Plant } from '../../../src/plant/document.ts'
import { addCase, changeCase, removeCase, setInCase } from '../../../src/plant/edit/cases.ts'
import { connect } from '../../../src/plant/edit/connect.ts'
import { copyItems, duplicateItems, pasteItems } from '../../../src/plant/edit/copy-items.ts'
import { EditRefused } from '../../../src/plant/edit/edit-refused.ts'
import {
  addLayout,
  copyLayout,
  removeLayout,
  setAmbient,
  setLayoutName,
  whyNotRemoved,
} from '../../../src/plant/edit/layouts.ts'
import { setGiven } from '../../../src/plant/edit/set-given.ts'
import { setBends } from '../../../src/plant/edit/streams.ts'
import { readPlant } from '../../../src/plant/read-plant.ts'
import { writePlant } from '../../../src/plant/write-plant.ts'
import { invented } from '../invented-catalogue.ts'
import {
  base,
  endsOf,
  layoutOf,
  plantOf,
  tappedMill,
  unitOf,
  withGivensOf,
  withParts,
} from './sample-plant.ts'

function whole(plant: Plant): Plant {
  expect(readPlant(writePlant(plant, invented), invented)).toEqual({
    outcome: 'plant',
    plant,
    repairs: [],
  })
  return plant
}

describe('layouts', () => {
  const plant = withParts(tappedMill(), (layout) => ({
    ...layout,
    cases: [
      { id: 'design', name: 'Design' },
      { id: 'low', name: 'Low', frozen: true, given: { 's1.m': 3 } },
    ],
  }))

  test('a new one is empty but for what every plant shows', () => {
    const { plant: two, id } = addLayout(plant, 'Sketch', invented)
    expect(layoutOf(whole(two), id)).toMatchObject({
      name: 'Sketch',
      units: [],
      plant: { given: { otherAuxiliary: 0 } },
    })
  })

  test('a copy runs on the machines of the original', () => {
    const { plant: two, id } = copyLayout(plant, base, 'Heater added', invented)
    const copy = layoutOf(whole(two), id)
    expect(id).toBe('proposal')
    expect(copy.cases).toEqual([
      { id: 'design', name: 'Design' },
      {
        id: 'low',
        name: 'Low',
        frozen: true,
        given: { 's1.m': 3 },
        hardwareFrom: { layout: base },
      },
    ])
    // A tap put in between: both parts come from the second stretch of the original.
    const tapped = connect(two, id, 'mill1.tap2', 'tub1.steam', { insert: true }, invented).plant
    const mill = layoutOf(whole(tapped), id).units.find((unit) => unit.id === 'mill1')
    expect(mill?.options).toEqual({ origins: [1, 2, 2, 3, 4] })
    expect(layoutOf(tapped)).toBe(layoutOf(plant))
  })

  test('one on whose hardware others rely stays', () => {
    const { plant: two, id } = copyLayout(plant, base, 'Heater added', invented)
    expect(whyNotRemoved(plant, base)).toContain('at least one')
    expect(whyNotRemoved(two, base)).toBe(
      'Case Low of layout Heater added takes its hardware from this layout.',
    )
    expect(() => removeLayout(two, base)).toThrow(EditRefused)
    expect(removeLayout(two, id)).toEqual(plant)
  })

  test('names and surroundings', () => {
    expect(layoutOf(setLayoutName(plant, base, 'Now')).name).toBe('Now')
    expect(layoutOf(setAmbient(plant, base, { T: 285 })).ambient).toEqual({ T: 285, p: 101325 })
    expect(setAmbient(plant, base, { T: 298.15 })).toBe(plant)
    expect(() => setAmbient(plant, base, { T: 0 })).toThrow(EditRefused)
    expect(() => setAmbient(plant, base, { p: Number.NaN })).toThrow(EditRefused)
  })
})

describe('cases', () => {
  const given = setGiven(tappedMill(), base, 's1.m', 5, invented)
  const { plant, id } = addCase(given, base, 'Low load')
  const caseOf = (one: Plant) => layoutOf(whole(one)).cases.find((each) => each.id === id)

  test('start as the layout is, or like another', () => {
    expect(caseOf(plant)).toEqual({ id: 'case1', name: 'Low load' })
    const frozen = changeCase(plant, base, id, { frozen: true, loadControl: 'sliding' })
    const like = addCase(frozen, base, 'Lower', id)
    expect(layoutOf(like.plant).cases.at(-1)).toEqual({
      id: 'case2',
      name: 'Lower',
      frozen: true,
      loadControl: 'sliding',
    })
    expect(
      caseOf(changeCase(frozen, base, id, { frozen: undefined, loadControl: undefined })),
    ).toEqual(caseOf(plant))
  })

  test('give, free, and leave to the layout', () => {
    const set = setInCase(plant, base, id, 's1.m', 3, invented)
    expect(caseOf(set)).toEqual({ id, name: 'Low load', given: { 's1.m': 3 } })
    const freed = setInCase(set, base, id, 's1.m', 'free', invented)
    expect(caseOf(freed)).toEqual({ id, name: 'Low load', free: ['s1.m'] })
    // Not given by the layout: there is nothing to free.
    expect(caseOf(setInCase(plant, base, id, 's2.p', 'free', invented))).toEqual(caseOf(plant))
    expect(caseOf(setInCase(freed, base, id, 's1.m', 4, invented))).toEqual({
      id,
      name: 'Low load',
      given: { 's1.m': 4 },
    })
    expect(setInCase(freed, base, id, 's1.m', 'layout', invented)).toEqual(plant)
    expect(() => setInCase(plant, base, id, 's1.q', 3, invented)).toThrow(EditRefused)
  })

  test('refuse what is not there', () => {
    expect(() => changeCase(plant, base, id, { hardwareFrom: { layout: 'old' } })).toThrow(
      EditRefused,
    )
    expect(() => changeCase(plant, base, id, { outOfService: ['h7'] })).toThrow('no unit h7')
    expect(() => changeCase(plant, base, 'ghost', {})).toThrow(EditRefused)
  })

  test('go, unless another takes its hardware from them', () => {
    expect(removeCase(plant, base, id)).toEqual(given)
    const other = addCase(plant, base, 'Other')
    const used = changeCase(other.plant, base, other.id, {
      hardwareFrom: { layout: base, case: id },
    })
    expect(() => removeCase(used, base, id)).toThrow('Case Other')
  })
})

describe('copying and pasting', () => {
  const plant = withGivensOf(setBends(tappedMill(), base, 's3', [[10, 20]]), 'mill1', {
    skill1: 0.81,
    skill2: {
      against: 's2.p',
      points: [
        [0, 0.7],
        [1, 0.8],
      ],
    },
    skill3: {
      against: 's1.m',
      points: [
        [0, 0.7],
        [1, 0.8],
      ],
    },
    skill4: {
      against: 'plant.netPower',
      points: [
        [0, 0.7],
        [1, 0.8],
      ],
    },
  })

  test('a part is a plant of its own', () => {
    const part = copyItems(plant, base, ['mill1', 'tub1'], invented)
    expect(readPlant(writePlant(part, invented), invented)).toMatchObject({
      outcome: 'plant',
      repairs: [],
    })
    expect(layoutOf(part).units.map(({ id }) => id)).toEqual(['mill1', 'tub1'])
    expect(Object.keys(endsOf(part))).toEqual(['s2', 's3', 's4'])
    expect(layoutOf(part).cases).toEqual([])
  })

  test('what is pasted has ids of its own, and its curves depend on the copies', () => {
    const after = duplicateItems(plant, base, ['mill1', 'tub1'], [16, 16], invented)
    whole(after.plant)
    expect(after.ids).toEqual(['mill2', 'tub2', 's5', 's6', 's7'])
    expect(endsOf(after.plant)).toMatchObject({ ...endsOf(plant), s6: 'mill2.tap2 > tub2.steam2' })
    expect(layoutOf(after.plant).streams.find(({ id }) => id === 's6')?.bends).toEqual([[26, 36]])
    expect(unitOf(after.plant, 'mill2')).toMatchObject({ label: 'Mill 2', at: [176, 16] })
    // The stream s1 was not copied: what depends on it is freed.
    expect(unitOf(after.plant, 'mill2').given).toEqual({
      skill1: 0.81,
      skill2: {
        against: 's5.p',
        points: [
          [0, 0.7],
          [1, 0.8],
        ],
      },
      skill4: {
        against: 'plant.netPower',
        points: [
          [0, 0.7],
          [1, 0.8],
        ],
      },
    })
    expect(layoutOf(after.plant).shafts).toMatchObject([{ turbines: ['mill1', 'mill2'] }])
    expect(layoutOf(after.plant).units.slice(0, 3)).toEqual(layoutOf(plant).units)
  })

  test('into another plant', () => {
    const part = copyItems(plant, base, ['kettle1', 'mill1'], invented)
    const other = plantOf('kettle')
    const after = pasteItems(other, base, part, [0, 0], invented)
    expect(endsOf(whole(after.plant))).toEqual({ s1: 'kettle2.steam > mill1.inlet' })
    expect(layoutOf(after.plant).shafts).toMatchObject([{ id: 'shaft1', turbines: ['mill1'] }])
    expect(
      pasteItems(other, base, copyItems(plant, base, [], invented), [0, 0], invented).plant,
    ).toBe(other)
  })
})
