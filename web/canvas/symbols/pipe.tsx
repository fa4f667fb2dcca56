import type { SymbolDrawing } from './symbol.ts'

export const pipe: SymbolDrawing = {
  size: ({ upright }) => (upright ? { width: 16, height: 16 } : { width: 24, height: 16 }),
  body: ({ upright }) =>
    upright ? { x: 2, y: 0, width: 12, height: 16 } : { x: 0, y: 2, width: 24, height: 12 },
  ports: {
    inlet: ({ upright }) => [upright ? { x: 8, y: 0, side: 'top' } : { x: 0, y: 8, side: 'left' }],
    outlet: ({ upright }) => [
      upright ? { x: 8, y: 16, side: 'bottom' } : { x: 24, y: 8, side: 'right' },
    ],
  },
  Drawing: ({ form }) =>
    form.upright ? (
      <>
        <path d="M4 0H12V16H4Z" />
        <path className="open" d="M2 0H14M2 16H14" />
      </>
    ) : (
      <>
        <path d="M0 4H24V12H0Z" />
        <path className="open" d="M0 2V14M24 2V14" />
      </>
    ),
  label: ['top', 'right', 'bottom', 'left'],
  turns: true,
}
