import { analyse } from '../../src/balance/structure.ts'
import { assemble } from '../../src/balance/system.ts'
import type { Finding, Status } from '../../src/messages.ts'
import type { Layout } from '../../src/plant/document.ts'
import { withGivens } from './draft.ts'
import { faultOf, notANumber, solveFile } from './judge.ts'
import { KnownState } from './known-state.ts'
import { Random } from './random.ts'
import { drawSolvable, type Solvable } from './solvable.ts'
import { hasTellingValue, leastEffect } from './swap-givens.ts'
import { Tableau } from './tableau.ts'

/*
 * Plants spoilt on purpose: one number taken away, one too many, one that contradicts, one that cannot
 * be, a pressure the wrong way round. The status must say so, and a remedy offered must mend it.
 */

export const spoilings = ['removed', 'added', 'contradictory', 'impossible', 'reversed'] as const
export type Spoiling = (typeof spoilings)[number]

export interface Spoilt {
  readonly spoiling: Spoiling
  readonly layout: Layout
  readonly expected: Status
  /** The quantity that was spoilt. */
  readonly culprit: string
  /** Every quantity of the state that the plant had before, by path. */
  readonly known: ReadonlyMap<string, number>
  /** How much a quantity moves with what was taken away or added (see `Tableau`); absent: not said. */
  readonly effects?: ReadonlyMap<string, number>
}

/** Spoils a plant that solves; undefined where this plant offers nothing to spoil that way. */
export function drawSpoilt(seed: number, place: number): Spoilt | undefined {
  const spoiling = spoilings[place % spoilings.length]!
  const plant = drawSolvable(seed, place)
  if ('unusable' in plant) return undefined
  const random = new Random(seed + 1, place)
  const isStructural = spoiling !== 'impossible' && spoiling !== 'reversed'
  let layout = isStructural ? plant.layout : plant.base
  let { balance } = solveFile(layout, `${seed}:${place}`)
  if (faultOf(balance) !== undefined) {
    // What cannot be solved before it is spoilt is counted with the solvable ones.
    layout = plant.base
    balance = solveFile(layout, `${seed}:${place}`).balance
  }
  const state = KnownState.of(balance.model)
  const known = state.quantities()
  if (!isStructural) {
    const draw = spoiling === 'impossible' ? impossible : reversed
    const choices = draw(plant, known, random)
    if (choices.length === 0) return undefined
    const [culprit, value] = random.choose(choices)
    return {
      spoiling,
      layout: withGivens(layout, [], new Map([[culprit, value]])),
      expected: 'infeasible',
      culprit,
      known,
    }
  }
  const tableau = Tableau.of(state)
  if (tableau === undefined) return undefined
  if (spoiling === 'removed') return removed(layout, tableau, known, random)
  return added(layout, tableau, known, random, spoiling)
}

function removed(
  layout: Layout,
  tableau: Tableau,
  known: ReadonlyMap<string, number>,
  random: Random,
): Spoilt | undefined {
  const streams = new Set(layout.streams.map(({ id }) => id))
  const isState = (path: string): boolean => {
    const [id, name] = path.split('.') as [string, string]
    return streams.has(id) && (name === 'm' || name === 'p' || name === 'h')
  }
  const columns = tableau.columns
    .map((_, c) => c)
    .filter(
      (c) =>
        isState(tableau.columns[c]!.path) ||
        tableau.rows.some(
          ({ path }, r) => isState(path) && Math.abs(tableau.entry(r, c)) > leastEffect,
        ),
    )
  if (columns.length === 0) return undefined
  const column = random.choose(columns)
  const culprit = tableau.columns[column]!.path
  const effects = new Map(tableau.rows.map(({ path }, r) => [path, tableau.entry(r, column)]))
  effects.set(culprit, 1)
  return {
    spoiling: 'removed',
    layout: withGivens(layout, [culprit], new Map()),
    expected: 'underspecified',
    culprit,
    known,
    effects,
  }
}

function added(
  layout: Layout,
  tableau: Tableau,
  known: ReadonlyMap<string, number>,
  random: Random,
  spoiling: 'added' | 'contradictory',
): Spoilt | undefined {
  const rows = tableau.rows
    .map((_, r) => r)
    .filter((r) => hasTellingValue(tableau.rows[r]!) && !isIdle(layout, tableau.rows[r]!.path))
  if (rows.length === 0) return undefined
  const row = random.choose(rows)
  const { path: culprit, value } = tableau.rows[row]!
  const wrong = spoiling === 'added' ? value : value * (random.chance(0.5) ? 1.05 : 0.95)
  const effects = new Map(tableau.columns.map(({ path }, c) => [path, tableau.entry(row, c)]))
  effects.set(culprit, 1)
  return {
    spoiling,
    layout: withGivens(layout, [], new Map([[culprit, wrong]])),
    expected: 'overspecified',
    culprit,
    known,
    effects,
  }
}

/** What has no effect where it stands: the drive of a pump on a shaft. */
function isIdle(layout: Layout, path: string): boolean {
  const [id, name] = path.split('.') as [string, string]
  const driven = layout.shafts.some(({ pumps }) => pumps.includes(id))
  return driven && (name === 'driveEfficiency' || name === 'electricPower')
}

type Choice = readonly [path: string, value: number]

/** Approaches, subcoolings, efficiencies and shares that cannot be. */
function impossible(plant: Solvable, known: ReadonlyMap<string, number>, random: Random): Choice[] {
  const choices: Choice[] = []
  const largest = Math.max(...plant.base.streams.map(({ id }) => known.get(`${id}.m`) ?? 0))
  for (const { id, kind, given } of plant.base.units) {
    if (kind === 'condenser') {
      choices.push([`${id}.subcooling`, random.choose([-2, 250])])
      if (given.coolingInletT !== undefined) choices.push([`${id}.coolingRise`, 90])
    }
    if (kind === 'mixingHeater') choices.push([`${id}.subcooling`, random.choose([-3, 700])])
    if (kind === 'boiler') {
      choices.push([`${id}.efficiency`, 1.2], [`${id}.pressureLossFraction`, -0.3])
    }
    if (kind === 'pump') choices.push([`${id}.efficiency`, random.choose([-0.4, 1.3])])
    if (kind === 'turbine') choices.push([`${id}.groupEfficiency1`, random.choose([-0.2, 1.25])])
    if (kind === 'branch' && given.share2 !== undefined) choices.push([`${id}.share2`, 1.4])
    if (kind === 'pipe' && given.pressureLossFraction !== undefined) {
      choices.push([`${id}.pressureLossFraction`, -0.25])
    }
  }
  for (const { id, to, given } of plant.base.streams) {
    // More steam sold than there is.
    if (to.startsWith('offtake') && given.m !== undefined && plant.heaters + plant.reheats > 0) {
      choices.push([`${id}.m`, 30 * largest])
    }
  }
  return choices
}

/** Pressures the wrong way round. */
function reversed(plant: Solvable, known: ReadonlyMap<string, number>, random: Random): Choice[] {
  const choices: Choice[] = []
  const highest = Math.max(...plant.base.streams.map(({ id }) => known.get(`${id}.p`) ?? 0))
  for (const { id, from, to, given } of plant.base.streams) {
    if (given.p === undefined) continue
    const source = from.slice(0, from.indexOf('.'))
    if (/\.(bleed\d+|exhaust)$/.test(from)) {
      choices.push([`${id}.p`, highest * random.between(1.1, 1.3)])
    }
    if (/^(pump|feedpump)\d+\.discharge$/.test(from)) {
      const suction = plant.base.streams.find((stream) => stream.to === `${source}.suction`)!
      choices.push([`${id}.p`, (known.get(`${suction.id}.p`) ?? 2000) * 0.5])
    }
    if (from.startsWith('supply') && /\.drain\d+$/.test(to)) choices.push([`${id}.p`, 800])
  }
  for (const { id, kind, given } of plant.base.units) {
    if ((kind === 'condenser' || kind === 'mixingHeater') && given.pressure !== undefined) {
      // Above everything, and still where steam condenses.
      if (highest < 16e6) choices.push([`${id}.pressure`, highest * random.between(1.1, 1.3)])
    }
  }
  return choices
}

/** What is wrong with how a spoilt plant is answered; undefined when nothing is. */
export function spoiltFault(spoilt: Spoilt, random: Random): string | undefined {
  const { balance } = solveFile(spoilt.layout, spoilt.spoiling)
  if (balance.status !== spoilt.expected) return `status ${balance.status}`
  const nan = notANumber(balance)
  if (nan !== undefined) return nan
  const errors = balance.findings.filter(({ severity }) => severity === 'error')
  if (errors.length === 0) return 'no finding'
  if (errors.some(({ message }) => /NaN|undefined|Infinity/.test(message))) return 'odd message'
  return spoilt.effects === undefined
    ? infeasibleFault(spoilt, errors)
    : countedFault(spoilt, errors, spoilt.effects, random)
}

/** The finding with the count: says one, names the culprit, and names only what helps. */
function countedFault(
  spoilt: Spoilt,
  errors: readonly Finding[],
  effects: ReadonlyMap<string, number>,
  random: Random,
): string | undefined {
  const removes = spoilt.spoiling === 'removed'
  const finding = errors.find(({ missing, excess }) => (removes ? missing : excess) !== undefined)
  if (finding === undefined) return 'no count'
  if ((removes ? finding.missing : finding.excess) !== 1) return 'wrong count'
  if (!finding.quantities.includes(spoilt.culprit)) return 'culprit not named'
  const offered = (finding.remedies ?? []).filter(
    ({ action }) => action === (removes ? 'give' : 'free'),
  )
  if (!offered.some(({ path }) => path === spoilt.culprit)) return 'culprit not offered'
  const apply = (path: string): Layout =>
    removes
      ? withGivens(spoilt.layout, [], new Map([[path, spoilt.known.get(path) ?? 1.5]]))
      : withGivens(spoilt.layout, [path], new Map())
  // Structurally every quantity of the set must help.
  const any = analyse(assemble(apply(random.choose(finding.quantities))))
  if ((removes ? any.missing : any.excess) !== 0) return 'named without help'
  if (faultOf(solveFile(apply(spoilt.culprit), 'mended').balance) !== undefined) {
    return 'culprit mended, not solved'
  }
  if (spoilt.spoiling === 'contradictory') return undefined
  // The first remedy that has an effect in numbers mends it as well.
  const telling = offered.find(({ path }) => {
    const value = spoilt.known.get(path)
    if (value === undefined || Math.abs(effects.get(path) ?? 0) < leastEffect) return false
    return !removes || Math.abs(value) > 1e-6
  })
  if (telling === undefined || telling.path === spoilt.culprit) return undefined
  const fault = faultOf(solveFile(apply(telling.path), 'mended').balance)
  return fault === undefined ? undefined : 'first remedy does not mend'
}

/** One of the remedies offered, with the value that the quantity had before, mends it. */
function infeasibleFault(spoilt: Spoilt, errors: readonly Finding[]): string | undefined {
  const paths = [
    ...new Set(errors.flatMap(({ remedies = [] }) => remedies.map(({ path }) => path))),
  ]
  if (paths.length === 0) return 'no remedy'
  // Only a change of the culprit can mend it: everything else is as it was.
  if (!paths.includes(spoilt.culprit)) return 'culprit not offered'
  const before = new Map([[spoilt.culprit, spoilt.known.get(spoilt.culprit)!]])
  const fault = faultOf(solveFile(withGivens(spoilt.layout, [], before), 'mended').balance)
  return fault === undefined ? undefined : 'culprit mended, not solved'
}
