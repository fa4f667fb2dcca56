import { freeze, givensOf, withGivens } from './case/freeze.ts'
import { freedByLoadControl } from './case/load-control.ts'
import { Model } from './model.ts'
import { Sensitivity } from './sensitivity.ts'
import { type Balance, solve } from './solve.ts'

/** What one practical step of a given quantity does to a target, to first order; SI. */
export interface Worth {
  readonly path: string
  /** The step, SI. */
  readonly step: number
  /** Change of the target by one step at fixed performance. */
  readonly fixed: number
  /** The same with the hardware frozen; null where that has no meaning or no solution, or was not asked for. */
  readonly frozen: number | null
}

/** The part of a value that counts as a step where its kind names none. */
const ordinaryStep = 0.01

/** Worths of all given numbers for targets; asked again and again after each solution. */
export class Worths {
  private readonly model: Model
  private readonly design: Sensitivity
  private frozen: { readonly sensitivity: Sensitivity; readonly model: Model } | undefined
  private replaced: ReadonlyMap<string, string> = new Map()
  private isFrozenFresh = false

  constructor(model: Model) {
    this.model = model
    this.design = new Sensitivity(model)
  }

  /** Takes over the model's present solution. */
  refresh(): void {
    this.design.refresh()
    this.isFrozenFresh = false
  }

  /**
   * Every given number's worth for a target; empty when the target is not determined. The hardware
   * is frozen on demand: that takes a model of its own.
   */
  of(target: string, balance: Balance, isFrozenWanted = true): Worth[] {
    const { system, program } = this.model
    const index = system.indexOf.get(target)
    if (index === undefined || program.lost[index]) return []
    const fixed = this.design.of(index).slice()
    if (isFrozenWanted && !this.isFrozenFresh) this.freeze(balance)
    const frozenTarget = !isFrozenWanted ? undefined : this.frozen?.model.system.indexOf.get(target)
    const frozen =
      this.frozen && frozenTarget !== undefined && !this.frozen.model.program.lost[frozenTarget]
        ? this.frozen.sensitivity.of(frozenTarget).slice()
        : undefined
    const found: Worth[] = []
    system.variables.forEach(({ path, description }, given) => {
      const value = system.given[given]!
      if (Number.isNaN(value)) return
      const step = description.step ?? ordinaryStep * Math.abs(value)
      if (step === 0) return
      const derivative = frozen && this.frozenDerivative(path, frozenTarget!, frozen)
      found.push({
        path,
        step,
        fixed: fixed[given]! * step,
        frozen: derivative === undefined ? null : derivative * step,
      })
    })
    return found
  }

  /**
   * With the hardware frozen a given works directly where it still is one. An approach that a
   * conductance has replaced changes with that conductance alone, as when the surface fouls; a
   * conductance that follows the flow, as a whole.
   */
  private frozenDerivative(path: string, target: number, frozen: Float64Array): number | undefined {
    const { sensitivity, model } = this.frozen!
    const { system } = model
    const index = system.indexOf.get(path)
    if (index !== undefined && !Number.isNaN(system.given[index]!)) return frozen[index]!
    const hardware = this.replaced.get(path)
    const sized = hardware === undefined ? undefined : system.indexOf.get(hardware)
    if (sized === undefined || index === undefined) return undefined
    const byHardware = (of: number): number => {
      const derivatives = sensitivity.of(of)
      return system.curved[sized] ? sensitivity.byScaleOfCurve(sized) : derivatives[sized]!
    }
    if (Number.isNaN(system.given[sized]!) && !system.curved[sized]) return undefined
    const slope = byHardware(index)
    return slope === 0 ? undefined : byHardware(target) / slope
  }

  /** The same plant with its own hardware frozen, at the design's load. */
  private freeze(balance: Balance): void {
    this.isFrozenFresh = true
    this.frozen = undefined
    if (balance.status !== 'solved') return
    const { layout, indexOf, given } = this.model.system
    const table = givensOf(layout)
    // The layout is as it was assembled; values may have changed since.
    for (const [path, value] of table) {
      const index = indexOf.get(path)
      if (typeof value === 'number' && index !== undefined) table.set(path, given[index]!)
    }
    const { replaced } = freeze(balance, balance, table, new Map())
    // What the flow laws now say about pressure, the load control gives way to: it slides.
    const sliding = freedByLoadControl('sliding', balance, table)
    for (const path of sliding) table.delete(path)
    const model = new Model(withGivens(layout, table), this.model.options)
    model.startFrom((path) => balance.results.value(path))
    const solved = solve(model)
    if (solved.status !== 'solved') return
    this.replaced = replaced
    this.frozen = { model, sensitivity: new Sensitivity(model) }
  }
}
