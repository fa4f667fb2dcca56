import { readFileSync } from 'node:fs'
import type { Page } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { Model } from '../../src/balance/model.ts'
import { solve } from '../../src/balance/solve.ts'
import {
  applyOverrides,
  describeQuantity,
  formatQuantity,
  type Layout,
  parseQuantity,
  readPlant,
} from '../../src/document.ts'
import { field, input, numberIn, solved } from './hands.ts'
import { openSeven, show } from './seven.ts'
import { openWindow, type Visit } from './support.ts'

const file = 'public/examples/tarn-vale-2.json'
const read = readPlant(readFileSync(file, 'utf8'))
if (read.outcome !== 'plant') throw new Error(read.message)
const layout = read.plant.layouts[0] as Layout

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

interface Question {
  /** What is asked, as an engineer says it. */
  readonly name: string
  /** Words that find the card. */
  readonly find: string
  /** What is solved now, and what is typed for it. */
  readonly give: string
  readonly text: string
  /** What is given now, and solved for it. */
  readonly free: string
}

const questions: readonly Question[] = [
  {
    name: 'steam flow for net power',
    find: 'plant.netPower',
    give: 'plant.netPower',
    text: '150',
    free: 'main.m',
  },
  {
    name: 'approach for conductance',
    find: 'heater 5',
    give: 'h5.conductance',
    text: '900',
    free: 'h5.terminalDifference',
  },
  {
    name: 'efficiency for exhaust temperature',
    find: 'stream hpx',
    give: 'hpx.T',
    text: '321',
    free: 'hp.groupEfficiency2',
  },
  {
    name: 'condenser pressure for heat rate',
    find: 'plant.unitHeatRate',
    give: 'plant.unitHeatRate',
    text: '9400',
    free: 'condenser.pressure',
  },
  {
    name: 'approach for final feedwater temperature',
    find: 'stream fw',
    give: 'fw.T',
    text: '245',
    free: 'h7.terminalDifference',
  },
  {
    name: 'drain approach for drain temperature',
    find: 'stream d5',
    give: 'd5.T',
    text: '168',
    free: 'h5.drainApproach',
  },
  {
    name: 'steam flow for fuel heat',
    find: 'plant.fuelHeat',
    give: 'plant.fuelHeat',
    text: '350',
    free: 'main.m',
  },
  {
    name: 'hot reheat temperature for reheater duty',
    find: 'reheater',
    give: 'reheater.heat',
    text: '55',
    free: 'hot.T',
  },
  {
    name: 'drain approach for drain cooler conductance',
    find: 'heater 6',
    give: 'h6.drainConductance',
    text: '160',
    free: 'h6.drainApproach',
  },
  {
    name: 'cooling water flow for cooling water rise',
    find: 'condenser',
    give: 'condenser.coolingRise',
    text: '9',
    free: 'condenser.coolingFlow',
  },
]

/** What the engine answers to a question, SI, or null where there is no answer. */
function answered({ give, text, free }: Question): number | null {
  const dimension = describeQuantity(layout, give)?.dimension ?? 'number'
  const typed = parseQuantity(text, dimension, 'metric')
  if (typed.outcome !== 'value') throw new Error(typed.message)
  const asked = applyOverrides(layout, { free: [free], set: { [give]: typed.value } })
  if (asked.outcome !== 'layout') throw new Error(asked.message)
  const { status, results } = solve(new Model(asked.layout))
  return status === 'solved' ? results.value(free) : null
}

/** Counts the clicks that the page gets from now on. */
async function countClicks(): Promise<() => Promise<number>> {
  await page.evaluate(() => {
    const counter = window as unknown as { clicks: number; counting?: true }
    counter.clicks = 0
    if (!counter.counting) window.addEventListener('click', () => counter.clicks++, true)
    counter.counting = true
  })
  return () => page.evaluate(() => (window as unknown as { clicks: number }).clicks)
}

const trouble = () => page.locator('.card-trouble')

/** A click on the number, the new value, and a click on what is to be solved for it. */
async function turn({ name, find, give, text, free }: Question): Promise<void> {
  await show(page, find, give)
  const clicks = await countClicks()
  await page.locator(`.card button[data-path="${give}"]`).click()
  await input(page, give).waitFor()
  await page.keyboard.type(text)
  await page.keyboard.press('Enter')
  await trouble().locator('.remedy').first().waitFor()
  const remedy = trouble().locator(`.remedy[data-remedy="${free}"]`)
  if ((await remedy.count()) > 0) await remedy.click()
  else {
    // Not among the nearest: found by its name, and freed by its dot.
    await page.keyboard.press('Escape')
    await show(page, free, free)
    await page.locator(`.card [data-turn="${free}"]`).click()
  }
  expect(await clicks(), `clicks for ${name}`).toBeLessThanOrEqual(2)
}

/** Takes the number typed and the one freed back. */
async function back(): Promise<void> {
  await page.keyboard.press('Escape')
  const undo = page.getByRole('button', { name: 'Undo', exact: true })
  await page.keyboard.press('Control+z')
  await page.keyboard.press('Control+z')
  await expect.poll(() => undo.isDisabled()).toBe(true)
  await solved(page)
}

test.for(questions)('$name, in two clicks and one number', async (question) => {
  const { free } = question
  const wanted = answered(question)
  if (wanted === null) throw new Error('The engine has no answer.')
  await turn(question)
  await solved(page)
  await show(page, free, free)
  const dimension = describeQuantity(layout, free)?.dimension ?? 'number'
  const shown = formatQuantity(wanted, dimension, 'metric')
  await expect
    .poll(async () => numberIn(await field(page, free).textContent()))
    .toBe(numberIn(shown.text))
  await back()
  expect(visit.problems).toEqual([])
})

test.for([
  {
    name: 'an exhaust colder than the best expansion leaves it',
    find: 'stream hpx',
    give: 'hpx.T',
    text: '310',
    free: 'hp.groupEfficiency2',
    why: /^Not possible.*group efficiency 2 is 11\d\.\d\d %; it cannot be above 100\.00 %/,
  },
  {
    name: 'a heat rate below that of any plant',
    find: 'plant.unitHeatRate',
    give: 'plant.unitHeatRate',
    text: '3000',
    free: 'condenser.pressure',
    why: /^(Not possible|No solution found)./,
  },
])('$name is explained, and taken back by a click', async ({ why, ...question }) => {
  expect(answered(question)).toBeNull()
  await turn(question)
  // That there is no answer takes the longest search.
  await expect.poll(() => trouble().textContent(), { timeout: 30_000 }).toMatch(why)
  const said = await trouble().textContent()
  expect(said).not.toMatch(/NaN|undefined|null/)
  expect(said?.length ?? 0).toBeGreaterThan(60)
  await trouble().locator('.remedy[data-remedy="undo"]').click()
  await page.keyboard.press('Escape')
  await page.keyboard.press('Control+z')
  await solved(page)
  expect(visit.problems).toEqual([])
})
