/**
 * Writes the published sums out as straight code: one power ladder per variable, one product per
 * term, every constant folded. `unrolledFiles` returns the text of each generated file from the
 * coefficient rows; test/steam/unroll.ts writes them and a test holds the committed files against
 * the rows.
 */
import { lowestSaturationPressure } from '../constants.ts'
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
import { saturationTemperatureOf } from './saturation-line.ts'

/** Lines of one function's body and the powers already there. */
class Body {
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

  /** Each power from the two that are ready soonest: the depth of the products is what takes time. */
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
 * sum of n x^I y^J with its logarithmic derivatives, in the names f, fx, fxx, fy, fxy, fyy of the body:
 * the sums of t, I t, I^2 t, J t, I J t, J^2 t over the terms t. Terms of one I are summed first.
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
      fxy.add(scaled(first.J, `u${id}`))
      fyy.add(scaled(first.J, `w${id}`))
      continue
    }
    const [zero, one, two] = groupSums(body, group, y, id)
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
      if (I !== 0) fxy.add(scaled(I, `q${id}`))
    }
    if (two !== '') fyy.add(times(two))
  }
}

/** The sums over one I of t, J t and J^2 t with t = n y^J; '' where a sum has no term. */
function groupSums(
  body: Body,
  group: readonly Term[],
  y: string,
  id: string,
): [string, string, string] {
  const sums = [new Sum(body, `a${id}`), new Sum(body, `b${id}`), new Sum(body, `c${id}`)] as const
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
      continue
    }
    body.say(`const j${t} = ${scaled(J, t)}`)
    sums[1].add(`j${t}`)
    sums[2].add(scaled(J, `j${t}`))
  }
  return [sums[0].name, sums[1].name, sums[2].name]
}

/** A number as part of a name. */
function named(value: number): string {
  return `${value}`.replace('-', 'm')
}

/**
 * The sums J t, J^2 t, J^3 t over all terms t = n x^I y^J, in the names fy, fyy, fyyy. Terms of one J
 * are summed first.
 */
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
  for (const [J, group] of groupedBy(used, ({ J }) => J)) {
    const id = named(J)
    const sum = new Sum(body, `a${id}`)
    for (const { I, n } of group) sum.add(I === 0 ? `${n}` : `${n} * ${powerName(x, I)}`)
    body.say(`const t${id} = ${sum.name} * ${powerName(y, J)}`)
    if (J === 1) {
      for (const sum of [fy, fyy, fyyy]) sum.add(`t${id}`)
      continue
    }
    body.say(`const u${id} = ${scaled(J, `t${id}`)}`)
    body.say(`const w${id} = ${scaled(J, `u${id}`)}`)
    fy.add(`u${id}`)
    fyy.add(`w${id}`)
    fyyy.add(scaled(J, `w${id}`))
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
    const sum = new Sum(body, `a${named(I)}`)
    for (const { J, n } of group) sum.add(J === 0 ? `${n}` : `${n} * ${powerName(y, J)}`)
    f.add(I === 0 ? sum.name : `${sum.name} * ${powerName(x, I)}`)
  }
}

/**
 * The ideal part of regions 2 and 5 without ln pi: o, oy, oyy, oyyy hold the sums of t, J t, J^2 t,
 * J^3 t over t = n y^J; with `slopes` those of the slopes alone.
 */
function idealPart(body: Body, rows: readonly Term[], y: string, slopes: boolean): void {
  body.powers(
    y,
    rows.map((row) => row.J),
  )
  const [o, oy, oyy, oyyy] = ['o', 'oy', 'oyy', 'oyyy'].map((name) => new Sum(body, name)) as [
    Sum,
    Sum,
    Sum,
    Sum,
  ]
  for (const { J, n } of rows) {
    if (J === 0) {
      if (!slopes) o.add(`${n}`)
      continue
    }
    const t = `o${named(J)}`
    body.say(`const ${t} = ${n} * ${powerName(y, J)}`)
    if (!slopes) o.add(t)
    let power = t
    for (const [k, sum] of [oy, oyy, oyyy].entries()) {
      if (k === 2 && !slopes) continue
      if (J !== 1 && k < (slopes ? 2 : 1)) {
        body.say(`const ${'jk'[k]}${t} = ${scaled(J, power)}`)
        power = `${'jk'[k]}${t}`
        sum.add(power)
      } else sum.add(scaled(J, power))
    }
  }
}

/** What every generated function works on: up to six outputs from slot 0, its inputs from slot 6. */
const inputs = ['g[6]', 'g[7]', 'g[8]']

function functionText(doc: string, name: string, names: readonly string[], body: Body): string {
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
  body.say('g[2] = (fxx - fx) * rx * rx')
  body.say('g[3] = fy * ry')
  body.say('g[4] = -fxy * rx * ry')
  body.say('g[5] = (fyy - fy) * ry * ry')
  text += functionText(
    'gamma of region 1 and its derivatives, from x = 7.1 - pi and y = tau - 1.222: writes gamma, d/dpi, d2/dpi2, d/dtau, d2/dpidtau, d2/dtau2.',
    'region1Potential',
    ['x', 'y'],
    settled(body),
  )
  body = new Body()
  sumWithSlopes(body, region1, 'x', 'y')
  body.say('const ry = 1 / y')
  body.say('g[0] = fy * ry')
  body.say('g[1] = (fyy - fy) * ry * ry')
  body.say('g[2] = (fyyy - 3 * fyy + 2 * fy) * ry * ry * ry')
  text += `\n${functionText(
    'The first three derivatives to tau of gamma of region 1, with x = 7.1 - pi and y = tau - 1.222.',
    'region1Slopes',
    ['x', 'y'],
    settled(body),
  )}`
  text += `\n${backward('region1TemperatureFromEnthalpy', 'T / K of region 1, x = p / 1 MPa, y = h / 2500 kJ/kg + 1.', region1TemperatureOfEnthalpy)}`
  text += `\n${backward('region1TemperatureFromEntropy', 'T / K of region 1, x = p / 1 MPa, y = s / 1 kJ/(kg K) + 2.', region1TemperatureOfEntropy)}`
  return text
}

function backward(name: string, doc: string, rows: readonly Term[]): string {
  const body = new Body()
  plainSum(body, rows, 'x', 'y')
  body.say('g[0] = f')
  return functionText(doc, name, ['x', 'y'], settled(body))
}

/** Below this pressure (MPa) the terms of region 2 that stay under round-off are left out. */
const lowPressure = 0.3

/**
 * The terms of region 2 that matter up to a pressure (MPa): those that reach 1e-16 of any derivative of
 * gamma that a state is made of. A term is largest along the saturation line, where tau is.
 */
function termsBelow(pressure: number): Term[] {
  const most = Math.log(pressure * 1e6)
  const least = Math.log(lowestSaturationPressure)
  return region2Residual.filter(({ I, J, n }) => {
    for (let i = 0; i <= 500; i++) {
      const p = Math.exp(least + ((most - least) * i) / 500)
      const tau = 540 / saturationTemperatureOf(p)
      const y = tau - 0.5
      const t = Math.abs(n * (p * 1e-6) ** I * y ** J)
      // gamma_tau is above 4 and gamma_tau tau near -4 there; pi gamma_pi and pi^2 gamma_pi pi near 1.
      const inTau = Math.max((t * J) / y, (t * J * (J - 1)) / (y * y)) / 4
      const inPi = Math.max(t * I * I, (t * I * J * tau) / y)
      if (Math.max(inTau, inPi) > 1e-16) return true
    }
    return false
  })
}

function potential2(name: string, rows: readonly Term[], doc: string): string {
  const body = new Body()
  body.say('const y = tau - 0.5')
  sumWithSecondDerivatives(body, rows, 'x', 'y')
  idealPart(body, region2Ideal, 'tau', false)
  body.say('const rx = 1 / x')
  body.say('const ry = 1 / y')
  body.say('const rt = 1 / tau')
  body.say('g[0] = o + f + logarithm')
  body.say('g[1] = (1 + fx) * rx')
  body.say('g[2] = (fxx - fx - 1) * rx * rx')
  body.say('g[3] = oy * rt + fy * ry')
  body.say('g[4] = fxy * rx * ry')
  body.say('g[5] = (oyy - oy) * rt * rt + (fyy - fy) * ry * ry')
  return functionText(
    `gamma of region 2 and its derivatives${doc}, from x = pi and logarithm = ln pi: writes gamma, d/dpi, d2/dpi2, d/dtau, d2/dpidtau, d2/dtau2.`,
    name,
    ['x', 'tau', 'logarithm'],
    settled(body),
  )
}

function slopes2(name: string, rows: readonly Term[], doc: string): string {
  const body = new Body()
  body.say('const y = tau - 0.5')
  sumWithSlopes(body, rows, 'x', 'y')
  idealPart(body, region2Ideal, 'tau', true)
  body.say('const ry = 1 / y')
  body.say('const rt = 1 / tau')
  body.say('g[0] = oy * rt + fy * ry')
  body.say('g[1] = (oyy - oy) * rt * rt + (fyy - fy) * ry * ry')
  body.say('const oThird = oyyy - 3 * oyy + 2 * oy')
  body.say('const fThird = fyyy - 3 * fyy + 2 * fy')
  body.say('g[2] = oThird * rt * rt * rt + fThird * ry * ry * ry')
  return functionText(
    `The first three derivatives to tau of gamma of region 2${doc}, with x = pi.`,
    name,
    ['x', 'tau'],
    settled(body),
  )
}

function region2File(): string {
  const low = termsBelow(lowPressure)
  const below = ` below ${lowPressure} MPa, without the terms under round-off there`
  let text = header('IAPWS R7-97(2012), Eqs. (16), (17) and (22) to (27)')
  text += `/** pi below which the shorter sums hold. */\nexport const lowPressure2 = ${lowPressure}\n\n`
  text += potential2('region2Potential', region2Residual, '')
  text += `\n${potential2('region2LowPotential', low, below)}`
  text += `\n${slopes2('region2Slopes', region2Residual, '')}`
  text += `\n${slopes2('region2LowSlopes', low, below)}`
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
  body.say(`g[2] = (fxx - fx - ${region3LogDelta}) * rx * rx`)
  body.say('g[3] = fy * ry')
  body.say('g[4] = fxy * rx * ry')
  body.say('g[5] = (fyy - fy) * ry * ry')
  text += functionText(
    'phi of region 3 and its derivatives, with x = delta, y = tau and logarithm = ln delta: writes phi, d/ddelta, d2/ddelta2, d/dtau, d2/ddeltadtau, d2/dtau2.',
    'region3Potential',
    ['x', 'y', 'logarithm'],
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
  body.say('g[2] = (fxx - fx - 1) * rx * rx')
  body.say('g[3] = (oy + fy) * ry')
  body.say('g[4] = fxy * rx * ry')
  body.say('g[5] = (oyy + fyy - oy - fy) * ry * ry')
  text += functionText(
    'gamma of region 5 and its derivatives, with x = pi, y = tau and logarithm = ln pi: writes gamma, d/dpi, d2/dpi2, d/dtau, d2/dpidtau, d2/dtau2.',
    'region5Potential',
    ['x', 'y', 'logarithm'],
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
