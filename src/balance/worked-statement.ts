import type { Dimension } from '../quantity/dimension.ts'
import type { UnitChoice } from '../quantity/unit-set.ts'
import { toShown, type UnitOfMeasure, unitNamed } from '../quantity/units-of-measure.ts'
import type { Figure, Piece, Worked, WorkedStep } from './answer.ts'
import { lineUnits, type UnitFor } from './coherent-units.ts'
import { figureText, readBack } from './figure-text.ts'
import { figures, symbols } from './statement-text.ts'
import {
  type Call,
  evaluate,
  type Leaf,
  partsOf,
  type StatementNode,
  solvedValue,
} from './statement-tree.ts'

/** Digits beyond the usual ones that a line may need before its figures agree. */
const mostExtraDigits = 11
/** A statement of more pieces refers to its steps instead of repeating them. */
const longest = 17
/** A result this small beside its terms is what rounding leaves: nought, */
const roundOff = 1e-9
/** and its figures show it to this, beside the terms. */
const nought = 1e-7
/** Units are coherent when reckoning with the numbers shown gives the result to this, relative. */
const coherent = 1e-9

interface Statement {
  readonly left: StatementNode
  readonly right: StatementNode
  /** The left side is the quantity asked for. */
  readonly isExplicit: boolean
}

/** An equation in figures that agree; undefined where it has none (a quantity is open). */
export function workedStatement(statement: Statement, units: UnitChoice): Worked | undefined {
  const { left, right } = statement
  const value = solvedValue(left)
  if (value === undefined || solvedValue(right) === undefined) return undefined
  const steps = stepsOf(statement)
  const dimension = left.type === 'leaf' ? left.dimension : sideDimension(left, right)
  for (const { unitFor, own } of lineUnits(units, dimension, value)) {
    if (!isCoherent(statement, steps, unitFor, dimension, own)) continue
    for (let extra = 0; extra <= mostExtraDigits; extra++) {
      const worked = new Attempt(statement, steps, unitFor, own, dimension, units, extra).work()
      if (worked) return worked
    }
  }
  return undefined
}

/** Both sides of an equation without explicit form measure the same; either may tell what. */
function sideDimension(left: StatementNode, right: StatementNode): Dimension {
  for (const side of [left, right]) {
    const [first] = [side, ...partsOf(side)].filter((node) => node.type === 'leaf')
    if (first && side.type !== 'product' && side.type !== 'quotient') return first.dimension
  }
  return 'number'
}

/** The calls of a statement, inner ones first, each once. A side that is a call is no step. */
function stepsOf({ left, right }: Statement): Call[] {
  const found = new Map<string, Call>()
  const visit = (node: StatementNode): void => {
    for (const part of partsOf(node)) visit(part)
    if (node.type !== 'call' || node === right || node === left) return
    const key = keyOf(node)
    if (!found.has(key)) found.set(key, node)
  }
  visit(left)
  visit(right)
  return [...found.values()]
}

function keyOf(call: Call): string {
  return JSON.stringify(symbols(call))
}

/** The number that a reader reckons with: per cent is read as a hundredth. */
function reckoned(value: number, dimension: Dimension, unit: UnitOfMeasure): number {
  return dimension === 'ratio' ? value : toShown(value, unit)
}

/** Whether reckoning with the numbers as they are shown gives the numbers that are shown. */
function isCoherent(
  { left, right }: Statement,
  steps: readonly Call[],
  unitFor: UnitFor,
  dimension: Dimension,
  own: UnitOfMeasure,
): boolean {
  const shown = (node: StatementNode): number | undefined =>
    evaluate(node, (one) => {
      const value = one.type === 'leaf' ? one.value : solvedValue(one)
      return value === undefined
        ? undefined
        : reckoned(value, one.dimension, unitFor(one.dimension))
    })
  const agrees = (node: StatementNode, of: Dimension, unit: UnitOfMeasure): boolean => {
    if (node.type === 'leaf' || node.type === 'call') return true
    const value = solvedValue(node)
    const number = shown(node)
    if (value === undefined || number === undefined) return false
    const wanted = reckoned(value, of, unit)
    return (
      Math.abs(number - wanted) <= coherent * Math.max(Math.abs(wanted), magnitude(node, shown))
    )
  }
  if (!isAbsolute(left, unitFor) || !isAbsolute(right, unitFor)) return false
  const calls = [...steps, ...[left, right].filter((side) => side.type === 'call')]
  const operandsAgree = calls.every((call) =>
    call.operands.every((operand, k) => {
      const of = call.operandDimensions[k] as Dimension
      return agrees(operand, of, unitFor(of))
    }),
  )
  if (!operandsAgree) return false
  if (left.type === 'leaf') {
    // A plain copy or a call is shown in the unit of the quantity itself.
    if (right.type === 'leaf') return own === unitFor(right.dimension)
    return agrees(right, dimension, own)
  }
  return agrees(left, dimension, own) && agrees(right, dimension, own)
}

/** Whether every temperature that is a factor is counted from absolute zero. */
function isAbsolute(node: StatementNode, unitFor: UnitFor): boolean {
  const isFactor = (one: StatementNode): boolean =>
    (one.type === 'leaf' || one.type === 'call') &&
    one.dimension === 'temperature' &&
    unitFor('temperature').shift !== undefined
  const isScaled = node.type === 'product' || node.type === 'quotient'
  return partsOf(node).every((part) => !(isScaled && isFactor(part)) && isAbsolute(part, unitFor))
}

/** The sum of the sizes of a node's terms: what its round-off is measured by. */
function magnitude(
  node: StatementNode,
  value: (node: StatementNode) => number | undefined,
): number {
  const size = (one: StatementNode): number => Math.abs(value(one) ?? 0)
  switch (node.type) {
    case 'sum':
      return node.terms.reduce((total, term) => total + magnitude(term.node, value), 0)
    case 'product':
      return node.factors.reduce((total, factor) => total * magnitude(factor, value), 1)
    case 'quotient':
      return magnitude(node.over, value) / (size(node.under) || 1)
    default:
      return size(node)
  }
}

/** A statement printed with a number of extra digits, reckoned from what is printed. */
class Attempt {
  private readonly statement: Statement
  private readonly calls: readonly Call[]
  private readonly unitFor: UnitFor
  private readonly own: UnitOfMeasure
  private readonly dimension: Dimension
  private readonly units: UnitChoice
  private readonly extra: number
  private readonly stepAt = new Map<string, number>()
  private readonly results: Figure[] = []

  constructor(
    statement: Statement,
    calls: readonly Call[],
    unitFor: UnitFor,
    own: UnitOfMeasure,
    dimension: Dimension,
    units: UnitChoice,
    extra: number,
  ) {
    this.statement = statement
    this.calls = calls
    this.unitFor = unitFor
    this.own = own
    this.dimension = dimension
    this.units = units
    this.extra = extra
  }

  work(): Worked | undefined {
    const { left, right, isExplicit } = this.statement
    const steps: WorkedStep[] = []
    for (const call of this.calls) {
      const value = this.call(call)
      if (value === undefined) return undefined
      const unit = this.unitFor(call.dimension)
      const result: Figure = {
        figure: figureText(value, call.dimension, unit, this.units, this.extra, false),
        unit: unit.name,
        step: steps.length,
      }
      const stepOf = (one: Call): number | undefined => this.stepAt.get(keyOf(one))
      steps.push({ symbols: symbols(call, stepOf), figures: this.print(call, true), result })
      this.stepAt.set(keyOf(call), this.results.length)
      this.results.push(result)
    }
    const result = this.result()
    if (result === undefined) return undefined
    const whole = [...symbols(left), ' = ', ...symbols(right)]
    const stepOf = (one: Call): number | undefined => this.stepAt.get(keyOf(one))
    return {
      symbols:
        whole.length <= longest
          ? whole
          : [...symbols(left, stepOf), ' = ', ...symbols(right, stepOf)],
      steps,
      figures: isExplicit
        ? this.print(right, true)
        : [...this.print(left, true), ' = ', ...this.print(right, true)],
      result,
    }
  }

  /** The result, if it follows from the figures printed. */
  private result(): Figure | undefined {
    const { left, right } = this.statement
    const value = solvedValue(left)!
    const path = left.type === 'leaf' ? left.path : undefined
    const figure = (text: string): Figure => ({
      figure: text,
      unit: this.own.name,
      ...(path === undefined ? {} : { path }),
    })
    const reckonedRight = this.side(right)
    if (reckonedRight === undefined) return undefined
    const sizes = magnitude(right, solvedValue)
    if (Math.abs(value) <= roundOff * sizes) {
      return Math.abs(reckonedRight) <= nought * sizes ? figure('0') : undefined
    }
    const print = (one: number): string =>
      figureText(one, this.dimension, this.own, this.units, 0, false)
    const wanted = print(value)
    if (print(reckonedRight) !== wanted) return undefined
    if (left.type !== 'leaf') {
      const reckonedLeft = this.side(left)
      if (reckonedLeft === undefined || print(reckonedLeft) !== wanted) return undefined
    }
    return figure(wanted)
  }

  private side(node: StatementNode): number | undefined {
    return node.type === 'call' ? this.call(node) : this.read(node)
  }

  /** A call's value, SI, from its operands as they are printed. */
  private call(call: Call): number | undefined {
    const operands = call.operands.map((operand) => this.read(operand))
    return operands.some((value) => value === undefined)
      ? undefined
      : call.evaluate(operands as number[])
  }

  /** A node's value, SI, from the figures as they are printed. */
  private read(node: StatementNode): number | undefined {
    return evaluate(node, (one) => {
      if (one.type === 'leaf') return this.back(this.leaf(one), one.dimension)
      const step = this.stepAt.get(keyOf(one))
      return step === undefined ? undefined : this.back(this.results[step]!, one.dimension)
    })
  }

  private back({ figure, unit }: Figure, dimension: Dimension): number | undefined {
    return readBack(figure, unitNamed(dimension, unit) ?? this.unitFor(dimension))
  }

  private leaf({ value, dimension, isGiven, path }: Leaf): Figure {
    const unit = this.unitFor(dimension)
    return {
      figure: figureText(value, dimension, unit, this.units, this.extra, isGiven),
      unit: unit.name,
      ...(path === undefined ? {} : { path }),
    }
  }

  private print(node: StatementNode, isWhole: boolean): Piece[] {
    return figures(node, isWhole, (one) => {
      if (one.type === 'leaf') return this.leaf(one)
      const step = this.stepAt.get(keyOf(one))
      return step === undefined ? undefined : this.results[step]
    })
  }
}
