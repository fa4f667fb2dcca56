import { type Box, onGrid, type Point } from './geometry.ts'

/** Lining up and spacing out: pure, px at 100 %. */

export interface Arranged {
  readonly id: string
  /** Top left corner of the unit, which the body need not share. */
  readonly at: Point
  readonly body: Box
  /** Height of the shaft's axis on the sheet, for machines. */
  readonly axis?: number
}

export type Alignment = 'left' | 'right' | 'top' | 'bottom' | 'across' | 'down'

export type Places = Readonly<Record<string, Point>>

/**
 * New corners of units lined up by an edge, or by their middles on a level line (`across`) or an
 * upright one (`down`). Machines among each other line up by their shafts. On the grid.
 */
export function aligned(units: readonly Arranged[], how: Alignment): Places {
  const level = how === 'top' || how === 'bottom' || how === 'across'
  const machines = how === 'across' && units.every(({ axis }) => axis !== undefined)
  const mark = ({ body, axis }: Arranged): number => {
    if (machines) return axis as number
    const start = level ? body.y : body.x
    const extent = level ? body.height : body.width
    if (how === 'left' || how === 'top') return start
    return how === 'right' || how === 'bottom' ? start + extent : start + extent / 2
  }
  const marks = units.map(mark)
  const least = Math.min(...marks)
  const most = Math.max(...marks)
  const to =
    how === 'left' || how === 'top'
      ? least
      : how === 'right' || how === 'bottom'
        ? most
        : (least + most) / 2
  return Object.fromEntries(
    units.map((unit, i) => {
      const by = to - (marks[i] as number)
      const [x, y] = unit.at
      return [unit.id, level ? [x, onGrid(y + by)] : [onGrid(x + by), y]] as const
    }),
  )
}

/** New corners with equal gaps between the first and the last, which stay where they are. */
export function distributed(units: readonly Arranged[], along: 'across' | 'down'): Places {
  const x = along === 'across'
  const start = ({ body }: Arranged) => (x ? body.x : body.y)
  const extent = ({ body }: Arranged) => (x ? body.width : body.height)
  const sorted = [...units].sort((a, b) => start(a) - start(b))
  const first = sorted[0]
  const last = sorted.at(-1)
  if (!first || !last || sorted.length < 3) return {}
  const filled = sorted.reduce((sum, unit) => sum + extent(unit), 0)
  const gap = (start(last) + extent(last) - start(first) - filled) / (sorted.length - 1)
  let next = start(first)
  return Object.fromEntries(
    sorted.map((unit, i) => {
      const by = i === 0 || i === sorted.length - 1 ? 0 : next - start(unit)
      next += extent(unit) + gap
      const at: Point = x
        ? [onGrid(unit.at[0] + by), unit.at[1]]
        : [unit.at[0], onGrid(unit.at[1] + by)]
      return [unit.id, at] as const
    }),
  )
}
