import {
  constant,
  type Equation,
  type Expression,
  equal,
  minus,
  plus,
  variable,
} from '../equations/expression/index.ts'
import type { Given, Layout, Shaft, Stream, Unit } from '../plant/document.ts'
import {
  dryness,
  entropy,
  saturationTemperature,
  subcooling,
  superheat,
  temperature,
  volume,
} from '../steam/operations.ts'
import { kindNamed, plantQuantities, quantitiesOfShaft, streamQuantities } from '../units/index.ts'
import {
  numberedPort,
  type PortExpressions,
  type QuantityDescription,
  type QuantityTable,
  type Shape,
  type TotalName,
  type UnitContext,
  type UnitKind,
} from '../units/kind.ts'
import { plantEquations } from '../units/plant-totals.ts'
import { shaftEquations } from '../units/shaft.ts'
import { curveOf } from './given-curve.ts'
import { joinsFiredUnitAndTurbine } from './lines.ts'
import type { Connection, PlacedUnit } from './placed-unit.ts'

/** A quantity of the layout that takes part in the equations. */
export interface SystemVariable {
  readonly path: string
  readonly owner: string
  readonly description: QuantityDescription
  /** m, p or h of a stream: what must be known for the balance to be solved. */
  readonly isState: boolean
  /** Stands for the state at a port without a stream; has no name that a user knows. */
  readonly isPhantom: boolean
}

export interface SystemEquation {
  /** The unit, stream, shaft or `plant`. */
  readonly owner: string
  readonly key: string
  readonly equation: Equation
  /** This is a given curve of that variable, or the steam relation of a given stream quantity. */
  readonly origin: 'unit' | 'steam' | 'curve'
}

/** What a unit exchanges with the world beside its streams: plain quantities or constants. */
export type UnitTotals = Partial<Record<TotalName, Expression>>

/** The equations of a layout and what is given in it. */
export interface System {
  readonly layout: Layout
  readonly variables: readonly SystemVariable[]
  readonly indexOf: ReadonlyMap<string, number>
  readonly equations: readonly SystemEquation[]
  /** By variable: the given number, or NaN. */
  readonly given: Float64Array
  /** By variable: given as a curve (1). */
  readonly curved: Uint8Array
  readonly units: readonly PlacedUnit[]
  readonly unitOf: ReadonlyMap<string, PlacedUnit>
  /** Quantities that mean nothing while their unit is out of service. */
  readonly meaningless: readonly string[]
  /** By unit: what it adds to the plant's totals. */
  readonly totalsOf: ReadonlyMap<string, UnitTotals>
  /** First variable of each stream (m; p and h follow), in the layout's order. */
  readonly streamBase: Int32Array
}

export interface AssemblyOptions {
  /** Fold givens of exactly 0 or 1 into the equations (the default). */
  readonly fold?: boolean
  /** Ids of units that are out of service. */
  readonly outOfService?: ReadonlySet<string>
}

/**
 * Assembles the equations of a layout. Variables and equations are the same and in the same order
 * whether givens are folded or not.
 */
export function assemble(layout: Layout, options: AssemblyOptions = {}): System {
  return new Assembly(layout, options).system()
}

class Assembly {
  private readonly layout: Layout
  private readonly fold: boolean
  private readonly outOfService: ReadonlySet<string>
  private readonly meaningless: string[] = []
  private readonly variables: SystemVariable[] = []
  private readonly expressions: Expression[] = []
  private readonly given: number[] = []
  private readonly curves: { readonly index: number; readonly given: Exclude<Given, number> }[] = []
  private readonly indexOf = new Map<string, number>()
  private readonly equations: SystemEquation[] = []
  private readonly ports = new Map<string, PortExpressions>()
  private readonly placed: PlacedUnit[] = []
  private readonly totals = new Map<TotalName, Expression[]>()
  private readonly totalsOf = new Map<string, UnitTotals>()
  private readonly streamBase: Int32Array

  constructor(layout: Layout, { fold = true, outOfService = new Set() }: AssemblyOptions) {
    this.layout = layout
    this.fold = fold
    this.outOfService = outOfService
    this.streamBase = new Int32Array(layout.streams.length)
  }

  system(): System {
    const { layout } = this
    layout.streams.forEach((stream, k) => {
      this.addStream(stream, k)
    })
    const drivenBy = new Set<string>()
    for (const shaft of layout.shafts) for (const id of shaft.pumps) drivenBy.add(id)
    const streamsAt = this.streamsAtUnits()
    for (const unit of layout.units) {
      this.placed.push(this.placeUnit(unit, streamsAt.get(unit.id) ?? new Map()))
    }
    const unitOf = new Map(this.placed.map((placed) => [placed.unit.id, placed]))
    for (const shaft of layout.shafts) this.addShaftQuantities(shaft)
    this.addQuantities('plant', plantQuantities, { options: {}, streams: {} }, layout.plant.given)
    for (const placed of this.placed) this.addUnitEquations(placed, drivenBy, unitOf)
    for (const shaft of layout.shafts) this.addShaftEquations(shaft, unitOf)
    this.addPlantEquations()
    const curved = new Uint8Array(this.variables.length)
    for (const { index, given } of this.curves) {
      this.addCurve(index, given)
      curved[index] = 1
    }
    return {
      layout,
      variables: this.variables,
      indexOf: this.indexOf,
      equations: this.equations,
      given: Float64Array.from(this.given),
      curved,
      units: this.placed,
      unitOf,
      meaningless: this.meaningless,
      totalsOf: this.totalsOf,
      streamBase: this.streamBase,
    }
  }

  /** Stream ids by unit and numbered port. */
  private streamsAtUnits(): Map<string, Map<string, string>> {
    const found = new Map<string, Map<string, string>>()
    const note = (reference: string, stream: string): void => {
      const dot = reference.indexOf('.')
      const unit = reference.slice(0, dot)
      let ports = found.get(unit)
      if (ports === undefined) {
        ports = new Map()
        found.set(unit, ports)
      }
      ports.set(reference.slice(dot + 1), stream)
    }
    for (const stream of this.layout.streams) {
      note(stream.from, stream.id)
      note(stream.to, stream.id)
    }
    return found
  }

  private add(
    path: string,
    owner: string,
    description: QuantityDescription,
    given: Given | undefined,
    isState = false,
    isPhantom = false,
  ): Expression {
    const index = this.variables.length
    this.variables.push({ path, owner, description, isState, isPhantom })
    this.indexOf.set(path, index)
    const number = typeof given === 'number' ? given : Number.NaN
    this.given.push(number)
    if (given !== undefined && typeof given !== 'number') this.curves.push({ index, given })
    const expression: Expression =
      this.fold && (number === 0 || number === 1) ? constant(number) : variable(index, path)
    this.expressions.push(expression)
    return expression
  }

  private expressionOf(path: string): Expression | undefined {
    const index = this.indexOf.get(path)
    return index === undefined ? undefined : this.expressions[index]
  }

  private addStream(stream: Stream, place: number): void {
    this.streamBase[place] = this.variables.length
    this.ports.set(stream.id, this.addState(stream.id, stream.id, stream.given, false))
  }

  /** m, p, h of a stream, and those of its other quantities that are given. */
  private addState(
    id: string,
    owner: string,
    given: Readonly<Record<string, Given>>,
    isPhantom: boolean,
  ): PortExpressions {
    const m = this.add(`${id}.m`, owner, streamQuantities.m, given.m, !isPhantom, isPhantom)
    const p = this.add(`${id}.p`, owner, streamQuantities.p, given.p, !isPhantom, isPhantom)
    const h = this.add(`${id}.h`, owner, streamQuantities.h, given.h, !isPhantom, isPhantom)
    const quantities = new Map<StreamRelation, Expression>()
    const related = (name: StreamRelation): Expression => {
      const relation = streamRelations[name](p, h)
      const value = given[name]
      if (value === undefined) return relation
      const quantity = this.add(`${id}.${name}`, owner, streamQuantities[name], value)
      quantities.set(name, quantity)
      // Temperature beside another distance from saturation fixes the pressure outright.
      const saturated = name === 'T' ? this.saturationBy(quantity, quantities, given) : undefined
      this.equations.push({
        owner,
        key: `${name}Relation`,
        equation: saturated
          ? equal(saturationTemperature(p), saturated)
          : equal(quantity, relation),
        origin: 'steam',
      })
      return quantity
    }
    related('superheat')
    related('subcooling')
    const x = related('x')
    return { id, m, p, h, T: related('T'), s: related('s'), x, v: volume(p, h) }
  }

  /** The saturation temperature that a given temperature and what is given beside it imply. */
  private saturationBy(
    T: Expression,
    quantities: ReadonlyMap<StreamRelation, Expression>,
    given: Readonly<Record<string, Given>>,
  ): Expression | undefined {
    const superheated = quantities.get('superheat')
    if (superheated) return minus(T, superheated)
    const subcooled = quantities.get('subcooling')
    if (subcooled) return plus(T, subcooled)
    const { x } = given
    return typeof x === 'number' && x >= 0 && x <= 1 ? T : undefined
  }

  private placeUnit(unit: Unit, streams: ReadonlyMap<string, string>): PlacedUnit {
    const kind = kindNamed(unit.kind)
    if (kind === undefined) throw new Error(`unit ${unit.id} is of unknown kind ${unit.kind}`)
    const counts: Record<string, number> = {}
    const open: string[] = []
    const connections: Connection[] = []
    for (const [port, description] of Object.entries(kind.ports)) {
      let count = 0
      const numbered = (number: number): string => numberedPort(kind.ports, port, number)
      if (description.repeated) while (streams.has(numbered(count + 1))) count++
      else if (streams.has(port)) count = 1
      if (count === 0 && !description.optional) {
        const name = description.repeated ? numbered(1) : port
        open.push(name)
        this.ports.set(`${unit.id}.${name}`, this.addState(`${unit.id}.${name}`, unit.id, {}, true))
        count = 1
      }
      counts[port] = count
      for (let k = 1; k <= count; k++) {
        const name = description.repeated ? numbered(k) : port
        const stream = streams.get(name)
        if (stream === undefined) continue
        const base = this.indexOf.get(`${stream}.m`)!
        connections.push({ name, port, description, stream, base })
      }
    }
    const shape: Shape = { options: unit.options ?? {}, streams: counts }
    this.addQuantities(unit.id, kind.quantities, shape, unit.given, this.idleKind(unit.id, kind))
    return { unit, kind, shape, streams, connections, open }
  }

  private addQuantities(
    owner: string,
    table: QuantityTable,
    shape: Shape,
    given: Readonly<Record<string, Given>>,
    idle?: UnitKind['outOfService'],
  ): void {
    for (const name in table) {
      const description = table[name]!
      if (description.when && !description.when(shape)) continue
      if (idle?.meaningless.includes(name)) {
        this.meaningless.push(`${owner}.${name}`)
        continue
      }
      if (description.each === undefined) {
        this.add(`${owner}.${name}`, owner, description, given[name])
        continue
      }
      const count = (shape.streams[description.each.port] ?? 0) + description.each.extra
      for (let k = 1; k <= count; k++) {
        this.add(`${owner}.${name}${k}`, owner, description, given[`${name}${k}`])
      }
    }
  }

  private portState(placed: PlacedUnit, port: string): PortExpressions {
    const stream = placed.streams.get(port)
    return this.ports.get(stream ?? `${placed.unit.id}.${port}`)!
  }

  /** What a kind's equations receive. */
  private contextOf(placed: PlacedUnit, onShaft: boolean): UnitContext<never, never> {
    const { unit, kind, shape } = placed
    const ports: Record<string, unknown> = {}
    for (const [port, description] of Object.entries(kind.ports)) {
      const count = shape.streams[port]!
      if (description.repeated) {
        ports[port] = Array.from({ length: count }, (_, k) =>
          this.portState(placed, numberedPort(kind.ports, port, k + 1)),
        )
      } else if (count > 0) ports[port] = this.portState(placed, port)
    }
    const quantities: Record<string, unknown> = {}
    for (const [name, description] of Object.entries(kind.quantities)) {
      if (description.when && !description.when(shape)) continue
      if (description.each === undefined) {
        quantities[name] = this.expressionOf(`${unit.id}.${name}`)
        continue
      }
      const count = (shape.streams[description.each.port] ?? 0) + description.each.extra
      quantities[name] = Array.from(
        { length: count },
        (_, k) => this.expressionOf(`${unit.id}.${name}${k + 1}`)!,
      )
    }
    return { ports, quantities, shape, onShaft } as unknown as UnitContext<never, never>
  }

  private addUnitEquations(
    placed: PlacedUnit,
    drivenBy: ReadonlySet<string>,
    unitOf: ReadonlyMap<string, PlacedUnit>,
  ): void {
    const { unit, kind } = placed
    const context = this.contextOf(placed, drivenBy.has(unit.id))
    const idle = this.idleKind(unit.id, kind)
    this.addEquations(unit.id, idle ? idle.equations(context) : kind.equations(context))
    const totals = kind.totals?.(context)
    if (totals === undefined) return
    this.totalsOf.set(unit.id, totals)
    for (const [name, expression] of Object.entries(totals) as [TotalName, Expression][]) {
      if (name === 'lineHeatLoss' && !joinsFiredUnitAndTurbine(placed, unitOf, this.layout))
        continue
      let parts = this.totals.get(name)
      if (parts === undefined) {
        parts = []
        this.totals.set(name, parts)
      }
      parts.push(expression)
    }
  }

  /** How a unit behaves out of service, where it is. */
  private idleKind(id: string, kind: UnitKind): UnitKind['outOfService'] {
    return this.outOfService.has(id) ? kind.outOfService : undefined
  }

  private addEquations(owner: string, equations: Readonly<Record<string, Equation>>): void {
    for (const key in equations) {
      this.equations.push({ owner, key, equation: equations[key]!, origin: 'unit' })
    }
  }

  private addShaftQuantities(shaft: Shaft): void {
    const table = quantitiesOfShaft(shaft.generator !== false)
    this.addQuantities(shaft.id, table, { options: {}, streams: {} }, shaft.given)
  }

  private addShaftEquations(shaft: Shaft, unitOf: ReadonlyMap<string, PlacedUnit>): void {
    const powers = (ids: readonly string[]): Expression[] =>
      ids.filter((id) => unitOf.has(id)).map((id) => this.expressionOf(`${id}.power`)!)
    this.addEquations(
      shaft.id,
      shaftEquations(
        powers(shaft.turbines),
        powers(shaft.pumps),
        (name) => this.expressionOf(`${shaft.id}.${name}`)!,
        shaft.generator !== false,
      ),
    )
  }

  private addPlantEquations(): void {
    const generators = this.layout.shafts
      .filter((shaft) => shaft.generator !== false)
      .map((shaft) => this.expressionOf(`${shaft.id}.generatorPower`)!)
    const sums = new Map<TotalName, Expression>()
    const sum = (name: TotalName): Expression => {
      let total = sums.get(name)
      if (total === undefined) {
        total = plus(...(this.totals.get(name) ?? []))
        sums.set(name, total)
      }
      return total
    }
    this.addEquations(
      'plant',
      plantEquations(sum, generators, (name) => this.expressionOf(`plant.${name}`)!),
    )
  }

  private addCurve(index: number, given: Exclude<Given, number>): void {
    const against = this.against(given.against)
    const { owner, path } = this.variables[index]!
    this.equations.push({
      owner,
      key: `${path.slice(path.lastIndexOf('.') + 1)}Curve`,
      equation: equal(this.expressions[index]!, curveOf(given, against)),
      origin: 'curve',
    })
  }

  /** The expression of any quantity, those of streams that no equation needed yet included. */
  private against(path: string): Expression {
    const known = this.expressionOf(path)
    if (known !== undefined) return known
    const dot = path.lastIndexOf('.')
    const state = this.ports.get(path.slice(0, dot))
    const name = path.slice(dot + 1)
    if (state === undefined || !(name in streamRelations)) {
      throw new Error(`a curve is given against ${path}, which the layout does not have`)
    }
    return streamRelations[name as StreamRelation](state.p, state.h)
  }
}

/** The other quantities of a stream as functions of its pressure and enthalpy. */
const streamRelations = { T: temperature, s: entropy, x: dryness, superheat, subcooling } as const
type StreamRelation = keyof typeof streamRelations
