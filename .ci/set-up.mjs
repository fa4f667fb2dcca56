/**
 * Makes a clone ready: installs the dependencies unless those of the lock file are there already
 * and, with --browser, looks for a Chromium and installs Debian's where that is possible.
 * Speaks on standard error only, so that commands which run after it own standard output.
 * Plain Node without dependencies: it runs before there are any.
 */
import { spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { findBrowser, noBrowser } from './browser.mjs'

const root = dirname(dirname(fileURLToPath(import.meta.url)))
const lockFile = join(root, 'package-lock.json')
const stampFile = join(root, 'node_modules', '.set-up')

/** @param {string} text */
const say = (text) => process.stderr.write(`${text}\n`)

/** @param {string} file */
const read = (file) => (existsSync(file) ? readFileSync(file, 'utf8') : '')

/**
 * Runs a program with its output on standard error.
 *
 * @param {string} program
 * @param {string[]} parameters
 * @param {Record<string, string>} environment
 */
function run(program, parameters, environment = {}) {
  const result = spawnSync(program, parameters, {
    cwd: root,
    env: { ...process.env, ...environment },
    stdio: ['ignore', 2, 2],
    shell: process.platform === 'win32' && program === 'npm',
  })
  return result.status === 0
}

/** Whether an installation made by hand holds just what the lock file asks for. */
function alreadyInstalled() {
  const installed = read(join(root, 'node_modules', '.package-lock.json'))
  if (!installed) return false
  const have = JSON.parse(installed).packages
  const want = JSON.parse(read(lockFile)).packages
  return Object.keys(want).every((path) => {
    if (path === '') return true
    if (have[path] === undefined) return want[path].optional === true
    return (
      have[path].version === want[path].version &&
      have[path].integrity === want[path].integrity &&
      existsSync(join(root, path, 'package.json'))
    )
  })
}

function installDependencies() {
  // Packages hold programs made for one system, so a copied folder is no installation.
  const system = `${process.platform} ${process.arch} Node ${process.versions.node.split('.')[0]}`
  const lock = createHash('sha256').update(read(lockFile)).digest('hex')
  const stamp = `${lock} ${system}\n`
  const former = read(stampFile)
  if (former === stamp) return true
  const sameSystem = former === '' || former.endsWith(` ${system}\n`)
  if (!sameSystem || !alreadyInstalled()) {
    say('Installing dependencies (once for each change of package-lock.json) ...')
    const parameters = ['ci', '--include=dev', '--ignore-scripts', '--no-audit', '--no-fund']
    const npm = process.env.npm_execpath
    // What an npm command that calls this was told must not change this one.
    const environment = {
      npm_config_global: 'false',
      npm_config_dry_run: 'false',
      npm_config_loglevel: 'warn',
    }
    const installed = npm?.endsWith('.js')
      ? run(process.execPath, [npm, ...parameters], environment)
      : run('npm', parameters, environment)
    if (!installed) {
      say('The dependencies could not be installed; the lines above say why. The first')
      say('installation needs a network, or a filled npm cache; later starts need neither.')
      return false
    }
  }
  writeFileSync(stampFile, stamp)
  return true
}

function installBrowser() {
  if (findBrowser()) return
  const debian = process.platform === 'linux' && existsSync('/usr/bin/apt-get')
  if (debian && process.getuid?.() === 0) {
    say('Installing Chromium for the browser tests ...')
    const quiet = { DEBIAN_FRONTEND: 'noninteractive' }
    run('apt-get', ['update', '-q'], quiet)
    const packages = ['chromium', 'fonts-liberation']
    run('apt-get', ['install', '-q', '-y', '--no-install-recommends', ...packages], quiet)
  }
  // The tests that need no browser still run; those that do are counted as failed.
  if (!findBrowser()) say(noBrowser)
}

const [major = 0, minor = 0] = process.versions.node.split('.').map(Number)
if (major < 20 || (major === 20 && minor < 19)) {
  say(`Bledsteam needs Node 20.19 or newer; this is ${process.version}.`)
  process.exit(1)
}
if (!installDependencies()) process.exit(1)
if (process.argv.includes('--browser')) {
  try {
    installBrowser()
  } catch (error) {
    say(String(error instanceof Error ? error.message : error))
  }
}
