// Generated from the coefficient rows by generate.ts; do not edit. Source: IAPWS R7-97(2012), Eqs. (33) and (34).

/**
 * gamma of region 5 and its derivatives, with x = pi, y = tau and logarithm = ln pi: writes gamma,
 * d/dpi, d2/dpi2, d/dtau, d2/dpidtau, d2/dtau2.
 */
export function region5Potential(g: Float64Array, x: number, y: number, logarithm: number): void {
  const x2 = x * x
  const x3 = x2 * x
  const y2 = y * y
  const y3 = y2 * y
  const y4 = y3 * y
  const y7 = y3 * y4
  const y9 = y7 * y2
  const t1x1 = 0.0015736404855259 * y
  const t1x2 = 0.00090153761673944 * y2
  const t1x3 = -0.0050270077677648 * y3
  const a1 = t1x1 + t1x2 + t1x3
  const b1 = t1x1 + 2 * t1x2 + 3 * t1x3
  const c1 = 2 * t1x2 + 6 * t1x3
  const p1 = a1 * x
  let f = p1
  let fx = p1
  const q1 = b1 * x
  let fy = q1
  let fxy = q1
  let fyy = c1 * x
  const t2x3 = 0.0000022440037409485 * y3
  const t2x9 = -0.0000041163275453471 * y9
  const a2 = t2x3 + t2x9
  const b2 = 3 * t2x3 + 9 * t2x9
  const c2 = 6 * t2x3 + 72 * t2x9
  const p2 = a2 * x2
  f += p2
  fx += 2 * p2
  let fxx = 2 * p2
  const q2 = b2 * x2
  fy += q2
  fxy += 2 * q2
  fyy += c2 * x2
  const t3x7 = 3.7919454822955e-8 * y7
  const b3 = 7 * t3x7
  const c3 = 42 * t3x7
  const p3 = t3x7 * x3
  f += p3
  fx += 3 * p3
  fxx += 6 * p3
  const q3 = b3 * x3
  fy += q3
  fxy += 3 * q3
  fyy += c3 * x3
  const ym1 = 1 / y
  const ym2 = ym1 * ym1
  const ym3 = ym2 * ym1
  const o1 = 6.8540841634434 * y
  const om3 = -0.024805148933466 * ym3
  const om2 = 0.36901534980333 * ym2
  const om1 = -3.1161318213925 * ym1
  const o2 = -0.32961626538917 * y2
  let o = -13.179983674201
  o += o1
  o += om3
  o += om2
  o += om1
  o += o2
  let oy = o1
  oy -= 3 * om3
  oy -= 2 * om2
  oy -= om1
  oy += 2 * o2
  let oyy = 12 * om3
  oyy += 6 * om2
  oyy += 2 * om1
  oyy += 2 * o2
  const rx = 1 / x
  const ry = 1 / y
  g[0] = o + f + logarithm
  g[1] = (1 + fx) * rx
  g[2] = (fxx - 1) * rx * rx
  g[3] = (oy + fy) * ry
  g[4] = fxy * rx * ry
  g[5] = (oyy + fyy) * ry * ry
}
