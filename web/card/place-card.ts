export interface Box {
  readonly left: number
  readonly top: number
  readonly width: number
  readonly height: number
}

/** Something a card would hide; the weight says how bad that is, per px2. */
export interface Obstacle extends Box {
  readonly weight: number
}

/** Side of the raster on which places are compared, px. */
const cell = 8
const margin = 12
/** What a px of way to the selected thing counts against hidden area, px2. */
const nearness = 0.6

/**
 * Where a card of a size covers least, and of those places the nearest to `anchor`. A place that the
 * card has already and that covers nothing is kept. All in px from the area's corner.
 */
export function placeCard(
  size: { readonly width: number; readonly height: number },
  area: { readonly width: number; readonly height: number },
  obstacles: readonly Obstacle[],
  anchor: Box | null,
  present: { readonly left: number; readonly top: number } | null,
): { left: number; top: number } {
  const columns = Math.max(1, Math.ceil(area.width / cell))
  const rows = Math.max(1, Math.ceil(area.height / cell))
  const sums = summedArea(obstacles, columns, rows)
  const width = columns + 1
  const hidden = (left: number, top: number): number => {
    const x0 = clamp(Math.floor(left / cell), columns)
    const y0 = clamp(Math.floor(top / cell), rows)
    const x1 = clamp(Math.ceil((left + size.width) / cell), columns)
    const y1 = clamp(Math.ceil((top + size.height) / cell), rows)
    const at = (x: number, y: number) => sums[y * width + x] ?? 0
    return at(x1, y1) - at(x0, y1) - at(x1, y0) + at(x0, y0)
  }
  const mostLeft = Math.max(margin, area.width - size.width - margin)
  const mostTop = Math.max(margin, area.height - size.height - margin)
  if (
    present &&
    present.left <= mostLeft &&
    present.top <= mostTop &&
    hidden(present.left, present.top) === 0
  ) {
    return { left: present.left, top: present.top }
  }
  const x = anchor ? anchor.left + anchor.width / 2 : area.width
  const y = anchor ? anchor.top + anchor.height / 2 : 0
  let best = { left: mostLeft, top: margin }
  let least = Number.POSITIVE_INFINITY
  for (let top = margin; top <= mostTop; top += cell) {
    for (let left = margin; left <= mostLeft; left += cell) {
      const dx = Math.max(left - x, x - left - size.width, 0)
      const dy = Math.max(top - y, y - top - size.height, 0)
      const cost = hidden(left, top) + nearness * Math.hypot(dx, dy)
      if (cost < least) {
        least = cost
        best = { left, top }
      }
    }
  }
  return best
}

function clamp(value: number, most: number): number {
  return Math.min(most, Math.max(0, value))
}

/** Sums of weighted area left of and above each corner of the raster, so that a box costs four reads. */
function summedArea(obstacles: readonly Obstacle[], columns: number, rows: number): Float64Array {
  const raster = new Float64Array(columns * rows)
  for (const { left, top, width, height, weight } of obstacles) {
    const x1 = clamp(Math.ceil((left + width) / cell), columns)
    const y1 = clamp(Math.ceil((top + height) / cell), rows)
    for (let y = clamp(Math.floor(top / cell), rows); y < y1; y++) {
      for (let x = clamp(Math.floor(left / cell), columns); x < x1; x++) {
        const at = y * columns + x
        raster[at] = Math.max(raster[at] ?? 0, weight * cell * cell)
      }
    }
  }
  const sums = new Float64Array((columns + 1) * (rows + 1))
  for (let y = 0; y < rows; y++) {
    let line = 0
    for (let x = 0; x < columns; x++) {
      line += raster[y * columns + x] ?? 0
      sums[(y + 1) * (columns + 1) + x + 1] = (sums[y * (columns + 1) + x + 1] ?? 0) + line
    }
  }
  return sums
}
