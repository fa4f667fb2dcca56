import type { Layout } from '../../src/document.ts'
import type { End, Ends } from './ends.ts'
import { centre } from './geometry.ts'
import { bodyOf, type Lie, placesOf } from './ports.ts'
import { strain } from './routing.ts'
import type { Anchor } from './symbols/symbol.ts'

/** One end of a stream with the places it may take. */
interface Ending extends End {
  readonly places: readonly Anchor[]
  chosen: Anchor
}

interface Span {
  readonly from: Ending
  readonly to: Ending
}

/** Chooses among the places of each port those between which the streams run with least strain. */
export function choosePlaces(
  layout: Layout,
  lies: ReadonlyMap<string, Lie>,
  ends: Ends,
): Map<string, Record<string, Anchor>> {
  const spans = layout.streams.map((stream): Span => {
    const { from, to } = ends.get(stream.id) as { from: End; to: End }
    const fromLie = lies.get(from.unit)
    const toLie = lies.get(to.unit)
    const sources = (fromLie && placesOf(fromLie, from.port)) ?? [middle(fromLie, toLie)]
    const targets = (toLie && placesOf(toLie, to.port)) ?? [middle(toLie, fromLie)]
    return {
      from: { ...from, places: sources, chosen: sources[0] as Anchor },
      to: { ...to, places: targets, chosen: targets[0] as Anchor },
    }
  })
  for (const { from, to } of spans) {
    let least = Number.POSITIVE_INFINITY
    for (const [i, source] of from.places.entries()) {
      for (const [j, target] of to.places.entries()) {
        const cost = strainBetween(source, target) + 4 * (i + j)
        if (cost < least) {
          least = cost
          from.chosen = source
          to.chosen = target
        }
      }
    }
  }
  settleDots(spans)
  const chosen = new Map<string, Record<string, Anchor>>()
  for (const { from, to } of spans) {
    for (const end of [from, to]) {
      const anchors = chosen.get(end.unit) ?? {}
      anchors[end.port] = end.chosen
      chosen.set(end.unit, anchors)
    }
  }
  return chosen
}

const strainBetween = (a: Anchor, b: Anchor): number =>
  strain({ point: [a.x, a.y], side: a.side }, { point: [b.x, b.y], side: b.side })

/** Streams that meet in a dot share its sides: of all ways to part them the one of least strain. */
function settleDots(spans: readonly Span[]): void {
  const meeting = new Map<string, { own: Ending; far: Ending }[]>()
  for (const { from, to } of spans) {
    for (const [own, far] of [
      [from, to],
      [to, from],
    ] as const) {
      if (own.places.length <= 3) continue
      const there = meeting.get(own.unit)
      if (there) there.push({ own, far })
      else meeting.set(own.unit, [{ own, far }])
    }
  }
  // Twice, so that dots beside each other settle together.
  for (let round = 0; round < 2; round++) {
    for (const ends of meeting.values()) {
      if (ends.length <= 4) part(ends)
    }
  }
}

function part(ends: readonly { own: Ending; far: Ending }[]): void {
  let least = Number.POSITIVE_INFINITY
  let best: readonly Anchor[] = []
  const taken: Anchor[] = []
  const go = (i: number, cost: number) => {
    if (cost >= least) return
    const end = ends[i]
    if (!end) {
      least = cost
      best = [...taken]
      return
    }
    for (const [rank, place] of end.own.places.entries()) {
      if (taken.some((other) => other.side === place.side)) continue
      taken.push(place)
      go(i + 1, cost + strainBetween(place, end.far.chosen) + 4 * rank)
      taken.pop()
    }
  }
  go(0, 0)
  for (const [i, anchor] of best.entries()) {
    const end = ends[i]
    if (end) end.own.chosen = anchor
  }
}

/** For a port that the symbol does not know: the middle of the side that faces the other unit. */
function middle(lie: Lie | undefined, other: Lie | undefined): Anchor {
  if (!lie) return { x: 0, y: 0, side: 'right' }
  const body = bodyOf(lie)
  const [x, y] = centre(body)
  const facesRight = !other || centre(bodyOf(other))[0] >= x
  return { x: facesRight ? body.x + body.width : body.x, y, side: facesRight ? 'right' : 'left' }
}
