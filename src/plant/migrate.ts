import type { JsonValue } from './parse-json.ts'

/** The version of the plant file that this program writes. */
export const currentVersion = 1

type JsonObject = { [key: string]: JsonValue }

/** Takes a file from one version to the next. Never edited once released, only followed by another. */
export interface Migration {
  /** The version reached; it starts from the one before. */
  readonly to: number
  /** What changes, in a few words. */
  readonly name: string
  /** May change the object it gets. */
  readonly migrate: (file: JsonObject) => JsonObject
}

/** In order and without gaps, from version 2 on: version 1 is the first. */
export const migrations: readonly Migration[] = []

export type Migrated =
  | { readonly outcome: 'current'; readonly value: JsonObject }
  | { readonly outcome: 'unusable'; readonly message: string }

/** Brings what a file holds to the version in force. A newer file is refused whole. */
export function migrate(
  value: JsonValue,
  steps: readonly Migration[] = migrations,
  current: number = currentVersion,
): Migrated {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    return { outcome: 'unusable', message: 'The file holds no plant: it is not a JSON object.' }
  }
  const { format, version } = value
  if (format !== 'bledsteam/plant') {
    const found = format === undefined ? 'there is none' : `here it is ${JSON.stringify(format)}`
    return {
      outcome: 'unusable',
      message: oneLine(`format: a plant file has the format "bledsteam/plant", ${found}.`),
    }
  }
  if (typeof version !== 'number' || !Number.isInteger(version) || version < 1) {
    return {
      outcome: 'unusable',
      message:
        current === 1
          ? 'version: the number 1 should stand here.'
          : `version: a whole number from 1 to ${current} should stand here.`,
    }
  }
  if (version > current) {
    return {
      outcome: 'unusable',
      message: `version: the file is of version ${version}, and this program reads up to version ${current}. Open it with a newer program; the file is left as it is.`,
    }
  }
  let file = value
  for (const step of steps) {
    if (step.to > version && step.to <= current) file = { ...step.migrate(file), version: step.to }
  }
  return { outcome: 'current', value: file }
}

/** Without characters that would break the line, and not endless. */
export function oneLine(message: string): string {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: these are what is to be kept out.
  const line = message.replace(/[\u0000-\u001f\u007f-\u009f\u2028\u2029]+/g, ' ')
  return line.length > 600 ? `${line.slice(0, 600)}…` : line
}
