/** At which of its totals another layout or case is solved, and the total's value there, SI. */
export interface EqualBasis {
  readonly basis: 'power' | 'fuel' | 'steam'
  /** Net power, W; fuel heat, W; flow of main steam, kg/s. */
  readonly value: number
}
