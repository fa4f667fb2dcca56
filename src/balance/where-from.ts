import {
  divide,
  type Expression,
  forEachVariable,
  minus,
  plus,
  print,
  times,
  variable,
} from '../equations/expression/index.ts'

import type { Dimension } from '../quantity/dimension.ts'
import type { UnitChoice } from '../quantity/unit-set.ts'
import {
  dryness,
  entropy,
  subcooling,
  superheat,
  temperature,
  volume,
} from '../steam/operations.ts'
import type { Origin, OwnEquation, Token } from './answer.ts'
import type { Model } from './model.ts'
import type { Results } from './results.ts'
import { auditNames } from './second-law.ts'
import { symbols } from './statement-text.ts'
import { type Leaf, sidesFor, treeOf } from './statement-tree.ts'
import { assemble, type SystemEquation } from './system.ts'
import { workedStatement } from './worked-statement.ts'

/** Around a name inside printed text; characters that no label or number has. */
const open = '\uE000'
const close = '\uE001'
const constantMark = '\uE002'

/** A quantity's equation as expressions whose variables stand for `leaves`. */
interface Statement {
  readonly left: Expression
  readonly right: Expression
  readonly isExplicit: boolean
  readonly leafOf: (index: number) => Leaf
}

type Found = Omit<Origin, 'statement' | 'inputs' | 'worked'> & {
  /** The first is preferred; the others are for where it has no figures. */
  readonly statements: readonly Statement[]
}

/**
 * Which equation fixed a quantity, what it was solved together with, and what went in. With units of
 * measure the equation is also worked out in figures that agree.
 */
export function whereFrom(
  model: Model,
  path: string,
  results?: Results,
  units?: UnitChoice,
): Origin {
  const { statements, ...found } = new Finder(model, results).find(path)
  const [statement] = statements
  if (!statement) return { ...found, statement: [], inputs: [] }
  const inputs = new Set<string>()
  const take = ({ index }: { readonly index: number }): void => {
    const { path: other } = statement.leafOf(index)
    if (other !== undefined && other !== path) inputs.add(other)
  }
  forEachVariable(statement.left, take)
  forEachVariable(statement.right, take)
  const worked = units && workedOf(statements, units, statement)
  return {
    ...found,
    statement: tokensOf(statement),
    inputs: [...inputs],
    ...(worked ? { worked } : {}),
  }
}

/** The equations of a unit, a shaft or the plant, each as it was used. */
export function equationsOf(
  model: Model,
  owner: string,
  results: Results,
  units: UnitChoice,
): OwnEquation[] {
  const { system, structure } = model
  const fixes = new Map<number, string>()
  for (const { equations, variables } of structure.blocks) {
    equations.forEach((e, k) => {
      fixes.set(e, system.variables[variables[k]!]!.path)
    })
  }
  return system.equations.flatMap(({ owner: its, key, equation }, e): OwnEquation[] => {
    if (its !== owner) return []
    const path = fixes.get(e)
    const worked = path === undefined ? undefined : whereFrom(model, path, results, units).worked
    if (path !== undefined && worked) return [{ key, path, symbols: worked.symbols, worked }]
    const finder = new Finder(model, results)
    const side = (expression: Expression) =>
      symbols(treeOf(expression, (index) => finder.leafOf(index), 'number'))
    return [
      {
        key,
        path: path ?? null,
        symbols: [...side(equation.left), ' = ', ...side(equation.right)],
      },
    ]
  })
}

function workedOf(
  statements: readonly Statement[],
  units: UnitChoice,
  first: Statement,
): Origin['worked'] {
  const own = first.left.kind === 'variable' ? first.leafOf(first.left.index).dimension : 'number'
  for (const { left, right, isExplicit, leafOf } of statements) {
    const worked = workedStatement(
      { left: treeOf(left, leafOf, own), right: treeOf(right, leafOf, own), isExplicit },
      units,
    )
    if (worked) return worked
  }
  return undefined
}

const unfolded = new WeakMap<Model, readonly SystemEquation[]>()

/** The equations with givens of 0 and 1 in their places: a reader looks for them. */
function unfoldedOf(model: Model): readonly SystemEquation[] {
  let equations = unfolded.get(model)
  if (!equations) {
    equations = assemble(model.system.layout, { ...model.options, fold: false }).equations
    unfolded.set(model, equations)
  }
  return equations
}

class Finder {
  private readonly model: Model
  private readonly results: Results | undefined
  /** Numbers that are no variables of the system: indexes from its variables' count on. */
  private readonly further: Leaf[] = []

  constructor(model: Model, results: Results | undefined) {
    this.model = model
    this.results = results
  }

  find(path: string): Found {
    const { system, structure, program } = this.model
    const index = system.indexOf.get(path)
    if (index === undefined) return this.derived(path)
    if (!Number.isNaN(system.given[index]!)) {
      return { path, how: 'given', with: [], statements: [] }
    }
    const k = structure.blocks.findIndex((block) => block.variables.includes(index))
    if (k < 0 || program.lost[index]) return opened(path)
    const block = structure.blocks[k]!
    const e = block.equations[block.variables.indexOf(index)]!
    const { owner, key } = system.equations[e]!
    const leafOf = (at: number): Leaf => this.leafOf(at)
    const statements = [unfoldedOf(this.model)[e]!, system.equations[e]!].map(({ equation }) => ({
      ...sidesFor(equation, index),
      leafOf,
    }))
    return {
      path,
      how: block.variables.length === 1 ? 'alone' : 'together',
      owner,
      key,
      with: block.variables.filter((v) => v !== index).map((v) => system.variables[v]!.path),
      statements,
    }
  }

  leafOf(index: number): Leaf {
    const { system, values } = this.model
    const further = this.further[index - system.variables.length]
    if (further) return further
    const { path, description } = system.variables[index]!
    const given = system.given[index]!
    const isGiven = !Number.isNaN(given)
    return {
      type: 'leaf',
      path,
      dimension: description.dimension,
      value: isGiven ? given : values[index]!,
      isGiven,
    }
  }

  /** A quantity as an expression, one that takes no part in the equations included. */
  private quantity(path: string, dimension: Dimension): Expression {
    const { system } = this.model
    const index = system.indexOf.get(path)
    if (index !== undefined) return variable(index, path)
    const value = this.results?.value(path) ?? Number.NaN
    return this.add({ type: 'leaf', path, dimension, value, isGiven: false })
  }

  private add(leaf: Leaf): Expression {
    this.further.push(leaf)
    return variable(this.model.system.variables.length + this.further.length - 1, '')
  }

  /** Results that are read off solved ones: further quantities of a state, and the second law. */
  private derived(path: string): Found {
    const dot = path.lastIndexOf('.')
    const owner = path.slice(0, dot)
    const name = path.slice(dot + 1)
    const { system } = this.model
    const right = system.indexOf.has(`${owner}.h`)
      ? this.stateQuantity(owner, name)
      : this.audit(owner, name)
    // A quantity may have no meaning here: the dryness of superheated steam.
    if (right === undefined || (this.results && this.results.value(path) === null)) {
      return opened(path)
    }
    const left = this.quantity(path, right.dimension)
    const leafOf = (at: number): Leaf => this.leafOf(at)
    return {
      path,
      how: 'property',
      with: [],
      statements: [{ left, right: right.expression, isExplicit: true, leafOf }],
    }
  }

  private stateQuantity(stream: string, name: string): Derived | undefined {
    const relation = stateRelations[name]
    return (
      relation && {
        dimension: relation.dimension,
        expression: relation.of(
          this.quantity(`${stream}.p`, 'pressure'),
          this.quantity(`${stream}.h`, 'specificEnthalpy'),
        ),
      }
    )
  }

  /** The second law of a unit or shaft (contract: an adiabatic unit's entropy, else exergies). */
  private audit(owner: string, name: string): Derived | undefined {
    const { system } = this.model
    const shaft = system.layout.shafts.find((one) => one.id === owner)
    if (shaft && name === 'exergyDestroyed') {
      const powers = (ids: readonly string[]): Expression[] =>
        ids.map((id) => this.quantity(`${id}.power`, 'power'))
      const taken = [
        ...powers(shaft.pumps),
        ...(shaft.generator === false ? [] : [this.quantity(`${owner}.generatorPower`, 'power')]),
      ]
      const expression = taken.reduce(minus, plus(...powers(shaft.turbines)))
      return { dimension: 'power', expression }
    }
    const placed = system.unitOf.get(owner)
    if (placed === undefined || !auditNames(placed.kind.secondLaw).includes(name)) return undefined
    const T0 = this.add({
      type: 'leaf',
      symbol: 'T0',
      dimension: 'temperature',
      value: system.layout.ambient.T,
      isGiven: true,
    })
    const role = placed.kind.secondLaw
    const isEntropy = role === 'adiabatic'
    const outgoing: Expression[] = []
    const incoming: Expression[] = []
    const entering = placed.connections.find(({ description }) => description.direction === 'in')
    for (const { description, stream } of placed.connections) {
      // What a heat user does not return leaves the plant at the state of its condensate.
      const flowOf = role === 'delivers' ? (entering?.stream ?? stream) : stream
      const m = this.quantity(`${flowOf}.m`, 'massFlow')
      const s = this.quantity(`${stream}.s`, 'specificEntropy')
      const h = this.quantity(`${stream}.h`, 'specificEnthalpy')
      const term = times(m, isEntropy ? s : minus(h, times(T0, s)))
      ;(description.direction === 'out' ? outgoing : incoming).push(term)
    }
    const [added, taken] = isEntropy
      ? [outgoing, incoming]
      : role === 'heated'
        ? [outgoing, incoming]
        : [incoming, outgoing]
    const fuel = role === 'fired' ? [this.quantity(`${owner}.fuelHeat`, 'heatFlow')] : []
    const sum = minus(plus(...fuel, ...added), plus(...taken))
    if (isEntropy && name !== 'entropyGenerated') {
      return { dimension: 'power', expression: times(T0, sum) }
    }
    if (name === 'entropyGenerated') {
      if (role === 'fired') return undefined
      return { dimension: 'entropyFlow', expression: isEntropy ? sum : divide(sum, T0) }
    }
    return { dimension: 'power', expression: sum }
  }
}

interface Derived {
  readonly dimension: Dimension
  readonly expression: Expression
}

function opened(path: string): Found {
  return { path, how: 'open', with: [], statements: [] }
}

const stateRelations: Readonly<
  Record<string, { readonly dimension: Dimension; of(p: Expression, h: Expression): Expression }>
> = {
  T: { dimension: 'temperature', of: temperature },
  s: { dimension: 'specificEntropy', of: entropy },
  x: { dimension: 'dryness', of: dryness },
  superheat: { dimension: 'temperatureDifference', of: superheat },
  subcooling: { dimension: 'temperatureDifference', of: subcooling },
  v: { dimension: 'specificVolume', of: volume },
}

/** The equation as text and names. */
function tokensOf({ left, right, leafOf }: Statement): Token[] {
  return [...tokens(left, leafOf), ' = ', ...tokens(right, leafOf)]
}

function tokens(expression: Expression, leafOf: Statement['leafOf']): Token[] {
  const { text } = print(expression, (leaf) => {
    if (leaf.kind === 'constant') return `${open}${constantMark}${leaf.value}${close}`
    const { path, symbol = '' } = leafOf(leaf.index)
    return path === undefined ? symbol : `${open}${path}${close}`
  })
  const found: Token[] = []
  for (const piece of text.split(open)) {
    const end = piece.indexOf(close)
    if (end < 0) {
      if (piece !== '') found.push(piece)
      continue
    }
    const inside = piece.slice(0, end)
    found.push(
      inside.startsWith(constantMark) ? { constant: Number(inside.slice(1)) } : { path: inside },
    )
    if (end + 1 < piece.length) found.push(piece.slice(end + 1))
  }
  return found
}
