import type { Finding } from './answer.ts'
import { checkAnswer, isImpossible } from './checks.ts'
import { variablesBehind } from './givens-behind.ts'
import type { Model } from './model.ts'
import type { Results } from './results.ts'

/** Rows evaluated in search of another answer. */
const mostSeeking = 6_000_000

/** Each of the ways is tried with as many sets of first guesses. */
const mostChoices = 40

/**
 * Ways to an answer when the usual one fails or leads to an impossible one, the best first: each
 * returns whether it reached an answer.
 */
function* attempts(model: Model): Generator<() => boolean> {
  for (let choice = 0; choice < mostChoices; choice++) {
    yield () => model.solveFromDesign(choice)
    if (choice > 0) yield () => model.solveOtherwise(choice)
    yield () => model.solveByAiming(choice)
  }
}

/**
 * Looks for another answer to a plant that has none yet, or an impossible one. Returns what its
 * checks find; when there is none, the model is left as it was, or with an impossible answer where
 * it had none at all.
 */
export function seekAnswer(
  model: Model,
  results: Results,
  first: readonly Finding[],
): readonly Finding[] {
  if (!mayDiffer(model, first)) return first
  const count = model.system.variables.length
  let kept = model.firstFailure() < 0 ? model.values.slice(0, count) : undefined
  const allowed = model.work + mostSeeking
  for (const attempt of attempts(model)) {
    if (model.work > allowed) break
    if (!attempt()) continue
    results.refresh()
    const checks = checkAnswer(model, results)
    if (!isImpossible(checks)) return checks
    kept ??= model.values.slice(0, count)
  }
  if (kept === undefined) model.solveOtherwise(0)
  else model.solveFrom(kept)
  results.refresh()
  return checkAnswer(model, results)
}

/** Codes of findings that name all that they follow from. */
const namesAll: ReadonlySet<string> = new Set([
  'reversed-flow',
  'pressure-rises',
  'entry-below-unit',
  'impossible-value',
])

/** Whether another answer could be free of each of these faults: none of them follows from givens alone. */
function mayDiffer(model: Model, findings: readonly Finding[]): boolean {
  const { program, structure, system } = model
  const failed = model.firstFailure()
  if (failed >= 0) return program.hasChoiceBehind(structure.blocks[failed]!.variables)
  return findings.every(({ severity, code, quantities, where }) => {
    if (severity !== 'error') return true
    const behind = quantities.flatMap((path) => variablesBehind(model, path))
    // Other faults hang on every state around their unit, not only on what they name.
    if (!namesAll.has(code)) {
      for (const id of where) {
        for (const { base } of system.unitOf.get(id)?.connections ?? []) {
          behind.push(base, base + 1, base + 2)
        }
      }
    }
    return program.hasChoiceBehind(behind)
  })
}
