import {
  type Equation,
  type Expression,
  forEachVariableOf,
  print,
  solveFor,
  variable,
} from '../equations/expression/index.ts'
import type { Origin, Token } from './answer.ts'
import type { Model } from './model.ts'
import { auditNames } from './second-law.ts'
import { streamResults } from './states.ts'

/** Around a name inside printed text; characters that no label or number has. */
const open = '\uE000'
const close = '\uE001'
const constantMark = '\uE002'

/** Which equation fixed a quantity, what it was solved together with, and what went in. */
export function whereFrom(model: Model, path: string): Origin {
  const { system, structure, program } = model
  const index = system.indexOf.get(path)
  if (index === undefined) return derived(model, path)
  if (!Number.isNaN(system.given[index]!)) {
    return { path, how: 'given', statement: [], with: [], inputs: [] }
  }
  const k = structure.blocks.findIndex((block) => block.variables.includes(index))
  if (k < 0 || program.lost[index]) {
    return { path, how: 'open', statement: [], with: [], inputs: [] }
  }
  const block = structure.blocks[k]!
  const e = block.equations[block.variables.indexOf(index)]!
  const { equation, owner, key } = system.equations[e]!
  const inputs = new Set<string>()
  forEachVariableOf(equation, (other) => {
    if (other !== index) inputs.add(system.variables[other]!.path)
  })
  return {
    path,
    how: block.variables.length === 1 ? 'alone' : 'together',
    owner,
    key,
    statement: statementOf(equation, index, path, system.variables),
    with: block.variables.filter((v) => v !== index).map((v) => system.variables[v]!.path),
    inputs: [...inputs],
  }
}

/** Results that are read off solved ones: further quantities of a state, and the second law. */
function derived(model: Model, path: string): Origin {
  const dot = path.lastIndexOf('.')
  const owner = path.slice(0, dot)
  const name = path.slice(dot + 1)
  const { layout } = model.system
  if (layout.streams.some((stream) => stream.id === owner)) {
    const inputs = [`${owner}.p`, `${owner}.h`]
    const isState = (streamResults as readonly string[]).includes(name)
    return isState
      ? {
          path,
          how: 'property',
          statement: [
            { path },
            ' = ',
            `${name}(`,
            { path: inputs[0]! },
            ', ',
            { path: inputs[1]! },
            ')',
          ],
          with: [],
          inputs,
        }
      : { path, how: 'open', statement: [], with: [], inputs: [] }
  }
  const placed = model.system.unitOf.get(owner)
  if (placed === undefined || !auditNames(placed.kind.secondLaw).includes(name)) {
    return { path, how: 'open', statement: [], with: [], inputs: [] }
  }
  const inputs: string[] = []
  const sum: Token[] = []
  for (const { description, stream: id } of placed.connections) {
    const entropyOnly = placed.kind.secondLaw === 'adiabatic'
    // An adiabatic unit's entropy flows are added up out less in, all others' exergy in less out.
    const isAdded = (description.direction === 'out') === entropyOnly
    sum.push(sum.length === 0 ? (isAdded ? '' : '−') : isAdded ? ' + ' : ' − ')
    if (entropyOnly) sum.push({ path: `${id}.m` }, ' ', { path: `${id}.s` })
    else {
      sum.push({ path: `${id}.m` }, ' (', { path: `${id}.h` }, ' − T0 ', { path: `${id}.s` }, ')')
      inputs.push(`${id}.h`)
    }
    inputs.push(`${id}.m`, `${id}.s`)
  }
  const fuel = placed.kind.secondLaw === 'fired' ? `${owner}.fuelHeat` : undefined
  if (fuel !== undefined) inputs.push(fuel)
  const wholeOfEntropy: Token[] =
    placed.kind.secondLaw === 'adiabatic' && name !== 'entropyGenerated'
      ? ['T0 (', ...sum, ')']
      : placed.kind.secondLaw === 'losesHeat' && name === 'entropyGenerated'
        ? ['(', ...sum, ')/T0']
        : sum
  return {
    path,
    how: 'property',
    statement: [
      { path },
      ' = ',
      ...(fuel === undefined ? [] : [{ path: fuel }, ' + ']),
      ...wholeOfEntropy,
    ],
    with: [],
    inputs,
  }
}

/** The equation, solved for the quantity where it can be, else as its kind writes it. */
function statementOf(
  equation: Equation,
  index: number,
  path: string,
  variables: readonly { readonly path: string }[],
): Token[] {
  const explicit = solveFor(equation, index)
  const left = explicit === undefined ? equation.left : variable(index, path)
  const right = explicit ?? equation.right
  return [...tokens(left, variables), ' = ', ...tokens(right, variables)]
}

function tokens(expression: Expression, variables: readonly { readonly path: string }[]): Token[] {
  const { text } = print(expression, (leaf) =>
    leaf.kind === 'variable'
      ? `${open}${variables[leaf.index]!.path}${close}`
      : `${open}${constantMark}${leaf.value}${close}`,
  )
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
