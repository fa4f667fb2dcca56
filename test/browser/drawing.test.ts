import { readFileSync } from 'node:fs'
import type { Page } from 'playwright-core'
import { expect, test } from 'vitest'
import {
  addUnit,
  type Dimension,
  describeQuantity,
  emptyPlant,
  type Given,
  givenOf,
  type Layout,
  readPlant,
  setOption,
} from '../../src/document.ts'
import { tidy } from '../../web/canvas/tidy/tidy.ts'
import {
  clickUnit,
  command,
  connectByKeys,
  connected,
  give,
  giveByKeys,
  join,
  middleOf,
  numberIn,
  place,
  solved,
  startEmpty,
  units,
} from './hands.ts'
import { withWindow } from './support.ts'

const folder = new URL('../reference/cases/', import.meta.url)

function layoutOf(file: string): Layout {
  const read = readPlant(readFileSync(new URL(file, folder), 'utf8'))
  if (read.outcome !== 'plant' || !read.plant.layouts[0]) throw new Error(`${file} is no plant.`)
  return read.plant.layouts[0]
}

/** A value as an engineer would type it. */
const typed: Partial<Record<Dimension, (value: number) => string>> = {
  pressure: (value) => `${Number((value / 1e5).toPrecision(12))} bar`,
  temperature: (value) => `${Number((value - 273.15).toFixed(6))} °C`,
  temperatureDifference: (value) => `${value} K`,
  massFlow: (value) => `${value} kg/s`,
  ratio: (value) => `${Number((100 * value).toPrecision(12))} %`,
  specificEnthalpy: (value) => `${value / 1000} kJ/kg`,
  specificHeat: (value) => `${value / 1000} kJ/(kg K)`,
}

function textOf(layout: Layout, path: string, value: Given): string {
  const dimension = describeQuantity(layout, path)?.dimension
  const write = dimension && typed[dimension]
  if (typeof value !== 'number') throw new Error(`${path} is a curve.`)
  return write ? write(value) : String(value)
}

/** What a unit of the kind, with these options, arrives with. */
function usualGivenOf(layout: Layout, id: string): (name: string) => Given | undefined {
  const unit = layout.units.find((one) => one.id === id)
  const added = addUnit(emptyPlant(), 'base', unit?.kind ?? '', [0, 0])
  let plant = added.plant
  for (const [option, value] of Object.entries(unit?.options ?? {})) {
    plant = setOption(plant, 'base', added.id, option, value)
  }
  const [bare] = plant.layouts
  // Numbered ones arrive as the first of them does.
  return (name) =>
    bare &&
    (givenOf(bare, `${added.id}.${name}`) ??
      givenOf(bare, `${added.id}.${name.replace(/\d+$/, '1')}`))
}

/** Closes the card, which may cover what is clicked next. */
async function letGo(page: Page): Promise<void> {
  await page.keyboard.press('Escape')
  await page.locator('.card').waitFor({ state: 'detached' })
}

/** Clicks a stream where nothing lies over it. */
async function clickBareStream(page: Page, id: string): Promise<void> {
  const at = await page
    .locator(`[data-stream="${id}"] .react-flow__edge-interaction`)
    .evaluate((line, own) => {
      const path = line as SVGPathElement
      for (const share of [0.5, 0.35, 0.65, 0.2, 0.8, 0.1, 0.9]) {
        const point = path.getPointAtLength(path.getTotalLength() * share)
        const { x, y } = point.matrixTransform(path.getScreenCTM() ?? undefined)
        const there = document.elementFromPoint(x, y)?.closest('[data-stream]')
        if (there?.getAttribute('data-stream') === own) return [x, y] as const
      }
      return null
    }, id)
  if (!at) throw new Error(`Stream ${id} lies under something along all its way.`)
  await page.mouse.click(...at)
  await page.locator('.card').waitFor()
}

/*
 * Seven heaters, a reheat, three machines: 24 units, 37 streams. The numbers and the answers are those
 * of the reference case o5; the drawing is made by the pointer, numbers are typed in the card.
 */
test('a plant with seven heaters is drawn by mouse from an empty canvas and solved', async () => {
  const wanted = layoutOf('o5-seven.json')
  const places = tidy(wanted)
  await withWindow(
    async ({ page, problems }) => {
      await startEmpty(page)
      const ids = new Map<string, string>()
      for (const { id, kind } of wanted.units) {
        const [x, y] = places.get(id)?.at ?? [0, 0]
        // Machines grow to the right as bleeds are connected; the others keep their size.
        const own = await place(page, kind, x + 40, y + 96)
        ids.set(id, own)
      }
      const mine = (reference: string) => {
        const dot = reference.indexOf('.')
        return `${ids.get(reference.slice(0, dot))}${reference.slice(dot)}`
      }
      for (const { id, options } of wanted.units) {
        if (Object.values(options ?? {}).every((value) => value !== true)) continue
        await clickUnit(page, ids.get(id) ?? '')
        await page.locator('.card-options summary').click()
        for (const [option, on] of Object.entries(options ?? {})) {
          const label = {
            drainCooler: /drain cool/i,
            desuperheater: /desuperheat/i,
            admission: /admission/i,
          }[option]
          if (on === true && label) await page.locator('.card').getByLabel(label).check()
        }
        await letGo(page)
      }
      const streams = new Map<string, string>()
      for (const { id, from, to } of wanted.streams) {
        streams.set(id, await join(page, mine(from), mine(to)))
      }
      await connected(page, 37)

      for (const { id, given } of wanted.units) {
        const usual = usualGivenOf(wanted, id)
        const others = Object.entries(given).filter(([name, value]) => usual(name) !== value)
        if (others.length === 0) continue
        await letGo(page)
        await clickUnit(page, ids.get(id) ?? '')
        for (const [name, value] of others) {
          await give(page, `${ids.get(id)}.${name}`, textOf(wanted, `${id}.${name}`, value))
        }
      }
      for (const { id, given } of wanted.streams) {
        if (Object.keys(given).length === 0) continue
        await letGo(page)
        await clickBareStream(page, streams.get(id) ?? '')
        for (const [name, value] of Object.entries(given)) {
          await give(page, `${streams.get(id)}.${name}`, textOf(wanted, `${id}.${name}`, value))
        }
      }
      const [shaft] = wanted.shafts
      await letGo(page)
      await page.mouse.click(...(await middleOf(page, '.shaft .symbol')))
      const own = (await page.locator('.shaft').getAttribute('data-shaft')) ?? ''
      for (const [name, value] of Object.entries(shaft?.given ?? {})) {
        if (typeof value === 'number' && value !== 0) {
          await give(page, `${own}.${name}`, textOf(wanted, `${shaft?.id}.${name}`, value))
        }
      }
      await solved(page)
      const text = (await page.getByLabel('Plant totals').textContent()) ?? ''
      expect(text.replaceAll('\u202f', '').replaceAll('\u2009', ' ')).toMatch(/Net power149\.5 ?MW/)
      expect(text.replaceAll('\u202f', '')).toContain('8988.5')
      expect(problems).toEqual([])
    },
    { viewport: { width: 1920, height: 1080 } },
  )
}, 600_000)

/*
 * A turbine with three bleeds to three mixing heaters: 10 units, 13 streams, no pointer. Expected are
 * the plant's own laws, worked here from the numbers shown: what a mixing heater takes of steam.
 */
test('a plant with three heaters is drawn, given its numbers and solved by keyboard alone', async () => {
  await withWindow(async ({ page, problems }) => {
    await startEmpty(page)
    await page.keyboard.press('b')
    await expect.poll(() => units(page).count()).toBe(1)
    const kinds = [
      'turbine',
      'condenser',
      'pump',
      'mixing heater',
      'pump',
      'mixing heater',
      'pump',
      'mixing heater',
      'pump',
    ]
    for (const [i, kind] of kinds.entries()) {
      await command(page, `Place a ${kind}`)
      await expect.poll(() => units(page).count()).toBe(i + 2)
    }
    for (const [unit, outlet, inlet] of [
      ['Boiler', 'Steam', 'turbine1.inlet'],
      ['Turbine', 'Bleed 1', 'mixing3.steam1'],
      ['Turbine', 'Bleed 2', 'mixing2.steam1'],
      ['Turbine', 'Bleed 3', 'mixing1.steam1'],
      ['Turbine', 'Exhaust', 'condenser1.steam1'],
      ['Condenser', 'Condensate', 'pump1.suction'],
      ['Pump', 'Discharge', 'mixing1.water1'],
      ['Mixing heater', 'Outlet', 'pump2.suction'],
      ['Pump 2', 'Discharge', 'mixing2.water1'],
      ['Mixing heater 2', 'Outlet', 'pump3.suction'],
      ['Pump 3', 'Discharge', 'mixing3.water1'],
      ['Mixing heater 3', 'Outlet', 'pump4.suction'],
      ['Pump 4', 'Discharge', 'boiler1.feedwater'],
    ] as const) {
      await connectByKeys(page, unit, outlet, inlet)
    }
    await connected(page, 13)
    for (const [name, path, text] of [
      ['Boiler to turbine, pressure', 's1.p', '10 MPa'],
      ['Boiler to turbine, temperature', 's1.T', '520'],
      ['Boiler to turbine, flow', 's1.m', '60'],
      ['Turbine to mixing heater 3, pressure', 's2.p', '20 bar'],
      ['Turbine to mixing heater 2, pressure', 's3.p', '6 bar'],
      ['Turbine to mixing heater, pressure', 's4.p', '1.2 bar'],
    ] as const) {
      await giveByKeys(page, name, path, text)
    }
    await solved(page)
    await page.keyboard.press('Escape')
    await page.keyboard.press('Shift+T')
    await expect.poll(() => page.locator('.canvas [role="status"]').textContent()).toBe('Tidied.')

    const cells = async (id: string): Promise<number[]> => {
      const row = page
        .getByRole('row')
        .filter({ has: page.getByRole('cell', { name: id, exact: true }) })
      // Only rows in sight are drawn.
      const table = page.locator('.drawer-scroll')
      await table.evaluate((element) => element.scrollTo(0, 0))
      await expect
        .poll(async () => {
          if ((await row.count()) > 0) return true
          await table.evaluate((element) => element.scrollBy(0, 60))
          return false
        })
        .toBe(true)
      const texts = await row.locator('.cell-number').allTextContents()
      // Each begins with its name for those who hear it.
      return texts.slice(0, 4).map((text) => numberIn(text.replace(/^.*: /, '')))
    }
    // m, p, T, h of steam, water in and water out of each heater: mass and energy by hand.
    for (const [steam, inlet, outlet] of [
      ['s2', 's11', 's12'],
      ['s3', 's9', 's10'],
      ['s4', 's7', 's8'],
    ] as const) {
      const [[m1 = 0, , , h1 = 0], [m2 = 0, , , h2 = 0], [m3 = 0, , , h3 = 0]] = [
        await cells(steam),
        await cells(inlet),
        await cells(outlet),
      ]
      expect(m1).toBeGreaterThan(1)
      expect(Math.abs(m1 + m2 - m3) / m3).toBeLessThan(1e-3)
      expect(Math.abs((m1 * h1 + m2 * h2) / (m3 * h3) - 1)).toBeLessThan(1e-3)
    }
    // Saturated water leaves each heater: temperatures of IAPWS-IF97 at 20, 6 and 1.2 bar.
    for (const [id, T] of [
      ['s12', 212.38],
      ['s10', 158.83],
      ['s8', 104.78],
    ] as const) {
      expect(Math.abs(((await cells(id))[2] ?? 0) - T)).toBeLessThan(0.06)
    }
    expect(problems).toEqual([])
  })
}, 300_000)
