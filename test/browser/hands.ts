import type { Page } from 'playwright-core'
import { expect } from 'vitest'

/** What a user does with mouse and keyboard, and what he reads off the screen; nothing else. */

type Spot = readonly [number, number]

export const units = (page: Page) => page.locator('.react-flow__node')
export const streams = (page: Page) => page.locator('.react-flow__edge')
export const unitBox = (id: string) => `.react-flow__node[data-id="${id}"]`

/** Opens the window on an empty plant. */
export async function startEmpty(page: Page): Promise<void> {
  await page.locator('.canvas').waitFor()
  await command(page, 'New plant')
  await page.locator('.empty-canvas').waitFor()
}

/** Finds a command, a unit, a stream or a quantity by its name and takes the first that fits. */
export async function command(page: Page, words: string): Promise<void> {
  await page.keyboard.press('Control+k')
  await page.keyboard.type(words)
  await page.locator('.command-list [role="option"]').first().waitFor()
  await page.keyboard.press('Enter')
}

export async function middleOf(page: Page, selector: string): Promise<Spot> {
  const box = await page.locator(selector).first().boundingBox()
  if (!box) throw new Error(`${selector} is not shown.`)
  return [box.x + box.width / 2, box.y + box.height / 2]
}

export async function drag(page: Page, from: Spot, to: Spot): Promise<void> {
  await page.mouse.move(...from)
  await page.mouse.down()
  await page.mouse.move((from[0] + to[0]) / 2, (from[1] + to[1]) / 2, { steps: 3 })
  await page.mouse.move(...to, { steps: 3 })
  await page.mouse.up()
}

/**
 * Drags a kind from the rail so that it stands with its middle at a point of the canvas, and lets go of
 * it, so that its card covers nothing.
 */
export async function place(page: Page, kind: string, x: number, y: number): Promise<string> {
  const before = await units(page).count()
  const canvas = await page.locator('.canvas').boundingBox()
  if (!canvas) throw new Error('There is no canvas.')
  await drag(page, await middleOf(page, `[data-kind="${kind}"]`), [canvas.x + x, canvas.y + y])
  await expect.poll(() => units(page).count()).toBe(before + 1)
  await page.keyboard.press('Escape')
  await page.locator('.card').waitFor({ state: 'detached' })
  return (await units(page).last().getAttribute('data-id')) ?? ''
}

/** Where a port is, its unit pointed at so that its ports show. */
export async function portAt(page: Page, port: string): Promise<Spot> {
  const [id = ''] = port.split('.')
  await page.mouse.move(...(await middleOf(page, unitBox(id))))
  const square = `[data-port="${port}"] .port-square`
  await page.locator(square).waitFor()
  return middleOf(page, square)
}

/** Puts an open card away, which may lie over what is to be clicked next. */
async function closeCard(page: Page): Promise<void> {
  if ((await page.locator('.card').count()) === 0) return
  await page.keyboard.press('Escape')
  await page.locator('.card').waitFor({ state: 'detached' })
}

export async function connect(page: Page, from: string, to: string): Promise<void> {
  await closeCard(page)
  const end = await portAt(page, to)
  const start = await portAt(page, from)
  await drag(page, start, end)
}

export async function connected(page: Page, count: number): Promise<void> {
  await expect.poll(() => streams(page).count()).toBe(count)
}

/** Connects two ports that become a stream of their own, and says its id. */
export async function join(page: Page, from: string, to: string): Promise<string> {
  const before = await streams(page).count()
  await connect(page, from, to)
  await connected(page, before + 1)
  return (await streams(page).last().getAttribute('data-id')) ?? ''
}

/** Clicks the middle of a unit's symbol. */
export async function clickUnit(page: Page, id: string): Promise<void> {
  await closeCard(page)
  await page.mouse.click(...(await middleOf(page, unitBox(id))))
  await page.locator('.card').waitFor()
}

/** A point on the line of a stream, half way along it. */
export async function onStream(page: Page, id: string): Promise<Spot> {
  return page.locator(`[data-stream="${id}"] .react-flow__edge-interaction`).evaluate((line) => {
    const path = line as SVGPathElement
    const middle = path.getPointAtLength(path.getTotalLength() / 2)
    const { x, y } = middle.matrixTransform(path.getScreenCTM() ?? undefined)
    return [x, y] as const
  })
}

export async function clickStream(page: Page, id: string): Promise<void> {
  await closeCard(page)
  await page.mouse.click(...(await onStream(page, id)))
  await page.locator('.card').waitFor()
}

/** A number in the card, as it stands there while its field is closed. */
export const field = (page: Page, path: string) =>
  page.locator(`.card button[data-path="${path}"] .quantity`)

/** The same, once it is given and its field closed. */
const givenState = (page: Page, path: string) =>
  field(page, path).and(page.locator('[data-state="given"], [data-state="conflicting"]'))

/** The open field of a number in the card. */
export const input = (page: Page, path: string) => page.locator(`.card input[data-path="${path}"]`)

/** Clicks a number in the card, types another and presses Enter. */
export async function give(page: Page, path: string, text: string): Promise<void> {
  await page.locator(`.card button[data-path="${path}"]`).click()
  await page.keyboard.type(text)
  await page.keyboard.press('Enter')
  await field(page, path)
    .and(page.locator('[data-state="given"], [data-state="conflicting"]'))
    .waitFor()
}

/** Turns a given number into a solved one, by a click. */
export async function turnRound(page: Page, path: string): Promise<void> {
  await page.locator(`[data-turn="${path}"]`).click()
}

/** What the canvas says aloud. */
const said = (page: Page) => page.locator('.canvas [role="status"]')

/** Presses an arrow key until the canvas says that what is wanted is reached. */
async function stepTo(page: Page, reached: RegExp): Promise<void> {
  await expect
    .poll(async () => {
      const text = (await said(page).textContent()) ?? ''
      if (!reached.test(text)) await page.keyboard.press('ArrowRight')
      return text
    })
    .toMatch(reached)
}

/** Connects by keys alone: a unit by its name, its outlet by its label, the inlet by its reference. */
export async function connectByKeys(
  page: Page,
  unit: string,
  outlet: string,
  inlet: string,
): Promise<void> {
  const before = await streams(page).count()
  await command(page, unit)
  await page.getByRole('region', { name: unit, exact: true }).waitFor()
  await page.keyboard.press('c')
  await stepTo(page, new RegExp(`^Connect from ${outlet}\\.`))
  await page.keyboard.press('Enter')
  await stepTo(page, new RegExp(`^To .*, ${inlet}$`))
  await page.keyboard.press('Enter')
  await connected(page, before + 1)
}

/** Finds a number by its name: the focus is then on it, in the card. */
export async function goTo(page: Page, name: string, path: string): Promise<void> {
  await command(page, name)
  await expect
    .poll(() =>
      page.evaluate(() =>
        document.activeElement?.closest('.card [data-path]')?.getAttribute('data-path'),
      ),
    )
    .toBe(path)
}

/** Finds a number by its name, types another and presses Enter: by keys alone. */
export async function giveByKeys(
  page: Page,
  name: string,
  path: string,
  text: string,
): Promise<void> {
  await goTo(page, name, path)
  await page.keyboard.type(text)
  await page.keyboard.press('Enter')
  await givenState(page, path).waitFor()
}

/** Waits until the plant is solved. */
export async function solved(page: Page): Promise<void> {
  await expect
    .poll(() => page.locator('.drawer-state').textContent(), { timeout: 20_000 })
    .toContain('Mass and energy close')
}

/** The number in a text such as '10 457.1 kJ/kWh'; NaN where none stands there. */
export function numberIn(text: string | null): number {
  const found = /[-−]?[\d\u202f]+(\.\d+)?/.exec(text ?? '')
  return Number((found?.[0] ?? 'none').replace('−', '-').replaceAll('\u202f', ''))
}
