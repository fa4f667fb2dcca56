import { symbolOf } from './symbols/index.ts'
import type { Form } from './symbols/symbol.ts'

interface Props {
  readonly kind: string
  readonly form: Form
  readonly mirrored?: boolean
  readonly upended?: boolean
}

/** The strokes of a symbol, its top left corner at the origin; within an `svg`. */
export function UnitSymbol({ kind, form, mirrored = false, upended = false }: Props) {
  const { size, Drawing } = symbolOf(kind)
  const { width, height } = size(form)
  const transform =
    mirrored || upended
      ? `translate(${mirrored ? width : 0} ${upended ? height : 0}) scale(${mirrored ? -1 : 1} ${upended ? -1 : 1})`
      : undefined
  return (
    <g className="symbol" transform={transform}>
      <Drawing form={form} />
    </g>
  )
}

const plainForm: Form = { options: {}, counts: {} }
const framed = 24

/** A symbol as a picture of 24 px, for the rail. */
export function SymbolIcon({ kind }: { readonly kind: string }) {
  const symbol = symbolOf(kind)
  const body = symbol.body?.(plainForm) ?? { x: 0, y: 0, ...symbol.size(plainForm) }
  const scale = Math.min(20 / body.width, 20 / body.height, 0.75)
  const dx = framed / 2 - scale * (body.x + body.width / 2)
  const dy = framed / 2 - scale * (body.y + body.height / 2)
  return (
    <svg className="symbol-icon" width={framed} height={framed} aria-hidden="true">
      <g transform={`translate(${dx} ${dy}) scale(${scale})`}>
        <UnitSymbol kind={kind} form={plainForm} />
      </g>
    </svg>
  )
}
