import type { Point, Side, Size } from '../geometry.ts'
import type { Anchor, Form, SymbolDrawing } from './symbol.ts'

const narrowEnd = 32
const usualPitch = 40

/** Bleeds and the exhaust from left to right, px from the inlet end; the inlet itself stands at 8. */
function stations(form: Form): readonly number[] {
  const groups = (form.counts.bleed ?? 0) + 1
  const places: number[] = []
  let x = 8
  for (let i = 0; i < groups; i++) {
    x += form.pitches?.[i] ?? usualPitch
    places.push(x)
  }
  return places
}

const width = (form: Form): number => (stations(form).at(-1) ?? 48) + 8

const wideEnd = (form: Form): number => narrowEnd + 24 + 12 * (form.counts.bleed ?? 0)

/** The axis on the grid, the wide end centred on it. */
const axis = (form: Form): number => Math.ceil(wideEnd(form) / 16) * 8

/** Half the height of the casing at x. */
const reach = (form: Form, x: number): number =>
  (narrowEnd + ((wideEnd(form) - narrowEnd) * x) / width(form)) / 2

function onCasing(form: Form, x: number, side: Side): Anchor {
  const up = side === 'top' ? -1 : 1
  return { x, y: axis(form) + up * reach(form, x), side }
}

/** A further bleed, not connected yet, is offered halfway to the exhaust. */
function bleedAt(form: Form, number: number): number {
  const places = stations(form)
  const last = places.length - 1
  if (number <= last) return places[number - 1] as number
  const before = last > 0 ? (places[last - 1] as number) : 8
  return Math.round((before + (places[last] as number)) / 16) * 8
}

/** In the middle, or as far towards the wide end as the text needs. */
function inside(form: Form, text: Size): Point | null {
  const most = width(form) - text.width - 6
  for (let x = (width(form) - text.width) / 2; x <= most; x += 2) {
    if (reach(form, x) >= text.height / 2 + 3) return [x, axis(form) - text.height / 2]
  }
  return null
}

export const turbine: SymbolDrawing = {
  size: (form) => ({ width: width(form), height: 2 * axis(form) }),
  body: (form) => ({
    x: 0,
    y: axis(form) - wideEnd(form) / 2,
    width: width(form),
    height: wideEnd(form),
  }),
  ports: {
    inlet: (form) => [onCasing(form, 8, 'top'), onCasing(form, 8, 'bottom')],
    'bleed*': (form, number) => [
      onCasing(form, bleedAt(form, number), 'bottom'),
      onCasing(form, bleedAt(form, number), 'top'),
    ],
    exhaust: (form) => {
      const x = width(form) - 8
      return [onCasing(form, x, 'bottom'), onCasing(form, x, 'top')]
    },
  },
  Drawing({ form }) {
    const w = width(form)
    const y = axis(form)
    const narrow = narrowEnd / 2
    const wide = wideEnd(form) / 2
    const ticks = stations(form)
      .slice(0, -1)
      .map((x) => `M${x} ${y - reach(form, x)}v5M${x} ${y + reach(form, x)}v-5`)
      .join('')
    return (
      <>
        <path d={`M0 ${y - narrow}L${w} ${y - wide}V${y + wide}L0 ${y + narrow}Z`} />
        {ticks && <path className="detail open" d={ticks} />}
      </>
    )
  },
  label: ['top', 'bottom', 'right', 'left'],
  inside,
  spaced: { port: 'bleed', last: 'exhaust', least: 24, usual: usualPitch },
  axis,
}
