import type { SymbolDrawing } from './symbol.ts'

export const valve: SymbolDrawing = {
  size: ({ upright }) => (upright ? { width: 16, height: 24 } : { width: 24, height: 16 }),
  ports: {
    inlet: ({ upright }) => [upright ? { x: 8, y: 0, side: 'top' } : { x: 0, y: 8, side: 'left' }],
    outlet: ({ upright }) => [
      upright ? { x: 8, y: 24, side: 'bottom' } : { x: 24, y: 8, side: 'right' },
    ],
  },
  Drawing: ({ form }) => (
    <path d={form.upright ? 'M1 0H15L8 12ZM1 24H15L8 12Z' : 'M0 1V15L12 8ZM24 1V15L12 8Z'} />
  ),
  label: ['top', 'right', 'bottom', 'left'],
  turns: true,
}
