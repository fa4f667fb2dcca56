import type { Connection, PlacedUnit } from './placed-unit.ts'
import type { System } from './system.ts'

/** Live steam of which nothing is known, Pa, and how far it stands above what is known behind it. */
const usualLivePressure = 8e6
const liveRatio = 3
/** How far what is throttled on entry stands above what it enters. */
const throttledRatio = 1.2

/**
 * First pressures: spread from where they are known along the units that keep them, then across
 * turbines and pumps.
 */
export class StartPressures {
  private readonly system: System
  private readonly values: Float64Array
  private readonly known: (index: number) => boolean

  constructor(system: System, values: Float64Array, known: (index: number) => boolean) {
    this.system = system
    this.values = values
    this.known = known
  }

  fill(): void {
    const { system, values } = this
    const done = new Uint8Array(system.variables.length)
    const isDone = (index: number): boolean => done[index] === 1 || this.known(index)
    const put = (index: number, p: number): void => {
      values[index] = Math.min(90e6, Math.max(700, p))
      done[index] = 1
    }
    const spread = (crossing: boolean): boolean => {
      let changed = false
      for (const placed of system.units) {
        const ports = placed.connections
        const isMachine = placed.kind.raisesPressure === true || placed.kind.shaft === 'driving'
        if (isMachine !== crossing || this.drops(placed)) continue
        const own = system.indexOf.get(`${placed.unit.id}.pressure`)
        if (crossing) {
          changed = this.cross(placed, isDone, put) || changed
          continue
        }
        let source = own !== undefined && isDone(own) ? values[own]! : undefined
        // Ports of a heat exchanging unit are grouped by what passes into what.
        const groups = this.pressureGroups(placed, ports)
        for (const group of groups) {
          const shares = group.filter((port) => port.description.pressure !== 'throttles')
          const from = shares.find((port) => isDone(port.base + 1))
          const isShell = shares.some((port) => port.description.pressure === 'equal')
          const p = isShell && source !== undefined ? source : from && values[from.base + 1]!
          if (p === undefined) continue
          if (isShell && own !== undefined && !isDone(own)) {
            put(own, p)
            source = p
            changed = true
          }
          for (const port of shares) {
            if (isDone(port.base + 1)) continue
            put(port.base + 1, p)
            changed = true
          }
        }
      }
      return changed
    }
    // What is throttled arrives somewhat above: a hint for want of a better one.
    const spreadThrottled = (): boolean => {
      for (const placed of system.units) {
        const { connections } = placed
        if (this.drops(placed)) {
          const [inlet, outlet] = connections
          if (inlet === undefined || outlet === undefined) continue
          if (isDone(inlet.base + 1) === isDone(outlet.base + 1)) continue
          if (isDone(inlet.base + 1)) put(outlet.base + 1, values[inlet.base + 1]! / throttledRatio)
          else put(inlet.base + 1, values[outlet.base + 1]! * throttledRatio)
          return true
        }
        const inside = connections.find(({ description }) => description.pressure === 'equal')
        if (inside === undefined || !isDone(inside.base + 1)) continue
        for (const { description, base } of connections) {
          if (description.pressure !== 'throttles' || isDone(base + 1)) continue
          put(base + 1, throttledRatio * values[inside.base + 1]!)
          return true
        }
      }
      return false
    }
    const most = 4 * system.units.length + 4
    for (let pass = 0; pass < most; pass++) if (!spread(false)) break
    // A vessel that no known pressure reaches starts at its usual one, before machines are crossed.
    for (const { unit } of system.units) {
      const own = system.indexOf.get(`${unit.id}.pressure`)
      const usual = own === undefined ? undefined : system.variables[own]!.description.usual
      if (own === undefined || usual === undefined || isDone(own)) continue
      put(own, usual)
      for (let pass = 0; pass < most; pass++) if (!spread(false)) break
    }
    // Live steam stands well above whatever is known behind it.
    for (const { connections } of system.units) {
      for (const { description, base } of connections) {
        if (!description.designed?.includes('m') || isDone(base + 1)) continue
        put(base + 1, this.livePressure(isDone))
        for (let pass = 0; pass < most; pass++) if (!spread(false)) break
      }
    }
    for (let pass = 0; pass < 2 * most; pass++) {
      if (!spread(false) && !spread(true) && !spreadThrottled()) break
    }
  }

  /** Nothing given keeps the pressures before and behind it near each other. */
  private drops({ kind, unit }: PlacedUnit): boolean {
    return (
      kind.dropsPressure?.((name) => {
        const index = this.system.indexOf.get(`${unit.id}.${name}`)
        return index !== undefined && this.known(index)
      }) ?? false
    )
  }

  private livePressure(isDone: (index: number) => boolean): number {
    let highest = 0
    for (const { kind, connections } of this.system.units) {
      if (kind.shaft !== 'driving') continue
      for (const { base } of connections) {
        if (isDone(base + 1)) highest = Math.max(highest, this.values[base + 1]!)
      }
    }
    return Math.max(usualLivePressure, liveRatio * highest)
  }

  /** Ports that share a pressure, nearly: what passes through apart from the shell. */
  private pressureGroups(placed: PlacedUnit, ports: readonly Connection[]): Connection[][] {
    const passes = placed.kind.passes ?? []
    const through = passes.map((pair) => ports.filter(({ port }) => pair.includes(port)))
    const shell = ports.filter(({ port }) => !passes.some((pair) => pair.includes(port)))
    return [...through, shell].filter((group) => group.length > 0)
  }

  /** Pressures on the far side of a turbine or pump, when one side is known. */
  private cross(
    placed: PlacedUnit,
    isDone: (index: number) => boolean,
    put: (index: number, p: number) => void,
  ): boolean {
    const { values } = this
    const inlets = placed.connections.filter((port) => port.description.direction === 'in')
    const outlets = placed.connections.filter((port) => port.description.direction === 'out')
    const inlet = inlets[0]
    if (inlet === undefined || outlets.length === 0) return false
    const inletKnown = isDone(inlet.base + 1)
    const rises = placed.kind.raisesPressure === true
    const knownOutlets = outlets.filter((port) => isDone(port.base + 1))
    if (inletKnown && knownOutlets.length === outlets.length) return false
    if (!inletKnown && knownOutlets.length === 0) return false
    const first = inletKnown
      ? values[inlet.base + 1]!
      : rises
        ? 1e5
        : 4 * Math.max(...knownOutlets.map((port) => values[port.base + 1]!))
    if (!inletKnown) put(inlet.base + 1, first)
    // Evenly by logarithm between what is known along the expansion.
    let previous = first
    outlets.forEach((port, k) => {
      if (isDone(port.base + 1)) {
        previous = values[port.base + 1]!
        return
      }
      const nextKnown = outlets.slice(k + 1).find((other) => isDone(other.base + 1))
      const steps = nextKnown ? outlets.indexOf(nextKnown) - k + 1 : 1
      const p = rises
        ? 10 * first
        : nextKnown
          ? previous * (values[nextKnown.base + 1]! / previous) ** (1 / steps)
          : previous / 3
      put(port.base + 1, p)
      previous = p
    })
    return true
  }
}
