import { expect, test } from 'vitest'
import { changed } from '../published/build-layout.ts'
import { reheatHeaterCycle } from '../published/cycles.ts'
import { solvedAnswerOf } from './contract-answer.ts'

/*
 * Any quantity of a plant can be given instead of another that it depends on (contract, section 1):
 * freed and replaced by a result at the value that it had, the plant comes out as it was.
 */

const plant = reheatHeaterCycle({
  main: { p: 13e6, T: 811, m: 100 },
  cold: { p: 3e6 },
  hot: { T: 811 },
  hp: 0.86,
  lp: [0.88, 0.9],
  bleed: { p: 6e5 },
  condenser: 6e3,
  pump: 0.78,
  cooling: { coolingInletT: 290, coolingRise: 10, coolingHeatCapacity: 4180 },
})
const whole = solvedAnswerOf(plant)

const rates = [
  'plant.cycleEfficiency',
  'plant.grossTurbineHeatRate',
  'plant.netTurbineHeatRate',
  'plant.unitHeatRate',
  'plant.unitEfficiency',
  'plant.steamRate',
]
const powers = [
  'plant.netPower',
  'plant.grossPower',
  'plant.turbinePower',
  'plant.cyclePower',
  's.generatorPower',
]
const heats = ['plant.heatInput', 'plant.fuelHeat', 'plant.turbineHeat', 'plant.heatRejected']

test.each([
  ['main.m', [...powers, ...heats, 'hp.power', 'exhaust.m', 'bleed.m', 'feed.m', 'c.coolingFlow']],
  [
    'main.T',
    [
      ...rates,
      ...powers,
      'plant.heatInput',
      'plant.turbineHeat',
      'cold.T',
      'main.superheat',
      'main.s',
      'b.heat',
    ],
  ],
  ['hot.T', [...rates, ...powers, ...heats, 'exhaust.x', 'bleed.T', 'hot.superheat', 'r.heat']],
  [
    'main.p',
    [...rates, ...powers, 'feed.p', 'cold.T', 'p2.pressureRise', 'p2.power', 'main.superheat'],
  ],
  ['cold.p', [...powers, 'hot.p', 'cold.T', 'hp.power', 'r.heat']],
  ['bleed.p', ['d.pressure', 'hotWater.T', 'feed.T', 'bleed.m', 'bleed.T']],
  ['hp.groupEfficiency1', [...rates, ...powers, 'cold.T', 'hp.power', 'r.heat']],
  ['lp.groupEfficiency2', [...rates, ...powers, 'exhaust.x', 'exhaust.h', 'c.heat', 'lp.power']],
  [
    'c.pressure',
    [
      ...rates,
      ...powers,
      'c.terminalDifference',
      'c.conductance',
      'condensate.T',
      'exhaust.p',
      'exhaust.x',
      'c.heat',
    ],
  ],
  ['c.coolingInletT', ['c.terminalDifference', 'c.conductance']],
  ['c.coolingRise', ['c.coolingFlow', 'c.terminalDifference', 'c.conductance']],
  ['p2.efficiency', ['p2.power', 'p2.electricPower', 'feed.T', 'feed.h', 'plant.pumpPower']],
  ['b.efficiency', ['plant.unitHeatRate', 'plant.unitEfficiency', 'plant.fuelHeat', 'b.fuelHeat']],
] as const)('%s from each of its results', (freed, results) => {
  for (const path of results) {
    const turned = solvedAnswerOf(
      changed(plant, { free: [freed], set: { [path]: whole.at(path) } }),
    )
    expect([path, turned.at(freed) / whole.at(freed)]).toEqual([path, expect.closeTo(1, 6)])
  }
})
