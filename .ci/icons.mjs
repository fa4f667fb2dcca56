/** Draws the icons in public/ that are pictures of public/icon.svg. Run after changing it. */
import { readFileSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { chromium } from 'playwright-core'
import { findBrowser, noBrowser } from './browser.mjs'

const folder = join(dirname(dirname(fileURLToPath(import.meta.url))), 'public')
const drawing = readFileSync(join(folder, 'icon.svg'), 'utf8')

/** `scale` shrinks the drawing; a system that cuts icons to its own shape wants paper all round. */
const pictures = [
  { file: 'icon-192.png', size: 192, scale: 1, paper: false },
  { file: 'icon-512.png', size: 512, scale: 1, paper: false },
  { file: 'icon-maskable-512.png', size: 512, scale: 0.72, paper: true },
  { file: 'apple-touch-icon.png', size: 180, scale: 0.86, paper: true },
]

const executablePath = findBrowser()
if (!executablePath) throw new Error(noBrowser)
const browser = await chromium.launch({ executablePath, args: ['--no-sandbox', '--disable-gpu'] })
try {
  for (const { file, size, scale, paper } of pictures) {
    const page = await browser.newPage({ viewport: { width: size, height: size } })
    await page.setContent(`<style>
      body { margin: 0; display: grid; place-items: center; height: 100vh; }
      body { background: ${paper ? '#FBFAF7' : 'transparent'}; }
      svg { width: ${size * scale}px; }
    </style>${drawing}`)
    writeFileSync(join(folder, file), await page.screenshot({ omitBackground: true }))
    await page.close()
  }
} finally {
  await browser.close()
}
