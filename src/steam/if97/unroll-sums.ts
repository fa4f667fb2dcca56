/**
 * Sums of powers written out as straight code: one power ladder per variable, one product per term,
 * every constant folded. What generate.ts builds its functions from.
 */
import type { Term } from './rows/term.ts'

/** Lines of one function's body and the powers already there. */
export class Body {
  readonly lines: string[] = []
  private readonly ladders = new Map<string, Map<number, number>>()

  say(line: string): void {
    this.lines.push(line)
  }

  /**
   * The powers of a variable with the given exponents, each from two that are there already; the
   * names are those of `powerName`. Negative exponents are powers of the reciprocal.
   */
  powers(variable: string, exponents: Iterable<number>): void {
    const wanted = [...exponents]
    this.ladder(
      variable,
      wanted.filter((e) => e > 0),
    )
    const negative = wanted.filter((e) => e < 0).map((e) => -e)
    if (negative.length === 0) return
    const reciprocal = powerName(variable, -1)
    if (!this.ladders.has(reciprocal)) this.say(`const ${reciprocal} = 1 / ${variable}`)
    this.ladder(reciprocal, negative)
  }

  /**
   * Each power from the two that are ready soonest: the depth of the products is what takes time.
   */
  private ladder(base: string, wanted: number[]): void {
    const depths = this.ladders.get(base) ?? new Map([[1, 0]])
    this.ladders.set(base, depths)
    const ensure = (e: number): void => {
      if (depths.has(e)) return
      let best: number | undefined
      let least = Number.POSITIVE_INFINITY
      for (const [first, depth] of depths) {
        const second = depths.get(e - first)
        if (second === undefined || Math.max(depth, second) >= least) continue
        best = first
        least = Math.max(depth, second)
      }
      if (best === undefined) {
        best = e >> 1
        ensure(best)
        ensure(e - best)
        least = Math.max(depths.get(best) as number, depths.get(e - best) as number)
      }
      this.say(`const ${rung(base, e)} = ${rung(base, best)} * ${rung(base, e - best)}`)
      depths.set(e, least + 1)
    }
    for (const e of [...wanted].sort((x, y) => x - y)) ensure(e)
  }
}

/** The name of a power of a base: y2 of y, ym2 of the reciprocal ym1. */
function rung(base: string, exponent: number): string {
  if (base.endsWith('m1')) return `${base.slice(0, -1)}${exponent}`
  return exponent === 1 ? base : `${base}${exponent}`
}

function powerName(variable: string, exponent: number): string {
  if (exponent === 1) return variable
  return exponent > 0 ? `${variable}${exponent}` : `${variable}m${-exponent}`
}

/** A factor in front of a name: nothing for 1, a minus for -1. */
function scaled(factor: number, name: string): string {
  if (factor === 1) return name
  if (factor === -1) return `-${name}`
  return `${factor} * ${name}`
}

function groupedBy(rows: readonly Term[], key: (row: Term) => number): Map<number, Term[]> {
  const groups = new Map<number, Term[]>()
  for (const row of rows) {
    const group = groups.get(key(row))
    if (group) group.push(row)
    else groups.set(key(row), [row])
  }
  return groups
}

function byI(rows: readonly Term[]): Map<number, Term[]> {
  return groupedBy(rows, ({ I }) => I)
}

/** A running sum that starts with its first part. */
class Sum {
  private started = false
  private readonly body: Body
  private readonly as: string

  constructor(body: Body, as: string) {
    this.body = body
    this.as = as
  }

  /** The sum's name; '' while it is empty. */
  get name(): string {
    return this.started ? this.as : ''
  }

  add(part: string): void {
    if (!this.started) {
      this.body.say(`let ${this.as} = ${part}`)
      this.started = true
    } else if (part.startsWith('-')) this.body.say(`${this.as} -= ${part.slice(1)}`)
    else this.body.say(`${this.as} += ${part}`)
  }
}

/**
 * A running sum kept in a slot of the array `sums`. What is stored in between keeps the compiler from
 * putting off all terms of one sum until those of another are through, and from moving hundreds of
 * terms to the stack and back meanwhile.
 */
class StoredSum {
  private parts: string[] = []
  private started = false
  private readonly slot: number

  constructor(slot: number) {
    this.slot = slot
  }

  add(part: string): void {
    this.parts.push(part)
  }

  /** Stores what has been added since. */
  flush(body: Body): void {
    if (this.parts.length === 0) return
    const [first, ...others] = this.started
      ? [`(sums[${this.slot}] as number)`, ...this.parts]
      : this.parts
    const rest = others.map((part) => (part.startsWith('-') ? ` - ${part.slice(1)}` : ` + ${part}`))
    body.say(`sums[${this.slot}] = ${first}${rest.join('')}`)
    this.started = true
    this.parts = []
  }
}

/** Sums that a function keeps: those of nine derivatives. */
export const SUMS = 9
type NineSums = [
  StoredSum,
  StoredSum,
  StoredSum,
  StoredSum,
  StoredSum,
  StoredSum,
  StoredSum,
  StoredSum,
  StoredSum,
]

/** Terms after which the sums are stored. */
const TERMS_AT_ONCE = 5

/**
 * sum of n x^I y^J with its logarithmic derivatives, in the names f, fx, fxx, fy, fxy, fyy of the
 * body: the sums of t, I t, I^2 t, J t, I J t, J^2 t over the terms t; with `slopes` those of the
 * second derivatives to y as well, fxxy, fxyy, fyyy. Terms of one I are summed first.
 */
export function sumWithSecondDerivatives(
  body: Body,
  rows: readonly Term[],
  x: string,
  y: string,
  slopes = false,
): void {
  body.powers(
    x,
    rows.map((row) => row.I),
  )
  body.powers(
    y,
    rows.map((row) => row.J),
  )
  const names = ['f', 'fx', 'fxx', 'fy', 'fxy', 'fyy', 'fxxy', 'fxyy', 'fyyy']
  const [f, fx, fxx, fy, fxy, fyy, fxxy, fxyy, fyyy] = [0, 1, 2, 3, 4, 5, 6, 7, 8].map(
    (slot) => new StoredSum(slot),
  ) as NineSums
  const sums = [f, fx, fxx, fy, fxy, fyy, fxxy, fxyy, fyyy]
  let waiting = 0
  const store = (terms: number): void => {
    waiting += terms
    if (waiting < TERMS_AT_ONCE) return
    for (const sum of sums) sum.flush(body)
    waiting = 0
  }
  for (const [I, group] of byI(rows)) {
    const id = named(I)
    const [first] = group
    if (group.length === 1 && first !== undefined && first.J !== 0 && I !== 0) {
      body.say(`const t${id} = ${first.n} * ${powerName(x, I)} * ${powerName(y, first.J)}`)
      body.say(`const u${id} = ${scaled(I, `t${id}`)}`)
      body.say(`const w${id} = ${scaled(first.J, `t${id}`)}`)
      f.add(`t${id}`)
      fx.add(`u${id}`)
      fxx.add(scaled(I, `u${id}`))
      fy.add(`w${id}`)
      if (!slopes) {
        fxy.add(scaled(first.J, `u${id}`))
        fyy.add(scaled(first.J, `w${id}`))
        store(1)
        continue
      }
      body.say(`const v${id} = ${scaled(first.J, `u${id}`)}`)
      body.say(`const z${id} = ${scaled(first.J, `w${id}`)}`)
      fxy.add(`v${id}`)
      fyy.add(`z${id}`)
      fxxy.add(scaled(I, `v${id}`))
      fxyy.add(scaled(first.J, `v${id}`))
      fyyy.add(scaled(first.J, `z${id}`))
      store(1)
      continue
    }
    const [zero, one, two, three] = groupSums(body, group, y, id, slopes)
    const times = (name: string): string => (I === 0 ? name : `${name} * ${powerName(x, I)}`)
    if (zero !== '') {
      body.say(`const p${id} = ${times(zero)}`)
      f.add(`p${id}`)
      if (I !== 0) {
        body.say(`const u${id} = ${scaled(I, `p${id}`)}`)
        fx.add(`u${id}`)
        fxx.add(scaled(I, `u${id}`))
      }
    }
    if (one !== '') {
      body.say(`const q${id} = ${times(one)}`)
      fy.add(`q${id}`)
      if (I !== 0 && slopes) {
        body.say(`const v${id} = ${scaled(I, `q${id}`)}`)
        fxy.add(`v${id}`)
        fxxy.add(scaled(I, `v${id}`))
      } else if (I !== 0) fxy.add(scaled(I, `q${id}`))
    }
    if (two !== '' && slopes) {
      body.say(`const r${id} = ${times(two)}`)
      fyy.add(`r${id}`)
      if (I !== 0) fxyy.add(scaled(I, `r${id}`))
    } else if (two !== '') fyy.add(times(two))
    if (three !== '') fyyy.add(times(three))
    store(group.length)
  }
  for (const sum of sums) sum.flush(body)
  for (const [slot, name] of names.entries()) {
    if (slot < 6 || slopes) body.say(`const ${name} = sums[${slot}] as number`)
  }
}

/**
 * The sums over one I of t, J t, J^2 t and, with `slopes`, J^3 t, with t = n y^J; '' where a sum has
 * no term.
 */
function groupSums(
  body: Body,
  group: readonly Term[],
  y: string,
  id: string,
  slopes: boolean,
): [string, string, string, string] {
  const sums = [
    new Sum(body, `a${id}`),
    new Sum(body, `b${id}`),
    new Sum(body, `c${id}`),
    new Sum(body, `d${id}`),
  ] as const
  for (const { J, n } of group) {
    if (J === 0) {
      sums[0].add(`${n}`)
      continue
    }
    const t = `t${id}x${named(J)}`
    body.say(`const ${t} = ${n} * ${powerName(y, J)}`)
    sums[0].add(t)
    if (J === 1) {
      sums[1].add(t)
      sums[2].add(t)
      if (slopes) sums[3].add(t)
      continue
    }
    body.say(`const j${t} = ${scaled(J, t)}`)
    sums[1].add(`j${t}`)
    if (!slopes) {
      sums[2].add(scaled(J, `j${t}`))
      continue
    }
    body.say(`const k${t} = ${scaled(J, `j${t}`)}`)
    sums[2].add(`k${t}`)
    sums[3].add(scaled(J, `k${t}`))
  }
  return [sums[0].name, sums[1].name, sums[2].name, sums[3].name]
}

/** A number as part of a name. */
function named(value: number): string {
  return `${value}`.replace('-', 'm')
}

/**
 * The sums J t, J^2 t over all terms t = n x^I y^J, in the names fy, fyy. Terms of one J are summed
 * first.
 */
export function sumWithSlopes(body: Body, rows: readonly Term[], x: string, y: string): void {
  const used = rows.filter((row) => row.J !== 0)
  body.powers(
    x,
    used.map((row) => row.I),
  )
  body.powers(
    y,
    used.map((row) => row.J),
  )
  const fy = new Sum(body, 'fy')
  const fyy = new Sum(body, 'fyy')
  for (const [J, group] of groupedBy(used, ({ J }) => J)) {
    const id = named(J)
    const sum = new Sum(body, `a${id}`)
    for (const { I, n } of group) sum.add(I === 0 ? `${n}` : `${n} * ${powerName(x, I)}`)
    body.say(`const t${id} = ${sum.name} * ${powerName(y, J)}`)
    if (J === 1) {
      for (const sum of [fy, fyy]) sum.add(`t${id}`)
      continue
    }
    body.say(`const u${id} = ${scaled(J, `t${id}`)}`)
    fy.add(`u${id}`)
    fyy.add(scaled(J, `u${id}`))
  }
}

/** The plain value of a backward equation's sum. */
export function plainSum(body: Body, rows: readonly Term[], x: string, y: string): void {
  body.powers(
    x,
    rows.map((row) => row.I),
  )
  body.powers(
    y,
    rows.map((row) => row.J),
  )
  const f = new Sum(body, 'f')
  for (const [I, group] of byI(rows)) {
    const sum = new Sum(body, `a${named(I)}`)
    for (const { J, n } of group) sum.add(J === 0 ? `${n}` : `${n} * ${powerName(y, J)}`)
    f.add(I === 0 ? sum.name : `${sum.name} * ${powerName(x, I)}`)
  }
}

/**
 * The ideal part of regions 2 and 5 without ln pi: o, oy, oyy, oyyy hold the sums of t, J t, J^2 t,
 * J^3 t over t = n y^J, as far as they are among those wanted.
 */
export function idealPart(
  body: Body,
  rows: readonly Term[],
  y: string,
  wanted: readonly ('o' | 'oy' | 'oyy' | 'oyyy')[],
): void {
  body.powers(
    y,
    rows.map((row) => row.J),
  )
  const names = ['o', 'oy', 'oyy', 'oyyy'] as const
  const sums = names.map((name) => (wanted.includes(name) ? new Sum(body, name) : undefined))
  const highest = names.findLastIndex((name) => wanted.includes(name))
  for (const { J, n } of rows) {
    if (J === 0) {
      sums[0]?.add(`${n}`)
      continue
    }
    let power = `o${named(J)}`
    body.say(`const ${power} = ${n} * ${powerName(y, J)}`)
    for (const [k, sum] of sums.entries()) {
      if (k > highest) break
      if (k > 0 && J !== 1) {
        const next = scaled(J, power)
        if (k < highest) {
          body.say(`const ${'jk'[k - 1]}o${named(J)} = ${next}`)
          power = `${'jk'[k - 1]}o${named(J)}`
        } else power = next
      }
      sum?.add(power)
    }
  }
}

/**
 * What every generated function works on: six outputs from slot 0, its inputs from slot 6 and three
 * more outputs from slot 9.
 */
const inputs = ['g[6]', 'g[7]', 'g[8]']

export function functionText(
  doc: string,
  name: string,
  names: readonly string[],
  body: Body,
): string {
  const comment = wrapped(doc)
  const read = names.map((input, i) => `const ${input} = ${inputs[i]} as number`)
  const lines = [...read, ...body.lines].map((line) => `  ${line}`)
  return `${comment}\nexport function ${name}(g: Float64Array): void {\n${lines.join('\n')}\n}\n`
}

function wrapped(doc: string): string {
  const words = doc.split(' ')
  const lines: string[] = []
  let line = ' *'
  for (const word of words) {
    if (line.length + 1 + word.length > 100) {
      lines.push(line)
      line = ' *'
    }
    line += ` ${word}`
  }
  lines.push(line)
  return `/**\n${lines.join('\n')}\n */`
}

/** Sums that never grew past their first part become constants. */
export function settled(body: Body): Body {
  const grown = new Set<string>()
  for (const line of body.lines) {
    const match = /^(\w+) [-+]= /.exec(line)
    if (match) grown.add(match[1] as string)
  }
  const out = new Body()
  for (const line of body.lines) {
    const match = /^let (\w+) = /.exec(line)
    out.say(match && !grown.has(match[1] as string) ? line.replace('let', 'const') : line)
  }
  return out
}
