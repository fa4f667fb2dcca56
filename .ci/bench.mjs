/** Runs every test/bench/*.bench.ts in turn, or those whose names contain one of the words given. */
import { spawnSync } from 'node:child_process'
import { existsSync, readdirSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'

const root = dirname(dirname(fileURLToPath(import.meta.url)))
const folder = join(root, 'test', 'bench')
const words = process.argv.slice(2)
const files = (existsSync(folder) ? readdirSync(folder, { recursive: true }) : [])
  .map(String)
  .filter((file) => file.endsWith('.bench.ts'))
  .filter((file) => words.length === 0 || words.some((word) => file.includes(word)))
  .sort()

if (files.length === 0) {
  console.error(words.length === 0 ? 'There is no benchmark.' : `No benchmark named ${words}.`)
  process.exit(1)
}
let failed = 0
for (const file of files) {
  console.log(`\n${file}`)
  const parameters = ['--expose-gc', '--import', 'tsx', join(folder, file)]
  if (spawnSync(process.execPath, parameters, { cwd: root, stdio: 'inherit' }).status !== 0) {
    console.error(`${file} failed`)
    failed += 1
  }
}
process.exit(failed === 0 ? 0 : 1)
