const widths = new Map<string, number>()
let context: CanvasRenderingContext2D | null | undefined

/** Width of a line of text in the window's own face, px; `size` in px. */
export function textWidth(text: string, size: number, weight = 400): number {
  const key = `${weight} ${size} ${text}`
  let width = widths.get(key)
  if (width === undefined) {
    context ??= document.createElement('canvas').getContext('2d')
    if (context) {
      context.font = `${weight} ${size}px ${getComputedStyle(document.body).fontFamily}`
      width = context.measureText(text).width
    } else {
      // Without a canvas: wide enough for any face.
      width = text.length * size * 0.62
    }
    // Numbers change without end; the names among them are few.
    if (widths.size > 2000) widths.clear()
    widths.set(key, width)
  }
  return width
}
