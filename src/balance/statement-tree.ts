import {
  type Application,
  apply,
  type Equation,
  type Expression,
  equal,
  type Operation,
  Outcome,
  solveFor,
  TapeBuilder,
  variable,
} from '../equations/expression/index.ts'
import type { Dimension } from '../quantity/dimension.ts'
import {
  dryness,
  enthalpyAtEntropy,
  enthalpyAtSubcooling,
  enthalpyAtSuperheat,
  enthalpyAtTemperature,
  entropy,
  liquidEnthalpy,
  moisture,
  saturationPressureAt,
  saturationTemperature,
  subcooling,
  superheat,
  temperature,
  vapourEnthalpy,
  volume,
  wetPart,
} from '../steam/operations.ts'

/** A quantity, or a number of the plant that has a symbol but no path (T0). */
export interface Leaf {
  readonly type: 'leaf'
  readonly path?: string
  readonly symbol?: string
  readonly dimension: Dimension
  /** SI. */
  readonly value: number
  /** Given by the user: all its digits count. */
  readonly isGiven: boolean
}

/** A property of steam, a mean difference or a curve: what is read off and not reckoned. */
export interface Call {
  readonly type: 'call'
  readonly name: string
  readonly operands: readonly StatementNode[]
  readonly operandDimensions: readonly Dimension[]
  /** Where the operand's place alone does not say what it is: 'x', 'superheat'. */
  readonly lastOperand?: string
  readonly dimension: Dimension
  /** SI to SI; undefined out of range. */
  evaluate(operands: readonly number[]): number | undefined
}

/** A statement as it is read: sums, products and quotients flattened, steam relations as calls. */
export type StatementNode =
  | Leaf
  | Call
  | { readonly type: 'number'; readonly value: number }
  | {
      readonly type: 'sum'
      readonly terms: readonly { readonly isNegative: boolean; readonly node: StatementNode }[]
    }
  | { readonly type: 'product'; readonly factors: readonly StatementNode[] }
  | { readonly type: 'quotient'; readonly over: StatementNode; readonly under: StatementNode }
  | { readonly type: 'power'; readonly base: StatementNode; readonly exponent: StatementNode }
  | {
      readonly type: 'square' | 'root' | 'logarithm' | 'exponential'
      readonly operand: StatementNode
    }

interface Signature {
  readonly name: string
  readonly operands: readonly Dimension[]
  readonly last?: string
  readonly dimension: Dimension
}

const [a, b, c, d] = [0, 1, 2, 3].map((index) => variable(index, '')) as [
  Expression,
  Expression,
  Expression,
  Expression,
]
const operationOf = (expression: Expression | undefined): Operation =>
  (expression as Application).operation
const inverse = (relation: Expression): Operation =>
  operationOf(solveFor(equal(c, relation), 1) as Expression)

const state: readonly Dimension[] = ['pressure', 'specificEnthalpy']

/** What each steam relation takes and gives. */
const signatures = new Map<Operation, Signature>([
  [operationOf(temperature(a, b)), { name: 'T', operands: state, dimension: 'temperature' }],
  [operationOf(entropy(a, b)), { name: 's', operands: state, dimension: 'specificEntropy' }],
  [operationOf(volume(a, b)), { name: 'v', operands: state, dimension: 'specificVolume' }],
  [operationOf(dryness(a, b)), { name: 'x', operands: state, dimension: 'dryness' }],
  [operationOf(moisture(a, b)), { name: 'moisture', operands: state, dimension: 'dryness' }],
  [
    operationOf(superheat(a, b)),
    { name: 'superheat', operands: state, dimension: 'temperatureDifference' },
  ],
  [
    operationOf(subcooling(a, b)),
    { name: 'subcooling', operands: state, dimension: 'temperatureDifference' },
  ],
  [
    operationOf(saturationTemperature(a)),
    { name: 'Tsat', operands: ['pressure'], dimension: 'temperature' },
  ],
  [
    operationOf(saturationPressureAt(a)),
    { name: 'psat', operands: ['temperature'], dimension: 'pressure' },
  ],
  [
    operationOf(liquidEnthalpy(a)),
    { name: 'h′', operands: ['pressure'], dimension: 'specificEnthalpy' },
  ],
  [
    operationOf(vapourEnthalpy(a)),
    { name: 'h″', operands: ['pressure'], dimension: 'specificEnthalpy' },
  ],
  [
    operationOf(enthalpyAtTemperature(a, b)),
    { name: 'h', operands: ['pressure', 'temperature'], dimension: 'specificEnthalpy' },
  ],
  [
    operationOf(enthalpyAtEntropy(a, b)),
    { name: 'h', operands: ['pressure', 'specificEntropy'], dimension: 'specificEnthalpy' },
  ],
  [
    inverse(volume(a, b)),
    { name: 'h', operands: ['pressure', 'specificVolume'], dimension: 'specificEnthalpy' },
  ],
  [
    inverse(dryness(a, b)),
    { name: 'h', operands: ['pressure', 'dryness'], last: 'x', dimension: 'specificEnthalpy' },
  ],
  [
    operationOf(enthalpyAtSuperheat(a, b)),
    {
      name: 'h',
      operands: ['pressure', 'temperatureDifference'],
      last: 'superheat',
      dimension: 'specificEnthalpy',
    },
  ],
  [
    operationOf(enthalpyAtSubcooling(a, b)),
    {
      name: 'h',
      operands: ['pressure', 'temperatureDifference'],
      last: 'subcooling',
      dimension: 'specificEnthalpy',
    },
  ],
  [
    operationOf(wetPart(a, b, c, d)),
    {
      name: 'wet part',
      operands: ['dryness', 'specificEnthalpy', 'specificEntropy', 'specificEnthalpy'],
      dimension: 'dryness',
    },
  ],
])

/** One operation on a tape of its own; undefined where it has no value. */
function evaluator(
  operation: Operation,
  count: number,
): (operands: readonly number[]) => number | undefined {
  const builder = new TapeBuilder(count)
  const slot = builder.lower(
    apply(operation, ...Array.from({ length: count }, (_, k) => variable(k, ''))),
  )
  const rows = builder.rowsBehind([slot])
  const tape = builder.finish()
  return (operands) => {
    tape.values.set(operands)
    if (tape.evaluate(rows) !== Outcome.fine) return undefined
    const value = tape.values[slot]!
    return Number.isFinite(value) ? value : undefined
  }
}

/** `leafOf` tells what a variable is; `ownDimension` is that of the quantity asked for. */
export function treeOf(
  expression: Expression,
  leafOf: (index: number) => Leaf,
  ownDimension: Dimension,
): StatementNode {
  const tree = (one: Expression): StatementNode => {
    if (one.kind === 'constant') return { type: 'number', value: one.value }
    if (one.kind === 'variable') return leafOf(one.index)
    const { operation } = one
    const operands = one.operands.map(tree)
    const [first, second] = operands as [StatementNode, StatementNode]
    switch (operation.name) {
      case 'sum':
        return sum(operands.map((node) => ({ isNegative: false, node })))
      case 'difference':
        return sum([
          { isNegative: false, node: first },
          { isNegative: true, node: second },
        ])
      case 'negative':
        return sum([{ isNegative: true, node: first }])
      case 'product':
        return product(first, second)
      case 'quotient':
        return quotient(first, second)
      case 'square':
      case 'signedSquare':
        return { type: 'square', operand: first }
      case 'squareRoot':
      case 'signedRoot':
        return { type: 'root', operand: first }
      case 'logarithm':
        return { type: 'logarithm', operand: first }
      case 'exponential':
        return { type: 'exponential', operand: first }
      case 'power':
        return { type: 'power', base: first, exponent: second }
      case 'mixedEnthalpy': {
        const idle = operands[2]!
        return solvedValue(second) === 0 ? idle : { type: 'quotient', over: first, under: second }
      }
      case 'reciprocalMean': {
        const reciprocal = evaluator(operation, 2)
        const mean: Call = {
          type: 'call',
          name: 'LMTD',
          operands,
          operandDimensions: ['temperatureDifference', 'temperatureDifference'],
          dimension: 'temperatureDifference',
          evaluate: (values) => {
            const value = reciprocal(values)
            return value === undefined ? undefined : 1 / value
          },
        }
        return { type: 'quotient', over: { type: 'number', value: 1 }, under: mean }
      }
    }
    const signature = signatures.get(operation)
    return {
      type: 'call',
      name: signature?.name ?? operation.name,
      operands,
      operandDimensions: signature?.operands ?? operands.map((node) => dimensionOf(node)),
      ...(signature?.last === undefined ? {} : { lastOperand: signature.last }),
      dimension: signature?.dimension ?? ownDimension,
      evaluate: evaluator(operation, operands.length),
    }
  }
  return tree(expression)
}

function sum(
  terms: readonly { readonly isNegative: boolean; readonly node: StatementNode }[],
): StatementNode {
  const flat = terms.flatMap(({ isNegative, node }) =>
    node.type === 'sum'
      ? node.terms.map((term) => ({ ...term, isNegative: term.isNegative !== isNegative }))
      : [{ isNegative, node }],
  )
  return { type: 'sum', terms: flat }
}

function product(first: StatementNode, second: StatementNode): StatementNode {
  // A reciprocal divides.
  if (second.type === 'quotient' && isOne(second.over)) {
    return { type: 'quotient', over: first, under: second.under }
  }
  const factors = [first, second].flatMap((node) =>
    node.type === 'product' ? node.factors : [node],
  )
  return { type: 'product', factors }
}

/** A flow that multiplies and divides alike (the mixture of one stream) is left out. */
function quotient(over: StatementNode, under: StatementNode): StatementNode {
  const plain: StatementNode = { type: 'quotient', over, under }
  if (over.type !== 'product' || under.type !== 'leaf' || under.value === 0) return plain
  const at = over.factors.findIndex(
    (factor) => factor.type === 'leaf' && factor.path === under.path,
  )
  if (at < 0 || under.path === undefined) return plain
  const [first, ...others] = over.factors.filter((_, k) => k !== at)
  if (!first) return plain
  return others.length === 0 ? first : { type: 'product', factors: [first, ...others] }
}

const isOne = (node: StatementNode): boolean => node.type === 'number' && node.value === 1

/** What a node measures, as far as its parts tell. */
function dimensionOf(node: StatementNode): Dimension {
  switch (node.type) {
    case 'leaf':
    case 'call':
      return node.dimension
    case 'sum': {
      const dimensions = node.terms.map((term) => dimensionOf(term.node))
      if (!dimensions.includes('temperature')) return dimensions[0] ?? 'number'
      let count = 0
      node.terms.forEach(({ isNegative }, k) => {
        if (dimensions[k] === 'temperature') count += isNegative ? -1 : 1
      })
      return count === 0 ? 'temperatureDifference' : 'temperature'
    }
    default:
      return 'number'
  }
}

/** A node's own value, SI; `leaf` may put other numbers in place of those of leaves and calls. */
export function evaluate(
  node: StatementNode,
  leaf: (node: Leaf | Call) => number | undefined,
): number | undefined {
  const inner = (one: StatementNode): number => evaluate(one, leaf) ?? Number.NaN
  const value = ((): number => {
    switch (node.type) {
      case 'leaf':
      case 'call':
        return leaf(node) ?? Number.NaN
      case 'number':
        return node.value
      case 'sum':
        return node.terms.reduce(
          (total, { isNegative, node: term }) => total + (isNegative ? -1 : 1) * inner(term),
          0,
        )
      case 'product':
        return node.factors.reduce((total, factor) => total * inner(factor), 1)
      case 'quotient':
        return inner(node.over) / inner(node.under)
      case 'power':
        return inner(node.base) ** inner(node.exponent)
      case 'square':
        return inner(node.operand) ** 2
      case 'root':
        return Math.sqrt(inner(node.operand))
      case 'logarithm':
        return Math.log(inner(node.operand))
      case 'exponential':
        return Math.exp(inner(node.operand))
    }
  })()
  return Number.isFinite(value) ? value : undefined
}

/** A node's value from the solution. */
export function solvedValue(node: StatementNode): number | undefined {
  return evaluate(node, (one) => (one.type === 'leaf' ? one.value : callValue(one)))
}

function callValue(call: Call): number | undefined {
  const operands = call.operands.map(solvedValue)
  return operands.some((value) => value === undefined)
    ? undefined
    : call.evaluate(operands as number[])
}

/** The parts of a node, in the order in which they are read. */
export function partsOf(node: StatementNode): readonly StatementNode[] {
  switch (node.type) {
    case 'leaf':
    case 'number':
      return []
    case 'call':
      return node.operands
    case 'sum':
      return node.terms.map((term) => term.node)
    case 'product':
      return node.factors
    case 'quotient':
      return [node.over, node.under]
    case 'power':
      return [node.base, node.exponent]
    default:
      return [node.operand]
  }
}

/** The two sides of an equation, solved for a variable where it can be. */
export function sidesFor(
  equation: Equation,
  index: number,
): { readonly left: Expression; readonly right: Expression; readonly isExplicit: boolean } {
  const explicit = solveFor(equation, index)
  return explicit === undefined
    ? { left: equation.left, right: equation.right, isExplicit: false }
    : { left: variable(index, ''), right: explicit, isExplicit: true }
}
