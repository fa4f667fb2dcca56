import type { Page } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { numberIn, solved } from './hands.ts'
import { accessibilityFaults, openWindow, type Visit } from './support.ts'

let visit: Visit
let page: Page

beforeAll(async () => {
  visit = await openWindow()
  page = visit.page
})

afterAll(async () => {
  await visit?.close()
})

const tabs = () => page.getByRole('tablist', { name: 'Tables' })
const undo = () => page.getByRole('button', { name: 'Undo', exact: true })
const field = (path: string) => page.locator(`.card button[data-path="${path}"] .quantity`)

async function select(words: string): Promise<void> {
  await page.keyboard.press('Control+k')
  await page.keyboard.type(words)
  await page.locator('.command-list [role="option"]').first().waitFor()
  await page.keyboard.press('Enter')
}

/** Takes back all that was done, and puts the card away. */
async function takeBack(steps: number): Promise<void> {
  for (let i = 0; i < steps; i++) await page.keyboard.press('Control+z')
  await expect.poll(() => undo().isDisabled()).toBe(true)
  await solved(page)
  await page.keyboard.press('Escape')
  expect(visit.problems).toEqual([])
}

test('a number is typed with a unit, stepped, freed and given again, by keyboard alone', async () => {
  await solved(page)
  await select('condenser pressure')
  const pressure = field('condenser.pressure')
  await expect.poll(() => page.evaluate(() => document.activeElement?.textContent)).toMatch(/bar/)
  const before = await pressure.textContent()
  await page.keyboard.type('6 kPa')
  await page.keyboard.press('Enter')
  await expect.poll(() => pressure.textContent()).toBe('0.0600\u2009bar')
  await expect.poll(() => page.locator('.total-edit').textContent()).toContain('to 0.0600 bar')
  await solved(page)
  await page.keyboard.press('Delete')
  await expect.poll(() => tabs().textContent()).toContain('1 short')
  await page.getByRole('tab', { name: /^Ledger/ }).click()
  const ledger = page.locator('.ledger')
  const remedy = ledger.locator('.remedy[data-remedy="condenser.pressure"]')
  await ledger.locator('.remedy').first().waitFor()
  if ((await remedy.count()) === 0) await ledger.locator('.remedy-more').click()
  expect(await remedy.textContent()).toContain('was 0.0600 bar')
  await remedy.click()
  await page.locator('.card input[data-path="condenser.pressure"]').waitFor()
  await page.keyboard.press('Enter')
  await solved(page)
  await takeBack(3)
  await select('condenser pressure')
  await expect.poll(() => pressure.textContent()).toBe(before)
  await page.keyboard.press('Escape')
})

test('what cannot be read is said beneath the field, and nothing typed is lost', async () => {
  await select('condenser pressure')
  await page.keyboard.type('6 ells')
  await page.keyboard.press('Enter')
  const input = page.locator('.card input[data-path="condenser.pressure"]')
  expect(await input.inputValue()).toBe('6 ells')
  expect(await page.getByRole('alert').textContent()).toContain('ells')
  await page.keyboard.press('Escape')
  await expect.poll(() => page.locator('.card input[data-path]').count()).toBe(0)
  expect(await undo().isDisabled()).toBe(true)
  await page.keyboard.press('Escape')
})

test('a click turns a solved number into a given one; the ledger names what to free', async () => {
  await select('HP, power')
  await page.locator('[data-turn="hp.power"]').click()
  await page.locator('.card input[data-path="hp.power"]').waitFor()
  await page.keyboard.press('Enter')
  await expect.poll(() => tabs().textContent()).toContain('1 too many')
  await page.getByRole('tab', { name: /^Ledger/ }).click()
  const ledger = page.locator('.ledger')
  const first = ledger.locator('.remedy').first()
  await expect.poll(() => first.textContent()).toContain('just given')
  await ledger.locator('.remedy[data-remedy="main.m"]').click()
  await solved(page)
  await takeBack(2)
})

/**
 * What one of a unit is in SI, and where its zero lies: BIPM, SI Brochure, 9th edition, 2.3.1; NIST SP
 * 811 (2008), appendix B.8, printed digits.
 */
const published: Readonly<Record<string, readonly [factor: number, shift?: number]>> = {
  'kg/s': [1],
  'lb/h': [1.259979e-4],
  bar: [1e5],
  kPa: [1e3],
  psia: [6894.757],
  '°C': [1, 273.15],
  K: [1],
  '°F': [1 / 1.8, 459.67],
  'kJ/kg': [1e3],
  'Btu/lb': [2326],
  'kJ/(kg K)': [1e3],
  'Btu/(lb °R)': [4186.8],
}

/** The numbers of the table of state points as they stand there, and the unit of each column. */
async function states(): Promise<{ units: string[]; rows: string[][] }> {
  return page.locator('[data-table="states"]').evaluate((table) => ({
    units: [...table.querySelectorAll('thead th')]
      .slice(2, 7)
      .map((head) => head.querySelector('small')?.textContent ?? ''),
    rows: [...table.querySelectorAll('tbody tr[data-row]')].map((row) =>
      [...row.children]
        .slice(2, 7)
        .map((cell) => cell.querySelector('.quantity-value')?.textContent ?? ''),
    ),
  }))
}

test('no value changes when the set of units does', async () => {
  await page.keyboard.press('Alt+1')
  const choose = async (set: string, sign: string) => {
    await page.getByLabel('Units').selectOption(set)
    await expect.poll(async () => (await states()).units[1]).toBe(sign)
    return states()
  }
  const metric = await choose('metric', 'bar')
  const inSi = ({ units, rows }: typeof metric) =>
    rows.map((row) =>
      row.map((text, i) => {
        const [factor, shift = 0] = published[units[i] ?? ''] ?? [Number.NaN]
        const decimals = text.split('.')[1]?.length ?? 0
        return { value: (numberIn(text) + shift) * factor, half: 0.5 * 10 ** -decimals * factor }
      }),
    )
  const before = inSi(metric)
  expect(before.length).toBeGreaterThan(5)
  for (const [set, sign] of [
    ['us', 'psia'],
    ['si', 'kPa'],
  ] as const) {
    const after = inSi(await choose(set, sign))
    before.forEach((row, i) => {
      row.forEach(({ value, half }, k) => {
        const other = after[i]?.[k]
        const allowed = half + (other?.half ?? 0) + 1e-6 * value
        expect(Math.abs((other?.value ?? Number.NaN) - value), `${set}, ${i}, ${k}`).toBeLessThan(
          allowed,
        )
      })
    })
    // A field opened and left as it stands, by Enter too, gives what was given.
    await select('condenser pressure')
    await page.keyboard.press('Enter')
    await page.locator('.card input[data-path="condenser.pressure"]').waitFor()
    await page.keyboard.press('Enter')
    await page.locator('.card input[data-path="condenser.pressure"]').waitFor({ state: 'detached' })
    await page.keyboard.press('Escape')
    expect(await undo().isDisabled()).toBe(true)
  }
  expect(await choose('metric', 'bar')).toEqual(metric)
  expect(await undo().isDisabled()).toBe(true)
})

test.for(['light', 'dark'] as const)(
  'strip, card, drawer, menu and totals pass the accessibility check in %s colours',
  async (colorScheme) => {
    await page.emulateMedia({ colorScheme })
    await page.keyboard.press('Alt+1')
    await select('condenser pressure')
    await page.locator('.card').waitFor()
    expect(await accessibilityFaults(page, '.strip, .card, .drawer, .totals')).toEqual([])
    await page.keyboard.press('Alt+3')
    await page.getByLabel('Menu').click()
    await page.locator('.menu').waitFor()
    expect(await accessibilityFaults(page, '.drawer, .menu')).toEqual([])
    await page.keyboard.press('Escape')
    await page.keyboard.press('Escape')
  },
)
