import { expect, test } from 'vitest'
import { fileName } from '../../web/files/plant-file.ts'

test('a file is named after its plant, in letters that every disk takes', () => {
  expect(fileName('Tarn Vale unit 2')).toBe('tarn-vale-unit-2.plant.json')
  expect(fileName('Überhitzer / ångkraft: 2')).toBe('uberhitzer-angkraft-2.plant.json')
  expect(fileName('  ..//  ')).toBe('plant.plant.json')
})
