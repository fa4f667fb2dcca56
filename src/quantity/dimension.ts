/** What a number measures. Inside, every value is in the coherent SI unit named here. */
export type Dimension =
  | 'massFlow' // kg/s
  | 'pressure' // Pa, absolute
  | 'pressureDifference' // Pa
  | 'temperature' // K
  | 'temperatureDifference' // K
  | 'specificEnthalpy' // J/kg
  | 'specificEntropy' // J/(kg K)
  | 'specificVolume' // m3/kg
  | 'specificHeat' // J/(kg K)
  | 'power' // W, mechanical or electric
  | 'heatFlow' // W
  | 'ratio' // 1, shown as per cent: efficiencies, loss fractions, shares
  | 'dryness' // 1, shown as a fraction
  | 'number' // 1, shown as it is: exponents, factors
  | 'area' // m2
  | 'velocity' // m/s
  | 'volumeFlow' // m3/s
  | 'length' // m
  | 'conductance' // W/K
  | 'heatRate' // J/J
  | 'steamRate' // kg/J
  | 'entropyFlow' // W/K
  | 'flowConstant' // kg/s over sqrt(Pa/(m3/kg)), which is m2
  | 'lossConstant' // Pa over (kg/s)2 m3/kg, which is 1/m4
