import { kindOf, type Layout, portsOf, type Stream, type Unit } from '../../../src/document.ts'

/** How a plant is read as a drawing: its steam path, its feedwater's way back, and what hangs between. */

export interface Reading {
  /** From the boiler through the machines to what condenses the steam, both included. */
  readonly steam: readonly Step[]
  /** From behind the condenser to before the boiler. */
  readonly water: readonly Step[]
  /** Units on a line between two of those: bleed lines, drain lines. */
  readonly chains: readonly Chain[]
  /** What is on none of them. */
  readonly rest: readonly string[]
}

/** A unit on a line, and the port by which the line comes in. */
export interface Step {
  readonly id: string
  readonly inlet: string | null
  /** The port by which the line goes on; null at its end. */
  readonly outlet: string | null
}

/** From a port of a line, through units one after another, to a port of a line. */
export interface Chain {
  readonly from: { readonly id: string; readonly port: string }
  readonly units: readonly string[]
  readonly to: { readonly id: string; readonly port: string }
}

interface Ways {
  readonly unit: Unit
  /** Streams that leave, by port. */
  readonly out: readonly { readonly port: string; readonly stream: Stream }[]
}

const split = (reference: string): readonly [string, string] => {
  const dot = reference.indexOf('.')
  return [reference.slice(0, dot), reference.slice(dot + 1)]
}

class Network {
  readonly units: ReadonlyMap<string, Ways>
  private readonly layout: Layout

  constructor(layout: Layout) {
    this.layout = layout
    const out = new Map<string, { port: string; stream: Stream }[]>()
    for (const unit of layout.units) out.set(unit.id, [])
    for (const stream of layout.streams) {
      const [id, port] = split(stream.from)
      out.get(id)?.push({ port, stream })
    }
    this.units = new Map(
      layout.units.map((unit) => [unit.id, { unit, out: out.get(unit.id) ?? [] }]),
    )
  }

  port(id: string, name: string) {
    const unit = this.units.get(id)?.unit
    return unit && portsOf(this.layout, unit).find((one) => one.name === name)
  }

  /** Ports by which a line that came in at a port goes on. */
  onward(id: string, inlet: string): readonly { readonly port: string; readonly stream: Stream }[] {
    const ways = this.units.get(id)
    const kind = ways && kindOf(ways.unit.kind)
    if (!ways || !kind) return []
    const came = this.port(id, inlet)?.port
    return ways.out.filter(({ port }) => {
      const leaves = this.port(id, port)
      if (!leaves) return false
      if (kind.passes) return kind.passes.some(([a, b]) => a === came && b === leaves.port)
      if (kind.shaft === 'driving') return !leaves.description.repeated
      return !leaves.description.optional
    })
  }
}

/** Longest searches are cut off here: a drawing need not be the best of all. */
const patience = 20_000

/** The line from a stream on that scores best; every unit at most once. */
function bestLine(
  network: Network,
  start: Stream,
  avoid: ReadonlySet<string>,
  goesOn: (id: string, inlet: string) => boolean,
  score: (line: readonly Step[]) => number,
): readonly Step[] {
  let best: readonly Step[] = []
  let most = Number.NEGATIVE_INFINITY
  let left = patience
  const seen = new Set(avoid)
  const line: Step[] = []
  const visit = (stream: Stream) => {
    const [id, inlet] = split(stream.to)
    if (left-- <= 0 || seen.has(id)) {
      const value = score(line)
      if (value > most) {
        most = value
        best = [...line]
      }
      return
    }
    seen.add(id)
    const ways = goesOn(id, inlet) ? network.onward(id, inlet) : []
    if (ways.length === 0) {
      line.push({ id, inlet, outlet: null })
      const value = score(line)
      if (value > most) {
        most = value
        best = [...line]
      }
      line.pop()
    }
    for (const { port, stream: next } of ways) {
      line.push({ id, inlet, outlet: port })
      visit(next)
      line.pop()
    }
    seen.delete(id)
  }
  visit(start)
  return best
}

const kindOfUnit = (network: Network, id: string) => kindOf(network.units.get(id)?.unit.kind ?? '')

/** Reads a layout; null where it has no machine that steam is led to. */
export function readLines(layout: Layout): Reading | null {
  const network = new Network(layout)
  const isMachine = (id: string) => kindOfUnit(network, id)?.shaft === 'driving'
  const machines = (line: readonly Step[]) => line.filter(({ id }) => isMachine(id)).length

  // Where steam begins: fired units that nothing passes through unchanged, else the plant's edge.
  const isSource = ({ unit }: Ways) => {
    const kind = kindOf(unit.kind)
    const ports = Object.values(kind?.ports ?? {})
    return (
      (kind?.secondLaw === 'fired' && !kind.passes) ||
      !ports.some((port) => port.direction === 'in')
    )
  }
  let steam: readonly Step[] = []
  let most = 0
  for (const ways of network.units.values()) {
    if (!isSource(ways)) continue
    for (const { port, stream } of ways.out) {
      const line = bestLine(
        network,
        stream,
        new Set([ways.unit.id]),
        (id) => {
          const kind = kindOfUnit(network, id)
          return kind?.passes !== undefined || kind?.shaft === 'driving'
        },
        (one) => 100 * machines(one) - one.length,
      )
      const fired = kindOf(ways.unit.kind)?.secondLaw === 'fired' ? 0.5 : 0
      if (machines(line) > 0 && machines(line) + fired > most) {
        most = machines(line) + fired
        steam = [{ id: ways.unit.id, inlet: null, outlet: port }, ...line]
      }
    }
  }
  if (steam.length === 0) return null
  const boiler = steam[0] as Step
  const sink = steam.at(-1) as Step

  const onSteam = new Set(steam.map(({ id }) => id))
  let water: readonly Step[] = []
  const back = sink.inlet === null || isMachine(sink.id) ? [] : network.onward(sink.id, sink.inlet)
  const avoid = new Set(onSteam)
  avoid.delete(boiler.id)
  for (const { stream } of back) {
    const line = bestLine(
      network,
      stream,
      avoid,
      (id) => id !== boiler.id,
      (one) => (one.at(-1)?.id === boiler.id ? 1000 : 0) + one.length,
    )
    if (line.length > water.length) water = line
  }
  water = water.filter(({ id }) => id !== boiler.id)

  const placed = new Set([...onSteam, ...water.map(({ id }) => id)])
  const chains = chainsBetween(layout, network, placed, steam, water)
  const chained = new Set(chains.flatMap(({ units }) => units))
  return {
    steam,
    water,
    chains,
    rest: layout.units.map(({ id }) => id).filter((id) => !placed.has(id) && !chained.has(id)),
  }
}

function chainsBetween(
  layout: Layout,
  network: Network,
  placed: ReadonlySet<string>,
  steam: readonly Step[],
  water: readonly Step[],
): Chain[] {
  const arrivals = new Map<string, number>()
  for (const { to } of layout.streams) {
    const [id] = split(to)
    arrivals.set(id, (arrivals.get(id) ?? 0) + 1)
  }
  const main = new Set(
    [...steam, ...water].flatMap(({ id, outlet }) => (outlet === null ? [] : [`${id}.${outlet}`])),
  )
  const chains: Chain[] = []
  const used = new Set<string>()
  for (const { id } of [...steam, ...water]) {
    for (const { port, stream } of network.units.get(id)?.out ?? []) {
      if (main.has(`${id}.${port}`)) continue
      const units: string[] = []
      let [next, inlet] = split(stream.to)
      while (
        !placed.has(next) &&
        !used.has(next) &&
        !units.includes(next) &&
        arrivals.get(next) === 1 &&
        network.units.get(next)?.out.length === 1
      ) {
        units.push(next)
        const onward = network.units.get(next)?.out[0]
        if (!onward) break
        ;[next, inlet] = split(onward.stream.to)
      }
      if (!placed.has(next)) continue
      for (const one of units) used.add(one)
      chains.push({ from: { id, port }, units, to: { id: next, port: inlet } })
    }
  }
  return chains
}
