import type { Layout, Stream, Unit } from '../../src/document.ts'
import { choosePlaces } from './choose-places.ts'
import { type Ends, endsOf } from './ends.ts'
import { type Box, centre, grid, onGrid, type Point, type Size } from './geometry.ts'
import { keep } from './keep.ts'
import { bodyOf, type Lie, placesOf, portKey } from './ports.ts'
import { symbolOf } from './symbols/index.ts'
import type { Anchor } from './symbols/symbol.ts'

/** A unit as it stands on the sheet. */
export interface PlacedUnit extends Lie {
  readonly id: string
  readonly kind: string
  readonly label: string
  readonly size: Size
  readonly body: Box
  /** By port name, for the ports with a stream. */
  readonly anchors: Readonly<Record<string, Anchor>>
}

const noOptions = {}
const nothing: Standing = new Map()

/** Units by id as they stand. */
export type Standing = ReadonlyMap<string, PlacedUnit>

/** Where the units of a layout stand, which way they are turned, and where their streams meet them. */
export function placeUnits(
  layout: Layout,
  moved: ReadonlyMap<string, Point> | null = null,
  previous: Standing = nothing,
): Standing {
  const lies = new Map<string, Lie>()
  const ends = endsOf(layout)
  const streamAt = new Map<string, Stream>()
  const counts = new Map<string, Record<string, number>>()
  for (const stream of layout.streams) {
    streamAt.set(stream.from, stream)
    streamAt.set(stream.to, stream)
  }
  for (const unit of layout.units) {
    counts.set(unit.id, {})
    const symbol = symbolOf(unit.kind)
    lies.set(unit.id, {
      symbol,
      form: { options: unit.options ?? noOptions, counts: counts.get(unit.id) ?? {} },
      mirrored: unit.mirrored ?? false,
      upended: false,
      at: moved?.get(unit.id) ?? unit.at,
    })
  }
  for (const { from, to } of ends.values()) {
    for (const end of [from, to]) {
      const lie = lies.get(end.unit)
      const found = lie && portKey(lie.symbol, end.port)
      if (!found?.key.endsWith('*')) continue
      const count = counts.get(end.unit) as Record<string, number>
      const base = found.key.slice(0, -1)
      count[base] = Math.max(count[base] ?? 0, found.number)
    }
  }

  turnAlongStreams(layout, lies, ends, streamAt)
  spacePorts(layout, lies, ends, streamAt)
  const chosen = choosePlaces(layout, lies, ends)

  const units = new Map<string, PlacedUnit>()
  for (const unit of layout.units) {
    const lie = lies.get(unit.id) as Lie
    units.set(
      unit.id,
      keep(previous.get(unit.id), {
        id: unit.id,
        kind: unit.kind,
        label: unit.label,
        ...lie,
        size: lie.symbol.size(lie.form),
        body: bodyOf(lie),
        anchors: chosen.get(unit.id) ?? {},
      }),
    )
  }
  return units
}

/** The far end of the stream at a port, as a point: its usual anchor, or the middle of a unit that turns. */
function farPoint(
  lies: ReadonlyMap<string, Lie>,
  ends: Ends,
  stream: Stream | undefined,
  unitId: string,
): Point | null {
  const both = stream && ends.get(stream.id)
  if (!both) return null
  const far = both.from.unit === unitId ? both.to : both.from
  const lie = lies.get(far.unit)
  if (!lie) return null
  if (lie.symbol.turns) return centre(bodyOf(lie))
  const place = placesOf(lie, far.port)?.[0]
  return place ? [place.x, place.y] : centre(bodyOf(lie))
}

/** Symbols that turn follow their streams: upright between what stands above and below. */
function turnAlongStreams(
  layout: Layout,
  lies: Map<string, Lie>,
  ends: Ends,
  streamAt: ReadonlyMap<string, Stream>,
): void {
  for (const unit of layout.units) {
    const lie = lies.get(unit.id) as Lie
    if (!lie.symbol.turns) continue
    const [inlet, outlet] = Object.keys(lie.symbol.ports)
    const own = centre(bodyOf(lie))
    const source = farPoint(lies, ends, streamAt.get(`${unit.id}.${inlet}`), unit.id)
    const target = farPoint(lies, ends, streamAt.get(`${unit.id}.${outlet}`), unit.id)
    if (!source && !target) continue
    const [x1, y1] = source ?? own
    const [x2, y2] = target ?? own
    const upright = standsUpright(own, source, target)
    lies.set(unit.id, {
      ...lie,
      form: { ...lie.form, upright },
      mirrored: !upright && (x2 === x1 ? lie.mirrored : x2 < x1),
      upended: upright && y2 < y1,
    })
  }
}

/** Upright where both neighbours, or the one there is, lie rather above and below than beside. */
function standsUpright(own: Point, source: Point | null, target: Point | null): boolean {
  const nearness = (other: Point | null) =>
    other ? Math.abs(other[0] - own[0]) - Math.abs(other[1] - own[1]) : 0
  const vertical = (other: Point | null) => other !== null && nearness(other) < 0
  if (source && target) {
    if (vertical(source) === vertical(target)) return vertical(source)
    // One of each: the straighter of the two decides.
    const slack = (other: Point) =>
      Math.min(Math.abs(other[0] - own[0]), Math.abs(other[1] - own[1]))
    return slack(source) <= slack(target) ? vertical(source) : vertical(target)
  }
  return vertical(source ?? target)
}

/** No symbol is drawn out of its shape for the sake of a straight stream. */
const widestPitch = 104

/** Spaces the ports of symbols that stretch, so that their streams fall straight where they can. */
function spacePorts(
  layout: Layout,
  lies: Map<string, Lie>,
  ends: Ends,
  streamAt: ReadonlyMap<string, Stream>,
): void {
  for (const unit of layout.units) {
    const lie = lies.get(unit.id) as Lie
    const spaced = lie.symbol.spaced
    if (!spaced) continue
    const count = lie.form.counts[spaced.port] ?? 0
    const ports = Array.from({ length: count }, (_, i) => `${spaced.port}${i + 1}`)
    const wanted = [...ports, spaced.last].map((port) =>
      straightBelow(lies, ends, streamAt.get(`${unit.id}.${port}`), unit),
    )
    const usual = lie.symbol.size(lie.form).width
    const room = roomBeside(lies, unit.id, lie)
    // Mirrored, the far edge stays where it is while the width is not known: two rounds settle it.
    let width = usual
    let pitches: number[] = []
    for (let round = 0; round < (lie.mirrored ? 3 : 1); round++) {
      pitches = stretched(
        wanted.map((x) =>
          x === null ? null : onGrid(lie.mirrored ? lie.at[0] + width - x : x - lie.at[0]),
        ),
        spaced.least,
        spaced.usual,
        Math.max(usual, room) - 8,
      )
      width = pitches.reduce((sum, pitch) => sum + pitch, 16)
    }
    lies.set(unit.id, { ...lie, form: { ...lie.form, pitches } })
  }
}

/** Pitches from the inlet at 8 to each port in turn; all multiples of 8. */
function stretched(
  wanted: readonly (number | null)[],
  least: number,
  usual: number,
  room: number,
): number[] {
  const pitches: number[] = []
  let x = 8
  wanted.forEach((want, i) => {
    const after = (wanted.length - 1 - i) * least
    const fits =
      want !== null && want - x >= least && want - x <= widestPitch && want + after <= room
    const next = fits ? want : x + usual
    pitches.push(next - x)
    x = next
  })
  return pitches
}

/** Where the far end of a stream lies below or above, so that it could fall straight: its x. */
function straightBelow(
  lies: ReadonlyMap<string, Lie>,
  ends: Ends,
  stream: Stream | undefined,
  unit: Unit,
): number | null {
  const both = stream && ends.get(stream.id)
  if (!both) return null
  const far = both.from.unit === unit.id ? both.to : both.from
  const lie = lies.get(far.unit)
  if (!lie) return null
  const place = placesOf(lie, far.port)?.find(({ side }) => side === 'top' || side === 'bottom')
  return place && place.x % grid === 0 ? place.x : null
}

/** Width that a unit may take before it meets another one beside it, px. */
function roomBeside(lies: ReadonlyMap<string, Lie>, id: string, lie: Lie): number {
  const own = bodyOf(lie)
  let room = 800
  for (const [other, otherLie] of lies) {
    if (other === id) continue
    const body = bodyOf(otherLie)
    if (body.y >= own.y + own.height || body.y + body.height <= own.y) continue
    const gap = body.x - lie.at[0]
    if (gap > 0) room = Math.min(room, gap - 8)
  }
  return room
}
