import { readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { applyOverrides, readPlant } from '../document.ts'
import { balanceOfCase } from '../engine.ts'

/*
 * npm run --silent balance -- FILE [--layout ID] [--case ID] [--free PATH]... [--set PATH=VALUE]...
 * Prints one JSON object. Exit 0 solved, 1 not solved, 2 file or call unusable (one line on standard
 * error, nothing on standard output).
 */

/** The file or the call cannot be used. */
class Unusable extends Error {}

interface Call {
  readonly file: string
  readonly layout?: string
  readonly case?: string
  readonly free: readonly string[]
  readonly set: Readonly<Record<string, number>>
}

function readCall(words: readonly string[]): Call {
  let file: string | undefined
  let layout: string | undefined
  let chosenCase: string | undefined
  const free: string[] = []
  const set: Record<string, number> = {}
  for (let k = 0; k < words.length; k++) {
    const word = words[k]!
    if (!word.startsWith('--')) {
      if (file !== undefined) throw new Unusable(`one file at a time: ${file} and ${word}`)
      file = word
      continue
    }
    const value = words[++k]
    if (value === undefined) throw new Unusable(`${word} wants a value after it`)
    if (word === '--layout') layout = value
    else if (word === '--case') chosenCase = value
    else if (word === '--free') free.push(value)
    else if (word === '--set') {
      const [path, number] = readSetting(value)
      set[path] = number
    } else throw new Unusable(`${word} is not known; there are --layout --case --free --set`)
  }
  if (file === undefined) {
    throw new Unusable('name a plant file: npm run --silent balance -- FILE')
  }
  return {
    file,
    free,
    set,
    ...(layout !== undefined && { layout }),
    ...(chosenCase !== undefined && { case: chosenCase }),
  }
}

function readSetting(text: string): readonly [string, number] {
  const at = text.indexOf('=')
  const digits = text.slice(at + 1).trim()
  const number = Number(digits)
  if (at <= 0 || digits === '' || !Number.isFinite(number)) {
    throw new Unusable(`--set ${text}: write PATH=VALUE with a number in SI units`)
  }
  return [text.slice(0, at), number]
}

function readFile(file: string): string {
  // npm runs scripts from the project's root; names are meant from where the user stands.
  const path = resolve(process.env.INIT_CWD ?? process.cwd(), file)
  try {
    return readFileSync(path, 'utf8')
  } catch (error) {
    throw new Unusable(`${file}: ${error instanceof Error ? error.message : String(error)}`)
  }
}

function run(words: readonly string[]): number {
  const call = readCall(words)
  const read = readPlant(readFile(call.file))
  if (read.outcome === 'unusable') throw new Unusable(`${call.file}: ${read.message}`)
  const { layouts } = read.plant
  const layout =
    call.layout === undefined ? layouts[0] : layouts.find((one) => one.id === call.layout)
  if (layout === undefined) {
    const ids = layouts.map((one) => one.id).join(', ')
    throw new Unusable(
      call.layout === undefined
        ? `${call.file}: the plant has no layout`
        : `${call.file} has no layout ${call.layout}; there are: ${ids}`,
    )
  }
  if (call.case !== undefined && !layout.cases.some((one) => one.id === call.case)) {
    const ids = layout.cases.map((one) => one.id).join(', ')
    throw new Unusable(`layout ${layout.id} has no case ${call.case}; there are: ${ids}`)
  }
  const overrides = { free: call.free, set: call.set }
  const checked = applyOverrides(layout, overrides)
  if (checked.outcome === 'unusable') throw new Unusable(checked.message)
  const solved = balanceOfCase(read.plant, layout.id, call.case ?? null, overrides)
  if (solved.outcome === 'unusable') throw new Unusable(`${call.file}: ${solved.message}`)
  process.stdout.write(`${JSON.stringify(solved.balance, null, 1)}\n`)
  return solved.balance.status === 'solved' ? 0 : 1
}

try {
  process.exitCode = run(process.argv.slice(2))
} catch (error) {
  if (!(error instanceof Unusable)) throw error
  process.stderr.write(`${error.message.replaceAll('\n', ' ')}\n`)
  process.exitCode = 2
}
