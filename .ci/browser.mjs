import { accessSync, constants, existsSync, statSync } from 'node:fs'
import { delimiter, join } from 'node:path'

const names = [
  'chromium',
  'chromium-browser',
  'google-chrome-stable',
  'google-chrome',
  'chrome',
  'microsoft-edge',
]

const places = [
  '/usr/lib/chromium/chromium',
  '/usr/lib/chromium-browser/chromium-browser',
  '/snap/bin/chromium',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  '/Applications/Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
  'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe',
  'C:\\Program Files (x86)\\Google\\Chrome\\Application\\chrome.exe',
  'C:\\Program Files (x86)\\Microsoft\\Edge\\Application\\msedge.exe',
]

/** What to say when a browser is wanted and there is none. */
export const noBrowser =
  'No Chromium was found for the browser tests. Install it (Debian: apt-get install chromium), ' +
  'or set CHROMIUM to the full path of a Chromium-based browser.'

/** @param {string} path */
function executable(path) {
  try {
    accessSync(path, constants.X_OK)
    return statSync(path).isFile()
  } catch {
    return false
  }
}

/**
 * Full path of a Chromium-based browser, or undefined when there is none. CHROMIUM in the
 * environment comes first; where it names no program the answer is an error, never another browser.
 *
 * @param {Record<string, string | undefined>} environment
 * @returns {string | undefined}
 */
export function findBrowser(environment = process.env) {
  const asked = environment.CHROMIUM
  if (asked) {
    if (executable(asked)) return asked
    throw new Error(
      `CHROMIUM is set to ${asked}, which ${existsSync(asked) ? 'is not a program' : 'does not exist'}.`,
    )
  }
  const folders = (environment.PATH ?? '').split(delimiter).filter(Boolean)
  const onPath = folders.flatMap((folder) => names.map((name) => join(folder, name)))
  return [...onPath, ...places].find(executable)
}
