import { readFileSync } from 'node:fs'
import type { Locator, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { checkLine } from '../balance/check-line.ts'
import { solved } from './hands.ts'
import { openExample, openSeven, show } from './seven.ts'
import { accessibilityFaults, openWindow, type Visit } from './support.ts'

const examples: readonly { readonly title: string }[] = JSON.parse(
  readFileSync('public/examples/index.json', 'utf8'),
)

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

const place = () => page.getByRole('region', { name: 'Where from' })
const heading = () => place().getByRole('heading', { level: 2 })
const trail = () => place().locator('.trail li')

interface Line {
  readonly text: string
  readonly figure: string
  readonly unit: string
}

interface Asked {
  readonly path: string
  readonly given: boolean
  /** What went in, in the order shown. */
  readonly inputs: readonly string[]
  /** The lines in figures that have their result before or behind them. */
  readonly lines: readonly Line[]
}

/** What is read off the place that tells where a number comes from, once its answer is there. */
async function readPlace(): Promise<Asked> {
  await page.locator('.where-from[data-origin]').waitFor()
  return place().evaluate((region) => {
    const plain = (element: Element | null | undefined) =>
      (element?.textContent ?? '').replaceAll('\u2009', ' ')
    const line = (figures: Element | undefined, result: Element | undefined): Line[] => {
      if (!figures || !result) return []
      const unit = plain(result.querySelector('.quantity-unit')).trim()
      const whole = plain(result)
      const figure = unit === '' ? whole : whole.slice(0, -unit.length - 1)
      return [{ text: plain(figures), figure, unit }]
    }
    const [result, figures] = [...region.querySelectorAll('[data-line="figures"] > .worked-line')]
    const steps = [...region.querySelectorAll('.worked-steps tr')]
    return {
      path: region.getAttribute('data-origin') ?? '',
      given: region.textContent?.includes('Given: it goes in as it is.') ?? false,
      inputs: [...region.querySelectorAll('[aria-label="What went in"] [data-follow]')].map(
        (one) => one.getAttribute('data-follow') ?? '',
      ),
      lines: [
        ...line(figures, result),
        ...steps.flatMap((row) => {
          const cells = [...row.querySelectorAll('td > .worked-line')]
          return line(cells[1], cells[2])
        }),
      ],
    }
  })
}

/** Asks where a number of the whole plant comes from, with the key. */
async function ask(path: string): Promise<void> {
  await show(page, path, path)
  await page.locator(`.card button[data-path="${path}"]`).focus()
  await page.keyboard.press('w')
  await expect.poll(async () => (await readPlace()).path).toBe(path)
}

async function isBackAtStart(): Promise<void> {
  await expect
    .poll(() => page.getByRole('button', { name: 'Undo', exact: true }).isDisabled())
    .toBe(true)
  await solved(page)
  expect(visit.problems).toEqual([])
}

test('net power is followed step by step to a given number, and back out again', async () => {
  await ask('plant.netPower')
  expect(await heading().textContent()).toBe('Net power')
  const paths = ['plant.grossPower', '.generatorPower', '.generatorEfficiency']
  for (const [i, path] of paths.entries()) {
    await place().locator(`[data-line="figures"] [data-follow$="${path}"]`).first().click()
    await expect.poll(() => trail().count()).toBe(i + 2)
    await expect.poll(async () => (await readPlace()).path).toMatch(path)
  }
  await expect.poll(() => place().textContent()).toContain('Given: it goes in as it is.')
  expect(await accessibilityFaults(page, '.where-from')).toEqual([])
  for (const _ of paths) await page.keyboard.press('Backspace')
  await expect.poll(() => heading().textContent()).toBe('Net power')
  await page.keyboard.press('Backspace')
  await expect.poll(() => place().count()).toBe(0)
  await page.keyboard.press('Escape')
  await isBackAtStart()
})

test('a total below the chart tells where it comes from', async () => {
  await page.locator('.totals [data-path="plant.netPower"]').click({ modifiers: ['Alt'] })
  await expect.poll(() => heading().textContent()).toBe('Net power')
  await page.keyboard.press('Escape')
  await expect.poll(() => place().count()).toBe(0)
  await page.locator('.totals [data-path="plant.heatInput"]').focus()
  await page.keyboard.press('w')
  await expect.poll(() => heading().textContent()).toBe('Heat input')
  await page.keyboard.press('Escape')
  await expect.poll(() => place().count()).toBe(0)
  await isBackAtStart()
})

test('a number on the canvas and in a table tells where it comes from', async () => {
  const asks = async (number: Locator, path: string): Promise<void> => {
    await number.click({ modifiers: ['Alt'] })
    await expect.poll(async () => (await readPlace()).path).toBe(path)
    await page.keyboard.press('Escape')
    await expect.poll(() => place().count()).toBe(0)
  }
  await asks(page.locator('.canvas [data-path="h6.heat"]'), 'h6.heat')
  await page.getByRole('tab', { name: 'State points', exact: true }).click()
  await asks(page.locator('[data-table="states"] td[data-path="main.h"]'), 'main.h')
  await asks(page.locator('[data-table="states"] td[data-path="main.v"]'), 'main.v')
  await page.keyboard.press('Escape')
  await isBackAtStart()
})

test('a card tells worth, basis and origin; what a number rests on is kept and undone', async () => {
  await show(page, 'heater 5', 'h5.terminalDifference')
  const row = page.locator('.card [data-row="h5.terminalDifference"]')
  await expect.poll(() => row.locator('[data-worth="fixed"]').textContent()).toMatch(/^\+\d/)
  await expect.poll(() => row.locator('[data-worth="frozen"]').textContent()).toMatch(/^\+\d/)
  await expect
    .poll(() => page.locator('.card-foot').textContent())
    .toMatch(/^Duty = .*kg\/s × \(.*\) kJ\/kg$/)
  await row.locator('.card-label').click()
  await page.getByLabel('Basis', { exact: true }).selectOption('measured')
  await page.getByLabel('Uncertainty, 95 %').fill('0.5')
  await page.getByLabel('Note on the basis').fill('Test of May')
  await page.keyboard.press('Enter')
  await expect.poll(() => page.locator('.card-foot').count()).toBe(1)
  expect(await accessibilityFaults(page, '.card')).toEqual([])
  await page.getByRole('tab', { name: /^Givens/ }).click()
  const given = page.locator('[data-given-row="h5.terminalDifference"]')
  await expect.poll(() => given.textContent()).toContain('Measured ± 0.5 K: Test of May')
  await page.keyboard.press('Escape')
  for (let i = 0; i < 3; i++) await page.keyboard.press('Control+z')
  await expect.poll(() => given.textContent()).not.toContain('Measured')
  await isBackAtStart()
})

test('a card keeps its width and its numbers their place, whatever is pointed at', async () => {
  await show(page, 'stream hpx', 'hpx.T')
  const number = page.locator('.card button[data-path="hpx.T"]')
  // Its worths have come in.
  await page.locator('.card [data-worth="fixed"]').first().waitFor()
  const before = await number.boundingBox()
  for (const path of ['hpx.m', 'hpx.h', 'hpx.s', 'hpx.T']) {
    await page.locator(`.card button[data-path="${path}"]`).hover()
    await expect
      .poll(() => page.locator('.card-foot').getAttribute('data-foot'), { message: path })
      .toBe(path)
    await expect.poll(() => page.locator('.card-foot').textContent()).toMatch(/ = /)
    expect(await number.boundingBox(), path).toEqual(before)
  }
  await page.keyboard.press('Escape')
  await isBackAtStart()
})

test.for(examples)(
  '$title: net power is followed to givens, every line agrees',
  async (example) => {
    await openExample(page, example.title)
    await ask('plant.netPower')
    // Where net power is what is given, nothing stands behind it: the fuel follows from it then.
    if ((await readPlace()).given) await ask('plant.fuelHeat')
    const asked = new Set<string>()
    let ends = 0
    let lines = 0
    // Down first, back where a place has nothing new, until three given numbers are reached.
    for (let turns = 0; ends < 3 && turns < 40; turns++) {
      const { path, given, inputs, lines: shown } = await readPlace()
      asked.add(path)
      for (const { text, figure, unit } of shown) checkLine(text, { figure, unit }, path)
      lines += shown.length
      if (given) ends += 1
      const next = inputs.find((one) => !asked.has(one))
      if (given || next === undefined) {
        await page.keyboard.press('Backspace')
        await expect.poll(async () => (await readPlace()).path).not.toBe(path)
      } else {
        await place().locator(`.went-in [data-follow="${next}"]`).first().click()
        await expect.poll(async () => (await readPlace()).path).toBe(next)
      }
    }
    expect(ends).toBe(3)
    expect(lines).toBeGreaterThan(3)
    await page.keyboard.press('Escape')
    await expect.poll(() => place().count()).toBe(0)
    expect(visit.problems).toEqual([])
  },
)
