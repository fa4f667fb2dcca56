/**
 * One term n x^I y^J of a published sum, as the release prints it: the exponents of the first and
 * the second reduced variable and the coefficient.
 */
export interface Term {
  readonly I: number
  readonly J: number
  readonly n: number
}
