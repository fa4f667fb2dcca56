/** Sets names beside their points so that no two overlap and few lines are covered. Lengths in px. */

export interface Rectangle {
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
}

export interface LabelRequest {
  readonly id: string
  /** The point named. */
  readonly x: number
  readonly y: number
  /** Size of the text. */
  readonly width: number
  readonly height: number
}

export interface PlacedLabel extends Rectangle {
  readonly id: string
  /** Which of the places round the point was taken; given back next time, it is kept if it still serves. */
  readonly place: number
  /** The label stands off and needs a leader from its point. */
  readonly leader: boolean
}

/** How much of the chart's lines lies in a rectangle; see `InkGrid`. */
export type InkIn = (rectangle: Rectangle) => number

interface Place {
  /** Where on the label's box the point lies, 0 to 1 of its width and height. */
  readonly ax: number
  readonly ay: number
  /** Direction away from the point. */
  readonly dx: number
  readonly dy: number
}

/** Left and right first, as on a drawing; then above and below, then the corners. */
const directions: readonly Place[] = [
  { ax: 1, ay: 0.5, dx: -1, dy: 0 },
  { ax: 0, ay: 0.5, dx: 1, dy: 0 },
  { ax: 0.5, ay: 1, dx: 0, dy: -1 },
  { ax: 0.5, ay: 0, dx: 0, dy: 1 },
  { ax: 1, ay: 1, dx: -0.7, dy: -0.7 },
  { ax: 0, ay: 1, dx: 0.7, dy: -0.7 },
  { ax: 1, ay: 0, dx: -0.7, dy: 0.7 },
  { ax: 0, ay: 0, dx: 0.7, dy: 0.7 },
]
/** Gaps between point and label, px; beyond the first two the label needs a leader. */
const distances = [7, 11, 24, 40] as const
const firstWithLeader = 2

/** Clear space round a label, px. */
const clearance = 2

export const placeCount = directions.length * distances.length

function overlaps(a: Rectangle, b: Rectangle, gap: number): boolean {
  return (
    a.x < b.x + b.width + gap &&
    b.x < a.x + a.width + gap &&
    a.y < b.y + b.height + gap &&
    b.y < a.y + a.height + gap
  )
}

function boxAt(request: LabelRequest, place: number): Rectangle {
  const direction = directions[place % directions.length] as Place
  const distance = distances[Math.floor(place / directions.length)] as number
  return {
    x: request.x + direction.dx * distance - direction.ax * request.width,
    y: request.y + direction.dy * distance - direction.ay * request.height,
    width: request.width,
    height: request.height,
  }
}

function inside(box: Rectangle, bounds: Rectangle): boolean {
  return (
    box.x >= bounds.x &&
    box.y >= bounds.y &&
    box.x + box.width <= bounds.x + bounds.width &&
    box.y + box.height <= bounds.y + bounds.height
  )
}

/** A label that was there before stays unless another place is better by this much. */
const habit = 14

/**
 * Places labels in the order given; one that finds no free place is left out rather than laid over
 * another.
 *
 * `taken` are boxes to keep clear of altogether (tick labels, legends); `ink` measures what a box would
 * cover; `before` are the labels of the last drawing, whose places are kept while they serve, so that a
 * label does not jump because a number moved a little.
 */
export function placeLabels(
  requests: readonly LabelRequest[],
  bounds: Rectangle,
  options: {
    readonly taken?: readonly Rectangle[]
    readonly ink?: InkIn
    readonly before?: readonly PlacedLabel[]
  } = {},
): PlacedLabel[] {
  const { taken = [], ink = () => 0, before = [] } = options
  const placed: PlacedLabel[] = []
  for (const request of requests) {
    const earlier = before.find((label) => label.id === request.id)?.place
    let best: PlacedLabel | undefined
    let least = Number.POSITIVE_INFINITY
    for (let place = 0; place < placeCount; place += 1) {
      const box = boxAt(request, place)
      if (!inside(box, bounds)) continue
      if (taken.some((other) => overlaps(box, other, clearance))) continue
      if (placed.some((other) => overlaps(box, other, clearance))) continue
      // Another named point under the text would be hidden.
      const hides = requests.some(
        (other) =>
          other !== request && overlaps(box, { x: other.x, y: other.y, width: 0, height: 0 }, 5),
      )
      const cost =
        ink(box) +
        (hides ? 200 : 0) +
        (place % directions.length) * 1.5 +
        Math.floor(place / directions.length) * 12 -
        (place === earlier ? habit : 0)
      if (cost < least) {
        least = cost
        best = {
          ...box,
          id: request.id,
          place,
          leader: Math.floor(place / directions.length) >= firstWithLeader,
        }
      }
    }
    if (best) placed.push(best)
  }
  return placed
}

/** Where the chart's lines run, on a coarse grid: cheap to fill and to ask. */
export class InkGrid {
  private readonly bounds: Rectangle
  private readonly cell: number
  private readonly columns: number
  private readonly rows: number
  private readonly cells: Float32Array

  constructor(bounds: Rectangle, cell = 5) {
    this.bounds = bounds
    this.cell = cell
    this.columns = Math.max(1, Math.ceil(bounds.width / cell))
    this.rows = Math.max(1, Math.ceil(bounds.height / cell))
    this.cells = new Float32Array(this.columns * this.rows)
  }

  /** Lays a line of the given weight; each cell keeps the heaviest line that runs through it. */
  addLine(x1: number, y1: number, x2: number, y2: number, weight: number): void {
    const steps = Math.max(1, Math.ceil(Math.hypot(x2 - x1, y2 - y1) / (this.cell / 2)))
    // A line that leaves the sheet by far costs no more than one that stays.
    if (!(steps < 10_000)) return
    for (let step = 0; step <= steps; step += 1) {
      const t = step / steps
      const column = Math.floor((x1 + t * (x2 - x1) - this.bounds.x) / this.cell)
      const row = Math.floor((y1 + t * (y2 - y1) - this.bounds.y) / this.cell)
      if (column < 0 || row < 0 || column >= this.columns || row >= this.rows) continue
      const at = row * this.columns + column
      if (weight > (this.cells[at] as number)) this.cells[at] = weight
    }
  }

  /** Sum of the weights of the cells that a rectangle touches. */
  inkIn = ({ x, y, width, height }: Rectangle): number => {
    const left = Math.max(0, Math.floor((x - this.bounds.x) / this.cell))
    const right = Math.min(this.columns - 1, Math.floor((x + width - this.bounds.x) / this.cell))
    const top = Math.max(0, Math.floor((y - this.bounds.y) / this.cell))
    const bottom = Math.min(this.rows - 1, Math.floor((y + height - this.bounds.y) / this.cell))
    let sum = 0
    for (let row = top; row <= bottom; row += 1) {
      for (let column = left; column <= right; column += 1) {
        sum += this.cells[row * this.columns + column] as number
      }
    }
    return sum
  }
}
