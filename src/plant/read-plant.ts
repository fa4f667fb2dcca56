import { type Catalogue, standardCatalogue } from './catalogue.ts'
import { checkPlant, type ReadResult } from './check-plant.ts'
import { migrate, oneLine } from './migrate.ts'
import { parseJson } from './parse-json.ts'

/** Reads the text of a plant file: parses, migrates, checks. Nothing is thrown, whatever the text. */
export function readPlant(text: string, catalogue: Catalogue = standardCatalogue): ReadResult {
  const parsed = parseJson(text)
  if (parsed.outcome === 'broken') {
    const { line, column, message } = parsed
    return { outcome: 'unusable', message: oneLine(`Line ${line}, column ${column}: ${message}.`) }
  }
  const migrated = migrate(parsed.value)
  return migrated.outcome === 'unusable' ? migrated : checkPlant(migrated.value, catalogue)
}
