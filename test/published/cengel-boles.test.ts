import { state } from '../../src/steam/index.ts'
import { oneHeaterCycle, reheatCycle, simpleCycle } from './cycles.ts'
import { type Answers, describeExample, kJ, MW, pumped, solutionOf, zero } from './examples.ts'

/* Y. A. Cengel and M. A. Boles, Thermodynamics: An Engineering Approach, chapter 10. */

function stateOf(pair: Parameters<typeof state>[0]): { readonly h: number; readonly s: number } {
  const found = state(pair)
  if (found.outcome !== 'state') throw new Error(found.message)
  return found
}

/** The answers that the simple ideal cycles of this chapter share, 1 kg/s. */
function simple(p: number, celsius: number, condenser: number): Answers {
  const at = solutionOf(simpleCycle({ main: { p, T: celsius + zero, m: 1 }, condenser }))
  return {
    h1: at('condensate.h') / kJ,
    w_p: pumped(at('p.power') / kJ, 1e-3),
    h2: pumped(at('feed.h') / kJ, 3e-4),
    h3: at('main.h') / kJ,
    s3: at('main.s') / kJ,
    x4: at('exhaust.x'),
    h4: at('exhaust.h') / kJ,
    q_in: pumped(at('plant.heatInput') / kJ),
    q_out: at('plant.heatRejected') / kJ,
    eta: pumped(at('plant.cycleEfficiency')),
  }
}

describeExample('CB-10-1', () => simple(3e6, 350, 75e3))
describeExample('CB-10-3a', () => simple(3e6, 350, 10e3))
describeExample('CB-10-3b', () => simple(3e6, 600, 10e3))
describeExample('CB-10-3c', () => simple(15e6, 600, 10e3))

describeExample('CB-10-7', () => {
  const T0 = 290
  const at = solutionOf(
    simpleCycle({ main: { p: 3e6, T: 350 + zero, m: 1 }, condenser: 75e3, ambient: T0 }),
  )
  const dead = stateOf({ p: 100e3, T: T0 })
  const rise = at('main.s') - at('feed.s')
  return {
    // The heat comes from a source at 1600 K, not from fuel as in the balance.
    x_destroyed_boiler: pumped((T0 * (rise - at('b.heat') / 1600)) / kJ),
    x_destroyed_condenser: at('c.exergyDestroyed') / kJ,
    // The book takes the dead state as saturated liquid of T0.
    exergy_turbine_exit: pumped(
      (at('exhaust.h') - dead.h - T0 * (at('exhaust.s') - dead.s)) / kJ,
      3e-4,
    ),
  }
})

describeExample('CB-10-2', () => {
  const at = solutionOf({
    units: {
      b: ['boiler', { efficiency: 1 }],
      mainLine: ['pipe'],
      t: ['turbine', { groupEfficiency1: 0.87, wetnessFactor: 0, exhaustLoss: 0 }],
      c: ['condenser', { pressure: 10e3, subcooling: 0 }],
      suctionLine: ['pipe'],
      p: ['pump', { efficiency: 0.85, driveEfficiency: 1 }],
      feedLine: ['pipe'],
    },
    streams: {
      superheated: ['b.steam', 'mainLine.inlet', { p: 15.2e6, T: 625 + zero, m: 15 }],
      main: ['mainLine.outlet', 't.inlet', { p: 15e6, T: 600 + zero }],
      exhaust: ['t.exhaust', 'c.steam1'],
      condensate: ['c.condensate', 'suctionLine.inlet'],
      suction: ['suctionLine.outlet', 'p.suction', { p: 9e3, T: 38 + zero }],
      discharge: ['p.discharge', 'feedLine.inlet', { p: 16e6 }],
      feed: ['feedLine.outlet', 'b.feedwater', { p: 15.9e6, T: 35 + zero }],
    },
    shafts: { s: { turbines: ['t'] } },
  })
  const m = 15
  return {
    w_pump: pumped(at('p.power') / m / kJ, 4e-3),
    h5: at('main.h') / kJ,
    h6s: stateOf({ p: 10e3, s: at('main.s') }).h / kJ,
    w_turb: at('t.power') / m / kJ,
    h4: at('superheated.h') / kJ,
    h3: at('feed.h') / kJ,
    q_in: at('b.heat') / m / kJ,
    w_net: pumped(at('plant.cyclePower') / m / kJ),
    eta: pumped(at('plant.cycleEfficiency')),
    P_net_MW: pumped(at('plant.netPower') / MW),
  }
})

describeExample('CB-10-4', () => {
  const reheated = {
    main: { p: 15e6, T: 600 + zero, m: 1 },
    hot: { T: 600 + zero },
    condenser: 10e3,
  }
  // The question turned round: moisture of 10.4 % at the exhaust given, reheat pressure solved.
  const wanted = solutionOf(reheatCycle({ ...reheated, cold: {}, exhaust: { x: 1 - 0.104 } }))
  // The book goes on with 4 MPa.
  const at = solutionOf(reheatCycle({ ...reheated, cold: { p: 4e6 } }))
  return {
    p_reheat_MPa: wanted('cold.p') / MW,
    eta_at_solved_pressure: pumped(wanted('plant.cycleEfficiency')),
    h3: at('main.h') / kJ,
    h4: at('cold.h') / kJ,
    h5: at('hot.h') / kJ,
    s5: at('hot.s') / kJ,
    h6: at('exhaust.h') / kJ,
    q_in: pumped(at('plant.heatInput') / kJ),
    q_out: at('plant.heatRejected') / kJ,
    eta: pumped(at('plant.cycleEfficiency')),
  }
})

describeExample('CB-10-5', () => {
  const at = solutionOf(
    oneHeaterCycle({
      main: { p: 15e6, T: 600 + zero, m: 1 },
      bleed: { p: 1.2e6 },
      condenser: 10e3,
    }),
  )
  return {
    h1: at('condensate.h') / kJ,
    h2: pumped(at('warm.h') / kJ),
    h3: at('hotWater.h') / kJ,
    h4: pumped(at('feed.h') / kJ),
    h5: at('main.h') / kJ,
    h6: at('bleed.h') / kJ,
    // The recomputed temperature comes from the backward equation T(p, s), good to 10 mK.
    T6_C: { value: at('bleed.T') - zero, within: 5e-5 },
    h7: at('exhaust.h') / kJ,
    x7: at('exhaust.x'),
    y: pumped(at('bleed.m')),
    q_in: pumped(at('plant.heatInput') / kJ),
    q_out: pumped(at('plant.heatRejected') / kJ),
    eta: pumped(at('plant.cycleEfficiency')),
  }
})

const fired = { pressureLossFraction: 0, efficiency: 1 } as const
const dry = { wetnessFactor: 0, exhaustLoss: 0 } as const
const idealPump = ['pump', { efficiency: 1, driveEfficiency: 1 }] as const

describeExample(
  'CB-10-6',
  () => {
    const at = solutionOf({
      units: {
        b: ['boiler', fired],
        hp: ['turbine', { groupEfficiency1: 1, ...dry }],
        br: ['branch'],
        r: ['reheater', fired],
        lp: ['turbine', { groupEfficiency1: 1, groupEfficiency2: 1, ...dry }],
        c: ['condenser', { pressure: 10e3, subcooling: 0 }],
        p1: idealPump,
        d: ['mixingHeater', { subcooling: 0 }],
        p2: idealPump,
        h: ['surfaceHeater', { pressureLossFraction: 0, terminalDifference: 0 }],
        p3: idealPump,
        mix: ['junction'],
      },
      streams: {
        main: ['b.steam', 'hp.inlet', { p: 15e6, T: 600 + zero, m: 1 }],
        expanded: ['hp.exhaust', 'br.inlet', { p: 4e6 }],
        toHeater: ['br.outlet1', 'h.steam1'],
        cold: ['br.outlet2', 'r.inlet'],
        hot: ['r.outlet', 'lp.inlet', { T: 600 + zero }],
        bleed: ['lp.bleed1', 'd.steam1', { p: 0.5e6 }],
        exhaust: ['lp.exhaust', 'c.steam1'],
        condensate: ['c.condensate', 'p1.suction'],
        warm: ['p1.discharge', 'd.water1'],
        hotWater: ['d.outlet', 'p2.suction'],
        pumped: ['p2.discharge', 'h.water'],
        heated: ['h.outlet', 'mix.inlet1'],
        drain: ['h.drain', 'p3.suction'],
        forward: ['p3.discharge', 'mix.inlet2'],
        feed: ['mix.outlet', 'b.feedwater'],
      },
      shafts: { s: { turbines: ['hp', 'lp'] } },
    })
    return {
      h1: at('condensate.h') / kJ,
      h2: at('warm.h') / kJ,
      h3: at('hotWater.h') / kJ,
      h4: pumped(at('pumped.h') / kJ),
      h5: at('heated.h') / kJ,
      h6: at('drain.h') / kJ,
      h7: pumped(at('forward.h') / kJ),
      h8: pumped(at('feed.h') / kJ),
      h9: at('main.h') / kJ,
      h10: at('expanded.h') / kJ,
      h11: at('hot.h') / kJ,
      h12: at('bleed.h') / kJ,
      h13: at('exhaust.h') / kJ,
      y: pumped(at('toHeater.m'), 2e-4),
      z: pumped(at('bleed.m')),
      q_in: pumped(at('plant.heatInput') / kJ),
      q_out: pumped(at('plant.heatRejected') / kJ),
      eta: pumped(at('plant.cycleEfficiency')),
      w_t_feed_15MPa_h5_compressed: pumped(at('plant.turbinePower') / kJ),
      w_p_feed_15MPa_h5_compressed: pumped(at('plant.pumpPower') / kJ, 4e-3),
      eta_from_work_feed_15MPa_h5_compressed: pumped(at('plant.cycleEfficiency')),
    }
  },
  {
    instead: Object.fromEntries(
      ['h4', 'h5', 'h6', 'h7', 'h8', 'y', 'z', 'q_in', 'q_out', 'eta'].map((name) => [
        name,
        `${name}_feed_15MPa_h5_compressed`,
      ]),
    ),
    // Feedwater of 15 MPa with the enthalpy of saturated liquid of 4 MPa.
    skip: [
      'h4',
      'h5',
      'h6',
      'h7',
      'h8',
      'y',
      'z',
      'q_in',
      'q_out',
      'eta',
      'w_t',
      'w_p',
      'eta_from_work',
    ].map((name) => `${name}_feed_pump_to_15MPa`),
  },
)

describeExample('CB-10-8', () => {
  const steam = { p: 7e6, T: 500 + zero, m: 15 }
  const condensate = { p: 0.5e6, x: 0 }
  // (a) All steam is throttled to the process heater.
  const a = solutionOf({
    units: {
      b: ['boiler', fired],
      v: ['valve'],
      process: ['heatUser', { returnFraction: 1 }],
      p: idealPump,
    },
    streams: {
      main: ['b.steam', 'v.inlet', steam],
      throttled: ['v.outlet', 'process.steam', { p: 0.5e6 }],
      returned: ['process.condensate', 'p.suction', condensate],
      feed: ['p.discharge', 'b.feedwater'],
    },
  })
  // (b) No process heat.
  const b = solutionOf(simpleCycle({ main: steam, condenser: 5e3 }))
  // (c) A tenth is throttled, seven tenths are bled, the rest goes to the condenser.
  const c = solutionOf({
    units: {
      b: ['boiler', fired],
      br: ['branch', { share2: 0.1 }],
      v: ['valve'],
      t: ['turbine', { groupEfficiency1: 1, groupEfficiency2: 1, ...dry }],
      joined: ['junction'],
      process: ['heatUser', { returnFraction: 1 }],
      p2: idealPump,
      c: ['condenser', { pressure: 5e3, subcooling: 0 }],
      p1: idealPump,
      mix: ['junction'],
    },
    streams: {
      main: ['b.steam', 'br.inlet', steam],
      admitted: ['br.outlet1', 't.inlet'],
      aside: ['br.outlet2', 'v.inlet'],
      throttled: ['v.outlet', 'joined.inlet1'],
      bleed: ['t.bleed1', 'joined.inlet2', { p: 0.5e6, m: 0.7 * 15 }],
      exhaust: ['t.exhaust', 'c.steam1'],
      processSteam: ['joined.outlet', 'process.steam'],
      returned: ['process.condensate', 'p2.suction', condensate],
      returnedFeed: ['p2.discharge', 'mix.inlet2'],
      condensate: ['c.condensate', 'p1.suction'],
      condensateFeed: ['p1.discharge', 'mix.inlet1'],
      feed: ['mix.outlet', 'b.feedwater'],
    },
    shafts: { s: { turbines: ['t'] } },
  })
  return {
    h3: b('main.h') / kJ,
    h5: c('bleed.h') / kJ,
    h6: b('exhaust.h') / kJ,
    h7: c('returned.h') / kJ,
    h8: b('condensate.h') / kJ,
    h9: pumped(b('feed.h') / kJ),
    h10: pumped(c('returnedFeed.h') / kJ),
    a_Q_process_kW: a('process.heat') / kJ,
    b_W_turb_kW: b('t.power') / kJ,
    b_W_pump_kW: pumped(b('p.power') / kJ, 2e-3),
    b_P_net_kW: pumped(b('plant.netPower') / kJ),
    b_Q_in_kW: pumped(b('b.heat') / kJ),
    b_utilization: pumped(b('plant.cycleEfficiency')),
    c_Q_process_MW: c('plant.processHeat') / MW,
    c_W_turb_kW: c('t.power') / kJ,
  }
})
