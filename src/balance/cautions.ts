import type { Finding } from './answer.ts'
import { Wording } from './findings.ts'
import type { Model } from './model.ts'
import type { PlacedUnit } from './placed-unit.ts'
import type { Results } from './results.ts'
import { solvedUnit } from './solved-unit.ts'

/** What each unit of a solved plant sees by itself that is unusual: cautions and remarks, never errors. */
export function kindCautions({ system, options }: Model, results: Results): Finding[] {
  const wording = new Wording(system.layout)
  return system.units.flatMap((placed) => {
    const { unit, kind } = placed
    if (!kind.cautions || options.outOfService?.has(unit.id)) return []
    return kind.cautions(solvedUnit(placed, results)).map((caution) => {
      const quantities = caution.quantities.map((name) => pathOf(placed, name))
      const streams = quantities
        .map((path) => path.slice(0, path.indexOf('.')))
        .filter((id) => id !== unit.id)
      const message = caution.message.replace(/\{(\d)\}/g, (_, k) => {
        const [value, dimension] = caution.values[k]!
        return wording.value(value, dimension)
      })
      return {
        severity: caution.severity ?? ('caution' as const),
        code: caution.code,
        where: [...new Set([unit.id, ...streams])],
        quantities,
        message: `${wording.name(unit.id)}: ${message}`,
        advice: caution.advice,
      }
    })
  })
}

/** `exhaust.x` to `s7.x`, the stream there; a quantity of the unit to its own path. */
function pathOf({ unit, streams }: PlacedUnit, name: string): string {
  const dot = name.indexOf('.')
  return dot < 0 ? `${unit.id}.${name}` : `${streams.get(name.slice(0, dot))}${name.slice(dot)}`
}
