import type { Page } from 'playwright-core'
import { expect, test } from 'vitest'
import { middleOf, numberIn, onStream, solved, unitBox } from './hands.ts'
import { accessibilityFaults, withWindow } from './support.ts'

const rings = (page: Page) => page.locator('.chart-rings .ring')
const row = (page: Page, id: string) =>
  page.getByRole('row').filter({ has: page.getByRole('cell', { name: id, exact: true }) })

async function haloed(page: Page): Promise<readonly string[]> {
  return page
    .locator('.stream-halo')
    .evaluateAll((all) =>
      all.map((one) => one.closest('[data-stream]')?.getAttribute('data-stream') ?? ''),
    )
}

test('pointing at a stream lights its state on the chart, and pointing at a state its stream', async () => {
  await withWindow(async ({ page, problems }) => {
    await solved(page)
    await page.locator('.chart-states circle').first().waitFor()
    const spots = new Set<string>()
    for (const id of ['main', 'hot', 'exhaust', 'feed']) {
      await page.mouse.move(...(await onStream(page, id)))
      await expect.poll(() => haloed(page)).toEqual([id])
      await expect.poll(() => rings(page).count()).toBe(1)
      await expect.poll(() => row(page, id).getAttribute('data-hovered')).toBe('true')
      const spot = await middleOf(page, '.chart-rings .ring')
      spots.add(spot.join())
      await page.mouse.move(5, 5)
      await expect.poll(() => rings(page).count()).toBe(0)
      // The other way round.
      await page.mouse.move(...spot)
      await expect.poll(() => haloed(page)).toEqual([id])
      await expect.poll(() => row(page, id).getAttribute('data-hovered')).toBe('true')
      const T = await row(page, id).locator('.cell-number .quantity').nth(2).textContent()
      expect(numberIn(await page.locator('.chart-read-out').textContent())).toBe(numberIn(T))
      await page.mouse.move(5, 5)
      await expect.poll(() => haloed(page)).toEqual([])
    }
    expect(spots.size).toBe(4)
    expect(problems).toEqual([])
  })
})

test('pointing at a row of the table lights stream and state; a click on the chart selects the stream', async () => {
  await withWindow(async ({ page }) => {
    await solved(page)
    await page.locator('.chart-states circle').first().waitFor()
    await row(page, 'hot').hover()
    await expect.poll(() => haloed(page)).toEqual(['hot'])
    const spot = await middleOf(page, '.chart-rings .ring')
    await page.mouse.click(...spot)
    await page.getByRole('region', { name: 'Reheater to LP' }).waitFor()
    expect(
      await page.locator('.react-flow__edge[data-id="hot"]').getAttribute('aria-pressed'),
    ).toBe('true')
    // A unit lights its own process.
    await page.mouse.move(...(await middleOf(page, unitBox('lp'))))
    await expect.poll(() => page.locator('.chart-halo path').count()).toBeGreaterThan(0)
  })
})

test.for(['light', 'dark'] as const)(
  'axe finds no fault in the whole window in %s colours, nor with a card open',
  async (colorScheme) => {
    await withWindow(
      async ({ page }) => {
        await solved(page)
        await page.locator('.chart-states circle').first().waitFor()
        expect(await accessibilityFaults(page)).toEqual([])
        await page.mouse.click(...(await middleOf(page, unitBox('condenser'))))
        await page.locator('.card').waitFor()
        expect(await accessibilityFaults(page)).toEqual([])
      },
      { context: { colorScheme } },
    )
  },
)
