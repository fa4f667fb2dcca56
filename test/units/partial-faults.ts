import type { SystemEquation, SystemVariable } from '../../src/balance/system.ts'
import {
  iteratedResidual,
  Outcome,
  residual,
  TapeBuilder,
} from '../../src/equations/expression/index.ts'
import { GradientProgram } from '../../src/equations/newton/index.ts'

/*
 * The partials that a solver uses against central differences of two widths, extrapolated
 * (Richardson), with what the extrapolation changed as an estimate of its error.
 */

/** Half a width, relative to the value. */
const width = 2e-5
/** Relative noise of one evaluation: rounding, and the iterations inside steam properties. */
const noise = 2e-13
const relative = 1e-6

/** Where an equation, as it stands and as it is iterated, has other partials than differences say. */
export function partialFaults(
  equations: readonly SystemEquation[],
  variables: readonly SystemVariable[],
  values: ArrayLike<number>,
): string[] {
  const builder = new TapeBuilder(variables.length)
  const forms = equations.flatMap(({ owner, key, equation }) => {
    const size = [builder.lower(equation.left), builder.lower(equation.right)]
    const stands = { name: `${owner}.${key}`, slot: builder.lower(residual(equation)), size }
    const iterated = iteratedResidual(equation)
    // Where there is no other form, it is the same difference of the two sides.
    const [left, right] = iterated.kind === 'application' ? iterated.operands : []
    if (left === equation.left && right === equation.right) return [stands]
    return [stands, { name: `${stands.name}, iterated`, slot: builder.lower(iterated), size }]
  })
  const seeds = forms.map(({ slot }) => slot)
  const behind = seeds.map((slot) => builder.rowsBehind([slot]))
  const all = builder.rowsBehind([...seeds, ...forms.flatMap(({ size }) => size)])
  const slots = builder.variableCount + builder.rowCount
  const program = new GradientProgram(builder, seeds, () => true, new Float64Array(4 * slots + 64))
  const tape = builder.finish()
  for (let v = 0; v < variables.length; v++) tape.values[v] = values[v]!
  const outcome = tape.evaluate(all)
  if (outcome !== Outcome.fine) return [`${equations[0]?.owner}: no value, outcome ${outcome}`]
  const entries = new Float64Array(program.entryVariable.length)
  program.evaluate(tape, entries)
  const sizes = forms.map(({ size }) =>
    Math.max(...size.map((slot) => Math.abs(tape.values[slot]!))),
  )

  const faults: string[] = []
  forms.forEach(({ name, slot }, k) => {
    const at = (v: number, x: number): number => {
      tape.values[v] = x
      return tape.evaluate(behind[k]!) === Outcome.fine ? tape.values[slot]! : Number.NaN
    }
    for (let e = program.entryFirst[k]!; e < program.entryFirst[k + 1]!; e++) {
      const v = program.entryVariable[e]!
      // Constants are leaves like variables.
      if (v >= variables.length) continue
      const x = values[v]!
      const step = width * Math.abs(x)
      const wide = (at(v, x + step) - at(v, x - step)) / (2 * step)
      const narrow = (at(v, x + step / 2) - at(v, x - step / 2)) / step
      tape.values[v] = x
      tape.evaluate(behind[k]!)
      const expected = narrow + (narrow - wide) / 3
      const allowed =
        relative * Math.abs(expected) +
        0.2 * Math.abs(narrow - wide) +
        (noise * Math.max(sizes[k]!, Math.abs(tape.values[slot]!))) / step
      const off = Math.abs(entries[e]! - expected)
      if (!(off <= allowed)) {
        faults.push(`${name} by ${variables[v]!.path}: ${entries[e]}, differences say ${expected}`)
      }
    }
  })
  return faults
}
