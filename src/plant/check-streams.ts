import { numberedPort, portNamed } from '../units/kind.ts'
import type { Catalogue, Kind } from './catalogue.ts'
import type { Layout, Stream, Unit } from './document.ts'
import { suggestion } from './nearest-name.ts'
import { splitPath } from './paths.ts'
import { refuse } from './place.ts'

type End = 'from' | 'to'

/** Every stream runs from an outlet to an inlet that exist, each port takes one, numbers have no gaps. */
export function checkStreamEnds(layout: Layout, place: string, catalogue: Catalogue): void {
  const units = new Map(layout.units.map((unit) => [unit.id, unit]))
  const taken = new Map<string, string>()
  /** `h1.drain` to the numbers in use, each with the place that uses it. */
  const numbers = new Map<string, Map<number, string>>()
  layout.streams.forEach((stream, i) => {
    for (const end of ['from', 'to'] as const) {
      const here = `${place}.streams[${i}].${end}`
      const reference = stream[end]
      const number = numberAt(stream, end, here, units, catalogue)
      const other = taken.get(reference)
      if (other !== undefined) {
        refuse(here, `${reference} takes one stream, and ${other} is connected to it already.`)
      }
      taken.set(reference, stream.id)
      if (number === undefined) continue
      const key = reference.slice(0, -String(number).length)
      const used = numbers.get(key) ?? new Map<number, string>()
      numbers.set(key, used.set(number, here))
    }
  })
  for (const [port, used] of numbers) {
    for (let number = 1; number <= used.size; number++) {
      if (used.has(number)) continue
      const [last, here] = [...used].reduce((a, b) => (b[0] > a[0] ? b : a))
      refuse(
        here,
        `there is a ${port}${last} but no ${port}${number}: numbers start at 1 and leave no gap.`,
      )
    }
  }
}

/** The number of the port that a stream ends at; undefined for single ports. */
function numberAt(
  stream: Stream,
  end: End,
  here: string,
  units: ReadonlyMap<string, Unit>,
  catalogue: Catalogue,
): number | undefined {
  const reference = stream[end]
  const [id, name] = splitPath(reference) ?? []
  if (id === undefined || name === undefined) {
    refuse(
      here,
      `stream ${stream.id} needs a unit and its port here, like b1.steam, not ${reference}.`,
    )
  }
  const unit = units.get(id)
  if (!unit) {
    const verb = end === 'from' ? 'starts' : 'ends'
    refuse(
      here,
      `stream ${stream.id} ${verb} at ${reference}, but there is no unit ${id}.${suggestion(id, units.keys())}`,
    )
  }
  const kind = catalogue.kindNamed(unit.kind)
  const found = kind && portNamed(kind.ports, name)
  const description = found && kind?.ports[found.port]
  if (!kind || !found || !description) {
    return refuse(
      here,
      `${id} (${unit.kind}) has no port ${name}${kind ? portList(kind, end, name) : ''}`,
    )
  }
  if (description.direction !== (end === 'from' ? 'out' : 'in')) {
    const why =
      end === 'from'
        ? `${reference} is an inlet, and stream ${stream.id} starts there: a stream starts at an outlet.`
        : `${reference} is an outlet, and stream ${stream.id} ends there: a stream ends at an inlet.`
    refuse(here, why)
  }
  if (description.repeated && found.number === undefined) {
    refuse(here, `the ports ${name} of ${id} are numbered: write ${id}.${name}1.`)
  }
  return found.number
}

/** '; its inlets: steam1, water.' and the nearest of them. */
function portList(kind: Kind, end: End, wrong: string): string {
  const direction = end === 'from' ? 'out' : 'in'
  const names = Object.entries(kind.ports)
    .filter(([, port]) => port.direction === direction)
    .map(([name, port]) => (port.repeated ? numberedPort(kind.ports, name, 1) : name))
  const what = direction === 'out' ? 'outlets' : 'inlets'
  return names.length === 0
    ? `; it has no ${what}.`
    : `; its ${what}: ${names.join(', ')}.${suggestion(wrong, names)}`
}
