import {
  describeQuantity,
  formatQuantity,
  type Layout,
  type UnitChoice,
} from '../../src/document.ts'
import type { ProfileMark, ZoneName } from '../../src/messages.ts'

/** Zones of a heater in the trade's words. */
export const zoneWords: Readonly<Record<ZoneName, string>> = {
  drainCooling: 'drain cooling',
  condensing: 'condensing',
  desuperheating: 'desuperheating',
  whole: 'heat passed on',
}

/** 'TTD −1.0 K', 'closest 0.6 K'. */
export function markText(
  { quantity, hot, cold }: ProfileMark,
  layout: Layout,
  units: UnitChoice,
): { readonly name: string; readonly value: string } {
  const { text, unit } = formatQuantity(hot - cold, 'temperatureDifference', units)
  const described = quantity === null ? undefined : describeQuantity(layout, quantity)
  return { name: described?.symbol ?? 'closest', value: `${text}\u2009${unit}` }
}
