import { describe, expect, test } from 'vitest'
import { currentVersion, type Migration, migrate, migrations } from '../../src/plant/migrate.ts'

describe('migrations', () => {
  test('lead from version 1 to the one in force without gaps', () => {
    expect(migrations.map(({ to }) => to)).toEqual(
      Array.from({ length: currentVersion - 1 }, (_, i) => i + 2),
    )
  })

  const steps: readonly Migration[] = [
    {
      to: 2,
      name: 'title becomes heading',
      migrate: ({ title, ...rest }) => ({ ...rest, heading: title ?? '' }),
    },
    {
      to: 3,
      name: 'heading in a list',
      migrate: ({ heading, ...rest }) => ({ ...rest, headings: [heading ?? ''] }),
    },
  ]

  test('an older file takes every step from its version on', () => {
    const first = { format: 'bledsteam/plant', version: 1, title: 'Tarn Vale' }
    expect(migrate(first, steps, 3)).toEqual({
      outcome: 'current',
      value: { format: 'bledsteam/plant', version: 3, headings: ['Tarn Vale'] },
    })
    const second = { format: 'bledsteam/plant', version: 2, heading: 'Tarn Vale' }
    expect(migrate(second, steps, 3)).toEqual(migrate(first, steps, 3))
    const third = { format: 'bledsteam/plant', version: 3, headings: [] }
    expect(migrate(third, steps, 3)).toEqual({ outcome: 'current', value: third })
  })

  test('a newer file is refused whole', () => {
    const newer = { format: 'bledsteam/plant', version: 4 }
    expect(migrate(newer, steps, 3)).toMatchObject({
      outcome: 'unusable',
      message: expect.stringContaining('version 4'),
    })
  })

  test.each([
    [null],
    [[]],
    ['text'],
    [{ version: 1 }],
    [{ format: 'bledsteam/plant', version: 0 }],
    [{ format: 'bledsteam/plant', version: 1.5 }],
  ])('%j is no plant file', (value) => {
    expect(migrate(value).outcome).toBe('unusable')
  })
})
