import { expect, test } from 'vitest'
import { addUnit, emptyPlant, type QuantityDescription } from '../../src/document.ts'
import { fieldText, fieldUnit, readTyped, usualText } from '../../web/number/typed-number.ts'
import { usePlantStore } from '../../web/store/plant-store.ts'

const power: QuantityDescription = { label: 'Power', dimension: 'power', help: '' }
const heat: QuantityDescription = { label: 'Duty', dimension: 'heatFlow', help: '' }

const started = emptyPlant()
const { plant, id } = addUnit(started, started.layouts[0]?.id ?? '', 'pump', [0, 0])
usePlantStore.getState().open(plant)
const path = `${id}.power`

const value = (text: string, description: QuantityDescription, unit: string, set = 'metric') => {
  const typed = readTyped(text, path, description, set as 'metric', unit)
  return typed.outcome === 'value' ? typed.value : typed
}

test('a bare number has the unit that stood beside the field when it opened', () => {
  const unit = fieldUnit(76.2e3, power, 'metric')
  expect(unit).toBe('kW')
  expect(fieldText(76.2e3, power, 'metric', false, unit)).toBe('76.20')
  expect(value('80', power, unit)).toBe(80e3)
  expect(value('80', power, fieldUnit(152e6, power, 'metric'))).toBe(80e6)
})

test('a unit typed with the number wins over the one beside the field', () => {
  expect(value('80 MW', power, 'kW')).toBe(80e6)
  expect(value('80 kW', power, 'MW')).toBe(80e3)
})

test('a field keeps its unit when the value grows past it', () => {
  const unit = fieldUnit(999e3, power, 'metric')
  const grown = fieldText(1009e3, power, 'metric', true, unit)
  expect(value(grown, power, unit)).toBeCloseTo(1009e3, 6)
})

test('heat flows below a million Btu/h are typed in thousands', () => {
  const unit = fieldUnit(100e3, heat, 'us')
  expect(unit).toBe('kBtu/h')
  // NIST SP 811, appendix B.8: 1 Btu(IT)/h = 0.29307107 W.
  expect(value('80', heat, unit, 'us')).toBeCloseTo(80e3 * 0.29307107, 2)
})

test('both ends of a usual range are told in one unit', () => {
  const ranged = { ...power, range: [5e5, 2e6] } as const
  expect(usualText(ranged, 'metric')).toBe('Usual 0.500 to 2.000 MW')
})
