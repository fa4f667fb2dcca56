import type { Box, Obstacle } from './place-card.ts'

/** What is drawn on the canvas, found by its classes. */
const unitSelector = '.react-flow__node, .shaft .symbol'
const lineSelector = '.stream-line, .shaft-line'
const textSelector = '.unit-label, .stream-tag, .canvas-controls, .legend-group, .legend-ramp'
/** Room to be left around things, px. */
const around = 6
/** How far apart a line is looked at, px on screen. */
const pitch = 14

/** Covering the selected thing itself is worst, then symbols, then texts, then lines. */
const weights = { selected: 20, unit: 4, text: 2, stream: 1 }

function boxOf(element: Element, area: DOMRect): Box {
  const { left, top, width, height } = element.getBoundingClientRect()
  return {
    left: left - area.left - around,
    top: top - area.top - around,
    width: width + 2 * around,
    height: height + 2 * around,
  }
}

/** Points along a line, in its own coordinates: found once for each course it takes. */
const courses = new WeakMap<SVGPathElement, { readonly key: string; readonly points: DOMPoint[] }>()

function pointsAlong(path: SVGPathElement, scale: number): readonly DOMPoint[] {
  const key = `${scale} ${path.getAttribute('d')}`
  const known = courses.get(path)
  if (known?.key === key) return known.points
  const length = path.getTotalLength()
  const steps = Math.max(1, Math.ceil((length * scale) / pitch))
  const points = Array.from({ length: steps + 1 }, (_, i) =>
    path.getPointAtLength((length * i) / steps),
  )
  courses.set(path, { key, points })
  return points
}

function alongPath(path: SVGPathElement, area: DOMRect, into: Obstacle[], weight: number): void {
  const toScreen = path.getScreenCTM()
  if (!toScreen) return
  const { a, b, c, d, e, f } = toScreen
  for (const { x, y } of pointsAlong(path, a)) {
    into.push({
      left: a * x + c * y + e - area.left - around,
      top: b * x + d * y + f - area.top - around,
      width: 2 * around,
      height: 2 * around,
      weight,
    })
  }
}

/** What a card laid over the canvas could hide, in px from the canvas's corner, and the selected thing. */
export function canvasObstacles(
  canvas: Element,
  selected: string,
): { obstacles: readonly Obstacle[]; anchor: Box | null } {
  const area = canvas.getBoundingClientRect()
  const obstacles: Obstacle[] = []
  let anchor: Box | null = null
  for (const element of canvas.querySelectorAll(unitSelector)) {
    const box = boxOf(element, area)
    const its = element.getAttribute('data-id') === selected
    if (its) anchor = box
    obstacles.push({ ...box, weight: its ? weights.selected : weights.unit })
  }
  for (const path of canvas.querySelectorAll<SVGPathElement>(lineSelector)) {
    const owner = path.closest<SVGElement>('[data-stream], [data-shaft]')?.dataset
    const its = (owner?.stream ?? owner?.shaft) === selected
    if (its) anchor = boxOf(path, area)
    alongPath(path, area, obstacles, its ? weights.selected : weights.stream)
  }
  for (const element of canvas.querySelectorAll(textSelector)) {
    obstacles.push({ ...boxOf(element, area), weight: weights.text })
  }
  return { obstacles, anchor }
}
