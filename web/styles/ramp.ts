/** Stops of the ramp in theme.css, `--ramp-0` to `--ramp-8`. */
const stops = 9
/** Steps between two stops: finer than the eye tells apart. */
const steps = 16

/**
 * The colours of the ramp, written as mixtures in oklab of the theme's own stops, so that a change of
 * theme recolours without anything being drawn anew.
 */
const colours: readonly string[] = Array.from({ length: (stops - 1) * steps + 1 }, (_, i) => {
  const stop = Math.floor(i / steps)
  const part = (i % steps) / steps
  return part === 0
    ? `var(--ramp-${stop})`
    : `color-mix(in oklab, var(--ramp-${stop}), var(--ramp-${stop + 1}) ${part * 100}%)`
})

/**
 * Colour of a temperature on the ramp that canvas, chart, tables and legend share: a CSS colour that
 * follows the theme, for CSS properties and SVG presentation attributes alike. Temperatures in K;
 * beyond the ends the end's colour holds.
 */
export function rampColour(T: number, Tmin: number, Tmax: number): string {
  const share = Tmax > Tmin ? (T - Tmin) / (Tmax - Tmin) : 0.5
  return rampAt(share)
}

/** Colour at a share of the ramp, 0 coldest, 1 hottest. */
export function rampAt(share: number): string {
  const last = colours.length - 1
  const at = share > 0 ? (share < 1 ? Math.round(share * last) : last) : 0
  return colours[at] as string
}
