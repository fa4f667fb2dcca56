import { describeQuantity, type Layout, splitPath, withinSentence } from '../../src/document.ts'

export interface QuantitySymbol {
  /** 'Q', 'TTD', 'm'; the label where the trade has no symbol. */
  readonly symbol: string
  /** Whose it is, as a subscript: the id; nothing for the plant. */
  readonly owner: string
}

/** Symbols of what a stream has beside the quantities that can be given. */
const further: Readonly<Record<string, string>> = {
  v: 'v',
  exergyDestroyed: 'Ed',
  entropyGenerated: 'Sgen',
  exergySupplied: 'Es',
  exergyDelivered: 'Eu',
}

/** A quantity as it stands in an equation. */
export function quantitySymbol(layout: Layout, path: string): QuantitySymbol {
  const [id = path, name = ''] = splitPath(path) ?? []
  const quantity = describeQuantity(layout, path)
  const number = quantity?.number === undefined ? '' : String(quantity.number)
  const symbol =
    quantity?.symbol === undefined
      ? (further[name] ?? withinSentence(quantity?.label ?? name))
      : `${quantity.symbol}${number}`
  return { symbol, owner: id === 'plant' ? '' : id }
}
