import { readdirSync, readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import { examples } from './examples.ts'
import { waiting } from './waiting.ts'

/** Ids in the calls of describeExample in this folder. */
function builtIds(): string[] {
  const folder = new URL('.', import.meta.url)
  return readdirSync(folder)
    .filter((name) => name.endsWith('.test.ts'))
    .flatMap((name) =>
      [
        ...readFileSync(new URL(name, folder), 'utf8').matchAll(/describeExample\(\s*'([^']+)'/g),
      ].map((match) => match[1]!),
    )
}

test('every example is built once or waits, and a part of one may do both', () => {
  const built = builtIds()
  expect(new Set(built).size).toBe(built.length)
  const whole = waiting.filter(({ answers }) => answers === undefined).map(({ id }) => id)
  const known = examples.map(({ id }) => id)
  expect([...built, ...whole].sort()).toEqual([...known].sort())
  for (const { id } of waiting) expect(known).toContain(id)
})

test('a part that waits names answers of its example', () => {
  for (const { id, answers } of waiting) {
    const example = examples.find((one) => one.id === id)!
    const names = [
      ...example.answers.map(({ quantity }) => quantity),
      ...Object.keys(example.also_recomputed),
    ]
    expect(names).toEqual(expect.arrayContaining([...(answers ?? [])]))
  }
})
