import type { Page } from 'playwright-core'
import { command } from './hands.ts'

/** Opens the example plant with seven heaters. Before the tests of a file, too. */
export function openSeven(page: Page): Promise<void> {
  return openExample(page, 'Tarn Vale unit 2')
}

/** Opens an example by its title, and waits until it is solved. */
export async function openExample(page: Page, title: string): Promise<void> {
  await stands(page)
  await command(page, 'open an example')
  await page
    .locator('.examples button')
    .filter({ has: page.getByText(title, { exact: true }) })
    .click()
  await page.waitForFunction(
    (wanted) => document.querySelector<HTMLInputElement>('.title input')?.value === wanted,
    title,
  )
  await stands(page)
}

/** As `solved`, which only tests can wait for. */
async function stands(page: Page): Promise<void> {
  await page.locator('.drawer-state', { hasText: 'Mass and energy close' }).waitFor()
}

/** Shows the card in which a number stands, by keys alone. */
export async function show(page: Page, words: string, path: string): Promise<void> {
  await command(page, words)
  await page.locator(`.card [data-row="${path}"]`).waitFor()
}
