import {
  apply,
  type Expression,
  type Operation,
  Outcome,
  type Printed,
  type Rows,
} from '../equations/expression/index.ts'
import { expressionOutcome } from './expression-outcome.ts'
import {
  enthalpyAtPressureDryness,
  enthalpyAtPressureEntropy,
  enthalpyAtPressureSubcooling,
  enthalpyAtPressureSuperheat,
  enthalpyAtPressureTemperature,
  enthalpyAtPressureVolume,
  SATURATION_SIZE,
  Saturation,
  STATE_SIZE,
  State,
  Outcome as SteamOutcome,
  saturationAtPressure,
  saturationPressure,
  stateAtPressureEnthalpy,
} from './index.ts'
import { wetPartOperation } from './wet-part.ts'

/*
 * Steam as operations of expressions. A steam relation is one equation with several explicit forms:
 * T(p, h) solved for h is h(p, T), and so on; the variable that the equation is matched to chooses.
 */

const called =
  (name: string) =>
  (operands: readonly Printed[]): Printed => ({
    text: `${name}(${operands.map((operand) => operand.text).join(', ')})`,
    strength: 4,
  })

/** The whole state at (p, h), kept in working memory; others read from it. */
const stateOperation: Operation = {
  name: 'state',
  memory: STATE_SIZE,
  evaluate(tape, row) {
    const k = tape.first[row]!
    const at = tape.memoryAt[row]!
    const p = tape.values[tape.operands[k]!]!
    const h = tape.values[tape.operands[k + 1]!]!
    // The same state as before needs no work: rows are shared among the steps that need them.
    if (tape.memory[at + State.p] === p && tape.memory[at + State.h] === h) return Outcome.fine
    return expressionOutcome(stateAtPressureEnthalpy(tape.memory, at, p, h))
  },
  print: called('state'),
}

/** A quantity of the state at (p, h), read with its partials from the shared record. */
function stateQuantity(
  name: string,
  value: number,
  byPressure: number,
  byEnthalpy: number,
  invert: Operation['invert'],
): Operation {
  return {
    name,
    reads: stateOperation,
    evaluate(tape, row) {
      const k = tape.first[row]!
      const at = tape.memoryAt[row]!
      tape.values[tape.slotOf(row)] = tape.memory[at + value]!
      tape.partials[k] = tape.memory[at + byPressure]!
      tape.partials[k + 1] = tape.memory[at + byEnthalpy]!
      return Outcome.fine
    },
    invert,
    print: called(name),
  }
}

const byEnthalpy =
  (form: () => Operation): Operation['invert'] =>
  (target, [p], index) =>
    index === 1 ? apply(form(), p!, target) : undefined

const temperatureOperation = stateQuantity(
  'T',
  State.T,
  State.Tp,
  State.Th,
  byEnthalpy(() => enthalpyFromTemperature),
)
const entropyOperation = stateQuantity(
  's',
  State.s,
  State.sp,
  State.sh,
  byEnthalpy(() => enthalpyFromEntropy),
)
const volumeOperation = stateQuantity(
  'v',
  State.v,
  State.vp,
  State.vh,
  byEnthalpy(() => enthalpyFromVolume),
)

/** Dryness; without meaning from the critical pressure up, where it is refused as out of range. */
const drynessOperation: Operation = {
  name: 'x',
  reads: stateOperation,
  evaluate(tape, row) {
    const k = tape.first[row]!
    const at = tape.memoryAt[row]!
    if (tape.memory[at + State.subcritical] !== 1) return Outcome.outsideRange
    tape.values[tape.slotOf(row)] = tape.memory[at + State.x]!
    tape.partials[k] = tape.memory[at + State.xp]!
    tape.partials[k + 1] = tape.memory[at + State.xh]!
    return Outcome.fine
  },
  invert: byEnthalpy(() => enthalpyFromDryness),
  print: called('x'),
}

/** Moisture of the state at (p, h): 1 - x where it is wet, 0 where it is dry, 1 at most. */
const moistureOperation: Operation = {
  name: 'moisture',
  vanishes: true,
  reads: stateOperation,
  evaluate(tape, row) {
    const k = tape.first[row]!
    const at = tape.memoryAt[row]!
    const x = tape.memory[at + State.x]!
    const wet = tape.memory[at + State.subcritical] === 1 && x < 1 && x > 0
    const liquid = tape.memory[at + State.subcritical] === 1 && x <= 0
    tape.values[tape.slotOf(row)] = wet ? 1 - x : liquid ? 1 : 0
    tape.partials[k] = wet ? -tape.memory[at + State.xp]! : 0
    tape.partials[k + 1] = wet ? -tape.memory[at + State.xh]! : 0
    return Outcome.fine
  },
  print: called('moisture'),
}

/** The saturation record at p, kept in working memory. */
const saturationOperation: Operation = {
  name: 'saturation',
  memory: SATURATION_SIZE,
  evaluate(tape, row) {
    const p = tape.values[tape.operands[tape.first[row]!]!]!
    return expressionOutcome(saturationAtPressure(tape.memory, tape.memoryAt[row]!, p))
  },
  print: called('saturation'),
}

function saturationQuantity(
  name: string,
  value: number,
  slope: number,
  invert?: Operation['invert'],
  isGentle = false,
): Operation {
  return {
    name,
    reads: saturationOperation,
    evaluate(tape, row) {
      const at = tape.memoryAt[row]!
      tape.values[tape.slotOf(row)] = tape.memory[at + value]!
      tape.partials[tape.first[row]!] = tape.memory[at + slope]!
      return Outcome.fine
    },
    ...(invert && { invert }),
    ...(isGentle && { gentle: true }),
    print: called(name),
  }
}

const saturationTemperatureOperation = saturationQuantity(
  'Tsat',
  Saturation.T,
  Saturation.Tp,
  (target) => apply(saturationPressureOperation, target),
)
const liquidEnthalpyOperation = saturationQuantity(
  "h'",
  Saturation.hL,
  Saturation.hLp,
  undefined,
  true,
)
const vapourEnthalpyOperation = saturationQuantity(
  "h''",
  Saturation.hV,
  Saturation.hVp,
  undefined,
  true,
)

/** T(p, h) - Tsat(p); given as 0 it means dry saturated steam. */
const superheatOperation = differenceToSaturation('superheat', 1, () => enthalpyFromSuperheat)
/** Tsat(p) - T(p, h); given as 0 it means saturated liquid. */
const subcoolingOperation = differenceToSaturation('subcooling', -1, () => enthalpyFromSubcooling)

function differenceToSaturation(name: string, sign: 1 | -1, form: () => Operation): Operation {
  return {
    name,
    memory: SATURATION_SIZE + STATE_SIZE,
    evaluate(tape, row) {
      const k = tape.first[row]!
      const at = tape.memoryAt[row]!
      const p = tape.values[tape.operands[k]!]!
      const h = tape.values[tape.operands[k + 1]!]!
      const saturated = saturationAtPressure(tape.memory, at, p)
      if (saturated !== SteamOutcome.fine) return Outcome.outsideRange
      const state = at + SATURATION_SIZE
      const outcome = stateAtPressureEnthalpy(tape.memory, state, p, h)
      if (outcome !== SteamOutcome.fine) return expressionOutcome(outcome)
      tape.values[tape.slotOf(row)] =
        sign * (tape.memory[state + State.T]! - tape.memory[at + Saturation.T]!)
      tape.partials[k] = sign * (tape.memory[state + State.Tp]! - tape.memory[at + Saturation.Tp]!)
      tape.partials[k + 1] = sign * tape.memory[state + State.Th]!
      return Outcome.fine
    },
    invert: byEnthalpy(form),
    solveFor: 1,
    print: called(name),
  }
}

type TwoOperandForm = (out: Float64Array, at: number, a: number, b: number) => number
type OneOperandForm = (out: Float64Array, at: number, a: number) => number

/** Values, two partials and a warm start. */
const formSize = 4

function form2(
  name: string,
  compute: TwoOperandForm,
  invert: Operation['invert'],
  isGentle = false,
): Operation {
  return {
    name,
    memory: formSize + 2,
    evaluate(tape: Rows, row: number) {
      const k = tape.first[row]!
      const at = tape.memoryAt[row]!
      const { memory } = tape
      const a = tape.values[tape.operands[k]!]!
      const b = tape.values[tape.operands[k + 1]!]!
      if (memory[at + formSize] !== a || memory[at + formSize + 1] !== b) {
        const outcome = compute(memory, at, a, b)
        if (outcome !== SteamOutcome.fine) return expressionOutcome(outcome)
        memory[at + formSize] = a
        memory[at + formSize + 1] = b
      }
      tape.values[tape.slotOf(row)] = memory[at]!
      tape.partials[k] = memory[at + 1]!
      tape.partials[k + 1] = memory[at + 2]!
      return Outcome.fine
    },
    invert,
    ...(isGentle && { gentle: true }),
    print: called(name),
  }
}

function form1(name: string, compute: OneOperandForm, invert?: Operation['invert']): Operation {
  return {
    name,
    memory: formSize,
    evaluate(tape: Rows, row: number) {
      const k = tape.first[row]!
      const at = tape.memoryAt[row]!
      const outcome = compute(tape.memory, at, tape.values[tape.operands[k]!]!)
      if (outcome !== SteamOutcome.fine) return expressionOutcome(outcome)
      tape.values[tape.slotOf(row)] = tape.memory[at]!
      tape.partials[k] = tape.memory[at + 1]!
      return Outcome.fine
    },
    ...(invert && { invert }),
    print: called(name),
  }
}

const back =
  (operation: () => Operation): Operation['invert'] =>
  (target, [p], index) =>
    index === 1 ? apply(operation(), p!, target) : undefined

const enthalpyFromTemperature = form2(
  'h',
  enthalpyAtPressureTemperature,
  back(() => temperatureOperation),
)
const enthalpyFromEntropy = form2(
  'h',
  enthalpyAtPressureEntropy,
  back(() => entropyOperation),
)
const enthalpyFromDryness = form2(
  'h',
  enthalpyAtPressureDryness,
  back(() => drynessOperation),
)
const enthalpyFromVolume = form2(
  'h',
  enthalpyAtPressureVolume,
  back(() => volumeOperation),
)
/** A superheat below zero is a subcooling, and the other way round. */
const eitherSide =
  (own: TwoOperandForm, other: TwoOperandForm): TwoOperandForm =>
  (out, at, p, difference) => {
    if (difference >= 0) return own(out, at, p, difference)
    const outcome = other(out, at, p, -difference)
    if (outcome === SteamOutcome.fine) out[at + 2] = -out[at + 2]!
    return outcome
  }

const enthalpyFromSuperheat = form2(
  'h',
  eitherSide(enthalpyAtPressureSuperheat, enthalpyAtPressureSubcooling),
  back(() => superheatOperation),
  true,
)
const enthalpyFromSubcooling = form2(
  'h',
  eitherSide(enthalpyAtPressureSubcooling, enthalpyAtPressureSuperheat),
  back(() => subcoolingOperation),
  true,
)
const saturationPressureOperation = form1('psat', saturationPressure, (target) =>
  apply(saturationTemperatureOperation, target),
)

/** Temperature, K, of the state at p (Pa) and h (J/kg). */
export const temperature = (p: Expression, h: Expression): Expression =>
  apply(temperatureOperation, p, h)
/** Entropy, J/(kg K), of the state at p (Pa) and h (J/kg). */
export const entropy = (p: Expression, h: Expression): Expression => apply(entropyOperation, p, h)
/** Volume, m3/kg, of the state at p (Pa) and h (J/kg). */
export const volume = (p: Expression, h: Expression): Expression => apply(volumeOperation, p, h)
/** Dryness fraction, (h - h')/(h'' - h'), not clamped, below the critical pressure. */
export const dryness = (p: Expression, h: Expression): Expression => apply(drynessOperation, p, h)
/** Moisture, 1 - x where wet, else 0. */
export const moisture = (p: Expression, h: Expression): Expression => apply(moistureOperation, p, h)
/** Superheat, K, T - Tsat(p). */
export const superheat = (p: Expression, h: Expression): Expression =>
  apply(superheatOperation, p, h)
/** Subcooling, K, Tsat(p) - T. */
export const subcooling = (p: Expression, h: Expression): Expression =>
  apply(subcoolingOperation, p, h)
/** Saturation temperature, K, at p (Pa). */
export const saturationTemperature = (p: Expression): Expression =>
  apply(saturationTemperatureOperation, p)
/** Enthalpy of saturated liquid, J/kg, at p (Pa). */
export const liquidEnthalpy = (p: Expression): Expression => apply(liquidEnthalpyOperation, p)
/** Enthalpy of dry saturated steam, J/kg, at p (Pa). */
export const vapourEnthalpy = (p: Expression): Expression => apply(vapourEnthalpyOperation, p)
/** Enthalpy, J/kg, at p (Pa) and T (K); refused where T is the saturation temperature. */
export const enthalpyAtTemperature = (p: Expression, T: Expression): Expression =>
  apply(enthalpyFromTemperature, p, T)
/** Enthalpy, J/kg, at p (Pa) after an isentropic change to it from entropy s (J/(kg K)). */
export const enthalpyAtEntropy = (p: Expression, s: Expression): Expression =>
  apply(enthalpyFromEntropy, p, s)
/** Enthalpy, J/kg, of the liquid subcooled by a difference (K) at p (Pa); 0 is saturated liquid. */
export const enthalpyAtSubcooling = (p: Expression, difference: Expression): Expression =>
  apply(enthalpyFromSubcooling, p, difference)
/** Enthalpy, J/kg, of steam superheated by a difference (K) at p (Pa); 0 is dry saturated steam. */
export const enthalpyAtSuperheat = (p: Expression, difference: Expression): Expression =>
  apply(enthalpyFromSuperheat, p, difference)
/** Saturation pressure, Pa, at T (K). */
export const saturationPressureAt = (T: Expression): Expression =>
  apply(saturationPressureOperation, T)
/**
 * Share of the isentropic drop from (p, h) with entropy s to the enthalpy `end` that lies below
 * saturation.
 */
export const wetPart = (p: Expression, h: Expression, s: Expression, end: Expression): Expression =>
  apply(wetPartOperation, moisture(p, h), h, s, end)
