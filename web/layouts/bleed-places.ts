import { kindOf, type Layout, labelOf, type Stream, splitPath } from '../../src/document.ts'

/** A stage group of a turbine: the streams between which it runs. */
export interface StageGroup {
  readonly number: number
  readonly from: string
  readonly to: string
}

/** A water stream between two heaters of one kind. */
export interface WaterPlace {
  readonly stream: string
  readonly name: string
  readonly before: string
}

const unitAt = (reference: string): string => splitPath(reference)?.[0] ?? ''

export function stageGroups(layout: Layout, turbine: string): StageGroup[] {
  const unit = layout.units.find(({ id }) => id === turbine)
  const kind = unit && kindOf(unit.kind)
  if (!kind) return []
  const streamAt = (port: string): Stream | undefined =>
    layout.streams.find(({ from, to }) => [from, to].includes(`${turbine}.${port}`))
  const single = (direction: 'in' | 'out') =>
    Object.entries(kind.ports).find(
      ([, port]) => port.direction === direction && !port.repeated,
    )?.[0]
  const repeated = Object.entries(kind.ports).find(
    ([, port]) => port.direction === 'out' && port.repeated,
  )?.[0]
  const ends = [streamAt(single('in') ?? '')]
  for (let number = 1; ; number++) {
    const bleed = streamAt(`${repeated}${number}`)
    if (!bleed) break
    ends.push(bleed)
  }
  ends.push(streamAt(single('out') ?? ''))
  return ends.slice(1).flatMap((end, i) => {
    const start = ends[i]
    return start && end ? [{ number: i + 1, from: start.id, to: end.id }] : []
  })
}

export function waterPlaces(layout: Layout): WaterPlace[] {
  return layout.streams.flatMap((stream) => {
    const [before, after] = [stream.from, stream.to].map((end) =>
      layout.units.find(({ id }) => id === unitAt(end)),
    )
    const kind = before && kindOf(before.kind)
    const passes = kind?.passes?.some(([, out]) => stream.from === `${before?.id}.${out}`)
    if (!before || !after || kind?.group !== 'Heaters' || !passes) return []
    if (after.kind !== before.kind) return []
    const name = `between ${labelOf(layout, before.id)} and ${labelOf(layout, after.id)}`
    return [{ stream: stream.id, name, before: before.id }]
  })
}

/** The heater that a bleed goes to, through lines, branches and valves. */
export function heaterOf(layout: Layout, stream: string): string | undefined {
  const seen = new Set<string>()
  const queue = [stream]
  for (let id = queue.shift(); id !== undefined; id = queue.shift()) {
    const found = layout.streams.find((one) => one.id === id)
    const unit = layout.units.find((one) => one.id === unitAt(found?.to ?? ''))
    const kind = unit && kindOf(unit.kind)
    if (!unit || seen.has(unit.id)) continue
    seen.add(unit.id)
    if (kind?.group === 'Heaters') return unit.id
    if (kind?.group !== 'Lines') continue
    queue.push(
      ...layout.streams.filter(({ from }) => unitAt(from) === unit.id).map((one) => one.id),
    )
  }
  return undefined
}
