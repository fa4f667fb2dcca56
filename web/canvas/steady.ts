import { type Layout, mirrorUnits, moveUnits, type Plant } from '../../src/document.ts'
import { layoutOf } from './joins.ts'
import { strain } from './routing.ts'
import { placeUnits, type Standing } from './standing.ts'
import type { Anchor } from './symbols/symbol.ts'

/** What an edit of the structure does to the drawing, beyond what was asked for. */

/**
 * Symbols with a shaft keep its axis in place when they grow or shrink with their ports, so that
 * shafts stay straight.
 */
export function withAxesKept(before: Layout, after: Plant): Plant {
  const old = placeUnits(before)
  const now = placeUnits(layoutOf(after, before.id))
  let plant = after
  for (const [id, unit] of now) {
    const earlier = old.get(id)
    const axis = unit.symbol.axis
    if (!earlier || !axis) continue
    const by = axis(earlier.form) - axis(unit.form)
    if (by !== 0) plant = moveUnits(plant, before.id, [id], [0, by])
  }
  return plant
}

/** Of a unit's streams together; how much mirroring must spare to be worth the surprise, px. */
const worthMirroring = 40

/**
 * A unit that has just got its first streams is mirrored where they then run with much less strain:
 * a pump placed the usual way round, but fed from the right.
 */
export function withEndsTurned(after: Plant, layoutId: string, streamId: string): Plant {
  let plant = after
  const layout = layoutOf(after, layoutId)
  const stream = layout.streams.find((one) => one.id === streamId)
  if (!stream) return plant
  for (const end of [stream.from, stream.to]) {
    const id = end.slice(0, end.indexOf('.'))
    const here = layoutOf(plant, layoutId)
    const count = here.streams.filter(
      (one) => one.from.startsWith(`${id}.`) || one.to.startsWith(`${id}.`),
    ).length
    if (count > 2) continue
    const turned = mirrorUnits(plant, layoutId, [id])
    const now = strainAt(placeUnits(here), here, id)
    const then = strainAt(placeUnits(layoutOf(turned, layoutId)), here, id)
    if (then + worthMirroring < now) plant = turned
  }
  return plant
}

function strainAt(standing: Standing, layout: Layout, id: string): number {
  let sum = 0
  for (const { from, to } of layout.streams) {
    if (!from.startsWith(`${id}.`) && !to.startsWith(`${id}.`)) continue
    const a = anchorAt(standing, from)
    const b = anchorAt(standing, to)
    if (a && b) sum += strain(terminal(a), terminal(b))
  }
  return sum
}

const terminal = ({ x, y, side }: Anchor) => ({ point: [x, y] as const, side })

function anchorAt(standing: Standing, reference: string): Anchor | undefined {
  const dot = reference.indexOf('.')
  return standing.get(reference.slice(0, dot))?.anchors[reference.slice(dot + 1)]
}
