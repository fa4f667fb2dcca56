import type { Page } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { field, numberIn, solved } from './hands.ts'
import { openSeven, show } from './seven.ts'
import { openWindow, type Visit } from './support.ts'

let visit: Visit
let page: Page

beforeAll(async () => {
  visit = await openWindow()
  page = visit.page
  await openSeven(page)
})

afterAll(async () => {
  await visit?.close()
})

const number = (path: string) => page.locator(`.card button[data-path="${path}"]`)
const undo = () => page.getByRole('button', { name: 'Undo', exact: true })

/** Takes the one step back that there is. */
async function takeBack(): Promise<void> {
  await page.keyboard.press('Control+z')
  await expect.poll(() => undo().isDisabled()).toBe(true)
  await solved(page)
  expect(visit.problems).toEqual([])
}

test('the same quantity of several is changed at once, in one step', async () => {
  await page.getByRole('tab', { name: /^Givens/ }).click()
  const kinds = page.locator('.givens-tools label > select')
  const label = await kinds.locator('option', { hasText: 'Drain approach' }).textContent()
  await kinds.selectOption({ label: label ?? '' })
  const rows = page.locator('[data-given-row$=".drainApproach"]')
  await expect.poll(() => rows.count()).toBeGreaterThan(3)
  const values = () => rows.locator('.quantity-value').allTextContents()
  const before = await values()
  await page.locator('.givens-tools input').fill('7')
  await page.keyboard.press('Enter')
  await expect.poll(async () => new Set(await values())).toEqual(new Set(['7.0']))
  await solved(page)
  // In the field that it was typed in, empty again, the key means the edit.
  await takeBack()
  await expect.poll(values).toEqual(before)
  await kinds.selectOption('')
})

test('several selected units have their common quantities in one card', async () => {
  for (const id of ['h5', 'h6', 'h7']) {
    await page
      .locator('[data-given-row]', { hasText: `Heater ${id[1]}` })
      .first()
      .waitFor()
  }
  await page.getByRole('tab', { name: 'Heaters', exact: true }).click()
  const row = (id: string) => page.locator(`[data-table] tr[data-row="${id}"] .cell-name button`)
  await row('h5').click()
  await row('h6').click({ modifiers: ['Control'] })
  await row('h7').click({ modifiers: ['Control'] })
  const card = page.getByRole('region', { name: '3 selected' })
  const common = card.locator('[data-common="drainApproach"]')
  await expect.poll(() => common.textContent()).toContain('all 3 given')
  await common.locator('input').fill('6 K')
  await page.keyboard.press('Enter')
  await expect.poll(() => common.locator('input').getAttribute('placeholder')).toBe('6.0')
  await solved(page)
  await page.keyboard.press('Escape')
  await page.keyboard.press('Escape')
  await takeBack()
})

test('a value is dragged, solved live, in one step', async () => {
  await show(page, 'main steam', 'main.p')
  const before = await number('main.p').textContent()
  const box = await number('main.p').boundingBox()
  if (!box) throw new Error('The number is not shown.')
  const [x, y] = [box.x + box.width / 2, box.y + box.height / 2]
  await page.mouse.move(x, y)
  await page.mouse.down()
  for (let i = 1; i <= 6; i++) await page.mouse.move(x - 8 * i, y)
  // Solved while the button is still down.
  await expect.poll(() => page.locator('.total-edit').textContent()).toContain('to 124.0 bar')
  await page.mouse.up()
  await expect.poll(async () => numberIn(await field(page, 'main.p').textContent())).toBe(124)
  await takeBack()
  await expect.poll(() => number('main.p').textContent()).toBe(before)
})

test('gauge pressure and vacuum are told as absolute while they are typed, a sum by its result', async () => {
  await show(page, 'main steam', 'main.p')
  const note = page.locator('.card .field-note')
  await number('main.p').click()
  await page.keyboard.type('129 barg')
  await expect
    .poll(() => note.textContent())
    .toBe(
      'Gauge pressure, taken as 130.0 bar absolute with the standard atmosphere of 1.01325 bar.',
    )
  await page.keyboard.press('Escape')
  await number('main.p').click()
  await page.keyboard.type('52/4 MPa')
  await expect.poll(() => note.textContent()).toBe('That is 130.0 bar.')
  await page.keyboard.press('Enter')
  await expect.poll(async () => numberIn(await field(page, 'main.p').textContent())).toBe(130)
  await page.keyboard.press('Escape')

  await show(page, 'condenser.pressure', 'condenser.pressure')
  await number('condenser.pressure').click()
  await page.keyboard.type('721 mmHg vacuum')
  // 760 mmHg less 721, at 133.3224 Pa (NIST SP 811, B.8).
  await expect.poll(() => note.textContent()).toContain('Vacuum, taken as 0.0520 bar absolute')
  await page.keyboard.press('Enter')
  await expect
    .poll(async () => numberIn(await field(page, 'condenser.pressure').textContent()))
    .toBeCloseTo(0.052, 3)
  await solved(page)
  await takeBack()
  for (const impossible of ['761 mmHg vacuum', '-1.1 barg', '-0.01 bar']) {
    await number('condenser.pressure').click()
    await page.keyboard.type(impossible)
    await page.keyboard.press('Enter')
    await expect.poll(() => note.getAttribute('role')).toBe('alert')
    expect(await note.textContent()).toMatch(/full vacuum|cannot be negative/)
    await page.keyboard.press('Escape')
  }
  expect(await undo().isDisabled()).toBe(true)
  await page.keyboard.press('Escape')
})

test('a curve is pasted as a table, drawn, and edited again', async () => {
  await show(page, 'boiler', 'boiler.efficiency')
  await page.locator('.card [data-row="boiler.efficiency"] .card-label').click()
  await page.getByRole('button', { name: 'Give as a curve' }).click()
  await page.getByLabel('Depends on').selectOption('main.m')
  await page.locator('textarea').fill('Flow\tEfficiency\n60\t89 %\n90\t90\n130\t91')
  await page.locator('.curve-drawing').waitFor()
  await page.getByRole('button', { name: 'Give the curve' }).click()
  await expect.poll(() => number('boiler.efficiency').textContent()).toMatch(/curve.*90\.7\d/)
  await solved(page)
  await number('boiler.efficiency').click()
  expect(await page.locator('textarea').inputValue()).toBe('60\t89\n90\t90\n130\t91')
  await page.keyboard.press('Escape')
  await takeBack()
})
