import { expect, test } from 'vitest'
import { perText, stepText, worthText, worthUnit } from '../../web/card/worth-text.ts'

test.each([
  // 1 kJ/kWh is 1/3600 J/J; a heat rate of 9000 kJ/kWh is told to hundredths.
  [0.83 / 3600, 2.5, 'heatRate', '+0.83'],
  [-90.484 / 3600, 2.5, 'heatRate', '−90.48'],
  [0.0001 / 3600, 2.5, 'heatRate', '0'],
  [60e3, 149.5e6, 'power', '+0.0600'],
  [1, 800, 'temperature', '+1.000'],
] as const)('a change of %d of a target of %d (%s) reads %s', (change, target, dimension, text) => {
  expect(worthText(change, target, dimension, 'metric')).toBe(text)
})

test('changes of temperature are in kelvins, and a fifth of those in degrees Fahrenheit', () => {
  expect(worthUnit(800, 'temperature', 'metric')).toBe('K')
  expect(worthText(5 / 9, 800, 'temperature', 'us')).toBe('+1.000')
})

test('a step is told by its unit where it is one', () => {
  expect(stepText(1, { dimension: 'temperature' }, 'metric')).toBe('K')
  expect(stepText(0.01, { dimension: 'ratio' }, 'metric')).toBe('%')
  expect(stepText(1e4, { dimension: 'conductance' }, 'metric')).toBe('10 kW/K')
  expect(stepText(0.1, { dimension: 'number' }, 'metric')).toBe('0.1')
  expect(perText(['K', '%', 'K'])).toBe('per K or %')
  expect(perText(['K', '%', 'bar', 'kg/s'])).toBe('per step')
})
