import {
  type Box,
  holds,
  overlap,
  type Point,
  type Side,
  type Size,
  sharedArea,
} from './geometry.ts'
import type { Route } from './routing.ts'

/** Sets labels and tags where they cover nothing. Lengths in px at 100 %. */

/** What text must not cover. */
export interface Occupied {
  readonly bodies: readonly Box[]
  readonly streams: readonly { readonly id: string; readonly route: Route }[]
}

export interface LabelRequest {
  readonly id: string
  readonly body: Box
  /** The label and its figure in two lines, beside each other, and in more lines where words allow. */
  readonly shapes: readonly { readonly arrangement: Arrangement; readonly size: Size }[]
  /** The sides in the order wished. */
  readonly wish: readonly Side[]
  /** Where within the symbol a text of that size has room; it goes there first. */
  readonly inside?: (size: Size) => Point | null
  /** Where streams meet the symbol. */
  readonly anchors: readonly { readonly x: number; readonly y: number; readonly side: Side }[]
}

export type Arrangement = 'stacked' | 'beside' | 'wrapped'

export interface PlacedLabel extends Box {
  readonly id: string
  /** Within its symbol. */
  readonly inside?: true
  readonly arrangement: Arrangement
  readonly align: 'left' | 'centre' | 'right'
}

export interface TagRequest {
  readonly id: string
  readonly route: Route
  readonly shapes: readonly { readonly lines: number; readonly size: Size }[]
}

export interface PlacedTag extends Box {
  readonly id: string
  readonly lines: number
  readonly align: 'left' | 'right'
  /** From the stream to the text. */
  readonly leader: readonly Point[]
}

const gap = 6
/** Half the width that a stream takes, walls and all. */
const streamReach = 4
/** Between a text and the stream beside it. */
const stemGap = 8
/** Room kept between texts. */
const between = 3

/** Boxes of a stream's straights, as wide as it may be drawn. */
export function boxesOf(route: Route, reach = streamReach): Box[] {
  const boxes: Box[] = []
  for (let i = 1; i < route.length; i++) {
    const [x1, y1] = route[i - 1] as Point
    const [x2, y2] = route[i] as Point
    boxes.push({
      x: Math.min(x1, x2) - reach,
      y: Math.min(y1, y2) - reach,
      width: Math.abs(x2 - x1) + 2 * reach,
      height: Math.abs(y2 - y1) + 2 * reach,
    })
  }
  return boxes
}

/** Boxes to be kept clear, found by their place. */
class Field {
  private readonly cells = new Map<number, Box[]>()
  private readonly cell = 96

  add(box: Box): void {
    this.each(box, (key) => {
      const there = this.cells.get(key)
      if (there) there.push(box)
      else this.cells.set(key, [box])
    })
  }

  /** Area covered, px2. A box that spans several cells counts in each: covering is what matters, not how much. */
  covered(box: Box): number {
    let sum = 0
    this.each(box, (key) => {
      for (const other of this.cells.get(key) ?? []) sum += sharedArea(box, other)
    })
    return sum
  }

  private each(box: Box, visit: (key: number) => void): void {
    const left = Math.floor(box.x / this.cell)
    const right = Math.floor((box.x + box.width) / this.cell)
    const top = Math.floor(box.y / this.cell)
    const bottom = Math.floor((box.y + box.height) / this.cell)
    for (let i = left; i <= right; i++) {
      for (let j = top; j <= bottom; j++) visit(i * 65536 + j)
    }
  }
}

interface Candidate extends Box {
  readonly arrangement: Arrangement
  readonly align: PlacedLabel['align']
}

function candidatesOf(request: LabelRequest): Candidate[] {
  const { body } = request
  const found: Candidate[] = []
  const right = body.x + body.width
  const bottom = body.y + body.height
  inside(request, found)
  // Close by on every side first, then farther off.
  for (const away of [gap, gap + 18, gap + 36]) {
    for (const side of request.wish) {
      for (const { arrangement, size } of request.shapes) {
        const { width, height } = size
        const put = (x: number, y: number, align: PlacedLabel['align']) =>
          found.push({ x, y, width, height, arrangement, align })
        const stems = request.anchors.filter((anchor) => anchor.side === side)
        if (side === 'top' || side === 'bottom') {
          const y = side === 'top' ? body.y - away - height : bottom + away
          if (stems.length === 0) put(body.x + body.width / 2 - width / 2, y, 'centre')
          for (const stem of stems) put(stem.x + stemGap, y, 'left')
          for (const stem of stems) put(stem.x - stemGap - width, y, 'right')
          put(body.x, y, 'left')
          put(right - width, y, 'right')
        } else {
          const x = side === 'left' ? body.x - away - width : right + away
          const align = side === 'left' ? 'right' : 'left'
          if (stems.length === 0) put(x, body.y + body.height / 2 - height / 2, align)
          put(x, bottom - height, align)
          put(x, body.y, align)
          for (const stem of stems) put(x, stem.y + streamReach + 3, align)
          for (const stem of stems) put(x, stem.y - streamReach - 3 - height, align)
          put(x, bottom + 2, align)
          put(x, body.y - height - 2, align)
        }
      }
    }
  }
  return found
}

/** Adds the places inside the symbol. */
function inside(request: LabelRequest, found: Candidate[]): void {
  for (const { arrangement, size } of request.shapes) {
    const at = arrangement === 'beside' ? null : request.inside?.(size)
    if (at) found.push({ x: at[0], y: at[1], ...size, arrangement, align: 'centre' })
  }
}

/**
 * A place for each label, in the order given: the one that covers least, the earlier the better.
 * `staying` labels keep the place they have as long as they cover nothing there.
 */
export function placeLabels(
  requests: readonly LabelRequest[],
  occupied: Occupied,
  staying: ReadonlyMap<string, PlacedLabel> = new Map(),
): Map<string, PlacedLabel> {
  const streams = new Field()
  for (const { route } of occupied.streams) for (const box of boxesOf(route)) streams.add(box)
  const bodies = new Field()
  for (const body of occupied.bodies) bodies.add(body)
  const texts = new Field()
  const placed = new Map<string, PlacedLabel>()
  for (const request of requests) {
    const within = request.inside !== undefined
    const covered = (box: Box) => {
      if (within && overlap(box, request.body)) return 0
      const lines = streams.covered(box)
      // However little of a stream is covered, its course is hidden.
      return 4 * bodies.covered(box) + 8 * lines + (lines > 0 ? 160 : 0)
    }
    const stays = staying.get(request.id)
    if (stays && covered(stays) === 0 && texts.covered(stays) === 0) {
      placed.set(request.id, stays)
      texts.add(padded(stays))
      continue
    }
    let best: Candidate | null = null
    let least = Number.POSITIVE_INFINITY
    for (const [i, candidate] of candidatesOf(request).entries()) {
      if (2 * i >= least) break
      const cost = covered(candidate) + 8 * texts.covered(candidate) + 2 * i
      if (cost < least) {
        least = cost
        best = candidate
      }
    }
    if (!best) continue
    const label: PlacedLabel = {
      id: request.id,
      ...best,
      ...(within && overlap(best, request.body) && { inside: true }),
    }
    placed.set(request.id, label)
    texts.add(padded(label))
  }
  return placed
}

const padded = (box: Box): Box => ({
  x: box.x - between,
  y: box.y - between,
  width: box.width + 2 * between,
  height: box.height + 2 * between,
})

/** How far along a straight a tag's leader may start, as shares of its length. */
const starts = [0.5, 0.25, 0.75, 0.12, 0.88] as const
const reaches = [14, 26] as const

/**
 * A place with a leader for each tag that finds one where it covers nothing; tags that find none are
 * left out. `staying` tags keep the place they have, or none, as long as they cover nothing there.
 * No tag lies outside `bounds`.
 */
export function placeTags(
  requests: readonly TagRequest[],
  occupied: Occupied,
  labels: Iterable<Box>,
  staying: ReadonlyMap<string, PlacedTag | null> = new Map(),
  bounds: Box | null = null,
): Map<string, PlacedTag> {
  const field = new Field()
  for (const { route } of occupied.streams) for (const box of boxesOf(route)) field.add(box)
  for (const body of occupied.bodies) field.add(padded(body))
  for (const label of labels) field.add(padded(label))
  const leaders = new Field()
  const placed = new Map<string, PlacedTag>()
  for (const request of requests) {
    const stays = staying.get(request.id)
    const tag =
      stays === undefined
        ? freeTag(request, field, leaders, bounds)
        : stays && field.covered(stays) === 0
          ? stays
          : null
    if (!tag) continue
    placed.set(request.id, tag)
    field.add(padded(tag))
    for (const box of boxesOf(tag.leader, 1)) {
      leaders.add(box)
      field.add(box)
    }
  }
  return placed
}

function freeTag(
  request: TagRequest,
  field: Field,
  leaders: Field,
  bounds: Box | null,
): PlacedTag | null {
  const straights = request.route
    .slice(1)
    .map((end, i) => ({ start: request.route[i] as Point, end }))
    .map((one) => ({
      ...one,
      length: Math.abs(one.end[0] - one.start[0]) + Math.abs(one.end[1] - one.start[1]),
    }))
    .filter(({ length }) => length >= 24)
    .sort((a, b) => b.length - a.length)
  for (const reach of reaches) {
    for (const { start, end } of straights) {
      const level = start[1] === end[1]
      for (const share of starts) {
        const at: Point = [
          Math.round(start[0] + (end[0] - start[0]) * share),
          Math.round(start[1] + (end[1] - start[1]) * share),
        ]
        for (const { lines, size } of request.shapes) {
          for (const way of level ? [1, -1] : [1, -1]) {
            const tag = level
              ? aboveOrBelow(request.id, at, way, reach, lines, size)
              : besides(request.id, at, way, reach, lines, size)
            for (const one of tag) {
              if (bounds && !holds(bounds, one)) continue
              if (field.covered(one) === 0 && clear(one.leader, field, leaders)) return one
            }
          }
        }
      }
    }
  }
  return null
}

/** A leader may start on its own stream but cross no other, nor any text. */
function clear(leader: readonly Point[], field: Field, leaders: Field): boolean {
  const [first, second] = leader
  if (!first || !second) return true
  const dx = Math.sign(second[0] - first[0])
  const dy = Math.sign(second[1] - first[1])
  const start: Point = [first[0] + dx * (streamReach + 1), first[1] + dy * (streamReach + 1)]
  const rest = [start, ...leader.slice(1)]
  return boxesOf(rest, 0.5).every((box) => field.covered(box) === 0 && leaders.covered(box) === 0)
}

const firstLine = 8

function aboveOrBelow(
  id: string,
  at: Point,
  way: number,
  reach: number,
  lines: number,
  size: Size,
): PlacedTag[] {
  const elbow: Point = [at[0], at[1] + way * reach]
  const top = way > 0 ? elbow[1] : elbow[1] - size.height
  // Straight into the text, then with an elbow to its first or last line.
  const level = way > 0 ? elbow[1] + firstLine : elbow[1] - size.height + firstLine
  return [
    {
      id,
      x: at[0] - 10,
      y: top,
      ...size,
      lines,
      align: 'left',
      leader: [at, elbow],
    },
    { id, x: at[0] - size.width + 10, y: top, ...size, lines, align: 'right', leader: [at, elbow] },
    {
      id,
      x: at[0] + 10,
      y: level - firstLine,
      ...size,
      lines,
      align: 'left',
      leader: [at, [at[0], level], [at[0] + 8, level]],
    },
    {
      id,
      x: at[0] - 10 - size.width,
      y: level - firstLine,
      ...size,
      lines,
      align: 'right',
      leader: [at, [at[0], level], [at[0] - 8, level]],
    },
  ]
}

function besides(
  id: string,
  at: Point,
  way: number,
  reach: number,
  lines: number,
  size: Size,
): PlacedTag[] {
  const end: Point = [at[0] + way * reach, at[1]]
  return [
    {
      id,
      x: way > 0 ? end[0] + 2 : end[0] - 2 - size.width,
      y: at[1] - firstLine,
      ...size,
      lines,
      align: way > 0 ? 'left' : 'right',
      leader: [at, end],
    },
  ]
}

/** The point halfway along a route: what a moved tag keeps its distance to. */
export function middleOf(route: Route): Point {
  const lengths = route.slice(1).map(([x, y], i) => {
    const [x0, y0] = route[i] as Point
    return Math.abs(x - x0) + Math.abs(y - y0)
  })
  let left = lengths.reduce((sum, length) => sum + length, 0) / 2
  for (const [i, length] of lengths.entries()) {
    const [x0, y0] = route[i] as Point
    const [x1, y1] = route[i + 1] as Point
    if (left <= length && length > 0) {
      return [x0 + ((x1 - x0) * left) / length, y0 + ((y1 - y0) * left) / length]
    }
    left -= length
  }
  return route[0] ?? [0, 0]
}

/** A tag where the user has put it, its leader from the nearest point of the stream. */
export function tagAt(request: TagRequest, at: Point): PlacedTag | null {
  const [shape] = request.shapes
  if (!shape) return null
  const [mx, my] = middleOf(request.route)
  const box = { x: mx + at[0], y: my + at[1], ...shape.size }
  let start: Point | null = null
  let stop: Point = [0, 0]
  let least = Number.POSITIVE_INFINITY
  const clamp = (value: number, a: number, b: number) =>
    Math.min(Math.max(value, Math.min(a, b)), Math.max(a, b))
  for (let i = 1; i < request.route.length; i++) {
    const [x1, y1] = request.route[i - 1] as Point
    const [x2, y2] = request.route[i] as Point
    // Nearest to the middle of the text, then the text's nearest edge to that.
    const near: Point = [
      clamp(box.x + box.width / 2, x1, x2),
      clamp(box.y + box.height / 2, y1, y2),
    ]
    const edge: Point = [
      clamp(near[0], box.x - 2, box.x + box.width + 2),
      clamp(near[1], box.y, box.y + box.height),
    ]
    const distance = (near[0] - edge[0]) ** 2 + (near[1] - edge[1]) ** 2
    if (distance < least) {
      least = distance
      start = near
      stop = edge
    }
  }
  const leader = start && least > 16 ? [start, stop] : []
  const align = stop[0] > box.x + box.width / 2 ? 'right' : 'left'
  return { id: request.id, ...box, lines: shape.lines, align, leader }
}
