/**
 * The whole check: types, lint, unused code, engine tests, build, browser tests; or only the steps
 * named as parameters. A failing step does not stop the later ones. Types, lint, unused code and
 * build count as one check each; the last line sums everything up as `N passed, N failed`.
 */
import { spawn } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { findBrowser, noBrowser } from './browser.mjs'

/** @typedef {{ passed: number, failed: number, skipped: number }} Counts */

const root = dirname(dirname(fileURLToPath(import.meta.url)))
const scratch = mkdtempSync(join(tmpdir(), 'bledsteam-test-'))
/** A step that takes longer than this hangs, ms. */
const patience = 20 * 60_000

/** Each folder has the libraries of the place that its code runs in. */
const typed = ['.', 'src', 'src/cli', 'web/worker', 'test', '.ci']

/** @type {Set<import('node:child_process').ChildProcess>} */
const running = new Set()

/** @param {import('node:child_process').ChildProcess} child */
function end(child) {
  try {
    // The group, so that what the child started ends too.
    if (child.pid && process.platform !== 'win32') process.kill(-child.pid, 'SIGKILL')
    else child.kill('SIGKILL')
  } catch {
    // It has ended by itself.
  }
}

for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
  process.on(signal, () => {
    for (const child of running) end(child)
    rmSync(scratch, { recursive: true, force: true })
    process.exit(1)
  })
}

/**
 * Runs a package's program; true when it succeeds.
 *
 * @param {string} program path below node_modules
 * @param {string[]} parameters
 * @param {Record<string, string>} environment
 * @returns {Promise<boolean>}
 */
function run(program, parameters, environment = {}) {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, [join('node_modules', program), ...parameters], {
      cwd: root,
      env: { ...process.env, ...environment },
      stdio: ['ignore', 'inherit', 'inherit'],
      detached: process.platform !== 'win32',
    })
    running.add(child)
    const timer = setTimeout(() => {
      console.error(`${program} has not ended after ${patience / 60_000} minutes and is stopped.`)
      end(child)
    }, patience)
    const done = (/** @type {boolean} */ succeeded) => {
      clearTimeout(timer)
      // A test that leaves a process behind must not leave it for good.
      end(child)
      running.delete(child)
      resolve(succeeded)
    }
    child.on('error', (error) => {
      console.error(error.message)
      done(false)
    })
    child.on('exit', (code) => done(code === 0))
  })
}

/**
 * @param {boolean} succeeded
 * @returns {Counts}
 */
const oneCheck = (succeeded) => ({
  passed: succeeded ? 1 : 0,
  failed: succeeded ? 0 : 1,
  skipped: 0,
})

/**
 * Runs one Vitest project; its reporter (test/reporter) leaves the counts in a file.
 *
 * @param {string} project
 * @returns {Promise<Counts>}
 */
async function vitest(project) {
  const file = join(scratch, `${project}.json`)
  const succeeded = await run('vitest/vitest.mjs', ['run', '--project', project], {
    BLEDSTEAM_COUNTS: file,
  })
  /** @type {Counts} */
  let counts = { passed: 0, failed: 0, skipped: 0 }
  try {
    counts = JSON.parse(readFileSync(file, 'utf8'))
  } catch {
    console.error(`The ${project} tests ended without a count.`)
  }
  // A run that found no test, or died, has failed although no test did.
  if (counts.failed === 0 && !(succeeded && counts.passed > 0)) counts.failed = 1
  return counts
}

let built = true

/** @type {Record<string, () => Promise<Counts>>} */
const steps = {
  async types() {
    const wrong = []
    for (const folder of typed) {
      if (!(await run('typescript/bin/tsc', ['--noEmit', '-p', folder]))) wrong.push(folder)
    }
    if (wrong.length > 0) console.error(`Types are wrong in: ${wrong.join(', ')}`)
    return oneCheck(wrong.length === 0)
  },
  async lint() {
    return oneCheck(await run('@biomejs/biome/bin/biome', ['check', '--error-on-warnings']))
  },
  async unused() {
    return oneCheck(await run('knip/bin/knip.js', []))
  },
  engine: () => vitest('engine'),
  async build() {
    built = await run('vite/bin/vite.js', ['build', '--logLevel', 'warn'])
    return oneCheck(built)
  },
  async browser() {
    if (!built) {
      console.error('The build failed, so the browser tests have nothing to open.')
      return oneCheck(false)
    }
    try {
      if (!findBrowser()) throw new Error(noBrowser)
    } catch (error) {
      console.error(error instanceof Error ? error.message : error)
      return oneCheck(false)
    }
    return vitest('browser')
  },
}

const asked = process.argv.slice(2)
const unknown = asked.filter((name) => !Object.hasOwn(steps, name))
if (unknown.length > 0) {
  console.error(
    `There is no step ${unknown.join(', ')}; the steps are ${Object.keys(steps).join(', ')}.`,
  )
  rmSync(scratch, { recursive: true, force: true })
  process.exit(2)
}

/** @type {Counts} */
const total = { passed: 0, failed: 0, skipped: 0 }
const summary = []
for (const [name, step] of Object.entries(steps)) {
  if (asked.length > 0 && !asked.includes(name)) continue
  console.log(`\n== ${name}`)
  const began = performance.now()
  const counts = await step()
  const seconds = ((performance.now() - began) / 1000).toFixed(1)
  total.passed += counts.passed
  total.failed += counts.failed
  total.skipped += counts.skipped
  summary.push(`${counts.failed === 0 ? 'ok    ' : 'FAILED'} ${name} (${seconds} s)`)
}
rmSync(scratch, { recursive: true, force: true })

console.log(`\n${summary.join('\n')}`)
const skipped = total.skipped > 0 ? `, ${total.skipped} skipped` : ''
console.log(`${total.passed} passed, ${total.failed} failed${skipped}`)
process.exitCode = total.failed === 0 ? 0 : 1
