import { readdir, readFile } from 'node:fs/promises'
import { join, relative } from 'node:path'
import { fileURLToPath } from 'node:url'
import { expect, test } from 'vitest'
import { giveByKeys, solved } from './hands.ts'
import { startPreview } from './preview.ts'
import { accessibilityFaults, keptOffline, openWindow, withWindow } from './support.ts'

const fromRoot = (path: string): URL => new URL(`../../${path}`, import.meta.url)

test('the window opens without a complaint of the browser', async () => {
  await withWindow(async ({ page, problems }) => {
    await expect.poll(() => page.locator('#window > *').count()).toBeGreaterThan(0)
    expect(await page.title()).toContain('Bledsteam')
    expect(problems).toEqual([])
  })
})

test('after one visit the window opens with the server gone', async () => {
  const preview = await startPreview()
  const first = await openWindow({ address: preview.address })
  try {
    await keptOffline(first.page)
    await preview.stop()
    await expect(fetch(preview.address)).rejects.toThrow()
    const next = await first.reopen()
    try {
      await expect.poll(() => next.page.locator('#window > *').count()).toBeGreaterThan(0)
      // The solver and the chart come from what was kept as well.
      await solved(next.page)
      await giveByKeys(next.page, 'Condenser, pressure', 'condenser.pressure', '6 kPa')
      await solved(next.page)
      await next.page.locator('.chart-states circle').first().waitFor()
      expect(next.problems).toEqual([])
    } finally {
      await next.close()
    }
  } finally {
    await first.close()
    await preview.stop()
  }
})

test('every file of the build is kept for use without a network', async () => {
  // The service worker and its library are kept by the browser itself.
  const built = (await readdir(fromRoot('dist'), { recursive: true, withFileTypes: true }))
    .filter((entry) => entry.isFile())
    .map((entry) => relative(fileURLToPath(fromRoot('dist')), join(entry.parentPath, entry.name)))
    .map((file) => file.replaceAll('\\', '/'))
    .filter((file) => !/^(sw|workbox-\w+)\.js$/.test(file))
  expect(built).toContain('index.html')
  await withWindow(async ({ page }) => {
    await keptOffline(page)
    const kept = await page.evaluate(async () => {
      const stores = await Promise.all((await caches.keys()).map((name) => caches.open(name)))
      const requests = (await Promise.all(stores.map((store) => store.keys()))).flat()
      return requests.map((request) => new URL(request.url).pathname.slice(1))
    })
    expect(built.filter((file) => !kept.includes(file))).toEqual([])
  })
})

test('the page may load nothing from elsewhere and run no code made from text', async () => {
  await withWindow(async ({ page }) => {
    const outcome = await page.evaluate(async () => {
      const refused: string[] = []
      document.addEventListener('securitypolicyviolation', (event) => {
        refused.push(event.effectiveDirective)
      })
      const script = document.createElement('script')
      script.textContent = 'window.inlineScriptRan = true'
      document.head.append(script)
      const fetched = await fetch('http://127.0.0.1:9/').then(
        () => true,
        () => false,
      )
      await new Promise((resolve) => setTimeout(resolve))
      return { refused, fetched, ran: 'inlineScriptRan' in window }
    })
    expect(outcome.ran).toBe(false)
    expect(outcome.fetched).toBe(false)
    expect(outcome.refused).toEqual(expect.arrayContaining(['script-src-elem', 'connect-src']))
  })
})

test('the icons that the manifest names are there in the sizes it states', async () => {
  const manifest = JSON.parse(await readFile(fromRoot('dist/manifest.webmanifest'), 'utf8'))
  const pictures = manifest.icons.filter((icon: { type: string }) => icon.type === 'image/png')
  expect(pictures.length).toBeGreaterThan(1)
  for (const { src, sizes } of pictures) {
    const png = await readFile(fromRoot(`dist/${src}`))
    expect(png.subarray(1, 4).toString()).toBe('PNG')
    expect(`${png.readUInt32BE(16)}x${png.readUInt32BE(20)}`, src).toBe(sizes)
  }
})

test('the accessibility check sees a fault', async () => {
  await withWindow(async ({ page }) => {
    await page.evaluate(() => {
      const picture = document.createElement('img')
      picture.id = 'unnamed-picture'
      document.body.append(picture)
    })
    const faults = await accessibilityFaults(page, '#unnamed-picture')
    expect(faults.join('\n')).toContain('image-alt')
  })
})
