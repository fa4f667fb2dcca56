import type { Layout } from '../../src/document.ts'
import type { BalanceMessage, NamesMessage } from '../../src/messages.ts'
import { useBalanceStore } from '../store/balance-store.ts'
import { readLayout } from '../store/plant-store.ts'

/** What a chart is drawn from. */
export interface ChartSource {
  readonly layout: Layout
  readonly names: NamesMessage | null
  readonly balance: BalanceMessage | null
}

/** The balance shown, for use outside React. */
export function readChartSource(): ChartSource {
  const { names, balance } = useBalanceStore.getState()
  return { layout: readLayout(), names, balance }
}
