/** Names of equations that do not read well from their keys. */
const names: Readonly<Record<string, string>> = {
  duty: 'heat balance of the water',
  drive: 'drive efficiency',
  fuel: 'fuel heat',
  generator: 'generator efficiency',
}

/** An equation's key as words: `terminalDifference` to 'terminal difference', `flowLaw2` to 'flow law 2'. */
export function equationName(key: string): string {
  return (
    names[key] ??
    key
      .replace(/Relation$/, ' relation of steam')
      .replace(/Curve$/, ', the curve given')
      .replace(
        /([a-z])([A-Z])/g,
        (_, before: string, after: string) => `${before} ${after.toLowerCase()}`,
      )
      .replace(/([a-z])(\d+)$/, '$1 $2')
  )
}
