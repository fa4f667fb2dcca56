import type { Page } from 'playwright-core'
import { expect, test } from 'vitest'
import { accessibilityFaults, withWindow } from './support.ts'

const tabs = (page: Page) => page.getByRole('tablist', { name: 'Tables' })
const field = (page: Page, path: string) =>
  page.locator(`.card button[data-path="${path}"] .quantity`)

async function solved(page: Page): Promise<void> {
  await expect
    .poll(() => page.locator('.drawer-state').textContent(), { timeout: 20_000 })
    .toContain('Mass and energy close')
}

async function select(page: Page, words: string): Promise<void> {
  await page.keyboard.press('Control+k')
  await page.keyboard.type(words)
  await page.locator('.command-list [role="option"]').first().waitFor()
  await page.keyboard.press('Enter')
}

test('a number is typed with a unit, stepped, freed and given again, by keyboard alone', async () => {
  await withWindow(async ({ page, problems }) => {
    await solved(page)
    await select(page, 'condenser pressure')
    const pressure = field(page, 'condenser.pressure')
    await expect.poll(() => page.evaluate(() => document.activeElement?.textContent)).toMatch(/bar/)
    const before = await pressure.textContent()
    await page.keyboard.type('6 kPa')
    await page.keyboard.press('Enter')
    await expect.poll(() => pressure.textContent()).toBe('0.0600\u2009bar')
    await expect.poll(() => page.locator('.total-edit').textContent()).toContain('to 0.0600 bar')
    await solved(page)
    await page.keyboard.press('Delete')
    await expect.poll(() => tabs(page).textContent()).toContain('1 short')
    await page.keyboard.press('Alt+3')
    const remedy = page.locator('.remedy[data-remedy="condenser.pressure"]')
    if ((await remedy.count()) === 0) await page.locator('.remedy-more').click()
    expect(await remedy.textContent()).toContain('was 0.0600 bar')
    await remedy.click()
    await page.keyboard.press('Enter')
    await solved(page)
    for (let i = 0; i < 3; i++) await page.keyboard.press('Control+z')
    await expect.poll(() => pressure.textContent()).toBe(before)
    await solved(page)
    expect(problems).toEqual([])
  })
})

test('what cannot be read is said beneath the field, and nothing typed is lost', async () => {
  await withWindow(async ({ page }) => {
    await solved(page)
    await select(page, 'condenser pressure')
    await page.keyboard.type('6 ells')
    await page.keyboard.press('Enter')
    const input = page.locator('.card input[data-path="condenser.pressure"]')
    expect(await input.inputValue()).toBe('6 ells')
    expect(await page.getByRole('alert').textContent()).toContain('ells')
    await page.keyboard.press('Escape')
    await expect.poll(() => page.locator('.card input[data-path]').count()).toBe(0)
    expect(await page.getByRole('button', { name: 'Undo', exact: true }).isDisabled()).toBe(true)
  })
})

test('a click turns a solved number into a given one; the ledger names what to free', async () => {
  await withWindow(async ({ page }) => {
    await solved(page)
    await select(page, 'HP, power')
    await page.locator('[data-turn="hp.power"]').click()
    await page.keyboard.press('Enter')
    await expect.poll(() => tabs(page).textContent()).toContain('1 too many')
    await page.keyboard.press('Alt+3')
    const first = page.locator('.remedy').first()
    expect(await first.textContent()).toContain('just given')
    await page.locator('.remedy[data-remedy="main.m"]').click()
    await solved(page)
  })
})

test('values stay the same in every set of units', async () => {
  await withWindow(async ({ page }) => {
    await solved(page)
    await select(page, 'condenser pressure')
    const pressure = field(page, 'condenser.pressure')
    const shown = await pressure.textContent()
    await page.getByLabel('Units').selectOption('us')
    await expect.poll(() => pressure.textContent()).toMatch(/psi/)
    await page.getByLabel('Units').selectOption('metric')
    await expect.poll(() => pressure.textContent()).toBe(shown)
    expect(await page.getByRole('button', { name: 'Undo', exact: true }).isDisabled()).toBe(true)
  })
})

test.for(['light', 'dark'] as const)(
  'strip, card, drawer, menu and totals pass the accessibility check in %s colours',
  async (colorScheme) => {
    await withWindow(
      async ({ page }) => {
        await solved(page)
        await select(page, 'condenser pressure')
        expect(await accessibilityFaults(page, '.strip, .card, .drawer, .totals')).toEqual([])
        await page.keyboard.press('Alt+3')
        await page.getByLabel('Menu').click()
        expect(await accessibilityFaults(page, '.drawer, .menu')).toEqual([])
      },
      { context: { colorScheme } },
    )
  },
)
