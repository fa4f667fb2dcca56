/**
 * Value of a printed formula: + and −, products by a blank, quotients by /, from left to right; a
 * trailing ² or ^ binds tighter, a leading − less tight than they do.
 */
export function readFormula(text: string, values: Readonly<Record<string, number>>): number {
  const tokens = text.match(/\d+(?:\.\d+)?(?:e[-+]?\d+)?|[a-z]+|[-+−/^²√()]/g) ?? []
  let at = 0

  const sum = (): number => {
    let total = product()
    for (;;) {
      if (tokens[at] === '+') {
        at++
        total += product()
      } else if (tokens[at] === '−') {
        at++
        total -= product()
      } else return total
    }
  }
  const product = (): number => {
    if (tokens[at] === '−') {
      at++
      return -product()
    }
    let result = raised()
    for (;;) {
      const token = tokens[at]
      if (token === '/') {
        at++
        result /= raised()
      } else if (token !== undefined && /^[\da-z(√]/.test(token)) result *= raised()
      else return result
    }
  }
  const raised = (): number => {
    let base = atom()
    for (;;) {
      if (tokens[at] === '²') {
        at++
        base *= base
      } else if (tokens[at] === '^') {
        at++
        base **= atom()
      } else return base
    }
  }
  const atom = (): number => {
    const token = tokens[at++]
    if (token === undefined) throw new Error(`${text} ends too early`)
    if (token === '(') {
      const value = sum()
      if (tokens[at++] !== ')') throw new Error(`${text} lacks a closing bracket`)
      return value
    }
    if (token === '√') return Math.sqrt(atom())
    if (token === 'ln') return Math.log(atom())
    if (token === 'exp') return Math.exp(atom())
    if (token in values) return values[token]!
    return Number(token)
  }

  const value = sum()
  if (at !== tokens.length) throw new Error(`${text} goes on after ${at} tokens`)
  return value
}
