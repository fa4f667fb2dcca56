import { type Dimension, labelOf, toShown, type UnitChoice, unitOf } from '../../src/document.ts'
import { plainNumber, textOfTable } from '../export/table-text.ts'
import type { ChartName } from './chart-settings.ts'
import type { ChartSource } from './chart-source.ts'
import { energyAccount } from './energy-bars.ts'
import { zoneWords } from './heat-zones.ts'

/** Header cell with the unit that the column is in. */
const header = (name: string, dimension: Dimension, units: UnitChoice): string => {
  const unit = unitOf(dimension, units).name
  return unit ? `${name} [${unit}]` : name
}

/** The numbers behind a chart as tab separated text, in the units in force: names first, units in the header. */
export function chartText(chart: ChartName, source: ChartSource, units: UnitChoice): string {
  const { layout, names, balance } = source
  if (!names || !balance) return ''
  const number = (value: number, dimension: Dimension): string =>
    plainNumber(toShown(value, unitOf(dimension, units)))
  const rows: string[][] = []
  if (chart === 'ts' || chart === 'hs') {
    rows.push([
      'Process',
      'From',
      'To',
      header('m', 'massFlow', units),
      header('s', 'specificEntropy', units),
      header('T', 'temperature', units),
      header('h', 'specificEnthalpy', units),
    ])
    const { points, starts, flows } = balance.curves
    names.processes.forEach(({ unit, from, to }, k) => {
      for (let i = starts[k] as number; i < (starts[k + 1] as number); i += 1) {
        rows.push([
          labelOf(layout, unit),
          from,
          to,
          number(flows[k] as number, 'massFlow'),
          number(points[3 * i] as number, 'specificEntropy'),
          number(points[3 * i + 1] as number, 'temperature'),
          number(points[3 * i + 2] as number, 'specificEnthalpy'),
        ])
      }
    })
  } else if (chart === 'tq') {
    rows.push([
      'Unit',
      'Line',
      header('Q', 'heatFlow', units),
      header('T', 'temperature', units),
      header('Difference', 'temperatureDifference', units),
    ])
    for (const profile of balance.profiles) {
      const name = labelOf(layout, profile.unit)
      for (const line of ['hot', 'cold', 'superheat'] as const) {
        for (let i = 0; i < profile[line].length; i += 2) {
          const [heat, T] = [profile[line][i] as number, profile[line][i + 1] as number]
          rows.push([name, line, number(heat, 'heatFlow'), number(T, 'temperature'), ''])
        }
      }
      for (const { name: zone, to } of profile.zones) {
        rows.push([name, `end of ${zoneWords[zone]}`, number(to, 'heatFlow'), '', ''])
      }
      for (const mark of [...profile.marks, ...(profile.closest ? [profile.closest] : [])]) {
        rows.push([
          name,
          mark.quantity ?? 'closest approach',
          number(mark.at, 'heatFlow'),
          number(mark.cold, 'temperature'),
          number(mark.hot - mark.cold, 'temperatureDifference'),
        ])
      }
    }
  } else {
    rows.push([
      'What',
      'Side',
      header('Energy', 'heatFlow', units),
      header('Exergy', 'heatFlow', units),
    ])
    const account = energyAccount(source)
    const side = (word: string, bars: NonNullable<typeof account>['energy'], exergy: boolean) => {
      for (const { label, value } of bars) {
        const text = number(value, 'heatFlow')
        rows.push([label, word, exergy ? '' : text, exergy ? text : ''])
      }
    }
    if (account) {
      side('enters', account.entering, false)
      side('leaves', account.energy, false)
      side('leaves', account.exergyLeaving, true)
      side('destroyed', account.destroyed, true)
    }
  }
  return textOfTable(rows)
}
