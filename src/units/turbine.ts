import {
  constant,
  divide,
  type Equation,
  type Expression,
  equal,
  massBalance,
  minus,
  plus,
  signedSquare,
  square,
  times,
} from '../equations/expression/index.ts'
import { state } from '../steam/index.ts'
import {
  enthalpyAtEntropy,
  entropy,
  liquidEnthalpy,
  moisture,
  volume,
  wetPart,
} from '../steam/operations.ts'
import { commonPractice, energy, one } from './common.ts'
import { mixedEnthalpy } from './heat-transfer.ts'
import {
  type Caution,
  defineUnitKind,
  type FreezeRule,
  type Shape,
  type StageGroup,
  type UnitNumbers,
} from './kind.ts'
import { carriedMoisture, moistureOf } from './wetness.ts'

const perGroup = { port: 'bleed', extra: 1 } as const
const perBleed = { port: 'bleed', extra: 0 } as const

const withAdmission = (shape: Shape): boolean => shape.options.admission === true
const withMoistureRemoval = (shape: Shape): boolean => shape.options.moistureRemoval === true

/** A state between groups; not a stream, as what enters the first group after the valves is none. */
interface GroupEnd {
  readonly p: Expression
  readonly h: Expression
}

/** Efficiency factor of a group on its wet part (K. Baumann, J. IEE 59, 1921): see the contract. */
function wetFactor(
  factor: Expression,
  start: GroupEnd,
  end: GroupEnd,
  s: Expression,
  isentropicEnd: Expression,
): Expression {
  const yStart = moisture(start.p, start.h)
  const yEnd = moisture(end.p, end.h)
  const mean = divide(plus(yStart, yEnd), constant(2))
  const wet = wetPart(start.p, start.h, s, isentropicEnd)
  return minus(one, times(factor, times(wet, mean)))
}

/**
 * The stage groups as the equations have them: a group starts where the valves or the group before it
 * end, less what moisture removal takes out. What the valves and the exhaust lose counts with the group.
 */
function stageGroups({ shape, port, quantity }: UnitNumbers): StageGroup[] {
  const inlet = port('inlet')
  const last = (shape.streams.bleed ?? 0) + 1
  const groups: StageGroup[] = []
  if (!inlet) return groups
  let { m: flow, p: inletPressure, h: entering } = inlet
  let inletEnthalpy = entering
  if (withAdmission(shape)) {
    const before = state({ p: inletPressure, h: entering })
    inletPressure *= 1 - quantity('admissionLossFraction')
    const ideal = before.outcome === 'state' && state({ p: inletPressure, s: before.s })
    const drop = ideal && ideal.outcome === 'state' ? entering - ideal.h : Number.NaN
    inletEnthalpy = entering - quantity('admissionEfficiency') * drop
  }
  for (let i = 1; i <= last; i++) {
    const outlet = port(i === last ? 'exhaust' : `bleed${i}`)
    if (!outlet) break
    const removes = i < last && withMoistureRemoval(shape)
    const outletEnthalpy = removes
      ? quantity(`groupEndEnthalpy${i}`)
      : i === last
        ? outlet.h - quantity('exhaustLoss')
        : outlet.h
    const leaving = removes ? outletEnthalpy : outlet.h
    groups.push({
      flow,
      inletPressure,
      inletEnthalpy,
      outletPressure: outlet.p,
      outletEnthalpy,
      power: flow * (entering - leaving),
      quantities: { efficiency: `groupEfficiency${i}`, flowConstant: `flowConstant${i}` },
    })
    const rest = flow - outlet.m
    // What the bleed does not take of the energy at the group's end goes on.
    entering = removes ? (flow * outletEnthalpy - outlet.m * outlet.h) / rest : outlet.h
    inletEnthalpy = entering
    inletPressure = outlet.p
    flow = rest
  }
  return groups
}

/** Above it long last blades, where the exhaust is below 1 bar, erode fast: common practice, 10 to 13 %. */
const mostMoisture = 0.12
const longBlades = 1e5

function cautions({ port }: UnitNumbers): Caution[] {
  const found: Caution[] = []
  const entering = moistureOf(port('inlet'))
  if (entering > carriedMoisture) {
    found.push({
      code: 'wet-inlet',
      quantities: ['inlet.x', 'inlet.T'],
      message: 'the entering steam holds {0} of moisture, where it should be dry.',
      values: [[entering, 'ratio']],
      advice: 'Superheat or separate it before the turbine, or check its state.',
    })
  }
  const exhaust = port('exhaust')
  const leaving = moistureOf(exhaust)
  if (exhaust && exhaust.p < longBlades && leaving > mostMoisture) {
    found.push({
      code: 'exhaust-moisture',
      quantities: ['exhaust.x', 'exhaust.p', 'inlet.T'],
      message: 'the exhaust holds {0} of moisture; above {1} the last blades erode fast.',
      values: [
        [leaving, 'ratio'],
        [mostMoisture, 'ratio'],
      ],
      advice: 'Raise the temperature before it, lower the reheat pressure, or remove moisture.',
    })
  }
  return found
}

export const turbine = defineUnitKind({
  name: 'turbine',
  label: 'Turbine',
  idStem: 'turbine',
  group: 'Machines',
  help: 'Expands steam in stage groups; between them steam is bled to the heaters.',
  ports: {
    inlet: { direction: 'in', carries: 'steam', pressure: 'own', label: 'Inlet' },
    bleed: {
      direction: 'out',
      repeated: true,
      optional: true,
      carries: 'steam',
      pressure: 'own',
      designed: ['p'],
      label: 'Bleed',
    },
    exhaust: {
      direction: 'out',
      carries: 'steam',
      pressure: 'own',
      designed: ['p'],
      label: 'Exhaust',
    },
  },
  quantities: {
    groupEfficiency: {
      label: 'Group efficiency',
      symbol: 'η',
      dimension: 'ratio',
      help: 'Dry isentropic efficiency of the stage group from its own inlet state.',
      usual: 0.87,
      given: true,
      range: [0.75, 0.93],
      basis: commonPractice,
      possible: { above: 0, most: 1 },
      step: 0.01,
      each: perGroup,
    },
    flowConstant: {
      label: 'Flow constant',
      symbol: 'K',
      dimension: 'flowConstant',
      help: "Stodola's ellipse: flow over the root of p/v and of 1 − (p_out/p_in)²; the group's swallowing capacity.",
      each: perGroup,
    },
    wetnessFactor: {
      label: 'Wetness factor',
      symbol: 'a',
      dimension: 'number',
      help: 'Loss of efficiency for each unit of mean moisture on the wet part of the expansion (Baumann).',
      usual: 1,
      given: true,
      range: [0.4, 2],
      basis: 'K. Baumann, J. IEE 59 (1921); spread from practice',
      possible: { least: 0 },
      step: 0.1,
    },
    exhaustLoss: {
      label: 'Exhaust loss',
      symbol: 'ΔhEL',
      dimension: 'specificEnthalpy',
      help: 'Leaving and hood losses: what the exhaust keeps above the end of the expansion line.',
      usual: 0,
      given: true,
      range: [0, 60e3],
      basis: commonPractice,
      possible: { least: 0 },
      step: 1e3,
    },
    exhaustVolumeFlow: {
      label: 'Exhaust volume flow',
      symbol: 'V',
      dimension: 'volumeFlow',
      help: 'Volume flow at the end of the expansion line, before the exhaust loss.',
    },
    exhaustArea: {
      label: 'Exhaust area',
      symbol: 'A',
      dimension: 'area',
      help: 'Annulus area of the last stage, all exhaust ends together.',
      possible: { above: 0 },
      step: 0.1,
    },
    exhaustVelocity: {
      label: 'Exhaust velocity',
      symbol: 'c',
      dimension: 'velocity',
      help: 'Axial velocity through the annulus.',
      range: [120, 300],
      basis: commonPractice,
      step: 10,
    },
    admissionLossFraction: {
      label: 'Admission pressure loss',
      symbol: 'Δp/p',
      dimension: 'ratio',
      help: 'Part of the inlet pressure that valves and control stage take before the first group.',
      usual: 0.03,
      given: true,
      range: [0.02, 0.04],
      basis: `${commonPractice}, valves wide open`,
      possible: { least: 0, below: 1 },
      step: 0.01,
      when: withAdmission,
    },
    admissionEfficiency: {
      label: 'Admission efficiency',
      symbol: 'η',
      dimension: 'ratio',
      help: 'Isentropic efficiency of the admission; 0 is pure throttling.',
      usual: 0,
      given: true,
      range: [0, 0.8],
      basis: `${commonPractice}: 0.6 to 0.8 of a control stage`,
      possible: { least: 0, most: 1 },
      step: 0.01,
      when: withAdmission,
    },
    moistureRemoval: {
      label: 'Moisture removal',
      symbol: 'r',
      dimension: 'ratio',
      help: 'Part of the moisture at the end of the group that leaves with the bleed as saturated liquid.',
      usual: 0.2,
      given: true,
      range: [0, 0.5],
      basis: commonPractice,
      possible: { least: 0, most: 1 },
      step: 0.01,
      each: perBleed,
      when: withMoistureRemoval,
    },
    groupEndEnthalpy: {
      label: 'Group end enthalpy',
      symbol: 'h',
      dimension: 'specificEnthalpy',
      help: 'Enthalpy at the end of the group, before moisture is taken out.',
      each: perBleed,
      when: withMoistureRemoval,
    },
    bleedSteam: {
      label: 'Bleed steam',
      symbol: 'm',
      dimension: 'massFlow',
      help: 'Flow of the bleed less the water that is taken out with it.',
      possible: { least: 0 },
      each: perBleed,
      when: withMoistureRemoval,
    },
    power: {
      label: 'Power',
      symbol: 'P',
      dimension: 'power',
      help: 'Power of the steam on the shaft, before mechanical losses.',
      step: 1e6,
    },
  },
  options: {
    admission: {
      label: 'Admission',
      help: 'Valves and control stage before the first group, with a pressure loss and an efficiency.',
    },
    moistureRemoval: {
      label: 'Moisture removal',
      help: 'Part of the moisture leaves with each bleed.',
    },
    controlledBleeds: {
      label: 'Controlled bleeds',
      help: 'Bleeds whose pressure a control valve holds when the hardware is frozen.',
      list: { numbersOf: 'bleed' },
    },
    splitFrom: {
      label: 'Split from',
      help: 'For each stage group the group of the hardware that it is part of.',
      list: { each: perGroup },
    },
  },
  chief: 'power',
  shaft: 'driving',
  equations: ({ ports: { inlet, bleed, exhaust }, quantities: q, shape }) => {
    const equations: Record<string, Equation> = {}
    const last = bleed.length
    const outlets = [...bleed, exhaust]
    equations.massBalance = massBalance(inlet.m, plus(...outlets.map((outlet) => outlet.m)))
    // The state where the expansion ends, before the exhaust loss is added.
    const endEnthalpy = minus(exhaust.h, q.exhaustLoss)
    let start: GroupEnd = inlet
    if (withAdmission(shape)) {
      const p = times(inlet.p, minus(one, q.admissionLossFraction))
      const isentropicEnd = enthalpyAtEntropy(p, inlet.s)
      const used = times(q.admissionEfficiency, minus(inlet.h, isentropicEnd))
      start = { p, h: minus(inlet.h, used) }
    }
    for (let i = 0; i <= last; i++) {
      const outlet = outlets[i]!
      const removes = i < last && withMoistureRemoval(shape)
      const endOfLine = i === last ? endEnthalpy : outlet.h
      const end = { p: outlet.p, h: removes ? q.groupEndEnthalpy[i]! : endOfLine }
      const s = entropy(start.p, start.h)
      const isentropicEnd = enthalpyAtEntropy(end.p, s)
      const drop = minus(start.h, isentropicEnd)
      const wet = wetFactor(q.wetnessFactor, start, end, s, isentropicEnd)
      const efficiency = times(q.groupEfficiency[i]!, wet)
      equations[`expansion${i + 1}`] = equal(end.h, minus(start.h, times(efficiency, drop)))
      const through = plus(...outlets.slice(i).map((stream) => stream.m))
      equations[`flowLaw${i + 1}`] = equal(
        times(signedSquare(through), times(start.p, volume(start.p, start.h))),
        times(square(q.flowConstant[i]!), minus(square(start.p), square(end.p))),
      )
      start = end
      if (removes) {
        // Water taken out, as a part of the group's flow; the rest shares the remaining state.
        const water = times(q.moistureRemoval[i]!, moisture(end.p, end.h))
        const liquid = liquidEnthalpy(end.p)
        const rest = divide(minus(end.h, times(water, liquid)), minus(one, water))
        const removed = times(water, through)
        const bled = plus(times(removed, liquid), times(minus(outlet.m, removed), rest))
        equations[`bleedState${i + 1}`] = equal(outlet.h, mixedEnthalpy(bled, outlet.m, rest))
        equations[`bleedSteam${i + 1}`] = equal(q.bleedSteam[i]!, minus(outlet.m, removed))
        start = { p: end.p, h: rest }
      }
    }
    equations.exhaustVolume = equal(
      q.exhaustVolumeFlow,
      times(exhaust.m, volume(exhaust.p, endEnthalpy)),
    )
    equations.exhaustVelocity = equal(q.exhaustVelocity, divide(q.exhaustVolumeFlow, q.exhaustArea))
    equations.energyBalance = equal(
      q.power,
      minus(energy(inlet), plus(...outlets.map((outlet) => energy(outlet)))),
    )
    return equations
  },
  totals: ({ quantities: q }) => ({ turbinePower: q.power }),
  controlled: (shape) => {
    const numbers = shape.options.controlledBleeds
    return Array.isArray(numbers) ? numbers : []
  },
  freezing: ({ shape, drivesGenerator }) => {
    const controlled = shape.options.controlledBleeds
    const rules: FreezeRule[] = [
      {
        quantity: 'exhaustLoss',
        frees: [],
        onlyGiven: true,
        law: { against: 'exhaustVolumeFlow', exponent: 2 },
      },
    ]
    for (let i = 1; i <= (shape.streams.bleed ?? 0) + 1; i++) {
      // Without a generator the inlet valve follows the pump; behind a controlled bleed it follows that.
      const followsValve = i === 1 && !drivesGenerator
      const followsBleed = Array.isArray(controlled) && controlled.includes(i - 1)
      if (!followsValve && !followsBleed) rules.push({ quantity: `flowConstant${i}`, frees: [] })
    }
    return rules
  },
  secondLaw: 'adiabatic',
  paths: (shape) => {
    const bleeds = shape.streams.bleed ?? 0
    const ends = ['inlet', ...Array.from({ length: bleeds }, (_, k) => `bleed${k + 1}`), 'exhaust']
    return ends.slice(1).map((to, k) => ({ from: ends[k]!, to, course: 'expansion' as const }))
  },
  stageGroups,
  cautions,
  starts: { bleed: 'expanded', exhaust: 'expanded' },
})
