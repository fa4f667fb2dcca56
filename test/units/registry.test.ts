import { isDeepStrictEqual } from 'node:util'
import { beforeAll, describe, expect, test } from 'vitest'
import { Model } from '../../src/balance/model.ts'
import { type Balance, solve } from '../../src/balance/solve.ts'
import type { SystemEquation } from '../../src/balance/system.ts'
import { equationsOf } from '../../src/balance/where-from.ts'
import {
  addUnit,
  type Dimension,
  derivedUnitQuantities,
  emptyPlant,
  type Layout,
  type Plant,
  readPlant,
  writePlant,
} from '../../src/document.ts'
import { balanceOfCase } from '../../src/engine.ts'
import {
  apply,
  equal,
  forEachVariableOf,
  type Operation,
  print,
  variable,
  variablesOf,
} from '../../src/equations/expression/index.ts'
import {
  kindNamed,
  kinds,
  plantQuantities,
  quantitiesOfShaft,
  streamQuantities,
} from '../../src/units/index.ts'
import type { QuantityTable, Shape } from '../../src/units/kind.ts'
import { layoutOf } from '../published/build-layout.ts'
import { type Bench, benchesOf, unitId } from './bench.ts'
import { contractTable } from './contract-table.ts'
import { descriptionFaults } from './description-faults.ts'
import { nameFaults } from './name-faults.ts'
import { partialFaults } from './partial-faults.ts'

/* What must hold of every kind of unit, whichever are registered: see bench.ts for the units tested. */

interface Solved extends Bench {
  readonly layout: Layout
  readonly model: Model
  readonly balance: Balance
  /** Of the unit alone, with no given folded into them. */
  readonly equations: readonly SystemEquation[]
  readonly shape: Shape
}

function solvedBench(bench: Bench): Solved {
  const layout = layoutOf(bench.parts)
  const model = new Model(layout)
  const balance = solve(model)
  const equations = model.unfolded.equations.filter(({ owner }) => owner === unitId)
  const { shape } = model.system.unitOf.get(unitId)!
  return { ...bench, layout, model, balance, equations, shape }
}

const planted = (layout: Layout): Plant => ({ ...emptyPlant('Trial'), layouts: [layout] })

/** Where all benches are well, nothing; else the name of each with what is wrong. */
function wrong(benches: readonly Solved[], faultsOf: (bench: Solved) => readonly string[]) {
  return benches.flatMap((bench) => faultsOf(bench).map((fault) => `${bench.name}: ${fault}`))
}

describe.each(kinds.map((kind) => [kind.name, kind] as const))('%s', (name, kind) => {
  let benches: readonly Solved[] = []
  beforeAll(() => {
    benches = benchesOf(kind).map(solvedBench)
  })

  test('has the ports and quantities of the contract', () => {
    const { ports, plain, further = {} } = contractTable[name]!
    const described = Object.entries(kind.ports).map(
      ([port, { direction, repeated, stem, optional, pressure }]) =>
        `${direction} ${stem ?? port}${repeated ? '1..n' : ''}${optional ? ', optional' : ''}${
          pressure === 'own' ? '' : `, ${pressure}`
        }`,
    )
    expect(described.sort()).toEqual([...ports].sort())
    const named = ({ options, streams }: Partial<Shape>): string[] =>
      Object.entries(kind.quantities).flatMap(([quantity, { when }]) =>
        !when || when({ options: options ?? {}, streams: streams ?? {} }) ? [quantity] : [],
      )
    expect(named({}).sort()).toEqual([...plain].sort())
    for (const [what, { shape, quantities }] of Object.entries(further)) {
      const added = named(shape).filter((quantity) => !plain.includes(quantity))
      expect(added.sort(), what).toEqual([...quantities].sort())
    }
  })

  test('unknowns and equations are square with the usual givens, and solved without a word', () => {
    expect(benches.length).toBeGreaterThan(0)
    const faults = wrong(benches, ({ model, balance, ports }) => {
      const { system, structure } = model
      const owners = new Set([unitId, ...ports])
      const ownerOf = (path: string): string => path.slice(0, path.indexOf('.'))
      const unknowns = system.variables.filter(
        ({ owner }, v) => owners.has(owner) && Number.isNaN(system.given[v]!),
      )
      const equations = system.equations.filter(({ owner }) => owners.has(owner))
      const open = [...balance.undetermined, ...balance.unbounded].filter((path) =>
        owners.has(ownerOf(path)),
      )
      return [
        ...(balance.status === 'solved' ? [] : [balance.status]),
        ...(unknowns.length === equations.length
          ? []
          : [`${unknowns.length} unknowns, ${equations.length} equations`]),
        ...(structure.missing + structure.excess === 0 ? [] : ['not square']),
        ...open.map((path) => `${path} is open`),
        ...balance.findings
          .filter(({ severity }) => severity !== 'remark')
          .map(({ message }) => message),
      ]
    })
    expect(faults).toEqual([])
  })

  test('partials of every equation agree with central differences', () => {
    const faults = wrong(benches, ({ model, equations }) => {
      const { variables } = model.unfolded
      return partialFaults(equations, variables, nearby(model))
    })
    expect(faults).toEqual([])
  })

  test('every equation is printed, and names all its quantities', () => {
    const faults = wrong(benches, ({ model, equations }) => {
      const { variables } = model.unfolded
      const found: string[] = []
      for (const { key, equation } of equations) {
        const names = new Set<string>()
        const sides = [equation.left, equation.right].map(
          (side) =>
            print(side, (leaf) => {
              if (leaf.kind === 'constant') return String(leaf.value)
              const { path } = variables[leaf.index]!
              names.add(path)
              return path
            }).text,
        )
        const text = sides.join(' = ')
        if (!sides.every((side) => /\S/.test(side))) found.push(`${key} has an empty side: ${text}`)
        if (/undefined|NaN|null|\[object/.test(text)) found.push(`${key}: ${text}`)
        for (const index of variablesOf(equation)) {
          const { path } = variables[index]!
          if (!names.has(path) || !text.includes(path)) found.push(`${key} does not name ${path}`)
        }
      }
      return found
    })
    expect(faults).toEqual([])
  })

  test('its equations are shown in symbols, each with the quantity that it fixes', () => {
    // Of the bench with most options and streams: to work out figures takes its time.
    const { model, balance, equations } = benches.at(-1)!
    const own = equationsOf(model, unitId, balance.results, 'si')
    expect(own.map(({ key }) => key)).toEqual(equations.map(({ key }) => key))
    for (const { key, path, symbols } of own) {
      const paths = symbols.map((piece) =>
        typeof piece !== 'string' && 'path' in piece ? piece.path : undefined,
      )
      expect(symbols, key).toContain(' = ')
      if (path !== null) expect(paths, key).toContain(path)
    }
  })

  test('every port is used by an equation, every quantity by an equation or when frozen', () => {
    const faults = wrong(benches, ({ model, balance, equations, shape, ports }) => {
      const { variables, unitOf, indexOf } = model.unfolded
      const used = new Set<number>()
      for (const { equation } of equations) forEachVariableOf(equation, (index) => used.add(index))
      const uses = (path: string): boolean => used.has(indexOf.get(path)!)
      const found: string[] = []
      const { connections } = unitOf.get(unitId)!
      expect(connections.map((one) => one.name)).toEqual(ports)
      // What enters or leaves the plant has the state that the stream says.
      const isEdge = kind.secondLaw === 'edge'
      for (const { name: port, stream, description } of connections) {
        if (!isEdge && !uses(`${stream}.m`)) found.push(`flow at ${port} is in no equation`)
        if (!isEdge && !uses(`${stream}.h`)) found.push(`enthalpy at ${port} is in no equation`)
        if (description.pressure === 'equal' && !uses(`${stream}.p`)) {
          found.push(`pressure at ${port} is in no equation`)
        }
        if (description.pressure === 'throttles' && uses(`${stream}.p`)) {
          found.push(`pressure at ${port} is in an equation, though it is throttled on entry`)
        }
      }
      const exponents = (kind.freezing?.({ shape, drivesGenerator: true }) ?? []).map(
        ({ law }) => law?.exponent,
      )
      const remarked = balance.findings.flatMap(({ code, quantities }) =>
        code === 'without-effect' ? quantities : [],
      )
      variables.forEach(({ owner, path }, index) => {
        const quantity = path.slice(owner.length + 1)
        if (owner !== unitId || used.has(index) || exponents.includes(quantity)) return
        if (!remarked.includes(path)) found.push(`${quantity} is used by nothing, and not a word`)
      })
      return found
    })
    expect(faults).toEqual([])
  })

  test('paths and keys are unique, results of the second law included', () => {
    const faults = wrong(benches, ({ model, balance }) => [
      ...twins(balance.results.paths),
      ...twins(model.system.variables.map(({ path }) => path)),
      ...twins(model.system.equations.map(({ owner, key }) => `${owner} ${key}`)),
    ])
    expect(faults).toEqual([])
  })

  test('names that it mentions are its own, and every outlet has a first guess', () => {
    expect(wrong(benches, ({ shape }) => nameFaults(kind, shape))).toEqual([])
  })

  test('goes to the file and comes back the same', () => {
    const faults = wrong(benches, ({ layout }) => {
      const plant = planted(withLists(layout))
      const read = readPlant(writePlant(plant))
      if (read.outcome === 'unusable') return [read.message]
      return [
        ...(isDeepStrictEqual(read.plant, plant) ? [] : ['is read as another plant']),
        ...read.repairs.map(({ message }) => message),
      ]
    })
    expect(faults).toEqual([])
    const { plant, id } = addUnit(emptyPlant('Trial'), 'base', name, [80, 40])
    const unit = plant.layouts[0]!.units.find((one) => one.id === id)!
    const arrives = Object.entries(kind.quantities).filter(([, { given, when, each }]) => {
      const bare = { options: {}, streams: {} }
      return given && (!when || when(bare)) && (!each || each.extra > 0)
    })
    expect(Object.keys(unit.given)).toEqual(
      arrives.map(([quantity, { each }]) => (each ? `${quantity}1` : quantity)),
    )
    expect(readPlant(writePlant(plant))).toMatchObject({ plant, repairs: [] })
  })

  test('says of itself, its ports, options and quantities what a user must know', () => {
    const faults = Object.entries(kind.quantities).flatMap(([quantity, description]) =>
      descriptionFaults(quantity, description),
    )
    const sentences = [kind, ...Object.values(kind.options ?? {})].map(({ help }) => help)
    for (const help of sentences) if (!/^[A-Z].*\.$/.test(help)) faults.push(help)
    const labelled = [kind, ...Object.values(kind.ports), ...Object.values(kind.options ?? {})]
    for (const { label } of labelled) if (!/^[A-Z]\S*( \S+)*$/.test(label)) faults.push(label)
    faults.push(...twins(Object.values(kind.ports).map(({ label }) => label)))
    faults.push(...twins(Object.values(kind.quantities).map(({ label }) => label)))
    expect(faults).toEqual([])
  })
})

describe('the registry', () => {
  test('holds the kinds of the contract, each by its name', () => {
    expect(kinds.map(({ name }) => name).sort()).toEqual(Object.keys(contractTable).sort())
    for (const kind of kinds) expect(kindNamed(kind.name)).toBe(kind)
  })

  test('no two kinds share name, label or the stem of their ids, which begin as ids do', () => {
    expect(twins(kinds.map(({ name }) => name))).toEqual([])
    expect(twins(kinds.map(({ label }) => label))).toEqual([])
    expect(twins(kinds.map(({ idStem }) => idStem))).toEqual([])
    expect(kinds.filter(({ idStem }) => !/^[a-z]+$/.test(idStem) || idStem === 'plant')).toEqual([])
  })

  test.each<[string, QuantityTable]>([
    ['streams', streamQuantities],
    ['shafts with a generator', quantitiesOfShaft(true)],
    ['shafts without', quantitiesOfShaft(false)],
    ['the plant', plantQuantities],
  ])('%s say of every quantity what a user must know', (_, table) => {
    const faults = Object.entries(table).flatMap(([quantity, description]) =>
      descriptionFaults(quantity, description),
    )
    expect(faults).toEqual([])
    expect(twins(Object.values(table).map(({ label }) => label))).toEqual([])
  })

  test('no quantity of a unit bears the name of one that is derived for every unit', () => {
    const derived = Object.keys(derivedUnitQuantities)
    expect(derived.length).toBeGreaterThan(0)
    for (const { quantities } of kinds) {
      expect(Object.keys(quantities).filter((name) => derived.includes(name))).toEqual([])
    }
  })
})

describe.each(
  kinds.filter(({ outOfService }) => outOfService).map((kind) => [kind.name, kind] as const),
)('%s out of service', (_, kind) => {
  test('the rest is solved: no steam, and what means nothing is null', () => {
    const { meaningless, idlePorts } = kind.outOfService!
    const optionsOf = ({ parts }: Bench): number => Object.keys(parts.units[unitId]![2]!).length
    const most = Math.max(...benchesOf(kind).map(optionsOf))
    // With no option and with all of them: what is idle makes nothing of them.
    const chosen = benchesOf(kind).filter((bench) => [0, most].includes(optionsOf(bench)))
    const faults = chosen.flatMap(({ name, parts, ports }) => {
      // Nothing is vented where no steam comes in: the contract leaves that case open.
      if (ports.includes('vent')) return []
      const base = layoutOf(parts)
      const layout = {
        ...base,
        cases: [...base.cases, { id: 'idle', name: 'Idle', outOfService: [unitId] }],
      }
      const solved = balanceOfCase(planted(layout), layout.id, 'idle')
      if (solved.outcome === 'unusable') return [`${name}: ${solved.message}`]
      const { status, streams, units, undetermined, closure } = solved.balance
      const found: string[] = status === 'solved' ? [] : [status]
      for (const port of ports) {
        const isIdle = idlePorts.some((idle) => new RegExp(`^${idle}\\d+$`).test(port))
        if (isIdle && streams[port]?.m !== 0) found.push(`${port} flows`)
      }
      for (const quantity of meaningless) {
        const value = units[unitId]![quantity]
        if (value !== undefined && value !== null) found.push(`${quantity} is ${value}`)
        if (undetermined.includes(`${unitId}.${quantity}`)) found.push(`${quantity} is open`)
      }
      const { mass = 1, energy = 1 } = closure ?? {}
      if (!(mass <= 1e-9 && energy <= 1e-9)) found.push(`closure ${mass} ${energy}`)
      return found.map((fault) => `${name}: ${fault}`)
    })
    expect(faults).toEqual([])
  })
})

describe('a planted fault is found', () => {
  const square = (slope: number): Operation => ({
    name: 'square',
    evaluate(tape, row) {
      const k = tape.first[row]!
      const x = tape.values[tape.operands[k]!]!
      tape.values[tape.slotOf(row)] = x * x
      tape.partials[k] = slope * x
      return 0
    },
    print: ([x]) => ({ text: `${x!.text}²`, strength: 3 }),
  })
  const faultsWith = (slope: number): string[] => {
    const [a, b] = [variable(0, 'a'), variable(1, 'b')]
    const described = ['a', 'b'].map((path) => ({
      path,
      owner: 'u',
      description: streamQuantities.m,
      isState: true,
      isPhantom: false,
    }))
    const equation = equal(a, apply(square(slope), b))
    return partialFaults([{ owner: 'u', key: 'law', equation, origin: 'unit' }], described, [4, 3])
  }

  test('in a partial', () => {
    expect(faultsWith(2)).toEqual([])
    expect(faultsWith(2.0001)).toHaveLength(1)
    expect(faultsWith(2.0001)[0]).toContain('u.law by b')
  })

  const right = kinds.find(({ quantities }) => quantities.terminalDifference?.given)!.quantities
    .terminalDifference!

  test.each([
    ['a label', { label: ' TTD' }],
    ['no symbol', { symbol: undefined }],
    ['a dimension', { dimension: 'speed' as Dimension }],
    ['two sentences', { help: 'One thing. Another.' }],
    ['no full stop', { help: 'One thing' }],
    ['no step', { step: undefined }],
    ['no basis', { basis: ' ' }],
    ['no range', { range: undefined }],
    ['no usual value', { usual: undefined }],
    ['a usual value out of range', { usual: 40 }],
    ['an impossible range', { possible: { least: 0 } }],
  ])('in a description: %s', (_, change) => {
    expect(descriptionFaults('TTD', right)).toEqual([])
    // Absent and undefined are the same to what reads descriptions.
    const changed = { ...right, ...change } as typeof right
    expect(descriptionFaults('TTD', changed)).toHaveLength(1)
  })

  test('in names', () => {
    const kind = kinds.find(({ passes }) => passes)!
    const shape = { options: {}, streams: {} }
    expect(nameFaults(kind, shape)).toEqual([])
    expect(nameFaults({ ...kind, passes: [['elsewhere', 'nowhere']] }, shape)).toHaveLength(2)
    expect(nameFaults({ ...kind, chief: 'charm' }, shape)).toEqual(['chief: no quantity charm'])
    expect(nameFaults({ ...kind, starts: {} }, shape).length).toBeGreaterThan(0)
  })
})

/** What a given of nought becomes: a partial at nought shows nothing. */
const ordinary: Partial<Record<Dimension, number>> = {
  ratio: 0.05,
  temperatureDifference: 2,
  specificEnthalpy: 1e4,
  heatFlow: 1e5,
  power: 1e4,
}

/** The solved values, each moved a little, so that what is saturated does not lie on a kink. */
function nearby({ unfolded, values }: Model): number[] {
  return unfolded.variables.map(({ description }, v) => {
    const value = values[v]! === 0 ? (ordinary[description.dimension] ?? 1) : values[v]!
    return value * (1 + 3e-4 * (1 - (2 * ((v * 7) % 10)) / 9))
  })
}

/** Names that occur more than once. */
function twins(names: readonly string[]): string[] {
  return names.filter((name, k) => names.indexOf(name) !== k)
}

/** Options that are lists of numbers, filled in where there are streams to number. */
function withLists(layout: Layout): Layout {
  const counted = (port: string): number =>
    layout.streams.filter(({ from, to }) =>
      [from, to].some((end) => new RegExp(`^${unitId}\\.${port}\\d+$`).test(end)),
    ).length
  const units = layout.units.map((unit) => {
    const lists = Object.entries(kindNamed(unit.kind)?.options ?? {}).flatMap(
      ([name, { list }]) => {
        if (!list || unit.id !== unitId) return []
        const count =
          'numbersOf' in list ? counted(list.numbersOf) : counted(list.each.port) + list.each.extra
        return count > 0 ? [[name, Array.from({ length: count }, (_, k) => k + 1)] as const] : []
      },
    )
    return lists.length === 0
      ? unit
      : { ...unit, options: { ...unit.options, ...Object.fromEntries(lists) } }
  })
  return { ...layout, units }
}
