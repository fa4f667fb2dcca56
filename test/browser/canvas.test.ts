import { expect, test } from 'vitest'
import {
  connect,
  connected,
  drag,
  middleOf,
  place,
  startEmpty,
  streams,
  unitBox,
  units,
} from './hands.ts'
import { accessibilityFaults, withWindow } from './support.ts'

test('units are dragged from the rail, connected port to port, moved, undone and deleted', async () => {
  await withWindow(async ({ page, problems }) => {
    await startEmpty(page)
    const boiler = await place(page, 'boiler', 120, 220)
    const turbine = await place(page, 'turbine', 320, 120)
    const condenser = await place(page, 'condenser', 480, 260)
    const pump = await place(page, 'pump', 300, 400)
    await connect(page, `${boiler}.steam`, `${turbine}.inlet`)
    await connect(page, `${turbine}.exhaust`, `${condenser}.steam1`)
    await connect(page, `${condenser}.condensate`, `${pump}.suction`)
    await connect(page, `${pump}.discharge`, `${boiler}.feedwater`)
    await connected(page, 4)

    const node = unitBox(condenser)
    const before = await middleOf(page, node)
    await drag(page, before, [before[0] + 66, before[1] + 29])
    const after = await middleOf(page, node)
    for (const [moved, wanted] of [
      [after[0] - before[0], 66],
      [after[1] - before[1], 29],
    ] as const) {
      expect(Math.abs(moved - wanted)).toBeLessThan(16)
      // In steps of the grid.
      expect(Math.abs(moved / 8 - Math.round(moved / 8))).toBeLessThan(0.05)
    }
    await page.keyboard.press('Control+z')
    await expect.poll(async () => Math.round((await middleOf(page, node))[0] - before[0])).toBe(0)

    await page.mouse.click(...(await middleOf(page, node)))
    await page.keyboard.press('Delete')
    await expect.poll(() => units(page).count()).toBe(3)
    await connected(page, 2)
    await page.keyboard.press('Control+z')
    await connected(page, 4)
    expect(problems).toEqual([])
  })
})

test('a connection that cannot work is refused with the reason, in place', async () => {
  await withWindow(async ({ page }) => {
    await startEmpty(page)
    const pump = await place(page, 'pump', 160, 300)
    const turbine = await place(page, 'turbine', 360, 160)
    await connect(page, `${pump}.discharge`, `${turbine}.inlet`)
    const note = page.locator('.canvas-note-refused')
    await note.waitFor()
    expect(await note.textContent()).toMatch(/carries water.*takes steam/)
    expect(await streams(page).count()).toBe(0)
  })
})

test('a plant is drawn and connected by keys alone', async () => {
  await withWindow(async ({ page }) => {
    await startEmpty(page)
    await page.keyboard.press('b')
    await expect.poll(() => units(page).count()).toBe(1)
    const filter = page.getByRole('searchbox', { name: 'Filter the kinds of unit' })
    await filter.focus()
    await page.keyboard.type('turb')
    await page.keyboard.press('Enter')
    await expect.poll(() => units(page).count()).toBe(2)
    await units(page).first().focus()
    await page.keyboard.press('Enter')
    await page.keyboard.press('c')
    const status = page.locator('.canvas [role="status"]')
    await expect.poll(() => status.textContent()).toContain('Connect from Steam')
    await page.keyboard.press('Enter')
    await expect.poll(() => status.textContent()).toContain('To Inlet')
    await page.keyboard.press('Enter')
    await connected(page, 1)
    await page.keyboard.press('Escape')
    // From the boiler along the stream to the turbine.
    const focused = () => page.evaluate(() => document.activeElement?.getAttribute('data-id'))
    const [boiler, turbine] = await units(page).evaluateAll((all) =>
      all.map((one) => [one.getAttribute('data-id') ?? '', String(one.getBoundingClientRect().x)]),
    )
    const way = Number(turbine?.[1]) > Number(boiler?.[1]) ? 'ArrowRight' : 'ArrowLeft'
    await page.keyboard.press(way)
    await expect.poll(focused).toBe(await streams(page).first().getAttribute('data-id'))
    await page.keyboard.press(way)
    await expect.poll(focused).toBe(turbine?.[0])
  })
})

test('units and streams have names and roles, and axe finds no fault in canvas and rail', async () => {
  await withWindow(async ({ page }) => {
    await page.locator('.canvas').waitFor()
    await expect
      .poll(() => page.getByRole('button', { name: /, boiler, [\d.]+ MW/ }).count())
      .toBeGreaterThan(0)
    expect(await page.getByRole('button', { name: /^Stream .* kg\/s$/ }).count()).toBeGreaterThan(4)
    expect(await accessibilityFaults(page, '.canvas')).toEqual([])
    expect(await accessibilityFaults(page, '.rail')).toEqual([])
  })
})

test('a connection dropped on an outlet in use puts a branch in, and a unit dropped on a stream is inserted', async () => {
  await withWindow(async ({ page }) => {
    await startEmpty(page)
    const boiler = await place(page, 'boiler', 120, 240)
    const turbine = await place(page, 'turbine', 420, 120)
    const heater = await place(page, 'mixingHeater', 300, 380)
    await connect(page, `${boiler}.steam`, `${turbine}.inlet`)
    await connected(page, 1)
    await connect(page, `${heater}.steam1`, `${boiler}.steam`)
    // Boiler to branch, branch to turbine, branch to heater.
    await connected(page, 3)
    expect(await units(page).count()).toBe(4)

    const other = await place(page, 'condenser', 560, 330)
    await connect(page, `${turbine}.exhaust`, `${other}.steam1`)
    await connected(page, 4)
    const line = await page
      .locator(`.react-flow__edge`)
      .last()
      .locator('.react-flow__edge-interaction')
      .boundingBox()
    const canvas = await page.locator('.canvas').boundingBox()
    if (!line || !canvas) throw new Error('The stream is not shown.')
    await place(
      page,
      'valve',
      line.x + line.width / 2 - canvas.x,
      line.y + line.height / 2 - canvas.y,
    )
    await connected(page, 5)
  })
})
