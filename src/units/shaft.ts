import {
  constant,
  type Equation,
  type Expression,
  equal,
  minus,
  plus,
  times,
} from '../equations/expression/index.ts'
import { commonPractice } from './common.ts'
import type { QuantityTable } from './kind.ts'

/** What every shaft has. */
const lineQuantities = {
  mechanicalEfficiency: {
    label: 'Mechanical efficiency',
    symbol: 'ηm',
    dimension: 'ratio',
    help: 'What the bearings leave of the turbine power, the part of the loss that grows with load.',
    usual: 0.99,
    given: true,
    range: [0.985, 0.997],
    basis: commonPractice,
    possible: { above: 0, most: 1 },
    step: 0.01,
  },
  mechanicalLoss: {
    label: 'Fixed mechanical loss',
    symbol: 'Pm',
    dimension: 'power',
    help: 'The part of the mechanical loss that does not shrink with load.',
    usual: 0,
    given: true,
    basis: commonPractice,
    possible: { least: 0 },
    step: 1e4,
  },
} as const satisfies QuantityTable

/** What a shaft with a generator has besides. */
const generatorQuantities = {
  generatorEfficiency: {
    label: 'Generator efficiency',
    symbol: 'ηg',
    dimension: 'ratio',
    help: 'Generator power over its input, before the fixed loss.',
    usual: 0.985,
    given: true,
    range: [0.965, 0.99],
    basis: commonPractice,
    possible: { above: 0, most: 1 },
    step: 0.01,
  },
  generatorLoss: {
    label: 'Fixed generator loss',
    symbol: 'Pg',
    dimension: 'power',
    help: 'The part of the generator loss that does not shrink with load.',
    usual: 0,
    given: true,
    basis: commonPractice,
    possible: { least: 0 },
    step: 1e4,
  },
  generatorInput: {
    label: 'Generator input',
    symbol: 'Pin',
    dimension: 'power',
    help: 'Power that the shaft hands to the generator.',
    step: 1e6,
  },
  generatorPower: {
    label: 'Generator power',
    symbol: 'Pel',
    dimension: 'power',
    help: 'Electric power at the generator terminals.',
    step: 1e6,
  },
} as const satisfies QuantityTable

/** Every quantity that a shaft may have. */
export const shaftQuantities: QuantityTable = { ...lineQuantities, ...generatorQuantities }

/** The quantities of a shaft with or without a generator. */
export function quantitiesOfShaft(generator: boolean): QuantityTable {
  return generator ? shaftQuantities : lineQuantities
}

/** Turbines drive; pumps and the generator take. Without a generator the balance fixes a flow. */
export function shaftEquations(
  turbinePowers: readonly Expression[],
  pumpPowers: readonly Expression[],
  quantity: (name: string) => Expression,
  generator: boolean,
): Record<string, Equation> {
  const left = minus(
    minus(
      times(plus(...turbinePowers), quantity('mechanicalEfficiency')),
      quantity('mechanicalLoss'),
    ),
    plus(...pumpPowers),
  )
  if (!generator) return { powerBalance: equal(left, constant(0)) }
  return {
    powerBalance: equal(quantity('generatorInput'), left),
    generator: equal(
      quantity('generatorPower'),
      minus(
        times(quantity('generatorEfficiency'), quantity('generatorInput')),
        quantity('generatorLoss'),
      ),
    ),
  }
}
