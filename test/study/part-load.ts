/**
 * Part load of the example plants: every layout, frozen on its own design, from 100 % to a lowest load
 * in steps of 1 %, by every load control that it allows. A script, too long for the tests, which check
 * a coarse part of it (part-load.test.ts):
 *
 *     node --import tsx test/study/part-load.ts [LOWEST] [FILE]...
 *
 * Prints a table: one line for each plant and control, and whatever broke off.
 */
import { readFileSync } from 'node:fs'
import { readPlant } from '../../src/document.ts'
import { type Line, partLoads, runPartLoad } from './part-load-lines.ts'

const [lowest = '30', ...wanted] = process.argv.slice(2)
const folder = new URL('../../public/examples/', import.meta.url)
const list = JSON.parse(readFileSync(new URL('index.json', folder), 'utf8')) as { file: string }[]
const files = wanted.length > 0 ? wanted : list.map(({ file }) => file)

console.log(
  'plant | layout | control | solved | heat rate, kJ/kWh, at 100 75 50 30 % | broke off at',
)
for (const file of files) {
  const read = readPlant(readFileSync(new URL(file, folder), 'utf8'))
  if (read.outcome === 'unusable') throw new Error(read.message)
  for (const load of partLoads(read.plant)) {
    const lines: Line[] = []
    for (let percent = 100; percent >= Number(lowest); percent--) {
      lines.push(runPartLoad(read.plant, load, percent / 100))
    }
    const rates = [100, 75, 50, 30].map((percent) => {
      const rate = lines.find(({ share }) => Math.abs(share * 100 - percent) < 0.5)?.heatRate
      return rate ? (rate * 3600).toFixed(1) : '–'
    })
    const gaps = lines.filter(({ status }) => status !== 'solved')
    const why = gaps
      .slice(0, 3)
      .map(({ share, status, finding }) => `${(share * 100).toFixed(0)} % ${status}: ${finding}`)
    console.log(
      [
        read.plant.title,
        load.layout,
        load.control,
        `${lines.length - gaps.length} of ${lines.length}`,
        rates.join(' '),
        why.join('; ') || '–',
      ].join(' | '),
    )
  }
}
