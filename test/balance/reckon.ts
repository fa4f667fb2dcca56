import type { Piece } from '../../src/balance/answer.ts'
import type { Dimension } from '../../src/quantity/dimension.ts'
import {
  allUnitsOf,
  dimensions,
  fromShown,
  toShown,
  type UnitOfMeasure,
  unitNamed,
} from '../../src/quantity/units-of-measure.ts'
import {
  drySaturatedEnthalpyAtEntropy,
  Outcome,
  RESULT_SIZE,
  type StatePair,
  type SteamState,
  state,
} from '../../src/steam/index.ts'

/*
 * Reckons a printed line as a reader would: with the numbers that stand there, in the units that stand
 * there, per cent read as hundredths; properties of steam looked up. It knows nothing of the plant.
 */

/** The printed text of pieces; symbols are not to stand in it. */
export function printed(pieces: readonly Piece[]): string {
  return pieces
    .map((piece) => {
      if (typeof piece === 'string') return piece
      if (!('figure' in piece)) throw new Error(`a symbol stands in a line of figures`)
      return piece.unit === '' ? piece.figure : `${piece.figure} ${piece.unit}`
    })
    .join('')
}

const unitNames = [
  ...new Set(dimensions.flatMap((dimension) => allUnitsOf(dimension).map(({ name }) => name))),
]
  .filter((name) => name !== '')
  .sort((one, other) => other.length - one.length)

export interface Reckoned {
  /** In the units printed. */
  readonly value: number
  /** The sum of the sizes of its terms: what rounding is measured by. */
  readonly size: number
}

/** Reckons one side of a line; properties of steam come in `resultUnit`. */
export function reckon(text: string, resultUnit: string): Reckoned {
  return new Reader(text, resultUnit).whole()
}

class Reader {
  private readonly text: string
  private readonly resultUnit: string
  private at = 0

  constructor(text: string, resultUnit: string) {
    this.text = text
    this.resultUnit = resultUnit
  }

  whole(): Reckoned {
    const value = this.sum()
    if (this.at !== this.text.length) throw new Error(`cannot read ${this.text.slice(this.at)}`)
    return value
  }

  private take(sign: string): boolean {
    if (!this.text.startsWith(sign, this.at)) return false
    this.at += sign.length
    return true
  }

  private sum(): Reckoned {
    const isNegative = /^−(?!\d)/.test(this.text.slice(this.at)) && this.take('−')
    let { value, size } = this.product()
    if (isNegative) value = -value
    for (;;) {
      const sign = this.take(' + ') ? 1 : this.take(' − ') ? -1 : 0
      if (sign === 0) return { value, size }
      const term = this.product()
      value += sign * term.value
      size += term.size
    }
  }

  private product(): Reckoned {
    let { value, size } = this.power()
    for (;;) {
      if (this.take(' × ')) {
        const factor = this.power()
        value *= factor.value
        size *= factor.size
      } else if (this.take(' / ')) {
        const divisor = this.power().value
        value /= divisor
        size /= Math.abs(divisor)
      } else return { value, size }
    }
  }

  private power(): Reckoned {
    const base = this.atom()
    if (this.take('²')) return { value: base.value ** 2, size: base.size ** 2 }
    if (!this.take('^')) return base
    const value = base.value ** this.atom().value
    return { value, size: Math.abs(value) }
  }

  private atom(): Reckoned {
    if (this.take('(')) {
      const inner = this.sum()
      if (!this.take(')')) throw new Error(`a bracket is not closed in ${this.text}`)
      this.unit()
      return inner
    }
    const call = /^(√|ln|exp|wet part|[A-Za-z]+[′″]?)\(/.exec(this.text.slice(this.at))
    if (call) {
      this.at += call[0].length
      return this.call(call[1] as string)
    }
    return this.number()
  }

  private number(): Reckoned {
    const rest = this.text.slice(this.at)
    const [digits = ''] = /^−?\d[\d\u202f]*(?:\.\d+)?(?: × 10[⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+)?/.exec(rest) ?? []
    if (digits === '') throw new Error(`a number is wanted at ${rest}`)
    this.at += digits.length
    const [mantissa = '', power] = digits.split(' × 10')
    const exponent = (power ?? '⁰')
      .replace('⁻', '-')
      .replace(/[⁰¹²³⁴⁵⁶⁷⁸⁹]/g, (one) => String('⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(one)))
    const number =
      Number(mantissa.replace('−', '-').replace(/\u202f/g, '')) * 10 ** Number(exponent)
    const value = this.unit() === '%' ? number / 100 : number
    return { value, size: Math.abs(value) }
  }

  /** The unit that stands here, if any. */
  private unit(): string | undefined {
    const name = unitNames.find((one) => {
      const next = this.text[this.at + one.length + 1]
      return (
        this.text.startsWith(` ${one}`, this.at) && (next === undefined || /[ ),²^]/.test(next))
      )
    })
    if (name !== undefined) this.at += name.length + 1
    return name
  }

  private call(name: string): Reckoned {
    if (name === '√' || name === 'ln' || name === 'exp') {
      const { value: inner } = this.sum()
      this.take(')')
      const value = { '√': Math.sqrt, ln: Math.log, exp: Math.exp }[name](inner)
      return { value, size: Math.abs(value) }
    }
    const operands: Operand[] = []
    do {
      const named = /^(x|superheat|subcooling) = /.exec(this.text.slice(this.at))
      if (named) this.at += named[0].length
      const start = this.at
      const { value } = this.sum()
      operands.push({ value, text: this.text.slice(start, this.at), named: named?.[1] })
    } while (this.take(', '))
    if (!this.take(')')) throw new Error(`a bracket is not closed in ${this.text}`)
    const value = this.lookUp(name, operands)
    return { value, size: Math.abs(value) }
  }

  private lookUp(name: string, operands: readonly Operand[]): number {
    const [first, second, third, fourth] = operands as [Operand, Operand, Operand, Operand]
    const shown = (value: number, dimension: Dimension): number =>
      toShown(value, unitNamed(dimension, this.resultUnit) ?? unitIn('', dimension))
    const p = () => si(first, 'pressure')
    const state = () => steam({ p: p(), h: si(second, 'specificEnthalpy') })
    const saturated = (x: 0 | 1) => steam({ p: p(), x })
    const dryness = () => (state().h - saturated(0).h) / (saturated(1).h - saturated(0).h)
    switch (name) {
      case 'T':
        return shown(state().T, 'temperature')
      case 's':
        return shown(state().s, 'specificEntropy')
      case 'v':
        return shown(state().v, 'specificVolume')
      case 'x':
        return dryness()
      case 'moisture':
        return state().phase === 'supercritical' ? 0 : Math.min(1, Math.max(0, 1 - dryness()))
      case 'superheat':
        return shown(state().T - saturated(1).T, 'temperatureDifference')
      case 'subcooling':
        return shown(saturated(0).T - state().T, 'temperatureDifference')
      case 'Tsat':
        return shown(saturated(0).T, 'temperature')
      case 'psat':
        return shown(steam({ T: si(first, 'temperature'), x: 0 }).p, 'pressure')
      case 'h′':
        return shown(saturated(0).h, 'specificEnthalpy')
      case 'h″':
        return shown(saturated(1).h, 'specificEnthalpy')
      case 'h':
        return shown(enthalpy(p(), second), 'specificEnthalpy')
      case 'wet part': {
        if (first.value > 0) return 1
        const end = si(fourth, 'specificEnthalpy')
        const start = si(second, 'specificEnthalpy')
        const dry = dryAtEntropy(si(third, 'specificEntropy'))
        return Math.min(1, Math.max(0, (dry - end) / (start - end)))
      }
      case 'LMTD': {
        const [a, b] = [first.value, second.value]
        return Math.abs(a - b) < 1e-9 * a ? a : (a - b) / Math.log(a / b)
      }
      default:
        throw new Error(`${name} is no property of steam`)
    }
  }
}

interface Operand {
  /** In the units printed. */
  readonly value: number
  readonly text: string
  readonly named: string | undefined
}

function si({ value, text }: Operand, dimension: Dimension): number {
  return fromShown(value, unitIn(text, dimension))
}

function steam(pair: StatePair): SteamState {
  const found = state(pair)
  if (found.outcome !== 'state') throw new Error(`no state of ${JSON.stringify(pair)}`)
  return found
}

/** The second operand of h(p, ...) by its name or its unit. */
function enthalpy(p: number, operand: Operand): number {
  const { named, value } = operand
  if (named === 'x') {
    const [liquid, dry] = [steam({ p, x: 0 }).h, steam({ p, x: 1 }).h]
    return liquid + value * (dry - liquid)
  }
  if (named !== undefined) {
    const difference = si(operand, 'temperatureDifference')
    const { T, h } = steam({ p, x: named === 'superheat' ? 1 : 0 })
    return difference === 0
      ? h
      : steam({ p, T: named === 'superheat' ? T + difference : T - difference }).h
  }
  for (const [key, dimension] of seconds) {
    if (namedUnits(operand.text, dimension).length > 0) {
      return steam({ p, [key]: si(operand, dimension) } as unknown as StatePair).h
    }
  }
  throw new Error(`h of pressure and ${operand.text}`)
}

const seconds = [
  ['s', 'specificEntropy'],
  ['v', 'specificVolume'],
  ['T', 'temperature'],
] as const

/** Enthalpy of dry saturated steam of an entropy, J/kg; where there is none, more than any. */
function dryAtEntropy(s: number): number {
  const out = new Float64Array(RESULT_SIZE)
  const outcome = drySaturatedEnthalpyAtEntropy(out, 0, s)
  return outcome === Outcome.fine ? (out[0] as number) : Number.NEGATIVE_INFINITY
}

function namedUnits(text: string, dimension: Dimension): readonly UnitOfMeasure[] {
  return allUnitsOf(dimension).filter(
    ({ name }) => name !== '' && new RegExp(`(^|[\\s(])${escaped(name)}($|[\\s),])`).test(text),
  )
}

/** The unit that a dimension's numbers have in a text. */
function unitIn(text: string, dimension: Dimension): UnitOfMeasure {
  return namedUnits(text, dimension)[0] ?? (allUnitsOf(dimension)[0] as UnitOfMeasure)
}

function escaped(text: string): string {
  return text.replace(/[.*+?^${}()|[\]\\/]/g, '\\$&')
}
