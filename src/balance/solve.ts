import type { Finding, Status } from './answer.ts'
import { kindCautions } from './cautions.ts'
import { checkAnswer, isImpossible, isOfGivens } from './checks.ts'
import { diagnose } from './diagnosis.ts'
import type { Model } from './model.ts'
import { type Closure, Results } from './results.ts'
import { seekAnswer } from './seek.ts'

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

/**
 * Solves a model (again) and says how it ended. With `seek`, other starts are tried where the first
 * finds no answer or an impossible one.
 */
export function solve(model: Model, results: Results = new Results(model), seek = true): Balance {
  const iterations = model.solve()
  results.refresh()
  let checks: readonly Finding[] = checkAnswer(model, results)
  if (
    seek &&
    isSquare(model) &&
    (model.firstFailure() >= 0 || isImpossible(checks)) &&
    !isOfGivens(model, checks)
  ) {
    checks = seekAnswer(model, results, checks)
  }
  const diagnosis = diagnose(model)
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
    findings: [
      ...diagnosis.findings,
      ...checks,
      ...(status === 'solved' ? kindCautions(model, results) : []),
    ],
    closure: status === 'solved' ? results.closure() : null,
    undetermined,
    unbounded,
    iterations,
  }
}

function isSquare({ structure }: Model): boolean {
  return structure.missing === 0 && structure.excess === 0
}
