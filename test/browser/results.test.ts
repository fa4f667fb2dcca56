import { createHash } from 'node:crypto'
import { readFile } from 'node:fs/promises'
import { fileURLToPath } from 'node:url'
import type { Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { readPlant, writePlant } from '../../src/document.ts'
import { balanceOf } from '../../src/engine.ts'
import { accessibilityFaults, openWindow, type Visit } from './support.ts'

const file = fileURLToPath(new URL('../../public/examples/tarn-vale-2.json', import.meta.url))

let visit: Visit
let page: Page
let solved: ReturnType<typeof balanceOf>
let sum: string

beforeAll(async () => {
  const read = readPlant(await readFile(file, 'utf8'))
  if (read.outcome !== 'plant') throw new Error(read.message)
  const layout = read.plant.layouts[0]
  if (!layout) throw new Error('No layout.')
  solved = balanceOf(layout)
  sum = createHash('sha256').update(writePlant(read.plant)).digest('hex')

  visit = await openWindow({
    context: { acceptDownloads: true, permissions: ['clipboard-read', 'clipboard-write'] },
  })
  page = visit.page
  await page.locator('.unit-label-name').first().waitFor()
  const [chooser] = await Promise.all([
    page.waitForEvent('filechooser'),
    page.keyboard.press('Control+o'),
  ])
  await chooser.setFiles(file)
  await page.locator('.unit-label-name', { hasText: 'Heater 7' }).waitFor()
  await page.locator('.drawer-state').getByText('close to').waitFor()
})

afterAll(async () => {
  await visit?.close()
})

/** What a click hands over as a file. */
async function saved(click: () => Promise<void>): Promise<{ name: string; text: string }> {
  const [download] = await Promise.all([page.waitForEvent('download'), click()])
  return { name: download.suggestedFilename(), text: await readFile(await download.path(), 'utf8') }
}

const chartTab = (name: string) =>
  page.locator('.chart-tabs').getByRole('tab', { name, exact: true })
const drawerTab = (name: string) =>
  page.locator('.drawer-tabs').getByRole('tab', { name, exact: true })

async function fromChartMenu(name: string): Promise<void> {
  await page.getByRole('button', { name: 'More of this chart' }).click()
  await page.getByRole('menuitem', { name }).click()
}

/** Texts of an SVG file's elements, and faults that would make it depend on anything else. */
function readSvg(text: string): Promise<{ texts: string[]; styled: number; outside: string[] }> {
  return page.evaluate((source) => {
    const svg = new DOMParser().parseFromString(source, 'image/svg+xml')
    if (svg.querySelector('parsererror')) throw new Error('Not well formed.')
    const all = [...svg.querySelectorAll('*')]
    const links = all.flatMap((one) =>
      ['href', 'src', 'xlink:href'].flatMap((name) => one.getAttribute(name) ?? []),
    )
    const values = all.flatMap((one) =>
      one.getAttributeNames().map((name) => one.getAttribute(name)),
    )
    return {
      texts: [...svg.querySelectorAll('text')].map((one) => one.textContent ?? ''),
      styled: svg.querySelectorAll('style, [class], [style], script').length,
      outside: [
        ...links,
        ...values.filter((value) =>
          /var\(|color-mix|oklab|https?:\/\/(?!www\.w3\.org)/.test(value ?? ''),
        ),
      ] as string[],
    }
  }, text)
}

describe('charts', () => {
  test.each(['h–s', 'T–Q', 'Energy', 'T–s'])(
    '%s shows, is sound, saves as a file of its own',
    async (name) => {
      await chartTab(name).click()
      await page.locator('.chart-picture svg').waitFor()
      expect(await accessibilityFaults(page, '.chart')).toEqual([])
      const { name: fileName, text } = await saved(() => fromChartMenu('Save as SVG'))
      expect(fileName).toMatch(/^tarn-vale-unit-2-as-built-.*\.svg$/)
      const { texts, styled, outside } = await readSvg(text)
      expect(texts.length).toBeGreaterThan(8)
      expect(styled).toBe(0)
      expect(outside).toEqual([])
    },
  )

  test('temperature against heat follows the selection and names its differences', async () => {
    await chartTab('T–Q').click()
    await page.getByLabel('Unit', { exact: true }).selectOption({ label: 'Heater 6' })
    const texts = await page.locator('.heat text').allTextContents()
    const approach = solved.units.h6?.drainApproach as number
    expect(texts.some((text) => text.includes('DCA') && text.includes(approach.toFixed(1)))).toBe(
      true,
    )
    expect(await page.locator('[data-row="h6"], .unit-frame-selected').count()).toBeGreaterThan(0)
  })

  test('a remembered balance lies underneath', async () => {
    await chartTab('T–s').click()
    expect(await page.locator('.chart-ghost').count()).toBe(0)
    await page.getByRole('button', { name: 'Ghost' }).click()
    expect(await page.locator('.chart-ghost path').count()).toBeGreaterThan(10)
    await fromChartMenu('Forget the ghost')
    expect(await page.locator('.chart-ghost').count()).toBe(0)
  })

  test('data go to the clipboard', async () => {
    await fromChartMenu('Copy as data')
    await expect
      .poll(() => page.evaluate(() => navigator.clipboard.readText()))
      .toMatch(/^Process\tFrom\tTo\tm \[kg\/s\]\ts \[kJ\/\(kg K\)\]/)
  })

  test('the diagrams of states load when they are wanted, the workbook not before', async () => {
    const loaded = await page.evaluate(() =>
      performance.getEntriesByType('resource').map(({ name }) => name),
    )
    expect(loaded.some((name) => name.includes('StateChart'))).toBe(true)
    expect(loaded.some((name) => name.includes('save-workbook'))).toBe(false)
    expect(loaded.some((name) => name.includes('ReportSheet'))).toBe(false)
  })
})

describe('tables', () => {
  test.each(['State points', 'Units', 'Heaters', 'Stages', 'Pumps', 'Totals'])(
    '%s shows, sorts and is sound',
    async (name) => {
      await drawerTab(name).click()
      await page.locator('.table tbody tr').first().waitFor()
      const second = page.locator('.table thead .sort').nth(2)
      await second.click()
      expect(await page.locator('th[aria-sort="ascending"]').count()).toBe(1)
      await second.click()
      expect(await page.locator('th[aria-sort="descending"]').count()).toBe(1)
      await second.click()
      expect(await page.locator('th[aria-sort]').count()).toBe(0)
      expect(await accessibilityFaults(page, '.drawer')).toEqual([])
    },
  )

  test('columns come and go, and CSV holds those shown in the units shown', async () => {
    await drawerTab('State points').click()
    await page.getByRole('button', { name: 'Columns' }).click()
    await page.getByLabel('Exergy flow').check()
    await page.getByLabel('Entropy', { exact: true }).uncheck()
    await page.keyboard.press('Escape')
    const { text } = await saved(() => page.getByRole('button', { name: 'CSV' }).click())
    const [head = '', ...rows] = text.replace('\ufeff', '').trimEnd().split('\r\n')
    const columns = head.split(',')
    expect(columns).toContain('Exergy flow [MW]')
    expect(columns).not.toContain('Entropy [kJ/(kg K)]')
    const at = columns.indexOf('Temperature [°C]')
    const main = rows.find((row) => row.includes(',main,'))?.split(',')
    expect(Number(main?.[at])).toBeCloseTo((solved.streams.main?.T as number) - 273.15, 6)
    expect(rows).toHaveLength(Object.keys(solved.streams).length)
  })
})

describe('drawing', () => {
  test('holds every unit and its figures as text, on its own', async () => {
    await drawerTab('Report').click()
    const { name, text } = await saved(() =>
      page.getByRole('tabpanel').getByRole('button', { name: 'Save as SVG' }).click(),
    )
    expect(name).toBe('tarn-vale-unit-2-as-built-case-design-diagram.svg')
    const { texts, styled, outside } = await readSvg(text)
    expect(styled).toBe(0)
    expect(outside).toEqual([])
    const all = texts.join('\n').replaceAll('\u2009', ' ')
    for (const label of ['HP', 'Condenser', 'Heater 5', 'Feed pump', 'Tarn Vale unit 2']) {
      expect(all).toContain(label)
    }
    const power = (solved.units.ip?.power as number) / 1e6
    expect(all).toContain(`${power.toPrecision(4)} MW`)
    const cold = (solved.streams.main?.p as number) / 1e5
    expect(all).toContain(`${cold.toPrecision(4)} bar`)
  })

  test('is a picture, too', async () => {
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('tabpanel').getByRole('button', { name: 'Save as PNG' }).click(),
    ])
    const picture = await readFile(await download.path())
    expect(picture.subarray(1, 4).toString()).toBe('PNG')
    expect(picture.readUInt32BE(16)).toBeGreaterThan(2000)
  })
})

describe('report', () => {
  beforeAll(async () => {
    await drawerTab('Report').click()
    await page.getByRole('button', { name: 'Open the report' }).click()
    await page.locator('.report').getByText(sum).first().waitFor()
    await page.locator('.report .drawing').waitFor()
  })

  afterAll(async () => {
    await page.keyboard.press('Escape')
  })

  test('is sound, and says what the balance says', async () => {
    expect(await accessibilityFaults(page, '.report-layer')).toEqual([])
    const rate = ((solved.plant.unitHeatRate as number) * 3600).toFixed(1)
    const totals = page.locator('.report-table[data-table="totals"]')
    expect(
      await totals.locator('tr', { hasText: 'Unit heat rate' }).first().textContent(),
    ).toContain(rate)
    const states = page.locator('.report-table[data-table="states"] tbody tr')
    expect(await states.count()).toBe(Object.keys(solved.streams).length)
  })

  test('prints on the paper chosen, charts and diagram within its pages', async () => {
    const pdf = await page.pdf({ preferCSSPageSize: true, printBackground: true })
    const text = pdf.toString('latin1')
    const boxes = [...text.matchAll(/\/MediaBox ?\[([\d. ]+)\]/g)].map(([, box]) =>
      (box as string).trim().split(/\s+/).map(Number),
    )
    expect(boxes.length).toBeGreaterThan(4)
    const sizes = new Set(boxes.map(([, , w, h]) => `${Math.round(w ?? 0)}x${Math.round(h ?? 0)}`))
    // A4 and Letter in points, upright and lying; the latter for the diagram.
    const known = ['595x842', '842x595', '612x792', '792x612']
    for (const size of sizes) expect(known).toContain(size)
    expect(sizes.size).toBe(2)
  })

  test('is one file that opens by itself', async () => {
    const { name, text } = await saved(() =>
      page.getByRole('button', { name: 'Save as one file' }).click(),
    )
    expect(name).toBe('tarn-vale-unit-2-as-built-report.html')
    expect(text).toContain(sum)
    expect(text).not.toMatch(/<script|<link|<img|src=|@import|url\((?!["']?#)/)
    const other = await visit.context.newPage()
    try {
      const asked: string[] = []
      other.on('request', (request) => asked.push(request.url()))
      await other.setContent(text)
      expect(asked.filter((url) => /^https?:/.test(url))).toEqual([])
      const svgs = await other.locator('svg').count()
      expect(svgs).toBeGreaterThan(8)
      const seen = await other.locator('.report h2').allTextContents()
      expect(seen.length).toBeGreaterThan(10)
      expect(await other.locator('.report').textContent()).toContain('licensed engineer')
    } finally {
      await other.close()
    }
  })
})

test('nothing was complained of', () => {
  expect(visit.problems).toEqual([])
})
