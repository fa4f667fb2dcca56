import { SATURATION_SIZE, Saturation, saturationAtTemperature } from '../../src/steam/index.ts'
import { oneHeaterCycle, reheatCycle, simpleCycle } from './cycles.ts'
import { describeExample, kJ, MW, pumped, solutionOf, zero } from './examples.ts'

/* M. J. Moran and H. N. Shapiro, Fundamentals of Engineering Thermodynamics, chapter 8. */

/** Saturated liquid, as the book takes cold water, SI. */
function water(celsius: number) {
  const record = new Float64Array(SATURATION_SIZE)
  saturationAtTemperature(record, 0, celsius + zero)
  return {
    p: record[Saturation.p]!,
    h: record[Saturation.hL]!,
    s: record[Saturation.sL]!,
    v: record[Saturation.vL]!,
  }
}

const cold = water(15)
const warm = water(35)
/** The book warms the water from 15 to 35 °C. */
const cooling = {
  coolingInletT: 15 + zero,
  coolingRise: 20,
  coolingHeatCapacity: (warm.h - cold.h) / 20,
}
const hour = 3600
const netPower = { netPower: 100 * MW }

describeExample('MS-8.1', () => {
  const at = solutionOf(
    simpleCycle({ main: { p: 8e6, x: 1 }, condenser: 8e3, cooling, plant: netPower }),
  )
  return {
    h1: at('main.h') / kJ,
    s1: at('main.s') / kJ,
    h2: at('exhaust.h') / kJ,
    x2: at('exhaust.x'),
    h3: at('condensate.h') / kJ,
    h4: pumped(at('feed.h') / kJ),
    eta: pumped(at('plant.cycleEfficiency')),
    back_work_ratio: pumped(at('plant.backWorkRatio'), 2e-3),
    m_steam_kg_h: pumped(at('main.m') * hour),
    Q_in_MW: pumped(at('plant.heatInput') / MW),
    Q_out_MW: pumped(at('plant.heatRejected') / MW),
    m_cw_kg_h: pumped(at('c.coolingFlow') * hour),
  }
})

const withLosses = simpleCycle({
  main: { p: 8e6, x: 1 },
  condenser: 8e3,
  turbine: 0.85,
  pump: 0.85,
  cooling,
  plant: netPower,
  ambient: 295,
})

describeExample('MS-8.2', () => {
  const at = solutionOf(withLosses)
  return {
    h2: at('exhaust.h') / kJ,
    h4: pumped(at('feed.h') / kJ),
    eta: pumped(at('plant.cycleEfficiency')),
    m_steam_kg_h: pumped(at('main.m') * hour),
    Q_in_MW: pumped(at('plant.heatInput') / MW),
    Q_out_MW: pumped(at('plant.heatRejected') / MW),
    m_cw_kg_h: pumped(at('c.coolingFlow') * hour),
  }
})

describeExample('MS-8.7-8.9', () => {
  const at = solutionOf(withLosses)
  const T0 = 295
  const exergyGain = at('main.h') - at('feed.h') - T0 * (at('main.s') - at('feed.s'))
  // What the cooling water carries away; the balance counts the condenser's heat as lost at T0.
  const withWater = at('c.coolingFlow') * (warm.h - cold.h - T0 * (warm.s - cold.s))
  return {
    exergy_to_water_in_boiler_MW: pumped((at('main.m') * exergyGain) / MW),
    Ed_turbine_MW: pumped(at('t.exergyDestroyed') / MW),
    // The excess of v dp over the isentropic work counts as destroyed in the recomputed value.
    Ed_pump_MW: pumped(at('p.exergyDestroyed') / MW, 0.025),
    exergy_out_with_cw_MW: pumped(withWater / MW),
    Ed_condenser_MW: pumped((at('c.exergyDestroyed') - withWater) / MW),
  }
})

const reheated = {
  main: { p: 8e6, T: 480 + zero },
  cold: { p: 0.7e6 },
  hot: { T: 440 + zero },
  condenser: 8e3,
  plant: netPower,
}

describeExample('MS-8.3', () => {
  const at = solutionOf(reheatCycle(reheated))
  return {
    h1: at('main.h') / kJ,
    s1: at('main.s') / kJ,
    x2: at('cold.x'),
    h2: at('cold.h') / kJ,
    h3: at('hot.h') / kJ,
    s3: at('hot.s') / kJ,
    x4: at('exhaust.x'),
    h4: at('exhaust.h') / kJ,
    h6: pumped(at('feed.h') / kJ),
    eta: pumped(at('plant.cycleEfficiency')),
    m_steam_kg_h: pumped(at('main.m') * hour),
    Q_out_MW: pumped(at('plant.heatRejected') / MW),
  }
})

describeExample('MS-8.4', () => {
  const at = solutionOf(reheatCycle({ ...reheated, hp: 0.85, lp: 0.85 }))
  return {
    h2: at('cold.h') / kJ,
    h4: at('exhaust.h') / kJ,
    eta: pumped(at('plant.cycleEfficiency')),
  }
})

describeExample('MS-8.5', () => {
  const at = solutionOf(
    oneHeaterCycle({
      main: { p: 8e6, T: 480 + zero },
      bleed: { p: 0.7e6 },
      turbine: [0.85, 0.85],
      condenser: 8e3,
      plant: netPower,
    }),
  )
  return {
    h1: at('main.h') / kJ,
    h2: at('bleed.h') / kJ,
    s2: at('bleed.s') / kJ,
    h3: at('exhaust.h') / kJ,
    h4: at('condensate.h') / kJ,
    h5: pumped(at('warm.h') / kJ),
    h6: at('hotWater.h') / kJ,
    h7: pumped(at('feed.h') / kJ),
    y: pumped(at('bleed.m') / at('main.m')),
    eta: pumped(at('plant.cycleEfficiency')),
    m_steam_kg_h: pumped(at('main.m') * hour),
    w_net: pumped(at('plant.cyclePower') / at('main.m') / kJ),
    q_in: pumped(at('plant.heatInput') / at('main.m') / kJ),
  }
})

describeExample('MS-8.6', () => {
  const fired = { pressureLossFraction: 0, efficiency: 1 }
  const stages = { groupEfficiency1: 1, groupEfficiency2: 1, wetnessFactor: 0, exhaustLoss: 0 }
  const solve = (feed: Readonly<Record<string, number>>) =>
    solutionOf({
      units: {
        b: ['boiler', fired],
        hp: ['turbine', stages],
        r: ['reheater', fired],
        lp: ['turbine', stages],
        c: ['condenser', { pressure: 8e3, subcooling: 0 }],
        p1: ['pump', { efficiency: 1, driveEfficiency: 1 }],
        d: ['mixingHeater', { subcooling: 0 }],
        p2: ['pump', { efficiency: 1, driveEfficiency: 1 }],
        h: ['surfaceHeater', { pressureLossFraction: 0 }],
      },
      streams: {
        main: ['b.steam', 'hp.inlet', { p: 8e6, T: 480 + zero }],
        toClosed: ['hp.bleed1', 'h.steam1', { p: 2e6 }],
        cold: ['hp.exhaust', 'r.inlet', { p: 0.7e6 }],
        hot: ['r.outlet', 'lp.inlet', { T: 440 + zero }],
        toOpen: ['lp.bleed1', 'd.steam1', { p: 0.3e6 }],
        exhaust: ['lp.exhaust', 'c.steam1'],
        condensate: ['c.condensate', 'p1.suction'],
        warm: ['p1.discharge', 'd.water1'],
        hotWater: ['d.outlet', 'p2.suction'],
        pumped: ['p2.discharge', 'h.water'],
        feed: ['h.outlet', 'b.feedwater', feed],
        drain: ['h.drain', 'd.drain1'],
      },
      shafts: { s: { turbines: ['hp', 'lp'] } },
      plant: { otherAuxiliary: 0, ...netPower },
    })
  // The book takes compressed water as h' (T) + v' (p - psat); IF97 has it 4.9 kJ/kg lower.
  const liquid = water(205)
  const at = solve({ h: liquid.h + liquid.v * (8e6 - liquid.p) })
  const exact = solve({ T: 205 + zero })
  const m = at('main.m')
  return {
    h2: at('toClosed.h') / kJ,
    h3: at('cold.h') / kJ,
    h4: at('hot.h') / kJ,
    h5: at('toOpen.h') / kJ,
    h6: at('exhaust.h') / kJ,
    h8: pumped(at('warm.h') / kJ),
    h9: at('hotWater.h') / kJ,
    h10: pumped(at('pumped.h') / kJ),
    h11: at('feed.h') / kJ,
    h12: at('drain.h') / kJ,
    y1: pumped(at('toClosed.m') / m),
    y2: pumped(at('toOpen.m') / m),
    w_t1: at('hp.power') / m / kJ,
    w_t2: pumped(at('lp.power') / m / kJ),
    w_p1: pumped(at('p1.power') / m / kJ, 2e-4),
    w_p2: pumped(at('p2.power') / m / kJ, 2e-3),
    q_in: pumped(at('plant.heatInput') / m / kJ),
    eta: pumped(at('plant.cycleEfficiency')),
    m_steam_kg_h: pumped(m * hour),
    h11_compressed_liquid_IF97: exact('feed.h') / kJ,
    eta_with_IF97_h11: pumped(exact('plant.cycleEfficiency')),
    TTD_K: exact('h.terminalDifference'),
  }
})
