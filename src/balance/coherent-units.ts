import type { Dimension } from '../quantity/dimension.ts'
import type { UnitChoice } from '../quantity/unit-set.ts'
import { type UnitOfMeasure, unitNamed, unitOf, unitsOf } from '../quantity/units-of-measure.ts'

/** The one unit that all values of a dimension have in a line. */
export type UnitFor = (dimension: Dimension) => UnitOfMeasure

/** kg/s, kPa, kJ/kg and kW go together. */
const engineering: Partial<Record<Dimension, string>> = {
  massFlow: 'kg/s',
  pressure: 'kPa',
  pressureDifference: 'kPa',
  temperature: 'K',
  temperatureDifference: 'K',
  specificEnthalpy: 'kJ/kg',
  specificEntropy: 'kJ/(kg K)',
  specificVolume: 'm³/kg',
  specificHeat: 'kJ/(kg K)',
  power: 'kW',
  heatFlow: 'kW',
  area: 'm²',
  velocity: 'm/s',
  volumeFlow: 'm³/s',
  length: 'm',
  conductance: 'kW/K',
  heatRate: 'J/J',
  entropyFlow: 'kW/K',
  flowConstant: 'm²',
  lossConstant: '1/m⁴',
}

/** SI without prefixes: whatever the equation, these fit. */
const base: Partial<Record<Dimension, string>> = {
  ...engineering,
  pressure: 'Pa',
  pressureDifference: 'Pa',
  specificEnthalpy: 'J/kg',
  specificEntropy: 'J/(kg K)',
  specificHeat: 'J/(kg K)',
  power: 'W',
  heatFlow: 'W',
  conductance: 'W/K',
  entropyFlow: 'W/K',
}

/** Sizes of powers, heat flows and flows that may make a line fit the user's other units. */
const sizes: readonly Partial<Record<Dimension, string>>[] = [
  { power: 'MW', heatFlow: 'MW' },
  { power: 'kW', heatFlow: 'kW' },
  { power: 'W', heatFlow: 'W' },
  { power: 'MW', heatFlow: 'MMBtu/h' },
  { power: 'MW', heatFlow: 'kBtu/h' },
  { power: 'kW', heatFlow: 'kBtu/h', massFlow: 'klb/h' },
  { power: 'kW', heatFlow: 'kBtu/h' },
  { power: 'kW', heatFlow: 'Btu/h' },
]

/** A choice of units for a line. */
export interface LineUnits {
  readonly unitFor: UnitFor
  /** The unit of the result. */
  readonly own: UnitOfMeasure
}

/** Choices of units for a line, those nearest to what the user reads elsewhere first. */
export function lineUnits(
  units: UnitChoice,
  dimension: Dimension,
  value: number,
): readonly LineUnits[] {
  const choice = (names: Partial<Record<Dimension, string>>): UnitFor => {
    const found = new Map<Dimension, UnitOfMeasure>()
    return (of) => {
      let unit = found.get(of)
      if (!unit) {
        unit = unitNamed(of, names[of]) ?? unitOf(of, units)
        found.set(of, unit)
      }
      return unit
    }
  }
  const suited = unitOf(dimension, units, value)
  const kelvin = { temperature: 'K', temperatureDifference: 'K' } as const
  const usual = [
    choice({ [dimension]: suited.name }),
    ...sizes.map(choice),
    ...sizes.slice(0, 3).map((names) => choice({ ...kelvin, ...names })),
  ]
  const others = unitsOf(dimension).filter((unit) => unit !== suited)
  return [
    ...usual.flatMap((unitFor) => [
      { unitFor, own: suited },
      { unitFor, own: unitFor(dimension) },
    ]),
    ...usual.flatMap((unitFor) => others.map((own) => ({ unitFor, own }))),
    ...[engineering, base].flatMap((names) => {
      const unitFor = choice(names)
      return [suited, ...others].map((own) => ({ unitFor, own }))
    }),
  ]
}
