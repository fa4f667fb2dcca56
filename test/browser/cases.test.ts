import { readFileSync } from 'node:fs'
import type { Page } from 'playwright-core'
import { expect, test } from 'vitest'
import { accessibilityFaults, withWindow } from './support.ts'

/** The long ones open several plants and solve each several times, ms. */
const patience = 180_000

const folder = new URL('../../public/examples/', import.meta.url)

async function solved(page: Page): Promise<void> {
  await expect
    .poll(() => page.locator('.drawer-state').textContent(), { timeout: 20_000 })
    .toContain('Mass and energy close')
}

/** Opens an example from the list of them. */
async function openExample(page: Page, title: string): Promise<void> {
  await solved(page)
  await command(page, 'Open an example')
  await page.locator('.examples button', { has: page.getByText(title, { exact: true }) }).click()
  await expect.poll(() => page.getByLabel('Title of the plant').inputValue()).toBe(title)
  await solved(page)
}

async function command(page: Page, words: string): Promise<void> {
  await page.keyboard.press('Control+k')
  await page.keyboard.type(words)
  await page.locator('.command-list [role="option"]').first().waitFor()
  await page.keyboard.press('Enter')
}

const caseTab = (page: Page, name: string) =>
  page.getByRole('tablist', { name: 'Cases' }).getByRole('tab', { name, exact: true })
const layoutTab = (page: Page, name: string) =>
  page.getByRole('tablist', { name: 'Layouts' }).getByRole('tab', { name, exact: true })
const total = (page: Page) => page.locator('.totals').textContent()

test(
  'the list of examples names every plant and opens each',
  async () => {
    const list = JSON.parse(readFileSync(new URL('index.json', folder), 'utf8')) as {
      title: string
      shows: string
    }[]
    await withWindow(async ({ page, problems }) => {
      await solved(page)
      await command(page, 'Open an example')
      const dialog = page.getByRole('dialog', { name: 'Example plants' })
      for (const { title, shows } of list) {
        await dialog.getByText(title, { exact: true }).waitFor()
        expect(await dialog.textContent()).toContain(shows)
      }
      expect(await accessibilityFaults(page, '.dialog')).toEqual([])
      await page.keyboard.press('Escape')
      for (const { title } of list.slice(1)) await openExample(page, title)
      expect(problems).toEqual([])
    })
  },
  patience,
)

test(
  'a case in three clicks; what is edited in it stays in it; the design is as it was',
  async () => {
    await withWindow(async ({ page, problems }) => {
      await openExample(page, 'Tarn Vale unit 3')
      const design = await total(page)
      await page.getByRole('button', { name: 'New case' }).click()
      await page.getByRole('button', { name: 'Sliding', exact: true }).click()
      await page.getByRole('button', { name: /^75 %/ }).click()
      await expect.poll(() => caseTab(page, '75 %').getAttribute('aria-selected')).toBe('true')
      await solved(page)
      await expect.poll(() => total(page)).not.toBe(design)
      const chips = page.getByRole('list', { name: 'What 75 % changes' })
      expect(await chips.textContent()).toContain('Main steam, flow 90.00')
      expect(await accessibilityFaults(page, '.case-row, .strip')).toEqual([])

      // Frozen hardware: the approach is solved now, the conductance given.
      await command(page, 'Heater 5, terminal difference')
      const state = (path: string) =>
        page.locator(`.card [data-path="${path}"] .quantity`).first().getAttribute('data-state')
      await expect.poll(() => state('h5.terminalDifference')).toBe('solved')
      expect(await state('h5.conductance')).toBe('given')

      await command(page, 'condenser cooling water inlet')
      await page.keyboard.type('25 °C')
      await page.keyboard.press('Enter')
      await solved(page)
      await expect.poll(() => chips.textContent()).toContain('cooling water inlet')
      await caseTab(page, 'Design').click()
      await solved(page)
      await expect.poll(() => total(page)).toBe(design)
      await caseTab(page, '75 %').click()
      await solved(page)
      await page.getByRole('button', { name: /cooling water inlet as in the layout/ }).click()
      await expect.poll(() => chips.textContent()).not.toContain('cooling water inlet')
      for (let i = 0; i < 3; i++) await page.keyboard.press('Control+z')
      await expect.poll(() => page.getByRole('tablist', { name: 'Cases' }).count()).toBe(0)
      await expect.poll(() => total(page)).toContain('143.7')
      expect(problems).toEqual([])
    })
  },
  patience,
)

test(
  'a heater goes out of service and back, in the design by a case of its own',
  async () => {
    await withWindow(async ({ page }) => {
      await openExample(page, 'Tarn Vale unit 3')
      await command(page, 'Heater 7')
      await command(page, 'Take Heater 7 out of service')
      await expect
        .poll(() => caseTab(page, 'Heater 7 out').getAttribute('aria-selected'))
        .toBe('true')
      await solved(page)
      const changes = page.getByRole('list', { name: 'What Heater 7 out changes' })
      expect(await changes.textContent()).toContain('Heater 7 out of service')
      await page.getByRole('button', { name: 'Heater 7 back in service' }).click()
      await expect.poll(() => changes.textContent()).not.toContain('Heater 7 out of service')
      await solved(page)
    })
  },
  patience,
)

test(
  'layouts: proposed, renamed, moved, deleted; what a proposal stands on cannot go',
  async () => {
    await withWindow(async ({ page }) => {
      await openExample(page, 'Tarn Vale unit 2')
      await page.getByRole('button', { name: 'Add a layout' }).click()
      await page.getByRole('menuitem', { name: 'Proposal on the machine that is there' }).click()
      await expect
        .poll(() => layoutTab(page, 'Proposal').getAttribute('aria-selected'))
        .toBe('true')
      await layoutTab(page, 'Proposal').dblclick()
      await page.getByLabel('Name of the layout').fill('Heater 8 added')
      await page.keyboard.press('Enter')
      await layoutTab(page, 'Heater 8 added').waitFor()
      await page.getByRole('button', { name: /More of layout/ }).click()
      await page.getByRole('menuitem', { name: 'Move left' }).click()
      const names = () =>
        page.getByRole('tablist', { name: 'Layouts' }).getByRole('tab').allTextContents()
      await expect.poll(names).toEqual(['Heater 8 added', 'As built'])
      await layoutTab(page, 'As built').click()
      await page.getByRole('button', { name: /More of layout/ }).click()
      const remove = page.getByRole('menuitem', { name: 'Delete' })
      expect(await remove.getAttribute('aria-disabled')).toBe('true')
      expect(await remove.getAttribute('title')).toContain('takes its hardware from this layout')
      await page.keyboard.press('Escape')
      await layoutTab(page, 'Heater 8 added').click()
      await page.getByRole('button', { name: /More of layout/ }).click()
      await page.getByRole('menuitem', { name: 'Delete' }).click()
      await expect.poll(names).toEqual(['As built'])
    })
  },
  patience,
)

test(
  'a heater on a new bleed in the same machine, compared at equal power, a ghost under the chart',
  async () => {
    await withWindow(async ({ page, problems }) => {
      await openExample(page, 'Tarn Vale unit 2')
      await command(page, 'LP')
      await command(page, 'Put a heater on a new bleed')
      const dialog = page.getByRole('dialog', { name: 'A heater on a new bleed of LP' })
      await dialog.getByText('Pressure at the new bleed').waitFor()
      expect(await accessibilityFaults(page, '.dialog')).toEqual([])
      await dialog.getByRole('button', { name: 'Put it in' }).click()
      await expect
        .poll(() => layoutTab(page, 'Proposal').getAttribute('aria-selected'))
        .toBe('true')
      await solved(page)
      await page.getByRole('button', { name: /More of layout/ }).click()
      await page.getByRole('menuitem', { name: 'Compare with As built' }).click()
      const table = page.locator('.compare')
      await expect.poll(() => table.textContent(), { timeout: 20_000 }).toContain('Unit heat rate')
      await table.getByRole('combobox').nth(1).selectOption('power')
      await expect
        .poll(() => table.locator('tr', { hasText: 'Net power' }).count(), { timeout: 20_000 })
        .toBe(0)
      expect(await table.textContent()).toContain('New heater')
      await expect.poll(() => page.locator('.chart-ghost-note').textContent()).toContain('As built')
      expect(await accessibilityFaults(page, '.compare')).toEqual([])
      expect(problems).toEqual([])
    })
  },
  patience,
)
