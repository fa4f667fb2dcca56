import type { SymbolDrawing } from './symbol.ts'

/** Stands for a kind that has no symbol: its streams meet the sides of a dashed box. */
export const unknown: SymbolDrawing = {
  size: () => ({ width: 48, height: 48 }),
  ports: {},
  Drawing: () => <path strokeDasharray="4 3" d="M0 0H48V48H0Z" />,
  label: ['top', 'bottom', 'right', 'left'],
}
