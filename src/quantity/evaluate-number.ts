export type EvaluatedNumber =
  /** `rest` is what follows the number, trimmed: its unit, if anything. */
  | { readonly outcome: 'value'; readonly value: number; readonly rest: string }
  | { readonly outcome: 'unreadable'; readonly message: string }

/** A number: digits in groups of three may be parted by spaces; one point; a power of ten. */
const numberAtStart = /^(?:\d{1,3}(?:[ \u00a0\u2009\u202f]\d{3})+(?!\d)|\d+)?(?:\.\d*)?/
const exponentAtStart = /^e[+-]?\d+/i
const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹'

class Unreadable extends Error {}

/** Reads a number, or a sum, product or quotient of numbers, at the start of a text. */
export function evaluateNumber(text: string): EvaluatedNumber {
  const reader = new Reader(plain(text))
  try {
    const value = reader.sum(0)
    const rest = reader.rest()
    if (!Number.isFinite(value)) throw new Unreadable('This does not come to a finite number.')
    if (/^,|^\.|^\)/.test(rest)) throw new Unreadable(misplaced(text, rest))
    return { outcome: 'value', value, rest }
  } catch (fault) {
    if (fault instanceof Unreadable) return { outcome: 'unreadable', message: fault.message }
    throw fault
  }
}

function misplaced(text: string, rest: string): string {
  return rest.startsWith(',')
    ? `${text.trim()} is written with a comma: here the decimal sign is a point, and thousands are not parted by commas.`
    : `${text.trim()} is not a number: there is a ${rest.charAt(0)} too many.`
}

/** With the signs of a keyboard: true minus, times sign, and powers of ten as e. */
function plain(text: string): string {
  return text
    .trim()
    .replace(/10([⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺]+)/g, (_, power: string) => `10^${lowered(power)}`)
    .replace(/^[−–](?=[\d.(])/, '-')
    .replace(/−/g, '-')
    .replace(/÷/g, '/')
    .replace(/\s*[×*·⋅]\s*10\^([+-]?\d+)/g, 'e$1')
    .replace(/×/g, '*')
}

/** Superscripts to ordinary figures. */
function lowered(power: string): string {
  return power
    .replace(/⁻/g, '-')
    .replace(/⁺/g, '+')
    .replace(/[^-+]/g, (digit) => String(superscripts.indexOf(digit)))
}

/** Recursion ends here: nobody types brackets this deep. */
const deepest = 50

class Reader {
  private at = 0
  private readonly text: string

  constructor(text: string) {
    this.text = text
  }

  rest(): string {
    return this.text.slice(this.at).trim()
  }

  sum(depth: number): number {
    let value = this.product(depth)
    for (;;) {
      const sign = this.operator('+-')
      if (sign === undefined) return value
      const other = this.product(depth)
      value = sign === '+' ? value + other : value - other
    }
  }

  private product(depth: number): number {
    let value = this.factor(depth)
    for (;;) {
      const sign = this.operator('*/')
      if (sign === undefined) return value
      const other = this.factor(depth)
      if (sign === '/' && other === 0) throw new Unreadable('This divides by zero.')
      value = sign === '*' ? value * other : value / other
    }
  }

  private factor(depth: number): number {
    this.skipSpaces()
    const next = this.text[this.at]
    if (next === undefined)
      throw new Unreadable(this.text === '' ? 'Nothing is written.' : 'The number ends too early.')
    if (depth > deepest) throw new Unreadable('This is nested too deep.')
    if (next === '-' || next === '+') {
      this.at++
      const value = this.factor(depth + 1)
      return next === '-' ? -value : value
    }
    if (next === '(') {
      this.at++
      const value = this.sum(depth + 1)
      this.skipSpaces()
      if (this.text[this.at] !== ')') throw new Unreadable('A closing bracket is missing.')
      this.at++
      return value
    }
    return this.number()
  }

  private number(): number {
    const rest = this.text.slice(this.at)
    const [digits = ''] = numberAtStart.exec(rest) ?? []
    if (!/\d/.test(digits)) throw new Unreadable(`${this.text} is not a number.`)
    // An e followed by digits is a power of ten; any other letter starts the unit.
    const [exponent = ''] = exponentAtStart.exec(rest.slice(digits.length)) ?? []
    this.at += digits.length + exponent.length
    return Number(digits.replace(/\s/g, '') + exponent)
  }

  /** The operator that comes next, where a number follows it: the stroke of a unit is none. */
  private operator(among: string): string | undefined {
    const match = /^\s*([-+*/])\s*(?=[\d.(+-])/.exec(this.text.slice(this.at))
    const [whole = '', sign = ''] = match ?? []
    if (sign === '' || !among.includes(sign)) return undefined
    this.at += whole.length
    return sign
  }

  private skipSpaces(): void {
    while (/\s/.test(this.text[this.at] ?? '')) this.at++
  }
}
