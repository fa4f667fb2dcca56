import type { Box, Point } from './geometry.ts'

/** The canvas on the screen, while there is one: what lies outside React asks it for places. */
interface View {
  toSheet(client: Point): Point
  toClient(sheet: Point): Point
  /** The canvas in the window. */
  box(): DOMRect
}

let view: View | null = null

export function setView(next: View | null): void {
  view = next
}

/** The point on the sheet under a point of the window. */
export function toSheet(client: Point): Point {
  return view ? view.toSheet(client) : client
}

/** True where a point of the window lies over the canvas. */
export function overCanvas([x, y]: Point): boolean {
  const box = view?.box()
  return box !== undefined && x >= box.left && x < box.right && y >= box.top && y < box.bottom
}

/** The middle of the canvas, on the sheet. */
export function middleOfCanvas(): Point {
  const box = view?.box()
  return box ? toSheet([box.left + box.width / 2, box.top + box.height / 2]) : [0, 0]
}

/** The point of the window over a point on the sheet. */
export function toClient(sheet: Point): Point {
  return view ? view.toClient(sheet) : sheet
}

/** The canvas in the window; nothing while there is none. */
export function canvasBox(): DOMRect | undefined {
  return view?.box()
}

/** The part of the sheet that is seen; nothing while there is no canvas. */
export function sheetInView(): Box | undefined {
  const box = view?.box()
  if (!box) return undefined
  const [x, y] = toSheet([box.left, box.top])
  const [right, bottom] = toSheet([box.right, box.bottom])
  return { x, y, width: right - x, height: bottom - y }
}
