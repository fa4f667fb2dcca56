import type { Locator, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { solved } from './hands.ts'
import { openSeven, show } from './seven.ts'
import { accessibilityFaults, openWindow, type Visit } from './support.ts'

interface Fault {
  readonly name: string
  /** The number at fault, and words that find its card. */
  readonly path: string
  readonly find: string
  /** What is typed; without it the number is freed. */
  readonly text?: string
  /** What the window calls it. */
  readonly said: RegExp
  /** The remedy that mends it. */
  readonly remedy: string
}

const short = /1 short/
const many = /1 too many/
const impossible = /Not possible|No solution found/

const faults: readonly Fault[] = [
  {
    name: 'the steam flow is taken away',
    find: 'main steam',
    path: 'main.m',
    said: short,
    remedy: 'main.m',
  },
  {
    name: 'the condenser pressure is taken away',
    find: 'condenser',
    path: 'condenser.pressure',
    said: short,
    remedy: 'condenser.pressure',
  },
  {
    name: 'an approach is taken away',
    find: 'heater 5',
    path: 'h5.terminalDifference',
    said: short,
    remedy: 'h5.terminalDifference',
  },
  {
    name: 'an efficiency is taken away',
    find: 'turbine hp',
    path: 'hp.groupEfficiency1',
    said: short,
    remedy: 'hp.groupEfficiency1',
  },
  {
    name: 'a power is given beside everything that fixes it',
    find: 'turbine hp',
    path: 'hp.power',
    text: '45',
    said: many,
    remedy: 'hp.power',
  },
  {
    name: 'net power is given beside the flow',
    find: 'numbers of the whole plant',
    path: 'plant.netPower',
    text: '150',
    said: many,
    remedy: 'plant.netPower',
  },
  {
    name: 'a duty contradicts the approach',
    find: 'heater 6',
    path: 'h6.heat',
    text: '12',
    said: many,
    remedy: 'h6.heat',
  },
  {
    name: 'a temperature contradicts the pressure behind the pump',
    find: 'stream f1',
    path: 'f1.T',
    text: '175',
    said: many,
    remedy: 'f1.T',
  },
  {
    name: 'cooling water hotter than the steam',
    find: 'condenser',
    path: 'condenser.coolingInletT',
    text: '45',
    said: impossible,
    remedy: 'undo',
  },
  {
    name: 'a bleed above the pressure it is taken from',
    find: 'stream b7',
    path: 'b7.p',
    text: '150',
    said: impossible,
    remedy: 'undo',
  },
]

let visit: Visit
let page: Page
/** Net power as it is before any fault. */
let sound: string | null

beforeAll(async () => {
  visit = await openWindow()
  page = visit.page
  await openSeven(page)
  sound = await netPower().textContent()
})

afterAll(async () => {
  await visit?.close()
})

const netPower = () => page.locator('.totals [data-path="plant.netPower"]')
const trouble = () => page.locator('.card-trouble')

/** Makes the fault by hand: the number is typed over, or freed by its dot. */
async function spoil({ find, path, text }: Fault): Promise<void> {
  await show(page, find, path)
  if (text === undefined) {
    await page.locator(`.card [data-turn="${path}"]`).click()
    return
  }
  await page.locator(`.card button[data-path="${path}"]`).click()
  await page.locator(`.card input[data-path="${path}"]`).waitFor()
  await page.keyboard.type(text)
  await page.keyboard.press('Enter')
}

/** Clicks a remedy, one that is not among the nearest too. */
async function mend(within: Locator, path: string): Promise<void> {
  const remedy = within.locator(`.remedy[data-remedy="${path}"]`)
  await within.locator('.remedy').first().waitFor()
  if ((await remedy.count()) === 0) await within.locator('.remedy-more').first().click()
  await remedy.click()
}

async function isSound(): Promise<void> {
  await solved(page)
  await expect.poll(() => netPower().textContent()).toBe(sound)
  await page.keyboard.press('Escape')
  expect(visit.problems).toEqual([])
}

test.for(faults)('$name: mended through its remedy alone', async (fault) => {
  await spoil(fault)
  await expect.poll(() => trouble().textContent(), { timeout: 30_000 }).toMatch(fault.said)
  await mend(trouble(), fault.remedy)
  // A remedy that gives leaves the field open, with the value that it had.
  if (fault.said === short) {
    await page.locator(`.card input[data-path="${fault.path}"]`).waitFor()
    await page.keyboard.press('Enter')
  }
  await isSound()
})

test('the ledger says the same, shows where it lies, and mends it', async () => {
  await spoil(faults[2] as Fault)
  await page.getByRole('tab', { name: /^Ledger/ }).click()
  const ledger = page.locator('.ledger')
  await expect.poll(() => ledger.locator('.ledger-line').first().textContent()).toMatch(short)
  await ledger.locator('.ledger-where').click()
  await expect.poll(() => page.locator('.react-flow__node.selected').count()).toBeGreaterThan(0)
  expect(await accessibilityFaults(page, '.strip, .card, .drawer, .totals')).toEqual([])
  await mend(ledger, 'h5.terminalDifference')
  await page.locator('.card input[data-path="h5.terminalDifference"]').waitFor()
  await page.keyboard.press('Enter')
  await solved(page)
  await expect
    .poll(() => page.locator('.equations').textContent())
    .toMatch(/Equations of heater 5.*energy balance/s)
  await isSound()
})
