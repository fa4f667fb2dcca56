/**
 * Slopes of a monotone piecewise cubic through points with rising r (F. N. Fritsch and R. E. Carlson,
 * SIAM J. Numer. Anal. 17, 1980, 238-246; slopes by F. N. Fritsch and J. Butland, SIAM J. Sci. Stat.
 * Comput. 5, 1984, 300-304): weighted harmonic mean of the secants, 0 where they change sign;
 * three-point end slopes.
 */
export function monotoneSlopes(points: readonly (readonly [number, number])[]): Float64Array {
  const n = points.length
  const widths = new Float64Array(n - 1)
  const secants = new Float64Array(n - 1)
  for (let i = 0; i < n - 1; i++) {
    widths[i] = points[i + 1]![0] - points[i]![0]
    secants[i] = (points[i + 1]![1] - points[i]![1]) / widths[i]!
  }
  const slopes = new Float64Array(n)
  if (n === 2) return slopes.fill(secants[0]!)
  for (let i = 1; i < n - 1; i++) {
    const before = secants[i - 1]!
    const after = secants[i]!
    if (before * after <= 0) continue
    const w1 = 2 * widths[i]! + widths[i - 1]!
    const w2 = widths[i]! + 2 * widths[i - 1]!
    slopes[i] = (w1 + w2) / (w1 / before + w2 / after)
  }
  slopes[0] = endSlope(widths[0]!, widths[1]!, secants[0]!, secants[1]!)
  slopes[n - 1] = endSlope(widths[n - 2]!, widths[n - 3]!, secants[n - 2]!, secants[n - 3]!)
  return slopes
}

/**
 * Three-point slope at an end: 0 when against the first secant, at most three times it where the
 * secants change sign.
 */
function endSlope(width: number, nextWidth: number, secant: number, nextSecant: number): number {
  const slope = ((2 * width + nextWidth) * secant - width * nextSecant) / (width + nextWidth)
  if (Math.sign(slope) !== Math.sign(secant)) return 0
  if (Math.sign(secant) !== Math.sign(nextSecant) && Math.abs(slope) > 3 * Math.abs(secant)) {
    return 3 * secant
  }
  return slope
}
