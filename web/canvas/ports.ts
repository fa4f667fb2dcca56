import type { Box, Point } from './geometry.ts'
import { mirroredSide } from './geometry.ts'
import type { Anchor, Form, Places, SymbolDrawing } from './symbols/symbol.ts'

/** How a symbol lies on the sheet. */
export interface Lie {
  readonly symbol: SymbolDrawing
  readonly form: Form
  /** Fed from the right. */
  readonly mirrored: boolean
  /** An upright symbol fed from below. */
  readonly upended: boolean
  /** Top left corner. */
  readonly at: Point
}

const numbered = /^(.*?[^0-9])([1-9][0-9]*)$/

/** Name in the symbol's table and number of a port: `bleed2` is `['bleed*', 2]`. */
export function portKey(
  symbol: SymbolDrawing,
  port: string,
): { readonly key: string; readonly number: number } | null {
  if (Object.hasOwn(symbol.ports, port)) return { key: port, number: 1 }
  const match = numbered.exec(port)
  const key = `${match?.[1]}*`
  return match && Object.hasOwn(symbol.ports, key) ? { key, number: Number(match[2]) } : null
}

/** Places of a port on the sheet; null where the symbol has no such port. */
export function placesOf(lie: Lie, port: string): Places | null {
  const found = portKey(lie.symbol, port)
  const places = found && lie.symbol.ports[found.key]?.(lie.form, found.number)
  if (!places) return null
  const { width, height } = lie.symbol.size(lie.form)
  const [x0, y0] = lie.at
  return places.map((place): Anchor => {
    let { x, y, side } = place
    if (lie.mirrored) {
      x = width - x
      side = mirroredSide(side)
    }
    if (lie.upended) {
      y = height - y
      side = side === 'top' ? 'bottom' : side === 'bottom' ? 'top' : side
    }
    return { x: x0 + x, y: y0 + y, side }
  }) as unknown as Places
}

/** What the strokes cover, on the sheet. */
export function bodyOf(lie: Lie): Box {
  const size = lie.symbol.size(lie.form)
  const body = lie.symbol.body?.(lie.form) ?? { x: 0, y: 0, ...size }
  const x = lie.mirrored ? size.width - body.x - body.width : body.x
  const y = lie.upended ? size.height - body.y - body.height : body.y
  return { x: lie.at[0] + x, y: lie.at[1] + y, width: body.width, height: body.height }
}
