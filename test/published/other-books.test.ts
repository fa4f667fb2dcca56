import { oneHeaterCycle, reheatCycle, reheatHeaterCycle, simpleCycle } from './cycles.ts'
import { type Answers, describeExample, kJ, MW, pumped, solutionOf, zero } from './examples.ts'

/*
 * M. C. Potter and C. W. Somerton; R. E. Sonntag, C. Borgnakke and G. J. Van Wylen; T. D. Eastop and
 * A. McConkey; S. C. Arora and S. Domkundwar: the titles stand in the data and in the tests' names.
 */

/** What these books ask of a simple ideal cycle, 1 kg/s. */
function simple(main: Readonly<Record<string, number>>, condenser: number): Answers {
  const at = solutionOf(simpleCycle({ main: { ...main, m: 1 }, condenser }))
  return {
    h1: at('condensate.h') / kJ,
    h3: at('main.h') / kJ,
    s3: at('main.s') / kJ,
    x4: at('exhaust.x'),
    h4: at('exhaust.h') / kJ,
    w_p: pumped(at('p.power') / kJ, 1e-3),
    w_t: at('t.power') / kJ,
    q_in: pumped(at('plant.heatInput') / kJ),
    eta: pumped(at('plant.cycleEfficiency')),
    work_ratio: pumped(1 - at('plant.backWorkRatio')),
    ssc_kg_kWh: pumped(at('plant.steamRate') * 3.6e6),
  }
}

describeExample('PS-8.1', () => simple({ p: 2e6, T: 400 + zero }, 10e3))
describeExample('SB-11.1', () => simple({ p: 2e6, x: 1 }, 10e3))
describeExample('SB-11.2', () => simple({ p: 4e6, T: 400 + zero }, 10e3))
describeExample('EM-8.1', () => simple({ p: 4.2e6, x: 1 }, 3.5e3))
describeExample('EM-8.2', () => simple({ p: 4.2e6, T: 500 + zero }, 3.5e3))

describeExample('PS-8.9', () => {
  const steam = { main: { p: 2e6, T: 600 + zero, m: 1 }, condenser: 10e3 }
  const ideal = solutionOf(simpleCycle(steam))
  const at = solutionOf(simpleCycle({ ...steam, turbine: 0.8 }))
  return {
    h4s: ideal('exhaust.h') / kJ,
    w_t: at('t.power') / kJ,
    // The book neglects the pump.
    eta: at('t.power') / (at('main.h') - at('condensate.h')),
    h4: at('exhaust.h') / kJ,
    // The recomputed temperature comes from the backward equation T(p, h), good to 10 mK.
    T4_C: { value: at('exhaust.T') - zero, within: 5e-5 },
  }
})

describeExample('SB-11.3', () => {
  const at = solutionOf(
    reheatCycle({
      main: { p: 4e6, T: 400 + zero, m: 1 },
      cold: { p: 0.4e6 },
      hot: { T: 400 + zero },
      condenser: 10e3,
    }),
  )
  return {
    h4: at('cold.h') / kJ,
    h5: at('hot.h') / kJ,
    h6: at('exhaust.h') / kJ,
    eta: pumped(at('plant.cycleEfficiency')),
  }
})

describeExample('AD-22.4', () => {
  const at = solutionOf(
    reheatCycle({
      main: { p: 9e6, T: 480 + zero, m: 1 },
      cold: { p: 1.2e6 },
      // The book reads this enthalpy from a chart.
      hot: { h: 3425.5 * kJ },
      condenser: 7e3,
    }),
  )
  return {
    h1: at('main.h') / kJ,
    h2: at('cold.h') / kJ,
    h4: at('exhaust.h') / kJ,
    h5: at('condensate.h') / kJ,
    w_net: pumped(at('plant.cyclePower') / kJ),
    eta: pumped(at('plant.cycleEfficiency')),
  }
})

describeExample('AD-22.11', () => {
  const vacuum = 707.5
  // The book's barometer: 760 mm of mercury are 1.013 bar.
  const condenser = ((760 - vacuum) / 760) * 1.013e5
  const parts = oneHeaterCycle({
    main: { p: 6e6, T: 450 + zero },
    bleed: { p: 0.3e6 },
    turbine: [0.87, 0.87],
    condenser,
    plant: { grossPower: 27 * MW },
  })
  const at = solutionOf({
    ...parts,
    shafts: {
      s: {
        turbines: ['t'],
        given: {
          mechanicalEfficiency: 0.98,
          mechanicalLoss: 0,
          generatorEfficiency: 0.95,
          generatorLoss: 0,
        },
      },
    },
  })
  const boilerEfficiency = 0.9
  const leftByAuxiliaries = 0.9
  return {
    p_cond_bar: condenser / 1e5,
    h1: at('main.h') / kJ,
    h2: at('bleed.h') / kJ,
    // In the recomputed value the line's efficiencies meet at a bleed state from backward equations.
    h3: { value: at('exhaust.h') / kJ, within: 2e-5 },
    // The book neglects the pumps; their power is within its 10 % for auxiliaries.
    m: pumped(at('bleed.m') / at('main.m'), 1e-3),
    m_steam_t_h: pumped(at('main.m') * 3.6),
    eta_overall: pumped(
      (leftByAuxiliaries * boilerEfficiency * at('plant.grossPower')) /
        (at('main.m') * (at('main.h') - at('hotWater.h'))),
    ),
  }
})

describeExample('AD-22.16', () => {
  const parts = reheatHeaterCycle({
    main: { p: 7e6, T: 459 + zero },
    cold: { p: 2.5e6 },
    hot: { T: 420 + zero },
    hp: 0.785,
    lp: [0.83, 0.83],
    bleed: { p: 1e6 },
    // The book's feedwater, 0.9 K below saturation.
    hotWater: { T: 179 + zero },
    subcooling: null,
    condenser: 7e3,
    plant: { grossPower: 20 * MW },
  })
  const transmission = 0.95
  const at = solutionOf({
    ...parts,
    shafts: {
      s: {
        turbines: ['hp', 'lp'],
        given: {
          mechanicalEfficiency: 0.85 * transmission,
          mechanicalLoss: 0,
          generatorEfficiency: 0.95,
          generatorLoss: 0,
        },
      },
    },
  })
  const m = at('main.m')
  const heat = m * (at('main.h') - at('hotWater.h') + at('hot.h') - at('cold.h'))
  return {
    h1: at('main.h') / kJ,
    h2: at('cold.h') / kJ,
    h3: at('hot.h') / kJ,
    h4: at('bleed.h') / kJ,
    h5: at('exhaust.h') / kJ,
    // The book neglects the pumps.
    m: pumped(at('bleed.m') / m, 1.5e-3),
    eta: pumped(at('plant.turbinePower') / heat, 3e-4),
    m_steam_kg_min: pumped(m * 60, 3e-4),
  }
})
