import type { Page } from 'playwright-core'
import { expect, test } from 'vitest'
import examples from '../reference/examples.json'
import {
  clickStream,
  clickUnit,
  command,
  connectByKeys,
  connected,
  field,
  give,
  giveByKeys,
  join,
  middleOf,
  numberIn,
  place,
  solved,
  startEmpty,
  turnRound,
  units,
} from './hands.ts'
import { withWindow } from './support.ts'

interface Answer {
  readonly quantity: string
  readonly printed: number
  readonly recomputed: number
}

function answer(id: string, quantity: string): Answer {
  const found = examples.examples
    .find((example) => example.id === id)
    ?.answers.find((one) => one.quantity === quantity)
  if (!found) throw new Error(`${id} does not answer ${quantity}.`)
  return found as Answer
}

/** The flow of a stream as the table of state points shows it. */
async function flow(page: Page, id: string): Promise<number> {
  const row = page
    .getByRole('row')
    .filter({ has: page.getByRole('cell', { name: id, exact: true }) })
  return numberIn(await row.locator('.cell-number .quantity').first().textContent())
}

/** What the book's readings from a chart leave open, as the data judge them. */
const chartScatter = 0.005

const ledger = (page: Page) => page.getByRole('tab', { name: /^Ledger/ })

/*
 * A reheat plant with one bleed: S. C. Arora and S. Domkundwar, A Course in Power Plant Engineering,
 * 6th ed., Example 22.16 (AD-22.16 of the data). The book reads its enthalpies from an h-s chart, which
 * scatters by half a per cent; recomputed from IAPWS-IF97 the data agree to all digits shown.
 */
test('a reheat plant with one mixing heater is drawn by mouse, given the numbers of a handbook, and solved', async () => {
  await withWindow(async ({ page, problems }) => {
    await startEmpty(page)
    const boiler = await place(page, 'boiler', 90, 260)
    const hp = await place(page, 'turbine', 260, 110)
    const lp = await place(page, 'turbine', 560, 110)
    const reheater = await place(page, 'reheater', 400, 260)
    const condenser = await place(page, 'condenser', 700, 300)
    const condensatePump = await place(page, 'pump', 580, 430)
    const heater = await place(page, 'mixingHeater', 430, 430)
    const feedPump = await place(page, 'pump', 260, 480)

    const main = await join(page, `${boiler}.steam`, `${hp}.inlet`)
    const cold = await join(page, `${hp}.exhaust`, `${reheater}.inlet`)
    const hot = await join(page, `${reheater}.outlet`, `${lp}.inlet`)
    const bleed = await join(page, `${lp}.bleed1`, `${heater}.steam1`)
    await join(page, `${lp}.exhaust`, `${condenser}.steam1`)
    await join(page, `${condenser}.condensate`, `${condensatePump}.suction`)
    await join(page, `${condensatePump}.discharge`, `${heater}.water1`)
    const hotWater = await join(page, `${heater}.outlet`, `${feedPump}.suction`)
    await join(page, `${feedPump}.discharge`, `${boiler}.feedwater`)

    // No losses but those of the turbines.
    await clickUnit(page, boiler)
    await give(page, `${boiler}.pressureLossFraction`, '0')
    await clickUnit(page, reheater)
    await give(page, `${reheater}.pressureLossFraction`, '0')
    await clickUnit(page, hp)
    await give(page, `${hp}.groupEfficiency1`, '78.5 %')
    await give(page, `${hp}.wetnessFactor`, '0')
    await clickUnit(page, lp)
    await give(page, `${lp}.groupEfficiency1`, '83 %')
    await give(page, `${lp}.groupEfficiency2`, '83 %')
    await give(page, `${lp}.wetnessFactor`, '0')
    await clickUnit(page, condenser)
    await give(page, `${condenser}.pressure`, '0.07 bar')
    for (const pump of [condensatePump, feedPump]) {
      await clickUnit(page, pump)
      await give(page, `${pump}.efficiency`, '100')
    }
    await clickStream(page, main)
    await give(page, `${main}.p`, '70 bar')
    await give(page, `${main}.T`, '459')
    await clickStream(page, cold)
    await give(page, `${cold}.p`, '2.5 MPa')
    await clickStream(page, hot)
    await give(page, `${hot}.T`, '420 C')
    await clickStream(page, bleed)
    await give(page, `${bleed}.p`, '10 bar')
    // Bearings 85 %, transmission 95 %.
    const shaft = (await page.locator('.shaft').getAttribute('data-shaft')) ?? ''
    await page.mouse.click(...(await middleOf(page, '.shaft .symbol')))
    await give(page, `${shaft}.mechanicalEfficiency`, '80.75 %')
    await give(page, `${shaft}.generatorEfficiency`, '95 %')
    // The book's feedwater has 179 °C; then how far it is below saturation is solved.
    await clickUnit(page, heater)
    await turnRound(page, `${heater}.subcooling`)
    await clickStream(page, hotWater)
    await give(page, `${hotWater}.T`, '179')
    // Only a flow or a power is missing, and either will do: the book gives the power.
    await expect.poll(() => ledger(page).textContent()).toContain('1 short')
    await page
      .getByLabel('Plant totals')
      .getByText('Gross power')
      .locator('..')
      .getByRole('button')
      .click()
    await give(page, 'plant.grossPower', '20 MW')
    await solved(page)

    const steam = await flow(page, main)
    const bled = (await flow(page, bleed)) / steam
    const { printed, recomputed } = answer('AD-22.16', 'm')
    expect(Math.abs(bled / printed - 1)).toBeLessThan(chartScatter)
    // The book neglects the work of the pumps, which warms the water a little.
    expect(Math.abs(bled / recomputed - 1)).toBeLessThan(2e-3)
    const rate = answer('AD-22.16', 'm_steam_kg_min')
    expect(Math.abs((60 * steam) / rate.recomputed - 1)).toBeLessThan(1e-3)
    const eta = numberIn(await field(page, 'plant.cycleEfficiency').textContent()) / 100
    expect(Math.abs(eta / answer('AD-22.16', 'eta').printed - 1)).toBeLessThan(chartScatter)
    expect(problems).toEqual([])
  })
})

/*
 * One mixing heater, drawn, connected, given its numbers and read without a pointer: M. J. Moran and
 * H. N. Shapiro, Fundamentals of Engineering Thermodynamics, 5th to 7th ed., Example 8.5 (MS-8.5).
 */
test('a regenerative plant is drawn, given the numbers of a handbook and solved by keyboard alone', async () => {
  await withWindow(async ({ page, problems }) => {
    await startEmpty(page)
    await page.keyboard.press('b')
    await expect.poll(() => units(page).count()).toBe(1)
    for (const kind of ['turbine', 'condenser', 'pump', 'mixing heater', 'pump']) {
      await command(page, `Place a ${kind}`)
    }
    await expect.poll(() => units(page).count()).toBe(6)
    for (const [unit, outlet, inlet] of [
      ['Boiler', 'Steam', 'turbine1.inlet'],
      ['Turbine', 'Bleed 1', 'mixing1.steam1'],
      ['Turbine', 'Exhaust', 'condenser1.steam1'],
      ['Condenser', 'Condensate', 'pump1.suction'],
      ['Pump', 'Discharge', 'mixing1.water1'],
      ['Mixing heater', 'Outlet', 'pump2.suction'],
      ['Pump 2', 'Discharge', 'boiler1.feedwater'],
    ] as const) {
      await connectByKeys(page, unit, outlet, inlet)
    }
    await connected(page, 7)

    for (const [name, path, text] of [
      ['Boiler, pressure loss', 'boiler1.pressureLossFraction', '0'],
      ['Turbine, group efficiency 1', 'turbine1.groupEfficiency1', '85'],
      ['Turbine, group efficiency 2', 'turbine1.groupEfficiency2', '85'],
      ['Turbine, wetness factor', 'turbine1.wetnessFactor', '0'],
      ['Condenser, pressure', 'condenser1.pressure', '0.008 MPa'],
      ['Pump, efficiency', 'pump1.efficiency', '100'],
      ['Pump 2, efficiency', 'pump2.efficiency', '100'],
      ['Boiler to turbine, pressure', 's1.p', '8 MPa'],
      ['Boiler to turbine, temperature', 's1.T', '480'],
      ['Turbine to mixing heater, pressure', 's2.p', '0.7 MPa'],
      ['Cycle power', 'plant.cyclePower', '100 MW'],
    ] as const) {
      await giveByKeys(page, name, path, text)
    }
    await solved(page)

    const steam = await flow(page, 's1')
    // To one unit of the last digit printed; of the fraction, two: it comes from two flows as shown.
    expect(Math.abs(3600 * steam - answer('MS-8.5', 'm_steam_kg_h').printed)).toBeLessThan(1e3)
    const bled = (await flow(page, 's2')) / steam
    expect(Math.abs(bled - answer('MS-8.5', 'y').printed)).toBeLessThan(2e-4)
    const eta = numberIn(await field(page, 'plant.cycleEfficiency').textContent()) / 100
    expect(Math.abs(eta - answer('MS-8.5', 'eta').printed)).toBeLessThan(1e-3)
    expect(problems).toEqual([])
  })
})
