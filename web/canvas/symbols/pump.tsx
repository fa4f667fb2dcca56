import type { SymbolDrawing } from './symbol.ts'

export const pump: SymbolDrawing = {
  size: () => ({ width: 32, height: 32 }),
  body: () => ({ x: 4, y: 4, width: 24, height: 24 }),
  ports: {
    suction: () => [
      { x: 4, y: 16, side: 'left' },
      { x: 16, y: 4, side: 'top' },
      { x: 16, y: 28, side: 'bottom' },
    ],
    discharge: () => [{ x: 28, y: 16, side: 'right' }],
  },
  Drawing: () => (
    <>
      <circle cx={16} cy={16} r={12} />
      <path d="M10 5.6L28 16L10 26.4Z" />
    </>
  ),
  label: ['bottom', 'top', 'left', 'right'],
  axis: () => 16,
}
