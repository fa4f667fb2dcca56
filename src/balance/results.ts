import type { Model } from './model.ts'
import { auditNames, auditUnit, type UnitAudit } from './second-law.ts'
import { States, streamResults } from './states.ts'

/** Both at most this when solved: relative to the largest flow and to the heat input. */
export interface Closure {
  readonly mass: number
  readonly energy: number
  readonly worstUnit: string
}

/** Every quantity of a layout in a fixed order, and where its number comes from. */
export class Results {
  /** Quantity paths, streams first, then units, shafts and the plant. */
  readonly paths: readonly string[]
  /** SI; NaN where a quantity is not determined or has no meaning. */
  readonly values: Float64Array
  readonly states: States
  readonly audits = new Map<string, UnitAudit>()
  readonly placeOf: ReadonlyMap<string, number>
  private readonly model: Model
  private readonly sources: Int32Array
  private readonly indexOfPath: ReadonlyMap<string, number>

  constructor(model: Model) {
    this.model = model
    this.states = new States(model)
    const { system } = model
    this.placeOf = new Map(system.layout.streams.map((stream, k) => [stream.id, k]))
    const paths: string[] = []
    const sources: number[] = []
    for (const stream of system.layout.streams) {
      for (const name of streamResults) {
        paths.push(`${stream.id}.${name}`)
        sources.push(-1)
      }
    }
    const streamIds = new Set(system.layout.streams.map((stream) => stream.id))
    system.variables.forEach(({ path, owner, isPhantom }, index) => {
      if (isPhantom || streamIds.has(owner)) return
      if (path.split('.').length !== 2) return
      paths.push(path)
      sources.push(index)
    })
    for (const path of system.meaningless) {
      paths.push(path)
      sources.push(-1)
    }
    for (const { unit, kind } of system.units) {
      for (const name of auditNames(kind.secondLaw)) {
        paths.push(`${unit.id}.${name}`)
        sources.push(-1)
      }
    }
    for (const shaft of system.layout.shafts) {
      paths.push(`${shaft.id}.exergyDestroyed`)
      sources.push(-1)
    }
    this.paths = paths
    this.sources = Int32Array.from(sources)
    this.values = new Float64Array(paths.length)
    this.indexOfPath = new Map(paths.map((path, k) => [path, k]))
    this.refresh()
  }

  /** A quantity by path, SI, or null. */
  value(path: string): number | null {
    const index = this.indexOfPath.get(path)
    if (index === undefined) return null
    const value = this.values[index]!
    return Number.isNaN(value) ? null : value
  }

  /** Reads everything from the model's present values. */
  refresh(): void {
    const { model, values, sources, states } = this
    const { lost } = model.program
    states.refresh()
    values.set(states.values)
    for (let k = states.values.length; k < values.length; k++) {
      const index = sources[k]!
      values[k] = index < 0 || lost[index] ? Number.NaN : model.values[index]!
    }
    const { units, layout } = model.system
    for (const placed of units) {
      const audit = auditUnit(model, states, placed, this.placeOf)
      this.audits.set(placed.unit.id, audit)
      for (const name of auditNames(placed.kind.secondLaw)) {
        this.put(`${placed.unit.id}.${name}`, audit[name as keyof UnitAudit] ?? Number.NaN)
      }
    }
    for (const shaft of layout.shafts) {
      const power = (ids: readonly string[]): number =>
        ids.reduce((sum, id) => sum + (this.value(`${id}.power`) ?? Number.NaN), 0)
      const generated = shaft.generator === false ? 0 : this.value(`${shaft.id}.generatorPower`)
      this.put(
        `${shaft.id}.exergyDestroyed`,
        power(shaft.turbines) - power(shaft.pumps) - (generated ?? Number.NaN),
      )
    }
  }

  private put(path: string, value: number): void {
    this.values[this.indexOfPath.get(path)!] = value
  }

  /** The worst unit's imbalance; only meaningful when everything is solved. */
  closure(): Closure {
    let largestFlow = 0
    let largestEnergy = 0
    const { states } = this
    for (let k = 0; k < states.phases.length; k++) {
      const m = Math.abs(states.get(k, 'm'))
      if (m > largestFlow) largestFlow = m
      largestEnergy = Math.max(largestEnergy, Math.abs(m * states.get(k, 'h')))
    }
    const heatInput = Math.abs(this.value('plant.heatInput') ?? 0)
    const energyScale = heatInput > 0 ? heatInput : largestEnergy
    let mass = 0
    let energy = 0
    let worst = 0
    let worstUnit = this.model.system.units[0]?.unit.id ?? ''
    for (const [id, audit] of this.audits) {
      const massPart = largestFlow > 0 ? Math.abs(audit.massImbalance) / largestFlow : 0
      const energyPart = energyScale > 0 ? Math.abs(audit.energyImbalance) / energyScale : 0
      if (massPart > mass) mass = massPart
      if (energyPart > energy) energy = energyPart
      if (Math.max(massPart, energyPart) > worst) {
        worst = Math.max(massPart, energyPart)
        worstUnit = id
      }
    }
    return { mass, energy, worstUnit }
  }
}
