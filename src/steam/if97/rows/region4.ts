/**
 * Region 4 of IAPWS R7-97(2012), Table 34, Eqs. (29) to (31): saturation, 273.15 K <= T <= 647.096
 * K: beta^2 theta^2 + n1 beta^2 theta + n2 beta^2 + n3 beta theta^2 + n4 beta theta + n5 beta + n6
 * theta^2 + n7 theta + n8 = 0, beta = (p / 1 MPa)^(1/4), theta = T + n9 / (T - n10), T in K.
 */
export const region4 = [
  0.11670521452767e4, -0.72421316703206e6, -0.17073846940092e2, 0.1202082470247e5,
  -0.32325550322333e7, 0.1491510861353e2, -0.48232657361591e4, 0.40511340542057e6,
  -0.23855557567849, 0.65017534844798e3,
] as const
