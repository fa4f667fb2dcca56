import { Level } from './marks.tsx'
import { at, inTurn, type SymbolDrawing } from './symbol.ts'

export const flashVessel: SymbolDrawing = {
  size: () => ({ width: 32, height: 56 }),
  ports: {
    'inlet*': inTurn(
      { x: 0, y: 24, side: 'left' },
      { x: 32, y: 24, side: 'right' },
      { x: 0, y: 16, side: 'left' },
      { x: 32, y: 16, side: 'right' },
    ),
    steam: at(16, 0, 'top'),
    water: at(16, 56, 'bottom'),
  },
  Drawing: () => (
    <>
      <rect width={32} height={56} rx={16} />
      <Level x={0} y={36} width={32} mark={16} />
    </>
  ),
  label: ['right', 'left', 'bottom', 'top'],
}
