import { type Dimension, fromShown, toShown, type UnitChoice, unitOf } from '../../src/document.ts'
import type { BalanceMessage } from '../../src/messages.ts'
import { type Geometry, lastInside } from './geometry.ts'
import type { Rectangle } from './place-labels.ts'

export interface IsobarLabel extends Rectangle {
  /** Which isobar. */
  readonly isobar: number
  readonly text: string
  /** The unit, with the first label only. */
  readonly unit: string
}

/** A pressure as a mark on a line needs it: two digits, or whole numbers from a hundred on. */
export function roundedPressure(p: number, units: UnitChoice): { text: string; unit: string } {
  const unit = unitOf('pressure', units)
  const shown = toShown(p, unit)
  const rounded = Math.abs(shown) >= 100 ? Math.round(shown) : Number(shown.toPrecision(2))
  return { text: String(rounded).replace('-', '\u2212'), unit: unit.name }
}

/** Height of a line of small text, px. */
const height = 13
/** Room between two marks, px. */
const gap = 4

/**
 * The marks at the isobars' ends, where they leave the plot: highest pressure first, with its unit; one
 * that would touch another is left out.
 */
export function isobarLabels(
  isobars: BalanceMessage['isobars'],
  geometry: Geometry,
  chartWidth: number,
  units: UnitChoice,
  width: (text: string) => number,
): IsobarLabel[] {
  const order = [...isobars.pressures.keys()].sort(
    (a, b) => (isobars.pressures[b] as number) - (isobars.pressures[a] as number),
  )
  const labels: IsobarLabel[] = []
  for (const isobar of order) {
    const [start, end] = [isobars.starts[isobar] as number, isobars.starts[isobar + 1] as number]
    const place = lastInside(isobars.points, start, end, geometry)
    if (!place) continue
    const { text, unit } = roundedPressure(isobars.pressures[isobar] as number, units)
    const shownUnit = labels.length === 0 ? unit : ''
    const wide = width(shownUnit ? `${text}\u2009${shownUnit}` : text)
    const box =
      place.edge === 'right'
        ? { x: place.x + 3, y: place.y - height / 2, width: wide, height }
        : {
            // The one with the unit reaches leftward, where no other follows.
            x: shownUnit ? place.x + 6 - wide : place.x - wide / 2,
            y: place.y - height - 2,
            width: wide,
            height,
          }
    // A wide number at the right keeps within the chart, over the line's end if it must.
    box.x = Math.min(box.x, chartWidth - wide - 1)
    const touches = labels.some(
      (other) =>
        box.x < other.x + other.width + gap &&
        other.x < box.x + box.width + gap &&
        box.y < other.y + other.height &&
        other.y < box.y + box.height,
    )
    if (!touches) labels.push({ ...box, isobar, text, unit: shownUnit })
  }
  return labels
}

/** Ticks of an axis: round in the unit shown, placed in SI. */
export function axisTicks(
  range: readonly [number, number],
  dimension: Dimension,
  units: UnitChoice,
  round: (low: number, high: number) => readonly number[],
): { si: number[]; shown: readonly number[]; unit: string } {
  // One unit for the whole axis: that of its far end.
  const unit = unitOf(dimension, units, range[1])
  const shown = round(toShown(range[0], unit), toShown(range[1], unit))
  return { si: shown.map((value) => fromShown(value, unit)), shown, unit: unit.name }
}
