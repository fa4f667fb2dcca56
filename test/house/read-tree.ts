import { readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../..', import.meta.url))

/** Text of every code file below the folders, by path from the root of the tree. */
export function readTree(...folders: readonly string[]): Map<string, string> {
  const files = new Map<string, string>()
  for (const folder of folders) {
    for (const name of readdirSync(root + folder, { recursive: true, encoding: 'utf8' }).sort()) {
      const path = `${folder}/${name.replaceAll('\\', '/')}`
      if (/\.[cm]?[jt]sx?$/.test(path)) files.set(path, readFileSync(root + path, 'utf8'))
    }
  }
  return files
}
