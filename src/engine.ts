/** Door for the worker and the command line: everything that solves. */

import type { ProcessName } from './balance/answer.ts'
import { givensOf } from './balance/case/freeze.ts'
import { solveCase } from './balance/case/solve-case.ts'
import { curvesOf, drynessLines, isobarsOf } from './balance/chart-data.ts'
import { type DerivedNames, derivedNames, derivedOf } from './balance/derived.ts'
import { heatProfilesOf } from './balance/heat-profile.ts'
import { Model } from './balance/model.ts'
import { domePoints } from './balance/paths.ts'
import { Questions } from './balance/questions.ts'
import { Results } from './balance/results.ts'
import { type Balance, solve } from './balance/solve.ts'
import type {
  Answer,
  BalanceMessage,
  DomeMessage,
  NamesMessage,
  QuestionRequest,
  Request,
  SolveRequest,
} from './messages.ts'
import type { Layout } from './plant/document.ts'
import { mainSteam, solveAtEqual } from './review/equal-basis.ts'

/** Answers the window's requests; keeps the last model, so that an edit of a value solves warm. */
export interface Engine {
  answer(request: Request): Answer[]
  /** The two-phase dome, the same for every plant. */
  dome(): DomeMessage
}

/** `clock` tells the time in ms. */
export function createEngine(clock: () => number = Date.now): Engine {
  let kept: { model: Model; results: Results; signature: string; number: number } | undefined
  let counter = 0
  let namesSent = 0
  let names: DerivedNames = { paths: [], account: [] }
  const questions = new Questions()

  /** A case is solved afresh: its givens follow from the design's solution. */
  function caseOf(request: SolveRequest): { balance: Balance; number: number } | string {
    const { plant, layout, case: id, equal } = request
    const solved = equal ? solveAtEqual(plant, layout, id, equal) : solveCase(plant, layout, id)
    if (solved.outcome === 'unusable') return solved.message
    const { balance, remarks } = solved
    counter++
    kept = undefined
    return {
      balance: { ...balance, findings: [...remarks, ...balance.findings] },
      number: counter,
    }
  }

  function modelFor(layout: Layout): { model: Model; results: Results; number: number } {
    const signature = signatureOf(layout)
    if (kept !== undefined && kept.signature === signature && update(kept.model, layout))
      return kept
    const model = new Model(layout)
    counter++
    kept = { model, results: new Results(model), signature, number: counter }
    return kept
  }

  return {
    answer(request) {
      if (request.type !== 'solve') return [answerTo(questions, request)]
      const start = clock()
      questions.takeOver(undefined)
      const answers: Answer[] = []
      const layout = request.plant.layouts.find((one) => one.id === request.layout)
      if (layout === undefined) {
        return [
          {
            type: 'unusable',
            sequence: request.sequence,
            message: `The plant has no layout ${request.layout}.`,
          },
        ]
      }
      try {
        let balance: Balance
        let number: number
        if (request.equal || isCase(layout, request.case)) {
          const solved = caseOf(request)
          if (typeof solved === 'string') {
            return [...answers, { type: 'unusable', sequence: request.sequence, message: solved }]
          }
          balance = solved.balance
          number = solved.number
        } else {
          const found = modelFor(layout)
          balance = solve(found.model, found.results)
          number = found.number
        }
        questions.takeOver(balance)
        if (namesSent !== number) {
          namesSent = number
          names = derivedNames(balance)
          answers.push(namesOf(request, balance, number, names))
        }
        answers.push({
          ...balanceMessage(request, balance, number, names),
          milliseconds: clock() - start,
        })
      } catch (error) {
        // A programming mistake must not leave the window waiting for an answer.
        kept = undefined
        answers.push({
          type: 'unusable',
          sequence: request.sequence,
          message: `The balance failed: ${error instanceof Error ? error.message : String(error)}`,
        })
      }
      return answers
    },
    dome: () => ({ type: 'dome', points: domePoints(), dryness: drynessLines() }),
  }
}

/** A question that cannot be answered must not leave the window waiting, nor cost it the balance. */
function answerTo(questions: Questions, request: QuestionRequest): Answer {
  const { sequence } = request
  try {
    return { type: 'answer', sequence, answer: questions.answer(request) }
  } catch {
    questions.takeOver(undefined)
    return { type: 'answer', sequence, answer: questions.answer(request) }
  }
}

/** Whether a case changes anything: the design case of a layout only names it. */
function isCase(layout: Layout, id: string | null): boolean {
  const chosen = layout.cases.find((one) => one.id === id)
  if (chosen === undefined) return false
  const { frozen, loadControl, given = {}, free = [], outOfService = [] } = chosen
  return (
    frozen === true ||
    loadControl !== undefined ||
    Object.keys(given).length > 0 ||
    free.length > 0 ||
    outOfService.length > 0
  )
}

/** What must stay the same for a model to serve a layout with other values. */
function signatureOf(layout: Layout): string {
  const givens = (given: Layout['plant']['given']): string =>
    Object.entries(given)
      .map(([name, value]) =>
        typeof value === 'number' ? name : `${name}:${JSON.stringify(value)}`,
      )
      .join(',')
  return [
    layout.id,
    `${layout.ambient.T},${layout.ambient.p}`,
    ...layout.units.map(
      (unit) =>
        `${unit.id}|${unit.kind}|${unit.label}|${JSON.stringify(unit.options ?? {})}|${givens(unit.given)}`,
    ),
    ...layout.streams.map(
      (stream) =>
        `${stream.id}|${stream.from}|${stream.to}|${stream.label ?? ''}|${givens(stream.given)}`,
    ),
    ...layout.shafts.map(
      (shaft) =>
        `${shaft.id}|${shaft.turbines}|${shaft.pumps}|${shaft.generator}|${shaft.label ?? ''}|${givens(shaft.given)}`,
    ),
    givens(layout.plant.given),
  ].join(';')
}

/** Takes over the values of a layout with the same signature; false where one folds or unfolds. */
function update(model: Model, layout: Layout): boolean {
  const take = (owner: string, given: Layout['plant']['given']): boolean => {
    for (const [name, value] of Object.entries(given)) {
      if (typeof value !== 'number') continue
      const index = model.system.indexOf.get(`${owner}.${name}`)
      if (index !== undefined && !model.set(index, value)) return false
    }
    return true
  }
  return (
    layout.units.every((unit) => take(unit.id, unit.given)) &&
    layout.streams.every((stream) => take(stream.id, stream.given)) &&
    layout.shafts.every((shaft) => take(shaft.id, shaft.given)) &&
    take('plant', layout.plant.given)
  )
}

function namesOf(
  request: SolveRequest,
  balance: Balance,
  structure: number,
  derived: DerivedNames,
): NamesMessage {
  const { model, results } = balance
  const processes: ProcessName[] = []
  for (const { unit, kind, shape, streams } of model.system.units) {
    for (const { from, to } of kind.paths(shape)) {
      const first = streams.get(from)
      const last = streams.get(to)
      if (first !== undefined && last !== undefined) {
        processes.push({ unit: unit.id, from: first, to: last })
      }
    }
  }
  return {
    type: 'names',
    structure,
    paths: results.paths,
    streams: model.system.layout.streams.map((stream) => stream.id),
    processes,
    layout: request.layout,
    case: request.case,
    given: [...givensOf(model.system.layout).keys()],
    mainSteam: mainSteam(balance) ?? null,
    derived,
  }
}

function balanceMessage(
  request: SolveRequest,
  balance: Balance,
  structure: number,
  names: DerivedNames,
): Omit<BalanceMessage, 'milliseconds'> {
  const { model, results } = balance
  const { missing, excess, equationCount, blocks } = model.structure
  return {
    type: 'balance',
    sequence: request.sequence,
    structure,
    status: balance.status,
    values: results.values.slice(),
    phases: results.states.phases.slice(),
    findings: balance.findings,
    ledger: {
      unknowns: equationCount + missing - excess,
      equations: equationCount,
      blocks: blocks.length,
      iterations: balance.iterations,
      missing,
      excess,
    },
    closure: balance.closure,
    undetermined: balance.undetermined,
    unbounded: balance.unbounded,
    curves: curvesOf(balance),
    isobars: isobarsOf(balance),
    derived: derivedOf(balance, names),
    profiles: heatProfilesOf(balance),
  }
}

/** Buffers that may be handed over instead of copied. */
export function transferables(answer: Answer): ArrayBuffer[] {
  if (answer.type === 'dome') {
    const { points, dryness } = answer
    return [points, dryness.points, dryness.starts].map((array) => array.buffer as ArrayBuffer)
  }
  if (answer.type !== 'balance') return []
  const { values, phases, curves, isobars, derived } = answer
  return [
    values,
    phases,
    curves.points,
    curves.starts,
    curves.flows,
    isobars.pressures,
    isobars.points,
    isobars.starts,
    derived.values,
    derived.account,
  ].map((array) => array.buffer as ArrayBuffer)
}

export { type AskedBalance, balanceOf, balanceOfCase } from './balance/balance-of.ts'
