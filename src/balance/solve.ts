import { mostStarts } from '../equations/newton/index.ts'
import type { Finding, Status } from './answer.ts'
import { checkAnswer } from './checks.ts'
import { diagnose } from './diagnosis.ts'
import type { Model } from './model.ts'
import { type Closure, Results } from './results.ts'

/** An answer to a layout: solved, or as much as can be and why not more. */
export interface Balance {
  readonly model: Model
  readonly results: Results
  readonly status: Status
  readonly findings: readonly Finding[]
  readonly closure: Closure | null
  readonly undetermined: readonly string[]
  readonly unbounded: readonly string[]
  readonly iterations: number
}

/** Iterations times unknowns spent on looking for another answer. */
const mostSeeking = 40_000

/**
 * Solves a model (again) and says how it ended. With `seek`, other starts are tried where the first
 * finds no answer or an impossible one.
 */
export function solve(model: Model, results: Results = new Results(model), seek = true): Balance {
  const iterations = model.solve()
  if (seek && model.firstFailure() >= 0) seekSolvable(model)
  results.refresh()
  const diagnosis = diagnose(model)
  let checks = checkAnswer(model, results)
  if (seek && diagnosis.status === 'solved' && isImpossible(checks) && model.program.hasChoice) {
    checks = seekPossible(model, results) ?? checks
  }
  const status =
    diagnosis.status === 'solved' && isImpossible(checks) ? 'infeasible' : diagnosis.status
  const undetermined: string[] = []
  const unbounded: string[] = []
  const { variables } = model.system
  variables.forEach(({ isPhantom, path }, index) => {
    if (isPhantom) return
    const state = model.program.lost[index]
    if (state === 2) unbounded.push(path)
    else if (state === 1) undetermined.push(path)
  })
  return {
    model,
    results,
    status,
    findings: [...diagnosis.findings, ...checks],
    closure: status === 'solved' ? results.closure() : null,
    undetermined,
    unbounded,
    iterations,
  }
}

function isImpossible(checks: readonly Finding[]): boolean {
  return checks.some((finding) => finding.severity === 'error')
}

/**
 * The equations may have another answer that is possible where the first is not. Leaves the first
 * in place when there is none.
 */
function seekPossible(model: Model, results: Results): Finding[] | undefined {
  const first = model.values.slice()
  const allowed = model.program.work + mostSeeking
  for (let choice = 1; choice < mostStarts && model.program.work < allowed; choice++) {
    if (!model.solveOtherwise(choice)) continue
    results.refresh()
    const checks = checkAnswer(model, results)
    if (!isImpossible(checks)) return checks
  }
  model.values.set(first)
  model.solveOtherwise(0)
  results.refresh()
  return undefined
}

/** A block may have no answer because an earlier one took another of its own. */
function seekSolvable(model: Model): void {
  if (!model.program.hasChoice) return
  const allowed = model.program.work + mostSeeking
  for (let choice = 1; choice < mostStarts && model.program.work < allowed; choice++) {
    if (model.solveOtherwise(choice)) return
  }
  model.solveOtherwise(0)
}
