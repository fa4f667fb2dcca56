/**
 * What part of a plane the chart shows, lowest and highest: entropy, J/(kg K), and what is drawn upright,
 * temperature in K or enthalpy in J/kg.
 */
export interface View {
  readonly s: readonly [number, number]
  readonly y: readonly [number, number]
}

/** How far a view may be zoomed in and out. */
export interface Limits {
  readonly least: { readonly s: number; readonly y: number }
  readonly widest: View
}

/** Entropy of dry steam at 273.15 K, rounded up, J/(kg K): the dome's foot is always in the fitted view. */
const domeFoot = 9200
/** 0 °C, where the formulation begins. */
const coldest = 273.15
/** The fitted view reaches at least 600 °C and at most 800 °C. */
const leastTop = 873.15
const mostTop = 1073.15
/** Room above the hottest state for its name, as a share of the temperature range. */
const headroom = 0.08
/** The fitted top moves in steps of 50 K, so that an edit does not shift the axis by a hair. */
const topStep = 50

/** In to 10 K and 0.15 kJ/(kg K), out to where nothing lies beyond. */
export const temperatureLimits: Limits = {
  least: { s: 150, y: 10 },
  widest: { s: [-1500, 14_000], y: [200, 1400] },
}
/** The same for enthalpy: in to 20 kJ/kg. */
export const enthalpyLimits: Limits = {
  least: { s: 150, y: 20e3 },
  widest: { s: [-1500, 14_000], y: [-500e3, 5500e3] },
}

/** The whole diagram: from 0 °C to above the hottest state and past the dome's foot. */
export function fittedView(hottest: number, largestEntropy: number): View {
  const wanted = hottest + headroom * (hottest - coldest)
  const stepped = coldest + Math.ceil((wanted - coldest) / topStep - 1e-9) * topStep
  const top = Math.min(mostTop, Math.max(leastTop, Number.isFinite(stepped) ? stepped : leastTop))
  const right = Math.max(domeFoot, Math.ceil((largestEntropy * 1.02) / 200) * 200 || domeFoot)
  return { s: [0, right], y: [coldest, top] }
}

function clamped(
  range: readonly [number, number],
  limits: readonly [number, number],
  least: number,
): readonly [number, number] {
  const span = Math.min(limits[1] - limits[0], Math.max(least, range[1] - range[0]))
  const middle = (range[0] + range[1]) / 2
  const low = Math.min(limits[1] - span, Math.max(limits[0], middle - span / 2))
  return [low, low + span]
}

function within(view: View, { least, widest }: Limits): View {
  return {
    s: clamped(view.s, widest.s, least.s),
    y: clamped(view.y, widest.y, least.y),
  }
}

/** Scales the view by `factor` (below 1 zooms in) and leaves the point (s, y) where it is. */
export function zoomed(
  view: View,
  factor: number,
  s: number,
  y: number,
  limits: Limits = temperatureLimits,
): View {
  const about = (
    [low, high]: readonly [number, number],
    fixed: number,
    most: readonly [number, number],
    least: number,
  ): readonly [number, number] => {
    const span = high - low
    const scale = Math.min((most[1] - most[0]) / span, Math.max(least / span, factor))
    return [fixed - (fixed - low) * scale, fixed + (high - fixed) * scale]
  }
  const { least, widest } = limits
  return within(
    { s: about(view.s, s, widest.s, least.s), y: about(view.y, y, widest.y, least.y) },
    limits,
  )
}

/** Moves the view by J/(kg K) and what is upright. */
export function panned(
  view: View,
  ds: number,
  dy: number,
  limits: Limits = temperatureLimits,
): View {
  return within(
    { s: [view.s[0] + ds, view.s[1] + ds], y: [view.y[0] + dy, view.y[1] + dy] },
    limits,
  )
}

/**
 * The fitted view of the enthalpy-entropy plane: the states of the machines with room about them, in
 * round steps, so that a small edit does not shift it.
 */
export function fittedExpansions(
  states: readonly { readonly s: number; readonly h: number }[],
): View {
  let [left, right, low, high] = [5800, 8600, 1950e3, 3650e3]
  if (states.length > 0) {
    const s = states.map((state) => state.s)
    const h = states.map((state) => state.h)
    left = Math.floor((Math.min(...s) - 350) / 200) * 200
    right = Math.ceil((Math.max(...s) + 350) / 200) * 200
    low = Math.floor((Math.min(...h) - 80e3) / 100e3) * 100e3
    high = Math.ceil((Math.max(...h) + 150e3) / 100e3) * 100e3
  }
  return { s: [left, right], y: [low, high] }
}

/** Round values between two ends, in steps of 1, 2 or 5 times a power of ten; about `count` of them. */
export function roundTicks(low: number, high: number, count: number): number[] {
  if (!(high > low) || !(count >= 1)) return []
  const rough = (high - low) / count
  const power = 10 ** Math.floor(Math.log10(rough))
  const step = power * ([1, 2, 5, 10].find((m) => m * power >= rough * 0.999) as number)
  const ticks: number[] = []
  // Whole multiples of the step, so that 0.3 is not 0.30000000000000004 of its fellows.
  const last = Math.floor(high / step + 1e-9)
  for (let i = Math.ceil(low / step - 1e-9); i <= last; i += 1) ticks.push(i === 0 ? 0 : i * step)
  return ticks
}

/** Digits after the point that ticks of this spacing need. */
export function tickDigits(ticks: readonly number[]): number {
  const step = ticks.length > 1 ? (ticks[1] as number) - (ticks[0] as number) : 1
  return Math.min(6, Math.max(0, -Math.floor(Math.log10(step) + 1e-9)))
}
