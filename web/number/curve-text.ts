import {
  type Dimension,
  formatQuantity,
  parseQuantity,
  type UnitChoice,
} from '../../src/document.ts'

export type CurvePoint = readonly [r: number, q: number]

export type ReadCurve =
  | { readonly outcome: 'points'; readonly points: readonly CurvePoint[] }
  | { readonly outcome: 'refused'; readonly message: string }

/** What a column of the table measures, and the unit that its bare numbers have. */
export interface CurveColumn {
  readonly dimension: Dimension
  readonly unit: string
}

/** Columns are parted by tabs, semicolons, bars, or else by blanks that no number or unit needs. */
function cells(line: string): readonly string[] {
  for (const sign of ['\t', ';', '|']) {
    if (line.includes(sign)) {
      return line
        .split(sign)
        .map((cell) => cell.trim())
        .filter(Boolean)
    }
  }
  const wide = line.trim().split(/\s{2,}|,\s+/)
  return wide.length >= 2 ? wide : line.trim().split(/\s+/)
}

/**
 * Reads a table of two columns, typed or pasted from a sheet: one point a line, values with or without
 * units. A first line of words is a head and passed over. Points are put in order.
 */
export function readCurve(
  text: string,
  columns: readonly [CurveColumn, CurveColumn],
  units: UnitChoice,
): ReadCurve {
  const points: CurvePoint[] = []
  const lines = text.split(/\r?\n/)
  for (const [i, line] of lines.entries()) {
    if (line.trim() === '') continue
    const parts = cells(line)
    if (points.length === 0 && !/\d/.test(line)) continue
    if (parts.length !== 2) {
      return refused(i, `${parts.length} values stand here instead of two: ${line.trim()}`)
    }
    const values: number[] = []
    for (const [k, part] of parts.entries()) {
      const { dimension, unit } = columns[k] as CurveColumn
      const read = parseQuantity(part, dimension, units, { unit })
      if (read.outcome === 'unreadable') return refused(i, `${part}: ${read.message}`)
      values.push(read.value)
    }
    points.push(values as unknown as CurvePoint)
  }
  if (points.length < 2) {
    return { outcome: 'refused', message: 'A curve needs two points at least, one a line.' }
  }
  points.sort((one, other) => one[0] - other[0])
  const twin = points.findIndex(([r], i) => i > 0 && points[i - 1]?.[0] === r)
  if (twin > 0) {
    const { dimension, unit } = columns[0]
    const { text: twice } = formatQuantity(points[twin]?.[0] ?? 0, dimension, units, {
      unit,
      digits: 'given',
    })
    return {
      outcome: 'refused',
      message: `${twice} ${unit} stands there twice. Leave one of the two.`,
    }
  }
  return { outcome: 'points', points }
}

function refused(line: number, why: string): ReadCurve {
  return { outcome: 'refused', message: `Line ${line + 1}: ${why}` }
}

/** The table of a curve, as it is edited again: every digit that its values need. */
export function curveText(
  points: readonly CurvePoint[],
  columns: readonly [CurveColumn, CurveColumn],
  units: UnitChoice,
): string {
  return points
    .map((point) =>
      point
        .map((value, k) => {
          const { dimension, unit } = columns[k] as CurveColumn
          return formatQuantity(value, dimension, units, { digits: 'all', unit }).text
        })
        .join('\t'),
    )
    .join('\n')
}
