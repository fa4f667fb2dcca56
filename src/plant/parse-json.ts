export type JsonValue =
  | null
  | boolean
  | number
  | string
  | JsonValue[]
  | { [key: string]: JsonValue }

export type ParsedJson =
  | { readonly outcome: 'value'; readonly value: JsonValue }
  | {
      readonly outcome: 'broken'
      /** Both from 1; the column in UTF-16 units. */
      readonly line: number
      readonly column: number
      readonly message: string
    }

class Broken extends Error {
  readonly at: number

  constructor(at: number, message: string) {
    super(message)
    this.at = at
  }
}

/**
 * Reads JSON (RFC 8259) and says where it breaks and why, the same in every browser; a key that
 * stands twice in one object is refused, for one of its values would be lost.
 */
export function parseJson(text: string): ParsedJson {
  const reader = new Reader(text)
  try {
    return { outcome: 'value', value: reader.whole() }
  } catch (fault) {
    if (!(fault instanceof Broken)) throw fault
    const before = text.slice(0, fault.at)
    const lineStart = before.lastIndexOf('\n') + 1
    return {
      outcome: 'broken',
      line: before.split('\n').length,
      column: fault.at - lineStart + 1,
      message: fault.message,
    }
  }
}

const space = /[ \t\n\r]*/y
const numberToken = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y
/** Anything up to a quote, a backslash or a control character. */
// biome-ignore lint/suspicious/noControlCharactersInRegex: these are what JSON forbids in a text.
const plainCharacters = /[^"\\\u0000-\u001f]*/y
const word = /[A-Za-z_$][\w$]*/y
const fourHexadecimals = /^[0-9a-fA-F]{4}$/

const escapes: Readonly<Record<string, string>> = {
  '"': '"',
  '\\': '\\',
  '/': '/',
  b: '\b',
  f: '\f',
  n: '\n',
  r: '\r',
  t: '\t',
}

/** A plant file is some eight levels deep; this keeps a hostile one from exhausting the stack. */
const deepest = 100

class Reader {
  private at = 0
  private readonly text: string

  constructor(text: string) {
    this.text = text
  }

  whole(): JsonValue {
    // A byte order mark is what some editors put first.
    if (this.text.startsWith('\ufeff')) this.at = 1
    this.skip()
    if (this.at >= this.text.length) throw this.broken('the file is empty')
    const value = this.value(0)
    this.skip()
    if (this.at < this.text.length)
      throw this.broken('the plant ends before this: something follows it')
    return value
  }

  private broken(message: string, at = this.at): Broken {
    return new Broken(at, message)
  }

  private match(pattern: RegExp): string {
    pattern.lastIndex = this.at
    const found = pattern.exec(this.text)?.[0] ?? ''
    this.at += found.length
    return found
  }

  private skip(): void {
    this.match(space)
  }

  private value(depth: number): JsonValue {
    if (depth > deepest) throw this.broken(`nested more than ${deepest} levels deep`)
    const next = this.text[this.at]
    if (next === '{') return this.object(depth)
    if (next === '[') return this.array(depth)
    if (next === '"') return this.string()
    const start = this.at
    const number = this.match(numberToken)
    if (number !== '') {
      if (/[\w.]/.test(this.text[this.at] ?? ''))
        throw this.broken('this number is malformed', start)
      // Minus zero is zero: nothing about a plant depends on its sign.
      return Number(number) || 0
    }
    const name = this.match(word)
    if (name === 'true') return true
    if (name === 'false') return false
    if (name === 'null') return null
    throw this.broken(this.noValue(name, next), start)
  }

  private noValue(name: string, next: string | undefined): string {
    if (name !== '') return `${name} is not a value in JSON`
    if (next === undefined) return 'the file ends where a value should stand'
    if (next === "'") return 'text stands between double quotes, not single ones'
    if (next === '/') return 'comments are not allowed'
    if (next === ',') return 'there is a comma too many'
    if (next === '}' || next === ']') return `a value is missing before ${next}`
    return `a value should stand here, not ${JSON.stringify(next)}`
  }

  private object(depth: number): JsonValue {
    const start = this.at++
    const object: { [key: string]: JsonValue } = {}
    this.skip()
    if (this.text[this.at] === '}') {
      this.at++
      return object
    }
    for (;;) {
      const keyAt = this.at
      if (this.text[this.at] !== '"') throw this.broken(this.noKey())
      const key = this.string()
      if (Object.hasOwn(object, key)) {
        throw this.broken(`the key ${JSON.stringify(key)} stands twice in the same object`, keyAt)
      }
      this.skip()
      if (this.text[this.at] !== ':') {
        throw this.broken(`a colon is missing after ${JSON.stringify(key)}`)
      }
      this.at++
      this.skip()
      const value = this.value(depth + 1)
      // Defined, not assigned: a key named __proto__ is a key like any other.
      Object.defineProperty(object, key, {
        value,
        writable: true,
        enumerable: true,
        configurable: true,
      })
      if (this.closes('}', start, 'object')) return object
    }
  }

  private array(depth: number): JsonValue {
    const start = this.at++
    const array: JsonValue[] = []
    this.skip()
    if (this.text[this.at] === ']') {
      this.at++
      return array
    }
    for (;;) {
      array.push(this.value(depth + 1))
      if (this.closes(']', start, 'list')) return array
    }
  }

  /** After a member: true at the closing bracket, false after a comma. */
  private closes(bracket: '}' | ']', start: number, what: string): boolean {
    this.skip()
    const next = this.text[this.at]
    if (next === bracket) {
      this.at++
      return true
    }
    if (next === undefined) {
      const line = this.text.slice(0, start).split('\n').length
      throw this.broken(`the file ends inside the ${what} that starts in line ${line}`)
    }
    if (next !== ',') throw this.broken(`a comma or ${bracket} is missing before this`)
    const comma = this.at++
    this.skip()
    if (this.text[this.at] === bracket) {
      throw this.broken(`the comma before ${bracket} is one too many`, comma)
    }
    return false
  }

  private noKey(): string {
    const next = this.text[this.at]
    if (next === undefined) return 'the file ends inside an object'
    if (next === "'") return 'keys stand between double quotes, not single ones'
    if (next === ',') return 'there is a comma too many'
    return 'a key between double quotes should stand here'
  }

  private string(): string {
    const start = this.at++
    let result = ''
    for (;;) {
      result += this.match(plainCharacters)
      const next = this.text[this.at]
      if (next === '"') {
        this.at++
        return result
      }
      if (next === undefined || next === '\n' || next === '\r') {
        throw this.broken('the closing quote of this text is missing', start)
      }
      if (next !== '\\') throw this.broken('a control character stands inside a text')
      result += this.escape()
    }
  }

  private escape(): string {
    const letter = this.text[this.at + 1] ?? ''
    const simple = Object.hasOwn(escapes, letter) ? escapes[letter] : undefined
    if (simple !== undefined) {
      this.at += 2
      return simple
    }
    const code = this.text.slice(this.at + 2, this.at + 6)
    if (letter !== 'u' || !fourHexadecimals.test(code)) {
      throw this.broken(`\\${letter} is not an escape that JSON knows`)
    }
    this.at += 6
    return String.fromCharCode(Number.parseInt(code, 16))
  }
}
