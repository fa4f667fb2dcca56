import type { Case, Layout, Plant } from '../../plant/document.ts'
import type { Overrides } from '../../plant/overrides.ts'
import type { Finding } from '../answer.ts'
import { Wording } from '../findings.ts'
import { Model } from '../model.ts'
import { type Balance, solve } from '../solve.ts'
import type { AssemblyOptions } from '../system.ts'
import { continueTo } from './continuation.ts'
import { freeze, type GivenTable, givensOf, withGivens } from './freeze.ts'
import { freedByLoadControl } from './load-control.ts'
import { splitTurbine, UnusableCase } from './split.ts'

export type CaseOutcome =
  | { readonly outcome: 'balance'; readonly balance: Balance; readonly remarks: readonly Finding[] }
  | { readonly outcome: 'unusable'; readonly message: string }

const nothing: Overrides = { free: [], set: {} }

/**
 * Solves a layout, or a case of it (contract, section 4): the layout's givens, the freeze, load
 * control, what is out of service, what the case frees and gives, and last the overrides.
 */
export function solveCase(
  plant: Plant,
  layoutId: string,
  caseId: string | null,
  overrides: Overrides = nothing,
): CaseOutcome {
  try {
    return new CaseSolver(plant).solve(layoutId, caseId, overrides)
  } catch (error) {
    if (error instanceof UnusableCase) return { outcome: 'unusable', message: error.message }
    throw error
  }
}

class CaseSolver {
  private readonly plant: Plant
  /** Cases being solved for their hardware, against going round in circles. */
  private readonly open = new Set<string>()

  constructor(plant: Plant) {
    this.plant = plant
  }

  solve(
    layoutId: string,
    caseId: string | null,
    overrides: Overrides,
  ): Extract<CaseOutcome, { outcome: 'balance' }> {
    const layout = this.layout(layoutId)
    const chosen = caseId === null ? undefined : this.caseOf(layout, caseId)
    const table = givensOf(layout)
    const remarks: Finding[] = []
    const wording = new Wording(layout)
    if (chosen === undefined || isPlain(chosen)) {
      applyCase(chosen, table, remarks, wording)
      applyOverrides(overrides, table, remarks, wording)
      return this.finish(withGivens(layout, table), {}, undefined, remarks)
    }
    const design = solve(new Model(layout))
    const options: AssemblyOptions = { outOfService: new Set(chosen.outOfService ?? []) }
    if (chosen.frozen) {
      if (design.status !== 'solved') return { outcome: 'balance', balance: design, remarks }
      const hardware = this.hardware(layout, chosen, design)
      if (hardware.status !== 'solved') {
        return { outcome: 'balance', balance: hardware, remarks }
      }
      this.freezeAll(design, hardware, table, remarks, wording)
    }
    if (chosen.loadControl) {
      const freed = freedByLoadControl(chosen.loadControl, design, table)
      for (const path of freed) table.delete(path)
      if (freed.length === 0) remarks.push(nothingFreed(chosen.loadControl))
    }
    takeOutOfService(design, options.outOfService!, table, remarks, wording)
    applyCase(chosen, table, remarks, wording)
    applyOverrides(overrides, table, remarks, wording)
    return this.finish(withGivens(layout, table), options, design, remarks)
  }

  private finish(
    layout: Layout,
    options: AssemblyOptions,
    design: Balance | undefined,
    remarks: readonly Finding[],
  ): Extract<CaseOutcome, { outcome: 'balance' }> {
    const balance =
      design === undefined || design.status !== 'solved'
        ? solve(new Model(layout, options))
        : continueTo(layout, options, design)
    return { outcome: 'balance', balance, remarks }
  }

  private layout(id: string): Layout {
    const found = this.plant.layouts.find((layout) => layout.id === id)
    if (found === undefined) throw new UnusableCase(`the plant has no layout ${id}`)
    return found
  }

  private caseOf(layout: Layout, id: string): Case {
    const found = layout.cases.find((one) => one.id === id)
    if (found === undefined) throw new UnusableCase(`layout ${layout.id} has no case ${id}`)
    return found
  }

  /** The solution whose hardware is taken: another layout or case, or the design itself. */
  private hardware(layout: Layout, chosen: Case, design: Balance): Balance {
    const from = chosen.hardwareFrom
    if (from === undefined) return design
    const key = `${from.layout}/${from.case ?? ''}`
    if (this.open.has(key)) {
      throw new UnusableCase(
        `case ${chosen.id} of layout ${layout.id} takes its hardware from ${key}, which takes it from here`,
      )
    }
    this.open.add(key)
    const solved = this.solve(from.layout, from.case ?? null, nothing)
    this.open.delete(key)
    return solved.balance
  }

  private freezeAll(
    design: Balance,
    hardware: Balance,
    table: GivenTable,
    remarks: Finding[],
    wording: Wording,
  ): void {
    const special = new Map<string, number>()
    for (const placed of design.model.system.units) {
      const other = hardware.model.system.unitOf.get(placed.unit.id)
      if (placed.kind.shaft !== 'driving' || other?.unit.kind !== placed.unit.kind) continue
      const parts = splitTurbine(placed, other, design, hardware, table)
      for (const [path, value] of parts) {
        special.set(path, value)
        if (path.includes('.groupEfficiency')) table.set(path, value)
      }
    }
    const { unfrozen } = freeze(design, hardware, table, special)
    for (const { unit, quantity } of unfrozen) {
      remarks.push({
        severity: 'remark',
        code: 'not-frozen',
        where: [unit],
        quantities: [`${unit}.${quantity}`],
        message: `${wording.quantity(`${unit}.${quantity}`)} is not known in the hardware's solution and was not frozen; what is given stays.`,
      })
    }
  }
}

/** A case that only gives and frees. */
function isPlain(chosen: Case): boolean {
  return !chosen.frozen && !chosen.loadControl && (chosen.outOfService ?? []).length === 0
}

function nothingFreed(control: NonNullable<Case['loadControl']>): Finding {
  const messages = {
    sliding: 'Sliding pressure frees the main steam pressure, but none is given on the way.',
    throttled:
      'Throttling frees the admission pressure loss, but no turbine that a boiler feeds has one given.',
    wideOpen:
      'Wide open frees what sets the load, but neither a steam flow nor a plant power is given.',
  }
  return {
    severity: 'remark',
    code: 'load-control-without-effect',
    where: [],
    quantities: [],
    message: messages[control],
  }
}

function applyCase(
  chosen: Case | undefined,
  table: GivenTable,
  remarks: Finding[],
  wording: Wording,
): void {
  if (chosen === undefined) return
  applyOverrides({ free: chosen.free ?? [], set: chosen.given ?? {} }, table, remarks, wording)
}

function applyOverrides(
  { free, set }: Overrides,
  table: GivenTable,
  remarks: Finding[],
  wording: Wording,
): void {
  for (const path of free) {
    if (table.delete(path)) continue
    remarks.push({
      severity: 'remark',
      code: 'not-given',
      where: [path.slice(0, path.indexOf('.'))],
      quantities: [path],
      message: `${wording.quantity(path)} is to be freed but is not given.`,
    })
  }
  for (const [path, value] of Object.entries(set)) table.set(path, value)
}

function takeOutOfService(
  design: Balance,
  ids: ReadonlySet<string>,
  table: GivenTable,
  remarks: Finding[],
  wording: Wording,
): void {
  for (const id of ids) {
    const placed = design.model.system.unitOf.get(id)
    const idle = placed?.kind.outOfService
    if (placed === undefined || idle === undefined) {
      remarks.push({
        severity: 'remark',
        code: 'cannot-be-idle',
        where: placed ? [id] : [],
        quantities: [],
        message: `${wording.name(id)} cannot be taken out of service.`,
      })
      continue
    }
    for (const name of [...idle.meaningless, ...idle.frees]) table.delete(`${id}.${name}`)
    for (const { port, stream } of placed.connections) {
      if (idle.idlePorts.includes(port)) table.delete(`${stream}.m`)
    }
  }
}
