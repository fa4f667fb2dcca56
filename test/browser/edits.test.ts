import type { Page } from 'playwright-core'
import { expect, test } from 'vitest'
import {
  clickUnit,
  command,
  connect,
  connected,
  drag,
  field,
  give,
  middleOf,
  place,
  startEmpty,
  streams,
  turnRound,
  unitBox,
  units,
} from './hands.ts'
import { withWindow } from './support.ts'

const undoButton = (page: Page) => page.getByRole('button', { name: /^Undo/ })

/** All that shows of the plant: where its units and streams are, and what its numbers say. */
async function picture(page: Page): Promise<string> {
  return page.evaluate(() => {
    const title = document.querySelector<HTMLInputElement>('.title input')?.value
    const drawn = [...document.querySelectorAll('.react-flow__node')].map(
      (node) =>
        `${node.getAttribute('data-id')} ${node.getAttribute('style')} ${node.querySelector('.symbol')?.outerHTML}`,
    )
    const lines = [...document.querySelectorAll('[data-stream] .stream-line')].map(
      (line) => `${line.parentElement?.getAttribute('data-stream')} ${line.getAttribute('d')}`,
    )
    const names = [...document.querySelectorAll('.unit-label-name')].map((one) => one.textContent)
    const numbers = document.querySelector('.card-rows')?.textContent
    return JSON.stringify([title, drawn, lines, names, numbers])
  })
}

/** The picture with nothing selected, pointed at or focused. */
async function atRest(page: Page): Promise<string> {
  await page.keyboard.press('Escape')
  await page.mouse.move(5, 5)
  return picture(page)
}

/**
 * Does one thing by hand, and checks that it is one step: a single undo brings back all that was seen
 * before, a single redo all that was seen after.
 */
async function isOneStep(page: Page, act: () => Promise<void>): Promise<void> {
  const before = await atRest(page)
  await act()
  await expect.poll(() => atRest(page)).not.toBe(before)
  const after = await atRest(page)
  await page.keyboard.press('Control+z')
  await expect.poll(() => atRest(page)).toBe(before)
  await page.keyboard.press('Control+Shift+Z')
  await expect.poll(() => atRest(page)).toBe(after)
}

test('whatever is done to the drawing is one step, undone and done again', async () => {
  await withWindow(async ({ page, problems }) => {
    await startEmpty(page)
    await isOneStep(page, async () => void (await place(page, 'boiler', 120, 220)))
    const turbine = await place(page, 'turbine', 320, 120)
    await isOneStep(page, async () => {
      await connect(page, 'boiler1.steam', `${turbine}.inlet`)
      await connected(page, 1)
    })
    // A drag of many moves is one step.
    await isOneStep(page, async () => {
      const [x, y] = await middleOf(page, unitBox(turbine))
      await page.mouse.move(x, y)
      await page.mouse.down()
      for (let i = 1; i <= 8; i++) await page.mouse.move(x + 10 * i, y + 4 * i)
      await page.mouse.up()
    })
    // So are nudges in a row.
    await isOneStep(page, async () => {
      await clickUnit(page, turbine)
      for (let i = 0; i < 3; i++) await page.keyboard.press('ArrowDown')
    })
    await isOneStep(page, async () => {
      await clickUnit(page, turbine)
      await page.keyboard.press('m')
    })
    // Dropped on an outlet in use: the branch, its connections and the new one are one step.
    const heater = await place(page, 'mixingHeater', 260, 400)
    await isOneStep(page, async () => {
      await connect(page, `${heater}.steam1`, 'boiler1.steam')
      await connected(page, 3)
    })
    // Two units selected and moved together.
    await isOneStep(page, async () => {
      await clickUnit(page, heater)
      await page.keyboard.down('Shift')
      await page.mouse.click(...(await middleOf(page, unitBox(turbine))))
      await page.keyboard.up('Shift')
      const start = await middleOf(page, unitBox(heater))
      await drag(page, start, [start[0] + 64, start[1] - 32])
    })
    await isOneStep(page, async () => {
      await clickUnit(page, heater)
      await page.keyboard.press('Delete')
    })
    expect(problems).toEqual([])
  })
})

test('whatever is done to numbers, names and options is one step, undone and done again', async () => {
  await withWindow(async ({ page, problems }) => {
    await startEmpty(page)
    const turbine = await place(page, 'turbine', 320, 160)
    const row = (path: string) => field(page, path)
    /** Checks a step by a number in the turbine's card. */
    const numberIsOneStep = async (path: string, act: () => Promise<void>): Promise<void> => {
      await clickUnit(page, turbine)
      const before = await row(path).textContent()
      await act()
      await expect.poll(() => row(path).textContent()).not.toBe(before)
      const after = await row(path).textContent()
      await undoButton(page).click()
      await expect.poll(() => row(path).textContent()).toBe(before)
      await page.keyboard.press('Control+y')
      await expect.poll(() => row(path).textContent()).toBe(after)
    }
    const efficiency = `${turbine}.groupEfficiency1`
    await numberIsOneStep(efficiency, () => give(page, efficiency, '84 %'))
    // Arrow keys in the open field: any number of presses, one step.
    await numberIsOneStep(efficiency, async () => {
      await page.locator(`.card button[data-path="${efficiency}"]`).click()
      for (let i = 0; i < 4; i++) await page.keyboard.press('ArrowUp')
      await page.keyboard.press('Enter')
    })
    await numberIsOneStep(efficiency, () => turnRound(page, efficiency))

    await isOneStep(page, async () => {
      await clickUnit(page, turbine)
      await page.locator('.card-title').fill('HP')
      await page.keyboard.press('Enter')
    })
    await clickUnit(page, turbine)
    const option = page.getByRole('checkbox', { name: 'Admission' })
    // Options are folded away until they are asked for.
    for (const fold of await page.locator('.card summary').all()) await fold.click()
    await option.check()
    await undoButton(page).click()
    await expect.poll(() => option.isChecked()).toBe(false)
    await page.keyboard.press('Control+Shift+Z')
    await expect.poll(() => option.isChecked()).toBe(true)
    await isOneStep(page, async () => {
      await page.getByLabel('Title of the plant').fill('Harrow Fen')
      await page.keyboard.press('Enter')
    })
    expect(problems).toEqual([])
  })
})

test('undone to the beginning and done again to the end, a plant is the same', async () => {
  await withWindow(async ({ page }) => {
    await startEmpty(page)
    await place(page, 'boiler', 120, 220)
    await place(page, 'turbine', 320, 120)
    await place(page, 'condenser', 480, 260)
    await connect(page, 'boiler1.steam', 'turbine1.inlet')
    await connect(page, 'turbine1.exhaust', 'condenser1.steam1')
    await connected(page, 2)
    await clickUnit(page, 'condenser1')
    await give(page, 'condenser1.pressure', '4 kPa')
    const whole = await atRest(page)
    while (await undoButton(page).isEnabled()) await undoButton(page).click()
    await expect.poll(() => units(page).count()).toBe(0)
    expect(await streams(page).count()).toBe(0)
    const redo = page.getByRole('button', { name: /^Redo/ })
    while (await redo.isEnabled()) await redo.click()
    await expect.poll(() => atRest(page)).toBe(whole)
    await command(page, 'Condenser, pressure')
    await expect.poll(() => field(page, 'condenser1.pressure').textContent()).toContain('0.04')
  })
})
