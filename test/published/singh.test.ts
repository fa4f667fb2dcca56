import { SATURATION_SIZE, Saturation, saturationAtPressure } from '../../src/steam/index.ts'
import { oneHeaterCycle, reheatCycle, reheatHeaterCycle, simpleCycle } from './cycles.ts'
import { describeExample, kJ, MW, pumped, solutionOf, zero } from './examples.ts'

/* Onkar Singh, Applied Thermodynamics, chapter 8. */

/** Saturated liquid, J/kg. */
function enthalpyOfLiquid(p: number): number {
  const record = new Float64Array(SATURATION_SIZE)
  saturationAtPressure(record, 0, p)
  return record[Saturation.hL]!
}

describeExample('OS-8.16', () => {
  const at = solutionOf(simpleCycle({ main: { p: 7e6, T: 550 + zero, m: 35 }, condenser: 20e3 }))
  return {
    h1: at('main.h') / kJ,
    s1: at('main.s') / kJ,
    h2: at('exhaust.h') / kJ,
    P_net_MW: pumped(at('plant.netPower') / MW),
    eta: pumped(at('plant.cycleEfficiency')),
  }
})

describeExample('OS-8.17', () => {
  const at = solutionOf(
    oneHeaterCycle({
      main: { p: 10e6, T: 600 + zero },
      bleed: { p: 2e6 },
      condenser: 10e3,
      plant: { turbinePower: 10 * MW },
    }),
  )
  return {
    h1: at('main.h') / kJ,
    s1: at('main.s') / kJ,
    h2: at('bleed.h') / kJ,
    h3: at('exhaust.h') / kJ,
    // The book neglects the pumps: its condensate enters the heater 2 kJ/kg colder,
    m_bleed: pumped(at('bleed.m') / at('main.m'), 2.5e-3),
    m_steam_kg_s: pumped(at('main.m'), 5e-4),
    // and its feedwater enters the boiler as it leaves the heater.
    Q_in_kW: pumped((at('main.m') * (at('main.h') - at('hotWater.h'))) / kJ, 5e-4),
  }
})

describeExample('OS-8.7', () => {
  const at = solutionOf(
    reheatCycle({
      main: { p: 5e6, T: 500 + zero, m: 1 },
      cold: { p: 0.5e6 },
      hot: { T: 400 + zero },
      condenser: 5e3,
    }),
  )
  const horsepower = 745.699_872
  return {
    h2: at('main.h') / kJ,
    h3: at('cold.h') / kJ,
    h4: at('hot.h') / kJ,
    h5: at('exhaust.h') / kJ,
    eta: pumped(at('plant.cycleEfficiency')),
    eta_without_reheat_heat: pumped(at('plant.cyclePower') / at('b.heat')),
    work_ratio: pumped(1 - at('plant.backWorkRatio')),
    steam_kg_per_hp_h: pumped((horsepower * 3600) / at('plant.cyclePower')),
  }
})

describeExample('OS-8.10', () => {
  const reheated = {
    main: { p: 7e6, T: 450 + zero, m: 1 },
    cold: { p: 3e6 },
    hot: { T: 400 + zero },
    hp: 0.8,
    condenser: 7.5e3,
  }
  // The book's 85 % hold for the whole line from the reheater, bleed or not: its end is given to the
  // group behind the bleed, which starts from a state already off the isentrope.
  const line = solutionOf(reheatCycle({ ...reheated, lp: 0.85 }))
  const at = solutionOf(
    reheatHeaterCycle({
      ...reheated,
      lp: [0.85, null],
      bleed: {},
      hotWater: { T: 140 + zero },
      exhaust: { h: line('exhaust.h') },
    }),
  )
  const behind = at('bleed.h') - at('exhaust.h')
  // The published heater balance, replayed: saturated liquid of 30 bar leaves the heater, and the bleed
  // enters with the enthalpy of the isentrope.
  const outlet = enthalpyOfLiquid(3e6)
  const isentropic = at('hot.h') - (at('hot.h') - at('bleed.h')) / 0.85
  const bleed = (outlet - at('warm.h')) / (isentropic - at('warm.h'))
  const turbines = at('main.h') - at('cold.h') + at('hot.h') - at('bleed.h') + (1 - bleed) * behind
  const feedPump = at('feed.h') - at('hotWater.h')
  const pumps = (1 - bleed) * (at('warm.h') - at('condensate.h')) + feedPump
  const heat = at('main.h') - outlet - feedPump + at('hot.h') - at('cold.h')
  return {
    h2: at('main.h') / kJ,
    h3a: at('cold.h') / kJ,
    h4: at('hot.h') / kJ,
    h5a: at('bleed.h') / kJ,
    h6a: at('exhaust.h') / kJ,
    m: pumped(at('bleed.m')),
    eta: pumped(at('plant.cycleEfficiency')),
    m_with_books_h9: pumped(bleed),
    eta_with_books_h9: pumped((turbines - pumps) / heat),
  }
})
