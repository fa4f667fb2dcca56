import { forEachVariableOf } from '../equations/expression/index.ts'
import { StepOutcome } from '../equations/newton/index.ts'
import { withGivens } from '../plant/overrides.ts'
import { rangeProblem } from '../steam/index.ts'
import { streamQuantities } from '../units/index.ts'
import { portNamed } from '../units/kind.ts'
import type { Finding, Status } from './answer.ts'
import { error, ownersOf, ranked, remedies, Wording } from './findings.ts'
import { givensBehind } from './givens-behind.ts'
import type { Model } from './model.ts'
import { analyse, type Misfit } from './structure.ts'
import { assemble } from './system.ts'
import { sufficient } from './together.ts'

/*
 * Where the words of graph theory and numerics become words of the plant: what is missing, what is
 * too many, which block has no answer and why.
 */

export interface Diagnosis {
  readonly status: Status
  readonly findings: readonly Finding[]
}

/** What the structure and the solved blocks say, before the answer itself is looked at. */
export function diagnose(model: Model): Diagnosis {
  const findings: Finding[] = []
  const wording = new Wording(model.system.layout)
  findings.push(...missingConnections(model, wording))
  const twice = turbinesOnTwoShafts(model, wording)
  findings.push(...twice)
  const { structure } = model
  if (structure.excess > 0) findings.unshift(overspecified(model, structure.over, wording))
  if (structure.missing > 0) findings.push(underspecified(model, structure.under, wording))
  const failure = failureOf(model, wording)
  if (failure !== undefined) findings.push(failure.finding)
  if (structure.excess > 0 || twice.length > 0) return { status: 'overspecified', findings }
  if (
    findings.some(
      (finding) =>
        finding.missing !== undefined ||
        finding.code === 'open-port' ||
        finding.code === 'turbine-without-shaft',
    )
  ) {
    return { status: 'underspecified', findings }
  }
  return { status: failure?.status ?? 'solved', findings }
}

function missingConnections(model: Model, wording: Wording): Finding[] {
  const findings: Finding[] = []
  const { units, layout } = model.system
  const onShaft = new Set(layout.shafts.flatMap((shaft) => [...shaft.turbines]))
  for (const { unit, kind, open } of units) {
    for (const port of open) {
      const named = portNamed(kind.ports, port)
      const label = named ? kind.ports[named.port]!.label.toLowerCase() : port
      findings.push(
        error(
          'open-port',
          [unit.id],
          [],
          `${wording.name(unit.id)} has no stream at its port ${port} (${label}).`,
          { advice: 'Connect the port, or remove the unit.' },
        ),
      )
    }
    if (kind.shaft === 'driving' && !onShaft.has(unit.id)) {
      findings.push(
        error(
          'turbine-without-shaft',
          [unit.id],
          [],
          `${wording.name(unit.id)} stands on no shaft, so its power goes nowhere.`,
          { advice: 'Put it on a shaft.' },
        ),
      )
    }
  }
  return findings
}

function turbinesOnTwoShafts(model: Model, wording: Wording): Finding[] {
  const shaftsOf = new Map<string, string[]>()
  for (const shaft of model.system.layout.shafts) {
    for (const id of [...shaft.turbines, ...shaft.pumps]) {
      shaftsOf.set(id, [...(shaftsOf.get(id) ?? []), shaft.id])
    }
  }
  const findings: Finding[] = []
  for (const [id, shafts] of shaftsOf) {
    if (shafts.length < 2) continue
    findings.push(
      error(
        'two-shafts',
        [id, ...shafts],
        [],
        `${wording.name(id)} stands on ${shafts.length} shafts; its power would be counted more than once.`,
        { advice: 'Leave it on one of them.' },
      ),
    )
  }
  return findings
}

/** Remedies offered for a block without an answer. */
const mostRemedies = 12

/** Every quantity that would help, those of open streams included. */
function helpful(model: Model, part: Misfit): string[] {
  const paths = part.variables.map((v) => model.system.variables[v]!.path)
  for (const id of part.streams) {
    for (const name of Object.keys(streamQuantities)) {
      const path = `${id}.${name}`
      if (name === 'm' || name === 'p' || name === 'h' || model.system.indexOf.has(path)) continue
      paths.push(path)
    }
  }
  return paths
}

function underspecified(model: Model, parts: readonly Misfit[], wording: Wording): Finding {
  const missing = parts.reduce((sum, part) => sum + part.count, 0)
  const quantities = ranked(
    model,
    [...new Set(parts.flatMap((part) => helpful(model, part)))],
    true,
  )
  const together = missing === 1 ? [] : sufficient(model, parts, quantities)
  const first = (missing === 1 ? quantities.slice(0, 3) : together.slice(0, 6)).map((path) =>
    wording.quantity(path),
  )
  const more = together.length - first.length
  return error(
    'underspecified',
    ownersOf(quantities),
    quantities,
    missing === 1
      ? `One number is missing: nothing fixes, for instance, ${first.join('; ')}.`
      : `${missing} numbers are missing. These would do together: ${first.join('; ')}${more > 0 ? `; and ${more} more` : ''}.`,
    {
      missing,
      advice:
        missing === 1
          ? 'Give one of these quantities.'
          : `Give ${missing} of these quantities; the first ${missing} do together.`,
      remedies: remedies('give', [...new Set([...together, ...quantities])], (path) => {
        const index = model.system.indexOf.get(path)
        return index === undefined ? undefined : model.system.variables[index]!.description.usual
      }),
    },
  )
}

function overspecified(model: Model, parts: readonly Misfit[], wording: Wording): Finding {
  const excess = parts.reduce((sum, part) => sum + part.count, 0)
  const known = parts.flatMap((part) => part.variables)
  const quantities = ranked(
    model,
    [...new Set([...known, ...foldedInto(model, parts)])].map(
      (v) => model.system.variables[v]!.path,
    ),
    false,
  )
  const first = quantities.slice(0, 4).map((path) => wording.quantity(path))
  return error(
    'overspecified',
    ownersOf(quantities),
    quantities,
    `${excess === 1 ? 'One number too many is' : `${excess} numbers too many are`} given: the others already fix what these say: ${first.join('; ')}.`,
    {
      excess,
      advice: excess === 1 ? 'Free one of them.' : `Free ${excess} of them.`,
      remedies: remedies('free', quantities, () => undefined),
    },
  )
}

/**
 * Givens of exactly 0 or 1 are folded into the equations, so that the structure does not show them;
 * those of the part that lower its count when freed.
 */
function foldedInto(model: Model, parts: readonly Misfit[]): number[] {
  const { layout, given, curved, variables } = model.system
  const candidates = new Set<number>()
  for (const part of parts) {
    for (const e of part.equations) {
      for (const v of variablesOf(model.unfolded.equations[e]!.equation)) {
        if ((given[v] === 0 || given[v] === 1) && !curved[v]) candidates.add(v)
      }
    }
  }
  return [...candidates].filter((v) => {
    const freed = assemble(
      withGivens(layout, new Map([[variables[v]!.path, undefined]])),
      model.options,
    )
    return analyse(freed).excess < model.structure.excess
  })
}

/** The first block of the core without an answer, in words. */
function failureOf(
  model: Model,
  wording: Wording,
): { readonly status: Status; readonly finding: Finding } | undefined {
  const k = model.firstFailure()
  if (k < 0) return undefined
  const { system, program, structure } = model
  const outcome = program.outcomes[k]!
  const block = structure.blocks[k]!
  const { owner, key } = system.equations[program.worstEquation(k)]!
  const unknowns = block.variables
    .filter((v) => !system.variables[v]!.isPhantom)
    .map((v) => system.variables[v]!.path)
  const givens = givensBehind(
    model,
    block.variables.map((v) => system.variables[v]!.path),
    mostRemedies,
  )
  const quantities = ranked(model, [...new Set([...givens, ...unknowns])], false).slice(0, 12)
  const where = [...new Set([owner, ...ownersOf(quantities)])]
  const target = unknowns[0] === undefined ? wording.name(owner) : wording.quantity(unknowns[0])
  switch (outcome) {
    case StepOutcome.onSaturation:
      return {
        status: 'underspecified',
        finding: error(
          'on-saturation',
          where,
          quantities,
          `${wording.name(owner)}: pressure and temperature are those of saturation, where they do not say how much is steam.`,
          {
            missing: 1,
            advice: 'Free the temperature and give the dryness or the enthalpy instead.',
            remedies: remedies('give', [`${owner}.x`], () => undefined),
          },
        ),
      }
    case StepOutcome.singular:
      return {
        status: 'underspecified',
        finding: error(
          'singular',
          where,
          quantities,
          `The equations of ${blockNames(model, block.equations, wording)} repeat each other in numbers and leave ${target} open.`,
          {
            missing: 1,
            advice: 'Give one more of these quantities and free one of the others.',
            remedies: remedies('give', unknowns, () => undefined),
          },
        ),
      }
    case StepOutcome.contradictory:
      return {
        status: 'overspecified',
        finding: error(
          'contradiction',
          where,
          quantities,
          `The equations of ${blockNames(model, block.equations, wording)} contradict each other.`,
          {
            excess: 1,
            advice: 'Free one of the given quantities.',
            remedies: remedies('free', givens, () => undefined),
          },
        ),
      }
    case StepOutcome.notConverged:
      return {
        status: 'notConverged',
        finding: error(
          'not-converged',
          where,
          quantities,
          `No solution was found for ${block.variables.length} quantities that depend on each other (${blockNames(model, block.equations, wording)}); the equation missed most is ${wording.name(owner)}, ${key}.`,
          {
            advice:
              'Check the given values around these units; start from a case that solves and change it in steps.',
            remedies: remedies('give', givens, () => undefined),
          },
        ),
      }
    default:
      return {
        status: 'infeasible',
        finding: error('no-answer', where, quantities, noAnswer(model, k, owner, target, wording), {
          advice: 'Change one of the given values named here.',
          remedies: remedies('give', givens, () => undefined),
        }),
      }
  }
}

function variablesOf(equation: Parameters<typeof forEachVariableOf>[0]): number[] {
  const found: number[] = []
  forEachVariableOf(equation, (index) => found.push(index))
  return found
}

function blockNames(model: Model, equations: readonly number[], wording: Wording): string {
  const owners = [...new Set(equations.map((e) => model.system.equations[e]!.owner))]
  const names = owners.slice(0, 4).map((id) => wording.name(id))
  return owners.length > 4 ? `${names.join(', ')} and ${owners.length - 4} more` : names.join(', ')
}

function noAnswer(
  model: Model,
  k: number,
  owner: string,
  target: string,
  wording: Wording,
): string {
  const { program } = model
  const name = wording.name(owner)
  switch (program.outcomes[k]) {
    case StepOutcome.outsideRange: {
      // Run again, so that the refusal read is this block's.
      program.steps[k]!.run(program.tape, 0)
      const { quantity, value, limit } = rangeProblem()
      const dimension = dimensionOfRange[quantity] ?? 'number'
      const end =
        quantity === 'pressure' && value <= 0
          ? 'only above 0 bar'
          : `only ${value < limit ? 'from' : 'up to'} ${wording.value(limit, dimension)}`
      return `${name}: ${target} would need steam at a ${quantity} of ${wording.value(value, dimension)}; the properties (IAPWS-IF97) hold ${end}.`
    }
    case StepOutcome.unbounded:
      return `${name}: ${target} would have to be unbounded; a difference that it is divided by is zero.`
    case StepOutcome.outsideDomain:
      return `${name}: ${target} has no answer; its equation asks for the root or logarithm of a negative number, as when a pressure or temperature difference has the wrong sign.`
    default:
      return `${name}: no value of ${target} within the physical range satisfies its equation.`
  }
}

const dimensionOfRange = {
  pressure: 'pressure',
  temperature: 'temperature',
  enthalpy: 'specificEnthalpy',
  entropy: 'specificEntropy',
  volume: 'specificVolume',
  difference: 'temperatureDifference',
  dryness: 'dryness',
} as const
