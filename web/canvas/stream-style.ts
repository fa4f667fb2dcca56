import type { Phase } from '../store/balance-store.ts'

/** How a stream is drawn: its pattern carries the phase, its width the mass flow. */
export type StreamPattern = 'liquid' | 'steam' | 'wet' | 'none'

/** Width of the thinnest stream with flow and what the largest flow adds, px. */
const thinnest = 1.25
const most = 4.5
/** Walls of a hollow stream, px. */
export const wall = 1.1

/** Width of a liquid stream, px: flow shows as area would, by its root. */
export function streamWidth(m: number | null, largest: number): number {
  if (m === null || largest <= 0) return thinnest
  return thinnest + most * Math.sqrt(Math.min(1, Math.abs(m) / largest))
}

/** A hollow stream is a little wider, so that there is a bore between its walls. */
export const hollowWidth = (width: number): number => width + 1.75

export function patternOf(phase: Phase, m: number | null): StreamPattern {
  if (m === null || Math.abs(m) < 1e-9) return 'none'
  switch (phase) {
    case 'liquid':
      return 'liquid'
    case 'wet':
      return 'wet'
    case 'vapour':
    case 'supercritical':
      return 'steam'
    default:
      return 'none'
  }
}

/** Length and half width of the arrow at the consumer, px. */
export function arrowSize(width: number): { readonly length: number; readonly half: number } {
  const half = 2.7 + 0.56 * width
  return { length: 1.65 * half, half }
}
