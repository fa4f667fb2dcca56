import type { Equation, Expression } from '../equations/expression/index.ts'
import type { Dimension } from '../quantity/dimension.ts'

/** How a kind is grouped in the rail, as the trade groups its equipment. */
export type KindGroup = 'Heat' | 'Machines' | 'Heaters' | 'Vessels' | 'Lines' | 'Edges'

export interface PortDescription {
  readonly direction: 'in' | 'out'
  /** Numbered from 1 without gaps, as many as there are streams: `drain1`, `drain2`. */
  readonly repeated?: true
  /** What the numbers of a repeated port follow, where that is not its own name. */
  readonly stem?: string
  /** May stay without a stream. */
  readonly optional?: true
  /** What may flow here; decides which connections make sense. */
  readonly carries: 'steam' | 'water' | 'any'
  /**
   * `equal`: the stream has the unit's shell or casing pressure. `throttles`: it may arrive at a
   * higher pressure and is throttled on entry. `own`: the kind's equations say.
   */
  readonly pressure: 'equal' | 'throttles' | 'own'
  /** What a designer gives of the stream that leaves here; the rest follows. */
  readonly designed?: readonly ('m' | 'p' | 'T')[]
  readonly label: string
}

/** Where on a unit quantities come in numbers: `groupEfficiency1..n+1` for n bleeds. */
export interface Repetition {
  readonly port: string
  readonly extra: number
}

/** What decides which quantities a unit has: its options and how many streams meet each port. */
export interface Shape {
  readonly options: Readonly<Record<string, boolean | readonly number[]>>
  /** By port name without number. */
  readonly streams: Readonly<Record<string, number>>
}

export interface QuantityDescription {
  readonly label: string
  /** The trade's symbol, shown beside the full name: TTD, DCA, UA. */
  readonly symbol?: string
  readonly dimension: Dimension
  /** One sentence. */
  readonly help: string
  /** The usual value, SI. */
  readonly usual?: number
  /** A new unit arrives with this quantity given at its usual value. */
  readonly given?: true
  /** A designer gives it, though it has no usual value. */
  readonly designed?: true
  /** The usual range, SI; outside it is a caution, never a refusal. */
  readonly range?: readonly [number, number]
  /** Where the usual value and range come from. */
  readonly basis?: string
  /** What is physically possible, SI, ends included unless `above`; outside it the plant is infeasible. */
  readonly possible?: {
    readonly above?: number
    readonly least?: number
    readonly most?: number
    readonly below?: number
  }
  /** One practical step, SI: what a change 'by one' means to the trade. */
  readonly step?: number
  /** One for each stream of a port, and `extra` more. */
  readonly each?: Repetition
  /** Absent: always there. */
  readonly when?: (shape: Shape) => boolean
}

/**
 * An option that is a list of whole numbers instead of yes or no. `numbersOf`: numbers of streams at
 * a repeated port (which bleeds are controlled); `each`: one entry for each (where a group comes from).
 */
export type OptionList = { readonly numbersOf: string } | { readonly each: Repetition }

export interface OptionDescription {
  readonly label: string
  readonly help: string
  readonly list?: OptionList
}

export type PortTable = Readonly<Record<string, PortDescription>>
export type QuantityTable = Readonly<Record<string, QuantityDescription>>

/** A stream as the equations of a unit see it. */
export interface PortExpressions {
  /** The stream's id. */
  readonly id: string
  readonly m: Expression
  readonly p: Expression
  readonly h: Expression
  readonly T: Expression
  readonly s: Expression
  readonly v: Expression
  /** Dryness, (h - h')/(h'' - h'), not clamped. */
  readonly x: Expression
}

const numbered = /^(.*?)([1-9][0-9]*)$/

/**
 * The port of a table that a stream's reference names (`drain2`, `outlet`), and its number where the
 * port is repeated; undefined where there is none.
 */
export function portNamed(
  ports: PortTable,
  name: string,
): { readonly port: string; readonly number?: number } | undefined {
  if (Object.hasOwn(ports, name) && !(ports[name]!.repeated && ports[name]!.stem)) {
    return { port: name }
  }
  const [, stem, digits] = numbered.exec(name) ?? []
  if (stem === undefined) return undefined
  for (const [port, description] of Object.entries(ports)) {
    if (description.repeated && (description.stem ?? port) === stem) {
      return { port, number: Number(digits) }
    }
  }
  return undefined
}

/** The name that a repeated port's stream of a number goes by. */
export function numberedPort(ports: PortTable, port: string, number: number): string {
  return `${ports[port]!.stem ?? port}${number}`
}

type PortsOf<P extends PortTable> = {
  readonly [K in keyof P]: P[K] extends { repeated: true }
    ? readonly PortExpressions[]
    : P[K] extends { optional: true }
      ? PortExpressions | undefined
      : PortExpressions
}

type QuantitiesOf<Q extends QuantityTable> = {
  readonly [K in keyof Q]: Q[K] extends { each: Repetition } ? readonly Expression[] : Expression
}

/** What `equations` receives: ports and quantities by name, as expressions of this one unit. */
export interface UnitContext<P extends PortTable, Q extends QuantityTable> {
  readonly ports: PortsOf<P>
  readonly quantities: QuantitiesOf<Q>
  readonly shape: Shape
  /** The pump is driven by a shaft (kinds that no shaft can drive never ask). */
  readonly onShaft: boolean
}

/** What a unit adds to the plant's totals. */
export type TotalName =
  | 'heatInput'
  | 'fuelHeat'
  | 'recoveredHeat'
  | 'processHeat'
  | 'turbinePower'
  | 'pumpPower'
  | 'electricPower'
  | 'heatRejected'
  | 'boilerSteam'
  /** Heat taken off turbineHeat: blowdown. */
  | 'turbineHeatCredit'
  /** Heat lost by a line; counts where the line joins a fired unit and a turbine. */
  | 'lineHeatLoss'

/** The path a process takes between two ports, for charts. */
export interface ProcessPath {
  readonly from: string
  readonly to: string
  /**
   * `line`: p and h change together; `isenthalp`; `expansion` and `compression` by constant
   * efficiency; `throttledLine`: first throttled to the end's pressure, then a line.
   */
  readonly course: 'line' | 'isenthalp' | 'expansion' | 'compression' | 'throttledLine'
}

/**
 * How the enthalpy of what leaves a port is guessed: cold water, saturated liquid or dry saturated
 * steam of its pressure, superheated steam, a turbine's expansion, water heated to the unit's saturation, a mixture
 * of all that comes in, water brought to a higher pressure, or what comes in at another port: as it is, or warmer by a quantity of the
 * unit (where the unit does not have it, saturated liquid).
 */
export type Start =
  | 'heated'
  | 'liquid'
  | 'dry'
  | 'superheated'
  | 'expanded'
  | 'cold'
  | 'mixed'
  | 'compressed'
  | { readonly as: string; readonly warmerBy?: string }

/**
 * Where a unit passes heat on, for the chart of temperature against heat. Port names without number
 * stand for all streams of a repeated port, mixed.
 */
export interface HeatPassage {
  /** What takes the heat up: streams between ports, or cooling water by its temperatures. */
  readonly cold:
    | { readonly from: string; readonly to: string }
    | { readonly inletTemperature: string; readonly rise: string }
  /** What gives it. */
  readonly hot: { readonly from: string; readonly to: string }
  /**
   * `counterflow`: both sides by their own states. `saturated`: the shell is at saturation but for a
   * zone that cools the steam and one that cools the drain, where there are such.
   */
  readonly shell: 'counterflow' | 'saturated'
  /** The quantity that the superheat left behind a desuperheating zone goes by; it is there with the zone. */
  readonly residualSuperheat?: string
  /** Differences of temperature that the trade has names for: quantities, and at which end they lie. */
  readonly differences: readonly {
    readonly quantity: string
    readonly end: 'hot' | 'cold'
    /** Counted from saturation, not from what enters there. */
    readonly fromSaturation?: true
  }[]
}

/** Solved numbers of a unit, SI; NaN where something is open. */
export interface UnitNumbers {
  readonly shape: Shape
  /** By numbered name. */
  port(name: string): { readonly m: number; readonly p: number; readonly h: number } | undefined
  quantity(name: string): number
}

/** What a kind sees by itself in its solved numbers that is unusual or unwise, though it can be. */
export interface Caution {
  readonly code: string
  /** What a user would look at first leads: own quantities by name, those of streams as `port.quantity`. */
  readonly quantities: readonly string[]
  /** What is so, after the unit's name; `{0}`, `{1}` ... stand for the values in the reader's units. */
  readonly message: string
  readonly values: readonly (readonly [number, Dimension])[]
  /** What to do. */
  readonly advice: string
  /** A caution unless it is worth no more than a remark. */
  readonly severity?: 'remark'
}

/** What works between two ports of a machine, SI. */
export interface StageGroup {
  readonly flow: number
  /** The state in which it starts. */
  readonly inletPressure: number
  readonly inletEnthalpy: number
  /** The end of its expansion line, before an exhaust loss. */
  readonly outletPressure: number
  readonly outletEnthalpy: number
  /** What it gives to the shaft, W; over all groups the machine's power. */
  readonly power: number
  /** Quantities of the unit that belong to it. */
  readonly quantities: Readonly<Record<'efficiency' | 'flowConstant', string>>
}

/** How exergy is accounted: contract, section 3, second law. */
export type SecondLawRole = 'adiabatic' | 'losesHeat' | 'fired' | 'heated' | 'delivers' | 'edge'

/**
 * What freezing the hardware gives and frees. The quantity takes the value that it has in the
 * hardware's solution; where that is not known, nothing is replaced.
 */
export interface FreezeRule {
  readonly quantity: string
  /** Quantities of the unit whose givens it replaces. */
  readonly frees: readonly string[]
  /** Only together with this one. */
  readonly needs?: string
  /** Only where the unit itself gives it as a number. */
  readonly onlyGiven?: true
  /** Given as a power of a flow or pressure instead of a number, through the hardware's value of it. */
  readonly law?: {
    /** A quantity of the unit, or a quantity of the stream at a port. */
    readonly against: string | { readonly port: string; readonly quantity: string }
    /** The exponent, or the quantity that gives it. */
    readonly exponent: number | string
  }
  /** A flow given on the unit's streams, or as their share at a branch before it, gives way. */
  readonly freesFlow?: true
}

/** What a kind may ask about its unit when its hardware is frozen. */
export interface FreezeContext {
  readonly shape: Shape
  /** The unit's shaft has a generator. */
  readonly drivesGenerator: boolean
}

/** How a unit behaves while it is out of service. */
export interface OutOfService<P extends PortTable, Q extends QuantityTable> {
  equations(unit: UnitContext<P, Q>): Readonly<Record<string, Equation>>
  /** Quantities that mean nothing then. */
  readonly meaningless: readonly string[]
  /** Quantities whose givens give way. */
  readonly frees: readonly string[]
  /** Ports whose streams carry nothing: a flow given there gives way. */
  readonly idlePorts: readonly string[]
}

/**
 * A kind of unit, declared once: everything that others need to know of it.
 * Registered in index.ts; nothing outside this folder asks which kind it has in hand.
 */
export interface UnitKind<
  N extends string = string,
  P extends PortTable = PortTable,
  Q extends QuantityTable = QuantityTable,
> {
  readonly name: N
  readonly label: string
  /** Two or three letters that new ids and labels start with. */
  readonly idStem: string
  readonly group: KindGroup
  /** One sentence. */
  readonly help: string
  readonly ports: P
  readonly quantities: Q
  readonly options?: Readonly<Record<string, OptionDescription>>
  /** The quantity shown beside the symbol. */
  readonly chief?: string
  /** Needs to stand on a shaft (turbine), may stand on one (pump). */
  readonly shaft?: 'driving' | 'driven'
  // Methods, so that kinds with exact port names fit where any kind is meant.
  equations(unit: UnitContext<P, Q>): Readonly<Record<string, Equation>>
  totals?(unit: UnitContext<P, Q>): Partial<Record<TotalName, Expression>>
  /** What stays when the hardware is frozen; absent: nothing of its own. */
  freezing?(unit: FreezeContext): readonly FreezeRule[]
  /** Absent: the kind cannot be taken out of service. */
  readonly outOfService?: OutOfService<P, Q>
  /** Numbers of bleeds whose pressure a control valve holds. */
  controlled?(shape: Shape): readonly number[]
  /** Holds the pressure behind it, whatever comes in, with these quantities given. */
  holdsPressure?(isGiven: (quantity: string) => boolean): boolean
  /** Leaves at any pressure below the one it receives, with these quantities given. */
  dropsPressure?(isGiven: (quantity: string) => boolean): boolean
  readonly secondLaw: SecondLawRole
  readonly paths: (shape: Shape) => readonly ProcessPath[]
  /** Absent: passes no heat on from stream to stream. */
  readonly heatPassage?: HeatPassage
  /** What is unusual in a solved unit; absent: nothing that it could see. */
  cautions?(unit: UnitNumbers): readonly Caution[]
  /** What the machine consists of, in the direction of the flow. */
  stageGroups?(unit: UnitNumbers): readonly StageGroup[]
  /** First guesses of what leaves: where an iteration starts when nothing better is known. */
  readonly starts: Readonly<Record<string, Start>>
  /** May leave at a higher pressure than it receives. */
  readonly raisesPressure?: true
  /** Streams of these ports pass through unchanged in kind: how lines are followed from unit to unit. */
  readonly passes?: readonly (readonly [string, string])[]
}

/** Gives a kind its exact type, so that port and quantity names are checked in its equations. */
export function defineUnitKind<
  const N extends string,
  const P extends PortTable,
  const Q extends QuantityTable,
>(kind: UnitKind<N, P, Q>): UnitKind<N, P, Q> {
  return kind
}
