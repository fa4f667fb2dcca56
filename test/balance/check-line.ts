import { expect } from 'vitest'
import type { Figure } from '../../src/balance/answer.ts'
import { reckon } from './reckon.ts'

/** Half a unit of the last digit that a figure shows. */
function half(figure: string): number {
  const [mantissa = '', power] = figure.replace(/\u202f/g, '').split(' × 10')
  const exponent = Number(
    (power ?? '⁰')
      .replace('⁻', '-')
      .replace(/[⁰¹²³⁴⁵⁶⁷⁸⁹]/g, (one) => String('⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(one))),
  )
  return 0.5 * 10 ** (exponent - (mantissa.split('.')[1]?.length ?? 0))
}

/**
 * Reckoned from its own figures, a printed line comes to its result, to half a unit of its last digit.
 * What a curve is read at stands in the line, what it says does not: such a line is passed over.
 */
export function checkLine(text: string, result: Figure, where: string): void {
  if (text.includes('curve(')) return
  const wanted = reckon(result.figure, '').value
  for (const side of text.split(' = ').length > 1 && !/[(,] ?\w+ = /.test(text)
    ? text.split(' = ')
    : [text]) {
    const { value, size } = reckon(side, result.unit)
    const inUnit = result.unit === '%' ? value * 100 : value
    // What is nought but for rounding is measured by the figures that it comes from.
    const allowed =
      result.figure === '0' ? 1e-6 * size : half(result.figure) * (1 + 1e-6) + 1e-9 * size
    expect(Math.abs(inUnit - wanted), `${where}: ${result.figure} = ${side}`).toBeLessThanOrEqual(
      allowed,
    )
  }
}
