/**
 * Draws the README's picture: the built window with its demonstration plant, in real Chromium.
 * Run after a build: `npm run screenshot`.
 */
import { spawn } from 'node:child_process'
import { mkdirSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { chromium } from 'playwright-core'
import { findBrowser, noBrowser } from './browser.mjs'

const root = dirname(dirname(fileURLToPath(import.meta.url)))
const port = 4799
const browserPath = findBrowser()
if (!browserPath) {
  console.error(noBrowser)
  process.exit(1)
}
const preview = spawn(
  process.execPath,
  [join(root, 'node_modules/vite/bin/vite.js'), 'preview', '--port', String(port), '--strictPort'],
  { cwd: root, stdio: 'ignore' },
)
try {
  const browser = await chromium.launch({
    executablePath: browserPath,
    args: ['--no-sandbox', '--disable-gpu', '--disable-background-networking'],
  })
  const page = await browser.newPage({ viewport: { width: 1440, height: 900 } })
  for (let attempt = 0; attempt < 40; attempt++) {
    const answered = await page.goto(`http://127.0.0.1:${port}/`).catch(() => null)
    if (answered?.ok()) break
    await new Promise((resolve) => setTimeout(resolve, 250))
  }
  await page.getByText('Mass and energy close to').waitFor()
  await page.waitForTimeout(500)
  const folder = join(root, '.readme')
  mkdirSync(folder, { recursive: true })
  await page.screenshot({ path: join(folder, 'window.png') })
  await browser.close()
} finally {
  preview.kill()
}
