import { expect, test } from 'vitest'
import {
  addUnit,
  emptyPlant,
  mirrorUnits,
  moveUnits,
  setGiven,
  setLabel,
  setTitle,
} from '../../src/document.ts'
import { sameBalance } from '../../web/store/same-balance.ts'

const empty = emptyPlant('Plant')
const layout = empty.layouts[0]?.id ?? ''
const { plant, id } = addUnit(empty, layout, 'pump', [0, 0])

test('moving, mirroring and a new title leave the balance as it is', () => {
  expect(sameBalance(plant, moveUnits(plant, layout, [id], [16, 8]))).toBe(true)
  expect(sameBalance(plant, mirrorUnits(plant, layout, [id]))).toBe(true)
  expect(sameBalance(plant, setTitle(plant, 'Other'))).toBe(true)
})

test('what is given, what is there and what it is called in messages all count', () => {
  expect(sameBalance(plant, setGiven(plant, layout, `${id}.efficiency`, 0.7))).toBe(false)
  expect(sameBalance(plant, setGiven(plant, layout, 'plant.otherAuxiliary', 1e6))).toBe(false)
  expect(sameBalance(plant, addUnit(plant, layout, 'pump', [80, 0]).plant)).toBe(false)
  expect(sameBalance(plant, empty)).toBe(false)
  expect(sameBalance(plant, setLabel(plant, layout, id, 'Feed pump'))).toBe(false)
})
