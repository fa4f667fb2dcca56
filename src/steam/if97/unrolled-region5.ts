// Generated from the coefficient rows by generate.ts; do not edit. Source: IAPWS R7-97(2012), Eqs. (33) and (34).

// Sums kept in between, see StoredSum in unroll-sums.ts.
const sums = new Float64Array(9)

/**
 * gamma of region 5 and its derivatives, with x = pi, y = tau and logarithm = ln pi: writes gamma,
 * d/dpi, d2/dpi2, d/dtau, d2/dpidtau, d2/dtau2.
 */
export function region5Potential(g: Float64Array): void {
  const x = g[6] as number
  const y = g[7] as number
  const logarithm = g[8] as number
  const x2 = x * x
  const x3 = x * x2
  const y2 = y * y
  const y3 = y * y2
  const y4 = y2 * y2
  const y7 = y3 * y4
  const y9 = y2 * y7
  const t1x1 = 0.0015736404855259 * y
  let a1 = t1x1
  let b1 = t1x1
  let c1 = t1x1
  const t1x2 = 0.00090153761673944 * y2
  a1 += t1x2
  const jt1x2 = 2 * t1x2
  b1 += jt1x2
  c1 += 2 * jt1x2
  const t1x3 = -0.0050270077677648 * y3
  a1 += t1x3
  const jt1x3 = 3 * t1x3
  b1 += jt1x3
  c1 += 3 * jt1x3
  const p1 = a1 * x
  const u1 = p1
  const q1 = b1 * x
  const t2x3 = 0.0000022440037409485 * y3
  let a2 = t2x3
  const jt2x3 = 3 * t2x3
  let b2 = jt2x3
  let c2 = 3 * jt2x3
  const t2x9 = -0.0000041163275453471 * y9
  a2 += t2x9
  const jt2x9 = 9 * t2x9
  b2 += jt2x9
  c2 += 9 * jt2x9
  const p2 = a2 * x2
  const u2 = 2 * p2
  const q2 = b2 * x2
  sums[0] = p1 + p2
  sums[1] = u1 + u2
  sums[2] = u1 + 2 * u2
  sums[3] = q1 + q2
  sums[4] = q1 + 2 * q2
  sums[5] = c1 * x + c2 * x2
  const t3 = 3.7919454822955e-8 * x3 * y7
  const u3 = 3 * t3
  const w3 = 7 * t3
  sums[0] = (sums[0] as number) + t3
  sums[1] = (sums[1] as number) + u3
  sums[2] = (sums[2] as number) + 3 * u3
  sums[3] = (sums[3] as number) + w3
  sums[4] = (sums[4] as number) + 7 * u3
  sums[5] = (sums[5] as number) + 7 * w3
  const f = sums[0] as number
  const fx = sums[1] as number
  const fxx = sums[2] as number
  const fy = sums[3] as number
  const fxy = sums[4] as number
  const fyy = sums[5] as number
  const ym1 = 1 / y
  const ym2 = ym1 * ym1
  const ym3 = ym1 * ym2
  let o = -13.179983674201
  const o1 = 6.8540841634434 * y
  o += o1
  let oy = o1
  let oyy = o1
  const om3 = -0.024805148933466 * ym3
  o += om3
  const jom3 = -3 * om3
  oy += jom3
  oyy -= 3 * jom3
  const om2 = 0.36901534980333 * ym2
  o += om2
  const jom2 = -2 * om2
  oy += jom2
  oyy -= 2 * jom2
  const om1 = -3.1161318213925 * ym1
  o += om1
  const jom1 = -om1
  oy += jom1
  oyy -= jom1
  const o2 = -0.32961626538917 * y2
  o += o2
  const jo2 = 2 * o2
  oy += jo2
  oyy += 2 * jo2
  const rx = 1 / x
  const ry = 1 / y
  g[0] = o + f + logarithm
  g[1] = (1 + fx) * rx
  g[2] = (fxx - fx - 1) * rx * rx
  g[3] = (oy + fy) * ry
  g[4] = fxy * rx * ry
  g[5] = (oyy + fyy - oy - fy) * ry * ry
}
