import type { Finding, Status } from '../messages.ts'
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

/** Solves a model (again) and says how it ended. */
export function solve(model: Model, results: Results = new Results(model)): Balance {
  const iterations = model.solve()
  results.refresh()
  const diagnosis = diagnose(model)
  const checks = checkAnswer(model, results)
  const impossible = checks.some((finding) => finding.severity === 'error')
  const status = diagnosis.status === 'solved' && impossible ? 'infeasible' : diagnosis.status
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
