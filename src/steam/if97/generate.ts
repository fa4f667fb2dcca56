/**
 * Writes the published sums out as straight code: one power ladder per variable, one product per
 * term, every constant folded. `unrolledFiles` returns the text of each generated file from the
 * coefficient rows; test/steam/unroll.ts writes them and a test holds the committed files against
 * the rows.
 */
import {
  region1,
  region1TemperatureOfEnthalpy,
  region1TemperatureOfEntropy,
} from './rows/region1.ts'
import {
  region2aTemperatureOfEnthalpy,
  region2aTemperatureOfEntropy,
  region2bTemperatureOfEnthalpy,
  region2bTemperatureOfEntropy,
  region2cTemperatureOfEnthalpy,
  region2cTemperatureOfEntropy,
  region2Ideal,
  region2Residual,
} from './rows/region2.ts'
import {
  region3,
  region3aTemperatureOfEnthalpy,
  region3aTemperatureOfEntropy,
  region3aVolumeOfEnthalpy,
  region3aVolumeOfEntropy,
  region3bTemperatureOfEnthalpy,
  region3bTemperatureOfEntropy,
  region3bVolumeOfEnthalpy,
  region3bVolumeOfEntropy,
  region3LogDelta,
} from './rows/region3.ts'
import { region5Ideal, region5Residual } from './rows/region5.ts'
import type { Term } from './rows/term.ts'

/** Lines of one function's body and the powers already there. */
class Body {
  readonly lines: string[] = []
  private readonly ladders = new Map<string, Set<number>>()

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

  private ladder(base: string, wanted: number[]): void {
    const there = this.ladders.get(base) ?? new Set([1])
    this.ladders.set(base, there)
    const ensure = (e: number): void => {
      if (there.has(e)) return
      const ready = [...there].sort((x, y) => y - x)
      let first = ready.find((x) => there.has(e - x))
      if (first === undefined) {
        first = ready.find((x) => x < e) as number
        ensure(e - first)
      }
      this.say(`const ${rung(base, e)} = ${rung(base, first)} * ${rung(base, e - first)}`)
      there.add(e)
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

/** An expression a + b + c of parts, with the signs drawn in. */
function added(parts: string[]): string {
  return parts.reduce((sum, part) =>
    part.startsWith('-') ? `${sum} - ${part.slice(1)}` : `${sum} + ${part}`,
  )
}

function byI(rows: readonly Term[]): Map<number, Term[]> {
  const groups = new Map<number, Term[]>()
  for (const row of rows) {
    const group = groups.get(row.I)
    if (group) group.push(row)
    else groups.set(row.I, [row])
  }
  return groups
}

/** A running sum that starts with its first part. */
class Sum {
  private started = false
  private readonly name: string
  private readonly body: Body

  constructor(body: Body, name: string) {
    this.body = body
    this.name = name
  }

  add(part: string): void {
    if (!this.started) {
      this.body.say(`let ${this.name} = ${part}`)
      this.started = true
    } else if (part.startsWith('-')) this.body.say(`${this.name} -= ${part.slice(1)}`)
    else this.body.say(`${this.name} += ${part}`)
  }
}

/**
 * sum of n x^I y^J with its logarithmic derivatives, written into `f`: the value, x d/dx, x^2 d2/dx2,
 * y d/dy, xy d2/dxdy, y^2 d2/dy2 in the constants f, fx, fxx, fy, fxy, fyy of the body.
 */
function sumWithSecondDerivatives(body: Body, rows: readonly Term[], x: string, y: string): void {
  body.powers(
    x,
    rows.map((row) => row.I),
  )
  body.powers(
    y,
    rows.map((row) => row.J),
  )
  const f = new Sum(body, 'f')
  const fx = new Sum(body, 'fx')
  const fxx = new Sum(body, 'fxx')
  const fy = new Sum(body, 'fy')
  const fxy = new Sum(body, 'fxy')
  const fyy = new Sum(body, 'fyy')
  for (const [I, group] of byI(rows)) {
    const id = `${I}`.replace('-', 'm')
    const [zero, one, two] = groupSums(body, group, y, id)
    const times = (name: string): string => (I === 0 ? name : `${name} * ${powerName(x, I)}`)
    if (zero !== '') {
      body.say(`const p${id} = ${times(zero)}`)
      f.add(`p${id}`)
      if (I !== 0) fx.add(scaled(I, `p${id}`))
      if (I !== 0 && I !== 1) fxx.add(scaled(I * (I - 1), `p${id}`))
    }
    if (one !== '') {
      body.say(`const q${id} = ${times(one)}`)
      fy.add(`q${id}`)
      if (I !== 0) fxy.add(scaled(I, `q${id}`))
    }
    if (two !== '') fyy.add(times(two))
  }
}

/** The sums over one I of t, J t and J(J - 1) t with t = n y^J; '' where a sum has no term. */
function groupSums(body: Body, group: Term[], y: string, id: string): [string, string, string] {
  const zero: string[] = []
  const one: string[] = []
  const two: string[] = []
  for (const { J, n } of group) {
    if (J === 0) {
      zero.push(`${n}`)
      continue
    }
    const t = `t${id}x${J}`.replace('-', 'm')
    body.say(`const ${t} = ${n} * ${powerName(y, J)}`)
    zero.push(t)
    one.push(scaled(J, t))
    if (J !== 1) two.push(scaled(J * (J - 1), t))
  }
  return [named(body, `a${id}`, zero), named(body, `b${id}`, one), named(body, `c${id}`, two)]
}

/** A sum of parts under a name, term by term; the part itself when there is only one. */
function named(body: Body, name: string, parts: string[]): string {
  if (parts.length === 0) return ''
  if (parts.length === 1 && /^[a-z]\w*$/.test(parts[0] as string)) return parts[0] as string
  if (added(parts).length <= 80) {
    body.say(`const ${name} = ${added(parts)}`)
    return name
  }
  const sum = new Sum(body, name)
  for (const part of parts) sum.add(part)
  return name
}

/** The sums J t, J(J-1) t, J(J-1)(J-2) t over all rows: y d/dy to y^3 d3/dy3 as fy, fyy, fyyy. */
function sumWithSlopes(body: Body, rows: readonly Term[], x: string, y: string): void {
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
  const fyyy = new Sum(body, 'fyyy')
  for (const [I, group] of byI(used)) {
    const id = `${I}`.replace('-', 'm')
    const one: string[] = []
    const two: string[] = []
    const three: string[] = []
    for (const { J, n } of group) {
      const t = `t${id}x${J}`.replace('-', 'm')
      body.say(`const ${t} = ${n * J} * ${powerName(y, J)}`)
      one.push(t)
      if (J !== 1) two.push(scaled(J - 1, t))
      if (J !== 1 && J !== 2) three.push(scaled((J - 1) * (J - 2), t))
    }
    const times = (name: string): string => (I === 0 ? name : `${name} * ${powerName(x, I)}`)
    const names = [
      named(body, `a${id}`, one),
      named(body, `b${id}`, two),
      named(body, `c${id}`, three),
    ]
    if (names[0]) fy.add(times(names[0]))
    if (names[1]) fyy.add(times(names[1]))
    if (names[2]) fyyy.add(times(names[2]))
  }
}

/** The plain value of a backward equation's sum. */
function plainSum(body: Body, rows: readonly Term[], x: string, y: string): void {
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
    const parts = group.map(({ J, n }) => (J === 0 ? `${n}` : `${n} * ${powerName(y, J)}`))
    const id = `${I}`.replace('-', 'm')
    const name = named(body, `a${id}`, parts)
    f.add(I === 0 ? name : `${name} * ${powerName(x, I)}`)
  }
}

/** The ideal part of regions 2 and 5 without ln pi: adds o, oy, oyy (y d/dy, y^2 d2/dy2). */
function idealPart(body: Body, rows: readonly Term[], y: string, third: boolean): void {
  body.powers(
    y,
    rows.map((row) => row.J),
  )
  const sums: string[][] = [[], [], [], []]
  for (const { J, n } of rows) {
    if (J === 0) {
      sums[0]?.push(`${n}`)
      continue
    }
    const t = `o${J}`.replace('-', 'm')
    body.say(`const ${t} = ${n} * ${powerName(y, J)}`)
    sums[0]?.push(t)
    sums[1]?.push(scaled(J, t))
    if (J !== 1) sums[2]?.push(scaled(J * (J - 1), t))
    if (J !== 1 && J !== 2) sums[3]?.push(scaled(J * (J - 1) * (J - 2), t))
  }
  const names = ['o', 'oy', 'oyy', 'oyyy']
  sums.forEach((parts, k) => {
    if ((k === 0 && third) || (k === 3 && !third)) return
    const sum = new Sum(body, names[k] as string)
    for (const part of parts) sum.add(part)
  })
}

function functionText(doc: string, head: string, body: Body): string {
  const comment = wrapped(doc)
  return `${comment}\nexport function ${head} {\n${body.lines.map((l) => `  ${l}`).join('\n')}\n}\n`
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
function settled(body: Body): Body {
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

const header = (source: string): string =>
  `// Generated from the coefficient rows by generate.ts; do not edit. Source: ${source}.\n\n`

function region1File(): string {
  let text = header('IAPWS R7-97(2012), Eqs. (7), (11) and (13)')
  let body = new Body()
  sumWithSecondDerivatives(body, region1, 'x', 'y')
  body.say('const rx = 1 / x')
  body.say('const ry = 1 / y')
  body.say('g[0] = f')
  body.say('g[1] = -fx * rx')
  body.say('g[2] = fxx * rx * rx')
  body.say('g[3] = fy * ry')
  body.say('g[4] = -fxy * rx * ry')
  body.say('g[5] = fyy * ry * ry')
  text += functionText(
    'gamma of region 1 and its derivatives, with x = 7.1 - pi and y = tau - 1.222: writes gamma, d/dpi, d2/dpi2, d/dtau, d2/dpidtau, d2/dtau2.',
    'region1Potential(g: Float64Array, x: number, y: number): void',
    settled(body),
  )
  body = new Body()
  sumWithSlopes(body, region1, 'x', 'y')
  body.say('const ry = 1 / y')
  body.say('g[0] = fy * ry')
  body.say('g[1] = fyy * ry * ry')
  body.say('g[2] = fyyy * ry * ry * ry')
  text += `\n${functionText(
    'The first three derivatives to tau of gamma of region 1, with x = 7.1 - pi and y = tau - 1.222.',
    'region1Slopes(g: Float64Array, x: number, y: number): void',
    settled(body),
  )}`
  text += `\n${backward('region1TemperatureFromEnthalpy', 'T / K of region 1, x = p / 1 MPa, y = h / 2500 kJ/kg + 1.', region1TemperatureOfEnthalpy)}`
  text += `\n${backward('region1TemperatureFromEntropy', 'T / K of region 1, x = p / 1 MPa, y = s / 1 kJ/(kg K) + 2.', region1TemperatureOfEntropy)}`
  return text
}

function backward(name: string, doc: string, rows: readonly Term[]): string {
  const body = new Body()
  plainSum(body, rows, 'x', 'y')
  body.say('return f')
  return functionText(doc, `${name}(x: number, y: number): number`, settled(body))
}

function region2File(): string {
  let text = header('IAPWS R7-97(2012), Eqs. (16), (17) and (22) to (27)')
  let body = new Body()
  body.say('const y = tau - 0.5')
  sumWithSecondDerivatives(body, region2Residual, 'x', 'y')
  idealPart(body, region2Ideal, 'tau', false)
  body.say('const rx = 1 / x')
  body.say('const ry = 1 / y')
  body.say('const rt = 1 / tau')
  body.say('g[0] = o + f + logarithm')
  body.say('g[1] = (1 + fx) * rx')
  body.say('g[2] = (fxx - 1) * rx * rx')
  body.say('g[3] = oy * rt + fy * ry')
  body.say('g[4] = fxy * rx * ry')
  body.say('g[5] = oyy * rt * rt + fyy * ry * ry')
  text += functionText(
    'gamma of region 2 and its derivatives, with x = pi and logarithm = ln pi: writes gamma, d/dpi, d2/dpi2, d/dtau, d2/dpidtau, d2/dtau2.',
    'region2Potential(g: Float64Array, x: number, tau: number, logarithm: number): void',
    settled(body),
  )
  body = new Body()
  body.say('const y = tau - 0.5')
  sumWithSlopes(body, region2Residual, 'x', 'y')
  idealPart(body, region2Ideal, 'tau', true)
  body.say('const ry = 1 / y')
  body.say('const rt = 1 / tau')
  body.say('g[0] = oy * rt + fy * ry')
  body.say('g[1] = oyy * rt * rt + fyy * ry * ry')
  body.say('g[2] = oyyy * rt * rt * rt + fyyy * ry * ry * ry')
  text += `\n${functionText(
    'The first three derivatives to tau of gamma of region 2, with x = pi.',
    'region2Slopes(g: Float64Array, x: number, tau: number): void',
    settled(body),
  )}`
  text += `\n${backward('region2aTemperatureFromEnthalpy', 'T / K of subregion 2a, x = p / 1 MPa, y = h / 2000 kJ/kg - 2.1.', region2aTemperatureOfEnthalpy)}`
  text += `\n${backward('region2bTemperatureFromEnthalpy', 'T / K of subregion 2b, x = p / 1 MPa - 2, y = h / 2000 kJ/kg - 2.6.', region2bTemperatureOfEnthalpy)}`
  text += `\n${backward('region2cTemperatureFromEnthalpy', 'T / K of subregion 2c, x = p / 1 MPa + 25, y = h / 2000 kJ/kg - 1.8.', region2cTemperatureOfEnthalpy)}`
  const quarters = region2aTemperatureOfEntropy.map((row) => ({ ...row, I: row.I * 4 }))
  text += `\n${backward('region2aTemperatureFromEntropy', 'T / K of subregion 2a, x = (p / 1 MPa)^(1/4), y = s / 2 kJ/(kg K) - 2.', quarters)}`
  text += `\n${backward('region2bTemperatureFromEntropy', 'T / K of subregion 2b, x = p / 1 MPa, y = 10 - s / 0.7853 kJ/(kg K).', region2bTemperatureOfEntropy)}`
  text += `\n${backward('region2cTemperatureFromEntropy', 'T / K of subregion 2c, x = p / 1 MPa, y = 2 - s / 2.9251 kJ/(kg K).', region2cTemperatureOfEntropy)}`
  return text
}

function region3File(): string {
  let text = header('IAPWS R7-97(2012), Eq. (28), and SR3-03(2014), Eqs. (2) to (9)')
  const body = new Body()
  sumWithSecondDerivatives(body, region3, 'x', 'y')
  body.say('const rx = 1 / x')
  body.say('const ry = 1 / y')
  body.say(`g[0] = ${region3LogDelta} * logarithm + f`)
  body.say(`g[1] = (${region3LogDelta} + fx) * rx`)
  body.say(`g[2] = (fxx - ${region3LogDelta}) * rx * rx`)
  body.say('g[3] = fy * ry')
  body.say('g[4] = fxy * rx * ry')
  body.say('g[5] = fyy * ry * ry')
  text += functionText(
    'phi of region 3 and its derivatives, with x = delta, y = tau and logarithm = ln delta: writes phi, d/ddelta, d2/ddelta2, d/dtau, d2/ddeltadtau, d2/dtau2.',
    'region3Potential(g: Float64Array, x: number, y: number, logarithm: number): void',
    settled(body),
  )
  const rows: [string, string, readonly Term[]][] = [
    [
      'region3aTemperatureFromEnthalpy',
      'T / 760 K of subregion 3a, x = p / 100 MPa + 0.24, y = h / 2300 kJ/kg - 0.615.',
      region3aTemperatureOfEnthalpy,
    ],
    [
      'region3bTemperatureFromEnthalpy',
      'T / 860 K of subregion 3b, x = p / 100 MPa + 0.298, y = h / 2800 kJ/kg - 0.72.',
      region3bTemperatureOfEnthalpy,
    ],
    [
      'region3aVolumeFromEnthalpy',
      'v / 0.0028 m3/kg of subregion 3a, x = p / 100 MPa + 0.128, y = h / 2100 kJ/kg - 0.727.',
      region3aVolumeOfEnthalpy,
    ],
    [
      'region3bVolumeFromEnthalpy',
      'v / 0.0088 m3/kg of subregion 3b, x = p / 100 MPa + 0.0661, y = h / 2800 kJ/kg - 0.72.',
      region3bVolumeOfEnthalpy,
    ],
    [
      'region3aTemperatureFromEntropy',
      'T / 760 K of subregion 3a, x = p / 100 MPa + 0.24, y = s / 4.4 kJ/(kg K) - 0.703.',
      region3aTemperatureOfEntropy,
    ],
    [
      'region3bTemperatureFromEntropy',
      'T / 860 K of subregion 3b, x = p / 100 MPa + 0.76, y = s / 5.3 kJ/(kg K) - 0.818.',
      region3bTemperatureOfEntropy,
    ],
    [
      'region3aVolumeFromEntropy',
      'v / 0.0028 m3/kg of subregion 3a, x = p / 100 MPa + 0.187, y = s / 4.4 kJ/(kg K) - 0.755.',
      region3aVolumeOfEntropy,
    ],
    [
      'region3bVolumeFromEntropy',
      'v / 0.0088 m3/kg of subregion 3b, x = p / 100 MPa + 0.298, y = s / 5.3 kJ/(kg K) - 0.816.',
      region3bVolumeOfEntropy,
    ],
  ]
  for (const [name, doc, table] of rows) text += `\n${backward(name, doc, table)}`
  return text
}

function region5File(): string {
  let text = header('IAPWS R7-97(2012), Eqs. (33) and (34)')
  const body = new Body()
  sumWithSecondDerivatives(body, region5Residual, 'x', 'y')
  idealPart(body, region5Ideal, 'y', false)
  body.say('const rx = 1 / x')
  body.say('const ry = 1 / y')
  body.say('g[0] = o + f + logarithm')
  body.say('g[1] = (1 + fx) * rx')
  body.say('g[2] = (fxx - 1) * rx * rx')
  body.say('g[3] = (oy + fy) * ry')
  body.say('g[4] = fxy * rx * ry')
  body.say('g[5] = (oyy + fyy) * ry * ry')
  text += functionText(
    'gamma of region 5 and its derivatives, with x = pi, y = tau and logarithm = ln pi: writes gamma, d/dpi, d2/dpi2, d/dtau, d2/dpidtau, d2/dtau2.',
    'region5Potential(g: Float64Array, x: number, y: number, logarithm: number): void',
    settled(body),
  )
  return text
}

/** Every generated file: its name within src/steam/if97 and its text. */
export function unrolledFiles(): ReadonlyMap<string, string> {
  return new Map([
    ['unrolled-region1.ts', region1File()],
    ['unrolled-region2.ts', region2File()],
    ['unrolled-region3.ts', region3File()],
    ['unrolled-region5.ts', region5File()],
  ])
}
