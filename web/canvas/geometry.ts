/** Points, boxes and sides on the drawing sheet, px at 100 %. */

export type Point = readonly [x: number, y: number]

export type Side = 'left' | 'right' | 'top' | 'bottom'

export interface Size {
  readonly width: number
  readonly height: number
}

export interface Box {
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
}

/** Everything stands on this grid. */
export const grid = 8

export const onGrid = (value: number): number => Math.round(value / grid) * grid

/** The way a stream leaves through a side. */
export const outward: Readonly<Record<Side, Point>> = {
  left: [-1, 0],
  right: [1, 0],
  top: [0, -1],
  bottom: [0, 1],
}

const flipped: Readonly<Record<Side, Side>> = {
  left: 'right',
  right: 'left',
  top: 'top',
  bottom: 'bottom',
}

/** The side as it lies in a mirrored symbol. */
export const mirroredSide = (side: Side): Side => flipped[side]

export const isHorizontal = (side: Side): boolean => side === 'left' || side === 'right'

export function grown(box: Box, by: number): Box {
  return {
    x: box.x - by,
    y: box.y - by,
    width: box.width + 2 * by,
    height: box.height + 2 * by,
  }
}

export function overlap(a: Box, b: Box): boolean {
  return a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height
}

/** True where the first box holds the second. */
export function holds(outer: Box, inner: Box): boolean {
  return (
    inner.x >= outer.x &&
    inner.y >= outer.y &&
    inner.x + inner.width <= outer.x + outer.width &&
    inner.y + inner.height <= outer.y + outer.height
  )
}

/** Area that two boxes share. */
export function sharedArea(a: Box, b: Box): number {
  const width = Math.min(a.x + a.width, b.x + b.width) - Math.max(a.x, b.x)
  const height = Math.min(a.y + a.height, b.y + b.height) - Math.max(a.y, b.y)
  return width > 0 && height > 0 ? width * height : 0
}

export function centre(box: Box): Point {
  return [box.x + box.width / 2, box.y + box.height / 2]
}

/** The box that holds all boxes; null of none. */
export function around(boxes: Iterable<Box>): Box | null {
  let left = Number.POSITIVE_INFINITY
  let top = Number.POSITIVE_INFINITY
  let right = Number.NEGATIVE_INFINITY
  let bottom = Number.NEGATIVE_INFINITY
  for (const box of boxes) {
    left = Math.min(left, box.x)
    top = Math.min(top, box.y)
    right = Math.max(right, box.x + box.width)
    bottom = Math.max(bottom, box.y + box.height)
  }
  return left <= right ? { x: left, y: top, width: right - left, height: bottom - top } : null
}
