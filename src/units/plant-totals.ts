import {
  divide,
  type Equation,
  type Expression,
  equal,
  isConstant,
  minus,
  plus,
  times,
} from '../equations/expression/index.ts'
import type { QuantityTable, TotalName } from './kind.ts'

/** The plant as a whole; any of these can be given. */
export const plantQuantities = {
  heatInput: {
    label: 'Heat input',
    symbol: 'Q',
    dimension: 'heatFlow',
    help: 'Heat that boilers and reheaters hand to the steam.',
    step: 1e6,
  },
  turbineHeat: {
    label: 'Turbine cycle heat',
    symbol: 'Qt',
    dimension: 'heatFlow',
    help: 'Heat input less what blowdown carries off and what the lines between boiler and turbine lose.',
    step: 1e6,
  },
  fuelHeat: {
    label: 'Fuel heat',
    symbol: 'Qf',
    dimension: 'heatFlow',
    help: 'Heat of all fuel burnt.',
    step: 1e6,
  },
  recoveredHeat: {
    label: 'Recovered heat',
    symbol: 'Qr',
    dimension: 'heatFlow',
    help: 'Heat from outside the cycle that costs no fuel.',
    step: 1e6,
  },
  processHeat: {
    label: 'Process heat',
    symbol: 'Qp',
    dimension: 'heatFlow',
    help: 'Heat delivered to heat users.',
    step: 1e6,
  },
  turbinePower: {
    label: 'Turbine power',
    symbol: 'Pt',
    dimension: 'power',
    help: 'Power of the steam on all turbine shafts.',
    step: 1e6,
  },
  pumpPower: {
    label: 'Pump power',
    symbol: 'Pp',
    dimension: 'power',
    help: 'Power at all pump shafts.',
    step: 1e5,
  },
  cyclePower: {
    label: 'Cycle power',
    symbol: 'Pc',
    dimension: 'power',
    help: 'Turbine power less pump power.',
    step: 1e6,
  },
  grossPower: {
    label: 'Gross power',
    symbol: 'Pg',
    dimension: 'power',
    help: 'Power at the terminals of all generators.',
    step: 1e6,
  },
  otherAuxiliary: {
    label: 'Other auxiliaries',
    symbol: 'Pa',
    dimension: 'power',
    help: 'Electric power of mills, fans, cooling and the rest, besides the pumps.',
    usual: 0,
    given: true,
    possible: { least: 0 },
    step: 1e5,
  },
  auxiliaryPower: {
    label: 'Auxiliary power',
    symbol: 'Paux',
    dimension: 'power',
    help: 'Electric power of the pumps and of other auxiliaries.',
    step: 1e5,
  },
  netPower: {
    label: 'Net power',
    symbol: 'Pn',
    dimension: 'power',
    help: 'Gross power less auxiliary power.',
    step: 1e6,
  },
  heatRejected: {
    label: 'Heat rejected',
    symbol: 'Qc',
    dimension: 'heatFlow',
    help: 'Heat that the condensers give to the cooling water.',
    step: 1e6,
  },
  cycleEfficiency: {
    label: 'Cycle efficiency',
    symbol: 'ηc',
    dimension: 'ratio',
    help: 'Cycle power over heat input.',
    step: 0.01,
  },
  grossTurbineHeatRate: {
    label: 'Gross turbine heat rate',
    symbol: 'GTHR',
    dimension: 'heatRate',
    help: 'Turbine cycle heat over gross power.',
    step: 0.01,
  },
  netTurbineHeatRate: {
    label: 'Net turbine heat rate',
    symbol: 'NTHR',
    dimension: 'heatRate',
    help: 'Turbine cycle heat over gross power less the electric power of the pumps.',
    step: 0.01,
  },
  unitHeatRate: {
    label: 'Unit heat rate, net',
    symbol: 'HR',
    dimension: 'heatRate',
    help: 'Fuel heat over net power.',
    step: 0.01,
  },
  unitEfficiency: {
    label: 'Unit efficiency, net',
    symbol: 'η',
    dimension: 'ratio',
    help: 'Net power over fuel heat.',
    step: 0.01,
  },
  backWorkRatio: {
    label: 'Back work ratio',
    symbol: 'bwr',
    dimension: 'ratio',
    help: 'Pump power over turbine power.',
    step: 0.001,
  },
  steamRate: {
    label: 'Steam rate',
    symbol: 'SR',
    dimension: 'steamRate',
    help: 'Steam of all boilers over net power.',
    step: 1e-8,
  },
} as const satisfies QuantityTable

type PlantQuantity = keyof typeof plantQuantities

/** The plant's sums and ratios from what the units add: totals over totals, never specific values. */
export function plantEquations(
  sum: (name: TotalName) => Expression,
  generatorPowers: readonly Expression[],
  quantity: (name: PlantQuantity) => Expression,
): Record<string, Equation> {
  const q = quantity
  // A whole given as 0 would leave no ratio in the product, and the part no freedom.
  const ratio = (name: PlantQuantity, part: Expression, whole: Expression): Equation =>
    isConstant(whole, 0)
      ? equal(q(name), divide(part, whole))
      : { ...equal(times(q(name), whole), part), divisor: whole }
  return {
    heatInput: equal(q('heatInput'), sum('heatInput')),
    turbineHeat: equal(
      q('turbineHeat'),
      minus(minus(q('heatInput'), sum('turbineHeatCredit')), sum('lineHeatLoss')),
    ),
    fuelHeat: equal(q('fuelHeat'), sum('fuelHeat')),
    recoveredHeat: equal(q('recoveredHeat'), sum('recoveredHeat')),
    processHeat: equal(q('processHeat'), sum('processHeat')),
    turbinePower: equal(q('turbinePower'), sum('turbinePower')),
    pumpPower: equal(q('pumpPower'), sum('pumpPower')),
    cyclePower: equal(q('cyclePower'), minus(q('turbinePower'), q('pumpPower'))),
    grossPower: equal(q('grossPower'), plus(...generatorPowers)),
    auxiliaryPower: equal(q('auxiliaryPower'), plus(sum('electricPower'), q('otherAuxiliary'))),
    netPower: equal(q('netPower'), minus(q('grossPower'), q('auxiliaryPower'))),
    heatRejected: equal(q('heatRejected'), sum('heatRejected')),
    // Ratios as products: with the ratio given they are linear in what it relates.
    cycleEfficiency: ratio('cycleEfficiency', q('cyclePower'), q('heatInput')),
    grossTurbineHeatRate: ratio('grossTurbineHeatRate', q('turbineHeat'), q('grossPower')),
    netTurbineHeatRate: ratio(
      'netTurbineHeatRate',
      q('turbineHeat'),
      minus(q('grossPower'), sum('electricPower')),
    ),
    unitHeatRate: ratio('unitHeatRate', q('fuelHeat'), q('netPower')),
    unitEfficiency: ratio('unitEfficiency', q('netPower'), q('fuelHeat')),
    backWorkRatio: ratio('backWorkRatio', q('pumpPower'), q('turbinePower')),
    steamRate: ratio('steamRate', sum('boilerSteam'), q('netPower')),
  }
}
