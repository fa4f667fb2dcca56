import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Page } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { readPlant } from '../../src/document.ts'
import { field, giveByKeys, goTo, solved } from './hands.ts'
import { type Visit, withWindow } from './support.ts'

let folder = ''

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'bledsteam-files-'))
})

afterAll(async () => {
  await rm(folder, { recursive: true, force: true })
})

/** No dialog of the operating system can be answered here: the browser is left with its downloads. */
async function withoutSaveDialog(visit: Visit): Promise<void> {
  await visit.context.addInitScript(() => {
    Reflect.deleteProperty(window, 'showSaveFilePicker')
  })
}

const title = (page: Page) => page.getByLabel('Title of the plant')
const notes = (page: Page) => page.locator('.notice')

async function retitle(page: Page, text: string): Promise<void> {
  await title(page).fill(text)
  await title(page).press('Enter')
}

async function saved(page: Page): Promise<void> {
  await expect.poll(() => page.getByText('Saved here').count()).toBe(1)
}

async function openFile(page: Page, path: string): Promise<void> {
  const chosen = page.waitForEvent('filechooser')
  await page.keyboard.press('Control+o')
  await (await chosen).setFiles(path)
}

test('an edit is there after a reload that follows at once, and the next day', async () => {
  await withWindow(async (visit) => {
    const { page, problems } = visit
    await retitle(page, 'Harrow Fen')
    await page.reload()
    await expect.poll(() => title(page).inputValue()).toBe('Harrow Fen')
    await retitle(page, 'Harrow Fen 2')
    await saved(page)
    expect(problems).toEqual([])
    const next = await visit.reopen()
    try {
      await expect.poll(() => title(next.page).inputValue()).toBe('Harrow Fen 2')
    } finally {
      await next.close()
    }
  })
})

test('a reload in the midst of edits brings back all that was given, and solves it', async () => {
  await withWindow(async ({ page, problems }) => {
    await solved(page)
    await giveByKeys(page, 'Condenser, pressure', 'condenser.pressure', '6 kPa')
    await giveByKeys(page, 'Boiler to HP, pressure', 'main.p', '120 bar')
    // Another number is being typed as the page goes.
    await goTo(page, 'Boiler to HP, temperature', 'main.T')
    await page.keyboard.type('55')
    await page.reload()
    await solved(page)
    await goTo(page, 'Condenser, pressure', 'condenser.pressure')
    expect(await field(page, 'condenser.pressure').textContent()).toContain('0.0600')
    await goTo(page, 'Boiler to HP, pressure', 'main.p')
    expect(await field(page, 'main.p').textContent()).toContain('120')
    await goTo(page, 'Boiler to HP, temperature', 'main.T')
    expect(await field(page, 'main.T').textContent()).toContain('538')
    expect(problems).toEqual([])
  })
})

test('a plant saved to a file comes back from it the same', async () => {
  await withWindow(async (visit) => {
    const { page } = visit
    await withoutSaveDialog(visit)
    await page.reload()
    await retitle(page, 'Tarn Vale copy')
    const coming = page.waitForEvent('download')
    await page.keyboard.press('Control+s')
    const download = await coming
    expect(download.suggestedFilename()).toBe('tarn-vale-copy.plant.json')
    const path = join(folder, download.suggestedFilename())
    await download.saveAs(path)
    const text = await readFile(path, 'utf8')
    const read = readPlant(text)
    if (read.outcome !== 'plant') throw new Error(read.message)
    expect(read.repairs).toEqual([])
    expect(read.plant.layouts[0]?.units.length).toBeGreaterThan(0)
    await retitle(page, 'Something else')
    await openFile(page, path)
    await expect.poll(() => title(page).inputValue()).toBe('Tarn Vale copy')
    const again = page.waitForEvent('download')
    await page.keyboard.press('Control+s')
    expect(await readFile(await (await again).path(), 'utf8')).toBe(text)
  })
})

test('a file that cannot be read says what and where, and the present plant stays', async () => {
  await withWindow(async ({ page }) => {
    await retitle(page, 'Stays')
    const path = join(folder, 'broken.json')
    await writeFile(path, '{ "format": "bledsteam/plant",\n  "version": 1, oops }')
    await openFile(page, path)
    await expect.poll(() => notes(page).textContent()).toMatch(/broken\.json .*line 2, column/i)
    expect(await title(page).inputValue()).toBe('Stays')
    await writeFile(path, '{ "format": "bledsteam/plant", "version": 99, "layouts": [] }')
    await openFile(page, path)
    await expect.poll(() => notes(page).textContent()).toMatch(/version|newer/i)
    expect(await title(page).inputValue()).toBe('Stays')
  })
})

test('a file dropped onto the window is opened, and the plant before it stays kept', async () => {
  await withWindow(async ({ page }) => {
    await retitle(page, 'Before the drop')
    await saved(page)
    const text = JSON.stringify({
      format: 'bledsteam/plant',
      version: 1,
      title: 'Dropped',
      layouts: [
        {
          id: 'base',
          name: 'As built',
          ambient: { T: 298.15, p: 101325 },
          units: [],
          streams: [],
          shafts: [],
          plant: { given: {} },
          cases: [],
          stated: [],
        },
      ],
    })
    const data = await page.evaluateHandle((content) => {
      const transfer = new DataTransfer()
      transfer.items.add(new File([content], 'dropped.json', { type: 'application/json' }))
      return transfer
    }, text)
    await page.dispatchEvent('#window', 'drop', { dataTransfer: data })
    await expect.poll(() => title(page).inputValue()).toBe('Dropped')
    await page.getByLabel('Menu').click()
    await page.getByRole('menuitem', { name: 'Open a plant kept here' }).click()
    await page.getByRole('button', { name: /Before the drop/ }).click()
    await expect.poll(() => title(page).inputValue()).toBe('Before the drop')
  })
})

test('two windows on one plant: the later is told, and neither writes over the other unseen', async () => {
  await withWindow(async ({ page, context, address }) => {
    await retitle(page, 'Mine')
    await saved(page)
    const later = await context.newPage()
    await later.goto(address)
    await expect.poll(() => notes(later).textContent()).toContain('open in another window')
    await retitle(later, 'Theirs')
    await page.reload()
    await expect.poll(() => title(page).inputValue()).toBe('Mine')
    await later.bringToFront()
    await later.getByRole('button', { name: 'Edit it here' }).click()
    await saved(later)
    expect(await title(later).inputValue()).toBe('Theirs')
    await page.bringToFront()
    await expect.poll(() => notes(page).textContent()).toContain('taken over')
    expect(await title(page).inputValue()).toBe('Mine')
    await page.getByRole('button', { name: 'Work on a copy' }).click()
    await saved(page)
    expect(await notes(page).count()).toBe(0)
    await page.reload()
    await expect.poll(() => title(page).inputValue()).toBe('Mine (copy)')
    await later.reload()
    await expect.poll(() => title(later).inputValue()).toBe('Theirs')
  })
})
