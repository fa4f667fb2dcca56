import { readdirSync, readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import { examples } from './examples.ts'

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

test('every example of the data is built, once', () => {
  expect(builtIds().sort()).toEqual(examples.map(({ id }) => id).sort())
})
