import type { Figure, Piece } from './answer.ts'
import type { Call, Leaf, StatementNode } from './statement-tree.ts'

interface Printed {
  readonly pieces: readonly Piece[]
  /** 1 sum, 2 product or quotient, 3 power, 4 atom. */
  readonly strength: number
}

/** How leaves, calls and plain numbers look in a line. */
interface Style {
  leaf(leaf: Leaf): readonly Piece[]
  /** Undefined: printed with its operands. */
  call(call: Call): readonly Piece[] | undefined
  number(value: number): string
  /** The common unit of a bracket's terms, drawn behind it. */
  bracket(node: StatementNode): readonly Piece[] | undefined
}

/** A node in symbols. `stepOf`: calls that are printed as the step that they are. */
export function symbols(
  node: StatementNode,
  stepOf: (call: Call) => number | undefined = () => undefined,
): readonly Piece[] {
  return print(node, {
    leaf: ({ path, symbol }) => [path === undefined ? (symbol ?? '') : { path }],
    call: (call) => {
      const step = call === node ? undefined : stepOf(call)
      return step === undefined ? undefined : [{ step }]
    },
    number: plain,
    bracket: () => undefined,
  }).pieces
}

/** A node in figures. `isWhole`: a call at the top is printed with its operands, not as its result. */
export function figures(
  node: StatementNode,
  isWhole: boolean,
  figureOf: (node: Leaf | Call) => Figure | undefined,
): Piece[] {
  const style: Style = {
    leaf: (leaf) => [figureOf(leaf) as Figure],
    call: (call) => {
      const figure = isWhole && call === node ? undefined : figureOf(call)
      return figure && [figure]
    },
    number: plain,
    bracket: (sum) => {
      if (sum.type !== 'sum') return undefined
      const parts = sum.terms.map(({ node: term }) =>
        term.type === 'leaf' || term.type === 'call' ? figureOf(term) : undefined,
      )
      const [first] = parts
      if (!first || first.unit === '' || first.unit === '%') return undefined
      if (parts.some((part) => part?.unit !== first.unit)) return undefined
      const pieces: Piece[] = ['(']
      sum.terms.forEach(({ isNegative }, k) => {
        const figure = parts[k] as Figure
        const sign = isNegative ? '−' : '+'
        if (k > 0) pieces.push(` ${sign} `)
        else if (isNegative) pieces.push('−')
        const isBracketed = figure.figure.startsWith('−') && (k > 0 || isNegative)
        if (isBracketed) pieces.push('(')
        pieces.push({ ...figure, unit: '' })
        if (isBracketed) pieces.push(')')
      })
      return [...pieces, `) ${asDifference(first.unit)}`]
    },
  }
  return [...print(node, style).pieces]
}

/** What the difference of two temperatures is measured in. */
function asDifference(unit: string): string {
  return unit === '°C' ? 'K' : unit
}

/** A constant of an equation, with all its digits. */
function plain(value: number): string {
  return String(value).replace('-', '−')
}

/** Whether a printed piece starts with a minus: then it stands in brackets within a line. */
function isMinus(pieces: readonly Piece[]): boolean {
  const [first] = pieces
  if (first === undefined) return false
  if (typeof first === 'string') return first.startsWith('−')
  return 'figure' in first && first.figure.startsWith('−')
}

function wrapped(
  printed: Printed,
  strength: number,
  node: StatementNode,
  style: Style,
  isFirst = false,
): readonly Piece[] {
  if (printed.strength >= strength && (isFirst || !isMinus(printed.pieces))) return printed.pieces
  return style.bracket(node) ?? ['(', ...printed.pieces, ')']
}

function print(node: StatementNode, style: Style): Printed {
  const inner = (one: StatementNode, strength: number, isFirst = false): readonly Piece[] =>
    wrapped(print(one, style), strength, one, style, isFirst)
  switch (node.type) {
    case 'leaf':
      return { pieces: style.leaf(node), strength: 4 }
    case 'number':
      return { pieces: [style.number(node.value)], strength: 4 }
    case 'call': {
      const short = style.call(node)
      if (short) return { pieces: short, strength: 4 }
      const pieces: Piece[] = [`${node.name}(`]
      node.operands.forEach((operand, k) => {
        if (k > 0) pieces.push(', ')
        if (node.lastOperand !== undefined && k === node.operands.length - 1) {
          pieces.push(`${node.lastOperand} = `)
        }
        pieces.push(...print(operand, style).pieces)
      })
      return { pieces: [...pieces, ')'], strength: 4 }
    }
    case 'sum': {
      const pieces: Piece[] = []
      node.terms.forEach(({ isNegative, node: term }, k) => {
        if (k > 0) pieces.push(isNegative ? ' − ' : ' + ')
        else if (isNegative) pieces.push('−')
        pieces.push(...inner(term, 2, k === 0 && !isNegative))
      })
      return { pieces, strength: 1 }
    }
    case 'product': {
      const pieces: Piece[] = []
      node.factors.forEach((factor, k) => {
        if (k > 0) pieces.push(' × ')
        // A quotient that is not the first factor would be read as dividing all before it.
        pieces.push(...inner(factor, k === 0 ? 2 : factor.type === 'quotient' ? 3 : 2, k === 0))
      })
      return { pieces, strength: 2 }
    }
    case 'quotient':
      return {
        pieces: [...inner(node.over, 2, true), ' / ', ...inner(node.under, 3)],
        strength: 2,
      }
    case 'power':
      return {
        pieces: [...inner(node.base, 4), '^', ...inner(node.exponent, 4)],
        strength: 3,
      }
    case 'square':
      return { pieces: [...squared(inner(node.operand, 4))], strength: 3 }
    case 'root':
      return { pieces: ['√(', ...print(node.operand, style).pieces, ')'], strength: 4 }
    case 'logarithm':
      return { pieces: ['ln(', ...print(node.operand, style).pieces, ')'], strength: 4 }
    case 'exponential':
      return { pieces: ['exp(', ...print(node.operand, style).pieces, ')'], strength: 4 }
  }
}

/** A figure with a unit stands in brackets: 5 kg/s² would be read otherwise. */
function squared(pieces: readonly Piece[]): readonly Piece[] {
  const [first] = pieces
  const isPlain =
    pieces.length === 1 && (typeof first === 'string' || (first && !('figure' in first)))
  if (isPlain) return [...pieces, '²']
  return typeof first === 'string' && first.startsWith('(') && pieces.at(-1) === ')'
    ? [...pieces, '²']
    : ['(', ...pieces, ')²']
}
