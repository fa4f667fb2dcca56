import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { parseJson } from '../../src/plant/parse-json.ts'

/** RFC 8259 decides what is JSON; the platform's own reader stands for it here. */
function platform(text: string): { value: unknown } | null {
  try {
    return { value: JSON.parse(text) }
  } catch {
    return null
  }
}

function place(text: string): string {
  const result = parseJson(text)
  if (result.outcome === 'value') throw new Error(`${text} was read`)
  return `${result.line}:${result.column} ${result.message}`
}

describe('broken text is placed', () => {
  test.each([
    ['', '1:1 the file is empty'],
    ['  \n ', '2:2 the file is empty'],
    ['{', '1:2 the file ends inside an object'],
    ['{\n  "a": [1,\n  2', '3:4 the file ends inside the list that starts in line 2'],
    ['{\n  "a": 1\n  "b": 2\n}', '3:3 a comma or } is missing before this'],
    ['{\n  "a": 1,\n}', '2:9 the comma before } is one too many'],
    ['[1, 2,]', '1:6 the comma before ] is one too many'],
    ['{"a" 1}', '1:6 a colon is missing after "a"'],
    ["{'a': 1}", '1:2 keys stand between double quotes, not single ones'],
    ['{a: 1}', '1:2 a key between double quotes should stand here'],
    ['{"a": NaN}', '1:7 NaN is not a value in JSON'],
    ['{"a": .5}', '1:7 a value should stand here, not "."'],
    ['[01]', '1:2 this number is malformed'],
    ['[1.]', '1:2 this number is malformed'],
    ['[1e]', '1:2 this number is malformed'],
    ['// plant\n{}', '1:1 comments are not allowed'],
    ['{} {}', '1:4 the plant ends before this: something follows it'],
    ['{"a": "b\nc"}', '1:7 the closing quote of this text is missing'],
    ['["\\x"]', '1:3 \\x is not an escape that JSON knows'],
    ['["a\tb"]', '1:4 a control character stands inside a text'],
    ['{\n "a": 1,\n "b": 2,\n "a": 3\n}', '4:2 the key "a" stands twice in the same object'],
  ])('%j', (text, expected) => {
    expect(place(text)).toBe(expected)
  })

  test('nesting that would exhaust the stack is refused', () => {
    expect(place('['.repeat(100_000))).toContain('nested more than 100 levels')
    expect(place('{"a":'.repeat(100_000))).toContain('nested more than 100 levels')
  })
})

describe('what is JSON is read as such', () => {
  test('any value comes back', { timeout: 60_000 }, () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 4 }), fc.nat(4), (value, indent) => {
        const text = JSON.stringify(value, null, indent)
        expect(parseJson(text)).toEqual({
          outcome: 'value',
          value: JSON.parse(text.replace(/-0(?![\d.])/g, '0')),
        })
      }),
    )
  })

  test('a byte order mark is passed over', () => {
    expect(parseJson('\ufeff{"a": 1}')).toEqual({ outcome: 'value', value: { a: 1 } })
  })

  test('keys named like parts of every object are keys like any other', () => {
    const result = parseJson('{"__proto__": {"a": 1}, "constructor": 2}')
    expect(result.outcome === 'value' && Object.keys(result.value as object)).toEqual([
      '__proto__',
      'constructor',
    ])
    expect(({} as { a?: number }).a).toBeUndefined()
  })

  test('accepts just what the platform accepts, twins apart', { timeout: 60_000 }, () => {
    const pieces = fc.constantFrom(
      '{',
      '}',
      '[',
      ']',
      ',',
      ':',
      '"a"',
      '"b"',
      '1',
      '-0.5e3',
      '0',
      '-',
      '.',
      'e',
      'true',
      'null',
      'nul',
      ' ',
      '\n',
      '"',
      '\\n',
      '\\u00e4',
      '\\',
      "'",
    )
    fc.assert(
      fc.property(fc.array(pieces, { maxLength: 9 }), (parts) => {
        const text = parts.join('')
        const mine = parseJson(text)
        const theirs = platform(text)
        if (mine.outcome === 'value') expect(theirs).not.toBeNull()
        else if (theirs) expect(mine.message).toContain('stands twice')
        else expect(mine.line).toBeGreaterThan(0)
      }),
      { numRuns: 5000 },
    )
  })
})
