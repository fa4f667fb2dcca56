import type { Page } from 'playwright-core'
import { expect, test } from 'vitest'
import { field, giveByKeys, goTo, input, solved } from './hands.ts'
import { withWindow } from './support.ts'

const state = (page: Page) => page.locator('.drawer-state')
const findings = (page: Page) => page.getByRole('tabpanel').locator('.finding')

async function showFindings(page: Page): Promise<void> {
  await page.getByRole('tab', { name: /^Findings/ }).click()
}

/** Words and signs that no user should ever read. */
const leaks = /\b(NaN|undefined|null|Infinity|object Object)\b/

async function showsNoLeak(page: Page): Promise<void> {
  expect(await page.locator('body').textContent()).not.toMatch(leaks)
}

test('an exhaust above the inlet pressure is said in a sentence, and a click mends it', async () => {
  await withWindow(async ({ page, problems }) => {
    await solved(page)
    await giveByKeys(page, 'HP to cold reheat, pressure', 'hpx.p', '150 bar')
    await expect.poll(() => state(page).textContent()).toBe('Not possible')
    await showFindings(page)
    const first = findings(page).first()
    expect(await first.textContent()).toContain(
      'HP would raise the pressure, from 118.0 bar to 150.0 bar.',
    )
    await first.getByRole('button', { name: /HP to cold reheat, pressure, was 23.00 bar/ }).click()
    await page.keyboard.press('Enter')
    await solved(page)
    expect(await findings(page).count()).toBe(0)
    expect(problems).toEqual([])
  })
})

test('pressure and temperature given for wet steam: it is said why they do not suffice', async () => {
  await withWindow(async ({ page, problems }) => {
    await solved(page)
    await goTo(page, 'LP to condenser, temperature', 'exhaust.T')
    await page.locator('[data-turn="exhaust.T"]').click()
    await input(page, 'exhaust.T').waitFor()
    await page.keyboard.press('Enter')
    await expect.poll(() => state(page).textContent()).toContain('numbers contradict')
    await goTo(page, 'LP, group efficiency 1', 'lp.groupEfficiency1')
    await page.keyboard.press('Delete')
    await expect
      .poll(() => page.getByRole('tab', { name: /^Ledger/ }).textContent())
      .toContain('85 = 85')
    await showFindings(page)
    await expect
      .poll(() => findings(page).first().textContent())
      .toMatch(/pressure and temperature are those of saturation.*do not say how much is steam/)
    await showsNoLeak(page)
    await page.keyboard.press('Control+z')
    await page.keyboard.press('Control+z')
    await solved(page)
    expect(problems).toEqual([])
  })
})

test('what makes no number is refused where it was typed, with the reason', async () => {
  await withWindow(async ({ page, problems }) => {
    await solved(page)
    for (const [name, path, text, reason] of [
      ['Boiler to HP, pressure', 'main.p', '-5', /cannot be negative/],
      ['Boiler to HP, pressure', 'main.p', 'abc', /abc is not a number/],
      ['Boiler to HP, pressure', 'main.p', '540 F', /unit of temperature; here a pressure/],
      ['Boiler to HP, pressure', 'main.p', '12,5', /comma/],
      ['Boiler to HP, pressure', 'main.p', '1e999', /./],
      ['Boiler to HP, temperature', 'main.T', '-300', /below absolute zero/],
      ['Boiler to HP, temperature', 'main.T', '5 MW', /unit of power; here a temperature/],
    ] as const) {
      await goTo(page, name, path)
      const before = await field(page, path).textContent()
      await page.keyboard.type(text)
      await page.keyboard.press('Enter')
      await expect
        .poll(() => page.getByRole('alert').textContent(), { message: text })
        .toMatch(reason)
      expect(await input(page, path).inputValue()).toBe(text)
      await page.keyboard.press('Escape')
      await expect.poll(() => field(page, path).textContent()).toBe(before)
    }
    expect(await page.getByRole('button', { name: 'Undo', exact: true }).isDisabled()).toBe(true)
    await solved(page)
    expect(problems).toEqual([])
  })
})

test('units of another set are converted as they are typed', async () => {
  await withWindow(async ({ page }) => {
    await solved(page)
    await giveByKeys(page, 'Boiler to HP, temperature', 'main.T', '1000 F')
    expect(await field(page, 'main.T').textContent()).toMatch(/^537\.8/)
    await giveByKeys(page, 'Condenser, pressure', 'condenser.pressure', '1 psi')
    expect(await field(page, 'condenser.pressure').textContent()).toMatch(/^0\.0689/)
    await giveByKeys(page, 'Condenser, cooling water inlet', 'condenser.coolingInletT', '290 K')
    expect(await field(page, 'condenser.coolingInletT').textContent()).toMatch(/^16\.8/)
    await solved(page)
  })
})

test('numbers that no plant can have are answered in sentences, and undo brings the plant back', async () => {
  await withWindow(async ({ page, problems }) => {
    await solved(page)
    await showFindings(page)
    for (const [name, path, text, said] of [
      [
        'Boiler to HP, pressure',
        'main.p',
        '1e99',
        /pressure of 1 × 10⁹⁹ bar.*properties.*only up to/,
      ],
      ['Boiler to HP, pressure', 'main.p', '0', /must be above 0 bar/],
      ['Boiler to HP, pressure', 'main.p', '180 psi', /would raise the pressure, from 12\.41 bar/],
      [
        'Boiler to HP, temperature',
        'main.T',
        '5000',
        /temperature of 5000\.0 °C.*properties.*only up to/,
      ],
      ['Boiler to HP, flow', 'main.m', '-40', /would have to flow backwards, −40\.00 kg\/s/],
      ['Boiler to HP, flow', 'main.m', '0', /Give a flow or a power other than zero/],
      ['HP, group efficiency 1', 'hp.groupEfficiency1', '101 %', /cannot be above 100/],
      ['Boiler, pressure loss', 'boiler.pressureLossFraction', '150 %', /cannot be above 100/],
    ] as const) {
      await giveByKeys(page, name, path, text)
      await expect.poll(() => state(page).textContent(), { message: text }).toBe('Not possible')
      await expect
        .poll(async () => (await findings(page).allTextContents()).join('\n'), { message: text })
        .toMatch(said)
      await showsNoLeak(page)
      await page.keyboard.press('Control+z')
      await solved(page)
    }
    // Beyond all measure, but a balance all the same: the numbers go on being numbers.
    await giveByKeys(page, 'Boiler to HP, flow', 'main.m', '1e99')
    await expect.poll(() => page.locator('.totals').textContent()).toContain('× 10')
    await showsNoLeak(page)
    expect(problems).toEqual([])
  })
})
