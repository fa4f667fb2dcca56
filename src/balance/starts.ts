import type { Expression } from '../equations/expression/index.ts'
import {
  enthalpyAtPressureEntropy,
  enthalpyAtPressureTemperature,
  Outcome,
  RESULT_SIZE,
  SATURATION_SIZE,
  Saturation,
  STATE_SIZE,
  State,
  saturationAtPressure,
  stateAtPressureEnthalpy,
} from '../steam/index.ts'
import type { Start } from '../units/kind.ts'
import { ExpressionValues } from './expression-values.ts'
import type { PlacedUnit } from './placed-unit.ts'
import { ordinaryValue } from './ranges.ts'
import { balanceFlows, mainFlow } from './start-flows.ts'
import { StartPressures } from './start-pressures.ts'
import type { System } from './system.ts'

/** Superheated steam of which nothing is known, J/kg. */
const superheatedEnthalpy = 3.4e6
/** A bleed as a part of the largest flow, while nothing is known of it. */
const bleedShare = 0.06
/** How far below saturation heated water starts, K. */
const nearSaturation = 3
/** Passes over the equations that give a quantity outright. */
const outrightPasses = 4
/** Decades by which other choices scatter pressures and flows. */
const pressureScatter = 0.7
const flowScatter = 0.4
/** Ranges in which other choices scatter enthalpies, J/kg. */
const waterEnthalpies = [1e5, 1.2e6] as const
const steamEnthalpies = [2.3e6, 3.5e6] as const
/** Specific heat of water, J/(kg K). */
const waterHeat = 4200
/** Volume of water over the efficiency of a pump, m3/kg. */
const compressionVolume = 1.3e-3
/** Make-up and the like, J/kg. */
const coldEnthalpy = 1e5
/** Group efficiency while none is known. */
const expansionEfficiency = 0.85

/**
 * First values for unknowns that an iteration must start from: pressures spread from where they are
 * known along the units that keep them, enthalpies follow from what kinds declare of their outlets,
 * flows are of the size of the largest known one.
 */
export class Starts {
  private readonly system: System
  private readonly values: Float64Array
  private readonly known: (index: number) => boolean
  private readonly choice: number
  private readonly saturation = new Float64Array(SATURATION_SIZE)
  private readonly state = new Float64Array(STATE_SIZE)
  private readonly result = new Float64Array(RESULT_SIZE + 8)

  /**
   * `known` tells which values are given or solved already; the others are overwritten. Choices
   * other than 0 scatter the usual guess, each always the same way.
   */
  constructor(system: System, values: Float64Array, known: (index: number) => boolean, choice = 0) {
    this.choice = choice
    this.system = system
    this.values = values
    this.known = known
  }

  /** Fills in what the wanted variables are guessed from; without a list everything. */
  fill(wanted?: readonly number[]): void {
    const { system, values } = this
    const isWanted = (test: (index: number) => boolean): boolean => wanted?.some(test) ?? true
    const wantsQuantities = isWanted((index) => !system.variables[index]!.isState)
    const wantsFlows =
      wantsQuantities ||
      isWanted((index) => system.variables[index]!.description.dimension === 'massFlow')
    for (let v = 0; v < system.variables.length; v++) {
      if (!this.known(v)) values[v] = ordinaryValue(system.variables[v]!)
    }
    new StartPressures(system, values, this.known).fill()
    if (this.choice > 0) this.scatterPressures()
    this.fillEnthalpies()
    if (this.choice > 0) this.scatterEnthalpies()
    if (wantsFlows) this.fillFlows()
    if (wantsFlows && this.choice === 0 && this.hasMixtures()) {
      // Mixtures take other enthalpies once the flows are known, and flows follow.
      this.fillEnthalpies()
      this.fillFlows()
    }
    if (wantsQuantities) this.fillQuantities()
  }

  /** Between -1 and 1, the same for the same variable and choice. */
  private scatter(index: number): number {
    // A multiplicative hash (D. E. Knuth, The Art of Computer Programming 3, 6.4).
    const hash = Math.imul(index + 1, 2654435761) ^ Math.imul(this.choice, 40503 * 65537)
    return (Math.imul(hash ^ (hash >>> 15), 2246822519) >>> 8) / 2 ** 23 - 1
  }

  private scatterPressures(): void {
    const { system, values } = this
    system.variables.forEach(({ description }, index) => {
      if (this.known(index) || description.dimension !== 'pressure') return
      const p =
        values[index]! *
        10 ** (pressureScatter * (1 + (this.choice % 10) / 3) * this.scatter(index))
      values[index] = Math.min(90e6, Math.max(700, p))
    })
  }

  private scatterEnthalpies(): void {
    for (const placed of this.system.units) {
      for (const { base, description } of placed.connections) {
        if (description.direction !== 'out' || this.known(base + 2)) continue
        const u = this.scatter(base + 2)
        const isWater =
          description.carries === 'water' ||
          (description.carries === 'any' && this.values[base + 2]! < 1.5e6)
        const [low, high] = isWater ? waterEnthalpies : steamEnthalpies
        const h = low + ((high - low) * (u + 1)) / 2
        // Half the choices keep what the kind says and scatter only pressures and flows.
        if (this.choice % 2 === 0) this.values[base + 2] = h
      }
    }
  }

  /** First variable of the stream at a port, or undefined. */
  private streamAt(placed: PlacedUnit, port: string): number | undefined {
    return placed.connections.find(({ name }) => name === port)?.base
  }

  private fillEnthalpies(): void {
    const { system, values } = this
    const done = new Uint8Array(system.variables.length)
    for (let pass = 0; pass < 3; pass++) {
      for (const placed of system.units) {
        for (const { port, base, description } of placed.connections) {
          if (description.direction !== 'out' || this.known(base + 2)) continue
          values[base + 2] = this.enthalpyAt(placed, base, placed.kind.starts[port], done)
          done[base + 2] = 1
        }
      }
    }
  }

  private enthalpyAt(
    placed: PlacedUnit,
    base: number,
    start: Start | undefined,
    done: Uint8Array,
  ): number {
    const p = this.values[base + 1]!
    if (typeof start === 'object') {
      const source = this.streamAt(placed, start.as) ?? this.streamAt(placed, `${start.as}1`)
      const isKnown = source !== undefined && (this.known(source + 2) || done[source + 2])
      if (!isKnown) return this.saturated(p, Saturation.hL)
      const h = this.values[source + 2]!
      if (start.warmerBy === undefined) return h
      const warmerBy = this.system.indexOf.get(`${placed.unit.id}.${start.warmerBy}`)
      const saturated = this.saturated(p, Saturation.hL)
      if (warmerBy === undefined) return saturated
      return Math.min(saturated, h + this.values[warmerBy]! * waterHeat)
    }
    if (start === 'compressed') return this.compressed(placed, p, done)
    if (start === 'cold') return coldEnthalpy
    if (start === 'mixed') return this.mixed(placed) ?? this.saturated(p, Saturation.hL)
    if (start === 'dry') return this.saturated(p, Saturation.hV)
    if (start === 'superheated') return superheatedEnthalpy
    if (start === 'expanded') return this.expanded(placed, p, done)
    if (start === 'heated') return this.heated(placed, p)
    return this.saturated(p, Saturation.hL)
  }

  private compressed(placed: PlacedUnit, p: number, done: Uint8Array): number {
    const inlet = placed.connections.find(({ description }) => description.direction === 'in')
    if (inlet === undefined || !(this.known(inlet.base + 2) || done[inlet.base + 2])) {
      return this.saturated(p, Saturation.hL)
    }
    const { values } = this
    const rise = Math.max(0, p - values[inlet.base + 1]!) * compressionVolume
    return values[inlet.base + 2]! + rise
  }

  /** What comes in, mixed in the proportions of the flows. */
  private mixed(placed: PlacedUnit): number | undefined {
    let flow = 0
    let energy = 0
    for (const { description, base } of placed.connections) {
      if (description.direction !== 'in') continue
      const m = Math.max(0, this.values[base]!)
      flow += m
      energy += m * this.values[base + 2]!
    }
    return flow > 0 ? energy / flow : undefined
  }

  private hasMixtures(): boolean {
    return this.system.units.some(({ kind, connections }) =>
      connections.some(({ port, base }) => kind.starts[port] === 'mixed' && !this.known(base + 2)),
    )
  }

  private saturated(p: number, slot: number): number {
    const outcome = saturationAtPressure(this.saturation, 0, Math.min(21e6, Math.max(700, p)))
    return outcome === Outcome.fine ? this.saturation[slot]! : slot === Saturation.hL ? 5e5 : 2.7e6
  }

  /** Brought near to the saturation temperature of the unit's shell. */
  private heated(placed: PlacedUnit, p: number): number {
    const shell = this.system.indexOf.get(`${placed.unit.id}.pressure`)
    const pShell = shell === undefined ? p : this.values[shell]!
    const clamped = Math.min(21e6, Math.max(700, pShell))
    if (saturationAtPressure(this.saturation, 0, clamped) !== Outcome.fine) return 5e5
    const T = this.saturation[Saturation.T]! - nearSaturation
    const outcome = enthalpyAtPressureTemperature(this.result, 0, p, T)
    return outcome === Outcome.fine ? this.result[0]! : this.saturation[Saturation.hL]!
  }

  private expanded(placed: PlacedUnit, p: number, done: Uint8Array): number {
    const inlet = placed.connections.find((port) => port.description.direction === 'in')
    if (inlet === undefined) return 2.8e6
    const p1 = this.values[inlet.base + 1]!
    const hasStart = this.known(inlet.base + 2) || done[inlet.base + 2] === 1
    const h1 = hasStart ? this.values[inlet.base + 2]! : superheatedEnthalpy
    if (stateAtPressureEnthalpy(this.state, 0, p1, h1) !== Outcome.fine) return 2.8e6
    const outcome = enthalpyAtPressureEntropy(this.result, 0, p, this.state[State.s]!)
    if (outcome !== Outcome.fine) return 2.8e6
    return h1 - expansionEfficiency * (h1 - this.result[0]!)
  }

  /** Flows of ordinary size, then shifted as little as it takes for the balances to close. */
  private fillFlows(): void {
    const { system, values } = this
    const largest = mainFlow(system, values, this.known, this.choice)
    for (const placed of system.units) {
      for (const { description, base } of placed.connections) {
        if (this.known(base)) continue
        const isBleed = description.repeated === true && placed.kind.shaft === 'driving'
        values[base] = isBleed ? bleedShare * largest : largest
        if (this.choice > 0) values[base]! *= 10 ** (flowScatter * this.scatter(base))
      }
    }
    balanceFlows(system, values, this.known, bleedShare * largest)
  }

  /** What equations give outright follows from the first guesses: powers, heats, totals, ratios. */
  private fillQuantities(): void {
    const { system, values } = this
    const targets: number[] = []
    const expressions: Expression[] = []
    for (const { equation } of system.equations) {
      const { left, right } = equation
      if (left.kind !== 'variable') continue
      if (system.variables[left.index]!.isState || this.known(left.index)) continue
      targets.push(left.index)
      expressions.push(right)
    }
    const outright = new ExpressionValues(expressions, system.variables.length)
    outright.load(values)
    // Totals follow from parts: a few passes carry values through all of them.
    for (let pass = 0; pass < outrightPasses; pass++) {
      targets.forEach((index, place) => {
        const value = outright.read(place)
        if (value === undefined) return
        values[index] = value
        outright.set(index, value)
      })
    }
  }
}
