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
import {
  Body,
  functionText,
  idealPart,
  plainSum,
  SUMS,
  settled,
  sumWithSecondDerivatives,
  sumWithSlopes,
} from './unroll-sums.ts'

const header = (source: string): string =>
  `// Generated from the coefficient rows by generate.ts; do not edit. Source: ${source}.

// Sums kept in between, see StoredSum in unroll-sums.ts.
const sums = new Float64Array(${SUMS})

`

function region1File(): string {
  let text = header('IAPWS R7-97(2012), Eqs. (7), (11) and (13)')
  let body = new Body()
  sumWithSecondDerivatives(body, region1, 'x', 'y', true)
  body.say('const rx = 1 / x')
  body.say('const ry = 1 / y')
  body.say('g[0] = f')
  body.say('g[1] = -fx * rx')
  body.say('g[2] = (fxx - fx) * rx * rx')
  body.say('g[3] = fy * ry')
  body.say('g[4] = -fxy * rx * ry')
  body.say('g[5] = (fyy - fy) * ry * ry')
  body.say('g[9] = (fyyy - 3 * fyy + 2 * fy) * ry * ry * ry')
  body.say('g[10] = (fxy - fxyy) * rx * ry * ry')
  body.say('g[11] = (fxxy - fxy) * rx * rx * ry')
  text += functionText(
    'gamma of region 1 and its derivatives, from x = 7.1 - pi and y = tau - 1.222: writes gamma, d/dpi, d2/dpi2, d/dtau, d2/dpidtau, d2/dtau2 and then d3/dtau3, d3/dpidtau2, d3/dpi2dtau.',
    'region1Potential',
    ['x', 'y'],
    settled(body),
  )
  body = new Body()
  sumWithSlopes(body, region1, 'x', 'y')
  body.say('const ry = 1 / y')
  body.say('g[0] = fy * ry')
  body.say('g[1] = (fyy - fy) * ry * ry')
  text += `\n${functionText(
    'The first two derivatives to tau of gamma of region 1, with x = 7.1 - pi and y = tau - 1.222.',
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
 * The terms of region 2 that matter up to a pressure (MPa): those that reach 1e-16 of any
 * derivative of gamma that a state is made of. A term is largest along the saturation line, where
 * tau is.
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
  sumWithSecondDerivatives(body, rows, 'x', 'y', true)
  idealPart(body, region2Ideal, 'tau', ['o', 'oy', 'oyy', 'oyyy'])
  body.say('const rx = 1 / x')
  body.say('const ry = 1 / y')
  body.say('const rt = 1 / tau')
  body.say('g[0] = o + f + logarithm')
  body.say('g[1] = (1 + fx) * rx')
  body.say('g[2] = (fxx - fx - 1) * rx * rx')
  body.say('g[3] = oy * rt + fy * ry')
  body.say('g[4] = fxy * rx * ry')
  body.say('g[5] = (oyy - oy) * rt * rt + (fyy - fy) * ry * ry')
  body.say('const oThird = oyyy - 3 * oyy + 2 * oy')
  body.say('const fThird = fyyy - 3 * fyy + 2 * fy')
  body.say('g[9] = oThird * rt * rt * rt + fThird * ry * ry * ry')
  body.say('g[10] = (fxyy - fxy) * rx * ry * ry')
  body.say('g[11] = (fxxy - fxy) * rx * rx * ry')
  return functionText(
    `gamma of region 2 and its derivatives${doc}, from x = pi and logarithm = ln pi: writes gamma, d/dpi, d2/dpi2, d/dtau, d2/dpidtau, d2/dtau2 and then d3/dtau3, d3/dpidtau2, d3/dpi2dtau.`,
    name,
    ['x', 'tau', 'logarithm'],
    settled(body),
  )
}

function slopes2(name: string, rows: readonly Term[], doc: string): string {
  const body = new Body()
  body.say('const y = tau - 0.5')
  sumWithSlopes(body, rows, 'x', 'y')
  idealPart(body, region2Ideal, 'tau', ['oy', 'oyy'])
  body.say('const ry = 1 / y')
  body.say('const rt = 1 / tau')
  body.say('g[0] = oy * rt + fy * ry')
  body.say('g[1] = (oyy - oy) * rt * rt + (fyy - fy) * ry * ry')
  return functionText(
    `The first two derivatives to tau of gamma of region 2${doc}, with x = pi.`,
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
  idealPart(body, region5Ideal, 'y', ['o', 'oy', 'oyy'])
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
