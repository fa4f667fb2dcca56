import { forEachVariableOf } from '../equations/expression/index.ts'
import type { Dimension } from '../quantity/dimension.ts'
import type { Model } from './model.ts'
import type { Misfit } from './structure.ts'
import type { System } from './system.ts'

/** As a plant is laid out: what a unit usually has given, then pressures, temperatures, flows. */
const layingOut: Partial<Record<Dimension, number>> = { pressure: 1, temperature: 2, massFlow: 3 }

function asLaidOut({ system }: Model, paths: readonly string[]): string[] {
  const rankOf = (path: string): number => {
    const index = system.indexOf.get(path)
    if (index === undefined) return path.endsWith('.T') ? 2 : 5
    const { given, dimension } = system.variables[index]!.description
    return given ? 0 : (layingOut[dimension] ?? 4)
  }
  return [...paths].sort((a, b) => rankOf(a) - rankOf(b))
}

/**
 * Of these quantities some that would together fix what is open: as many as numbers are missing, none of
 * them following from the others by the structure. What a set may leave out so that its equations still
 * have an unknown each is a transversal matroid, so taking greedily is taking best (Edmonds and
 * Fulkerson 1965).
 */
export function sufficient(
  model: Model,
  parts: readonly Misfit[],
  quantities: readonly string[],
): string[] {
  const matching = new OpenPart(model, parts)
  let missing = parts.reduce((sum, part) => sum + part.count, 0)
  const chosen: string[] = []
  for (const path of asLaidOut(model, quantities)) {
    if (missing === 0) break
    const variable = variableBehind(model, path)
    if (variable === undefined || !matching.release(variable)) continue
    chosen.push(path)
    missing -= 1
  }
  return chosen
}

/** A temperature that is no unknown of its own stands for the enthalpy, which it fixes off saturation. */
function variableBehind({ system }: Model, path: string): number | undefined {
  const own = system.indexOf.get(path)
  if (own !== undefined || !path.endsWith('.T')) return own
  return system.indexOf.get(`${path.slice(0, -2)}.h`)
}

/** The equations of the open parts, each with an unknown of its own, which can be let go of one by one. */
class OpenPart {
  private readonly unknowns: number[][] = []
  private readonly rowOf = new Map<number, number>()
  private readonly open: Set<number>

  constructor({ system, structure }: Model, parts: readonly Misfit[]) {
    this.open = new Set(structure.open)
    for (const part of parts) for (const e of part.equations) this.add(system, e)
    // What describes the open part fixes it when given.
    const listed = new Set(parts.flatMap((part) => part.variables))
    for (const { equations, variables } of structure.blocks.slice(structure.describingFrom)) {
      const [variable] = variables
      if (variable === undefined || !listed.has(variable)) continue
      this.open.add(variable)
      this.add(system, equations[0]!)
    }
    for (let row = 0; row < this.unknowns.length; row++) this.match(row, new Set())
  }

  /** Its other unknowns are solved by themselves. */
  private add(system: System, equation: number): void {
    const unknowns: number[] = []
    forEachVariableOf(system.equations[equation]!.equation, (index) => {
      if (this.open.has(index)) unknowns.push(index)
    })
    this.unknowns.push(unknowns)
  }

  /** Whether every equation still has an unknown once this one is given; then it is. */
  release(variable: number): boolean {
    if (!this.open.delete(variable)) return false
    const row = this.rowOf.get(variable)
    if (row === undefined) return true
    this.rowOf.delete(variable)
    if (this.match(row, new Set())) return true
    this.open.add(variable)
    this.rowOf.set(variable, row)
    return false
  }

  private match(row: number, seen: Set<number>): boolean {
    for (const variable of this.unknowns[row]!) {
      if (!this.open.has(variable) || seen.has(variable)) continue
      seen.add(variable)
      const holder = this.rowOf.get(variable)
      if (holder === undefined || this.match(holder, seen)) {
        this.rowOf.set(variable, row)
        return true
      }
    }
    return false
  }
}
